package rules

// The expansion of a covariant or adm model.

import (
	"fmt"

	"remnant/expr/budget"
	"remnant/expr/field"
	exprshow "remnant/expr/show"
	"remnant/parse"
	"remnant/parse/diag"
)

// Expansion is a covariant or adm model at second order.
type Expansion struct {
	Model     *parse.Model // with the terms of its quadratic form, and the derived relations
	Equations []Equation   // of the background, in the order in which they were used
	NonLocal  []NonLocal   // what the form factors leave; its fields are the model's last
}

// expansion is the state of a run.
type expansion struct {
	m       *parse.Model
	ring    *ring
	density field.Elem // N̄a³
	scalars []field.Gen

	curvature field.Elem // in the gauge δR = 0: R on the background
}

// Expander expands variants of one model, in other gauges and sectors; what they share, the
// background equations and the relations solved from them, is found once.
type Expander struct {
	equations []Equation
	relations []parse.RelationDecl
}

// Expand expands a model that no variant is asked of.
func Expand(m *parse.Model) (*Expansion, error) { return new(Expander).Expand(m) }

// Expand derives the background equations of a covariant or adm model and its quadratic form,
// in the model's gauge and sector. Refusals are a diag.List; a limit or an interruption is a
// *budget.Stop. Models that one expander is given share their field K.
func (s *Expander) Expand(model *parse.Model) (out *Expansion, err error) {
	defer budget.Catch(&err)
	defer catchRefusal(&err)
	m := *model
	m.Relations = append([]parse.RelationDecl(nil), model.Relations...)
	m.Quadratic = nil
	x := &expansion{m: &m, ring: newRing(m.K, m.Lapse, m.A)}
	x.density = m.Lapse.Mul(m.A.Pow(3))
	x.scalars = m.Scalars()
	b := m.K.Budget()
	var eqs []Equation
	if s.equations == nil {
		b.Stage("deriving the background equations")
		if eqs, err = x.firstOrder(); err != nil {
			return nil, err
		}
	}
	b.Stage("expanding the action to second order")
	var names []string
	for _, f := range m.Fields {
		names = append(names, f.Name)
	}
	l, ranks, err := x.secondOrder(names)
	if err != nil {
		return nil, err
	}
	l, nonlocal := x.integrateIn(l, ranks)
	if s.equations == nil {
		if err := x.solve(eqs); err != nil {
			return nil, err
		}
		s.equations, s.relations = eqs, m.Relations
	}
	m.Relations = s.relations
	if err := x.checkGauge(); err != nil {
		return nil, err
	}
	b.Stage("reducing the quadratic action by the background equations")
	if err := x.finish(l); err != nil {
		return nil, err
	}
	return &Expansion{Model: &m, Equations: s.equations, NonLocal: nonlocal}, nil
}

// catchRefusal turns a refusal that was raised deep in an evaluation into the error.
func catchRefusal(err *error) {
	switch v := recover().(type) {
	case nil:
	case diag.List:
		*err = v
	case *field.Unsolvable: // relations that lead back to themselves
		*err = v
	default:
		panic(v)
	}
}

// evaluator builds the frame and the scalars from the perturbations that names lists.
func (x *expansion) evaluator(r *ring, names []string) *evaluator {
	e := &evaluator{frame: geometry(r, names, x.m.A), source: x.m.Source,
		scalars: map[field.Gen]quantity{}, cache: map[string]labelled{}}
	for _, s := range x.scalars {
		q := background(x.m.K.Gen(s))
		for i, n := range names {
			if n == "d"+x.m.K.Info(s).Name {
				q = q.add(r.field(i))
			}
		}
		e.scalars[s] = q
	}
	return e
}

func (x *expansion) secondOrder(names []string) (quantity, []rankOne, error) {
	e := x.evaluator(x.ring, names)
	if x.curvatureGauge() {
		l, err := x.uniformCurvature(e, len(names))
		return l, nil, err
	}
	l, ranks := x.lagrangian(e)
	return l, ranks, nil
}

// finish writes the terms of the quadratic form, coefficients reduced by the relations.
func (x *expansion) finish(l quantity) error {
	for _, t := range x.ring.terms(l, x.m.A, x.density) {
		c, err := t.Coef.Normal()
		if err != nil {
			return x.refuse(NoSolution, x.m.LagrangianSpan, fmt.Sprintf("a coefficient of the quadratic action divides by zero: %v", err), "")
		}
		if x.m.Sector == parse.TensorSector {
			c = c.Scale(1, 2) // γ_ijγ_ij is 2γ² for γ_xx = −γ_yy = γ
		}
		if t.Coef = c; !c.IsZero() {
			t.Span = x.m.LagrangianSpan
			x.m.Quadratic = append(x.m.Quadratic, t)
		}
	}
	return nil
}

// checkGauge refuses a gauge that the background does not allow, and records what it needs.
func (x *expansion) checkGauge() error {
	if x.m.Sector != parse.ScalarSector || x.m.ADM != nil {
		return nil
	}
	needs, of := field.Elem{}, ""
	switch x.m.Gauge {
	case parse.Unitary:
		if x.curvatureGauge() {
			needs, of = x.curvature.D(), "R'"
			break
		}
		if len(x.scalars) == 0 {
			return x.refuse(IncompleteGauge, x.m.GaugeSpan, "the unitary gauge needs a scalar to set to zero, and the model has none", "gauge newtonian is complete on every background")
		}
		needs, of = x.m.K.Jet(x.scalars[0], 1), exprshow.UnicodeName(x.m.K.Info(x.scalars[0]).Name)+"'"
	case parse.Flat:
		needs, of = x.m.A.D(), "H"
	default:
		return nil
	}
	n, err := needs.Normal()
	if err != nil || n.IsZero() {
		return x.refuse(IncompleteGauge, x.m.GaugeSpan,
			fmt.Sprintf("the %s gauge needs %s ≠ 0, and it is zero on this background", x.m.Gauge, of), "gauge newtonian is complete on every background")
	}
	x.m.K.AssumeNonzero(n, fmt.Sprintf("the %s gauge needs it", x.m.Gauge))
	return nil
}

func (x *expansion) refuse(kind diag.Kind, at diag.Span, summary, hint string) error {
	return diag.List{{Kind: kind, Source: x.m.Source, Span: at, Summary: summary, Hint: hint}}
}

func show(e field.Elem) string { return exprshow.Text(exprshow.Elem(e), 0) }
