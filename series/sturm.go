package series

// Zeros of polynomials over ℚ, exactly: Sturm chains count the real ones in an interval and
// isolate them, and a Cauchy index along a circle counts all of them in a disc. Everything is
// done with primitive integer polynomials, so that coefficients stay as small as they can.
//
// The circle |s − c| = R is the image of the real line under s = c + R(1+it)/(1−it), the
// disc that of the upper half plane. With p of degree n, (1−it)ⁿ p(s(t)) = A(t) + iB(t) has
// its zeros where p has, and the Cauchy index of B/A over the real line is
// (zeros below) − (zeros above); common factors of A and B without real zeros belong to
// pairs of zeros that mirror each other in the circle and count once inside.
// Methods: [BasuPollackRoy2006], chapter 2 and section 9.1; [Henrici1974], section 6.7.

import (
	"math/big"
	"sort"

	"remnant/expr/budget"
)

// intPoly is a polynomial over ℤ, dense and without leading zeros.
type intPoly []*big.Int

// primitive divides p by its positive content.
func (p intPoly) primitive() intPoly {
	for len(p) > 0 && p[len(p)-1].Sign() == 0 {
		p = p[:len(p)-1]
	}
	g := new(big.Int)
	for _, c := range p {
		g.GCD(nil, nil, g, new(big.Int).Abs(c))
	}
	out := make(intPoly, len(p))
	for i, c := range p {
		out[i] = new(big.Int).Quo(c, g)
	}
	return out
}

// remainder is −(p mod q) up to a positive factor, primitive. q ≠ 0.
func (p intPoly) remainder(q intPoly, b *budget.Budget) intPoly {
	r := make(intPoly, len(p))
	for i, c := range p {
		r[i] = new(big.Int).Set(c)
	}
	lead := new(big.Int).Abs(q[len(q)-1])
	sign := q[len(q)-1].Sign()
	t := new(big.Int)
	for len(r) >= len(q) {
		b.Check(len(r))
		top, at := new(big.Int).Set(r[len(r)-1]), len(r)-len(q)
		if sign < 0 {
			top.Neg(top)
		}
		for i := range r {
			r[i].Mul(r[i], lead)
		}
		for i, c := range q {
			r[i+at].Sub(r[i+at], t.Mul(top, c))
		}
		for len(r) > 0 && r[len(r)-1].Sign() == 0 {
			r = r[:len(r)-1]
		}
	}
	for i := range r {
		r[i].Neg(r[i])
	}
	return r.primitive()
}

// signAt is the sign of p at x.
func (p intPoly) signAt(x *big.Rat) int {
	// Horner for num/den: Σ cᵢ numⁱ den^(n−i) has the sign of p(x), as den > 0.
	out, scale, t := new(big.Int), big.NewInt(1), new(big.Int)
	for i := len(p) - 1; i >= 0; i-- {
		out.Mul(out, x.Num())
		out.Add(out, t.Mul(p[i], scale))
		scale.Mul(scale, x.Denom())
	}
	return out.Sign()
}

// signAtInfinity is the sign of p far right (dir > 0) or far left.
func (p intPoly) signAtInfinity(dir int) int {
	if len(p) == 0 {
		return 0
	}
	s := p[len(p)-1].Sign()
	if dir < 0 && len(p)%2 == 0 {
		s = -s
	}
	return s
}

// sturmChain is the chain of signed remainders that begins with p, q; the last one is a
// greatest common divisor.
func sturmChain(p, q intPoly, b *budget.Budget) []intPoly {
	chain := []intPoly{p}
	for len(q) > 0 {
		chain = append(chain, q)
		p, q = q, p.remainder(q, b)
	}
	return chain
}

// variations counts changes of sign along the chain, zeros left out.
func variations(chain []intPoly, sign func(intPoly) int) int {
	n, last := 0, 0
	for _, p := range chain {
		if s := sign(p); s != 0 {
			if s == -last {
				n++
			}
			last = s
		}
	}
	return n
}

func variationsAt(chain []intPoly, x *big.Rat) int {
	return variations(chain, func(p intPoly) int { return p.signAt(x) })
}

func variationsAtInfinity(chain []intPoly, dir int) int {
	return variations(chain, func(p intPoly) int { return p.signAtInfinity(dir) })
}

// RealRoot is one real zero of a polynomial.
type RealRoot struct {
	Lo, Hi       *big.Rat // the zero is Lo = Hi, or lies between and nowhere else
	Multiplicity int
}

// RealRoots isolates the real zeros of p ≠ 0, by increasing value, each in an interval that
// is not longer than width > 0, with pairwise disjoint closures except where the zero is
// known exactly. Cost: a Sturm chain of each square-free part and one evaluation of it per
// bisection.
func RealRoots(p UniPoly, width *big.Rat, b *budget.Budget) (roots []RealRoot, err error) {
	defer budget.Catch(&err)
	return realRoots(p, width, b), nil
}

func realRoots(p UniPoly, width *big.Rat, b *budget.Budget) []RealRoot {
	var out []RealRoot
	for _, f := range p.squareFree() {
		q := f.part.integral()
		chain := sturmChain(q, f.part.Deriv().integral(), b)
		bound := rootBound(q)
		for _, r := range bisect(q, chain, new(big.Rat).Neg(bound), bound, b) {
			r.Multiplicity = f.exp
			out = append(out, narrow(q, r, width, b))
		}
	}
	sort.SliceStable(out, func(i, j int) bool { return out[i].Lo.Cmp(out[j].Lo) < 0 })
	separate(p, out, b)
	return out
}

