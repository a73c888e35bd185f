// The sparse modular gcd of Zippel (1979), [Zippel1979].
//
// Let x be the main variable, y_1 … y_k the others in which the gcd g may have positive
// degree, and Γ the gcd of the leading coefficients in x. Then h = Γ·g/lc(g) is a
// polynomial with leading coefficient Γ; modulo a prime its image at a point of the y is
// the monic gcd of the univariate images, times the value of Γ, as long as the degree is
// right. From the image at one base point, h is found one variable after the other:
// for D+1 values of y_i the polynomial in y_1 … y_{i−1} is computed on the monomials it
// had at the base point — as many images as its largest coefficient in x has terms, at a
// geometric sequence of points, and a transposed Vandermonde system ([Zippel1990]) — and
// each coefficient is interpolated in y_i. A second prime starts from the monomials that
// the first has found. Everything rests on luck that the caller checks by division.
//
// Cost: O(Σ_i D_i·T_i) evaluations, T_i the greatest number of terms of a coefficient.

package poly

import "math/big"

// zippel is one computation of h.
type zippel struct {
	o       Ops
	p, q, g *trie // arranged by x, y_1, …, y_k; g is Γ
	k       int
	deg     int   // the degree of the gcd in x
	bound   []int // bound[i] ≥ the degree of h in y_i; bound[0] is not used
	random  *stream
}

// form is h without its leading coefficient, modulo a prime: terms sorted by the power
// of x.
type form struct {
	x   []uint32
	n   int      // number of y
	exp []uint32 // the exponents of y_1 … y_n, for each term
	co  []uint64
}

// ys is the exponents of y in term t.
func (s *form) ys(t int) []uint32 { return s.exp[t*s.n : (t+1)*s.n] }

// outcome of a modular computation.
type outcome uint8

const (
	lucky   outcome = iota
	unlucky         // this prime or point will not do
	lower           // the degree of the gcd in x is below deg
)

// prepared is the three polynomials with the base point of one prime put in.
type prepared struct {
	f       primeField
	p, q, g *values
	a, b, c []uint64 // work space for images: by power of x
}

// prepare puts the base point into the tries.
func (z *zippel) prepare(f primeField, base []uint64) *prepared {
	salt := z.random.next()
	fixed := func(v Var) uint64 {
		s := stream(salt + uint64(v))
		return f.element(&s)
	}
	e := &prepared{f: f}
	e.p, e.q, e.g = newValues(z.p, f, base, fixed), newValues(z.q, f, base, fixed), newValues(z.g, f, base, fixed)
	e.a = make([]uint64, maxExp(z.p.level[0].exp)+1)
	e.b = make([]uint64, maxExp(z.q.level[0].exp)+1)
	e.c = make([]uint64, 1)
	return e
}

// gcd is the scaled gcd of the images in a and b, with Γ in c. The images are lost.
func (e *prepared) gcd(deg int) ([]uint64, outcome) {
	if e.a[len(e.a)-1] == 0 || e.b[len(e.b)-1] == 0 || e.c[0] == 0 {
		return nil, unlucky
	}
	h := e.f.gcdDense(e.a, e.b)
	switch {
	case len(h)-1 > deg:
		return nil, unlucky
	case len(h)-1 < deg:
		return nil, lower
	}
	if s := e.c[0]; s != e.f.one {
		for i := range h {
			h[i] = e.f.mul(h[i], s)
		}
	}
	return h, lucky
}

// first computes h modulo a prime from nothing.
func (z *zippel) first(f primeField) (form, outcome) {
	base := make([]uint64, z.k+1)
	for i := range base {
		base[i] = f.element(z.random)
	}
	e := z.prepare(f, base)
	e.p.sum(0, e.p.val[0], e.a)
	e.q.sum(0, e.q.val[0], e.b)
	e.g.sum(0, e.g.val[0], e.c)
	h, out := e.gcd(z.deg)
	if out != lucky {
		return form{}, out
	}
	var s form
	for x, c := range h[:z.deg] {
		if c != 0 {
			s.x, s.co = append(s.x, uint32(x)), append(s.co, c)
		}
	}
	for i := 1; i <= z.k; i++ {
		if s, out = z.extend(e, s, i, base[i]); out != lucky {
			return form{}, out
		}
	}
	return s, lucky
}

