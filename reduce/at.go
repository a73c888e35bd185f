package reduce

// Values at a point. Every generator that stands in a result is replaced by the number that
// the point, the model's numbers or the definition of a function give it. All is exact: a
// value is made of rational numbers, π, roots and elementary functions of these.
//
// A value given for what a background relation or a definition fixes is checked against it;
// a known name that no result needs is passed over; what is needed and not given is named.
// A point at which an assumption of the reduction fails, or a declared sign, is refused.

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/parse/diag"
)

// Refusals of a point.
const (
	// PointTwice: one name with two values. A test makes the example.
	PointTwice diag.Kind = "two values for one name"
	// PointSign: a value against a declared sign. A test makes the example.
	PointSign diag.Kind = "value against a declared sign"
	// PointDisagrees: a value against what fixes it. A test makes the example.
	PointDisagrees diag.Kind = "value against a relation"
	// PointMissing: a name without a value. A test makes the example.
	PointMissing diag.Kind = "value missing"
	// PointSingular: a point where an assumption fails. A test makes the example.
	PointSingular diag.Kind = "assumption fails at the point"
)

// Values holds the result at a point: what Result holds, with numbers for all quantities.
type Values struct {
	Point   []parse.Assignment
	Single  *Single
	Several *Several
}

// At evaluates the result at the point that src describes. Refusals are a diag.List; a
// limit or an interruption is a *budget.Stop.
func (r *Result) At(src *diag.Source) (v *Values, err error) {
	defer budget.Catch(&err)
	r.Model.K.Budget().Stage("evaluating the result at the point")
	given, err := r.Model.Point(src)
	if err != nil {
		return nil, err
	}
	p := &point{r: r, k: r.Model.K, src: src, values: map[field.Gen]field.Elem{}}
	for _, step := range []func([]parse.Assignment) error{p.take, p.check, p.holds} {
		if err := step(given); err != nil {
			return nil, err
		}
	}
	v = &Values{Point: given}
	if r.Single != nil {
		v.Single = p.single(r.Single)
	}
	if r.Several != nil {
		v.Several = p.several(r.Several)
	}
	if p.fault != nil {
		return nil, p.fault
	}
	if len(p.missing) > 0 {
		return nil, diag.List{{Kind: PointMissing, Summary: src.Name + ": the point gives no value for " + strings.Join(p.missing, ", ")}}
	}
	return v, nil
}

// point is what is known at a point.
type point struct {
	r       *Result
	k       *field.Field
	src     *diag.Source
	values  map[field.Gen]field.Elem
	missing []string // needed and not given, in the order of need
	fault   error    // the first
}

func (p *point) refuse(kind diag.Kind, at diag.Span, summary, hint string) error {
	return diag.List{{Kind: kind, Source: p.src, Span: at, Summary: summary, Hint: hint}}
}

// take records the values; those of the point come before the model's numbers.
func (p *point) take(given []parse.Assignment) error {
	for _, a := range given {
		if _, twice := p.values[a.Gen]; twice {
			return p.refuse(PointTwice, a.Span, fmt.Sprintf("'%s' is given twice", a.Name), "one value is allowed")
		}
		if want := p.k.Info(a.Gen).Sign; want != field.Unknown && (a.Value.IsZero() || a.Value.Sign() == -want) {
			word := map[field.Sign]string{field.Positive: "positive", field.Negative: "negative"}[want]
			return p.refuse(PointSign, a.Span, fmt.Sprintf("'%s' is %s in this model", a.Name, word), "a "+word+" value is expected")
		}
		p.values[a.Gen] = a.Value
	}
	for _, n := range p.r.Model.Numbers {
		if _, ok := p.values[n.Gen]; !ok && !n.Initial {
			p.values[n.Gen] = n.Value
		}
	}
	return nil
}

// check compares the values given for fixed quantities with what fixes them.
func (p *point) check(given []parse.Assignment) error {
	for _, a := range given {
		fixed, by := p.k.Gen(a.Gen), "the background relations"
		if fixed.Equal(p.k.Raw(a.Gen)) {
			def, ok, err := p.defined(a.Gen)
			if err != nil {
				return err
			}
			if !ok {
				continue
			}
			fixed, by = def, "its definition"
		}
		name := show.Notation(show.Elem(fixed))
		v, missing, err := p.eval(fixed)
		switch {
		case err != nil:
			return p.refuse(PointSingular, a.Span, fmt.Sprintf("'%s' cannot be checked: %v", a.Name, err), "by "+by+" it is "+name)
		case len(missing) > 0:
			return p.refuse(PointMissing, a.Span, fmt.Sprintf("'%s' cannot be checked without a value for %s", a.Name, strings.Join(missing, ", ")), "by "+by+" it is "+name)
		case !v.Equal(a.Value):
			return p.refuse(PointDisagrees, a.Span, fmt.Sprintf("'%s' disagrees with %s", a.Name, by),
				"here it is "+name+" = "+show.Notation(show.Elem(v)))
		}
	}
	return nil
}

// holds refuses a point at which an assumption of the reduction fails.
func (p *point) holds([]parse.Assignment) error {
	for _, a := range p.r.Assumptions {
		v, missing, err := p.eval(a.Factor)
		if err != nil || len(missing) > 0 {
			continue
		}
		if v.IsZero() || a.Positive && v.Sign() == field.Negative {
			op := " != 0"
			if a.Positive {
				op = " > 0"
			}
			return p.refuse(PointSingular, diag.Span{}, "the reduction assumes "+show.Notation(show.Elem(a.Factor))+op,
				"this is "+show.Notation(show.Elem(v))+" at the point")
		}
	}
	return nil
}

