// Values at a point, modulo a prime and in ℚ.

package poly

import "math/big"

// EvalMod is the value at the point at modulo m. The function is called once for each
// variable of p and returns residues. Cost: one product for each power in each term.
func (p Poly) EvalMod(m Modulus, at func(Var) uint64) uint64 {
	if p.d == nil {
		return 0
	}
	l := p.d.lay
	powers := make([]powerTable, len(l.vars))
	for i, d := range l.degrees(p.d.exps) {
		powers[i] = newPowerTable(m, at(l.vars[i]), d, p.d.len())
	}
	sum := uint64(0)
	for k := range p.d.len() {
		e := p.d.mono(k)
		var c uint64
		if p.d.bg == nil {
			c = m.FromInt(p.d.co[k])
		} else {
			c = m.FromBig(p.d.bg[k])
		}
		for i := range powers {
			if x := l.exp(e, i); x != 0 {
				c = m.Mul(c, powers[i].pow(x))
			}
		}
		sum = m.Add(sum, c)
	}
	return sum
}

// powerTable gives the powers of one residue.
type powerTable struct {
	m    Modulus
	base uint64
	pows []uint64 // by exponent, or nil where a table would not pay
}

// newPowerTable makes a table for exponents up to d, to be used about n times.
func newPowerTable(m Modulus, base, d uint64, n int) powerTable {
	t := powerTable{m: m, base: base}
	if d > 16+4*uint64(n) {
		return t
	}
	t.pows = make([]uint64, d+1)
	t.pows[0] = 1
	for i := range d {
		t.pows[i+1] = m.Mul(t.pows[i], base)
	}
	return t
}

func (t *powerTable) pow(e uint64) uint64 {
	if t.pows != nil {
		return t.pows[e]
	}
	return t.m.Pow(t.base, e)
}

// EvalRat is the value at the point at. The function is called once for each variable
// of p. The sum is formed over the common denominator Π denᵈ, d the degree.
func (p Poly) EvalRat(at func(Var) *big.Rat) *big.Rat {
	if p.d == nil {
		return new(big.Rat)
	}
	l := p.d.lay
	num, den := make([][]*big.Int, len(l.vars)), make([][]*big.Int, len(l.vars))
	common := big.NewInt(1)
	for i, d := range l.degrees(p.d.exps) {
		x := at(l.vars[i])
		num[i], den[i] = bigPowers(x.Num(), d), bigPowers(x.Denom(), d)
		common.Mul(common, den[i][d])
	}
	sum := new(big.Int)
	for k := range p.d.len() {
		e := p.d.mono(k)
		c := new(big.Int).Set(p.d.coef(k))
		for i := range num {
			x := l.exp(e, i)
			c.Mul(c, num[i][x])
			c.Mul(c, den[i][uint64(len(den[i]))-1-x])
		}
		sum.Add(sum, c)
	}
	return new(big.Rat).SetFrac(sum, common)
}

// bigPowers is 1, x, …, xᵈ.
func bigPowers(x *big.Int, d uint64) []*big.Int {
	out := make([]*big.Int, d+1)
	out[0] = bigOne
	for i := range d {
		out[i+1] = new(big.Int).Mul(out[i], x)
	}
	return out
}
