// Arithmetic modulo word-sized primes in Montgomery form ([Montgomery1985]), for the
// inner loops of the gcd; the primes; dense univariate gcds.

package poly

import (
	"math/big"
	"math/bits"
	"sync"
)

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

// trim drops leading zeros of a dense univariate polynomial, constant term first.
func trim(a []uint64) []uint64 {
	for len(a) > 0 && a[len(a)-1] == 0 {
		a = a[:len(a)-1]
	}
	return a
}

// gcdDense is the monic gcd of two dense univariate polynomials, which it overwrites and
// of which at least one is not zero. Method: Euclid's algorithm, without divisions until
// the end. Cost: O(len(a)·len(b)) products.
func (f *primeField) gcdDense(a, b []uint64) []uint64 {
	a, b = trim(a), trim(b)
	if len(a) < len(b) {
		a, b = b, a
	}
	for len(b) > 1 {
		for len(a) >= len(b) {
			f.eliminate(a, b)
			a = trim(a[:len(a)-1])
		}
		a, b = b, a
	}
	if len(b) == 1 {
		b[0] = f.one
		return b
	}
	if lead := a[len(a)-1]; lead != f.one {
		inv := f.invert(lead)
		for i := range a {
			a[i] = f.mul(a[i], inv)
		}
	}
	return a
}

// eliminate puts a → lc(b)·a − lc(a)·xᵏ·b, k the difference of degrees.
func (f *primeField) eliminate(a, b []uint64) {
	g := *f
	la, lb := a[len(a)-1], b[len(b)-1]
	low, high := a[:len(a)-len(b)], a[len(a)-len(b):]
	for i, x := range low {
		low[i] = g.mul(x, lb)
	}
	b = b[:len(high)]
	for i, x := range high {
		high[i] = g.sub(g.mul(x, lb), g.mul(b[i], la))
	}
}

// primes is the primes below 2⁶² in decreasing order, as far as they were asked for.
var primes struct {
	sync.Mutex
	list []uint64
}

// primeAt is the i-th of the primes.
func primeAt(i int) uint64 {
	primes.Lock()
	defer primes.Unlock()
	for len(primes.list) <= i {
		c := uint64(1<<62 - 1)
		if n := len(primes.list); n > 0 {
			c = primes.list[n-1] - 2
		}
		// The Baillie–PSW test, to which ProbablyPrime(0) comes down, has no exceptions
		// below 2⁶⁴.
		for !new(big.Int).SetUint64(c).ProbablyPrime(0) {
			c -= 2
		}
		primes.list = append(primes.list, c)
	}
	return primes.list[i]
}

// stream is a deterministic sequence of pseudorandom words (splitmix64, [Steele2014]).
type stream uint64

func (s *stream) next() uint64 {
	*s += 0x9e3779b97f4a7c15
	x := uint64(*s)
	x = (x ^ x>>30) * 0xbf58476d1ce4e5b9
	x = (x ^ x>>27) * 0x94d049bb133111eb
	return x ^ x>>31
}

// element is a pseudorandom element that is not zero.
func (f *primeField) element(s *stream) uint64 {
	for {
		if x := s.next() % f.p; x != 0 {
			return x
		}
	}
}
