package series

// Upper bounds of absolute values: non-negative numbers with a float64 mantissa and an
// exponent that cannot overflow in practice, every operation rounded up. They are the radii
// and error bounds of the complex arithmetic. [Johansson2017]

import (
	"math"
	"math/big"
)

// mag is m·2^e, with m = 0 or 1/2 ≤ m < 1.
type mag struct {
	m float64
	e int
}

// One float64 operation errs by at most 2⁻⁵³ of its result; up and down cover four of them.
const (
	up   = 1 + 0x1p-50
	down = 1 - 0x1p-50
)

func makeMag(m float64, e int) mag {
	if m == 0 {
		return mag{}
	}
	f, x := math.Frexp(m)
	return mag{f, e + x}
}

func (a mag) isZero() bool { return a.m == 0 }

func (a mag) mul(b mag) mag { return makeMag(a.m*b.m*up, a.e+b.e) }

func (a mag) add(b mag) mag { return a.sum(b, up) }

// sum is a + b, rounded in the direction of way.
func (a mag) sum(b mag, way float64) mag {
	if a.m == 0 {
		return b
	}
	if b.m == 0 {
		return a
	}
	if a.e < b.e {
		a, b = b, a
	}
	return makeMag((a.m+math.Ldexp(b.m, max(b.e-a.e, -200)))*way, a.e)
}

// subDown is a lower bound of a − b, 0 if that may be negative.
func (a mag) subDown(b mag) mag {
	if !b.less(a) {
		return mag{}
	}
	d := a.m*down - math.Ldexp(b.m, max(b.e-a.e, -200))*up
	return makeMag(max(d*down, 0), a.e)
}

// quo is an upper bound of a/b for a lower bound b > 0.
func (a mag) quo(b mag) mag { return makeMag(a.m/b.m*up, a.e-b.e) }

func (a mag) less(b mag) bool {
	switch {
	case b.m == 0:
		return false
	case a.m == 0:
		return true
	case a.e != b.e:
		return a.e < b.e
	}
	return a.m < b.m
}

// float is a as a float64, rounded up; +Inf if too large.
func (a mag) float() float64 {
	f := math.Ldexp(a.m, a.e)
	if a.m != 0 && f < 0x1p-1000 {
		return 0x1p-1000
	}
	return f
}

// exact is a as a big float, without rounding.
func (a mag) exact() *big.Float {
	f := new(big.Float).SetPrec(53).SetFloat64(a.m)
	return f.SetMantExp(f, a.e)
}

// exp is an upper bound of e^a.
func (a mag) exp() mag {
	f := a.float()
	if f > 0x1p40 {
		return mag{0.5, 1 << 42}
	}
	return makeMag(1, int(math.Ceil(f*1.4427))) // log₂e < 1.4427
}

// expm1 is an upper bound of e^a − 1.
func (a mag) expm1() mag {
	if f := a.float(); f < 0.5 {
		// e^a − 1 = a(1 + a/2 + a²/6 + …) ≤ a(1 + a).
		return a.mul(makeMag((1+f)*up, 0))
	}
	return a.exp()
}

// magOf is an upper bound of |x|.
func magOf(x *big.Float) mag {
	if x.Sign() == 0 {
		return mag{}
	}
	f, _ := new(big.Float).SetMantExp(x, -x.MantExp(nil)).Float64()
	return makeMag(math.Abs(f)*up, x.MantExp(nil))
}

// magOfRat is an upper bound of |x|.
func magOfRat(x *big.Rat) mag {
	return magOf(new(big.Float).SetPrec(64).SetMode(big.AwayFromZero).SetRat(x))
}

// magInt is n ≥ 0, rounded up.
func magInt(n int) mag { return makeMag(float64(n)*up, 0) }

func maxMag(a, b mag) mag {
	if a.less(b) {
		return b
	}
	return a
}
