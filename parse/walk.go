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

// Expressions returns the expressions of a statement in the order of the text.
func (s *Statement) Expressions() []Expr {
	var list []Expr
	formula := func(f *Formula) {
		if f != nil {
			list = append(list, f.X)
		}
	}
	switch {
	case s.Functions != nil:
		for _, f := range s.Functions {
			if f.Definition != nil {
				list = append(list, f.Definition.X)
			}
		}
	case s.FormFactor != nil:
		formula(s.FormFactor.Definition)
		if r := s.FormFactor.Rule; r != nil {
			formula(r.Value)
		}
	case s.Let != nil:
		formula(s.Let.Value)
	case s.Given != nil:
		formula(s.Given.Left)
		formula(s.Given.Right)
	case s.Lagrangian != nil:
		formula(s.Lagrangian.Value)
	case s.Keep != nil:
		formula(s.Keep.Definition)
	case s.Numbers != nil:
		for _, e := range s.Numbers {
			list = append(list, e.Left.X, e.Right.X)
		}
	}
	return list
}
