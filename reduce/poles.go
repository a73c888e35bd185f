package reduce

// The poles of the propagator of an action with a form factor: the zeros of W(s) in a disc.
// The action of the mode is ½∫√−ḡ Y𝒪(□̄)Y with 𝒪 = −W/(wF). A real simple zero s₀ is healthy if
// 𝒪′(s₀) = −W′(s₀)/(wF(s₀)) > 0 and a ghost if it is negative; on Minkowski space it is a tachyon
// if s₀ < 0; on de Sitter space s₀ is the mass squared in (□ − s₀)u = 0, and a mode with s₀ < 0
// grows.

import (
	"math/big"

	"remnant/expr/field"
	"remnant/series"
)

// PoleVerdict judges a pole.
type PoleVerdict string

const (
	Healthy      PoleVerdict = "healthy"
	GhostPole    PoleVerdict = "ghost"
	Tachyon      PoleVerdict = "tachyon"
	Growing      PoleVerdict = "growing" // on de Sitter space: its mass squared s₀ is negative
	ComplexPair  PoleVerdict = "complex pair"
	MultiplePole PoleVerdict = "multiple"
	Undecided    PoleVerdict = "undecided" // a cluster, or a sign that could not be proved
)

// Pole is a zero of W with its verdicts.
type Pole struct {
	series.Zero
	Verdicts []PoleVerdict
}

// Poles is the answer about one disc |s| < Radius.
type Poles struct {
	Function string // W(s) with the model's numbers
	Radius   *big.Rat
	Zeros    series.Zeros
	List     []Pole

	// TruncationArtefacts are zeros that W with F cut after the given order has and W has not;
	// nil where no truncation was asked for.
	TruncationArtefacts []series.Zero
	TruncationOrder     int
}

// Poles counts and judges the zeros of W in the disc |s| < radius, and with order > 0 those
// that the truncation of W after sⁿ adds. It needs numbers for the constants and a definition
// of the form factor; refusals are a diag.List. A count that could not be proved is no error.
func (r *Result) Poles(radius *big.Rat, order int) (*Poles, error) {
	f := r.FormFactor
	if f == nil {
		return nil, r.refusePoles("the action has no form factor, and its poles are those of the reduced operator", "'remnant reduce' prints it")
	}
	if f.Powers == nil {
		return nil, r.refusePoles("W depends on time and is no function of the eigenvalue of box", "on Minkowski and de Sitter space it is one")
	}
	r.Model.K.Budget().Stage("building W")
	w, form, weight, err := r.numericW()
	if err != nil {
		return nil, err
	}
	r.Model.K.Budget().Stage("counting the zeros of W")
	opt := series.ZeroOptions{Budget: r.Model.K.Budget()}
	out := &Poles{Function: w.String(), Radius: radius}
	if out.Zeros, err = series.ZerosInDisc(w, new(big.Rat), radius, opt); err != nil {
		return nil, err
	}
	for _, z := range out.Zeros.List {
		verdicts, err := r.judge(z, form, weight)
		if err != nil {
			return nil, err
		}
		out.List = append(out.List, Pole{z, verdicts})
	}
	if order > 0 {
		err = out.truncate(w, order, opt)
	}
	return out, err
}

// truncate adds the zeros that only the truncation has.
func (p *Poles) truncate(w series.Entire, order int, opt series.ZeroOptions) error {
	t, err := series.CompareTruncation(w, order, p.Radius, big.NewRat(1, 1000), opt)
	if err != nil {
		return err
	}
	p.TruncationOrder = order
	p.TruncationArtefacts = []series.Zero{}
	for _, z := range t.Polynomial.List {
		if z.Artefact {
			p.TruncationArtefacts = append(p.TruncationArtefacts, z)
		}
	}
	return nil
}

// numericW is W(s) = 1 + wF(s) Σ lₙsⁿ with the model's numbers, beside F and w.
func (r *Result) numericW() (w, form series.Entire, weight *big.Rat, err error) {
	f := r.FormFactor
	if form, err = r.entire(f.Form); err != nil {
		return w, form, nil, err
	}
	if weight, err = r.rational(f.Weight, "the weight of the form factor"); err != nil {
		return w, form, nil, err
	}
	var coefs []*big.Rat
	for _, l := range f.Powers {
		c, err := r.rational(l, "W")
		if err != nil {
			return w, form, nil, err
		}
		coefs = append(coefs, c.Mul(c, weight))
	}
	one := series.Polynomial(series.IntUniPoly(1))
	return series.Sum(one, series.Product(series.Polynomial(series.NewUniPoly(coefs...)), form)), form, weight, nil
}

// judge gives the verdicts on one zero.
func (r *Result) judge(z series.Zero, form series.Entire, weight *big.Rat) ([]PoleVerdict, error) {
	switch {
	case z.Cluster:
		return []PoleVerdict{Undecided}, nil
	case z.Multiplicity > 1 && !z.Real:
		return []PoleVerdict{MultiplePole, ComplexPair}, nil
	case z.Multiplicity > 1:
		return []PoleVerdict{MultiplePole}, nil
	case !z.Real:
		return []PoleVerdict{ComplexPair}, nil
	}
	out := []PoleVerdict{Undecided}
	d, err := form.Enclose(z.Re, new(big.Rat), z.Radius, 128, r.Model.K.Budget())
	if err != nil {
		return nil, err
	}
	if re, _ := d.Mid(); d.ExcludesZero() && z.Slope != 0 {
		if -z.Slope*re.Sign()*weight.Sign() > 0 {
			out[0] = Healthy
		} else {
			out[0] = GhostPole
		}
	}
	if new(big.Rat).Add(z.Re, z.Radius).Sign() < 0 {
		if r.onMinkowski() {
			out = append(out, Tachyon)
		} else {
			out = append(out, Growing)
		}
	}
	return out, nil
}

// onMinkowski reports whether the scale factor is constant.
func (r *Result) onMinkowski() bool {
	d, err := r.Model.A.D().Normal()
	return err == nil && d.Equal(field.Elem{})
}
