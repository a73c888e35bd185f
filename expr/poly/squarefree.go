// Square-free decomposition and square roots.

package poly

import (
	"math/big"
	"slices"
)

// Factor is a power of a polynomial.
type Factor struct {
	Poly Poly
	Exp  int
}

// SquareFree is the square-free decomposition without limits; see Ops.SquareFree.
func (p Poly) SquareFree() []Factor { return Ops{}.SquareFree(p) }

// SquareFree writes the primitive part of p as Π Polyᴱˣᵖ with increasing exponents and
// factors that are square-free, pairwise coprime, primitive, of positive leading
// coefficient and not constant. It is empty for a constant. Method: [Yun1976], one
// variable after the other.
func (o Ops) SquareFree(p Poly) []Factor {
	if p.IsConst() {
		return nil
	}
	p = p.primitive()
	byExp := map[int]Poly{}
	put := func(f Poly, e int) {
		if f.IsConst() {
			return
		}
		if g, ok := byExp[e]; ok {
			f = o.Mul(f, g)
		}
		byExp[e] = f
	}
	m := p.MonoContent()
	for _, x := range m {
		put(FromVar(x.Var), int(x.Exp))
	}
	p, _ = p.DivMono(m)
	for !p.IsConst() {
		p = o.yun(p, p.d.lay.vars[0], put)
	}
	out := make([]Factor, 0, len(byExp))
	for e, f := range byExp {
		out = append(out, Factor{f, e})
	}
	slices.SortFunc(out, func(a, b Factor) int { return cmpInt(a.Exp, b.Exp) })
	return out
}

// yun splits off the factors of p in which v occurs and returns what remains. With
// p = c·Π fᵢⁱ, c free of v, the gcd of p and ∂p is c·Π fᵢⁱ⁻¹, so that c never enters.
func (o Ops) yun(p Poly, v Var, put func(Poly, int)) Poly {
	d := p.Deriv(v)
	g := o.Gcd(p, d)
	w := o.quo(p, g)
	z := o.quo(d, g).Sub(w.Deriv(v))
	rest := p
	for i := 1; w.Has(v); i++ {
		f := o.Gcd(w, z).primitive()
		if f.Has(v) {
			put(f, i)
			for range i {
				rest = o.quo(rest, f)
			}
		}
		w, z = o.quo(w, f), o.quo(z, f)
		z = z.Sub(w.Deriv(v))
	}
	return rest.primitive()
}

// quo is p/q where q is known to divide p.
func (o Ops) quo(p, q Poly) Poly {
	r, ok := o.DivExact(p, q)
	if !ok {
		panic("poly: a divisor does not divide")
	}
	return r
}

// IsSquare is the square root with positive leading coefficient and true if p is a
// square, else 0 and false. Cost: that of SquareFree, unless the leading coefficient or
// monomial shows at once that there is no root.
func (p Poly) IsSquare() (root Poly, ok bool) {
	if p.IsZero() {
		return p, true
	}
	c, q := p.PrimitivePart()
	if c.Sign() < 0 {
		return Poly{}, false
	}
	s := new(big.Int).Sqrt(c)
	if new(big.Int).Mul(s, s).Cmp(c) != 0 {
		return Poly{}, false
	}
	lead := q.LeadCoef()
	if r := new(big.Int).Sqrt(lead); r.Mul(r, r).Cmp(lead) != 0 {
		return Poly{}, false
	}
	for i := range q.d.lay.vars {
		if q.d.lay.exp(q.d.mono(0), i)%2 != 0 {
			return Poly{}, false
		}
	}
	root = FromBig(s)
	for _, f := range q.SquareFree() {
		if f.Exp%2 != 0 {
			return Poly{}, false
		}
		root = root.Mul(f.Poly.Pow(f.Exp / 2))
	}
	return root, true
}
