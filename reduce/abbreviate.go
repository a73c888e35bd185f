package reduce

// Abbreviations in the output. A let whose value is a product with one sum in it, such as
// ρ = φ′²(P,X + φ′²P,XX)/2, is put back where that sum stands as a factor and the expression
// becomes shorter.

import (
	"remnant/expr/field"
	"remnant/expr/poly"
)

// abbreviation is a name with the sum by which it is recognised.
type abbreviation struct {
	Abbreviation
	ratio field.Elem // name / value
	sum   poly.Poly  // the one factor of the value that is a sum
	exp   int        // its power in the value: 1 or −1
}

// Abbreviation is a let that stands in a result.
type Abbreviation struct {
	Name  string
	Value field.Elem
}

// Abbreviated is the result with the model's abbreviations put back, for people to read. It
// is not to be computed with: the names stand for functions without relations.
func (r *Result) Abbreviated() *Result {
	names := r.abbreviations()
	if len(names) == 0 {
		return r
	}
	used := make([]bool, len(names))
	short := func(e field.Elem) field.Elem {
		for i, n := range names {
			s, ok := n.apply(e)
			e, used[i] = s, used[i] || ok
		}
		return e
	}
	out := *r
	out.Steps = nil
	for _, s := range r.Steps {
		out.Steps = append(out.Steps, s.mapped(short))
	}
	out.Remaining = r.Remaining.mapped(short)
	if r.Single != nil {
		s := *r.Single
		s.Q, s.EquationOfMotion = mapList(s.Q, short), mapList(s.EquationOfMotion, short)
		for _, p := range []**field.Elem{&s.Kinetic, &s.Gradient, &s.Mass, &s.SoundSpeed2, &s.ZSquared, &s.ZppOverZ} {
			if *p != nil {
				e := short(**p)
				*p = &e
			}
		}
		out.Single = &s
	}
	if r.Several != nil {
		s := *r.Several
		s.Form, _ = mapForm(s.Form, func(e field.Elem) (field.Elem, error) { return short(e), nil })
		s.SoundSpeeds, s.Minors = mapList(s.SoundSpeeds, short), mapList(s.Minors, short)
		out.Several = &s
	}
	out.Stability = nil
	for _, s := range r.Stability {
		s.Condition, s.Minors = short(s.Condition), mapList(s.Minors, short)
		out.Stability = append(out.Stability, s)
	}
	for i, n := range names {
		if used[i] {
			out.Abbreviations = append(out.Abbreviations, n.Abbreviation)
		}
	}
	return &out
}

// abbreviations lists the lets that can be recognised.
func (r *Result) abbreviations() []abbreviation {
	var out []abbreviation
	k := r.Model.K
	for _, l := range r.Model.Lets {
		v, err := l.Value.Normal()
		if !l.Background || err != nil || v.IsZero() {
			continue
		}
		var sums []field.FactorPower
		_, factors := v.Factors()
		for _, f := range factors {
			if !f.P.IsMono() {
				sums = append(sums, f)
			}
		}
		if len(sums) != 1 || sums[0].Exp != 1 && sums[0].Exp != -1 {
			continue
		}
		if _, taken := k.Lookup(l.Name); taken {
			continue
		}
		name := k.Gen(k.Function(l.Name, v.Sign()))
		out = append(out, abbreviation{Abbreviation{l.Name, v}, name.Div(v), sums[0].P, sums[0].Exp})
	}
	return out
}

// apply puts the name into e where its sum is a factor; false if it does not shorten e.
func (n abbreviation) apply(e field.Elem) (field.Elem, bool) {
	if e.IsZero() {
		return e, false
	}
	_, factors := e.Factors()
	for _, f := range factors {
		if f.P.Equal(n.sum) {
			if short := e.Mul(n.ratio.Pow(f.Exp * n.exp)); short.Terms() < e.Terms() {
				return short, true
			}
		}
	}
	return e, false
}

func mapList(es []field.Elem, fn func(field.Elem) field.Elem) []field.Elem {
	if es == nil {
		return nil
	}
	out := make([]field.Elem, len(es))
	for i, e := range es {
		out[i] = fn(e)
	}
	return out
}

// mapped is the step with fn applied to what it prints.
func (s Step) mapped(fn func(field.Elem) field.Elem) Step {
	out := Step{Kind: s.Kind, Nonzero: mapList(s.Nonzero, fn), after: s.after, names: s.names}
	if s.names == nil && len(s.after.Names) > 0 {
		out.after = s.after.mapped(fn)
	}
	for _, sol := range s.Solutions {
		short := Solution{Name: sol.Name, Equation: sol.Equation}
		for _, a := range sol.Sum {
			short.Sum = append(short.Sum, Addend{a.Coef.Map(fn), a.Name})
		}
		out.Solutions = append(out.Solutions, short)
	}
	return out
}

// mapped is the system's normal form with fn applied to its coefficients.
func (s System) mapped(fn func(field.Elem) field.Elem) System {
	form, err := s.Form()
	if err != nil {
		panic(err) // every step keeps the matrix self-adjoint
	}
	form, _ = mapForm(form, func(e field.Elem) (field.Elem, error) { return fn(e), nil })
	return System{K: s.K, Names: s.Names, form: &form}
}
