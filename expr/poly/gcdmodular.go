// The gcd by images modulo primes: bounds for its degrees, what follows from them alone,
// and the proof by division of what Zippel's algorithm finds.
//
// The degree in v of the gcd of two images is never below that of the gcd, provided that
// a leading coefficient in v does not vanish with the image. So bounds from random
// points are certain, and a common divisor that reaches them is the gcd: nothing here
// depends on luck but the time.

package poly

import (
	"math/big"
	"math/bits"
	"slices"
)

const (
	// attempts is how often the modular method starts afresh before the caller turns to
	// remainder sequences. A random failure has probability about
	// (terms · degrees)/2⁶², so more than one hints at an error of method.
	attempts = 6
	// maxDense is the greatest degree for which dense univariate images are used, and
	// maxPoints that of a variable in which h is interpolated.
	maxDense  = 1 << 14
	maxPoints = 1 << 11
)

// gcdModular is the gcd of primitive polynomials, not constant, that no monomial
// divides and that have positive leading coefficients; ok is false if it is not found
// within bounded work.
func (o Ops) gcdModular(p, q Poly) (g Poly, ok bool) {
	c := &candidates{o: o, p: p, q: q}
	c.init()
	if len(c.vars) == 0 {
		return one, true
	}
	if c.tooDense() {
		return Poly{}, false
	}
	for try := range attempts {
		if !c.tighten(newPrimeField(primeAt(try))) {
			continue
		}
		if slices.Max(c.bound) == 0 {
			return one, true
		}
		if g, ok := c.zippel(try); ok {
			return g, true
		}
	}
	return Poly{}, false
}

// candidates is what is known of a gcd.
type candidates struct {
	o      Ops
	p, q   Poly
	vars   []Var // common to p and q
	dp, dq []int // degrees of p and q in vars
	bound  []int // upper bounds of the degrees of the gcd in vars
	random stream
}

func (c *candidates) init() {
	lp, lq := c.p.d.lay, c.q.d.lay
	degP, degQ := lp.degrees(c.p.d.exps), lq.degrees(c.q.d.exps)
	for i, v := range lp.vars {
		if j := lq.index(v); j >= 0 {
			c.vars = append(c.vars, v)
			c.dp, c.dq = append(c.dp, int(degP[i])), append(c.dq, int(degQ[j]))
			c.bound = append(c.bound, int(min(degP[i], degQ[j])))
		}
	}
}

func (c *candidates) tooDense() bool {
	for _, d := range []*data{c.p.d, c.q.d} {
		if slices.Max(d.lay.degrees(d.exps)) > maxDense {
			return true
		}
	}
	return false
}

// tighten lowers the bounds by univariate images at a random point, one for each common
// variable; it is false if no bound could be had there.
func (c *candidates) tighten(f primeField) bool {
	salt := c.random.next()
	at := func(v Var) uint64 {
		s := stream(salt + uint64(v))
		return f.element(&s)
	}
	ip, iq := f.univariate(c.p.d, c.vars, at), f.univariate(c.q.d, c.vars, at)
	for i := range c.vars {
		a, b := ip[i], iq[i]
		if a[c.dp[i]] == 0 && b[c.dq[i]] == 0 {
			return false
		}
		c.bound[i] = min(c.bound[i], len(f.gcdDense(a, b))-1)
	}
	return true
}

