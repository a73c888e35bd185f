// Exact division. That the divisor does not divide is reported as soon as a leading
// term shows it.

package poly

import (
	"math"
	"math/big"
	"math/bits"
)

// DivExact is p/q and true if q divides p over ℤ, else 0 and false; see Ops.DivExact.
func (p Poly) DivExact(q Poly) (Poly, bool) { return Ops{}.DivExact(p, q) }

// DivExact is p/q and true if q divides p over ℤ, else 0 and false. It panics if q is 0.
// Degrees and the last terms are compared first. Method: division with a heap of the
// products of quotient and divisor still to be subtracted ([MonaganPearce2011]). Cost:
// O(nm log n) for n terms of the quotient and m of the divisor, and a pass over p.
func (o Ops) DivExact(p, q Poly) (Poly, bool) {
	switch {
	case q.d == nil:
		panic("poly: division by zero")
	case p.d == nil:
		return Poly{}, true
	case q.d.len() == 1:
		return divTerm(p, q)
	case p.d.len() == 1:
		return Poly{}, false
	}
	l, pe, qe, bound := quotientLayout(p.d, q.d)
	if l == nil {
		return Poly{}, false
	}
	last := make([]uint64, l.words)
	if w := l.words; !l.divides(last, pe[len(pe)-w:], qe[len(qe)-w:]) || !l.divides(last, bound, last) {
		return Poly{}, false
	}
	a, c := operand{pe, p.d.co, p.d.bg}, operand{qe, q.d.co, q.d.bg}
	if a.bg == nil && c.bg == nil {
		if r, done, ok := o.divWord(l, a, c, bound); done {
			return r, ok
		}
	}
	a.big()
	c.big()
	return o.divBig(l, a, c, bound)
}

// quotientLayout brings dividend and divisor to a layout that leaves room for every
// product of the divisor with a monomial under bound, the greatest exponents that a
// quotient can have. The layout is nil if the degrees already forbid division.
func quotientLayout(p, q *data) (l *layout, pe, qe, bound []uint64) {
	vars := p.lay.vars
	dp, dq := p.lay.degrees(p.exps), q.lay.degrees(q.exps)
	width, diff := make([]int, len(vars)), make([]uint64, len(vars))
	j := 0
	for i, v := range vars {
		diff[i], width[i] = dp[i], bits.Len64(dp[i])
		if j < len(dq) && q.lay.vars[j] == v {
			if dq[j] > dp[i] {
				return nil, nil, nil, nil
			}
			diff[i], j = dp[i]-dq[j], j+1
		}
	}
	if j < len(dq) {
		return nil, nil, nil, nil // a variable that p has not
	}
	l = p.lay
	if l.words > 1 {
		if t := tightLayout(vars, width); t != nil {
			l = t
		}
	}
	return l, p.lay.repack(p.exps, l), q.lay.repack(q.exps, l), l.pack(diff)
}

// divTerm divides by a single term.
func divTerm(p, q Poly) (Poly, bool) {
	if len(q.d.lay.vars) == 0 {
		return p.DivExactInt(q.d.coef(0))
	}
	r, ok := p, true
	if c := q.d.coef(0); !c.IsInt64() || c.Int64() != 1 {
		if r, ok = p.DivExactInt(c); !ok {
			return Poly{}, false
		}
	}
	return r.DivMono(q.d.lay.powers(nil, q.d.mono(0)))
}

// DivMono is p/m and true if the monomial m divides every term, else 0 and false.
func (p Poly) DivMono(m []Power) (Poly, bool) {
	if p.d == nil || len(m) == 0 {
		return p, true
	}
	ml, me := packPowers(m)
	md := &data{lay: ml, exps: me, co: []int64{1}}
	l, pe, qe, _ := quotientLayout(p.d, md)
	if l == nil {
		return Poly{}, false
	}
	w := l.words
	b := builder{lay: l, exps: make([]uint64, len(pe)), co: p.d.co, bg: p.d.bg}
	for i := 0; i < len(pe); i += w {
		if !l.divides(b.exps[i:i+w], pe[i:i+w], qe) {
			return Poly{}, false
		}
	}
	return b.canonical(), true
}

// DivExactInt is p/c and true if c divides every coefficient, else 0 and false. It
// panics if c is 0.
func (p Poly) DivExactInt(c *big.Int) (Poly, bool) {
	if c.Sign() == 0 {
		panic("poly: division by zero")
	}
	if p.d == nil || c.IsInt64() && c.Int64() == 1 {
		return p, true
	}
	b := builder{lay: p.d.lay, exps: p.d.exps}
	if w, ok := fitsWord(c); ok && p.d.bg == nil {
		b.co = make([]int64, len(p.d.co))
		for i, x := range p.d.co {
			if x%w != 0 {
				return Poly{}, false
			}
			b.co[i] = x / w
		}
		return b.poly(), true
	}
	var r big.Int
	for i := range p.d.len() {
		x, _ := new(big.Int).QuoRem(p.d.coef(i), c, &r)
		if r.Sign() != 0 {
			return Poly{}, false
		}
		b.big(x)
	}
	return b.poly(), true
}

