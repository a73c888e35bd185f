package reduce

// Derivatives of a function with a definition, for numbers. The algebra keeps V and V,φ; a
// definition is known on the background only, as f(x) with the arguments Aᵢ of the function
// put in. An argument that is a generator is differentiated by as it stands. Any other, such
// as X = φ′²/(2N̄²), needs a generator p of its own, here φ′; then f_X = (∂f/∂p)/(∂X/∂p), and the
// derivative by a plain argument g at fixed X is ∂f/∂g − f_X ∂X/∂g. Arguments N and K of an adm
// model have constants that stand in for them until all derivatives are taken.

import (
	"fmt"
	"slices"

	"remnant/expr/field"
	"remnant/expr/poly"
	"remnant/parse"
)

// defined gives the jet g of a free function by the definition of that function; false if g
// is no such jet or has no definition.
func (p *point) defined(g field.Gen) (v field.Elem, ok bool, err error) {
	in := p.k.Info(g)
	if in.Kind != field.FreeFunction {
		return v, false, nil
	}
	for _, d := range p.r.Model.Functions {
		if d.Fn != in.Fn || d.Definition == nil {
			continue
		}
		v = d.Formal
		for i, n := range in.Index {
			for range n {
				if v, err = byArgument(p.k, d, v, i); err != nil {
					return v, false, err
				}
			}
		}
		v, err = d.OnBackground(v)
		return v, err == nil, err
	}
	return v, false, nil
}

// byArgument is the derivative of e, a function of the arguments of d, by the i-th.
func byArgument(k *field.Field, d parse.FunctionDecl, e field.Elem, i int) (field.Elem, error) {
	own, plain, err := ownGenerator(k, d, i)
	if err != nil {
		return field.Elem{}, err
	}
	out := partial(k, e, own)
	if !plain {
		return out.Div(partial(k, d.Fn.Args[i], own)), nil
	}
	for j, arg := range d.Fn.Args {
		along := partial(k, arg, own)
		if _, standsIn := d.StandIns[j]; j == i || standsIn || along.IsZero() {
			continue
		}
		byJ, err := byArgument(k, d, e, j)
		if err != nil {
			return field.Elem{}, err
		}
		out = out.Sub(byJ.Mul(along))
	}
	return out, nil
}

// ownGenerator is the i-th argument if it is a generator, else a generator that stands in
// this argument only.
func ownGenerator(k *field.Field, d parse.FunctionDecl, i int) (g field.Gen, plain bool, err error) {
	if g, ok := d.StandIns[i]; ok {
		return g, true, nil
	}
	arg := d.Fn.Args[i]
	gens := arg.Gens()
	if len(gens) == 1 && arg.Equal(k.Raw(gens[0])) {
		return gens[0], true, nil
	}
	for _, g := range slices.Backward(gens) {
		elsewhere := false
		for j, other := range d.Fn.Args {
			_, standsIn := d.StandIns[j]
			elsewhere = elsewhere || j != i && !standsIn && other.Has(g)
		}
		if !elsewhere && !partial(k, arg, g).IsZero() {
			return g, false, nil
		}
	}
	return 0, false, fmt.Errorf("the definition of %s cannot be differentiated by %s on this background; give a value for the derivative", d.Name, d.Fn.ArgNames[i])
}

// partial is ∂e/∂g, all other generators fixed.
func partial(k *field.Field, e field.Elem, g field.Gen) field.Elem {
	if e.IsZero() {
		return e
	}
	num, den := e.Num(), e.Den()
	up := partialPoly(k, num, g)
	down := partialPoly(k, den, g)
	d, err := k.Poly(den)
	if err != nil || d.IsZero() {
		panic("reduce: a denominator vanishes by the relations")
	}
	return up.Div(d).Sub(e.Mul(down).Div(d))
}

// partialPoly is Σ_h (∂p/∂h)(∂h/∂g).
func partialPoly(k *field.Field, p poly.Poly, g field.Gen) field.Elem {
	var sum field.Elem
	for _, h := range p.Vars() {
		inner := partialGen(k, h, g)
		if inner.IsZero() {
			continue
		}
		outer, err := k.Poly(p.Deriv(h))
		if err == nil {
			sum = sum.Add(outer.Mul(inner))
		}
	}
	return sum
}

// partialGen is ∂h/∂g for a generator h.
func partialGen(k *field.Field, h, g field.Gen) field.Elem {
	if h == g {
		return k.Int(1)
	}
	in, self := k.Info(h), k.Raw(h)
	switch {
	case in.Kind == field.Root: // h² = r
		return partial(k, in.Arg, g).Div(self.Scale(2, 1))
	case in.Kind == field.FreeFunction:
		var sum field.Elem
		for i, arg := range in.Fn.Args {
			index := slices.Clone(in.Index)
			index[i]++
			sum = sum.Add(k.FuncJet(in.Fn, index).Mul(partial(k, arg, g)))
		}
		return sum
	case in.Kind != field.Elementary:
		return field.Elem{}
	}
	inner := partial(k, in.Arg, g)
	if inner.IsZero() {
		return inner
	}
	switch in.Name {
	case "exp":
		return self.Mul(inner)
	case "log":
		return inner.Div(in.Arg)
	case "sin":
		if c, err := k.Elementary("cos", in.Arg); err == nil {
			return c.Mul(inner)
		}
	case "tanh":
		return k.Int(1).Sub(self.Mul(self)).Mul(inner)
	}
	return field.Elem{}
}
