// Arithmetic modulo a word-sized prime: Modulus for evaluation, montgomery for the inner
// loops of the gcd.

package poly

import (
	"math/big"
	"math/bits"
)

// Modulus is a prime below 2⁶². Its methods take and return residues in [0, m).
type Modulus uint64

// Mersenne61 is the prime 2⁶¹ − 1, for which Mul is fastest.
const Mersenne61 Modulus = 1<<61 - 1

// Add is a + b.
func (m Modulus) Add(a, b uint64) uint64 {
	s := a + b
	if s >= uint64(m) {
		s -= uint64(m)
	}
	return s
}

// Sub is a − b.
func (m Modulus) Sub(a, b uint64) uint64 {
	if a < b {
		a += uint64(m)
	}
	return a - b
}

// Neg is −a.
func (m Modulus) Neg(a uint64) uint64 { return m.Sub(0, a) }

// Mul is a·b.
func (m Modulus) Mul(a, b uint64) uint64 {
	hi, lo := bits.Mul64(a, b)
	if m == Mersenne61 {
		s := lo&uint64(Mersenne61) + (hi<<3 | lo>>61)
		if s >= uint64(Mersenne61) {
			s -= uint64(Mersenne61)
		}
		return s
	}
	return bits.Rem64(hi, lo, uint64(m))
}

// Pow is aⁿ, with a⁰ = 1.
func (m Modulus) Pow(a, n uint64) uint64 {
	r := uint64(1)
	for ; n > 0; n >>= 1 {
		if n&1 == 1 {
			r = m.Mul(r, a)
		}
		a = m.Mul(a, a)
	}
	return r
}

// Inv is the inverse of a, and 0 for a = 0. Method: Euclid's algorithm.
func (m Modulus) Inv(a uint64) uint64 {
	if a == 0 {
		return 0
	}
	r0, r1 := uint64(m), a
	var s0, s1 int64 = 0, 1 // |s| ≤ m < 2⁶²
	for r1 > 1 {
		q := r0 / r1
		r0, r1 = r1, r0-q*r1
		s0, s1 = s1, s0-int64(q)*s1
	}
	if s1 < 0 {
		s1 += int64(m)
	}
	return uint64(s1)
}

// FromInt is the residue of c.
func (m Modulus) FromInt(c int64) uint64 {
	r := abs(c)
	if r >= uint64(m) {
		r %= uint64(m)
	}
	if c < 0 {
		return m.Neg(r)
	}
	return r
}

// FromBig is the residue of c.
func (m Modulus) FromBig(c *big.Int) uint64 {
	if c.IsInt64() {
		return m.FromInt(c.Int64())
	}
	r := uint64(0)
	words := c.Bits()
	if bits.UintSize == 64 {
		for i := len(words) - 1; i >= 0; i-- {
			r = bits.Rem64(r, uint64(words[i]), uint64(m))
		}
	} else {
		var t big.Int
		r = t.Mod(t.Abs(c), new(big.Int).SetUint64(uint64(m))).Uint64()
	}
	if c.Sign() < 0 {
		return m.Neg(r)
	}
	return r
}
