package series

// Exact values of entire functions: sums Σ cᵢ exp(qᵢ) with rational c and distinct rational
// q. By the theorem of Lindemann and Weierstrass such a sum is zero only if every cᵢ is, so
// equality is decided by comparing terms. [Baker1975], theorem 1.4

import (
	"math/big"
	"strings"
)

// ExpSum is Σ Coef·exp(Exp), the exponents increasing. It is immutable; the zero value is 0.
type ExpSum struct{ terms []ExpTerm }

// ExpTerm is Coef·exp(Exp), Coef ≠ 0.
type ExpTerm struct{ Exp, Coef *big.Rat }

// RatSum is the rational number x.
func RatSum(x *big.Rat) ExpSum { return expPower(new(big.Rat), x) }

// expPower is c·exp(q).
func expPower(q, c *big.Rat) ExpSum {
	if c.Sign() == 0 {
		return ExpSum{}
	}
	return ExpSum{[]ExpTerm{{new(big.Rat).Set(q), new(big.Rat).Set(c)}}}
}

// Terms lists the terms; they must not be changed.
func (x ExpSum) Terms() []ExpTerm { return x.terms }

// IsZero reports whether x = 0; exactly.
func (x ExpSum) IsZero() bool { return len(x.terms) == 0 }

// Rat is x as a rational number, if it is one.
func (x ExpSum) Rat() (*big.Rat, bool) {
	switch {
	case len(x.terms) == 0:
		return new(big.Rat), true
	case len(x.terms) == 1 && x.terms[0].Exp.Sign() == 0:
		return new(big.Rat).Set(x.terms[0].Coef), true
	}
	return nil, false
}

// Add is x + y.
func (x ExpSum) Add(y ExpSum) ExpSum {
	var out []ExpTerm
	for i, j := 0, 0; i < len(x.terms) || j < len(y.terms); {
		order := 0
		switch {
		case i == len(x.terms):
			order = 1
		case j == len(y.terms):
			order = -1
		default:
			order = x.terms[i].Exp.Cmp(y.terms[j].Exp)
		}
		switch {
		case order < 0:
			out, i = append(out, x.terms[i]), i+1
		case order > 0:
			out, j = append(out, y.terms[j]), j+1
		default:
			c := new(big.Rat).Add(x.terms[i].Coef, y.terms[j].Coef)
			if c.Sign() != 0 {
				out = append(out, ExpTerm{x.terms[i].Exp, c})
			}
			i, j = i+1, j+1
		}
	}
	return ExpSum{out}
}

// Scale is k·x.
func (x ExpSum) Scale(k *big.Rat) ExpSum {
	if k.Sign() == 0 {
		return ExpSum{}
	}
	out := make([]ExpTerm, len(x.terms))
	for i, t := range x.terms {
		out[i] = ExpTerm{t.Exp, new(big.Rat).Mul(t.Coef, k)}
	}
	return ExpSum{out}
}

// Mul is x·y.
func (x ExpSum) Mul(y ExpSum) ExpSum {
	var out ExpSum
	for _, a := range x.terms {
		part := make([]ExpTerm, len(y.terms))
		for i, b := range y.terms {
			part[i] = ExpTerm{new(big.Rat).Add(a.Exp, b.Exp), new(big.Rat).Mul(a.Coef, b.Coef)}
		}
		out = out.Add(ExpSum{part})
	}
	return out
}

// Enclose is a disc around x.
func (x ExpSum) Enclose(a Arith) Disc {
	var out Disc
	for _, t := range x.terms {
		e := a.Exp(a.Rat(t.Exp, new(big.Rat)))
		out = a.Add(out, a.Mul(a.Rat(t.Coef, new(big.Rat)), e))
	}
	return out
}

// String writes x in the notation that the parser reads.
func (x ExpSum) String() string {
	if x.IsZero() {
		return "0"
	}
	var b strings.Builder
	for _, t := range x.terms {
		c := t.Coef.RatString()
		if b.Len() > 0 && !strings.HasPrefix(c, "-") {
			b.WriteString("+")
		}
		b.WriteString(c)
		if t.Exp.Sign() != 0 {
			b.WriteString("*exp(" + t.Exp.RatString() + ")")
		}
	}
	return b.String()
}
