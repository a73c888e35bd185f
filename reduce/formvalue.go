package reduce

// A form factor with rational data: its definition, or the rule for its Taylor coefficients,
// with the model's numbers in the place of the constants.

import (
	"fmt"
	"math/big"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/parse"
	"remnant/parse/diag"
	"remnant/series"
)

// formReader reads a definition.
type formReader struct {
	m     *parse.Model
	bound string   // the bound name of a rule; "" in a definition
	n     *big.Rat // its value
}

// entire is the form factor as a function of s. It is refused where it is not defined, has a
// pole, or is of a form that is not read; remainders of a split are taken from their form
// factor.
func (r *Result) entire(f *parse.FormFactorDecl) (series.Entire, error) {
	read := &formReader{m: r.Model}
	if of, at, ok := f.Of(); ok {
		return r.remainder(of, at)
	}
	switch {
	case f.Definition != nil:
		return read.function(f.Definition)
	case f.Rule != nil:
		return read.rule(f)
	}
	return series.Entire{}, diag.List{{Kind: Undefined, Source: r.Model.Source, Span: f.Span,
		Summary: fmt.Sprintf("the form factor '%s' is free, and has no zeros to speak of", f.Name),
		Hint:    "a definition is needed: formfactor F(box) = (exp(-box) - 1)/box"}}
}

// remainder is Z with F(x) = F(r) + F′(r)(x − r) + (x − r)²Z(x).
func (r *Result) remainder(of *parse.FormFactorDecl, at field.Elem) (series.Entire, error) {
	f, err := r.entire(of)
	if err != nil {
		return f, err
	}
	p, err := r.rational(at, "the eigenvalue")
	if err != nil {
		return f, err
	}
	c, ok := f.Taylor(p, 2)
	if ok {
		f0, ok0 := c[0].Rat()
		f1, ok1 := c[1].Rat()
		if ok0 && ok1 {
			line := series.NewUniPoly(new(big.Rat).Sub(f0, new(big.Rat).Mul(p, f1)), f1)
			shift := series.NewUniPoly(new(big.Rat).Neg(p), big.NewRat(1, 1))
			rest := series.Sum(f, series.Polynomial(line.Scale(big.NewRat(-1, 1))))
			return series.Quotient(rest, shift.Mul(shift), r.Model.K.Budget())
		}
	}
	return f, r.refusePoles(fmt.Sprintf("the value of '%s' at %s is no rational number", of.Name, p.RatString()), "zeros are counted for rational data")
}

// rational is a constant of the model by its numbers.
func (r *Result) rational(e field.Elem, what string) (*big.Rat, error) {
	k := r.Model.K
	v, err := e.Substitute(func(g field.Gen) (field.Elem, bool) {
		for _, n := range r.Model.Numbers {
			if n.Gen == g {
				return n.Value, true
			}
		}
		for _, f := range r.Model.FormFactors {
			if n, at, ok := f.ValueOf(g); ok {
				if c, err := r.taylorValue(f, n, at); err == nil {
					return k.Rat(c), true
				}
			}
		}
		return field.Elem{}, false
	})
	if err != nil {
		return nil, r.refusePoles(what+" divides by zero for these numbers", "other numbers are needed")
	}
	if x, ok := v.Rat(); ok {
		return x, nil
	}
	if gens := v.Gens(); len(gens) > 0 {
		in := k.Info(gens[0])
		hint := "rational values are given so: numbers M = 1"
		if in.Kind == field.Function {
			hint = fmt.Sprintf("a constant value of a function of time is given as the initial one: numbers %s(0) = 1", in.Name)
		}
		return nil, r.refusePoles(fmt.Sprintf("a number is missing for '%s', which stands in %s", in.Name, what), hint)
	}
	return nil, r.refusePoles(what+" is no rational number", "rational values are given so: numbers M = 1")
}

// taylorValue is F.n(r) of a defined form factor at a rational point.
func (r *Result) taylorValue(f *parse.FormFactorDecl, n int, at field.Elem) (*big.Rat, error) {
	fn, err := r.entire(f)
	if err != nil {
		return nil, err
	}
	p := new(big.Rat)
	if !at.IsZero() {
		if p, err = r.rational(at, "the argument of "+f.Name); err != nil {
			return nil, err
		}
	}
	if c, ok := fn.Taylor(p, n+1); ok {
		if x, ok := c[n].Rat(); ok {
			return x, nil
		}
	}
	return nil, r.refusePoles(fmt.Sprintf("the value of '%s' there is no rational number", f.Name), "zeros are counted for rational data")
}

