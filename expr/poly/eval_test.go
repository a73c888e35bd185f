package poly

import (
	"math/big"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/ringtest"
)

var moduli = rapid.SampledFrom([]Modulus{Mersenne61, 2, 3, 1<<62 - 57, 1000003})

func TestModulusIsField(t *testing.T) {
	for _, m := range []Modulus{Mersenne61, 2, 7, 1<<62 - 57} {
		ringtest.Axioms(t, ringtest.Ring[uint64]{
			Zero: 0, One: 1,
			Add: m.Add, Sub: m.Sub, Mul: m.Mul, Neg: m.Neg,
			Equal: func(a, b uint64) bool { return a == b },
			Inv:   func(a uint64) (uint64, bool) { return m.Inv(a), a != 0 },
			Gen: rapid.Map(rapid.Uint64(), func(x uint64) uint64 {
				if x%4 == 0 {
					return uint64(m) - 1 - x/4%2
				}
				return x % uint64(m)
			}),
			Commutative: true,
		})
	}
}

// TestPrimeField compares Montgomery arithmetic with Modulus.
func TestPrimeField(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		f := newPrimeField(primeAt(rapid.IntRange(0, 5).Draw(t, "prime")))
		m := Modulus(f.p)
		a, b := rapid.Uint64().Draw(t, "a")%f.p, rapid.Uint64().Draw(t, "b")%f.p
		x, y := f.in(a), f.in(b)
		if f.out(f.mul(x, y)) != m.Mul(a, b) || f.out(f.add(x, y)) != m.Add(a, b) || f.out(f.sub(x, y)) != m.Sub(a, b) {
			t.Fatalf("arithmetic of %d and %d modulo %d", a, b, f.p)
		}
		if n := a % 1000; f.out(f.pow(x, n)) != m.Pow(a, n) {
			t.Fatalf("power")
		}
		if a != 0 && f.out(f.invert(x)) != m.Inv(a) {
			t.Fatalf("inverse of %d modulo %d", a, f.p)
		}
	})
}

// TestEvalModIsHomomorphism: values of sums and products, and agreement with the values
// in ℚ.
func TestEvalModIsHomomorphism(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p, q := s.poly().Draw(t, "p"), s.poly().Draw(t, "q")
		m := moduli.Draw(t, "m")
		seed := rapid.Uint64().Draw(t, "seed")
		at := func(v Var) uint64 {
			s := stream(seed + uint64(v))
			return s.next() % uint64(m)
		}
		x, y := p.EvalMod(m, at), q.EvalMod(m, at)
		if p.Add(q).EvalMod(m, at) != m.Add(x, y) || p.Mul(q).EvalMod(m, at) != m.Mul(x, y) {
			t.Fatalf("no homomorphism modulo %d", m)
		}
		whole := p.EvalRat(func(v Var) *big.Rat { return new(big.Rat).SetInt(new(big.Int).SetUint64(at(v))) })
		if !whole.IsInt() || m.FromBig(whole.Num()) != x {
			t.Fatalf("%v modulo %d is %d", whole, m, x)
		}
	})
}

func TestEvalRatIsHomomorphism(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p, q := s.poly().Draw(t, "p"), s.poly().Draw(t, "q")
		a, b := rapid.Int64Range(-9, 9).Draw(t, "a"), rapid.Int64Range(1, 9).Draw(t, "b")
		at := func(v Var) *big.Rat { return big.NewRat(a+int64(v)%5, b) }
		x, y := p.EvalRat(at), q.EvalRat(at)
		if p.Add(q).EvalRat(at).Cmp(new(big.Rat).Add(x, y)) != 0 || p.Mul(q).EvalRat(at).Cmp(new(big.Rat).Mul(x, y)) != 0 {
			t.Fatal("no homomorphism")
		}
	})
}

// TestEvalHighPower: exponents too high for a table of powers.
func TestEvalHighPower(t *testing.T) {
	p := FromMono([]Power{{0, 1 << 31}}).Add(FromInt(1))
	want := Mersenne61.Add(Mersenne61.Pow(5, 1<<31), 1)
	if got := p.EvalMod(Mersenne61, func(Var) uint64 { return 5 }); got != want {
		t.Errorf("got %d, want %d", got, want)
	}
}

func TestSubst(t *testing.T) {
	small := shape{3, 4, 3, smallInts}
	rapid.Check(t, func(t *rapid.T) {
		p, q := small.poly().Draw(t, "p"), small.poly().Draw(t, "q")
		v := Var(3*rapid.IntRange(0, 3).Draw(t, "v") + 1)
		r := must(t, p.Subst(v, q))
		at := func(x Var) uint64 { return uint64(x)*1234567 + 89 }
		inner := q.EvalMod(Mersenne61, at)
		want := p.EvalMod(Mersenne61, func(x Var) uint64 {
			if x == v {
				return inner
			}
			return at(x)
		})
		if got := r.EvalMod(Mersenne61, at); got != want {
			t.Fatalf("%v with %v for x%d gives %v", p, q, v, r)
		}
	})
}

func TestRename(t *testing.T) {
	maps := map[string]func(Var) Var{
		"shift":   func(v Var) Var { return v + 5 },
		"reverse": func(v Var) Var { return 1000 - v },
		"merge":   func(v Var) Var { return v % 2 },
		"shuffle": func(v Var) Var { return v * 7 % 101 },
	}
	for name, f := range maps {
		t.Run(name, func(t *testing.T) {
			shapes(t, func(t *rapid.T, s shape) {
				p := s.poly().Draw(t, "p")
				want := Poly{}
				for m, c := range p.Terms() {
					x := FromBig(c)
					for _, e := range m {
						x = x.MulMono([]Power{{f(e.Var), e.Exp}})
					}
					want = want.Add(x)
				}
				wantEqual(t, p.Rename(f), want)
			})
		})
	}
}

func TestCoeffsIn(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p := s.poly().Draw(t, "p")
		for _, v := range append(p.Vars(), 1, 1000) {
			c := p.CoeffsIn(v)
			if len(c) != p.Degree(v)+1 {
				t.Fatalf("%d coefficients for degree %d", len(c), p.Degree(v))
			}
			deriv := make([]Poly, max(0, len(c)-1))
			for i, x := range c {
				if must(t, x).Has(v) {
					t.Fatalf("coefficient %v contains x%d", x, v)
				}
				if i > 0 {
					deriv[i-1] = x.MulInt(big.NewInt(int64(i)))
				}
			}
			wantEqual(t, FromCoeffsIn(v, c), p)
			wantEqual(t, p.Deriv(v), FromCoeffsIn(v, deriv))
		}
	})
}

// TestEvalRatHighPower: the size of a value, not of an exponent, is what counts.
func TestEvalRatHighPower(t *testing.T) {
	p := FromMono([]Power{{0, 1 << 31}, {1, 3}}).Add(FromInt(1))
	got := p.EvalRat(func(v Var) *big.Rat {
		if v == 0 {
			return big.NewRat(-1, 1)
		}
		return big.NewRat(1, 2)
	})
	if got.Cmp(big.NewRat(9, 8)) != 0 {
		t.Errorf("got %v, want 9/8", got)
	}
}
