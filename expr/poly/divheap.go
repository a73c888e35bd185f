// Quotients by a heap of the products of quotient and divisor that are still to be
// subtracted: row i is the i-th term of the quotient times the successive terms of the
// divisor after the first ([MonaganPearce2011]; the heap is that of the products). The
// greatest of the heap and of what is left of the dividend is the next remainder term;
// its quotient by the leading term of the divisor must be a monomial under the bound
// that the degrees set, with an integer coefficient.

package poly

import "math/big"

// divHeap divides word coefficients on one-word monomials.
func (o Ops) divHeap(b *builder, p, q operand, bound uint64) quotient {
	pe, qe, guard := p.exps, q.exps, b.lay.guard[0]
	w := newWorkspace(0)
	h, at, ready := w.rowHeap, w.at, w.ready
	defer func() {
		*w = workspace{h, at, ready} // which may have grown
		w.release()
	}()
	b.reserve(1 + len(pe)/len(qe))
	for k := 0; k < len(pe) || len(h.heap) > 0; {
		var a acc // the remainder with the opposite sign
		var key uint64
		if len(h.heap) > 0 {
			key = h.heap[0].key
		}
		if k < len(pe) && (len(h.heap) == 0 || pe[k] >= key) {
			key = pe[k]
			a.addWord(-p.co[k])
			k++
		}
		ready = ready[:0]
		for len(h.heap) > 0 && h.heap[0].key == key {
			for r := h.pop(); r >= 0; r = h.next[r] {
				a.addMul(b.co[r], q.co[at[r]])
				ready = append(ready, r)
			}
		}
		for _, r := range ready {
			if at[r]++; int(at[r]) < len(qe) {
				h.push(b.exps[r]+qe[at[r]], r)
			}
		}
		if a.isZero() {
			continue
		}
		e := key - qe[0]
		if (e|(bound-e))&guard != 0 {
			return fails
		}
		if out := b.quoTerm(&a, q.co[0]); out != divides {
			return out
		}
		r := int32(len(at))
		b.exps = append(b.exps, e)
		at, h.next = append(at, 1), append(h.next, -1)
		h.push(e+qe[1], r)
		if r%checkEvery == 0 {
			o.Budget.Check(int(r))
		}
	}
	return divides
}

// quoTerm appends −a/lead to the coefficients of the quotient.
func (b *builder) quoTerm(a *acc, lead int64) quotient {
	c, ok, big := a.quo(lead)
	switch {
	case ok:
		b.word(-c)
		return divides
	case big:
		return tooBig
	}
	return fails
}

// divHeapWords divides word coefficients on monomials of any number of words.
func (o Ops) divHeapWords(b *builder, p, q operand, bound []uint64) quotient {
	return o.divRows(b, p, q, bound, func(k int, next func() (int, int, bool)) (zero bool, out quotient) {
		var a acc
		if k >= 0 {
			a.addWord(-p.co[k])
		}
		for i, j, more := next(); more; i, j, more = next() {
			a.addMul(b.co[i], q.co[j])
		}
		if a.isZero() {
			return true, divides
		}
		return false, b.quoTerm(&a, q.co[0])
	})
}

// divBig divides big coefficients.
func (o Ops) divBig(l *layout, p, q operand, bound []uint64) (Poly, bool) {
	b := newBuilder(l, 0)
	var quo []*big.Int
	var t, rem big.Int
	out := o.divRows(&b, p, q, bound, func(k int, next func() (int, int, bool)) (zero bool, out quotient) {
		a := new(big.Int)
		if k >= 0 {
			a.Set(p.bg[k])
		}
		for i, j, more := next(); more; i, j, more = next() {
			a.Sub(a, t.Mul(quo[i], q.bg[j]))
		}
		if a.Sign() == 0 {
			return true, divides
		}
		if a.QuoRem(a, q.bg[0], &rem); rem.Sign() != 0 {
			return false, fails
		}
		quo = append(quo, a)
		b.big(a)
		return false, divides
	})
	if out != divides {
		return Poly{}, false
	}
	return b.canonical(), true
}

// divRows drives the division on monomials of any number of words. For each monomial of
// the remainder it calls term with the index of that monomial in p (−1 if absent) and
// an iterator over the pairs (quotient term, divisor term) to be subtracted; term
// appends a coefficient to the quotient unless the remainder's is zero.
func (o Ops) divRows(b *builder, p, q operand, bound []uint64, term func(int, func() (int, int, bool)) (zero bool, out quotient)) quotient {
	w, n, m := b.lay.words, p.len(), q.len()
	h := newRows(0, w)
	var at []int // at[i] is the divisor term that row i of the quotient meets next
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
		if k < n && (len(h.heap) == 0 || compareMono(p.exps[k*w:k*w+w], h.mono(h.heap[0])) >= 0) {
			copy(top, p.exps[k*w:k*w+w])
			in, k = k, k+1
		} else {
			copy(top, h.mono(h.heap[0]))
		}
		ready = ready[:0]
		zero, out := term(in, next)
		if out != divides {
			return out
		}
		if !zero && !(b.lay.divides(e, top, q.exps[:w]) && b.lay.divides(room, bound, e)) {
			return fails
		}
		for _, r := range ready {
			if at[r]++; at[r] < m {
				h.push(r, b.exps[int(r)*w:int(r)*w+w], q.exps[at[r]*w:at[r]*w+w])
			}
		}
		if zero {
			continue
		}
		r := int32(len(at))
		b.exps = append(b.exps, e...)
		at = append(at, 1)
		h.push(r, e, q.exps[w:2*w])
		if r%checkEvery == 0 {
			o.Budget.Check(int(r))
		}
	}
	return divides
}
