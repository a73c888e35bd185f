package series

// A list of coefficients, such as q₀, q₁, … of a normal form, in powers of small parameters or
// of the wave number on large or small scales.

import (
	"strings"

	"remnant/expr/field"
)

// Expansion is what is printed of a series of a normal form.
type Expansion struct {
	In     string        // "eps, eta"; "k" on large scales; "1/k" on small ones
	Order  int           // the highest order kept: of k⁻¹ on small scales
	Coefs  []Coefficient // one for each qₙ
	factor field.Elem    // k, or 1
}

// Coefficient is the series of one element.
type Coefficient struct {
	Terms []Term // small parameters: homogeneous parts; k: powers of k and their coefficients
	Exact bool   // nothing is left out
	Order int    // if not exact: the lowest degree, or power of k nearest to those kept, left out
}

// Value is a term as an element: with its power of k, where the expansion is in k.
func (e Expansion) Value(t Term) field.Elem {
	if e.factor.IsOne() {
		return t.Coef
	}
	return t.Coef.Mul(e.factor.Pow(t.Power))
}

// InSmall expands each of q in the small parameters, keeping total degrees up to order.
func InSmall(f *field.Field, q []field.Elem, small []field.Gen, order int) (Expansion, error) {
	g, err := Small(f, small)
	if err != nil {
		return Expansion{}, err
	}
	list, err := g.ExpandAll(q, order+1)
	if err != nil {
		return Expansion{}, err
	}
	out := Expansion{In: g.names(), Order: order, factor: f.Int(1)}
	for _, s := range list {
		c := Coefficient{Terms: s.Terms(), Exact: s.order == Exact, Order: s.order}
		for i := range c.Terms {
			c.Terms[i].Coef = c.Terms[i].Coef.Lowest()
		}
		out.Coefs = append(out.Coefs, c)
	}
	return out, nil
}

func (g *Grading) names() string {
	var out []string
	for _, x := range g.gens {
		out = append(out, g.f.Raw(x).String())
	}
	return strings.Join(out, ", ")
}

// InWavenumber expands each of q in k: on large scales up to k^order, on small ones down to
// k^−order. Where an element depends on k² only, so does its series, and the first power
// left out is even; the same for k times such an element.
func InWavenumber(f *field.Field, q []field.Elem, k field.Gen, order int, largeScales bool) (Expansion, error) {
	g, sign, name := (*Grading)(nil), 1, f.Raw(k).String()
	var err error
	if largeScales {
		g, err = LargeScales(f, k)
	} else {
		sign, name = -1, "1/"+name
		g, err = SmallScales(f, k)
	}
	if err != nil {
		return Expansion{}, err
	}
	out := Expansion{In: name, Order: order, factor: f.Raw(k)}
	for _, e := range q {
		s, err := g.Expand(e, order+1)
		if err != nil {
			return Expansion{}, err
		}
		c := Coefficient{Exact: s.order == Exact}
		if !c.Exact {
			c.Order = sign * g.evenOrder(e, k, s.order)
		}
		for _, t := range s.Terms() {
			p := sign * t.Power
			c.Terms = append(c.Terms, Term{p, t.Coef.Mul(f.Raw(k).Pow(-p)).Lowest()})
		}
		out.Coefs = append(out.Coefs, c)
	}
	return out, nil
}

// evenOrder raises the order of the series of e by one where it has the wrong parity for e
// even or odd in k. Where a root or function holds k the sign of k does not tell.
func (g *Grading) evenOrder(e field.Elem, k field.Gen, order int) int {
	for _, x := range e.Gens() {
		if x != k && g.involved(x) {
			return order
		}
	}
	flipped, err := e.Substitute(func(x field.Gen) (field.Elem, bool) {
		return g.f.Raw(k).Neg(), x == k
	})
	if err != nil {
		return order
	}
	switch odd := order%2 != 0; {
	case odd && flipped.Equal(e), !odd && flipped.Equal(e.Neg()):
		return order + 1
	}
	return order
}