// separate narrows neighbours that belong to different square-free parts until they are apart.
func separate(p UniPoly, roots []RealRoot, b *budget.Budget) {
	parts := map[int]intPoly{}
	for _, f := range p.squareFree() {
		parts[f.exp] = f.part.integral()
	}
	half := func(r RealRoot) RealRoot {
		w := new(big.Rat).Sub(r.Hi, r.Lo)
		if w.Sign() == 0 {
			return r
		}
		return narrow(parts[r.Multiplicity], r, w.Quo(w, big.NewRat(2, 1)), b)
	}
	for done := false; !done; {
		done = true
		for i := 0; i+1 < len(roots); i++ {
			if l, r := roots[i], roots[i+1]; l.Hi.Cmp(r.Lo) >= 0 {
				roots[i], roots[i+1], done = half(l), half(r), false
			}
		}
		sort.SliceStable(roots, func(i, j int) bool { return roots[i].Lo.Cmp(roots[j].Lo) < 0 })
	}
}

// rootBound is a power of two above the absolute value of every zero [Cauchy's bound].
func rootBound(p intPoly) *big.Rat {
	top := new(big.Int)
	for _, c := range p {
		if a := new(big.Int).Abs(c); a.Cmp(top) > 0 {
			top = a
		}
	}
	k := top.BitLen() - p[len(p)-1].BitLen() + 3
	return new(big.Rat).SetInt(new(big.Int).Lsh(big.NewInt(1), uint(max(k, 1))))
}

// bisect isolates the zeros of the square-free p in (lo, hi]; p does not vanish at lo.
func bisect(p intPoly, chain []intPoly, lo, hi *big.Rat, b *budget.Budget) []RealRoot {
	type span struct {
		lo, hi   *big.Rat
		vlo, vhi int
	}
	var out []RealRoot
	todo := []span{{lo, hi, variationsAt(chain, lo), variationsAt(chain, hi)}}
	for len(todo) > 0 {
		b.Check(len(todo))
		s := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		switch n := s.vlo - s.vhi; {
		case n == 0:
			continue
		case n == 1:
			out = append(out, RealRoot{Lo: s.lo, Hi: s.hi})
			continue
		}
		mid := middle(s.lo, s.hi)
		v := variationsAt(chain, mid)
		todo = append(todo, span{mid, s.hi, v, s.vhi}, span{s.lo, mid, s.vlo, v})
	}
	return out
}

// narrow shortens the interval (Lo, Hi] around the one zero of p to at most width, and ends
// with an open interval at whose ends p does not vanish, or with the zero itself.
func narrow(p intPoly, r RealRoot, width *big.Rat, b *budget.Budget) RealRoot {
	if r.Lo.Cmp(r.Hi) == 0 {
		return r
	}
	hi := p.signAt(r.Hi)
	if hi == 0 {
		return RealRoot{r.Hi, r.Hi, r.Multiplicity}
	}
	for first := true; first || p.signAt(r.Lo) == 0 || new(big.Rat).Sub(r.Hi, r.Lo).Cmp(width) > 0; first = false {
		b.Check(0)
		mid := middle(r.Lo, r.Hi)
		switch p.signAt(mid) {
		case 0:
			return RealRoot{mid, mid, r.Multiplicity}
		case hi:
			r.Hi = mid
		default:
			r.Lo = mid
		}
	}
	return r
}

func middle(a, b *big.Rat) *big.Rat {
	m := new(big.Rat).Add(a, b)
	return m.Quo(m, big.NewRat(2, 1))
}

// countInDisc is the number of zeros of p ≠ 0 with |s − centre| < radius, by multiplicity,
// and whether one lies on the circle, in which case the number is not meant.
func countInDisc(p UniPoly, centre, radius *big.Rat, b *budget.Budget) (n int, edge bool) {
	left := new(big.Rat).Sub(centre, radius)
	if p.Eval(left).Sign() == 0 { // t = ∞
		return 0, true
	}
	re, im := onCircle(p, centre, radius)
	// Primitive multiples do: positive factors do not change signs.
	chain := sturmChain(re.integral(), im.integral(), b)
	if g := chain[len(chain)-1]; len(g) > 1 {
		own := sturmChain(g, g.rational().Deriv().integral(), b)
		if variationsAtInfinity(own, -1) != variationsAtInfinity(own, 1) {
			return 0, true
		}
	}
	// V(−∞) − V(∞) is the Cauchy index of B/A over the real line. B/A has no pole at t = ∞,
	// as A has degree n.
	index := variationsAtInfinity(chain, -1) - variationsAtInfinity(chain, 1)
	return (p.Degree() - index) / 2, false
}

// onCircle is the real and the imaginary part of (1−it)ⁿ p(c + R(1+it)/(1−it)), turned by a
// power of i so that the real part has degree n.
func onCircle(p UniPoly, centre, radius *big.Rat) (re, im UniPoly) {
	// c(1−it) + R(1+it) = (c+R) + i(R−c)t.
	u := NewUniPoly(new(big.Rat).Add(centre, radius))
	v := NewUniPoly(new(big.Rat), new(big.Rat).Sub(radius, centre))
	one, minus := IntUniPoly(1), IntUniPoly(0, -1)
	mul := func(a, b, c, d UniPoly) (UniPoly, UniPoly) {
		return a.Mul(c).Add(b.Mul(d).Scale(big.NewRat(-1, 1))), a.Mul(d).Add(b.Mul(c))
	}
	wr, wi := one, UniPoly{} // (1−it)^(n−k)
	for k := p.Degree(); k >= 0; k-- {
		re, im = mul(re, im, u, v)
		re, im = re.Add(wr.Scale(p.c[k])), im.Add(wi.Scale(p.c[k]))
		wr, wi = mul(wr, wi, one, minus)
	}
	if re.Degree() < p.Degree() {
		re, im = im.Scale(big.NewRat(-1, 1)), re
	}
	return re, im
}
