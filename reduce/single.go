package reduce

// What is said of one remaining field: L = ½ Σ qₙ (u⁽ⁿ⁾)². At second order, with q₁ = 𝒦 free of
// k and q₀ = −(𝒢k² + ℳ), this is S = ∫dτ d³x ½[𝒦 u′² − 𝒢 (∂u)² − ℳ u²].

import (
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
)

// Single describes one remaining field. Pointers are nil where a quantity does not apply.
type Single struct {
	Q []field.Elem // the normal form q₀, q₁, …

	Kinetic  *field.Elem // 𝒦 = q₁, where it is free of k and q₀ is linear in k²
	Gradient *field.Elem // 𝒢, likewise
	Mass     *field.Elem // ℳ, likewise

	// SoundSpeed2 is c_s² = (a²/N̄²) lim_{k→∞} (−q₀/(k²q₁)). Where that limit is infinite it is
	// nil, and GrowthInK is the power of k with which the quotient grows.
	SoundSpeed2 *field.Elem
	GrowthInK   int

	// EquationOfMotion holds the cᵢ of Σ cᵢ u⁽ⁱ⁾ = 0, the highest 1. It is nil where writing it
	// out would be no gain: it is then read as Σ (−D)ⁿ qₙ Dⁿ u = 0.
	EquationOfMotion []field.Elem

	// Canonical variable v = zu at second order: v″ + (−(a²/N̄²)q₀/q₁ − z″/z) v = 0 where the
	// primes of this equation are d/dη = (a/N̄)D.
	ZSquared *field.Elem // z² = 𝒦N̄/a
	ZppOverZ *field.Elem // ½(z²)″/z² − ¼((z²)′/z²)²; nil where that is better left as it stands
}

// Sizes, in terms, up to which derivatives of coefficients are written out. Each derivative
// of a coefficient of a general theory multiplies its size by ten and more.
const (
	motionBelow = 150 // of the leading coefficient, for the equation of motion
	pumpBelow   = 60  // of z², for z″/z, which holds second derivatives
	slopeBelow  = 500 // of (z²)′, for the same
)

func analyseSingle(m *parse.Model, d System) (*Single, error) {
	form, err := d.Form()
	if err != nil {
		return nil, err
	}
	s := &Single{}
	for _, q := range form.Symmetric {
		s.Q = append(s.Q, q[0][0])
	}
	if n := len(s.Q); n > 0 && s.Q[n-1].Terms() <= motionBelow {
		a := oper.FromNormalForm(s.Q)
		for i := 0; i <= a.Order(); i++ {
			s.EquationOfMotion = append(s.EquationOfMotion, a.Coef(i).Div(a.Lead()).Lowest())
		}
	}
	if len(s.Q) == 2 {
		s.secondOrder(m)
	}
	return s, nil
}

func (s *Single) secondOrder(m *parse.Model) {
	k := wavenumberGen(m)
	q0, q1 := s.Q[0], s.Q[1]
	if c, ok := coefficientsInK2(q0, k); ok && len(c) <= 2 && !q1.Has(k) {
		c = append(c, field.Elem{}, field.Elem{})
		kin, grad, mass := q1, c[1].Neg(), c[0].Neg()
		s.Kinetic, s.Gradient, s.Mass = &kin, &grad, &mass
	}
	frame := m.A.Div(m.Lapse).Pow(2)
	high, n := leadingInK(q0.Neg(), k) // c_s²k² at large k
	low, n1 := leadingInK(q1, k)
	switch n -= n1; {
	case n > 2:
		s.GrowthInK = n - 2
	case n == 2:
		c2 := high.Div(low).Mul(frame).Lowest()
		s.SoundSpeed2 = &c2
	default:
		s.SoundSpeed2 = &field.Elem{}
	}
	z2 := q1.Mul(m.Lapse).Div(m.A).Lowest()
	s.ZSquared = &z2
	if z2.Terms() > pumpBelow {
		return
	}
	dEta := func(e field.Elem) field.Elem { return e.D().Mul(m.A).Div(m.Lapse) }
	d1 := dEta(z2)
	if d1.Terms() > slopeBelow {
		return
	}
	log := d1.Div(z2)
	zpp := dEta(d1).Div(z2).Scale(1, 2).Sub(log.Mul(log).Scale(1, 4)).Lowest()
	s.ZppOverZ = &zpp
}

// wavenumberGen is the generator k of the model.
func wavenumberGen(m *parse.Model) field.Gen { return m.Wavenumber.Num().Vars()[0] }

// coefficientsInK2 gives e as a polynomial in k²; false if it is none.
func coefficientsInK2(e field.Elem, k field.Gen) ([]field.Elem, bool) {
	if e.IsZero() {
		return nil, true
	}
	c, ok := e.CoeffsIn(k)
	if !ok {
		return nil, false
	}
	var out []field.Elem
	for i, x := range c {
		if i%2 == 0 {
			out = append(out, x)
		} else if !x.IsZero() {
			return nil, false
		}
	}
	return out, true
}

// leadingInK gives the leading coefficient and the power of e as k → ∞.
func leadingInK(e field.Elem, k field.Gen) (field.Elem, int) {
	if e.IsZero() {
		return e, 0
	}
	f := e.Field()
	r, factors := e.Factors()
	lead, n := f.Rat(r), 0
	for _, p := range factors {
		c := p.P.CoeffsIn(k)
		top, err := f.Poly(c[len(c)-1])
		if err != nil {
			panic(err) // no division in it
		}
		lead = lead.Mul(top.Pow(p.Exp))
		n += p.Exp * (len(c) - 1)
	}
	return lead.Lowest(), n
}

// trailingInK gives the leading coefficient and the power of e as k → 0.
func trailingInK(e field.Elem, k field.Gen) (field.Elem, int) {
	if e.IsZero() {
		return e, 0
	}
	f := e.Field()
	r, factors := e.Factors()
	low, n := f.Rat(r), 0
	for _, p := range factors {
		c := p.P.CoeffsIn(k)
		i := p.P.MinDegree(k)
		bottom, err := f.Poly(c[i])
		if err != nil {
			panic(err) // no division in it
		}
		low = low.Mul(bottom.Pow(p.Exp))
		n += p.Exp * i
	}
	return low.Lowest(), n
}
