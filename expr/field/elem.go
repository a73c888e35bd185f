package field

import (
	"math/big"
	"slices"

	"remnant/expr/poly"
)

// Elem is an element of a field: num / (den.int · Π factorᵉ). The numerator and the
// denominator have no common factor of the basis and no common integer; the denominator
// holds no root, and no leader of a relation stands anywhere. Elements are immutable. The
// zero value is 0 of any field.
type Elem struct {
	f   *Field
	num poly.Poly
	den denominator
}

// denominator is a positive integer (nil: 1) times powers of factors, exponents positive,
// sorted by factor.
type denominator struct {
	int *big.Int
	pow []power
}

// Field is the field that e belongs to; nil for the zero value.
func (e Elem) Field() *Field { return e.f }

// IsZero reports whether e is zero.
func (e Elem) IsZero() bool { return e.num.IsZero() }

// IsOne reports whether e is one.
func (e Elem) IsOne() bool { return e.num.IsOne() && e.isPoly() }

func (e Elem) isPoly() bool { return e.den.int == nil && len(e.den.pow) == 0 }

// Equal reports whether a and b are the same element.
func (a Elem) Equal(b Elem) bool {
	if a.sameDen(b) {
		return a.num.Equal(b.num)
	}
	return a.Sub(b).IsZero()
}

func (a Elem) sameDen(b Elem) bool {
	if (a.den.int == nil) != (b.den.int == nil) || a.den.int != nil && a.den.int.Cmp(b.den.int) != 0 {
		return false
	}
	return slices.Equal(a.den.pow, b.den.pow)
}

// Rat is the value of e if it is a rational number.
func (e Elem) Rat() (*big.Rat, bool) {
	c, ok := e.num.Const()
	if !ok || len(e.den.pow) > 0 {
		return nil, false
	}
	r := new(big.Rat).SetInt(c)
	if e.den.int != nil {
		r.Quo(r, new(big.Rat).SetInt(e.den.int))
	}
	return r, true
}

// Num is the numerator over Den, with integer coefficients.
func (e Elem) Num() poly.Poly { return e.live().num }

// DenInt is the integer in the denominator, positive.
func (e Elem) DenInt() *big.Int {
	if e.den.int == nil {
		return big.NewInt(1)
	}
	return new(big.Int).Set(e.den.int)
}

// Den is the whole denominator, expanded. The algebra never needs it.
func (e Elem) Den() poly.Poly {
	d := poly.FromBig(e.DenInt())
	if e.f == nil {
		return d
	}
	e = e.live()
	for _, p := range e.den.pow {
		d = e.f.mulPower(d, p.id, p.exp)
	}
	return d
}

// Terms is the size of e: the terms of the numerator and of the denominator's factors.
func (e Elem) Terms() int {
	n := e.num.Len()
	for _, p := range e.den.pow {
		n += e.f.factors[p.id].p.Len()
	}
	return n
}

// Gens lists the generators that stand in e, in increasing order.
func (e Elem) Gens() []Gen {
	e = e.live()
	seen := map[Gen]bool{}
	for _, v := range e.num.Vars() {
		seen[v] = true
	}
	for _, p := range e.den.pow {
		for _, v := range e.f.factors[p.id].p.Vars() {
			seen[v] = true
		}
	}
	out := make([]Gen, 0, len(seen))
	for g := range seen {
		out = append(out, g)
	}
	slices.Sort(out)
	return out
}

// Has reports whether generator g stands in e.
func (e Elem) Has(g Gen) bool {
	e = e.live()
	if e.num.Has(g) {
		return true
	}
	for _, p := range e.den.pow {
		if e.f.factors[p.id].p.Has(g) {
			return true
		}
	}
	return false
}

// live brings the denominator up to date with the basis.
func (e Elem) live() Elem {
	if e.f != nil && e.f.splits > 0 && len(e.den.pow) > 0 {
		if ps := e.f.livePowers(e.den.pow); !slices.Equal(ps, e.den.pow) {
			e.den.pow = ps
			e = e.cancel(ps)
		}
	}
	return e
}

func sortPowers(m map[int32]int32) []power {
	out := make([]power, 0, len(m))
	for id, exp := range m {
		if exp != 0 {
			out = append(out, power{id, exp})
		}
	}
	slices.SortFunc(out, func(a, b power) int { return int(a.id) - int(b.id) })
	return out
}

// String writes e for tests and debugging; package show writes it for people.
func (e Elem) String() string {
	if e.f == nil {
		return "0"
	}
	name := func(g Gen) string { return e.f.plainName(g) }
	s := e.num.Format(name)
	if e.isPoly() {
		return s
	}
	s = "(" + s + ")"
	if e.den.int != nil {
		s += "/" + e.den.int.String()
	}
	for _, p := range e.den.pow {
		s += "/(" + e.f.factors[p.id].p.Format(name) + ")"
		if p.exp > 1 {
			s += "^" + big.NewInt(int64(p.exp)).String()
		}
	}
	return s
}

func (f *Field) plainName(g Gen) string {
	in := f.gens[g]
	s := in.Name
	switch in.Kind {
	case Function:
		for range in.Order {
			s += "'"
		}
	case FreeFunction:
		for i, n := range in.Index {
			for range n {
				s += "," + in.Fn.ArgNames[i]
			}
		}
	case Root, Elementary:
		s += "(" + in.Arg.String() + ")"
	}
	return s
}

// CoeffsIn gives e as a polynomial in generator g, coefficients by power; false if g stands
// in the denominator.
func (e Elem) CoeffsIn(g Gen) ([]Elem, bool) {
	e = e.live()
	unit := Elem{f: e.f, num: poly.FromInt(1), den: e.den}
	if unit.Has(g) {
		return nil, false
	}
	var out []Elem
	for _, c := range e.num.CoeffsIn(g) {
		out = append(out, Elem{f: e.f, num: c}.Mul(unit))
	}
	return out, true
}
