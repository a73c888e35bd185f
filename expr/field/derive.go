package field

// The derivation D = d/dτ: zero on constants, the next jet on jets, the chain rule on free
// functions, D s = (D r) s/(2r) on a root s² = r, and its own derivative on each elementary
// function.

import "remnant/expr/poly"

// D is the time derivative of e modulo the relations.
func (e Elem) D() Elem {
	if e.f == nil || e.num.IsConst() && len(e.den.pow) == 0 {
		return Elem{}
	}
	e = e.live()
	f := e.f
	// D(n/d) = (Dn)/d − (n/d) Σ eᵢ (D fᵢ)/fᵢ
	out := f.derivePoly(e.num).Mul(Elem{f: f, num: poly.FromInt(1), den: e.den})
	for _, p := range e.den.pow {
		out = out.Sub(e.Mul(f.logDeriv(p.id)).Scale(int64(p.exp), 1))
	}
	return out
}

// Dn is the n-th derivative of e.
func (e Elem) Dn(n int) Elem {
	for range n {
		e = e.D()
	}
	return e
}

// logDeriv is (D q)/q for the factor q.
func (f *Field) logDeriv(id int32) Elem {
	fc := f.factors[id]
	if fc.deriv.epoch != f.epoch {
		fc.deriv = cached{f.epoch, f.derivePoly(fc.p).Mul(Elem{f: f, num: poly.FromInt(1), den: denominator{pow: []power{{id, 1}}}})}
	}
	return fc.deriv.elem
}

// derivePoly is D p = Σ_g (∂p/∂g) D g.
func (f *Field) derivePoly(p poly.Poly) Elem {
	var parts []Elem
	for _, g := range p.Vars() {
		if d := f.genDeriv(g); !d.IsZero() {
			parts = append(parts, Elem{f: f, num: p.Deriv(g)}.Mul(d))
		}
	}
	return Sum(parts)
}

// genDeriv is D of one generator, modulo the relations.
func (f *Field) genDeriv(g Gen) Elem {
	gen := f.gens[g]
	if gen.deriv.epoch == f.epoch {
		return gen.deriv.elem
	}
	var d Elem
	switch gen.Kind {
	case Function:
		d = f.value(f.JetGen(g, gen.Order+1))
	case FreeFunction:
		for i, arg := range gen.Fn.Args {
			if da := arg.normalOrSelf().D(); !da.IsZero() {
				d = d.Add(f.FuncJet(gen.Fn, bump(gen.Index, i)).Mul(da))
			}
		}
	case Root:
		r := gen.Arg
		d = r.D().Mul(f.Raw(g)).Mul(r.Scale(2, 1).Inv())
	case Elementary:
		if du := gen.Arg.D(); !du.IsZero() {
			d = f.elementaryDeriv(g).Mul(du)
		}
	}
	gen.deriv = cached{f.epoch, d}
	return d
}

func bump(index []int, i int) []int {
	out := append([]int(nil), index...)
	out[i]++
	return out
}
