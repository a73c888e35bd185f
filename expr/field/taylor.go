package field

// Taylor series in time along a random background, modulo a prime.
//
// Every jet that no relation fixes gets a random value at τ = 0; all other derivatives follow
// from the relations and the chain rule. The truncated series of an element is then computed
// with series arithmetic alone: D is never applied to an expression, so that this is a route
// independent of the symbolic derivation, and one that does not swell. A coefficient that is
// not zero is a proof that the element is not; zeros are certain up to a probability of
// order (degree/prime).

import (
	"errors"
	"math/big"
	"math/rand/v2"

	"remnant/expr/poly"
)

// ErrUnlucky says that a random background hits a pole or a radicand without a root modulo
// the prime; another one should be tried.
var ErrUnlucky = errors.New("field: the random background is singular")

// Background is a random background modulo a prime. It is for one goroutine.
type Background struct {
	f    *Field
	m    poly.Modulus
	rnd  *rand.Rand
	at   map[Gen]uint64   // random values at τ = 0
	memo map[Gen][]uint64 // Taylor coefficients c₀, c₁, … found so far
}

// RandomBackground draws a background from the given seed; the same seed gives the same one.
func (f *Field) RandomBackground(m poly.Modulus, seed uint64) *Background {
	return &Background{f: f, m: m, rnd: rand.New(rand.NewPCG(seed, 0x9e3779b97f4a7c15)),
		at: map[Gen]uint64{}, memo: map[Gen][]uint64{}}
}

// Modulus is the prime that the background is taken modulo.
func (b *Background) Modulus() poly.Modulus { return b.m }

// Taylor gives the coefficients c₀ … cₙ of e = Σ cⱼ τʲ along the background. It fails with
// ErrUnlucky where e has no such series there.
func (b *Background) Taylor(e Elem, n int) (c []uint64, err error) {
	defer func() {
		if r := recover(); r != nil {
			if r != any(ErrUnlucky) {
				panic(r)
			}
			c, err = nil, ErrUnlucky
		}
	}()
	return b.elem(e, n), nil
}

func (b *Background) elem(e Elem, n int) []uint64 {
	if e.IsZero() {
		return make([]uint64, n+1)
	}
	out := b.poly(e.num, n)
	den := b.constant(e.DenInt(), n)
	for _, p := range e.den.pow {
		q := b.poly(b.f.factors[p.id].p, n)
		for range p.exp {
			den = b.mul(den, q)
		}
	}
	return b.mul(out, b.inv(den))
}

func (b *Background) constant(c *big.Int, n int) []uint64 {
	out := make([]uint64, n+1)
	out[0] = new(big.Int).Mod(c, new(big.Int).SetUint64(uint64(b.m))).Uint64()
	return out
}

func (b *Background) poly(p poly.Poly, n int) []uint64 {
	sum := make([]uint64, n+1)
	for mono, c := range p.Terms() {
		term := b.constant(c, n)
		for _, v := range mono {
			term = b.mul(term, b.pow(b.gen(v.Var, n), int(v.Exp)))
		}
		for i := range sum {
			sum[i] = b.m.Add(sum[i], term[i])
		}
	}
	return sum
}

// gen gives the series of one generator to order n.
func (b *Background) gen(g Gen, n int) []uint64 {
	if c := b.memo[g]; len(c) > n {
		return c[:n+1]
	}
	c := b.compute(g, n)
	b.memo[g] = c
	return c
}

func (b *Background) compute(g Gen, n int) []uint64 {
	gen := b.f.gens[g]
	if gen.rule != nil {
		return b.elem(gen.rule.value, n)
	}
	switch gen.Kind {
	case Function:
		if b.f.hasLowerRule(g) {
			low := b.gen(b.f.JetGen(g, gen.Order-1), n+1)
			return b.derive(low)
		}
		if n == 0 {
			return []uint64{b.random(g)}
		}
		return b.integrate(b.random(g), b.gen(b.f.JetGen(g, gen.Order+1), n-1))
	case FreeFunction:
		return b.freeJet(g, n)
	case Root:
		return b.sqrt(g, n)
	case Elementary:
		return b.elementary(g, n)
	}
	out := make([]uint64, n+1)
	out[0] = b.random(g)
	return out
}

func (b *Background) random(g Gen) uint64 {
	v, ok := b.at[g]
	if !ok {
		v = 2 + b.rnd.Uint64N(uint64(b.m)-2)
		b.at[g] = v
	}
	return v
}