// extend takes h as a polynomial in x, y_1 … y_{i−1} with the base point for the others
// to h as a polynomial in x, y_1 … y_i.
func (z *zippel) extend(e *prepared, s form, i int, base uint64) (form, outcome) {
	f := e.f
	w, ok := z.newSampler(e, s, i-1)
	if !ok {
		return form{}, unlucky
	}
	n := z.bound[i] + 1
	points := []uint64{base}
	value := [][]uint64{s.co}
	for len(points) < n {
		y := f.element(z.random)
		for _, x := range points {
			if x == y {
				return form{}, unlucky
			}
		}
		e.p.fold(e.p.node0(i-1), i, y)
		e.q.fold(e.q.node0(i-1), i, y)
		e.g.fold(e.g.node0(i-1), i, y)
		co, out := w.solve()
		if out != lucky {
			return form{}, out
		}
		points, value = append(points, y), append(value, co)
	}
	m := f.lagrange(points)
	t := form{n: i}
	for k := range s.co {
		for d := range n {
			c := uint64(0)
			for j := range n {
				c = f.add(c, f.mul(m[j][d], value[j][k]))
			}
			if c != 0 {
				t.x, t.co = append(t.x, s.x[k]), append(t.co, c)
				t.exp = append(append(t.exp, s.ys(k)...), uint32(d))
			}
		}
	}
	return t, lucky
}

// again computes h modulo another prime on the monomials s.
func (z *zippel) again(f primeField, s form) ([]uint64, outcome) {
	e := z.prepare(f, nil)
	w, ok := z.newSampler(e, s, z.k)
	if !ok {
		return nil, unlucky
	}
	for _, v := range []*values{e.p, e.q, e.g} {
		copy(v.node0(z.k), v.val[z.k])
	}
	return w.solve()
}

// sampler finds the coefficients of h on given monomials in x, y_1 … y_i from images at
// a geometric sequence of points.
type sampler struct {
	z      *zippel
	e      *prepared
	i      int
	form   form
	group  []int         // group[j] is where the terms with the j-th power of x begin
	system []vandermonde // for each group
	value  [][]uint64    // the samples for each group
}

// newSampler chooses the sequence; ok is false if two monomials have the same value.
func (z *zippel) newSampler(e *prepared, s form, i int) (w *sampler, ok bool) {
	w = &sampler{z: z, e: e, i: i, form: s}
	beta := make([]uint64, i+1)
	for k := range beta {
		beta[k] = e.f.element(z.random)
	}
	for _, v := range []*values{e.p, e.q, e.g} {
		v.ratios(i, beta)
	}
	node := make([]uint64, len(s.co))
	for t := range node {
		node[t] = e.f.one
		for k, x := range s.ys(t) {
			node[t] = e.f.mul(node[t], e.f.pow(beta[k+1], uint64(x)))
		}
	}
	for from := 0; from < len(s.co); {
		to := from + 1
		for to < len(s.co) && s.x[to] == s.x[from] {
			to++
		}
		v, ok := e.f.newVandermonde(node[from:to])
		if !ok {
			return nil, false
		}
		w.group = append(w.group, from)
		w.system = append(w.system, v)
		w.value = append(w.value, make([]uint64, to-from))
		from = to
	}
	return w, true
}

// solve samples h with the current node values and solves for its coefficients.
func (w *sampler) solve() ([]uint64, outcome) {
	e, most := w.e, 1
	for _, v := range w.value {
		most = max(most, len(v))
	}
	for j := range most {
		w.z.o.Budget.Check(0)
		e.a, e.b = e.a[:cap(e.a)], e.b[:cap(e.b)]
		e.p.image(w.i, e.a)
		e.q.image(w.i, e.b)
		e.g.image(w.i, e.c)
		h, out := e.gcd(w.z.deg)
		if out != lucky {
			return nil, out
		}
		g := 0
		for x := range w.z.deg {
			if g < len(w.group) && int(w.form.x[w.group[g]]) == x {
				if j < len(w.value[g]) {
					w.value[g][j] = h[x]
				}
				g++
			} else if h[x] != 0 {
				return nil, unlucky // the base point has hidden this power
			}
		}
	}
	co := make([]uint64, len(w.form.co))
	for g, from := range w.group {
		w.system[g].solve(&e.f, w.value[g], co[from:from+len(w.value[g])])
	}
	return co, lucky
}

// crt is integers known modulo a product of primes, in the symmetric range.
type crt struct {
	mod *big.Int
	val []*big.Int
}

// extend takes in residues modulo another prime and reports whether any value changed.
func (c *crt) extend(p uint64, residue []uint64) (changed bool) {
	m := Modulus(p)
	bp := new(big.Int).SetUint64(p)
	if c.mod == nil {
		c.mod = big.NewInt(1)
		c.val = make([]*big.Int, len(residue))
		for i := range c.val {
			c.val[i] = new(big.Int)
		}
		changed = true
	}
	inv := m.Inv(m.FromBig(c.mod))
	half := new(big.Int).Mul(c.mod, bp)
	next := new(big.Int).Set(half)
	half.Rsh(half, 1)
	var t big.Int
	for i, r := range residue {
		d := m.Mul(m.Sub(r, m.FromBig(c.val[i])), inv)
		if d == 0 {
			continue
		}
		changed = true
		v := new(big.Int).Add(c.val[i], t.Mul(c.mod, t.SetUint64(d)))
		if v.Cmp(half) > 0 {
			v.Sub(v, next)
		}
		c.val[i] = v
	}
	c.mod = next
	return changed
}
