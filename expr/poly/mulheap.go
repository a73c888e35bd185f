// Products by a heap of outstanding products.
//
// The product of a term of the shorter factor with the successive terms of the longer
// is a row. Row i+1 begins when row i has given its first product, so that the heap
// never holds more rows than it must ([MonaganPearce2011]). Cost: O(nm log min(n, m))
// comparisons, memory O(min(n, m)) beside the result.

package poly

import (
	"math/big"
	"math/bits"
)

// mulHeap multiplies word coefficients on one-word monomials.
func (o Ops) mulHeap(b *builder, p, q operand) {
	pe, pc, qe, qc := p.exps, p.co, q.exps, q.co
	n := len(pe)
	w := newWorkspace(n)
	defer w.release()
	h, at, ready := w.rowHeap, w.at, w.ready // local, to be fast
	small := maxBits(pc)+maxBits(qc)+bits.Len(uint(n)) <= 63
	b.reserve(max(min(n*len(qe), checkEvery), n+len(qe)))
	defer b.clip()
	h.push(pe[0]+qe[0], 0)
	for len(h.heap) > 0 {
		key := h.heap[0].key
		var sum int64
		var a acc
		ready = ready[:0]
		for len(h.heap) > 0 && h.heap[0].key == key {
			for r := h.pop(); r >= 0; r = h.next[r] {
				if small {
					sum += pc[r] * qc[at[r]]
				} else {
					a.addMul(pc[r], qc[at[r]])
				}
				ready = append(ready, r)
			}
		}
		if small && sum != 0 {
			b.exps = append(b.exps, key)
			b.word(sum)
		} else if !small && !a.isZero() {
			b.exps = append(b.exps, key)
			b.acc(&a)
		}
		if len(b.exps)%checkEvery == checkEvery-1 {
			o.Budget.Check(len(b.exps))
		}
		for _, r := range ready {
			if at[r] == 0 && int(r)+1 < n {
				h.push(pe[r+1]+qe[0], r+1)
			}
			if at[r]++; int(at[r]) < len(qe) {
				h.push(pe[r]+qe[at[r]], r)
			}
		}
	}
}

// mulHeapWords multiplies word coefficients on monomials of several words.
func (o Ops) mulHeapWords(b *builder, p, q operand) {
	o.mulRows(b, p, q, func(next func() (int, int, bool)) bool {
		var a acc
		for i, j, ok := next(); ok; i, j, ok = next() {
			a.addMul(p.co[i], q.co[j])
		}
		if a.isZero() {
			return false
		}
		b.acc(&a)
		return true
	})
}

// mulHeapBig multiplies big coefficients.
func (o Ops) mulHeapBig(b *builder, p, q operand) {
	var t big.Int
	o.mulRows(b, p, q, func(next func() (int, int, bool)) bool {
		a := new(big.Int)
		for i, j, ok := next(); ok; i, j, ok = next() {
			a.Add(a, t.Mul(p.bg[i], q.bg[j]))
		}
		if a.Sign() == 0 {
			return false
		}
		b.big(a)
		return true
	})
}

// mulRows drives the heap for monomials of any number of words. For each monomial of
// the product it calls sum, which adds up the pairs of terms that next yields and
// reports whether the result was not zero.
func (o Ops) mulRows(b *builder, p, q operand, sum func(next func() (int, int, bool)) bool) {
	w, n, m := b.lay.words, p.len(), q.len()
	h := newRows(n, w)
	at := make([]int, n)
	ready := make([]int32, 0, n)
	top := make([]uint64, w)
	next := func() (int, int, bool) {
		if !h.topIs(top) {
			return 0, 0, false
		}
		r := h.pop()
		ready = append(ready, r)
		return int(r), at[r], true
	}
	h.push(0, p.exps[:w], q.exps[:w])
	for len(h.heap) > 0 {
		copy(top, h.mono(h.heap[0]))
		ready = ready[:0]
		if sum(next) {
			b.exps = append(b.exps, top...)
		}
		if b.len()%checkEvery == checkEvery-1 {
			o.Budget.Check(b.len())
		}
		for _, r := range ready {
			if i := int(r) + 1; at[r] == 0 && i < n {
				h.push(r+1, p.exps[i*w:i*w+w], q.exps[:w])
			}
			if at[r]++; at[r] < m {
				h.push(r, p.exps[int(r)*w:int(r)*w+w], q.exps[at[r]*w:at[r]*w+w])
			}
		}
	}
}
