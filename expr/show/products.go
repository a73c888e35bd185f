package show

// A Lagrangian as a sum of products of two fields with a coefficient before each, as it
// stands before anything is eliminated. Powers of k² are Laplacians: of one field where the
// two are unlike, on both in equal shares where they are alike.

import (
	"remnant/expr/field"
)

// FieldProduct is Coef·k²ⁿ·u⁽ⁱ⁾v⁽ʲ⁾ with n = Laplacians. Symbol, if not empty, is a named
// factor behind Coef. Of unlike fields V takes the Laplacians: k²ⁿuv is (−1)ⁿ u ∂²ⁿv.
type FieldProduct struct {
	Coef           field.Elem // not zero
	Symbol         string
	U, V           string
	UOrder, VOrder int // of the time derivatives
	Laplacians     int
}

// FieldProducts is the sum of the products in the order given.
func FieldProducts(list []FieldProduct) Node {
	var out []Node
	for _, p := range list {
		out = append(out, p.node())
	}
	return Sum(out...)
}

func (p FieldProduct) node() Node {
	u, v := symbol{name: p.U, primes: p.UOrder}, symbol{name: p.V, primes: p.VOrder}
	c, fields := p.Coef, square(p.Laplacians, u)
	switch {
	case u.same(v):
	case p.Laplacians == 0:
		fields = Product(u, v)
	default:
		if p.Laplacians%2 != 0 {
			c = c.Neg()
		}
		fields = Product(u, Spatial(p.V, p.VOrder, 2*p.Laplacians))
	}
	q := fractionOf(c)
	if p.Symbol != "" {
		q.num = append(q.num, symbol{name: p.Symbol})
	}
	return q.times(fields, true)
}
