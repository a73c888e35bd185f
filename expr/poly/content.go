// Contents: the greatest integer and the greatest monomial that divide a polynomial.

package poly

import (
	"math/big"
	"math/bits"
)

// Content is the greatest common divisor of the coefficients, not negative. The integer
// is new.
func (p Poly) Content() *big.Int {
	if p.d == nil {
		return new(big.Int)
	}
	if p.d.bg == nil {
		return new(big.Int).SetUint64(contentWord(p.d.co))
	}
	g := new(big.Int).Abs(p.d.bg[0])
	for _, c := range p.d.bg[1:] {
		if g.IsInt64() && g.Int64() == 1 {
			break
		}
		var a big.Int
		g.GCD(nil, nil, g, a.Abs(c))
	}
	return g
}

// contentWord is the content of word coefficients.
func contentWord(co []int64) uint64 {
	g := uint64(0)
	for _, c := range co {
		if g = gcdWord(g, abs(c)); g == 1 {
			break
		}
	}
	return g
}

// gcdWord is the greatest common divisor, by the binary method.
func gcdWord(a, b uint64) uint64 {
	if a == 0 || b == 0 {
		return a | b
	}
	s := bits.TrailingZeros64(a | b)
	a >>= bits.TrailingZeros64(a)
	for b != 0 {
		b >>= bits.TrailingZeros64(b)
		if a > b {
			a, b = b, a
		}
		b -= a
	}
	return a << s
}

// MonoContent is the greatest monomial that divides p, 1 for the polynomial 0.
func (p Poly) MonoContent() []Power {
	if p.d == nil {
		return nil
	}
	var m []Power
	for i, e := range p.d.lay.valuations(p.d.exps) {
		if e > 0 {
			m = append(m, Power{p.d.lay.vars[i], uint32(e)})
		}
	}
	return m
}

// PrimitivePart splits p = c·q with an integer c and q primitive with positive leading
// coefficient. For the polynomial 0 both are 0.
func (p Poly) PrimitivePart() (c *big.Int, q Poly) {
	if p.d == nil {
		return new(big.Int), p
	}
	c = p.Content()
	if p.Sign() < 0 {
		c.Neg(c)
	}
	q, _ = p.DivExactInt(c)
	return c, q
}

// primitive is the primitive part alone.
func (p Poly) primitive() Poly {
	_, q := p.PrimitivePart()
	return q
}
