// Dense univariate polynomials modulo a prime, constant term first: their gcds.

package poly

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
