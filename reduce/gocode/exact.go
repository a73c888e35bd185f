package gocode

// Expectations: exact values of elements at rational points, and how far float64 code may be
// from them.
//
// Points are dyadic rationals, so that float64 holds them exactly and every difference is
// the generated code's own rounding. A value without functions is a rational number; roots
// and elementary functions are computed to 600 bits. The tolerance follows the standard
// model of rounding [Higham2002]: a term that meets n roundings is off by at most n·2⁻⁵³ of
// itself, so that a polynomial is off by n·2⁻⁵³ Σ|terms|, and relatively by n·2⁻⁵³ times its
// condition Σ|terms|/|value|; exponents and quotients add up.

import (
	"fmt"
	"math"
	"math/big"
	"math/rand/v2"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// precision is that of values with functions, in bits.
const precision = 600

// point gives the generators that are no functions of others their values.
type point struct {
	f      *field.Field
	at     map[field.Gen]*big.Rat
	values map[field.Gen]inexact
	s      *sharer // counts roundings
}

// inexact is a generator's value, and the relative error of its float64 code in units of
// 2⁻⁵³.
type inexact struct {
	v   *big.Float
	err float64
}

// unfit says why a point cannot serve.
type unfit struct{ why string }

func (u unfit) Error() string { return "gocode: " + u.why }

// drawPoint draws values for the generators: n/64 with 1 ≤ n ≤ 192, of the sign that is
// declared, else of either.
func drawPoint(f *field.Field, gens []field.Gen, s *sharer, rnd *rand.Rand) *point {
	p := &point{f: f, at: map[field.Gen]*big.Rat{}, values: map[field.Gen]inexact{}, s: s}
	for _, g := range gens {
		n := int64(1 + rnd.IntN(192))
		sign := f.Info(g).Sign
		if sign == field.Negative || sign == field.Unknown && rnd.IntN(3) == 0 {
			n = -n
		}
		p.at[g] = big.NewRat(n, 64)
	}
	return p
}

// expectation is a value and the relative tolerance for the code that computes it.
type expectation struct {
	exact *big.Rat   // nil if functions stand in the value
	value *big.Float // to many digits
	tol   float64
}

// maxTolerance is the worst tolerance of a point that still tests something.
const maxTolerance = 1e-9

// expect evaluates e at the point. It fails with unfit where e is not defined, vanishes or
// is ill-conditioned there.
func (p *point) expect(e field.Elem) (x expectation, err error) {
	if e.IsZero() {
		return expectation{exact: new(big.Rat), value: newFloat()}, nil
	}
	v, units, err := p.elem(e)
	if err != nil {
		return x, err
	}
	x.value, x.tol = v, 2*units*0x1p-53
	if !(x.tol <= maxTolerance) {
		return x, unfit{"ill-conditioned"}
	}
	if !p.holdsFunctions(e) {
		x.exact = p.rational(e)
	}
	return x, nil
}

func newFloat() *big.Float { return new(big.Float).SetPrec(precision) }

func (p *point) holdsFunctions(e field.Elem) bool {
	for _, g := range e.Gens() {
		if _, free := p.at[g]; !free {
			return true
		}
	}
	return false
}

// rational is e at the point, exactly.
func (p *point) rational(e field.Elem) *big.Rat {
	out, factors := e.Factors()
	for _, fp := range factors {
		v := fp.P.EvalRat(func(g poly.Var) *big.Rat { return p.at[g] })
		if fp.Exp < 0 {
			v = new(big.Rat).Inv(v)
		}
		for range max(fp.Exp, -fp.Exp) {
			out.Mul(out, v)
		}
	}
	return out
}

// elem is e at the point and a bound on the relative error of its code, in units of 2⁻⁵³.
func (p *point) elem(e field.Elem) (*big.Float, float64, error) {
	if e.IsZero() {
		return newFloat(), 0, nil
	}
	r, factors := e.Factors()
	out := newFloat().SetRat(r)
	units := 3.0 // number, product and quotient
	for _, fp := range factors {
		v, u, err := p.poly(fp.P)
		if err != nil {
			return nil, 0, err
		}
		n := max(fp.Exp, -fp.Exp)
		units += float64(n) * (u + 1)
		for range n {
			if fp.Exp > 0 {
				out.Mul(out, v)
			} else {
				out.Quo(out, v)
			}
		}
	}
	return out, units, nil
}

// poly is a factor at the point and its error bound.
func (p *point) poly(q poly.Poly) (*big.Float, float64, error) {
	sum, size, worst := newFloat(), newFloat(), 0.0
	for mono, c := range q.Terms() {
		term, err := newFloat().SetInt(c), 0.0
		for _, m := range mono {
			x, why := p.generator(m.Var)
			if why != nil {
				return nil, 0, why
			}
			for range m.Exp {
				term.Mul(term, x.v)
			}
			err += float64(m.Exp) * x.err
		}
		sum.Add(sum, term)
		size.Add(size, newFloat().Abs(term))
		worst = max(worst, err)
	}
	if sum.Sign() == 0 {
		return nil, 0, unfit{"a factor vanishes"}
	}
	condition, _ := newFloat().Quo(size, newFloat().Abs(sum)).Float64()
	roundings := float64(p.s.roundings[p.s.signedPoly(q).id])
	return sum, condition * (roundings + worst), nil
}

// generator is the value of a generator, of a function by its argument.
func (p *point) generator(g field.Gen) (inexact, error) {
	if x, ok := p.values[g]; ok {
		return x, nil
	}
	x, err := p.newValue(g)
	if err == nil {
		p.values[g] = x
	}
	return x, err
}

// maxArgument bounds the arguments of functions at a point.
const maxArgument = 30

func (p *point) newValue(g field.Gen) (inexact, error) {
	if r, free := p.at[g]; free {
		return inexact{newFloat().SetRat(r), 0}, nil
	}
	in := p.f.Info(g)
	if isPi(in) {
		return inexact{pi(), 1}, nil
	}
	arg := in.Arg
	if in.Name == "cos" {
		arg = in.Angle
	}
	x, units, err := p.elem(arg)
	if err != nil {
		return inexact{}, err
	}
	approx, _ := x.Float64()
	if math.Abs(approx) > maxArgument && in.Name != "sqrt" && in.Name != "log" {
		return inexact{}, unfit{"the argument of a function is large"}
	}
	if x.Sign() <= 0 && (in.Name == "sqrt" || in.Name == "log") {
		return inexact{}, unfit{"a root or logarithm is not real"}
	}
	v, gain := function(in.Name, x, approx)
	return inexact{v, gain*units + 4}, nil
}

// function is the value of an elementary function and by what factor it passes on relative
// errors of its argument.
func function(name string, x *big.Float, approx float64) (v *big.Float, gain float64) {
	switch name {
	case "sqrt":
		return newFloat().Sqrt(x), 0.5
	case "exp":
		return exp(x), math.Abs(approx)
	case "log":
		return log(x, approx), 1 / math.Abs(math.Log(approx))
	case "sin":
		return sin(x), math.Abs(approx / math.Tan(approx))
	case "cos":
		return cos(x), math.Abs(approx * math.Tan(approx))
	case "tanh":
		return tanh(x), 1
	}
	panic(fmt.Sprintf("gocode: no function %q", name))
}

// series is Σ terms of first·Π ratio(n)·y, n ≥ 1, until they vanish at the precision.
func series(first, y *big.Float, divisor func(n int64) int64) *big.Float {
	sum, term := newFloat().Set(first), newFloat().Set(first)
	for n := int64(1); term.Sign() != 0 && term.MantExp(nil) > -precision-64; n++ {
		term.Mul(term, y)
		term.Quo(term, newFloat().SetInt64(divisor(n)))
		sum.Add(sum, term)
	}
	return sum
}

func exp(x *big.Float) *big.Float {
	const halvings = 16
	y := newFloat().SetMantExp(x, -halvings)
	v := series(newFloat().SetInt64(1), y, func(n int64) int64 { return n })
	for range halvings {
		v.Mul(v, v)
	}
	return v
}

// log is the solution of exp(y) = x by Halley's method, which trebles the digits.
func log(x *big.Float, approx float64) *big.Float {
	y := newFloat().SetFloat64(math.Log(approx))
	for bits := 40; bits < precision; bits *= 3 {
		e := exp(y)
		diff := newFloat().Sub(x, e)
		diff.Quo(diff, newFloat().Add(x, e))
		y.Add(y, diff.SetMantExp(diff, 1))
	}
	return y
}

func sin(x *big.Float) *big.Float {
	y := newFloat().Mul(x, x)
	return series(x, y.Neg(y), func(n int64) int64 { return 2 * n * (2*n + 1) })
}

func cos(x *big.Float) *big.Float {
	y := newFloat().Mul(x, x)
	return series(newFloat().SetInt64(1), y.Neg(y), func(n int64) int64 { return 2 * n * (2*n - 1) })
}

func tanh(x *big.Float) *big.Float {
	e := exp(newFloat().SetMantExp(x, 1))
	one := newFloat().SetInt64(1)
	return newFloat().Quo(newFloat().Sub(e, one), newFloat().Add(e, one))
}

// pi is Machin's 16 arctan 1/5 − 4 arctan 1/239.
func pi() *big.Float {
	arctan := func(inv int64) *big.Float {
		sum, pow := newFloat(), newFloat().Quo(newFloat().SetInt64(1), newFloat().SetInt64(inv))
		sq := newFloat().SetInt64(-inv * inv)
		for n := int64(1); pow.MantExp(nil) > -precision-64; n += 2 {
			sum.Add(sum, newFloat().Quo(pow, newFloat().SetInt64(n)))
			pow.Quo(pow, sq)
		}
		return sum
	}
	a, b := arctan(5), arctan(239)
	a.Mul(a, newFloat().SetInt64(16))
	return a.Sub(a, b.Mul(b, newFloat().SetInt64(4)))
}
