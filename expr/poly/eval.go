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
	deg := l.degrees(p.d.exps)
	num, den := make([]bigPowers, len(deg)), make([]bigPowers, len(deg))
	common := big.NewInt(1)
	for i, d := range deg {
		x := at(l.vars[i])
		num[i], den[i] = newBigPowers(x.Num()), newBigPowers(x.Denom())
		common.Mul(common, den[i].pow(d))
	}
	sum := new(big.Int)
	for k := range p.d.len() {
		e := p.d.mono(k)
		c := new(big.Int).Set(p.d.coef(k))
		for i, d := range deg {
			x := l.exp(e, i)
			c.Mul(c, num[i].pow(x))
			c.Mul(c, den[i].pow(d-x))
		}
		sum.Add(sum, c)
	}
	return new(big.Rat).SetFrac(sum, common)
}

// bigPowers gives the powers of one integer, each computed once.
type bigPowers struct {
	base *big.Int
	pows map[uint64]*big.Int
}

func newBigPowers(x *big.Int) bigPowers {
	return bigPowers{x, map[uint64]*big.Int{0: bigOne, 1: x}}
}

func (t *bigPowers) pow(e uint64) *big.Int {
	if x, ok := t.pows[e]; ok {
		return x
	}
	x := new(big.Int).Exp(t.base, new(big.Int).SetUint64(e), nil)
	t.pows[e] = x
	return x
}