func (r *Result) refusePoles(summary, hint string) error {
	return diag.List{{Kind: Undefined, Source: r.Model.Source, Span: r.Model.LagrangianSpan, Summary: summary, Hint: hint}}
}

func (f *formReader) refuse(x parse.Expr, summary, hint string) error {
	return diag.List{{Kind: diag.NotYetSupported, Source: f.m.Source, Span: x.Span(), Summary: summary, Hint: hint}}
}

// quotientOf is a numerator over a polynomial.
type quotientOf struct {
	num series.Entire
	den series.UniPoly
}

func constant(x *big.Rat) quotientOf {
	return quotientOf{series.Polynomial(series.NewUniPoly(x)), series.IntUniPoly(1)}
}

// function is an expression in box; poles that do not cancel are refused with their place.
func (f *formReader) function(x parse.Expr) (series.Entire, error) {
	q, err := f.quotient(x)
	if err != nil {
		return series.Entire{}, err
	}
	out, err := series.Quotient(q.num, q.den, f.m.K.Budget())
	if err != nil {
		if _, stopped := err.(*budget.Stop); stopped {
			return out, err
		}
		return out, diag.List{{Kind: Undefined, Source: f.m.Source, Span: x.Span(),
			Summary: fmt.Sprintf("the form factor is not analytic: %v", err),
			Hint:    "a pole is made local by an auxiliary field: v with (box - p)[v] = u stands for (box - p)^-1[u], up to a choice of boundary condition"}}
	}
	return out, nil
}

func (f *formReader) quotient(x parse.Expr) (quotientOf, error) {
	switch n := x.(type) {
	case *parse.Number:
		return constant(n.Value), nil
	case *parse.Paren:
		return f.quotient(n.X)
	case *parse.Name:
		return f.name(n)
	case *parse.Sign:
		q, err := f.quotient(n.X)
		if n.Minus {
			q.num = q.num.Times(big.NewRat(-1, 1))
		}
		return q, err
	case *parse.Sum:
		return f.sum(n)
	case *parse.Product:
		return f.product(n)
	case *parse.Power:
		return f.power(n)
	case *parse.Call:
		return f.call(n)
	}
	return quotientOf{}, f.refuse(x, "this cannot stand in a form factor yet", "polynomials in box, their quotients and exp of them are read")
}

func (f *formReader) name(n *parse.Name) (quotientOf, error) {
	if n.Name == "box" {
		return quotientOf{series.Polynomial(series.IntUniPoly(0, 1)), series.IntUniPoly(1)}, nil
	}
	v, err := f.value(n)
	if err != nil {
		return quotientOf{}, err
	}
	return constant(v), nil
}

func (f *formReader) sum(n *parse.Sum) (quotientOf, error) {
	out := constant(new(big.Rat))
	for _, t := range n.Terms {
		q, err := f.quotient(t.X)
		if err != nil {
			return q, err
		}
		if t.Minus {
			q.num = q.num.Times(big.NewRat(-1, 1))
		}
		left := series.Product(out.num, series.Polynomial(q.den))
		right := series.Product(q.num, series.Polynomial(out.den))
		out = quotientOf{series.Sum(left, right), out.den.Mul(q.den)}
	}
	return out, nil
}

func (f *formReader) product(n *parse.Product) (quotientOf, error) {
	out := constant(big.NewRat(1, 1))
	for _, t := range n.Factors {
		q, err := f.quotient(t.X)
		if err != nil {
			return q, err
		}
		if t.Over {
			if q, err = f.inverse(q, t.X); err != nil {
				return q, err
			}
		}
		out = quotientOf{series.Product(out.num, q.num), out.den.Mul(q.den)}
	}
	return out, nil
}

// inverse is 1/q for a rational function q, or one times an exponential.
func (f *formReader) inverse(q quotientOf, x parse.Expr) (quotientOf, error) {
	p, g, ok := q.num.Structure()
	if !ok || p.IsZero() {
		return q, f.refuse(x, "this cannot stand in the denominator of a form factor yet", "polynomials in box and exponentials of them divide")
	}
	up := series.Product(series.Polynomial(q.den), series.Exp(g.Times(big.NewRat(-1, 1))))
	return quotientOf{up, p}, nil
}

func (f *formReader) power(n *parse.Power) (quotientOf, error) {
	e, err := f.value(n.Exponent)
	if err != nil {
		return quotientOf{}, err
	}
	if !e.IsInt() || !e.Num().IsInt64() || e.Num().Int64() > maxBoxPowers || e.Num().Int64() < -maxBoxPowers {
		return quotientOf{}, f.refuse(n.Exponent, "this exponent cannot stand in a form factor", fmt.Sprintf("whole exponents up to %d are read", maxBoxPowers))
	}
	base, err := f.quotient(n.Base)
	k := int(e.Num().Int64())
	if err == nil && k < 0 {
		base, err = f.inverse(base, n.Base)
		k = -k
	}
	if err != nil {
		return base, err
	}
	out := quotientOf{base.num.Pow(k), series.IntUniPoly(1)}
	for range k {
		out.den = out.den.Mul(base.den)
	}
	return out, nil
}