// univariate is the dense images of d in each of vars, the other variables having the
// values at.
func (f *primeField) univariate(d *data, vars []Var, at func(Var) uint64) [][]uint64 {
	l := d.lay
	deg := l.degrees(d.exps)
	pow := make([][]uint64, len(l.vars))
	out := make([][]uint64, len(vars))
	of := make([][]uint64, len(l.vars)) // the image in each variable of l, if wanted
	for i, v := range l.vars {
		pow[i] = f.powers(at(v), int(deg[i]))
		if k, ok := slices.BinarySearch(vars, v); ok {
			out[k] = make([]uint64, deg[i]+1)
			of[i] = out[k]
		}
	}
	exp := make([]uint64, len(l.vars))
	before := make([]uint64, len(l.vars)) // product of the powers of earlier variables
	for t, c := range f.coefs(d) {
		m := d.mono(t)
		for i := range exp {
			exp[i] = l.exp(m, i)
			before[i] = c
			if exp[i] != 0 {
				c = f.mul(c, pow[i][exp[i]])
			}
		}
		after := f.one
		for i := len(exp) - 1; i >= 0; i-- {
			if u := of[i]; u != nil {
				u[exp[i]] = f.add(u[exp[i]], f.mul(before[i], after))
			}
			if exp[i] != 0 {
				after = f.mul(after, pow[i][exp[i]])
			}
		}
	}
	return out
}

// zippel runs the sparse algorithm, with the try-th prime first.
func (c *candidates) zippel(try int) (Poly, bool) {
	order, gamma := c.arrange()
	z := &zippel{o: c.o, k: len(order) - 1, random: &c.random}
	z.p, z.q, z.g = newTrie(c.p.d, order), newTrie(c.q.d, order), newTrie(gamma.d, order)
	x, _ := slices.BinarySearch(c.vars, order[0])
	z.deg = c.bound[x]
	z.bound = make([]int, len(order))
	for i, v := range order[1:] {
		k, _ := slices.BinarySearch(c.vars, v)
		z.bound[i+1] = c.bound[k] + gamma.Degree(v)
	}
	if slices.Max(z.bound) > maxPoints {
		return Poly{}, false
	}
	f := newPrimeField(primeAt(try))
	s, out := z.first(f)
	if out != lucky {
		return Poly{}, false
	}
	var known crt
	residue := make([]uint64, len(s.co))
	co := s.co
	for n := range c.maxPrimes(gamma) {
		for i, r := range co {
			residue[i] = f.out(r)
		}
		stable := !known.extend(f.p, residue)
		if stable || n == 0 {
			if g, ok := c.prove(z.poly(order, gamma, s, known.val), order[0]); ok {
				return g, true
			}
			if stable {
				return Poly{}, false
			}
		}
		if f, co, out = z.otherPrime(s, try+attempts*(n+1)); out != lucky {
			return Poly{}, false
		}
	}
	return Poly{}, false
}

// maxPrimes is a number of primes whose product is greater than twice any coefficient of
// h, by Gelfond's bound: the heights of factors of p multiply to at most that of p times
// e to the sum of degrees, and 2³ is more than e².
func (c *candidates) maxPrimes(gamma Poly) int {
	n := 2 + gamma.height() + max(c.p.height(), c.q.height()) + bits.Len(uint(gamma.Len()))
	for i := range c.vars {
		n += 2 * max(c.dp[i], c.dq[i])
	}
	return 2 + n/61
}

// height is the bit length of the greatest coefficient.
func (p Poly) height() int {
	if p.d.bg == nil {
		return maxBits(p.d.co)
	}
	n := 0
	for _, c := range p.d.bg {
		n = max(n, c.BitLen())
	}
	return n
}

// otherPrime computes h on the monomials s modulo the first prime from the i-th on that
// is lucky.
func (z *zippel) otherPrime(s form, i int) (f primeField, co []uint64, out outcome) {
	for k := range attempts {
		f = newPrimeField(primeAt(i + k))
		if co, out = z.again(f, s); out == lucky {
			break
		}
	}
	return f, co, out
}

