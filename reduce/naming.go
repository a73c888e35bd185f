package reduce

// Named coefficients. In a large system every coefficient of the normal form gets a name, a
// function of time of its own, before anything is eliminated; the constraints are solved in
// terms of the names, and the values are put back at the end. Products of large coefficients
// are then never expanded on the way.
//
// Names know no relations among the coefficients, so a degeneracy that the values have may be
// missed: a pivot may vanish when its value is put back, or a leading matrix that looks
// regular may be singular. Both are noticed: the first as a division by zero, the second
// because the weights then do not add to half the independent count of solutions. In either
// case the elimination is done again with the values themselves.

import (
	"fmt"

	"remnant/expr/field"
	"remnant/expr/oper"
)

// nameAbove is the size of a system, in terms, from which its coefficients are named.
const nameAbove = 120

// naming goes from names back to values.
type naming struct {
	k      *field.Field // of the values
	sub    *field.Field // of the names
	wave   field.Elem   // k in the field of values
	gens   []field.Gen  // the names
	values []field.Elem
	index  map[field.Gen]int
	memo   map[field.Gen]field.Elem
}

// nameCoefficients rewrites s with a name for each coefficient of its Lagrangian that is no
// number; false where k stands in a denominator.
func nameCoefficients(s System, wave field.Elem) (System, *naming, bool) {
	n := &naming{k: s.K, sub: field.New(s.K.Budget()), wave: wave,
		index: map[field.Gen]int{}, memo: map[field.Gen]field.Elem{}}
	subWave := n.sub.Gen(n.sub.Wavenumber("k"))
	b := oper.NewMatrix(len(s.Names), len(s.Names))
	for _, t := range lagrangian(s) {
		parts, ok := t.c.CoeffsIn(wave.Num().Vars()[0])
		if !ok {
			return s, nil, false
		}
		var named field.Elem
		for p, v := range parts {
			if !v.IsZero() {
				named = named.Add(n.name(v).Mul(subWave.Pow(p)))
			}
		}
		b.Set(t.a, t.b, b.At(t.a, t.b).Add(t.form(named)))
	}
	return System{K: n.sub, Names: s.Names, D: b.Add(b.Adjoint())}, n, true
}

// bilinear is the term c·u_a⁽ⁱ⁾u_b⁽ʲ⁾ of a Lagrangian.
type bilinear struct {
	a, i int
	b, j int
	c    field.Elem
}

// form is (−D)ⁱ c Dʲ, the place of the term in B with 𝒟 = B + B†.
func (t bilinear) form(c field.Elem) oper.Oper {
	op := oper.Mono(c, t.j)
	for range t.i {
		op = op.D().Neg()
	}
	return op
}

// lagrangian writes the form as a Lagrangian in which the two orders of a term differ by at
// most one. A mixed term of odd order may be written with the derivative on either field;
// that is taken which leaves less for the order below, so that no derivative of a
// coefficient gets a name beside the coefficient.
func lagrangian(s System) []bilinear {
	var out []bilinear
	for a := range s.Names {
		for b := range a + 1 {
			rest := s.D.At(b, a)
			for !rest.IsZero() {
				t, left := peel(rest, b, a)
				out, rest = append(out, t), left
			}
		}
	}
	return out
}

// peel takes the highest order off the entry (a,b), a ≤ b, of a form.
func peel(entry oper.Oper, a, b int) (bilinear, oper.Oper) {
	n := entry.Order()
	half, c := n/2, entry.Lead()
	if half%2 != 0 {
		c = c.Neg()
	}
	if a == b { // self-adjoint: n is even, and the term stands once in B + B†
		t := bilinear{a, half, b, half, c.Scale(1, 2)}
		return t, entry.Sub(t.form(c))
	}
	t := bilinear{a, half, b, n - half, c}
	left := entry.Sub(t.form(c))
	if n%2 == 0 {
		return t, left
	}
	// c u_a⁽ʰ⁾u_b⁽ʰ⁺¹⁾ is −c u_b⁽ʰ⁾u_a⁽ʰ⁺¹⁾ − c′ u_a⁽ʰ⁾u_b⁽ʰ⁾ up to a total derivative
	other := bilinear{b, half, a, half + 1, c.Neg()}
	if l := entry.Sub(other.form(other.c).Adjoint()); l.Terms() < left.Terms() {
		return other, l
	}
	return t, left
}