func (f *formReader) call(n *parse.Call) (quotientOf, error) {
	name, ok := n.Fun.(*parse.Name)
	if !ok || name.Name != "exp" || len(n.Args) != 1 {
		return quotientOf{}, f.refuse(n, "this function cannot stand in a form factor yet", "exp of a polynomial in box is read; others by their Taylor coefficients: formfactor F(box): F.n = …")
	}
	g, err := f.function(n.Args[0])
	if err != nil {
		return quotientOf{}, err
	}
	return quotientOf{series.Exp(g), series.IntUniPoly(1)}, nil
}

// value is an expression of numbers, constants and the bound name of a rule.
func (f *formReader) value(x parse.Expr) (*big.Rat, error) {
	switch n := x.(type) {
	case *parse.Number:
		return n.Value, nil
	case *parse.Paren:
		return f.value(n.X)
	case *parse.Name:
		if f.bound != "" && n.Name == f.bound {
			return f.n, nil
		}
		return f.number(n)
	case *parse.Sign:
		v, err := f.value(n.X)
		if err == nil && n.Minus {
			v = new(big.Rat).Neg(v)
		}
		return v, err
	case *parse.Sum:
		out := new(big.Rat)
		for _, t := range n.Terms {
			v, err := f.value(t.X)
			if err != nil {
				return nil, err
			}
			if t.Minus {
				v = new(big.Rat).Neg(v)
			}
			out.Add(out, v)
		}
		return out, nil
	case *parse.Product:
		out := big.NewRat(1, 1)
		for _, t := range n.Factors {
			v, err := f.value(t.X)
			if err != nil {
				return nil, err
			}
			if t.Over {
				if v.Sign() == 0 {
					return nil, f.refuse(t.X, "this is zero and cannot be divided by", "")
				}
				v = new(big.Rat).Inv(v)
			}
			out.Mul(out, v)
		}
		return out, nil
	case *parse.Power:
		return f.numericPower(n)
	case *parse.Factorial:
		v, err := f.value(n.X)
		if err != nil {
			return nil, err
		}
		if !v.IsInt() || v.Sign() < 0 || !v.Num().IsInt64() || v.Num().Int64() > 1<<14 {
			return nil, f.refuse(n, "the factorial of this is not taken", "a whole number that is not negative has one")
		}
		return new(big.Rat).SetInt(new(big.Int).MulRange(1, v.Num().Int64())), nil
	}
	return nil, f.refuse(x, "a rational number is expected here", "numbers, constants with a value, and their powers and factorials are read")
}

func (f *formReader) numericPower(n *parse.Power) (*big.Rat, error) {
	base, err := f.value(n.Base)
	if err != nil {
		return nil, err
	}
	e, err := f.value(n.Exponent)
	if err != nil {
		return nil, err
	}
	if !e.IsInt() || !e.Num().IsInt64() || e.Num().Int64() > 1<<14 || e.Num().Int64() < -1<<14 || e.Sign() < 0 && base.Sign() == 0 {
		return nil, f.refuse(n.Exponent, "this power is not taken", "whole exponents are read")
	}
	k := e.Num().Int64()
	if k < 0 {
		base, k = new(big.Rat).Inv(base), -k
	}
	p := big.NewInt(k)
	return new(big.Rat).SetFrac(new(big.Int).Exp(base.Num(), p, nil), new(big.Int).Exp(base.Denom(), p, nil)), nil
}

// number is the value that the model's numbers give to a constant.
func (f *formReader) number(n *parse.Name) (*big.Rat, error) {
	if g, ok := f.m.K.Lookup(n.Name); ok {
		for _, d := range f.m.Numbers {
			if d.Gen == g {
				if v, ok := d.Value.Rat(); ok {
					return v, nil
				}
			}
		}
	}
	return nil, diag.List{{Kind: Undefined, Source: f.m.Source, Span: n.Span(),
		Summary: fmt.Sprintf("a number is missing for '%s'", n.Text), Hint: "rational values are given so: numbers " + n.Name + " = 1"}}
}

