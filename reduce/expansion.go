package reduce

// A model before anything is eliminated: its background equations and its Lagrangian at
// second order. The Lagrangian is not the expansion term by term but its shortest equivalent
// up to total derivatives, which the matrix 𝒟 fixes: the two orders of a product differ by at
// most one, and no coefficient is differentiated where that can be avoided.

import (
	"cmp"
	"slices"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/rules"
)

// Expanded is a model at second order. It is not changed after it was made.
type Expanded struct {
	Model       *parse.Model     // with the relations that its background equations gave
	Background  []rules.Equation // as derived; nil for a quadratic model, which has its relations given
	Form        System           // 𝒟 of S = ½∫Φᵀ𝒟Φ
	Lagrangian  []Product        // the same as a Lagrangian, S = ∫dτ d³x Σ products
	NonLocal    []rules.NonLocal // what form factors add to it
	Assumptions []field.Assumption
}

// Product is Coef·k²ⁿ·u⁽ⁱ⁾v⁽ʲ⁾ with n = Laplacians; U and V are places in the list of fields.
// Where Coef is no polynomial in k² it holds k itself, and n is 0.
type Product struct {
	Coef           field.Elem
	U, V           int
	UOrder, VOrder int
	Laplacians     int
}

// Variants works on variants of one model, in other gauges and sectors over one field K; what
// they share is found once. Refusals are a diag.List; a limit or an interruption is a
// *budget.Stop. The zero value is ready.
type Variants struct{ expander rules.Expander }

// Reduce is the function Reduce beside other variants.
func (v *Variants) Reduce(m *parse.Model) (*Result, error) { return reduceBy(&v.expander, m) }

// Expand brings a variant to second order. A quadratic model is there as it stands.
func (v *Variants) Expand(m *parse.Model) (x *Expanded, err error) {
	defer budget.Catch(&err)
	x = &Expanded{Model: m}
	if m.Covariant != nil || m.ADM != nil {
		full, err := v.expander.Expand(m)
		if err != nil {
			return nil, err
		}
		x.Model, x.Background, x.NonLocal = full.Model, full.Equations, full.NonLocal
	}
	m.K.Budget().Stage("writing the Lagrangian as a quadratic form")
	x.Form = Quadratic(x.Model)
	x.Lagrangian = products(x.Form)
	x.Assumptions = m.K.Assumptions()
	return x, nil
}

// GaugeCheck holds the Noether identities of a covariant or adm model in its sector, verified
// before a gauge is fixed. For tensors there are none.
type GaugeCheck struct {
	Sector     parse.Sector
	Identities []rules.GaugeIdentity
}

// CheckGauge verifies the Noether identities of a covariant or adm model.
func (v *Variants) CheckGauge(m *parse.Model) (g *GaugeCheck, err error) {
	defer budget.Catch(&err)
	ids, err := v.expander.CheckGauge(m)
	if err != nil {
		return nil, err
	}
	return &GaugeCheck{m.Sector, ids}, nil
}

// Holds reports whether every identity holds.
func (g *GaugeCheck) Holds() bool {
	return !slices.ContainsFunc(g.Identities, func(id rules.GaugeIdentity) bool { return !id.Holds() })
}

// products writes a form as a Lagrangian: squares first, then higher derivatives before lower
// ones.
func products(s System) []Product {
	var out []Product
	for _, t := range lagrangian(s) {
		c := t.c.Lowest()
		split, ok := show.Laplacians(c)
		if !ok {
			split = []field.Elem{c}
		}
		for n, c := range split {
			if c = c.Lowest(); !c.IsZero() {
				p := Product{c, t.a, t.b, t.i, t.j, n}
				if s.carries(p) {
					p = Product{c, t.b, t.a, t.j, t.i, n}
				}
				out = append(out, p)
			}
		}
	}
	slices.SortStableFunc(out, func(p, q Product) int {
		return cmp.Or(
			cmp.Compare(b2i(p.U != p.V), b2i(q.U != q.V)),
			-cmp.Compare(p.UOrder+p.VOrder, q.UOrder+q.VOrder),
			cmp.Compare(min(p.U, p.V), min(q.U, q.V)),
			cmp.Compare(max(p.U, p.V), max(q.U, q.V)),
			-cmp.Compare(p.Laplacians, q.Laplacians))
	})
	return out
}

func b2i(b bool) int {
	if b {
		return 1
	}
	return 0
}

// carries says of two unlike fields whether the first, not the second, is written behind. That
// is where the Laplacians act, if there are any: on a potential of the shift or of the slices'
// shear, else on the field that is differentiated less by time, else on the later one. Without
// Laplacians the field with more time derivatives stands behind.
func (s System) carries(p Product) bool {
	potential := func(n int) bool { return s.Names[n] == "B" || s.Names[n] == "E" }
	switch {
	case p.U == p.V:
		return false
	case p.Laplacians > 0 && potential(p.U) != potential(p.V):
		return potential(p.U)
	case p.UOrder != p.VOrder:
		return p.UOrder < p.VOrder == (p.Laplacians > 0)
	}
	return p.U > p.V
}

// LagrangianNode lays out the Lagrangian.
func (x *Expanded) LagrangianNode() show.Node {
	var list []show.FieldProduct
	for _, p := range x.Lagrangian {
		list = append(list, x.Show(p))
	}
	return show.FieldProducts(list)
}

// Show is a product with the names of its fields.
func (x *Expanded) Show(p Product) show.FieldProduct {
	return show.FieldProduct{
		Coef: p.Coef, U: x.Form.Names[p.U], V: x.Form.Names[p.V],
		UOrder: p.UOrder, VOrder: p.VOrder, Laplacians: p.Laplacians,
	}
}
