package series

// A series with its order of truncation.

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// Exact is the order of a series that is known to the end.
const Exact = math.MaxInt

// Series is Σ cₙ + O(order), with cₙ homogeneous of weight n, val ≤ n < order. It is
// immutable.
//
// Invariant: coefs is empty, or its first and last entries are not zero; val+len(coefs) ≤
// order. Generators of the field that the unknown rest may hold are listed in support,
// sorted.
type Series struct {
	g       *Grading
	val     int
	coefs   []field.Elem
	order   int
	support []field.Gen
}

// make brings the parts of a series to the normal form of the invariant.
func (g *Grading) make(val int, coefs []field.Elem, order int, support []field.Gen) Series {
	if n := order - val; order != Exact && n < len(coefs) {
		coefs = coefs[:max(n, 0)]
	}
	for len(coefs) > 0 && coefs[0].IsZero() {
		coefs, val = coefs[1:], val+1
	}
	for len(coefs) > 0 && coefs[len(coefs)-1].IsZero() {
		coefs = coefs[:len(coefs)-1]
	}
	if len(coefs) == 0 {
		val = 0
	}
	return Series{g, val, coefs, order, support}
}

// Zero is 0 + O(order).
func (g *Grading) Zero(order int) Series { return Series{g: g, order: order} }

// Int is the integer n, exact.
func (g *Grading) Int(n int64) Series { return g.make(0, []field.Elem{g.f.Int(n)}, Exact, nil) }

// Grading is the grading that s is a series in.
func (s Series) Grading() *Grading { return s.g }

// Order is the lowest weight of which nothing is known, or Exact.
func (s Series) Order() int { return s.order }

// IsZero reports whether no non-zero coefficient of s is known.
func (s Series) IsZero() bool { return len(s.coefs) == 0 }

// Valuation is the weight of the first term; for a series without terms it is the order.
func (s Series) Valuation() int {
	if s.IsZero() {
		return s.order
	}
	return s.val
}

// Lead is the first non-zero coefficient, zero if there is none.
func (s Series) Lead() field.Elem {
	if s.IsZero() {
		return field.Elem{}
	}
	return s.coefs[0]
}

// Coef is the part of weight n, and whether it is known.
func (s Series) Coef(n int) (c field.Elem, known bool) {
	if i := n - s.val; i >= 0 && i < len(s.coefs) {
		return s.coefs[i], true
	}
	return field.Elem{}, n < s.order
}

// Term is one part of a series.
type Term struct {
	Power int        // its weight
	Coef  field.Elem // homogeneous of that weight
}

// Terms lists the non-zero parts by increasing weight.
func (s Series) Terms() []Term {
	var out []Term
	for i, c := range s.coefs {
		if !c.IsZero() {
			out = append(out, Term{s.val + i, c})
		}
	}
	return out
}

// Elem is the sum of the known terms.
func (s Series) Elem() field.Elem { return field.Sum(s.coefs) }

// Truncate is s with nothing kept of weight order and above. A series that is exact and
// ends before stays exact.
func (s Series) Truncate(order int) Series {
	if order >= s.order || s.order == Exact && s.val+len(s.coefs) <= order {
		return s
	}
	return s.g.make(s.val, s.coefs, order, s.support)
}

// Equal reports whether s and t agree in all weights that are known of both.
func (s Series) Equal(t Series) bool { return s.Sub(t).IsZero() }

// Monomial is a product of powers of weighted generators, times a coefficient free of them.
type Monomial struct {
	Powers []poly.Power
	Coef   field.Elem
}

// Monomials splits the part of weight n by powers of the weighted generators, in decreasing
// lexicographic order. It is false if the part is unknown or no polynomial in them.
func (s Series) Monomials(n int) ([]Monomial, bool) {
	c, known := s.Coef(n)
	if !known {
		return nil, false
	}
	if c.IsZero() {
		return nil, true
	}
	c = c.Lowest()
	num, den := c.Num(), c.Den()
	if slices.ContainsFunc(den.Vars(), s.g.involved) {
		return nil, false
	}
	list := groupTerms(num, func(x field.Gen) bool { _, ok := s.g.weighted(x); return ok })
	out := make([]Monomial, len(list))
	for i, gr := range list {
		rest := poly.FromTerms(gr.rest)
		if slices.ContainsFunc(rest.Vars(), s.g.involved) {
			return nil, false
		}
		out[i] = Monomial{gr.own, s.g.elem(rest).Div(s.g.elem(den))}
	}
	slices.SortStableFunc(out, func(a, b Monomial) int {
		return poly.FromMono(b.Powers).Compare(poly.FromMono(a.Powers))
	})
	return out, true
}

// involved reports whether a weighted generator is x, or stands inside the root or function
// x.
func (g *Grading) involved(x field.Gen) bool {
	if _, ok := g.weighted(x); ok {
		return true
	}
	in := g.f.Info(x)
	switch in.Kind {
	case field.Root, field.Elementary:
		return slices.ContainsFunc(in.Arg.Gens(), g.involved)
	case field.FreeFunction:
		for _, arg := range in.Fn.Args {
			if slices.ContainsFunc(arg.Gens(), g.involved) {
				return true
			}
		}
	}
	return false
}

// elem is a polynomial whose generators are values of the field already.
func (g *Grading) elem(p poly.Poly) field.Elem {
	e, err := g.f.Poly(p)
	if err != nil {
		panic("series: a polynomial has no value: " + err.Error())
	}
	return e
}

// String writes s for tests and debugging.
func (s Series) String() string {
	var parts []string
	for _, t := range s.Terms() {
		parts = append(parts, "["+t.Coef.String()+"]")
	}
	if s.order != Exact {
		parts = append(parts, fmt.Sprintf("O(%d)", s.order))
	}
	if len(parts) == 0 {
		return "0"
	}
	return strings.Join(parts, " + ")
}