// rule is the function of a rule F.n = c·rⁿ·(…)/(an + b)!…, whose growth is read off: with
// (an + b)! ≥ (n!)ᵃ the coefficients are at most |c|·|r|ⁿ/(n!)^Σa.
func (f *formReader) rule(d *parse.FormFactorDecl) (series.Entire, error) {
	bound := d.Rule.Bound.Name()
	g, err := f.growth(d.Rule.Value.X, bound)
	if err != nil {
		return series.Entire{}, err
	}
	coef := func(n int) *big.Rat {
		v, err := (&formReader{f.m, bound, new(big.Rat).SetInt64(int64(n))}).value(d.Rule.Value.X)
		if err != nil {
			panic(err) // growth read every part of it
		}
		return v
	}
	return series.Rule(d.Name, coef, g)
}

// growth bounds the coefficients of a rule.
func (f *formReader) growth(x parse.Expr, bound string) (series.Growth, error) {
	g := series.Growth{C: big.NewRat(1, 1), R: big.NewRat(1, 1), Q: 1}
	if err := f.growthOf(parse.Operand{X: x}, bound, &g); err != nil {
		return g, err
	}
	if g.P == 0 {
		return g, f.refuse(x, "these coefficients do not fall as those of an entire function", "a factorial such as (2*n+1)! divides them")
	}
	return g, nil
}

func (f *formReader) growthOf(t parse.Operand, bound string, g *series.Growth) error {
	switch n := unwrap(t.X).(type) {
	case *parse.Sign:
		return f.growthOf(parse.Operand{Over: t.Over, X: n.X}, bound, g)
	case *parse.Product:
		for _, part := range n.Factors {
			part.Over = part.Over != t.Over
			if err := f.growthOf(part, bound, g); err != nil {
				return err
			}
		}
		return nil
	case *parse.Factorial:
		a, b, ok := f.linear(n.X, bound)
		if !t.Over || !ok || a < 1 || b < 0 {
			return f.refuse(t.X, "the growth of this is not known", "a factorial (a*n + b)! divides, with whole a ≥ 1 and b ≥ 0")
		}
		g.P += a
		return nil
	case *parse.Power:
		a, b, ok := f.linear(n.Exponent, bound)
		if ok && a != 0 {
			base, err := (&formReader{m: f.m}).value(n.Base)
			if err != nil {
				return err
			}
			base = new(big.Rat).Abs(base)
			if t.Over != (a < 0) {
				if base.Sign() == 0 {
					return f.refuse(n.Base, "this is zero and cannot be divided by", "")
				}
				base = new(big.Rat).Inv(base)
			}
			for range max(a, -a) {
				g.R = new(big.Rat).Mul(g.R, base)
			}
			return f.scale(n, b, t.Over, g)
		}
	}
	v, err := (&formReader{m: f.m}).value(t.X)
	if err != nil {
		return err
	}
	v = new(big.Rat).Abs(v)
	if t.Over {
		if v.Sign() == 0 {
			return f.refuse(t.X, "this is zero and cannot be divided by", "")
		}
		v = new(big.Rat).Inv(v)
	}
	g.C = new(big.Rat).Mul(g.C, v)
	return nil
}

// scale multiplies the bound by |base|^b of a power base^(an + b).
func (f *formReader) scale(n *parse.Power, b int, over bool, g *series.Growth) error {
	base, err := (&formReader{m: f.m}).value(n.Base)
	if err != nil {
		return err
	}
	base = new(big.Rat).Abs(base)
	if over {
		b = -b
	}
	if b < 0 {
		if base.Sign() == 0 {
			return f.refuse(n.Base, "this is zero and cannot be divided by", "")
		}
		base, b = new(big.Rat).Inv(base), -b
	}
	for range b {
		g.C = new(big.Rat).Mul(g.C, base)
	}
	return nil
}

func unwrap(x parse.Expr) parse.Expr {
	if p, ok := x.(*parse.Paren); ok {
		return unwrap(p.X)
	}
	return x
}

// linear reads an + b with small whole numbers, by the values at n = 0, 1 and 2.
func (f *formReader) linear(x parse.Expr, bound string) (a, b int, ok bool) {
	at := func(n int64) (*big.Rat, bool) {
		v, err := (&formReader{f.m, bound, big.NewRat(n, 1)}).value(x)
		return v, err == nil && v.IsInt() && v.Num().IsInt64() && v.Num().CmpAbs(big.NewInt(1000)) < 0
	}
	v0, ok0 := at(0)
	v1, ok1 := at(1)
	v2, ok2 := at(2)
	if !ok0 || !ok1 || !ok2 {
		return 0, 0, false
	}
	a = int(v1.Num().Int64() - v0.Num().Int64())
	return a, int(v0.Num().Int64()), int(v2.Num().Int64()) == 2*a+int(v0.Num().Int64())
}