// divWord divides word coefficients; done is false if the quotient has a coefficient
// that is none.
func (o Ops) divWord(l *layout, p, q operand, bound []uint64) (r Poly, done, ok bool) {
	b := newBuilder(l, 0)
	lead := q.co[0]
	done, ok = true, true
	o.divRows(&b, p, q, bound, func(k int, next func() (int, int, bool)) (zero, divides bool) {
		var a acc
		if k >= 0 {
			a.addWord(-p.co[k])
		}
		for i, j, more := next(); more; i, j, more = next() {
			a.addMul(b.co[i], q.co[j])
		}
		if a.isZero() {
			return true, true
		}
		c, fits := a.quo(lead)
		if !fits {
			x, rem := new(big.Int).QuoRem(a.big(), big.NewInt(lead), new(big.Int))
			if rem.Sign() == 0 {
				done = false
			}
			_ = x
			return false, false
		}
		b.word(-c)
		return false, true
	}, &ok)
	if !done || !ok {
		return Poly{}, done, false
	}
	return b.canonical(), true, true
}

// quo is a/d if that is exact and a word coefficient.
func (a *acc) quo(d int64) (int64, bool) {
	if w, ok := a.word(); ok {
		return w / d, w%d == 0
	}
	neg := int64(a.hi) < 0
	x := *a
	if neg {
		var b uint64
		x.lo, b = bits.Sub64(0, x.lo, 0)
		x.mid, b = bits.Sub64(0, x.mid, b)
		x.hi, _ = bits.Sub64(0, x.hi, b)
	}
	m := abs(d)
	if x.hi != 0 || x.mid >= m {
		return 0, false
	}
	c, r := bits.Div64(x.mid, x.lo, m)
	if r != 0 || c > math.MaxInt64 {
		return 0, false
	}
	if neg != (d < 0) {
		return -int64(c), true
	}
	return int64(c), true
}

// divBig divides big coefficients.
func (o Ops) divBig(l *layout, p, q operand, bound []uint64) (Poly, bool) {
	b := newBuilder(l, 0)
	var quotient []*big.Int
	var t, rem big.Int
	ok := true
	o.divRows(&b, p, q, bound, func(k int, next func() (int, int, bool)) (zero, divides bool) {
		a := new(big.Int)
		if k >= 0 {
			a.Set(p.bg[k])
		}
		for i, j, more := next(); more; i, j, more = next() {
			a.Sub(a, t.Mul(quotient[i], q.bg[j]))
		}
		if a.Sign() == 0 {
			return true, true
		}
		if a.QuoRem(a, q.bg[0], &rem); rem.Sign() != 0 {
			return false, false
		}
		quotient = append(quotient, a)
		b.big(a)
		return false, true
	}, &ok)
	if !ok {
		return Poly{}, false
	}
	return b.canonical(), true
}

// divRows drives the division on monomials of any number of words. For each monomial of
// the remainder it calls term with the index of that monomial in p (−1 if absent) and
// an iterator over the pairs (quotient term, divisor term) to be subtracted; term
// appends a coefficient to the quotient unless the remainder's is zero. *ok becomes
// false as soon as the division fails.
func (o Ops) divRows(b *builder, p, q operand, bound []uint64, term func(int, func() (int, int, bool)) (zero, divides bool), ok *bool) {
	w, n, m := b.lay.words, p.len(), q.len()
	h := newRows(0, w)
	var at []int // at[i] is the divisor term that row i of the quotient is to meet next
	var ready []int32
	top, e, room := make([]uint64, w), make([]uint64, w), make([]uint64, w)
	next := func() (int, int, bool) {
		if !h.topIs(top) {
			return 0, 0, false
		}
		r := h.pop()
		ready = append(ready, r)
		return int(r), at[r], true
	}
	for k := 0; k < n || len(h.heap) > 0; {
		in := -1
		switch {
		case k == n:
			copy(top, h.mono(h.heap[0]))
		case len(h.heap) == 0 || compareMono(p.exps[k*w:k*w+w], h.mono(h.heap[0])) >= 0:
			copy(top, p.exps[k*w:k*w+w])
			in, k = k, k+1
		default:
			copy(top, h.mono(h.heap[0]))
		}
		ready = ready[:0]
		zero, divides := term(in, next)
		if !divides || !zero && !(b.lay.divides(e, top, q.exps[:w]) && b.lay.divides(room, bound, e)) {
			*ok = false
			return
		}
		for _, r := range ready {
			if at[r]++; at[r] < m {
				h.push(r, b.exps[int(r)*w:int(r)*w+w], q.exps[at[r]*w:at[r]*w+w])
			}
		}
		if !zero {
			r := int32(len(at))
			b.exps = append(b.exps, e...)
			at = append(at, 1)
			h.push(r, e, q.exps[w:2*w])
			if r%checkEvery == 0 {
				o.Budget.Check(int(r))
			}
		}
	}
}
