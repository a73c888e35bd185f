// The gcd by primitive polynomial remainder sequences, one variable after the other
// ([Brown1971]): slow on large input and sure on every input. It is used where the
// modular method has met only unlucky primes and points.

package poly

// gcdPRS is the gcd of polynomials that are not zero, primitive over ℤ, with positive
// leading coefficients.
func (o Ops) gcdPRS(p, q Poly) Poly {
	if p.IsConst() || q.IsConst() {
		return one
	}
	v, common := mainVar(p, q)
	if !common {
		// v occurs in one of them only, so the gcd divides all coefficients of that.
		if q.Has(v) {
			p, q = q, p
		}
		return o.contentIn(p, v, q)
	}
	cp, cq := o.contentIn(p, v, Poly{}), o.contentIn(q, v, Poly{})
	p, _ = o.DivExact(p, cp)
	q, _ = o.DivExact(q, cq)
	if p.Degree(v) < q.Degree(v) {
		p, q = q, p
	}
	for q.Has(v) {
		r := o.pseudoRem(p, q, v).primitive()
		p, q = q, r
		if !r.IsZero() {
			q, _ = o.DivExact(r, o.contentIn(r, v, Poly{}))
		}
	}
	if !q.IsZero() {
		p = one // a remainder free of v: the primitive parts are coprime
	}
	return o.Mul(o.gcdPRS(cp, cq), p.positive())
}

// mainVar is the variable of least degree among those common to p and q, or, where there
// is one that occurs in only one of them, that.
func mainVar(p, q Poly) (v Var, common bool) {
	best := -1
	for _, x := range p.d.lay.union(q.d.lay) {
		a, b := p.Degree(x), q.Degree(x)
		if a == 0 || b == 0 {
			return x, false
		}
		if d := min(a, b); best < 0 || d < best {
			v, best = x, d
		}
	}
	return v, true
}

// contentIn is the gcd, primitive over ℤ, of g and the coefficients of p as a
// polynomial in v.
func (o Ops) contentIn(p Poly, v Var, g Poly) Poly {
	g = g.primitive()
	for _, c := range p.coeffsIn(v) {
		switch pp := c.coef.primitive(); {
		case g.IsZero():
			g = pp
		case g.IsOne():
			return g
		default:
			g = o.gcdPRS(g, pp)
		}
	}
	return g
}

// pseudoRem is the remainder of lc(q)ⁿ·p by q in the variable v, n being as large as
// each step needs.
func (o Ops) pseudoRem(p, q Poly, v Var) Poly {
	d := q.Degree(v)
	lq := q.lead(v)
	for {
		n := p.Degree(v)
		if p.IsZero() || n < d {
			return p
		}
		lp := p.lead(v)
		p = o.Mul(lq, p).Sub(o.Mul(lp.MulMono(power(v, uint64(n-d))), q))
		o.Budget.Check(p.Len())
	}
}

// lead is the leading coefficient as a polynomial in v.
func (p Poly) lead(v Var) Poly {
	c := p.coeffsIn(v)
	return c[len(c)-1].coef
}
