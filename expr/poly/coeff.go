// Coefficients: machine words while all of them fit, big integers for the whole
// polynomial as soon as one does not.
//
// A word coefficient c has |c| < 2⁶³, so that negation cannot overflow; −2⁶³ is big.

package poly

import (
	"math"
	"math/big"
	"math/bits"
)

// fitsWord reports whether x is a word coefficient.
func fitsWord(x *big.Int) (int64, bool) {
	if !x.IsInt64() {
		return 0, false
	}
	w := x.Int64()
	return w, w != math.MinInt64
}

// abs is the magnitude of a word coefficient.
func abs(c int64) uint64 {
	if c < 0 {
		return uint64(-c)
	}
	return uint64(c)
}

// bigs is a copy of word coefficients as big integers, made in two allocations.
func bigs(co []int64) []*big.Int {
	vals, out := make([]big.Int, len(co)), make([]*big.Int, len(co))
	for i, c := range co {
		out[i] = vals[i].SetInt64(c)
	}
	return out
}

// maxBits is the bit length of the greatest magnitude among word coefficients.
func maxBits(co []int64) int {
	var or uint64
	for _, c := range co {
		or |= abs(c)
	}
	return bits.Len64(or)
}

// acc is a signed sum of products of word coefficients: 192 bits, two's complement,
// enough for 2⁶⁵ products.
type acc struct{ lo, mid, hi uint64 }

// addMul adds x·y.
func (a *acc) addMul(x, y int64) {
	h, l := bits.Mul64(uint64(x), uint64(y))
	h -= uint64(x>>63)&uint64(y) + uint64(y>>63)&uint64(x)
	var c uint64
	a.lo, c = bits.Add64(a.lo, l, 0)
	a.mid, c = bits.Add64(a.mid, h, c)
	a.hi += uint64(int64(h)>>63) + c
}

// addWord adds x.
func (a *acc) addWord(x int64) {
	s := uint64(x >> 63)
	var c uint64
	a.lo, c = bits.Add64(a.lo, uint64(x), 0)
	a.mid, c = bits.Add64(a.mid, s, c)
	a.hi += s + c
}

// word is the value if it is a word coefficient.
func (a *acc) word() (int64, bool) {
	s := uint64(int64(a.lo) >> 63)
	return int64(a.lo), a.mid == s && a.hi == s && a.lo != 1<<63
}

func (a *acc) isZero() bool { return a.lo|a.mid|a.hi == 0 }

// big is the value as a big integer.
func (a acc) big() *big.Int {
	neg := int64(a.hi) < 0
	a = a.abs()
	x := new(big.Int).SetUint64(a.hi)
	x.Lsh(x, 64).Or(x, new(big.Int).SetUint64(a.mid))
	x.Lsh(x, 64).Or(x, new(big.Int).SetUint64(a.lo))
	if neg {
		x.Neg(x)
	}
	return x
}

// quo is a/d if that is exact and a word coefficient. Else big tells that it is exact.
func (a *acc) quo(d int64) (c int64, ok, big bool) {
	if w, ok := a.word(); ok {
		c = w / d
		return c, c*d == w, false
	}
	neg := int64(a.hi) < 0
	x := a.abs()
	m := abs(d)
	if x.hi == 0 && x.mid < m {
		u, r := bits.Div64(x.mid, x.lo, m)
		if r != 0 || u <= math.MaxInt64 {
			if neg != (d < 0) {
				return -int64(u), r == 0, false
			}
			return int64(u), r == 0, false
		}
	}
	r := bits.Rem64(x.hi, x.mid, m)
	return 0, false, bits.Rem64(r, x.lo, m) == 0
}

// abs is the magnitude.
func (a acc) abs() acc {
	if int64(a.hi) < 0 {
		var b uint64
		a.lo, b = bits.Sub64(0, a.lo, 0)
		a.mid, b = bits.Sub64(0, a.mid, b)
		a.hi, _ = bits.Sub64(0, a.hi, b)
	}
	return a
}
