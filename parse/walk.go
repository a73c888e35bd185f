package parse

// Walk calls visit for x and for everything below it, in the order of the text; where
// visit returns false, what is below is passed over.
func Walk(x Expr, visit func(Expr) bool) {
	if x == nil || !visit(x) {
		return
	}
	switch n := x.(type) {
	case *Number, *Name:
	case *Paren:
		Walk(n.X, visit)
	case *Sign:
		Walk(n.X, visit)
	case *Sum:
		for _, t := range n.Terms {
			Walk(t.X, visit)
		}
	case *Product:
		for _, f := range n.Factors {
			Walk(f.X, visit)
		}
	case *Power:
		Walk(n.Base, visit)
		Walk(n.Exponent, visit)
	case *Factorial:
		Walk(n.X, visit)
	case *Prime:
		Walk(n.X, visit)
	case *Deriv:
		Walk(n.X, visit)
	case *Index:
		Walk(n.X, visit)
	case *Call:
		Walk(n.Fun, visit)
		for _, a := range n.Args {
			Walk(a, visit)
		}
	case *Apply:
		Walk(n.Operator, visit)
		Walk(n.X, visit)
	default:
		panic("parse: unknown node in a tree")
	}
}
