package poly

import (
	"errors"
	"fmt"
	"math/big"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/ringtest"
)

// shape bounds what genPoly draws.
type shape struct {
	vars, terms, degree int
	coef                *rapid.Generator[*big.Int]
}

var (
	smallInts = rapid.Map(ringtest.Small(), big.NewInt)
	// tiny polynomials collide and cancel often.
	tiny = shape{3, 5, 3, smallInts}
	// edge polynomials have coefficients about the ends of a word.
	edge = shape{3, 5, 3, ringtest.Integer()}
	// wide polynomials need several words for a monomial.
	wide = shape{24, 6, 40, ringtest.Integer()}
)

// poly draws a polynomial: 0, a constant, a single term, or a sum.
func (s shape) poly() *rapid.Generator[Poly] {
	return rapid.Custom(func(t *rapid.T) Poly {
		n := rapid.IntRange(0, s.terms).Draw(t, "terms")
		terms := make([]Term, n)
		for i := range terms {
			terms[i] = Term{s.coef.Draw(t, "coef"), s.mono().Draw(t, "mono")}
		}
		return FromTerms(terms)
	})
}

// nonzero draws a polynomial other than 0.
func (s shape) nonzero() *rapid.Generator[Poly] {
	return rapid.Map(s.poly(), func(p Poly) Poly {
		if p.IsZero() {
			return FromInt(1)
		}
		return p
	})
}

// mono draws a monomial. Variables are numbered with gaps.
func (s shape) mono() *rapid.Generator[[]Power] {
	return rapid.Custom(func(t *rapid.T) []Power {
		var m []Power
		for v := range s.vars {
			if e := rapid.IntRange(-s.degree, s.degree).Draw(t, "exp"); e > 0 {
				m = append(m, Power{Var(3*v + 1), uint32(e)})
			}
		}
		return m
	})
}

// shapes runs a property on every shape.
func shapes(t *testing.T, property func(t *rapid.T, s shape)) {
	for name, s := range map[string]shape{"tiny": tiny, "edge": edge, "wide": wide} {
		t.Run(name, func(t *testing.T) {
			rapid.Check(t, func(t *rapid.T) { property(t, s) })
		})
	}
}

// canonical reports how p departs from the invariants of the representation.
func canonical(p Poly) error {
	d := p.d
	if d == nil {
		return nil
	}
	n := d.len()
	if n == 0 || (d.co == nil) == (d.bg == nil) || len(d.exps) != n*d.lay.words {
		return fmt.Errorf("lengths: %d exponents, %d and %d coefficients", len(d.exps), len(d.co), len(d.bg))
	}
	if want := newLayout(d.lay.vars, d.need()); want.words != d.lay.words || !slices.Equal(want.field, d.lay.field) {
		return errors.New("the layout is not the canonical one")
	}
	if !slices.IsSorted(d.lay.vars) || len(slices.Compact(slices.Clone(d.lay.vars))) != len(d.lay.vars) {
		return errors.New("variables are not increasing")
	}
	or := d.lay.orOf(d.exps)
	for i, v := range d.lay.vars {
		if d.lay.exp(or, i) == 0 {
			return fmt.Errorf("variable %d does not occur", v)
		}
	}
	small := true
	for i := range n {
		if i > 0 && compareMono(d.mono(i-1), d.mono(i)) <= 0 {
			return errors.New("terms are not decreasing")
		}
		if !d.lay.divides(make([]uint64, d.lay.words), d.mono(i), make([]uint64, d.lay.words)) {
			return errors.New("a guard bit is set")
		}
		c := d.coef(i)
		if c.Sign() == 0 {
			return errors.New("a coefficient is zero")
		}
		if _, ok := fitsWord(c); !ok {
			small = false
		}
	}
	if small != (d.bg == nil) {
		return errors.New("coefficients are big without need, or words that do not fit")
	}
	return nil
}

// must fails unless p is canonical, and returns it.
func must(t interface{ Fatalf(string, ...any) }, p Poly) Poly {
	if err := canonical(p); err != nil {
		t.Fatalf("%v is not canonical: %v", p, err)
	}
	return p
}

// wantEqual fails unless both are canonical and equal.
func wantEqual(t interface {
	Fatalf(string, ...any)
	Helper()
}, got, want Poly) {
	t.Helper()
	if !must(t, got).Equal(must(t, want)) {
		t.Fatalf("got\n  %v\nwant\n  %v", got, want)
	}
	if got.Hash() != want.Hash() || got.Compare(want) != 0 {
		t.Fatalf("equal polynomials %v with different hashes or order", got)
	}
}
