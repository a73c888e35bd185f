package field

// What is known and what is assumed of signs. Every division by something that could vanish
// records that it does not.

import (
	"math/big"

	"remnant/expr/poly"
)

// Assumption is a condition under which a computation holds.
type Assumption struct {
	Factor   Elem   // a factor of the basis
	Positive bool   // it is assumed positive, else only non-zero
	Why      string // what needed it, in words: "the relation for V,phi divides by it"
}

// Assumptions lists what was recorded on the field, in order.
func (f *Field) Assumptions() []Assumption { return append([]Assumption(nil), f.assumptions...) }

// Vanishable lists the factors of the numerator of e that could be zero: neither numbers nor
// of a declared or evident sign. A division by e needs exactly these to be non-zero.
func (e Elem) Vanishable() []Elem {
	if e.IsZero() {
		return nil
	}
	f := e.f
	_, num := f.rationalise(e.num)
	_, powers := f.factorise(num)
	var out []Elem
	for _, p := range powers {
		if q := f.factors[p.id].p; f.polySign(q) == Unknown {
			out = append(out, Elem{f: f, num: q})
		}
	}
	return out
}

// AssumeNonzero records that e does not vanish, factor by factor, unless that is known.
func (f *Field) AssumeNonzero(e Elem, why string) {
	for _, q := range e.Vanishable() {
		f.assume(Assumption{Factor: q, Why: why})
	}
}

func (f *Field) assumePositive(e Elem, why string) {
	if e.Sign() != Positive {
		f.assume(Assumption{Factor: e, Positive: true, Why: why})
	}
}

func (f *Field) assume(a Assumption) {
	for i, old := range f.assumptions {
		if old.Factor.Equal(a.Factor) {
			f.assumptions[i].Positive = old.Positive || a.Positive
			return
		}
	}
	f.assumptions = append(f.assumptions, a)
}

// assumedNonzero reports whether the factor q was assumed not to vanish.
func (f *Field) assumedNonzero(q poly.Poly) bool {
	for _, a := range f.assumptions {
		if a.Factor.num.Equal(q) {
			return true
		}
	}
	return false
}

// Sign is the sign of e as it follows from the declared signs of the generators; Unknown
// where it does not follow. Zero has an unknown sign.
func (e Elem) Sign() Sign {
	if e.IsZero() {
		return Unknown
	}
	f, e := e.f, e.live()
	content, powers := f.factorise(e.num)
	s := Sign(content.Sign())
	for _, p := range append(powers, f.livePowers(e.den.pow)...) {
		if p.exp%2 != 0 {
			s *= f.polySign(f.factors[p.id].p)
		} else if len(f.roots) > 0 && f.holdsRoot(f.factors[p.id].p) {
			s *= f.polySign(f.factors[p.id].p)
		}
	}
	return s
}

func (f *Field) holdsRoot(p poly.Poly) bool {
	for _, g := range f.roots {
		if p.Has(g) {
			return true
		}
	}
	return false
}

// polySign is the sign of p where all its terms have one sign, of which one does not vanish.
func (f *Field) polySign(p poly.Poly) Sign {
	all, strict := Unknown, false
	for mono, c := range p.Terms() {
		s, sure := f.termSign(mono, c)
		if s == Unknown || all != Unknown && s != all {
			return Unknown
		}
		all, strict = s, strict || sure
	}
	if !strict {
		return Unknown
	}
	return all
}

// termSign is the sign of one term as far as it is known; sure, if it cannot vanish.
func (f *Field) termSign(mono []poly.Power, c *big.Int) (s Sign, sure bool) {
	s, sure = Sign(c.Sign()), true
	for _, m := range mono {
		g := f.gens[m.Var].Sign
		switch {
		case m.Exp%2 == 0:
			sure = sure && g != Unknown
		default:
			s *= g
		}
	}
	return s, sure
}
