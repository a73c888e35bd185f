package parse

import (
	"fmt"

	"remnant/parse/diag"
)

// Operators: polynomials in box, with coefficients that depend on time, acting on forms.

// apply lets an operator act on f. Factors compose, the last one acts first.
func (e *elaborator) apply(operator Expr, f form) form {
	if !hasBox(operator) {
		panic(newFault(diag.NotAnOperator, operator.Span(), fmt.Sprintf("'%s' is no operator", brief(operator)), "an operator contains box: (box - m^2)[zeta]; elsewhere brackets are round"))
	}
	return e.act(operator, f)
}

// act lets one factor or term of an operator act on f.
func (e *elaborator) act(x Expr, f form) form {
	if !hasBox(x) {
		return e.mul(e.eval(x), f, x.Span())
	}
	switch n := x.(type) {
	case *Name:
		g := f.box(e.model.A, e.model.Lapse)
		e.limitJets(g, n.At)
		return g
	case *Paren:
		return e.act(n.X, f)
	case *Sign:
		g := e.act(n.X, f)
		if n.Minus {
			g = g.scale(e.k.Int(-1))
		}
		return g
	case *Sum:
		var c collector
		for _, t := range n.Terms {
			g := e.act(t.X, f)
			if t.Minus {
				g = g.scale(e.k.Int(-1))
			}
			c.addForm(g)
		}
		return c.form()
	case *Product:
		for i := len(n.Factors) - 1; i >= 0; i-- {
			o := n.Factors[i]
			switch {
			case !o.Over:
				f = e.act(o.X, f)
			case hasBox(o.X):
				panic(newFault(diag.NotYetSupported, o.X.Span(), "an operator in a denominator is not yet supported", "sums, products and powers of box can be used"))
			default:
				f = f.scale(e.divisor(o.X, "the model divides by it"))
			}
		}
		return f
	case *Power:
		if !hasBox(n.Exponent) {
			return e.actPower(n, f)
		}
	}
	panic(newFault(diag.NotYetSupported, x.Span(), fmt.Sprintf("the operator '%s' is not yet supported", brief(x)), "sums, products and powers of box can be used"))
}

func (e *elaborator) actPower(n *Power, f form) form {
	r := e.exponent(n.Exponent)
	if !r.IsInt() || r.Sign() < 0 {
		panic(newFault(diag.NotYetSupported, n.Exponent.Span(), "powers of operators other than whole ones are not yet supported", "box^2[zeta] acts twice"))
	}
	e.limitPower(r.Num(), n)
	e.limitOrder(2*int(r.Num().Int64()), n.At)
	for range r.Num().Int64() {
		f = e.act(n.Base, f)
	}
	return f
}
