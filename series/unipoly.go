package series

// Polynomials of one variable s over ℚ, dense: coefficient i belongs to sⁱ, the last one is
// not zero, and no coefficients are the polynomial 0. Form factors have few and low powers,
// so nothing is gained by a sparse form.

import (
	"fmt"
	"math/big"
	"strings"

	"remnant/expr/poly"
)

// UniPoly is a polynomial in s over ℚ. It is immutable; the zero value is 0.
type UniPoly struct{ c []*big.Rat }

// NewUniPoly is Σ c[i] sⁱ.
func NewUniPoly(c ...*big.Rat) UniPoly {
	out := make([]*big.Rat, len(c))
	for i, x := range c {
		out[i] = new(big.Rat).Set(x)
	}
	return trim(out)
}

// IntUniPoly is Σ c[i] sⁱ with integer coefficients.
func IntUniPoly(c ...int64) UniPoly {
	out := make([]*big.Rat, len(c))
	for i, x := range c {
		out[i] = new(big.Rat).SetInt64(x)
	}
	return trim(out)
}

// trim takes ownership of c.
func trim(c []*big.Rat) UniPoly {
	for len(c) > 0 && c[len(c)-1].Sign() == 0 {
		c = c[:len(c)-1]
	}
	return UniPoly{c}
}

// Degree is the degree, −1 for 0.
func (p UniPoly) Degree() int { return len(p.c) - 1 }

// IsZero reports whether p = 0.
func (p UniPoly) IsZero() bool { return len(p.c) == 0 }

// Coef is a copy of the coefficient of sⁿ.
func (p UniPoly) Coef(n int) *big.Rat {
	if n < 0 || n >= len(p.c) {
		return new(big.Rat)
	}
	return new(big.Rat).Set(p.c[n])
}

// Equal reports whether p = q.
func (p UniPoly) Equal(q UniPoly) bool {
	if len(p.c) != len(q.c) {
		return false
	}
	for i := range p.c {
		if p.c[i].Cmp(q.c[i]) != 0 {
			return false
		}
	}
	return true
}

// Add is p + q.
func (p UniPoly) Add(q UniPoly) UniPoly {
	out := make([]*big.Rat, max(len(p.c), len(q.c)))
	for i := range out {
		out[i] = p.Coef(i)
		if i < len(q.c) {
			out[i].Add(out[i], q.c[i])
		}
	}
	return trim(out)
}

// Scale is k·p.
func (p UniPoly) Scale(k *big.Rat) UniPoly {
	out := make([]*big.Rat, len(p.c))
	for i, c := range p.c {
		out[i] = new(big.Rat).Mul(c, k)
	}
	return trim(out)
}

// Mul is p·q.
func (p UniPoly) Mul(q UniPoly) UniPoly {
	if p.IsZero() || q.IsZero() {
		return UniPoly{}
	}
	out := make([]*big.Rat, len(p.c)+len(q.c)-1)
	for i := range out {
		out[i] = new(big.Rat)
	}
	t := new(big.Rat)
	for i, a := range p.c {
		for j, b := range q.c {
			out[i+j].Add(out[i+j], t.Mul(a, b))
		}
	}
	return trim(out)
}

// Deriv is dp/ds.
func (p UniPoly) Deriv() UniPoly {
	var out []*big.Rat
	for i := 1; i < len(p.c); i++ {
		out = append(out, new(big.Rat).Mul(p.c[i], new(big.Rat).SetInt64(int64(i))))
	}
	return trim(out)
}

// Compose is p(q(s)).
func (p UniPoly) Compose(q UniPoly) UniPoly {
	var out UniPoly
	for i := len(p.c) - 1; i >= 0; i-- {
		out = out.Mul(q).Add(NewUniPoly(p.c[i]))
	}
	return out
}

// Eval is p(x).
func (p UniPoly) Eval(x *big.Rat) *big.Rat {
	out := new(big.Rat)
	for i := len(p.c) - 1; i >= 0; i-- {
		out.Add(out.Mul(out, x), p.c[i])
	}
	return out
}

// divideByS is p/s and whether s divides p.
func (p UniPoly) divideByS() (UniPoly, bool) {
	if p.IsZero() {
		return p, true
	}
	if p.c[0].Sign() != 0 {
		return UniPoly{}, false
	}
	return UniPoly{p.c[1:]}, true
}

// shift is p(s + a).
func (p UniPoly) shift(a *big.Rat) UniPoly {
	return p.Compose(NewUniPoly(a, big.NewRat(1, 1)))
}

// integral is the primitive integer multiple of p, with the sign of p.
func (p UniPoly) integral() intPoly {
	den := big.NewInt(1)
	for _, c := range p.c {
		g := new(big.Int).GCD(nil, nil, den, c.Denom())
		den.Mul(den, new(big.Int).Quo(c.Denom(), g))
	}
	out := make(intPoly, len(p.c))
	for i, c := range p.c {
		out[i] = new(big.Int).Mul(c.Num(), new(big.Int).Quo(den, c.Denom()))
	}
	return out.primitive()
}

// squareFree is the decomposition p = const·Π Part^Exp into coprime square-free parts, by
// increasing exponent. [Yun1976]
func (p UniPoly) squareFree() []uniFactor {
	terms := make([]poly.Term, 0, len(p.c))
	for i, c := range p.integral() {
		t := poly.Term{Coef: c}
		if i > 0 {
			t.Mono = []poly.Power{{Var: 0, Exp: uint32(i)}}
		}
		terms = append(terms, t)
	}
	var out []uniFactor
	for _, f := range poly.FromTerms(terms).SquareFree() {
		var c []*big.Rat
		for _, k := range f.Poly.CoeffsIn(0) {
			v, _ := k.Const()
			c = append(c, new(big.Rat).SetInt(v))
		}
		if part := trim(c); part.Degree() > 0 {
			out = append(out, uniFactor{part, int(f.Exp)})
		}
	}
	return out
}

type uniFactor struct {
	part UniPoly
	exp  int
}

// String writes p by decreasing powers of s, in the notation that the parser reads.
func (p UniPoly) String() string {
	var b strings.Builder
	for i := len(p.c) - 1; i >= 0; i-- {
		c := p.c[i]
		if c.Sign() == 0 {
			continue
		}
		switch {
		case c.Sign() < 0:
			b.WriteString("-")
		case b.Len() > 0:
			b.WriteString("+")
		}
		b.WriteString(uniTerm(new(big.Rat).Abs(c), i))
	}
	if b.Len() == 0 {
		return "0"
	}
	return b.String()
}

func uniTerm(c *big.Rat, power int) string {
	one := c.Cmp(big.NewRat(1, 1)) == 0
	s := "s"
	if power > 1 {
		s = fmt.Sprintf("s^%d", power)
	}
	switch {
	case power == 0:
		return c.RatString()
	case one:
		return s
	default:
		return c.RatString() + "*" + s
	}
}
