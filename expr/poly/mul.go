// Products: the chooser between methods, and the products that need none.

package poly

import (
	"math/big"
	"math/bits"
)

// Mul is p·q without limits; see Ops.Mul.
func (p Poly) Mul(q Poly) Poly { return Ops{}.Mul(p, q) }

// Pow is pⁿ without limits; see Ops.Pow.
func (p Poly) Pow(n int) Poly { return Ops{}.Pow(p, n) }

// Mul is p·q. A product with a single term is one pass; others are computed by a heap
// of the outstanding products or, where the monomials fill their box well enough, in an
// array of accumulators.
func (o Ops) Mul(p, q Poly) Poly {
	if p.d == nil || q.d == nil {
		return Poly{}
	}
	if p.d.len() > q.d.len() {
		p, q = q, p
	}
	l, pe, qe := productLayout(p.d, q.d)
	b := newBuilder(l, 0)
	a := operand{pe, p.d.co, p.d.bg}
	c := operand{qe, q.d.co, q.d.bg}
	if p.d.len() == 1 {
		mulTerm(&b, a, c)
	} else {
		o.mulTerms(&b, a, c)
	}
	o.Budget.Check(b.len())
	if l.words > 1 || l.width == 0 {
		return b.canonical()
	}
	return b.poly()
}

// operand is the terms of a factor in the layout of the product.
type operand struct {
	exps []uint64
	co   []int64
	bg   []*big.Int
}

func (a *operand) len() int {
	if a.bg != nil {
		return len(a.bg)
	}
	return len(a.co)
}

// big makes the coefficients big.
func (a *operand) big() {
	if a.bg == nil {
		a.bg, a.co = bigs(a.co), nil
	}
}

// productLayout brings two factors to a layout in which no exponent of the product
// overflows: a canonical one if that has one word, else one word with fields as narrow
// as the degrees allow, else several words.
func productLayout(p, q *data) (l *layout, pe, qe []uint64) {
	if e, ok := p.lay.admit(q); ok && (or1(p.exps)+or1(e))&p.lay.over[0] == 0 {
		return p.lay, p.exps, e
	}
	if e, ok := q.lay.admit(p); ok && (or1(q.exps)+or1(e))&q.lay.over[0] == 0 {
		return q.lay, e, q.exps
	}
	dp, dq := p.lay.degrees(p.exps), q.lay.degrees(q.exps)
	vars := p.lay.union(q.lay)
	width, need := make([]int, len(vars)), 0
	i, j := 0, 0
	for k, v := range vars {
		d := uint64(0)
		if i < len(dp) && p.lay.vars[i] == v {
			d, i = d+dp[i], i+1
		}
		if j < len(dq) && q.lay.vars[j] == v {
			d, j = d+dq[j], j+1
		}
		if d>>32 != 0 {
			exponentOverflow()
		}
		width[k] = bits.Len64(d)
		need = max(need, width[k])
	}
	if wordsNeeded(len(vars), need) > 1 {
		l = tightLayout(vars, width)
	}
	if l == nil {
		l = p.lay.join(q.lay, need)
	}
	return l, p.lay.repack(p.exps, l), q.lay.repack(q.exps, l)
}

// mulTerm multiplies q by the single term p.
func mulTerm(b *builder, p, q operand) {
	w := b.lay.words
	b.exps = make([]uint64, len(q.exps))
	for i := 0; i < len(q.exps); i += w {
		for j := range w {
			b.exps[i+j] = q.exps[i+j] + p.exps[j]
		}
	}
	if p.bg == nil && q.bg == nil {
		b.co = make([]int64, 0, len(q.co))
		c := p.co[0]
		if bits.Len64(abs(c))+maxBits(q.co) <= 63 {
			for _, x := range q.co {
				b.co = append(b.co, c*x)
			}
			return
		}
		for _, x := range q.co {
			var a acc
			a.addMul(c, x)
			b.acc(&a)
		}
		return
	}
	p.big()
	q.big()
	for _, x := range q.bg {
		b.big(new(big.Int).Mul(p.bg[0], x))
	}
}

// mulTerms multiplies two factors of more than one term, the shorter first.
func (o Ops) mulTerms(b *builder, p, q operand) {
	if p.bg != nil || q.bg != nil {
		p.big()
		q.big()
		o.mulHeapBig(b, p, q)
		return
	}
	if b.lay.words > 1 {
		o.mulHeapWords(b, p, q)
		return
	}
	if c, ok := arrayCut(b.lay, p.exps, q.exps); ok {
		o.mulArray(b, p, q, c)
		return
	}
	o.mulHeap(b, p, q)
}

// MulInt is c·p.
func (p Poly) MulInt(c *big.Int) Poly { return p.Mul(FromBig(c)) }

// MulMono is p times the monomial m.
func (p Poly) MulMono(m []Power) Poly { return p.Mul(FromMono(m)) }

// Pow is pⁿ for n ≥ 0, with p⁰ = 1. Method: repeated multiplication by p, which for
// sparse polynomials beats squaring ([Fateman1974]); a single term and a constant are
// squared.
func (o Ops) Pow(p Poly, n int) Poly {
	if n < 0 {
		panic("poly: negative power")
	}
	if n == 0 {
		return FromInt(1)
	}
	if p.Len() <= 1 {
		return powTerm(p, n)
	}
	r := p
	for range n - 1 {
		r = o.Mul(r, p)
	}
	return r
}

// powTerm is pⁿ for a polynomial of at most one term.
func powTerm(p Poly, n int) Poly {
	for m, c := range p.Terms() {
		q := make([]Power, len(m))
		for i, x := range m {
			e := uint64(x.Exp) * uint64(n)
			if e>>32 != 0 || n>>32 != 0 {
				exponentOverflow()
			}
			q[i] = Power{x.Var, uint32(e)}
		}
		return monomial(new(big.Int).Exp(c, big.NewInt(int64(n)), nil), q)
	}
	return Poly{}
}
