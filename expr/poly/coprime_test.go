package poly

import (
	"math/big"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// multiply is Π Basis[Index]ᴱˣᵖ.
func multiply(basis []Poly, powers []IndexPower) Poly {
	p := FromInt(1)
	for _, x := range powers {
		p = p.Mul(basis[x.Index].Pow(x.Exp))
	}
	return p
}

// checkBasis: pairwise coprime, primitive, positive, not constant.
func checkBasis(t *rapid.T, basis []Poly) {
	for i, b := range basis {
		if b.IsConst() || b.Sign() < 0 || b.Content().Cmp(big.NewInt(1)) != 0 {
			t.Fatalf("%v is not fit for a basis", must(t, b))
		}
		for _, c := range basis[:i] {
			if g := Gcd(b, c); !g.IsOne() {
				t.Fatalf("%v and %v have the common factor %v", b, c, g)
			}
		}
	}
}

func TestRefine(t *testing.T) {
	small := shape{3, 3, 2, smallInts}
	rapid.Check(t, func(t *rapid.T) {
		f := make([]Poly, 4)
		for i := range f {
			f[i] = small.nonzero().Draw(t, "factor")
		}
		// Products that share factors.
		basis := CoprimeBasis([]Poly{f[0].Mul(f[1]), f[1].Mul(f[1]).Mul(f[2])})
		checkBasis(t, basis)
		p := f[0].Mul(f[2]).Mul(f[2]).Mul(f[3])
		r := Refine(basis, p)
		checkBasis(t, r.Basis)
		wantEqual(t, multiply(r.Basis, r.Powers).MulInt(r.Unit), p)
		if len(r.Old) != len(basis) {
			t.Fatalf("%d old elements, want %d", len(r.Old), len(basis))
		}
		for i, b := range basis {
			wantEqual(t, multiply(r.Basis, r.Old[i]), b)
		}
		if !slices.IsSortedFunc(r.Powers, func(a, b IndexPower) int { return a.Index - b.Index }) {
			t.Fatalf("indices %v do not increase", r.Powers)
		}
	})
}

// TestRefineKeeps: what is coprime to p keeps its place, and what p is made of is found.
func TestRefineKeeps(t *testing.T) {
	x, y := FromVar(0), FromVar(1)
	one := FromInt(1)
	a, b, c, d := x.Add(one), y.Add(one), x.Add(y), x.Sub(y)
	r := Refine([]Poly{a, b.Mul(c), d}, c.Pow(2).Mul(d).MulInt(big.NewInt(-6)))
	want := []Poly{a, b, c, d}
	slices.SortFunc(want[1:3], Poly.Compare)
	if !slices.EqualFunc(r.Basis, want, Poly.Equal) || r.Unit.Int64() != -6 {
		t.Fatalf("basis %v, unit %v", r.Basis, r.Unit)
	}
	wantEqual(t, multiply(r.Basis, r.Powers), c.Pow(2).Mul(d))
	if len(r.Old[0]) != 1 || r.Old[0][0] != (IndexPower{0, 1}) || len(r.Old[1]) != 2 {
		t.Errorf("old elements %v", r.Old)
	}
	if r = Refine(nil, FromInt(-4)); len(r.Basis) != 0 || r.Unit.Int64() != -4 {
		t.Errorf("refinement by a constant: %v", r)
	}
}

func TestSquareFree(t *testing.T) {
	for name, s := range map[string]shape{"tiny": {3, 3, 2, smallInts}, "one": {1, 5, 5, smallInts}, "edge": {2, 3, 2, edge.coef}} {
		t.Run(name, func(t *testing.T) {
			rapid.Check(t, func(t *rapid.T) {
				p := FromInt(1)
				for k := 1; k <= 3; k++ {
					p = p.Mul(s.nonzero().Draw(t, "f").Pow(k))
				}
				factors := p.SquareFree()
				product, last := FromInt(1), 0
				var basis []Poly
				for _, f := range factors {
					if f.Exp <= last {
						t.Fatalf("exponents do not increase: %v", factors)
					}
					last = f.Exp
					basis = append(basis, f.Poly)
					product = product.Mul(f.Poly.Pow(f.Exp))
					for _, v := range f.Poly.Vars() {
						if g := Gcd(f.Poly, f.Poly.Deriv(v)); g.Has(v) {
							t.Fatalf("%v has the square of a factor of %v", f.Poly, g)
						}
					}
				}
				checkBasis(t, basis)
				wantEqual(t, product, p.primitive())
			})
		})
	}
}

func TestIsSquare(t *testing.T) {
	s := shape{3, 4, 3, edge.coef}
	rapid.Check(t, func(t *rapid.T) {
		p := s.poly().Draw(t, "p")
		root, ok := p.Mul(p).IsSquare()
		if !ok {
			t.Fatalf("the square of %v is not seen", p)
		}
		wantEqual(t, root, p.positive())
		q := s.poly().Draw(t, "q")
		if root, ok := q.IsSquare(); ok {
			wantEqual(t, root.Mul(root), q)
		}
		if p.IsConst() {
			return
		}
		if _, ok := p.Mul(p).Add(FromInt(1)).IsSquare(); ok {
			t.Fatalf("1 more than the square of %v is no square", p)
		}
		if _, ok := p.Mul(p).Neg().IsSquare(); ok {
			t.Fatalf("the negative square of %v is no square", p)
		}
	})
}

func TestContents(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p := s.nonzero().Draw(t, "p")
		c, q := p.PrimitivePart()
		wantEqual(t, must(t, q).MulInt(c), p)
		if q.Sign() != 1 || q.Content().Cmp(big.NewInt(1)) != 0 || c.Sign() != p.Sign() {
			t.Fatalf("%v is not the primitive part of %v", q, p)
		}
		if p.Content().Cmp(new(big.Int).Abs(c)) != 0 {
			t.Fatalf("content %v, signed content %v", p.Content(), c)
		}
		m := p.MonoContent()
		r, ok := p.DivMono(m)
		if !ok || len(must(t, r).MonoContent()) != 0 {
			t.Fatalf("%v is not the greatest monomial that divides %v", m, p)
		}
	})
}
