// Arithmetic modulo word-sized primes in Montgomery form ([Montgomery1985]), for the
// inner loops of the gcd.

package poly

import "math/bits"

// primeField is the integers modulo an odd prime p < 2⁶². An element a is held as
// a·2⁶⁴ mod p.
type primeField struct {
	p, inv   uint64 // inv·p = 1 modulo 2⁶⁴
	one, two uint64 // 2⁶⁴ and 2¹²⁸ modulo p
}

func newPrimeField(p uint64) primeField {
	f := primeField{p: p, inv: p} // p·p = 1 modulo 8
	for range 5 {
		f.inv *= 2 - p*f.inv
	}
	f.one = bits.Rem64(1, 0, p)
	f.two = bits.Rem64(f.one, 0, p)
	return f
}

func (f *primeField) mul(a, b uint64) uint64 {
	hi, lo := bits.Mul64(a, b)
	m, _ := bits.Mul64(lo*f.inv, f.p)
	r := hi - m
	if hi < m {
		r += f.p
	}
	return r
}

func (f *primeField) add(a, b uint64) uint64 {
	s := a + b
	if s >= f.p {
		s -= f.p
	}
	return s
}

func (f *primeField) sub(a, b uint64) uint64 {
	d := a - b
	if a < b {
		d += f.p
	}
	return d
}

// in is the element of a residue.
func (f *primeField) in(a uint64) uint64 { return f.mul(a, f.two) }

// out is the residue of an element.
func (f *primeField) out(a uint64) uint64 { return f.mul(a, 1) }

func (f *primeField) pow(a, n uint64) uint64 {
	r := f.one
	for ; n > 0; n >>= 1 {
		if n&1 == 1 {
			r = f.mul(r, a)
		}
		a = f.mul(a, a)
	}
	return r
}

// invert is 1/a for a ≠ 0.
func (f *primeField) invert(a uint64) uint64 {
	return f.in(Modulus(f.p).Inv(f.out(a)))
}

// invertAll replaces elements, none of them zero, by their inverses, at the price of one
// inversion and three products each (Montgomery's trick).
func (f *primeField) invertAll(a []uint64) {
	if len(a) == 0 {
		return
	}
	prefix := make([]uint64, len(a))
	all := f.one
	for i, x := range a {
		prefix[i] = all
		all = f.mul(all, x)
	}
	all = f.invert(all)
	for i := len(a) - 1; i >= 0; i-- {
		a[i], all = f.mul(all, prefix[i]), f.mul(all, a[i])
	}
}

// powers is 1, a, …, aᵈ.
func (f *primeField) powers(a uint64, d int) []uint64 {
	t := make([]uint64, d+1)
	t[0] = f.one
	for i := range d {
		t[i+1] = f.mul(t[i], a)
	}
	return t
}

// coefs is the coefficients of d as elements.
func (f *primeField) coefs(d *data) []uint64 {
	out := make([]uint64, d.len())
	for i := range out {
		if d.bg != nil {
			out[i] = f.in(Modulus(f.p).FromBig(d.bg[i]))
			continue
		}
		out[i] = f.in(Modulus(f.p).FromInt(d.co[i]))
	}
	return out
}
