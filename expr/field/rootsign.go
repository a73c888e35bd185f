package field

// The sign of what leaves a square root. A root is the positive one, so √(1/(1−ε)) is
// √(1−ε)/(1−ε) and not √(1−ε)/(ε−1), whichever of the two the basis of factors holds. Signs
// follow from the declared ones and from the radicands, which are positive: with a sign
// written as a bit, each radicand is a linear equation modulo 2 for the bits of its factors.
// What is left open is assumed positive.

import (
	"math/big"
	"math/bits"

	"remnant/expr/poly"
)

// parity is a product of factors of open sign, one bit each, with an overall sign.
type parity struct {
	mask     uint64
	negative bool
}

func (p parity) times(q parity) parity {
	return parity{p.mask ^ q.mask, p.negative != q.negative}
}

// openSigns numbers the factors whose sign is not declared.
type openSigns struct {
	f   *Field
	ids []int32
}

// of is the parity of content times powers; false if more than 64 signs are open.
func (o *openSigns) of(content *big.Int, powers []power) (parity, bool) {
	out := parity{negative: content.Sign() < 0}
	for _, p := range powers {
		if p.exp%2 == 0 {
			continue
		}
		switch o.f.polySign(o.f.factors[p.id].p) {
		case Positive:
		case Negative:
			out.negative = !out.negative
		default:
			i := o.index(p.id)
			if i == 64 {
				return out, false
			}
			out.mask ^= 1 << i
		}
	}
	return out, true
}

func (o *openSigns) index(id int32) int {
	for i, have := range o.ids {
		if have == id {
			return i
		}
	}
	if len(o.ids) == 64 {
		return 64
	}
	o.ids = append(o.ids, id)
	return len(o.ids) - 1
}

// positive is content times powers, or its negative: the one that is positive where the
// radicands are. Factors whose sign stays open are assumed positive, and recorded so.
func (f *Field) positive(e Elem, content *big.Int, powers []power, radicands []poly.Poly) Elem {
	o := openSigns{f: f}
	sign, ok := o.of(content, powers)
	var rows []parity // reduced: each has a highest bit of its own
	for _, r := range radicands {
		c, ps := f.factorise(r)
		row, fits := o.of(c, ps)
		if row = reduceParity(row, rows); fits && row.mask != 0 {
			rows = append(rows, row)
		}
	}
	if sign = reduceParity(sign, rows); ok {
		for m := sign.mask; m != 0; m &= m - 1 {
			id := o.ids[bits.TrailingZeros64(m)]
			f.assumePositive(Elem{f: f, num: f.factors[id].p}, "it leaves a square root")
		}
	}
	if sign.negative {
		return e.Neg()
	}
	return e
}

// reduceParity multiplies p by those rows whose highest factor it holds.
func reduceParity(p parity, rows []parity) parity {
	for again := true; again; {
		again = false
		for _, r := range rows {
			if top := bits.Len64(r.mask) - 1; p.mask>>top&1 == 1 {
				p, again = p.times(r), true
			}
		}
	}
	return p
}
