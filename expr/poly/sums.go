// Arrays of accumulators for sums of products of word coefficients, as wide as the bits
// of the operands ask for.

package poly

import "math/bits"

// sums is an array of accumulators.
type sums interface {
	// add adds c·co[i] to the accumulator base + off[i] for all i.
	add(base int32, off []int32, c int64, co []int64)
	// take clears an accumulator, appends its value to b and reports whether that is
	// not zero.
	take(b *builder, k int) bool
}

// newSums is n accumulators for sums of products of p's with q's coefficients, of which
// each occurs at most once in a sum.
func newSums(n int, p, q []int64) sums {
	product := maxBits(p) + maxBits(q)
	switch {
	case product+bits.Len(uint(min(len(p), len(q)))) <= 63:
		return make(sums1, n)
	case product <= 63:
		return make(sums2, n)
	}
	return make(sums3, n)
}

// sums1 is for sums of less than 64 bits.
type sums1 []int64

func (s sums1) add(base int32, off []int32, c int64, co []int64) {
	co = co[:len(off)]
	for i, o := range off {
		s[base+o] += c * co[i]
	}
}

func (s sums1) take(b *builder, k int) bool {
	v := s[k]
	s[k] = 0
	if v != 0 {
		b.word(v)
	}
	return v != 0
}

// sums2 is for products of less than 64 bits: two words, low first.
type sums2 [][2]uint64

func (s sums2) add(base int32, off []int32, c int64, co []int64) {
	co = co[:len(off)]
	for i, o := range off {
		x := c * co[i]
		a := &s[base+o]
		lo, carry := bits.Add64(a[0], uint64(x), 0)
		a[0] = lo
		a[1] += uint64(x>>63) + carry
	}
}

func (s sums2) take(b *builder, k int) bool {
	v := acc{lo: s[k][0], mid: s[k][1], hi: uint64(int64(s[k][1]) >> 63)}
	s[k] = [2]uint64{}
	if v.isZero() {
		return false
	}
	b.acc(&v)
	return true
}

// sums3 is for any word coefficients.
type sums3 []acc

func (s sums3) add(base int32, off []int32, c int64, co []int64) {
	co = co[:len(off)]
	for i, o := range off {
		s[base+o].addMul(c, co[i])
	}
}

func (s sums3) take(b *builder, k int) bool {
	v := s[k]
	s[k] = acc{}
	if v.isZero() {
		return false
	}
	b.acc(&v)
	return true
}