// arrange chooses the main variable, that with the simplest leading coefficients, and
// puts the other variables of positive bound after it, high degrees first. It also
// returns Γ, the gcd of the leading coefficients, without what the gcd cannot contain.
func (c *candidates) arrange() (order []Var, gamma Poly) {
	best := -1
	for i, v := range c.vars {
		if c.bound[i] == 0 {
			continue
		}
		n := min(c.p.leadLen(v, c.dp[i]), c.q.leadLen(v, c.dq[i]))*64 - min(c.bound[i], 63)
		if best < 0 || n < best {
			best = n
			order = []Var{v}
		}
	}
	gamma = c.o.Gcd(c.p.lead(order[0]), c.q.lead(order[0]))
	var rest []int
	for i, v := range c.vars {
		if c.bound[i] > 0 && v != order[0] {
			rest = append(rest, i)
		}
	}
	slices.SortStableFunc(rest, func(i, j int) int { return c.bound[j] - c.bound[i] })
	for _, i := range rest {
		order = append(order, c.vars[i])
	}
	for _, v := range gamma.Vars() {
		if !slices.Contains(order, v) {
			gamma = c.o.gcdOfCoeffs(Poly{}, v, gamma).MulInt(gamma.Content())
		}
	}
	return order, gamma
}

// leadLen is the number of terms of the leading coefficient in v, d being the degree.
func (p Poly) leadLen(v Var, d int) int {
	k, n := p.d.lay.index(v), 0
	for i := range p.d.len() {
		if p.d.lay.exp(p.d.mono(i), k) == uint64(d) {
			n++
		}
	}
	return n
}

// poly is h over ℤ.
func (z *zippel) poly(order []Var, gamma Poly, s form, co []*big.Int) Poly {
	terms := make([]Term, 0, len(co))
	for t, c := range co {
		if c.Sign() == 0 {
			continue
		}
		m := power(order[0], uint64(s.x[t]))
		for i, e := range s.ys(t) {
			if e > 0 {
				m = append(m, Power{order[i+1], e})
			}
		}
		terms = append(terms, Term{c, m})
	}
	return gamma.MulMono(power(order[0], uint64(z.deg))).Add(FromTerms(terms))
}

// prove takes h to the gcd, if it is right. A common divisor with the greatest degree in
// x that the gcd can have is the gcd but for a factor free of x, and that divides all
// coefficients of both quotients. If h itself is no divisor, it may be so for a factor
// of Γ, free of x, that is divided out.
func (c *candidates) prove(h Poly, x Var) (Poly, bool) {
	h = h.primitive().positive()
	i, _ := slices.BinarySearch(c.vars, x)
	if h.Degree(x) != c.bound[i] {
		return Poly{}, false
	}
	u, v, ok := c.cofactors(h)
	if !ok {
		content := c.o.gcdOfCoeffs(Poly{}, x, h)
		if content.IsOne() {
			return Poly{}, false
		}
		h = c.o.quo(h, content).positive()
		if u, v, ok = c.cofactors(h); !ok {
			return Poly{}, false
		}
	}
	if c.reached(h) {
		return h, true
	}
	rest := c.o.gcdOfCoeffs(c.o.gcdOfCoeffs(Poly{}, x, u), x, v)
	return c.o.Mul(h, rest).positive(), true
}

// cofactors is p/h and q/h, if h divides both.
func (c *candidates) cofactors(h Poly) (u, v Poly, ok bool) {
	if c.exceeds(h) {
		return
	}
	if u, ok = c.o.DivExact(c.p, h); ok {
		v, ok = c.o.DivExact(c.q, h)
	}
	return u, v, ok
}

// exceeds reports whether h has a higher degree than the gcd can have.
func (c *candidates) exceeds(h Poly) bool {
	for i, v := range c.vars {
		if h.Degree(v) > c.bound[i] {
			return true
		}
	}
	return false
}

// reached reports whether h has the greatest degrees that the gcd can have.
func (c *candidates) reached(h Poly) bool {
	for i, v := range c.vars {
		if h.Degree(v) < c.bound[i] {
			return false
		}
	}
	return true
}

// gcdOfCoeffs is the gcd, primitive over ℤ, of g and the coefficients of p in v.
func (o Ops) gcdOfCoeffs(g Poly, v Var, p Poly) Poly {
	c := p.coeffsIn(v)
	slices.SortStableFunc(c, func(a, b coefAt) int { return a.coef.Len() - b.coef.Len() })
	for _, x := range c {
		if g = o.Gcd(g, x.coef).primitive(); g.IsOne() {
			break
		}
	}
	return g
}
