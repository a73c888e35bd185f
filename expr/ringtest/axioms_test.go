package ringtest

import (
	"errors"
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

// integers is ℤ, with the exact quotient.
func integers() Ring[*big.Int] {
	return Ring[*big.Int]{
		Zero: big.NewInt(0), One: big.NewInt(1),
		Add:         func(a, b *big.Int) *big.Int { return new(big.Int).Add(a, b) },
		Sub:         func(a, b *big.Int) *big.Int { return new(big.Int).Sub(a, b) },
		Mul:         func(a, b *big.Int) *big.Int { return new(big.Int).Mul(a, b) },
		Neg:         func(a *big.Int) *big.Int { return new(big.Int).Neg(a) },
		Equal:       func(a, b *big.Int) bool { return a.Cmp(b) == 0 },
		Show:        (*big.Int).String,
		Gen:         Integer(),
		Commutative: true,
		Derive:      func(*big.Int) *big.Int { return new(big.Int) },
		Inv: func(a *big.Int) (*big.Int, bool) {
			return a, a.IsInt64() && (a.Int64() == 1 || a.Int64() == -1)
		},
		Quo: func(a, b *big.Int) (*big.Int, bool) {
			q, r := new(big.Int).QuoRem(a, b, new(big.Int))
			return q, r.Sign() == 0
		},
		Check: func(a *big.Int) error {
			if a == nil {
				return errors.New("nil")
			}
			return nil
		},
	}
}

func TestIntegers(t *testing.T) { Axioms(t, integers()) }

// TestFaultsAreFound: each law refuses a structure made to break it.
func TestFaultsAreFound(t *testing.T) {
	z := integers()
	plus := func(k int64) func(a, b *big.Int) *big.Int {
		return func(a, b *big.Int) *big.Int { return new(big.Int).Add(z.Add(a, b), big.NewInt(k)) }
	}
	faults := map[string]func(r *Ring[*big.Int]){
		"zero is neutral":    func(r *Ring[*big.Int]) { r.Add = plus(1) },
		"negative cancels":   func(r *Ring[*big.Int]) { r.Neg = func(a *big.Int) *big.Int { return a } },
		"product commutes":   func(r *Ring[*big.Int]) { r.Mul = func(a, b *big.Int) *big.Int { return a } },
		"product associates": func(r *Ring[*big.Int]) { r.Mul = z.Sub },
		"one is neutral":     func(r *Ring[*big.Int]) { r.One = big.NewInt(2) },
		"zero absorbs":       func(r *Ring[*big.Int]) { r.Mul = plus(0) },
		"difference":         func(r *Ring[*big.Int]) { r.Sub = z.Add },
		"derivation of a product": func(r *Ring[*big.Int]) {
			r.Derive = func(a *big.Int) *big.Int { return a }
		},
		"quotient": func(r *Ring[*big.Int]) {
			r.Quo = func(a, b *big.Int) (*big.Int, bool) { return a, true }
		},
		"addition commutes": func(r *Ring[*big.Int]) {
			r.Add = func(a, b *big.Int) *big.Int { a.Add(a, b); return a } // changes a
		},
	}
	for name, spoil := range faults {
		r := integers()
		r.Gen = rapid.Map(rapid.Int64Range(2, 50), big.NewInt)
		spoil(&r)
		found := false
		for _, l := range r.laws() {
			if l.name == name {
				found = fails(r, l)
			}
		}
		if !found {
			t.Errorf("%q does not find its fault", name)
		}
	}
}

// fails reports whether a law is broken for some of a few examples.
func fails(r Ring[*big.Int], l law[*big.Int]) (failed bool) {
	defer func() {
		if v := recover(); v != nil {
			if _, failed = v.(fault); !failed {
				panic(v)
			}
		}
	}()
	for i := range 10 {
		c := &checker[*big.Int]{Ring: r, t: recorder{}}
		l.holds(c, r.Gen.Example(3*i), r.Gen.Example(3*i+1), r.Gen.Example(3*i+2))
	}
	return false
}

// fault is the panic of a test that fails.
type fault struct{}

type recorder struct{}

func (recorder) Fatalf(string, ...any) { panic(fault{}) }