// eval is the number that e is at the point, or the names that it lacks.
func (p *point) eval(e field.Elem) (v field.Elem, missing []string, err error) {
	var inner error
	v, err = e.Substitute(func(g field.Gen) (field.Elem, bool) {
		if x, ok := p.values[g]; ok {
			return x, true
		}
		def, ok, err := p.defined(g)
		if err != nil {
			inner = err
		}
		if !ok || err != nil {
			return field.Elem{}, false
		}
		x, lacks, err := p.eval(def)
		missing = append(missing, lacks...)
		if err != nil {
			inner = err
		}
		return x, err == nil && len(lacks) == 0
	})
	if err == nil {
		err = inner
	}
	if err != nil {
		return field.Elem{}, nil, p.explain(err)
	}
	for _, g := range v.Gens() {
		if !p.isNumber(g) && len(missing) == 0 {
			missing = p.lacking(v)
		}
	}
	slices.Sort(missing)
	return v.Lowest(), slices.Compact(missing), nil
}

// lacking names the generators of e that are no numbers.
func (p *point) lacking(e field.Elem) []string {
	var out []string
	for _, g := range e.Gens() {
		if p.isNumber(g) {
			continue
		}
		if in := p.k.Info(g); in.Kind == field.Root || in.Kind == field.Elementary {
			out = append(out, p.lacking(in.Arg)...)
			continue
		}
		out = append(out, show.Notation(show.Generator(p.k, g)))
	}
	return out
}

// isNumber reports whether g stands for a real number: π, or a function of numbers.
func (p *point) isNumber(g field.Gen) bool {
	in := p.k.Info(g)
	switch in.Kind {
	case field.Constant:
		return in.Name == "pi"
	case field.Root, field.Elementary:
		return !slices.ContainsFunc(in.Arg.Gens(), func(h field.Gen) bool { return !p.isNumber(h) })
	}
	return false
}

func (p *point) explain(err error) error {
	var zero *field.ErrZeroDivisor
	if errors.As(err, &zero) {
		return fmt.Errorf("it divides by %s, which is zero at the point", show.Notation(show.Elem(zero.Factor)))
	}
	return err
}

// number evaluates one quantity of the result.
func (p *point) number(e field.Elem) field.Elem {
	v, missing, err := p.eval(e)
	if err != nil && p.fault == nil {
		p.fault = p.refuse(PointSingular, diag.Span{}, "the result has no value here: "+err.Error(), "another point is expected")
	}
	for _, m := range missing {
		if !slices.Contains(p.missing, m) {
			p.missing = append(p.missing, m)
		}
	}
	return v
}

func (p *point) optional(e *field.Elem) *field.Elem {
	if e == nil {
		return nil
	}
	v := p.number(*e)
	return &v
}

func (p *point) list(es []field.Elem) []field.Elem {
	if es == nil {
		return nil
	}
	out := make([]field.Elem, len(es))
	for i, e := range es {
		out[i] = p.number(e)
	}
	return out
}

func (p *point) single(s *Single) *Single {
	return &Single{
		Q:       p.list(s.Q),
		Kinetic: p.optional(s.Kinetic), Gradient: p.optional(s.Gradient), Mass: p.optional(s.Mass),
		SoundSpeed2: p.optional(s.SoundSpeed2), GrowthInK: s.GrowthInK,
		EquationOfMotion: p.motion(s),
		ZSquared:         p.optional(s.ZSquared), ZppOverZ: p.pump(s),
	}
}

// motion divides the coefficients of the equation of motion at the point, so that it does
// not matter whether the result writes their quotients out.
func (p *point) motion(s *Single) []field.Elem {
	if s.EquationOfMotion != nil || len(s.Q) == 0 {
		return p.list(s.EquationOfMotion)
	}
	a := oper.FromNormalForm(s.Q)
	out := make([]field.Elem, a.Order()+1)
	for i := range out {
		out[i] = p.number(a.Coef(i))
	}
	lead := out[a.Order()]
	for i := range out {
		out[i] = p.quotient(out[i], lead)
	}
	return out
}

// pump is z″/z from z² and its derivatives by dη = (N̄/a)dτ at the point.
func (p *point) pump(s *Single) *field.Elem {
	if s.ZppOverZ != nil || s.ZSquared == nil {
		return p.optional(s.ZppOverZ)
	}
	rate := p.r.Model.A.Div(p.r.Model.Lapse)
	d1 := s.ZSquared.D().Mul(rate)
	z2, z2p, z2pp := p.number(*s.ZSquared), p.number(d1), p.number(d1.D().Mul(rate))
	log := p.quotient(z2p, z2)
	out := p.quotient(z2pp, z2).Scale(1, 2).Sub(log.Mul(log).Scale(1, 4)).Lowest()
	return &out
}

// quotient divides numbers; a divisor that vanishes is a fault of the point.
func (p *point) quotient(a, b field.Elem) field.Elem {
	if b.IsZero() {
		if p.fault == nil && len(p.missing) == 0 {
			p.fault = p.refuse(PointSingular, diag.Span{}, "the result has no value here: its kinetic coefficient vanishes", "another point is expected")
		}
		return b
	}
	return a.Div(b).Lowest()
}

func (p *point) several(s *Several) *Several {
	out := &Several{SoundSpeeds: p.list(s.SoundSpeeds), Minors: p.list(s.Minors)}
	matrices := func(in [][][]field.Elem) [][][]field.Elem {
		all := make([][][]field.Elem, len(in))
		for n, m := range in {
			for _, row := range m {
				all[n] = append(all[n], p.list(row))
			}
		}
		return all
	}
	out.Form.Symmetric, out.Form.Antisymmetric = matrices(s.Form.Symmetric), matrices(s.Form.Antisymmetric)
	return out
}
