package field

// The denominators' factors: a gcd-free basis of primitive, square-free polynomials with
// positive leading coefficient, each a number that fractions refer to. When a new
// polynomial shares a proper divisor with a factor, the factor is split: it stays, dead,
// with the finer factors that replace it, and fractions that still refer to it are
// brought up to date when they are next used.

import (
	"math/big"

	"remnant/expr/poly"
)

type factor struct {
	p     poly.Poly
	mono  bool        // the factor is a single generator
	v     Gen         // that generator
	split []power     // non-nil: replaced by these
	deriv cached      // D p / p
	pows  []poly.Poly // p², p³, … as needed
}

// power is a factor with its exponent.
type power struct {
	id  int32
	exp int32
}

func (f *Field) newFactor(p poly.Poly) int32 {
	id := int32(len(f.factors))
	f.factors = append(f.factors, &factor{p: p})
	f.byHash[p.Hash()] = append(f.byHash[p.Hash()], id)
	return id
}

func (f *Field) varFactor(v Gen) int32 {
	if id, ok := f.byVar[v]; ok {
		return id
	}
	id := int32(len(f.factors))
	f.factors = append(f.factors, &factor{p: poly.FromVar(v), mono: true, v: v})
	f.byVar[v] = id
	return id
}

// pow is the n-th power of factor id, n ≥ 1.
func (f *Field) pow(id int32, n int32) poly.Poly {
	fc := f.factors[id]
	if n == 1 {
		return fc.p
	}
	for int32(len(fc.pows)) < n-1 {
		last := fc.p
		if m := len(fc.pows); m > 0 {
			last = fc.pows[m-1]
		}
		fc.pows = append(fc.pows, f.ops.Mul(last, fc.p))
	}
	return fc.pows[n-2]
}

// mulPower multiplies n by a power of factor id.
func (f *Field) mulPower(n poly.Poly, id int32, exp int32) poly.Poly {
	if fc := f.factors[id]; fc.mono {
		return n.MulMono([]poly.Power{{Var: fc.v, Exp: uint32(exp)}})
	}
	return f.ops.Mul(n, f.pow(id, exp))
}

// factorise writes p ≠ 0 as content × powers of factors of the basis, which it extends and
// refines as needed. The powers are sorted by factor.
func (f *Field) factorise(p poly.Poly) (*big.Int, []power) {
	content, p := p.PrimitivePart()
	out := map[int32]int32{}
	if mono := p.MonoContent(); len(mono) > 0 {
		p, _ = p.DivMono(mono)
		for _, m := range mono {
			out[f.varFactor(m.Var)] += int32(m.Exp)
		}
	}
	p = f.divideOut(p, out)
	if !p.IsOne() {
		for _, sq := range f.ops.SquareFree(p) {
			for _, id := range f.refine(sq.Poly) {
				out[id] += int32(sq.Exp)
			}
		}
	}
	return content, f.livePowers(sortPowers(out))
}

// divideOut divides p by the known factors as often as they go, adding to out.
func (f *Field) divideOut(p poly.Poly, out map[int32]int32) poly.Poly {
	for id, fc := range f.factors {
		if p.IsOne() {
			break
		}
		if fc.mono || fc.split != nil {
			continue
		}
		var n int32
		p, n = f.divideBy(p, fc.p, -1)
		if n > 0 {
			out[int32(id)] += n
		}
	}
	return p
}

// divideBy divides p by q as often as it goes, at most limit times (-1: no limit).
func (f *Field) divideBy(p, q poly.Poly, limit int32) (poly.Poly, int32) {
	var n int32
	for n != limit && mayDivide(p, q) {
		r, ok := f.ops.DivExact(p, q)
		if !ok {
			break
		}
		p, n = r, n+1
	}
	return p, n
}

// mayDivide is false where degrees already show that q does not divide p.
func mayDivide(p, q poly.Poly) bool {
	if p.IsZero() {
		return false
	}
	for _, v := range q.Vars() {
		if p.Degree(v) < q.Degree(v) {
			return false
		}
	}
	return true
}

// refine makes the square-free polynomial s, which no factor divides, a product of
// factors of the basis and returns them.
func (f *Field) refine(s poly.Poly) []int32 {
	var ids []int32
	for id := 0; id < len(f.factors) && !s.IsOne(); id++ {
		fc := f.factors[id]
		if fc.mono || fc.split != nil || !shareVars(fc.p, s) {
			continue
		}
		g := f.ops.Gcd(fc.p, s)
		if g.IsConst() {
			continue
		}
		s = f.quotient(s, g)
		if g.Equal(fc.p) {
			ids = append(ids, int32(id))
			continue
		}
		rest := f.quotient(fc.p, g)
		a, b := f.newFactor(g), f.newFactor(rest)
		fc.split = []power{{a, 1}, {b, 1}}
		f.splits++
		ids = append(ids, a)
	}
	if !s.IsOne() {
		ids = append(ids, f.newFactor(s))
	}
	return ids
}

func (f *Field) quotient(p, q poly.Poly) poly.Poly {
	r, ok := f.ops.DivExact(p, q)
	if !ok {
		panic("field: a common divisor does not divide")
	}
	return r
}

func shareVars(p, q poly.Poly) bool {
	for _, v := range p.Vars() {
		if q.Has(v) {
			return true
		}
	}
	return false
}

// livePowers replaces dead factors by those that they were split into.
func (f *Field) livePowers(ps []power) []power {
	if f.splits == 0 {
		return ps
	}
	dead := false
	for _, p := range ps {
		dead = dead || f.factors[p.id].split != nil
	}
	if !dead {
		return ps
	}
	out := map[int32]int32{}
	for _, p := range ps {
		f.spread(p, out)
	}
	return sortPowers(out)
}

func (f *Field) spread(p power, out map[int32]int32) {
	fc := f.factors[p.id]
	if fc.split == nil {
		out[p.id] += p.exp
		return
	}
	for _, q := range fc.split {
		f.spread(power{q.id, q.exp * p.exp}, out)
	}
}
