// Sums: the merge of two sorted lists of terms, and sums of many by halves.

package poly

import (
	"math"
	"math/big"
)

// Neg is −p.
func (p Poly) Neg() Poly {
	if p.d == nil {
		return p
	}
	n := &data{lay: p.d.lay, exps: p.d.exps}
	if p.d.bg == nil {
		n.co = make([]int64, len(p.d.co))
		for i, c := range p.d.co {
			n.co[i] = -c
		}
		return Poly{d: n}
	}
	n.bg = make([]*big.Int, len(p.d.bg))
	for i, c := range p.d.bg {
		n.bg[i] = new(big.Int).Neg(c)
	}
	return Poly{d: n}
}

// Add is p + q. Cost: one pass over both.
func (p Poly) Add(q Poly) Poly { return merge(p, q, 1) }

// Sub is p − q. Cost: one pass over both.
func (p Poly) Sub(q Poly) Poly { return merge(p, q, -1) }

// merge is p + sign·q, sign being 1 or −1.
func merge(p, q Poly, sign int64) Poly {
	if q.d == nil {
		return p
	}
	if p.d == nil {
		if sign < 0 {
			return q.Neg()
		}
		return q
	}
	l, pe, qe := common(p.d, q.d)
	b := newBuilder(l, p.d.len()+q.d.len())
	switch {
	case p.d.bg != nil || q.d.bg != nil:
		mergeBig(&b, pe, p.d.bigs(), qe, q.d.bigs(), sign)
	case l.words == 1 && mergeWord1(&b, pe, p.d.co, qe, q.d.co, sign):
	default:
		mergeWord(&b, pe, p.d.co, qe, q.d.co, sign)
	}
	return b.canonical()
}

// mergeWord1 merges word coefficients on monomials of one word; it gives up, leaving b
// empty, if a sum is no word.
func mergeWord1(b *builder, pe []uint64, pc []int64, qe []uint64, qc []int64, sign int64) bool {
	n := len(pe) + len(qe)
	e, c := b.exps[:n], b.co[:n]
	i, j, k := 0, 0, 0
	for i < len(pe) && j < len(qe) {
		switch x, y := pe[i], qe[j]; {
		case x > y:
			e[k], c[k] = x, pc[i]
			i, k = i+1, k+1
		case x < y:
			e[k], c[k] = y, sign*qc[j]
			j, k = j+1, k+1
		default:
			v, w := pc[i], sign*qc[j]
			s := v + w
			if (v^s)&(w^s) < 0 || s == math.MinInt64 {
				return false
			}
			e[k], c[k] = x, s
			i, j = i+1, j+1
			if s != 0 {
				k++
			}
		}
	}
	copy(c[k:], pc[i:])
	k += copy(e[k:], pe[i:])
	copy(e[k:], qe[j:])
	for ; j < len(qe); j, k = j+1, k+1 {
		c[k] = sign * qc[j]
	}
	b.exps, b.co = e[:k], c[:k]
	return true
}

// sum appends the coefficient x + y and reports whether it is not zero.
func (b *builder) sum(x, y int64) bool {
	s := x + y
	if s == 0 {
		return false
	}
	// Overflow, or −2⁶³, which is no word coefficient.
	if (x^s)&(y^s) < 0 || s == math.MinInt64 {
		var a acc
		a.addWord(x)
		a.addWord(y)
		b.big(a.big())
		return true
	}
	b.word(s)
	return true
}

// mergeWord merges word coefficients on monomials of several words.
func mergeWord(b *builder, pe []uint64, pc []int64, qe []uint64, qc []int64, sign int64) {
	w, i, j := b.lay.words, 0, 0
	for i < len(pc) || j < len(qc) {
		switch c := compareHeads(pe, qe, i, j, w); {
		case c > 0:
			b.exps = append(b.exps, pe[i*w:i*w+w]...)
			b.word(pc[i])
			i++
		case c < 0:
			b.exps = append(b.exps, qe[j*w:j*w+w]...)
			b.word(sign * qc[j])
			j++
		default:
			if b.sum(pc[i], sign*qc[j]) {
				b.exps = append(b.exps, pe[i*w:i*w+w]...)
			}
			i, j = i+1, j+1
		}
	}
}

// compareHeads compares monomial i of pe with monomial j of qe; a list at its end is
// less than any monomial.
func compareHeads(pe, qe []uint64, i, j, w int) int {
	if i*w == len(pe) {
		return -1
	}
	if j*w == len(qe) {
		return 1
	}
	return compareMono(pe[i*w:i*w+w], qe[j*w:j*w+w])
}

// mergeBig merges big coefficients.
func mergeBig(b *builder, pe []uint64, pc []*big.Int, qe []uint64, qc []*big.Int, sign int64) {
	w, i, j := b.lay.words, 0, 0
	for i < len(pc) || j < len(qc) {
		switch c := compareHeads(pe, qe, i, j, w); {
		case c > 0:
			b.exps = append(b.exps, pe[i*w:i*w+w]...)
			b.big(pc[i])
			i++
		case c < 0:
			b.exps = append(b.exps, qe[j*w:j*w+w]...)
			b.big(signed(qc[j], sign))
			j++
		default:
			s := new(big.Int)
			if sign > 0 {
				s.Add(pc[i], qc[j])
			} else {
				s.Sub(pc[i], qc[j])
			}
			if s.Sign() != 0 {
				b.exps = append(b.exps, pe[i*w:i*w+w]...)
				b.big(s)
			}
			i, j = i+1, j+1
		}
	}
}

// signed is sign·c.
func signed(c *big.Int, sign int64) *big.Int {
	if sign < 0 {
		return new(big.Int).Neg(c)
	}
	return c
}

// Sum is the sum of all ps. Cost: each term is merged O(log len(ps)) times.
func Sum(ps []Poly) Poly {
	switch len(ps) {
	case 0:
		return Poly{}
	case 1:
		return ps[0]
	}
	h := len(ps) / 2
	return Sum(ps[:h]).Add(Sum(ps[h:]))
}
