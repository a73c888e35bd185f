package rules

// The unitary gauge of an action whose only scalar is R: δR = 0. The action f(R, …) is the
// same as f(s, …) + f_s(s, …)(R − s) where f_ss ≠ 0, since the equation of s is f_ss(R − s) = 0.
// In it s is a scalar field, the gauge sets δs = 0, and s on the background is R̄. With δs = 0
// this is the expansion of f in R about R̄ cut after the first power of R − R̄, whatever else R
// is multiplied by.

import (
	"remnant/expr/field"
	"remnant/parse"
	"remnant/parse/diag"
)

// curvatureGauge reports whether the unitary gauge is the one with δR = 0.
func (x *expansion) curvatureGauge() bool {
	return x.m.Gauge == parse.Unitary && x.m.Sector == parse.ScalarSector && len(x.scalars) == 0 && x.m.Covariant != nil
}

// uniformCurvature expands the density with R = R̄ + ρ, ρ a field of its own with the number
// of fields given, drops ρ², and puts the perturbation of R for ρ.
func (x *expansion) uniformCurvature(e *evaluator, rho int) (quantity, error) {
	if holdsForm(x.action()) {
		return quantity{}, x.refuse(diag.NotYetSupported, x.m.GaugeSpan, "a form factor in the unitary gauge δR = 0 is not yet supported", "gauge newtonian expands it")
	}
	full := e.scalarCurvature()
	e.cache["R"] = labelled{tensor: scalarTensor(background(full.bg).add(x.ring.field(rho)))}
	l := e.volume.mul(e.scalar(x.m.Covariant))
	var out, slope quantity
	var bend field.Elem
	out.bg = l.bg
	for _, t := range l.lin {
		switch {
		case t.j.field() != rho:
			out.lin = append(out.lin, t)
		case t.j != newJet(rho, 0, 0):
			return out, x.derivedCurvature()
		default:
			slope.bg = t.c
		}
	}
	for _, t := range l.quad {
		mine := t.j.field() == rho // the last field: it stands second
		switch {
		case !mine:
			out.quad = append(out.quad, t)
		case t.j != newJet(rho, 0, 0):
			return out, x.derivedCurvature()
		case t.i == t.j:
			bend = t.c
		default:
			slope.lin = append(slope.lin, linear{t.i, t.c})
		}
	}
	if bend.IsZero() {
		return out, x.refuse(IncompleteGauge, x.m.GaugeSpan, "the unitary gauge needs a scalar to set to zero; the model has none, and R stands linearly",
			"gauge newtonian is complete on every background")
	}
	x.m.K.AssumeNonzero(bend, "the scalar in R exists only then")
	x.curvature = full.bg
	return out.add(slope.mul(full.perturbation())), nil
}

func (x *expansion) derivedCurvature() error {
	return x.refuse(diag.NotYetSupported, x.m.GaugeSpan, "a derivative of R in the unitary gauge δR = 0 is not yet supported", "gauge newtonian expands it")
}