// freeJet follows f_J′ = Σ f_{J+i} argᵢ′, solved for the jet along the chain where f_J is
// fixed by a relation.
func (b *Background) freeJet(g Gen, n int) []uint64 {
	f := b.f
	gen := f.gens[g]
	if low, i, ok := f.lowerJet(g); ok && f.fixed(low) {
		lower := f.gens[low].Index
		rest := b.derive(b.gen(low, n+1))
		for j, arg := range gen.Fn.Args {
			if j != i && varies(arg) {
				rest = b.sub(rest, b.mul(b.gen(f.FuncJetGen(gen.Fn, bump(lower, j)), n), b.rate(arg, n)))
			}
		}
		return b.mul(rest, b.inv(b.rate(gen.Fn.Args[i], n)))
	}
	if n == 0 {
		return []uint64{b.random(g)}
	}
	rate := make([]uint64, n)
	for j, arg := range gen.Fn.Args {
		if varies(arg) { // else its jet may hang on g itself
			rate = b.add(rate, b.mul(b.gen(f.FuncJetGen(gen.Fn, bump(gen.Index, j)), n-1), b.rate(arg, n-1)))
		}
	}
	return b.integrate(b.random(g), rate)
}

// rate is the series of D arg to order n.
func (b *Background) rate(arg Elem, n int) []uint64 { return b.derive(b.elem(arg, n+1)) }

func (b *Background) elementary(g Gen, n int) []uint64 {
	if n == 0 {
		return []uint64{b.random(g)}
	}
	arg := b.f.gens[g].Arg
	self := b.gen(g, n-1)
	slope := b.elem(b.f.elementaryDeriv(g), n-1)
	if b.f.gens[g].Name == "exp" {
		slope = self
	}
	return b.integrate(b.random(g), b.mul(slope, b.rate(arg, n-1)))
}

// sqrt is the root of a series whose constant term is a square modulo the prime.
func (b *Background) sqrt(g Gen, n int) []uint64 {
	r := b.elem(b.f.gens[g].Arg, n)
	m := b.m
	s0, ok := b.sqrtMod(r[0])
	if !ok || s0 == 0 {
		panic(ErrUnlucky)
	}
	out := make([]uint64, n+1)
	out[0] = s0
	half := m.Inv(m.Add(s0, s0))
	for i := 1; i <= n; i++ {
		v := r[i]
		for j := 1; j < i; j++ {
			v = m.Sub(v, m.Mul(out[j], out[i-j]))
		}
		out[i] = m.Mul(v, half)
	}
	return out
}

func (b *Background) sqrtMod(x uint64) (uint64, bool) {
	p := new(big.Int).SetUint64(uint64(b.m))
	s := new(big.Int).ModSqrt(new(big.Int).SetUint64(x), p)
	if s == nil {
		return 0, false
	}
	return s.Uint64(), true
}

func (b *Background) add(x, y []uint64) []uint64 {
	out := make([]uint64, len(x))
	for i := range x {
		out[i] = b.m.Add(x[i], y[i])
	}
	return out
}

func (b *Background) sub(x, y []uint64) []uint64 {
	out := make([]uint64, len(x))
	for i := range x {
		out[i] = b.m.Sub(x[i], y[i])
	}
	return out
}

func (b *Background) mul(x, y []uint64) []uint64 {
	out := make([]uint64, len(x))
	for i, u := range x {
		if u == 0 {
			continue
		}
		for j := 0; i+j < len(x); j++ {
			out[i+j] = b.m.Add(out[i+j], b.m.Mul(u, y[j]))
		}
	}
	return out
}

func (b *Background) pow(x []uint64, n int) []uint64 {
	out := make([]uint64, len(x))
	out[0] = 1
	for ; n > 0; n >>= 1 {
		if n&1 == 1 {
			out = b.mul(out, x)
		}
		if n > 1 {
			x = b.mul(x, x)
		}
	}
	return out
}

func (b *Background) inv(x []uint64) []uint64 {
	if x[0] == 0 {
		panic(ErrUnlucky)
	}
	m := b.m
	out := make([]uint64, len(x))
	out[0] = m.Inv(x[0])
	for i := 1; i < len(x); i++ {
		var v uint64
		for j := 1; j <= i; j++ {
			v = m.Add(v, m.Mul(x[j], out[i-j]))
		}
		out[i] = m.Mul(m.Sub(0, v), out[0])
	}
	return out
}

// derive loses one order, integrate wins one.
func (b *Background) derive(x []uint64) []uint64 {
	out := make([]uint64, len(x)-1)
	for i := range out {
		out[i] = b.m.Mul(uint64(i+1), x[i+1])
	}
	return out
}

func (b *Background) integrate(c0 uint64, x []uint64) []uint64 {
	out := make([]uint64, len(x)+1)
	out[0] = c0
	for i, v := range x {
		out[i+1] = b.m.Mul(v, b.m.Inv(uint64(i+1)))
	}
	return out
}
