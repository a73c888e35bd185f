package series

import (
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

// drawRat is a rational number, often 0, ±1, dyadic, very small or very large.
func drawRat(r *rapid.T, label string) *big.Rat {
	x := rat(rapid.Int64Range(-40, 40).Draw(r, label+" num"), rapid.Int64Range(1, 12).Draw(r, label+" den"))
	shift := rapid.SampledFrom([]int{0, 0, 0, 3, -3, 70, -70, 300, -300}).Draw(r, label+" shift")
	p := new(big.Rat).SetInt(new(big.Int).Lsh(big.NewInt(1), uint(max(shift, -shift))))
	if shift < 0 {
		p.Inv(p)
	}
	return x.Mul(x, p)
}

func contains(r *rapid.T, what string, d Disc, re, im *big.Rat) {
	r.Helper()
	if !d.Contains(re, im) {
		r.Errorf("%s: %v does not hold %v, %v", what, d, re, im)
	}
}

// TestDiscArithmetic compares with exact arithmetic of Gaussian rationals.
func TestDiscArithmetic(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		a := NewArith(rapid.SampledFrom([]int{53, 54, 64, 200}).Draw(r, "bits"))
		x, y := drawRat(r, "x"), drawRat(r, "y")
		v, w := drawRat(r, "v"), drawRat(r, "w")
		p, q := a.Rat(x, y), a.Rat(v, w)
		mul := func(x, y *big.Rat) *big.Rat { return new(big.Rat).Mul(x, y) }
		add := func(x, y *big.Rat) *big.Rat { return new(big.Rat).Add(x, y) }
		sub := func(x, y *big.Rat) *big.Rat { return new(big.Rat).Sub(x, y) }
		re, im := sub(mul(x, v), mul(y, w)), add(mul(x, w), mul(y, v))
		contains(r, "point", p, x, y)
		contains(r, "sum", a.Add(p, q), add(x, v), add(y, w))
		contains(r, "difference", a.Sub(p, q), sub(x, v), sub(y, w))
		contains(r, "product", a.Mul(p, q), re, im)
		contains(r, "x·y − y·x", a.Sub(a.Mul(p, q), a.Mul(q, p)), new(big.Rat), new(big.Rat))
		square := add(mul(re, re), mul(im, im))
		if square.Sign() == 0 {
			return
		}
		inv, ok := a.Inv(a.Mul(p, q))
		if !ok {
			r.Fatalf("%v is not inverted", a.Mul(p, q))
		}
		contains(r, "inverse", inv, new(big.Rat).Quo(re, square), new(big.Rat).Quo(new(big.Rat).Neg(im), square))
		if s := a.Mul(p, q); s.rad.mul(mag{0.5, 45}).less(s.midDown()) == false {
			r.Errorf("the product %v is not sharp", s)
		}
	})
}

// TestDiscRounding: products and sums of exact points, where the radius is rounding alone.
func TestDiscRounding(t *testing.T) {
	a := NewArith(53)
	rapid.Check(t, func(r *rapid.T) {
		var x [4]float64
		var q [4]*big.Rat
		for i := range x {
			x[i] = rapid.Float64Range(-2, 2).Draw(r, "part")
			q[i] = new(big.Rat).SetFloat64(x[i])
		}
		u, v := a.Point(x[0], x[1]), a.Point(x[2], x[3])
		mul := func(i, j int) *big.Rat { return new(big.Rat).Mul(q[i], q[j]) }
		re, im := new(big.Rat).Sub(mul(0, 2), mul(1, 3)), new(big.Rat).Add(mul(0, 3), mul(1, 2))
		contains(r, "product", a.Mul(u, v), re, im)
		contains(r, "sum", a.Add(u, v), new(big.Rat).Add(q[0], q[2]), new(big.Rat).Add(q[1], q[3]))
	})
}

// TestDiscFunctions checks identities, and values against those found with many more bits.
func TestDiscFunctions(t *testing.T) {
	one, zero := rat(1, 1), new(big.Rat)
	fine := NewArith(600)
	rapid.Check(t, func(r *rapid.T) {
		a := NewArith(rapid.SampledFrom([]int{53, 90, 300}).Draw(r, "bits"))
		x := rat(rapid.Int64Range(-3000, 3000).Draw(r, "x"), rapid.Int64Range(1, 300).Draw(r, "d"))
		y := rat(rapid.Int64Range(-3000, 3000).Draw(r, "y"), 71)
		z := a.Rat(x, y)
		contains(r, "e^z e^−z", a.Mul(a.Exp(z), a.Exp(a.Neg(z))), one, zero)
		s, c := a.Sin(z), a.Cos(z)
		contains(r, "sin² + cos²", a.Add(a.Mul(s, s), a.Mul(c, c)), one, zero)
		for _, f := range []struct{ coarse, fine Disc }{
			{a.Exp(z), fine.Exp(fine.Rat(x, y))}, {s, fine.Sin(fine.Rat(x, y))}, {c, fine.Cos(fine.Rat(x, y))},
			{a.Exp(z), fine.expSquaring(fine.Rat(x, y))},
		} {
			diff := fine.Sub(f.coarse.exactMid(), f.fine.exactMid())
			if f.coarse.rad.add(f.fine.rad).less(diff.midDown()) {
				r.Errorf("%v does not meet %v", f.coarse, f.fine)
			}
		}
		if e := a.Exp(z); e.rad.mul(mag{0.5, 38}).less(e.midDown()) == false {
			r.Errorf("the exponential %v is not sharp", e)
		}
	})
}
