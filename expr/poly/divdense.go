// Quotients in an array of accumulators: the division that goes with the products of
// muldense.go. For one outer monomial after the other, greatest first, what is left of
// the dividend is gathered in the array, with all products of earlier groups of the
// quotient and later groups of the divisor; the array is then divided, from the top, by
// the first group of the divisor.

package poly

import (
	"math"
	"math/bits"
)

// arrayDivCut is the cheapest choice of inner variables for a division, and whether that
// is cheaper than a heap. The size of the quotient is guessed: as full a box as the
// divisor has.
func arrayDivCut(l *layout, p, q, bound []uint64) (best cut, ok bool) {
	if len(p) < arrayMinProducts {
		return best, false
	}
	deg, degQ := l.degrees(p), l.degrees(q)
	fill := float64(len(q))
	for i := range deg {
		fill *= float64(l.exp(bound, i)+1) / float64(degQ[i]+1)
	}
	terms := max(1, min(fill, float64(len(p))))
	products := max(terms*float64(len(q)), float64(len(p)))
	least := products * (costHeapProduct + costHeapLevel*math.Log2(terms+1))
	for _, c := range cuts(l, deg, p, q) {
		// The quotient has as many groups as there are, for each of the divisor's, in
		// the dividend; see cost for the rest.
		c.groups[0] = max(1, c.groups[0]-c.groups[1])
		if cost := c.cost(products) + costArrayPair*float64(len(p))/16; cost < least {
			least, best, ok = cost, c, true
		}
	}
	return best, ok
}

// arrayDivision is the state of a division.
type arrayDivision struct {
	*box
	sums     sums3 // the remainder with the opposite sign
	b        *builder
	divisor  []group
	lead     uint64 // the greatest monomial of the divisor
	bound    uint64
	off      []int32 // numbers of the quotient's inner monomials
	quotient []span
}

// span is a group of the quotient: terms from … to−1.
type span struct {
	outer    uint64
	from, to int
}

// divArray divides word coefficients on one-word monomials by the given cut.
func (o Ops) divArray(b *builder, p, q operand, bound uint64, c cut) quotient {
	x := newBox(b.lay, c, b.lay.degrees(p.exps))
	d := &arrayDivision{box: x, sums: make(sums3, x.size), b: b, divisor: x.groups(q.exps, q.co), lead: q.exps[0], bound: bound}
	rest := x.groups(p.exps, p.co)
	var h rowHeap // rows are groups of the quotient
	var at, ready []int32
	for len(rest) > 0 || len(h.heap) > 0 {
		var outer uint64
		if len(h.heap) > 0 {
			outer = h.heap[0].key
		}
		if len(rest) > 0 && (len(h.heap) == 0 || rest[0].outer >= outer) {
			outer = rest[0].outer
			d.load(&rest[0])
			rest = rest[1:]
		}
		ready = ready[:0]
		for len(h.heap) > 0 && h.heap[0].key == outer {
			for r := h.pop(); r >= 0; r = h.next[r] {
				d.subtract(d.quotient[r], &d.divisor[at[r]])
				ready = append(ready, r)
			}
		}
		for _, r := range ready {
			if at[r]++; int(at[r]) < len(d.divisor) {
				h.push(d.quotient[r].outer+d.divisor[at[r]].outer, r)
			}
		}
		from := len(d.off)
		if out := d.reduce(outer); out != divides {
			return out
		}
		o.Budget.Check(len(d.off))
		if len(d.off) == from {
			continue
		}
		s := span{b.exps[from] >> x.shift, from, len(d.off)}
		r := int32(len(d.quotient))
		d.quotient = append(d.quotient, s)
		at, h.next = append(at, 1), append(h.next, -1)
		if len(d.divisor) > 1 {
			h.push(s.outer+d.divisor[1].outer, r)
		}
	}
	return divides
}

// load puts a group of the dividend into the array.
func (d *arrayDivision) load(g *group) {
	d.mark(0, g.off)
	for i, o := range g.off {
		d.sums[o].addWord(-g.co[i])
	}
}

// subtract takes the product of a group of the quotient and one of the divisor from the
// remainder.
func (d *arrayDivision) subtract(s span, g *group) {
	for t := s.from; t < s.to; t++ {
		d.mark(d.off[t], g.off)
		d.sums.add(d.off[t], g.off, d.b.co[t], g.co)
	}
}

// reduce divides the array, which holds the remainder at one outer monomial, by the
// first group of the divisor. It leaves the array empty if that succeeds.
func (d *arrayDivision) reduce(outer uint64) quotient {
	first := &d.divisor[0]
	guard := d.l.guard[0]
	for w := len(d.touch) - 1; w >= 0; w-- {
		for d.touch[w] != 0 {
			bit := bits.Len64(d.touch[w]) - 1
			d.touch[w] ^= 1 << bit
			k := w<<6 + bit
			a := d.sums[k]
			if a.isZero() {
				continue
			}
			d.sums[k] = acc{}
			e := outer<<d.shift | d.key[k]
			e -= d.lead
			if (e|(d.bound-e))&guard != 0 {
				return fails
			}
			if out := d.b.quoTerm(&a, first.co[0]); out != divides {
				return out
			}
			base := int32(k) - first.off[0]
			d.b.exps = append(d.b.exps, e)
			d.off = append(d.off, base)
			d.mark(base, first.off[1:])
			d.sums.add(base, first.off[1:], d.b.co[len(d.b.co)-1], first.co[1:])
		}
	}
	return divides
}
