package reduce

// The main job: a model in, what remains out.

import (
	"errors"
	"strings"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/parse"
	"remnant/rules"
)

// Result is a reduction. It is not changed after it was made.
type Result struct {
	Model            *parse.Model
	Background       []rules.Equation // of a covariant model, as derived; nil for a quadratic one
	Initial          System           // the quadratic form of the Lagrangian
	Steps            []Step
	Remaining        System
	Weights          []int  // half the order of each remaining field in the leading matrix
	DegreesOfFreedom int    // polarisations counted
	Count            Count  // the independent count, which agrees
	Variable         string // the field that remains; "" if none or several do
	Requested        string // what the model asked to keep; "" if it did not
	Single           *Single
	Several          *Several
	Stability        []Statement
	FormFactor       *FormFactor        // of an action with one; what else is said of one field is nil then
	Abbreviations    []Abbreviation     // those that Abbreviated put in
	Assumptions      []field.Assumption // all that was assumed, from the model's own text on
}

// ErrCount says that the elimination and the independent count disagree: a fault of the
// program, which must not be taken for a result.
var ErrCount = errors.New("the independent count of solutions disagrees with the elimination; this is a fault of the program, please report the model")

// Reduce takes the model's action to what remains of it. Refusals are a diag.List; a limit
// or an interruption is a *budget.Stop.
func Reduce(m *parse.Model) (*Result, error) { return reduceBy(new(rules.Expander), m) }

// Sectors reduces a covariant or adm model in its scalar, vector and tensor sectors; what
// they share is found once.
func Sectors(m *parse.Model) ([]*Result, error) {
	var out []*Result
	x := new(rules.Expander)
	for _, s := range []parse.Sector{parse.ScalarSector, parse.VectorSector, parse.TensorSector} {
		r, err := reduceBy(x, m.Variant(m.Gauge, s))
		if err != nil {
			return nil, err
		}
		out = append(out, r)
	}
	return out, nil
}

func reduceBy(expander *rules.Expander, m *parse.Model) (r *Result, err error) {
	defer budget.Catch(&err)
	b := m.K.Budget()
	var background []rules.Equation
	var expanded *rules.Expansion
	if m.Covariant != nil || m.ADM != nil {
		x, err := expander.Expand(m)
		if err != nil {
			return nil, err
		}
		m, background, expanded = x.Model, x.Equations, x
	}
	b.Stage("writing the Lagrangian as a quadratic form")
	r = &Result{Model: m, Background: background, Initial: Quadratic(m)}
	if m.Keep != nil {
		r.Requested = m.Keep.Name
	}
	if expanded != nil && len(expanded.NonLocal) > 0 {
		return r, r.reduceNonLocal(expanded)
	}
	b.Stage("counting the solutions")
	if r.Count, err = r.Initial.CountSolutions(); err != nil {
		return nil, err
	}
	e, err := eliminate(start(m, r.Initial), m.Wavenumber, r.Count, r.Initial.Names, r.Requested)
	if err != nil {
		return nil, gaugeDiagnostic(m, err)
	}
	if e, err = keptRemains(r, e); err != nil {
		return nil, err
	}
	r.Steps, r.Remaining, r.Weights = e.steps, e.now, e.weights
	r.DegreesOfFreedom = half(e.weights) * m.Sector.Polarisations()
	if r.Count.Gauge != 0 || r.Count.Solutions != 2*half(e.weights) {
		return nil, ErrCount
	}
	b.Stage("analysing what remains")
	if err := r.analyse(); err != nil {
		return nil, err
	}
	r.Assumptions = r.allAssumptions()
	return r, nil
}

// start is the system to eliminate in: with a new variable, if the model keeps one.
func start(m *parse.Model, initial System) System {
	if m.Keep == nil || m.Keep.Definition == nil {
		return initial
	}
	multiplier := "multiplier"
	for initial.index(multiplier) >= 0 || multiplier == m.Keep.Name {
		multiplier += "_1"
	}
	return initial.define(m.Keep.Name, multiplier, m.Keep.Definition, m.Wavenumber)
}

func (r *Result) analyse() (err error) {
	switch len(r.Remaining.Names) {
	case 0:
	case 1:
		r.Variable = r.Remaining.Names[0]
		if r.Single, err = analyseSingle(r.Model, r.Remaining); err == nil {
			r.Stability = r.Single.stability(r.Model)
		}
	default:
		if r.Several, err = analyseSeveral(r.Model, r.Remaining); err == nil {
			r.Stability = r.Several.stability(r.Weights)
		}
	}
	return err
}

// allAssumptions joins those of the model and those of the steps, each factor once.
func (r *Result) allAssumptions() []field.Assumption {
	out := r.Model.K.Assumptions()
	for _, s := range r.Steps {
		for _, f := range s.Nonzero {
			known := false
			for _, a := range out {
				known = known || a.Factor.Equal(f)
			}
			if !known {
				out = append(out, field.Assumption{Factor: f, Why: s.describe() + " divides by it"})
			}
		}
	}
	return out
}

func (s Step) describe() string {
	var names []string
	for _, sol := range s.Solutions {
		names = append(names, sol.Name)
	}
	list := strings.Join(names, " and ")
	if s.Kind == Redefined {
		return "the redefinition of " + list
	}
	return "the solution for " + list
}
