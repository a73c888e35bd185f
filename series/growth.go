package series

// Bounds of growth for hypergeometric rules, where F(n+1)/F(n) is a rational function of n:
// the bound is found, not believed.

import (
	"errors"
	"math/big"

	"remnant/expr/budget"
)

// ErrGrowth is the error of a rule for which no bound of an entire function was found.
var ErrGrowth = errors.New("the coefficients do not fall like a power of n! from the first one on")

// maxGrowthCheck is the number of coefficients that are compared one by one.
const maxGrowthCheck = 4096

// RatioGrowth is a bound for coefficients with F(0) = first and F(n+1)/F(n) = num(n)/den(n)
// for all n ≥ 0, such as 1/((2n+2)(2n+3)) for F(n) = 1/(2n+1)!. With k = deg den − deg num > 0
// it finds R with |num(n)|(n+1)ᵏ ≤ R|den(n)| for every n ≥ 0, proved by the real zeros of
// R²den² − num²(n+1)²ᵏ beyond which the sign is fixed, and one by one before. The error is
// ErrGrowth, also if den vanishes at some n ≥ 0.
func RatioGrowth(first *big.Rat, num, den UniPoly, b *budget.Budget) (g Growth, err error) {
	defer catch(&err)
	k := den.Degree() - num.Degree()
	if num.IsZero() || den.IsZero() || k <= 0 {
		return Growth{}, ErrGrowth
	}
	lhs := num
	for range k {
		lhs = lhs.Mul(IntUniPoly(1, 1))
	}
	lhs = lhs.Mul(lhs)
	r := new(big.Rat).Quo(num.c[len(num.c)-1], den.c[len(den.c)-1])
	r.Abs(r)
	for range 64 {
		if dominates(den.Mul(den).Scale(new(big.Rat).Mul(r, r)), lhs, den, b) {
			return Growth{new(big.Rat).Abs(first), r, k, 1}, nil
		}
		r.Mul(r, big.NewRat(2, 1))
	}
	return Growth{}, ErrGrowth
}

// dominates reports whether p(n) ≥ q(n) and den(n) ≠ 0 are proved for all integers n ≥ 0.
func dominates(p, q, den UniPoly, b *budget.Budget) bool {
	h := p.Add(q.Scale(big.NewRat(-1, 1)))
	last := new(big.Rat)
	for _, f := range []UniPoly{h, den} {
		if f.Degree() < 1 {
			continue
		}
		for _, root := range realRoots(f, big.NewRat(1, 2), b) {
			if root.Hi.Cmp(last) > 0 {
				last = root.Hi
			}
		}
	}
	if h.Degree() >= 0 && h.c[len(h.c)-1].Sign() < 0 || last.Cmp(big.NewRat(maxGrowthCheck, 1)) > 0 {
		return false
	}
	for n := new(big.Rat); n.Cmp(last) <= 0; n.Add(n, rat1()) {
		if h.Eval(n).Sign() < 0 || den.Eval(n).Sign() == 0 {
			return false
		}
	}
	return true
}
