package reduce

// Expansions of what remains: its normal form in the model's small parameters, and in the
// wave number on large and on small scales. Package series does the expanding; here it is
// said of what.

import (
	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/series"
)

// Place says which coefficient of a normal form is meant: q_N of the fields A and B, or p_N
// of the antisymmetric part. A single remaining field has A = B = 0.
type Place struct {
	Antisymmetric bool
	N, A, B       int
}

// Expansion is the truncated series of a normal form; Coefs and Places run in parallel. For
// several fields the places are those with A ≤ B, which determine the rest.
type Expansion struct {
	series.Expansion
	Places []Place
}

// ExpandSmall expands in the parameters that the model declares small, keeping terms up to
// the given total degree. It is nil if the model declares none or if nothing remains.
func (r *Result) ExpandSmall(order int) (*Expansion, error) {
	if len(r.Model.Small) == 0 {
		return nil, nil
	}
	return r.expand(func(q []field.Elem) (series.Expansion, error) {
		return series.InSmall(r.Model.K, q, r.Model.Small, order)
	})
}

// ExpandScales expands in the wave number: on large scales up to k^order if large is true,
// else on small scales down to k^−order. It is nil if nothing remains.
func (r *Result) ExpandScales(order int, large bool) (*Expansion, error) {
	return r.expand(func(q []field.Elem) (series.Expansion, error) {
		return series.InWavenumber(r.Model.K, q, wavenumberGen(r.Model), order, large)
	})
}

func (r *Result) expand(by func([]field.Elem) (series.Expansion, error)) (x *Expansion, err error) {
	defer budget.Catch(&err)
	r.Model.K.Budget().Stage("expanding what remains in a series")
	places := r.places()
	if len(places) == 0 {
		return nil, nil
	}
	q := make([]field.Elem, len(places))
	for i, p := range places {
		q[i] = r.coefficient(p)
	}
	s, err := by(q)
	if err != nil {
		return nil, err
	}
	return &Expansion{s, places}, nil
}

// places lists the independent coefficients of the normal form, the highest derivatives
// first.
func (r *Result) places() []Place {
	var out []Place
	if r.Single != nil {
		for n := len(r.Single.Q) - 1; n >= 0; n-- {
			out = append(out, Place{N: n})
		}
	}
	if r.Several == nil {
		return out
	}
	form, size := r.Several.Form, len(r.Remaining.Names)
	for n := max(len(form.Symmetric), len(form.Antisymmetric)) - 1; n >= 0; n-- {
		for a := range size {
			for b := a; b < size; b++ {
				if n < len(form.Symmetric) {
					out = append(out, Place{N: n, A: a, B: b})
				}
				if n < len(form.Antisymmetric) && a != b {
					out = append(out, Place{Antisymmetric: true, N: n, A: a, B: b})
				}
			}
		}
	}
	return out
}

func (r *Result) coefficient(p Place) field.Elem {
	switch {
	case r.Single != nil:
		return r.Single.Q[p.N]
	case p.Antisymmetric:
		return r.Several.Form.Antisymmetric[p.N][p.A][p.B]
	}
	return r.Several.Form.Symmetric[p.N][p.A][p.B]
}
