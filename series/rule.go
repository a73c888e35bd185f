package series

// Entire functions given by a rule for their Taylor coefficients at 0, with a bound of their
// growth that makes every tail of the series rigorous.

import (
	"fmt"
	"math"
	"math/big"
	"sync"
)

// Growth says |Fₙ| ≤ C·Rⁿ/(n!)^(P/Q) for all n, which makes the function entire of order at
// most Q/P. For sin(√s)/√s, where Fₙ = (−1)ⁿ/(2n+1)!, it holds with C = 1, R = 1/4, P/Q = 2.
type Growth struct {
	C, R *big.Rat
	P, Q int
}

// GrowthError says that a rule breaks the bound it was given.
type GrowthError struct {
	Name string
	N    int // the first coefficient that does
	Coef *big.Rat
}

func (e *GrowthError) Error() string {
	return fmt.Sprintf("coefficient %d of %s, %s, is greater than its bound allows", e.N, e.Name, e.Coef.RatString())
}

// ruleNode is Σ Fₙ sⁿ. Coefficients are kept once computed.
type ruleNode struct {
	name string
	coef func(n int) *big.Rat
	g    Growth

	mu    sync.Mutex
	exact []*big.Rat
	bound []mag           // C·Rⁿ/(n!)^(P/Q), rounded up
	discs map[uint][]Disc // by precision
}

// Rule is the function Σ F(n) sⁿ named name. The function F must be deterministic and fast
// for small n; its values are not changed. The bound is checked against every coefficient
// that an enclosure uses (*GrowthError), and Rule fails where the bound is none: C or R negative, P or Q not positive.
func Rule(name string, coef func(n int) *big.Rat, g Growth) (Entire, error) {
	if g.C == nil || g.R == nil || g.C.Sign() < 0 || g.R.Sign() < 0 || g.P <= 0 || g.Q <= 0 {
		return Entire{}, fmt.Errorf("the growth bound of %s needs C, R ≥ 0 and P, Q > 0", name)
	}
	return Entire{newRule(name, coef, g)}, nil
}

func newRule(name string, coef func(n int) *big.Rat, g Growth) *ruleNode {
	return &ruleNode{name: name, coef: coef, g: g, discs: map[uint][]Disc{}}
}

// extend makes the first n coefficients known. The lock is held.
func (f *ruleNode) extend(n int) {
	for k := len(f.exact); k < n; k++ {
		b := magOfRat(f.g.C)
		if k > 0 {
			b = f.bound[k-1].mul(magOfRat(f.g.R)).mul(inversePower(k, f.g.P, f.g.Q))
		}
		f.exact, f.bound = append(f.exact, f.coef(k)), append(f.bound, b)
	}
}

// check panics with a *GrowthError if coefficient n is known to break the bound.
func (f *ruleNode) check(n int) {
	if f.bound[n].less(magOfRat(f.exact[n]).mul(mag{1 - 0x1p-40, 0})) {
		panic(&GrowthError{f.name, n, f.exact[n]})
	}
}

// inversePower is an upper bound of n^(−p/q), checked in exact arithmetic.
func inversePower(n, p, q int) mag {
	w := math.Pow(float64(n), -float64(p)/float64(q)) * (1 + 0x1p-45)
	for {
		// w ≥ n^(−p/q) if and only if w^q n^p ≥ 1.
		x := new(big.Rat).SetFloat64(w)
		left := new(big.Int).Exp(x.Num(), big.NewInt(int64(q)), nil)
		left.Mul(left, new(big.Int).Exp(big.NewInt(int64(n)), big.NewInt(int64(p)), nil))
		if left.Cmp(new(big.Int).Exp(x.Denom(), big.NewInt(int64(q)), nil)) >= 0 {
			return makeMag(w, 0)
		}
		w *= 1 + 0x1p-30
	}
}

// upTo is coefficients to sum for |s| ≤ r, and a bound of what all others add there: from
// where the terms of the bound at least halve, the rest is below twice its first term.
func (f *ruleNode) upTo(ev *evaluator, r mag) (coefs []Disc, rest mag) {
	f.mu.Lock()
	defer f.mu.Unlock()
	var top mag
	power := mag{0.5, 1}
	step := magOfRat(f.g.R).mul(r)
	for n := 0; ; n++ {
		ev.budget.Check(n)
		f.extend(n + 1)
		f.check(n)
		term := f.bound[n].mul(power)
		halves := step.mul(inversePower(n+1, f.g.P, f.g.Q)).less(mag{0.5, 0})
		if halves && n > 0 && !top.mul(mag{0.5, -int(ev.prec)}).less(term) {
			return f.enclosed(ev, n), term.mul(mag{0.5, 2})
		}
		top = maxMag(top, magOfRat(f.exact[n]).mul(power))
		power = power.mul(r)
		if top.isZero() && halves && term.e < -2*int(ev.prec) {
			return f.enclosed(ev, n+1), term.mul(mag{0.5, 2})
		}
	}
}

// enclosed is the first n coefficients as discs. The lock is held.
func (f *ruleNode) enclosed(ev *evaluator, n int) []Disc {
	d := f.discs[ev.prec]
	for k := len(d); k < n; k++ {
		d = append(d, ev.rat(f.exact[k]))
	}
	f.discs[ev.prec] = d
	return d[:n:n]
}

func (f *ruleNode) model(ev *evaluator, c Disc, rho mag) model {
	coefs, rest := f.upTo(ev, c.midUp().add(rho))
	return ev.polynomial(coefs, rest, c, rho)
}

func (f *ruleNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	if a.Sign() != 0 {
		return nil, false
	}
	f.mu.Lock()
	defer f.mu.Unlock()
	f.extend(n)
	out := make([]ExpSum, n)
	for j := range out {
		out[j] = RatSum(f.exact[j])
	}
	return out, true
}

// deriv has the coefficients (n+1)F(n+1), and (n+1)/((n+1)!)^k ≤ (n+1)^(1−k)/(n!)^k, where
// (n+1)^(1−k) ≤ 2ⁿ for k < 1.
func (f *ruleNode) deriv() node {
	g := f.g
	g.C = new(big.Rat).Mul(g.C, g.R)
	if g.P < g.Q {
		g.R = new(big.Rat).Mul(g.R, big.NewRat(2, 1))
	}
	coef := func(n int) *big.Rat {
		return new(big.Rat).Mul(big.NewRat(int64(n+1), 1), f.coef(n+1))
	}
	return newRule(f.name+"'", coef, g)
}

func (f *ruleNode) text(arg string) string { return f.name + "(" + arg + ")" }
