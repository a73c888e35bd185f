// Exact division. That the divisor does not divide is reported as soon as a leading
// term shows it.

package poly

import (
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
		if r, out := o.divWord(l, a, c, bound); out != tooBig {
			return r, out == divides
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

// quotient is the outcome of a division of word coefficients.
type quotient uint8

const (
	divides quotient = iota
	fails
	tooBig // so far it divides, but the next coefficient is no word
)

// divWord divides word coefficients, by the method that is to be expected fastest.
func (o Ops) divWord(l *layout, p, q operand, bound []uint64) (Poly, quotient) {
	b := newBuilder(l, 0)
	var out quotient
	if l.words > 1 {
		out = o.divHeapWords(&b, p, q, bound)
	} else if c, ok := arrayDivCut(l, p.exps, q.exps, bound); ok {
		out = o.divArray(&b, p, q, bound[0], c)
	} else {
		out = o.divHeap(&b, p, q, bound[0])
	}
	if out != divides {
		return Poly{}, out
	}
	return b.canonical(), divides
}
