package field

// Elementary functions of background quantities: generators with their own derivative.
// Exponentials of sums are products of exponentials of single terms, and the cosine is the
// root of 1 − sin², so that the identities that join them hold by construction.

import (
	"fmt"
	"math/big"

	"remnant/expr/poly"
)

// Elementary is exp, log, sin, cos or tanh of e, or sqrt.
func (f *Field) Elementary(name string, e Elem) (Elem, error) {
	switch name {
	case "sqrt":
		return f.Sqrt(e)
	case "exp":
		return f.exp(e)
	case "log":
		if e.IsZero() {
			return Elem{}, fmt.Errorf("the logarithm of zero is not defined")
		}
		if e.IsOne() {
			return Elem{}, nil
		}
		f.assumePositive(e, "its logarithm is taken")
		return f.function("log", e), nil
	case "sin", "tanh":
		if e.IsZero() {
			return Elem{}, nil
		}
		if name == "sin" { // its derivative, so that a limit on roots is met here
			if _, err := f.cos(e); err != nil {
				return Elem{}, err
			}
		}
		if e.num.Sign() < 0 { // odd
			return f.function(name, e.Neg()).Neg(), nil
		}
		return f.function(name, e), nil
	case "cos":
		return f.cos(e)
	}
	return Elem{}, fmt.Errorf("no elementary function has the name %q", name)
}

// function is the generator name(e), made when it is first asked for.
func (f *Field) function(name string, e Elem) Elem {
	for id, g := range f.gens {
		if g.Kind == Elementary && g.Name == name && g.Arg.Equal(e) {
			return f.Raw(Gen(id))
		}
	}
	s := Unknown
	if name == "exp" {
		s = Positive
	}
	return f.Raw(f.add(generator{Info: Info{Kind: Elementary, Name: name, Arg: e, Sign: s}}))
}

func (f *Field) cos(e Elem) (Elem, error) {
	if e.IsZero() {
		return f.Int(1), nil
	}
	if e.num.Sign() < 0 { // even
		e = e.Neg()
	}
	s := f.function("sin", e)
	c, err := f.rootOf(f.Int(1).Sub(s.Mul(s)).num)
	if err != nil {
		return Elem{}, err
	}
	if g := c.num.Vars()[0]; f.gens[g].Kind == Root {
		f.gens[g].Name, f.gens[g].Angle, f.gens[g].Sign = "cos", e, Unknown
	}
	return c, nil
}

// exp is Π exp(tᵢ/qᵢ)^nᵢ over the terms nᵢtᵢ/qᵢ of e.
func (f *Field) exp(e Elem) (Elem, error) {
	out := f.Int(1)
	unit := Elem{f: f, num: poly.FromInt(1), den: denominator{pow: e.live().den.pow}}
	for mono, c := range e.num.Terms() {
		t := Elem{f: f, num: poly.FromMono(append([]poly.Power(nil), mono...))}.Mul(unit)
		q := new(big.Rat).SetFrac(c, e.DenInt())
		n, base, err := f.expBase(t, q)
		if err != nil {
			return Elem{}, err
		}
		out = out.Mul(base.Pow(n))
	}
	return out, nil
}

// expBase finds exp(c·t) with n·c = q among the generators, or makes it.
func (f *Field) expBase(t Elem, q *big.Rat) (int, Elem, error) {
	for id, g := range f.gens {
		if g.Kind != Elementary || g.Name != "exp" {
			continue
		}
		ratio, ok := g.Arg.Div(t).Rat()
		if !ok {
			continue
		}
		n := new(big.Rat).Quo(q, ratio)
		if !n.IsInt() || !n.Num().IsInt64() || n.Num().Int64() > 1<<16 || n.Num().Int64() < -1<<16 {
			return 0, Elem{}, fmt.Errorf("exp of this is not a whole power of the earlier exp(%v): use the smaller exponential first", g.Arg)
		}
		return int(n.Num().Int64()), f.Raw(Gen(id)), nil
	}
	arg, n := t.Mul(f.Rat(new(big.Rat).Abs(q))), 1
	if q.Sign() < 0 {
		n = -1
	}
	return n, f.function("exp", arg), nil
}

// elementaryDeriv is the derivative of generator g by its argument.
func (f *Field) elementaryDeriv(g Gen) Elem {
	gen, self := f.gens[g], f.Raw(g)
	switch gen.Name {
	case "exp":
		return self
	case "log":
		return gen.Arg.Inv()
	case "sin":
		c, err := f.cos(gen.Arg)
		if err != nil {
			panic(err) // the limit on roots was checked when sin was read
		}
		return c
	case "tanh":
		return f.Int(1).Sub(self.Mul(self))
	}
	panic("field: no derivative for " + gen.Name)
}
