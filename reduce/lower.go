package reduce

// Order reduction. Where higher derivatives come with a small parameter, 𝒟 = 𝒟₀ + 𝒟₁ + 𝒟₂ + …
// by degrees in it and 𝒟₀ of second order, they are perturbations: write 𝒟ₙ = 𝒟₀p𝒟₀ + r with
// p = p† and r of order at most 2, both unique, by division from both sides. The redefinition
// u → u − ½p𝒟₀u takes the first term away at this degree; it vanishes on the leading equation
// of motion, so that late-time correlators of u are unchanged there. What it makes at higher
// degrees joins the next ones. The result is an action of second order with 𝒦, 𝒢, ℳ and c_s²
// corrected degree by degree. The modes that are removed lie where the small parameter times
// the derivatives is of order one (compare Jaén, Llosa, Molina 1986, Phys. Rev. D 34, 2302).

import (
	"fmt"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/series"
)

// Lowered is the effective action of second order.
type Lowered struct {
	Order int     // the highest degree in the small parameters that is kept
	Field *Single // its normal form and what follows from it, each cut after Order
}

// Lower reduces the order of what remains, if it is one field of higher order whose model
// declares small parameters, up to the model's order; nil if there is nothing to reduce. It
// fails where the action without the small parameters is not of second order.
func (r *Result) Lower() (out *Lowered, err error) {
	defer budget.Catch(&err)
	m := r.Model
	if r.Single == nil || len(r.Single.Q) < 3 || len(m.Small) == 0 {
		return nil, nil
	}
	m.K.Budget().Stage("reducing the order of what remains")
	g, err := series.Small(m.K, m.Small)
	if err != nil {
		return nil, err
	}
	d, err := byDegree(g, oper.FromNormalForm(r.Single.Q), m.SmallOrder)
	if err != nil {
		return nil, err
	}
	if d[0].Order() != 2 {
		return nil, fmt.Errorf("without the small parameters the equation of motion is of order %d, not 2", max(d[0].Order(), 0))
	}
	for n := 1; n < len(d); n++ {
		if d, err = lowerDegree(g, d, n); err != nil {
			return nil, err
		}
	}
	var sum oper.Oper
	for _, part := range d {
		sum = sum.Add(part)
	}
	q, err := sum.NormalForm()
	if err != nil {
		return nil, err
	}
	s, err := cutSingle(r, g, q)
	return &Lowered{m.SmallOrder, s}, err
}

// byDegree splits an operator into its parts by degree in the small parameters.
func byDegree(g *series.Grading, a oper.Oper, order int) ([]oper.Oper, error) {
	out := make([]oper.Oper, order+1)
	for i := 0; i <= a.Order(); i++ {
		s, err := g.Expand(a.Coef(i), order+1)
		if err != nil {
			return nil, err
		}
		if s.Valuation() < 0 {
			return nil, fmt.Errorf("the action has a pole in the small parameters")
		}
		for n := range out {
			if c, known := s.Coef(n); known && !c.IsZero() {
				out[n] = out[n].Add(oper.Mono(c, i))
			}
		}
	}
	return out, nil
}

// lowerDegree removes the higher derivatives of degree n.
func lowerDegree(g *series.Grading, d []oper.Oper, n int) ([]oper.Oper, error) {
	p := sandwiched(d[0], d[n])
	if p.IsZero() {
		return d, nil
	}
	// u → (1 − P)u with P = ½p𝒟₀ of degree n
	shift := p.Mul(d[0]).Map(func(e field.Elem) field.Elem { return e.Scale(1, 2) })
	adjoint := shift.Adjoint()
	out := make([]oper.Oper, len(d))
	for k := range d {
		part := d[k]
		if k >= n {
			part = part.Sub(adjoint.Mul(d[k-n])).Sub(d[k-n].Mul(shift))
		}
		if k >= 2*n {
			part = part.Add(adjoint.Mul(d[k-2*n]).Mul(shift))
		}
		pieces, err := byDegree(g, part.Map(field.Elem.Lowest), len(d)-1)
		if err != nil {
			return nil, err
		}
		for i, x := range pieces {
			out[i] = out[i].Add(x)
		}
	}
	return out, nil
}

// sandwiched is the self-adjoint p with a − 𝒟₀p𝒟₀ of order at most 2: the leading term of what
// is left, c·D²ᵐ, is taken away by p = (−D)ᵐ⁻² c′ Dᵐ⁻² with c = ±c′·(lead 𝒟₀)².
func sandwiched(d0, a oper.Oper) oper.Oper {
	var p oper.Oper
	inv := d0.Lead().Mul(d0.Lead()).Inv()
	for a.Order() > 2 {
		m := a.Order()/2 - 2
		c := a.Lead().Mul(inv)
		if m%2 != 0 {
			c = c.Neg()
		}
		q := make([]field.Elem, m+1)
		q[m] = c
		part := oper.FromNormalForm(q)
		p = p.Add(part)
		a = a.Sub(d0.Mul(part).Mul(d0)).Map(field.Elem.Lowest)
	}
	return p
}

// cutSingle describes the effective action; quotients are expanded and cut as well.
func cutSingle(r *Result, g *series.Grading, q []field.Elem) (*Single, error) {
	s := &Single{Q: q}
	cut := func(e field.Elem) (field.Elem, error) {
		x, err := g.Expand(e, r.Model.SmallOrder+1)
		if err != nil {
			return e, err
		}
		return x.Elem().Lowest(), nil
	}
	for i := range q {
		var err error
		if q[i], err = cut(q[i]); err != nil {
			return nil, err
		}
	}
	if len(q) != 2 {
		return s, nil
	}
	k := wavenumberGen(r.Model)
	c, ok := coefficientsInK2(q[0], k)
	if !ok || len(c) > 2 || q[1].Has(k) {
		return s, nil
	}
	c = append(c, field.Elem{}, field.Elem{})
	kin, grad, mass := q[1], c[1].Neg(), c[0].Neg()
	speed, err := cut(grad.Div(kin).Mul(r.Frame2()))
	s.Kinetic, s.Gradient, s.Mass, s.SoundSpeed2 = &kin, &grad, &mass, &speed
	return s, err
}
