// Greatest common divisors: what can be split off or decided without an algorithm, and
// the proof of what an algorithm finds.

package poly

import "math/big"

// Gcd is the greatest common divisor without limits; see Ops.Gcd.
func Gcd(p, q Poly) Poly { return Ops{}.Gcd(p, q) }

// Gcd is the greatest common divisor of p and q over ℤ, content included, with positive
// leading coefficient; Gcd(0, 0) = 0.
//
// Method: integer and monomial contents are split off, and the shorter polynomial is
// tried as a divisor of the other. Images modulo a prime in every common variable bound
// the degrees, and mostly show that nothing is left. Else the sparse modular algorithm
// ([Zippel1979], [Zippel1990]) finds the gcd and division proves it. For degrees beyond
// its reach, some thousands, there are remainder sequences ([Brown1971]), whose cost can
// be exponential in the number of variables. Cost otherwise: for each variable, its
// degree times the terms of a coefficient in the main variable, evaluations of p and q.
func (o Ops) Gcd(p, q Poly) Poly {
	if p.IsZero() {
		return q.positive()
	}
	if q.IsZero() || p.d == q.d {
		return p.positive()
	}
	cp, pp := p.PrimitivePart()
	cq, qq := q.PrimitivePart()
	c := new(big.Int).GCD(nil, nil, cp.Abs(cp), cq.Abs(cq))
	mp, mq := pp.MonoContent(), qq.MonoContent()
	pp, _ = pp.DivMono(mp)
	qq, _ = qq.DivMono(mq)
	return monomial(c, meet(mp, mq)).Mul(o.gcdPrimitive(pp, qq))
}

// positive is p or −p, with positive leading coefficient.
func (p Poly) positive() Poly {
	if p.Sign() < 0 {
		return p.Neg()
	}
	return p
}

// meet is the greatest common divisor of two monomials.
func meet(a, b []Power) []Power {
	var m []Power
	j := 0
	for _, x := range a {
		for j < len(b) && b[j].Var < x.Var {
			j++
		}
		if j < len(b) && b[j].Var == x.Var {
			m = append(m, Power{x.Var, min(x.Exp, b[j].Exp)})
		}
	}
	return m
}

// gcdPrimitive is the gcd of primitive polynomials that no monomial divides, with
// positive leading coefficients.
func (o Ops) gcdPrimitive(p, q Poly) Poly {
	switch {
	case p.IsConst() || q.IsConst():
		return one
	case p.d.len() > q.d.len():
		p, q = q, p
	}
	// That one divides the other is the commonest case, and mostly refuted at once.
	if _, ok := o.DivExact(q, p); ok {
		return p
	}
	if g, ok := o.gcdModular(p, q); ok {
		return g
	}
	return o.gcdPRS(p, q)
}

// one is the polynomial 1.
var one = FromInt(1)
