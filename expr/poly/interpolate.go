// Interpolation modulo a prime: dense in one variable, and sparse on known monomials.

package poly

// lagrange is the matrix that takes the values of a polynomial of degree below
// len(points) at these points to its coefficients: coefficient i is Σ_j m[j][i]·value_j.
// The points must differ.
func (f *primeField) lagrange(points []uint64) [][]uint64 {
	master := f.master(points)
	m := make([][]uint64, len(points))
	den := make([]uint64, len(points))
	for j, x := range points {
		m[j] = f.without(master, x)
		den[j] = f.horner(m[j], x)
	}
	f.invertAll(den)
	for j := range m {
		for i, c := range m[j] {
			m[j][i] = f.mul(c, den[j])
		}
	}
	return m
}

// master is Π (z − point), constant term first.
func (f *primeField) master(points []uint64) []uint64 {
	m := make([]uint64, 1, len(points)+1)
	m[0] = f.one
	for _, x := range points {
		m = append(m, m[len(m)-1])
		for i := len(m) - 2; i > 0; i-- {
			m[i] = f.sub(m[i-1], f.mul(m[i], x))
		}
		m[0] = f.sub(0, f.mul(m[0], x))
	}
	return m
}

// without is m/(z − x) for a root x of m.
func (f *primeField) without(m []uint64, x uint64) []uint64 {
	q := make([]uint64, len(m)-1)
	c := uint64(0)
	for i := len(q) - 1; i >= 0; i-- {
		c = f.add(m[i+1], f.mul(c, x))
		q[i] = c
	}
	return q
}

// horner is the value at x.
func (f *primeField) horner(p []uint64, x uint64) uint64 {
	r := uint64(0)
	for i := len(p) - 1; i >= 0; i-- {
		r = f.add(f.mul(r, x), p[i])
	}
	return r
}

// vandermonde solves Σ_t c_t·node_tʲ = value_j, j = 1 … len(node), for c: the
// interpolation of a polynomial on known monomials from its values at a geometric
// sequence of points ([Zippel1990]).
type vandermonde struct {
	node   []uint64
	master []uint64
	scale  []uint64 // 1/(node_t·Π_{s≠t}(node_t − node_s))
}

// newVandermonde prepares the solution; ok is false if nodes are equal or zero.
func (f *primeField) newVandermonde(node []uint64) (v vandermonde, ok bool) {
	v = vandermonde{node: node, master: f.master(node), scale: make([]uint64, len(node))}
	for t, x := range node {
		// The derivative of the master at a root is the product of differences.
		d, pow := uint64(0), f.one
		for i := 1; i < len(v.master); i++ {
			d = f.add(d, f.mul(f.mul(f.in(uint64(i)), v.master[i]), pow))
			pow = f.mul(pow, x)
		}
		if v.scale[t] = f.mul(d, x); v.scale[t] == 0 {
			return v, false
		}
	}
	f.invertAll(v.scale)
	return v, true
}

// solve writes the solution to c. Cost: O(n²).
func (v *vandermonde) solve(f *primeField, value, c []uint64) {
	g := *f
	n := len(v.node)
	for t, x := range v.node {
		q, sum := uint64(0), uint64(0)
		for i := n - 1; i >= 0; i-- {
			q = g.add(v.master[i+1], g.mul(q, x))
			sum = g.add(sum, g.mul(q, value[i]))
		}
		c[t] = g.mul(sum, v.scale[t])
	}
}
