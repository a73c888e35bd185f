package poly

import (
	"math/bits"
	"testing"

	"pgregory.net/rapid"
)

// TestExtremes: degrees and valuations of all variables at once, in the polynomial's
// layout and in one with fields of unequal width, against one variable at a time.
func TestExtremes(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p := s.nonzero().Draw(t, "p")
		l := p.d.lay
		width := make([]int, len(l.vars))
		for i, v := range l.vars {
			width[i] = bits.Len(uint(p.Degree(v)))
		}
		layouts := []*layout{l}
		if k := tightLayout(l.vars, width); k != nil {
			layouts = append(layouts, k)
		}
		for _, k := range layouts {
			exps := l.repack(p.d.exps, k)
			hi, lo := k.degrees(exps), k.valuations(exps)
			for i, v := range l.vars {
				if int(hi[i]) != p.Degree(v) || int(lo[i]) != p.MinDegree(v) {
					t.Fatalf("x%d in %v: from %d to %d", v, p, lo[i], hi[i])
				}
			}
		}
	})
}

// TestRepack: monomials survive the way to another layout and back.
func TestRepack(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p, q := s.nonzero().Draw(t, "p"), s.nonzero().Draw(t, "q")
		l, pe, qe := common(p.d, q.d)
		for _, x := range []struct {
			p    Poly
			exps []uint64
		}{{p, pe}, {q, qe}} {
			b := builder{lay: l, exps: x.exps, co: x.p.d.co, bg: x.p.d.bg}
			wantEqual(t, b.canonical(), x.p)
		}
	})
}

// TestMonomialOrder: lexicographic, lower variables first.
func TestMonomialOrder(t *testing.T) {
	falling := [][]Power{{{0, 2}}, {{0, 1}, {1, 3}}, {{0, 1}, {2, 9}}, {{0, 1}}, {{1, 1}, {2, 1}}, {{1, 1}}, {{2, 40}}, nil}
	p := Poly{}
	for _, m := range falling {
		p = p.Add(FromMono(m))
	}
	i := 0
	for m := range p.Terms() {
		if want := FromMono(falling[i]); !FromMono(m).Equal(want) {
			t.Errorf("term %d is %v, want %v", i, m, want)
		}
		i++
	}
}
