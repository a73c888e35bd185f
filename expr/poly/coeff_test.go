package poly

import (
	"math"
	"math/big"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/ringtest"
)

// wordAt draws a word coefficient, often at the end of the range.
var wordAt = rapid.Map(ringtest.Edge(), func(x *big.Int) int64 {
	if w, ok := fitsWord(x); ok {
		return w
	}
	return math.MaxInt64
})

// TestAcc compares three-word sums with big integers.
func TestAcc(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var a acc
		want := new(big.Int)
		for range rapid.IntRange(0, 12).Draw(t, "n") {
			x, y := wordAt.Draw(t, "x"), wordAt.Draw(t, "y")
			a.addMul(x, y)
			a.addWord(-y)
			want.Add(want, new(big.Int).Mul(big.NewInt(x), big.NewInt(y)))
			want.Sub(want, big.NewInt(y))
		}
		if a.big().Cmp(want) != 0 || a.isZero() != (want.Sign() == 0) {
			t.Fatalf("%v, want %v", a.big(), want)
		}
		w, ok := a.word()
		if v, fits := fitsWord(want); ok != fits || ok && v != w {
			t.Fatalf("word of %v: %d, %v", want, w, ok)
		}
	})
}

// TestAccQuo compares quotients of sums with big integers: exact or not, word or not.
func TestAccQuo(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x, d := wordAt.Draw(t, "x"), wordAt.Draw(t, "d")
		if d == 0 {
			d = 1
		}
		var a acc
		a.addMul(x, d)
		a.addMul(rapid.SampledFrom([]int64{0, 0, 1, d, math.MaxInt64}).Draw(t, "more"), rapid.SampledFrom([]int64{0, 1, d}).Draw(t, "times"))
		want, rem := new(big.Int).QuoRem(a.big(), big.NewInt(d), new(big.Int))
		w, fits := fitsWord(want)
		c, ok, isBig := a.quo(d)
		if exact := rem.Sign() == 0; ok != (exact && fits) || isBig != (exact && !fits) || ok && c != w {
			t.Fatalf("%v/%d: %d, %v, %v; want %v, remainder %v", a.big(), d, c, ok, isBig, want, rem)
		}
	})
}
