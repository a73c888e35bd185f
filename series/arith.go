package series

// Sums and products, and what they know. The order of a product is that of the unknown rest
// of one factor times the first term of the other.

import (
	"fmt"
	"math/big"
	"slices"

	"remnant/expr/field"
)

// NoLead is returned where an operation needs the first term of a series of which no term is
// known.
type NoLead struct{ Order int }

func (e *NoLead) Error() string {
	if e.Order == Exact {
		return "division by zero"
	}
	return fmt.Sprintf("division by a series that is zero as far as it is known, up to terms of order %d", e.Order)
}

// Endless is returned where a result never ends and neither its operand nor the caller says
// where to truncate it.
type Endless struct{}

func (*Endless) Error() string { return "the series does not end and needs an order of truncation" }

// shift is the order n plus d; Exact stays.
func shift(n, d int) int {
	if n == Exact || d == Exact {
		return Exact
	}
	return n + d
}

// with is the grading that s and t share; it panics if they belong to two.
func (s Series) with(t Series) *Grading {
	if s.g != t.g {
		panic("series: operands have unlike gradings")
	}
	return s.g
}

func union(a, b []field.Gen) []field.Gen {
	if len(a) == 0 || slices.Equal(a, b) {
		return b
	}
	if len(b) == 0 {
		return a
	}
	out := append(slices.Clone(a), b...)
	slices.Sort(out)
	return slices.Compact(out)
}

// Neg is −s.
func (s Series) Neg() Series { return s.each(field.Elem.Neg) }

func (s Series) each(fn func(field.Elem) field.Elem) Series {
	out := make([]field.Elem, len(s.coefs))
	for i, c := range s.coefs {
		out[i] = fn(c)
	}
	return s.g.make(s.val, out, s.order, s.support)
}

// Add is s + t; its order is the lower one.
func (s Series) Add(t Series) Series {
	g := s.with(t)
	order, support := min(s.order, t.order), union(s.support, t.support)
	switch {
	case s.IsZero():
		return g.make(t.val, t.coefs, order, support)
	case t.IsZero():
		return g.make(s.val, s.coefs, order, support)
	}
	val := min(s.val, t.val)
	out := make([]field.Elem, max(s.val+len(s.coefs), t.val+len(t.coefs))-val)
	copy(out[s.val-val:], s.coefs)
	for i, c := range t.coefs {
		j := i + t.val - val
		out[j] = out[j].Add(c)
	}
	return g.make(val, out, order, support)
}

// Sub is s − t.
func (s Series) Sub(t Series) Series { return s.Add(t.Neg()) }

// Scale is r·s.
func (s Series) Scale(r *big.Rat) Series {
	if r.Sign() == 0 {
		return s.g.Zero(Exact)
	}
	c := s.g.f.Rat(r)
	return s.each(c.Mul)
}

// Mul is s·t, of order min(v(s) + order(t), v(t) + order(s)).
func (s Series) Mul(t Series) Series {
	g := s.with(t)
	if s.order == Exact && s.IsZero() || t.order == Exact && t.IsZero() {
		return g.Zero(Exact)
	}
	order := min(shift(t.order, s.Valuation()), shift(s.order, t.Valuation()))
	return g.make(s.val+t.val, convolve(s.coefs, t.coefs, order, s.val+t.val), order, union(s.support, t.support))
}

// convolve multiplies coefficient lists as far as weights below order, the first product
// having weight val.
func convolve(a, b []field.Elem, order, val int) []field.Elem {
	if len(a) == 0 || len(b) == 0 {
		return nil
	}
	n := len(a) + len(b) - 1
	if order != Exact {
		n = min(n, max(order-val, 0))
	}
	out := make([]field.Elem, n)
	for i := range out {
		out[i] = convolution(a, b, i)
	}
	return out
}

// convolution is Σ a_j b_{i−j}.
func convolution(a, b []field.Elem, i int) field.Elem {
	var parts []field.Elem
	for j := max(0, i-len(b)+1); j <= i && j < len(a); j++ {
		if !a[j].IsZero() && !b[i-j].IsZero() {
			parts = append(parts, a[j].Mul(b[i-j]))
		}
	}
	return field.Sum(parts)
}

// Pow is sⁿ, truncated at order. A negative power needs a known first term, and fails with
// *NoLead without, or with *Endless if it would never end.
func (s Series) Pow(n int, order int) (Series, error) {
	if n < 0 {
		return s.power(big.NewRat(int64(n), 1), order)
	}
	out, base := s.g.Int(1), s
	for ; n > 0; n >>= 1 {
		if n&1 == 1 {
			out = out.Mul(base)
		}
		if n > 1 {
			base = base.Mul(base)
		}
	}
	return out.Truncate(order), nil
}

// Inv is 1/s, truncated at order. It fails as Pow does.
func (s Series) Inv(order int) (Series, error) { return s.Pow(-1, order) }

// Div is s/t, truncated at order. It fails as Pow does.
func (s Series) Div(t Series, order int) (Series, error) {
	s.with(t)
	if s.IsZero() && s.order == Exact {
		if t.IsZero() {
			return Series{}, &NoLead{t.order}
		}
		return s, nil
	}
	inv, err := t.Inv(shift(order, -s.Valuation()))
	if err != nil {
		return Series{}, err
	}
	return s.Mul(inv).Truncate(order), nil
}