// name gives a value its name: a number stays, and values that differ by a rational factor
// share one.
func (n *naming) name(v field.Elem) field.Elem {
	if r, ok := v.Rat(); ok {
		return n.sub.Rat(r)
	}
	for i, w := range n.values {
		if w.Num().Len() != v.Num().Len() {
			continue
		}
		if r, ok := v.Div(w).Rat(); ok {
			return n.sub.Gen(n.gens[i]).Mul(n.sub.Rat(r))
		}
	}
	g := n.sub.Function(fmt.Sprintf("c%d", len(n.values)), v.Sign())
	n.index[g] = len(n.values)
	n.gens, n.values = append(n.gens, g), append(n.values, v)
	return n.sub.Gen(g)
}

// at is the value of a generator of the names.
func (n *naming) at(g field.Gen) field.Elem {
	if v, ok := n.memo[g]; ok {
		return v
	}
	in, v := n.sub.Info(g), n.wave
	if in.Kind == field.Function {
		v = n.values[n.index[n.sub.Base(g)]].Dn(in.Order)
	}
	n.memo[g] = v
	return v
}

func (n *naming) elem(e field.Elem) (field.Elem, error) {
	v, err := n.k.Transfer(e, n.at)
	return v.Lowest(), err
}

func (n *naming) oper(a oper.Oper) (oper.Oper, error) {
	c := make([]field.Elem, a.Order()+1)
	for i := range c {
		var err error
		if c[i], err = n.elem(a.Coef(i)); err != nil {
			return oper.Oper{}, err
		}
	}
	return oper.New(c...), nil
}

// system puts the values into a system: into the normal form alone where one field is left,
// whose matrix holds derivatives of it that nobody may ask for.
func (n *naming) system(s System) (System, error) {
	out := System{K: n.k, Names: s.Names}
	if len(s.Names) == 1 {
		form, err := s.Form()
		if err != nil {
			return out, err
		}
		form, err = mapForm(form, n.elem)
		out.form = &form
		return out, err
	}
	out.D = oper.NewMatrix(s.D.Rows(), s.D.Cols())
	for i := range s.D.Rows() {
		for j := range s.D.Cols() {
			a, err := n.oper(s.D.At(i, j))
			if err != nil {
				return out, err
			}
			out.D.Set(i, j, a)
		}
	}
	return out, nil
}

// step puts the values into the record of a step; what stood after it is put back when it
// is asked for.
func (n *naming) step(s Step) (Step, error) {
	out := Step{Kind: s.Kind, after: s.after, names: n}
	for _, sol := range s.Solutions {
		back := Solution{Name: sol.Name, Equation: sol.Equation}
		for _, a := range sol.Sum {
			c, err := n.oper(a.Coef)
			if err != nil {
				return out, err
			}
			back.Sum = append(back.Sum, Addend{c, a.Name})
		}
		out.Solutions = append(out.Solutions, back)
	}
	for _, f := range s.Nonzero {
		v, err := n.elem(f)
		if err != nil {
			return out, err
		}
		if v.IsZero() {
			return out, &field.ErrZeroDivisor{Factor: v}
		}
		out.Nonzero = append(out.Nonzero, v.Vanishable()...)
	}
	return out, nil
}

// values puts the values back into a finished elimination; false where that divides by zero.
func (e *elimination) putBack(n *naming) bool {
	var err error
	for i := range e.steps {
		if e.steps[i], err = n.step(e.steps[i]); err != nil {
			return false
		}
	}
	e.now, err = n.system(e.now)
	return err == nil
}
