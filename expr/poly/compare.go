// The total order of polynomials, and a hash.

package poly

import "math/bits"

// Compare is a total order, for sorting factors: fewer terms first, then the first
// difference decides, the terms read in decreasing order, monomial before coefficient.
// It is −1, 0 or 1, and 0 exactly for equal polynomials.
func (p Poly) Compare(q Poly) int {
	if n, m := p.Len(), q.Len(); n != m {
		return cmpInt(n, m)
	}
	if p.d == q.d {
		return 0
	}
	lay, pe, qe := common(p.d, q.d)
	w := lay.words
	for i := range p.d.len() {
		if c := compareMono(pe[i*w:i*w+w], qe[i*w:i*w+w]); c != 0 {
			return c
		}
		if c := compareCoef(p.d, q.d, i); c != 0 {
			return c
		}
	}
	return 0
}

func cmpInt(a, b int) int {
	switch {
	case a < b:
		return -1
	case a > b:
		return 1
	}
	return 0
}

func compareCoef(p, q *data, i int) int {
	if p.bg == nil && q.bg == nil {
		switch {
		case p.co[i] < q.co[i]:
			return -1
		case p.co[i] > q.co[i]:
			return 1
		}
		return 0
	}
	return p.coef(i).Cmp(q.coef(i))
}

// Hash is equal for equal polynomials. It is the same in every run.
func (p Poly) Hash() uint64 {
	if p.d == nil {
		return 0
	}
	h := uint64(len(p.d.lay.vars))
	for _, v := range p.d.lay.vars {
		h = mix(h, uint64(v))
	}
	for _, e := range p.d.exps {
		h = mix(h, e)
	}
	for _, c := range p.d.co {
		h = mix(h, uint64(c))
	}
	for _, c := range p.d.bg {
		h = mix(h, uint64(c.Sign()))
		for _, w := range c.Bits() {
			h = mix(h, uint64(w))
		}
	}
	return h
}

// mix folds x into the hash h by a full product with an odd constant.
func mix(h, x uint64) uint64 {
	hi, lo := bits.Mul64(h^x^0x9e3779b97f4a7c15, 0xd6e8feb86659fd93)
	return hi ^ lo + x
}
