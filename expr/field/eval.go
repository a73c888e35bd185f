package field

// Values at a point: modulo a prime, for "certainly not equal" and for counting solutions,
// and the factors of an element, for people.

import (
	"math/big"
	"slices"

	"remnant/expr/poly"
)

// EvalMod is e at a point modulo the prime m; at gives the value of each generator. It is
// false where the denominator vanishes there.
func (e Elem) EvalMod(m poly.Modulus, at func(Gen) uint64) (uint64, bool) {
	if e.IsZero() {
		return 0, true
	}
	v := e.num.EvalMod(m, at)
	d := uint64(1)
	if e.den.int != nil {
		d = new(big.Int).Mod(e.den.int, new(big.Int).SetUint64(uint64(m))).Uint64()
	}
	for _, p := range e.den.pow {
		q := e.f.factors[p.id].p.EvalMod(m, at)
		d = m.Mul(d, m.Pow(q, uint64(p.exp)))
	}
	if d == 0 {
		return 0, false
	}
	return m.Mul(v, m.Inv(d)), true
}

// FactorPower is a polynomial, primitive with positive leading coefficient, to a power of
// either sign.
type FactorPower struct {
	P   poly.Poly
	Exp int
}

// Factors writes e ≠ 0 as a rational number times powers of pairwise coprime polynomials:
// single generators first, then by the polynomials' own order.
func (e Elem) Factors() (*big.Rat, []FactorPower) {
	e = e.Lowest()
	content, powers := e.f.factorise(e.num)
	r := new(big.Rat).SetFrac(content, e.DenInt())
	all := map[int32]int32{}
	for _, p := range powers {
		e.f.spread(p, all)
	}
	for _, p := range e.live().den.pow {
		all[p.id] -= p.exp
	}
	out := make([]FactorPower, 0, len(all))
	for _, p := range sortPowers(all) {
		out = append(out, FactorPower{e.f.factors[p.id].p, int(p.exp)})
	}
	slices.SortStableFunc(out, func(a, b FactorPower) int {
		am, bm := a.P.IsMono(), b.P.IsMono()
		if am != bm {
			if am {
				return -1
			}
			return 1
		}
		return b.P.Compare(a.P)
	})
	return r, out
}
