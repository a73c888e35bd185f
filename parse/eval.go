package parse

import (
	"fmt"
	"math/big"
	"slices"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// The value of an expression: a form. Everything is exact; primes and commas act on whole
// brackets by Leibniz' rule; what divides holds no perturbation, is not zero modulo the
// relations, and is recorded where it could vanish.

// Limits on what an expression may ask for.
const (
	maxOrder = 32     // of a derivative
	maxBits  = 200000 // of a power's coefficients
)

// value evaluates an expression whose indices are all summed.
func (e *elaborator) value(x Expr) form {
	e.checkIndices(x)
	return e.eval(x)
}

// background evaluates an expression that may hold no perturbation.
func (e *elaborator) background(x Expr, what string) field.Elem {
	f := e.value(x)
	v, ok := f.elem()
	if !ok {
		at := x.Span()
		for _, t := range f.terms {
			if t.degree > 0 {
				at = t.at
				break
			}
		}
		panic(newFault(diag.NotBackground, at, fmt.Sprintf("'%s' is a perturbation and cannot stand in %s", e.quote(at), what), "constants and functions of time stand here"))
	}
	return v
}

func (e *elaborator) eval(x Expr) form {
	switch n := x.(type) {
	case *Number:
		return background(e.k.Rat(n.Value), n.At)
	case *Name:
		return e.evalName(n)
	case *Paren:
		return e.eval(n.X)
	case *Sign:
		f := e.eval(n.X)
		if n.Minus {
			f = f.scale(e.k.Int(-1))
		}
		return f
	case *Sum:
		return e.evalSum(n)
	case *Product:
		return e.evalProduct(n)
	case *Power:
		return e.evalPower(n)
	case *Factorial:
		return e.evalFactorial(n)
	case *Prime:
		return e.evalPrime(n)
	case *Deriv:
		return e.evalDeriv(n)
	case *Index:
		return e.evalIndexed(n)
	case *Call:
		return e.evalCall(n)
	case *Apply:
		return e.apply(n.Operator, e.eval(n.X))
	}
	panic("parse: unknown node in a tree")
}

func (e *elaborator) evalName(n *Name) form {
	for _, f := range elementaryNames {
		if n.Name == f {
			panic(newFault(diag.WrongArguments, n.At, fmt.Sprintf("'%s' needs an argument", n.Text), "the form is: "+n.Text+"(x)"))
		}
	}
	if v, ok := e.bound[n.Name]; ok {
		return background(v, n.At)
	}
	if _, ok := e.symbols[n.Name]; !ok && n.Name == "X" {
		if phi, ok := e.symbols["phi"]; ok && phi.kind == symbolBackground {
			e.lookup(&Name{n.node, n.Text, "phi"})
			return background(e.kineticOf(phi.gen), n.At)
		}
	}
	s := e.lookup(n)
	switch s.kind {
	case symbolConstant, symbolBackground:
		return background(e.k.Gen(s.gen), n.At)
	case symbolFunction:
		return background(e.k.FuncJet(s.fn.Fn, make([]int, len(s.args))), n.At)
	case symbolField:
		return perturbation(e.k, s.index, n.At)
	case symbolLet:
		return e.letValue(s).standing(n.At)
	case symbolFormFactor:
		panic(e.formFactor(n))
	}
	switch n.Name {
	case "k":
		return background(e.model.Wavenumber, n.At)
	case "pi":
		return background(e.constantPi(), n.At)
	case "t":
		return background(e.k.Gen(e.time()), n.At)
	}
	panic(newFault(diag.OperatorAlone, n.At, "'"+n.Text+"' has nothing to act on", "what an operator acts on follows in square brackets: box[zeta]"))
}

func (e *elaborator) formFactor(x Expr) *fault {
	return newFault(diag.NotYetSupported, x.Span(), fmt.Sprintf("'%s' is a form factor, which is not yet supported", brief(x)), "powers of box can be used: box^2[zeta]")
}

// evalIndexed is the Taylor coefficient of a form factor; nothing else takes a dot here.
func (e *elaborator) evalIndexed(n *Index) form {
	if v, ok := e.formValue(n); ok {
		return background(v, n.At)
	}
	panic(e.indexed(n))
}

func (e *elaborator) indexed(n *Index) *fault {
	if name, ok := n.X.(*Name); ok {
		if s := e.symbols[name.Name]; s != nil && s.kind == symbolFormFactor {
			return e.formFactor(n)
		}
		if _, ok := e.symbols[name.Name]; !ok {
			return e.unknown(name)
		}
	}
	return newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' is no tensor: it takes no indices after a dot", brief(n.X)), "a space derivative is written with a comma: zeta,i")
}

// letValue is what an abbreviation stands for. While relations are being added it is
// computed afresh each time.
func (e *elaborator) letValue(s *symbol) form {
	if s.value != nil {
		return *s.value
	}
	src, anywhere := e.src, e.anywhere
	defer func() { e.src, e.anywhere = src, anywhere }()
	e.src, e.anywhere = e.model.Source, false // it stands in the file, below what it is made of
	f := e.value(s.let.Value.X)
	if e.related {
		s.value = &f
	}
	return f
}

func (e *elaborator) evalSum(n *Sum) form {
	var c collector
	for _, t := range n.Terms {
		f := e.eval(t.X)
		if t.Minus {
			f = f.scale(e.k.Int(-1))
		}
		c.addForm(f)
	}
	e.k.Budget().Check(len(c.terms))
	return c.form()
}

func (e *elaborator) evalProduct(n *Product) form {
	f := e.eval(n.Factors[0].X)
	for _, o := range n.Factors[1:] {
		if o.Over {
			f = f.scale(e.divisor(o.X, "the model divides by it"))
			continue
		}
		f = e.mul(f, e.eval(o.X), n.At)
		e.k.Budget().Check(len(f.terms))
	}
	return f.placed(n.At)
}

func (e *elaborator) mul(f, g form, at diag.Span) form {
	product, high := f.mul(g, at)
	if high != nil {
		panic(e.wrongOrder(high.degree, high.at))
	}
	return product
}

// divisor evaluates what is divided by and returns its inverse.
func (e *elaborator) divisor(x Expr, why string) field.Elem {
	v, ok := e.eval(x).elem()
	if !ok {
		panic(newFault(diag.DivideByField, x.Span(), fmt.Sprintf("'%s' holds a perturbation and cannot be divided by", brief(x)), "a Lagrangian is divided by constants and functions of time only"))
	}
	return e.inverse(v, x, why)
}

func (e *elaborator) inverse(v field.Elem, x Expr, why string) field.Elem {
	if v.IsZero() {
		panic(newFault(diag.DivideByZero, x.Span(), fmt.Sprintf("'%s' is zero and cannot be divided by", brief(x)), e.zeroHint(x)))
	}
	e.k.AssumeNonzero(v, why)
	return v.Inv()
}

// zeroHint says by which relation x is zero, where there is one to name.
func (e *elaborator) zeroHint(x Expr) string {
	if g, ok := e.symbolGen(x); ok {
		for _, r := range e.k.Rules() {
			if r.Leader == g && len(r.Sources) > 0 {
				return "it vanishes by the relation " + e.model.Relations[slices.Max(r.Sources)].Text
			}
		}
	}
	return "it vanishes by the background relations, or by itself"
}

// evalPower raises to a rational power; perturbations to a whole one.
func (e *elaborator) evalPower(n *Power) form {
	base := e.eval(n.Base)
	r := e.exponent(n.Exponent)
	v, isBackground := base.elem()
	if !isBackground {
		return e.powerOfForm(base, r, n)
	}
	e.limitPower(r.Num(), n)
	p := int(r.Num().Int64())
	if p < 0 {
		e.inverse(v, n.Base, "the model divides by it")
	}
	if q := r.Denom(); !q.IsInt64() || q.Int64() > 2 {
		panic(newFault(diag.NotYetSupported, n.Exponent.Span(), "roots other than square roots are not yet supported", "an exponent is a whole number or a half of one"))
	} else if q.Int64() == 2 {
		root, err := e.k.Sqrt(v)
		if err != nil {
			panic(domainFault(err, n.At))
		}
		v = root
	}
	e.limitSize(v, p, n)
	return background(v.Pow(p), n.At)
}

// exponent evaluates an exponent to a rational number.
func (e *elaborator) exponent(x Expr) *big.Rat {
	v, ok := e.eval(x).elem()
	if ok {
		if r, ok := v.Rat(); ok {
			return r
		}
	}
	panic(newFault(diag.BadExponent, x.Span(), fmt.Sprintf("'%s' is no rational number", brief(x)), "an exponent is a whole number or a fraction such as (3/2)"))
}

func (e *elaborator) limitPower(p *big.Int, n *Power) {
	if p.CmpAbs(big.NewInt(maxExponent)) > 0 {
		panic(newFault(diag.ExponentTooLarge, n.Exponent.Span(), fmt.Sprintf("the exponent '%s' is too large", brief(n.Exponent)), "exponents up to 1000 are read"))
	}
}

// limitSize refuses powers of powers that only grow, before they do.
func (e *elaborator) limitSize(v field.Elem, p int, n *Power) {
	if p < 0 {
		p = -p
	}
	if p < 2 || v.IsZero() {
		return
	}
	bits := max(v.Num().LeadCoef().BitLen(), v.DenInt().BitLen())
	degree := v.Num().TotalDegree()
	if _, isName := n.Base.(*Name); !isName {
		degree = max(degree, v.Den().TotalDegree())
	}
	if bits*p > maxBits || degree*p > maxBits {
		panic(newFault(diag.ExponentTooLarge, n.At, "the power is too large", "powers of powers multiply their exponents"))
	}
}

func (e *elaborator) powerOfForm(base form, r *big.Rat, n *Power) form {
	if !r.IsInt() || r.Sign() < 0 {
		if r.Sign() < 0 {
			panic(newFault(diag.DivideByField, n.Base.Span(), fmt.Sprintf("'%s' holds a perturbation and cannot be divided by", brief(n.Base)), "a Lagrangian is divided by constants and functions of time only"))
		}
		panic(newFault(diag.BadExponent, n.Exponent.Span(), "a perturbation has whole powers only", "every term of a quadratic Lagrangian is of order 2"))
	}
	e.limitPower(r.Num(), n)
	p := int(r.Num().Int64())
	if low, _ := base.degrees(); low*p > 2 {
		panic(e.wrongOrder(low*p, n.At))
	}
	out := background(e.k.Int(1), n.At)
	for range p {
		out = e.mul(out, base, n.At)
	}
	return out.placed(n.At)
}

func (e *elaborator) evalFactorial(n *Factorial) form {
	v, ok := e.eval(n.X).elem()
	if ok {
		if r, ok := v.Rat(); ok && r.IsInt() && r.Sign() >= 0 {
			if r.Num().Cmp(big.NewInt(maxExponent)) > 0 {
				panic(newFault(diag.ExponentTooLarge, n.At, "the factorial is too large", "factorials up to 1000! are read"))
			}
			product := new(big.Int).MulRange(1, r.Num().Int64())
			return background(e.k.Rat(new(big.Rat).SetInt(product)), n.At)
		}
	}
	panic(newFault(diag.BadExponent, n.X.Span(), fmt.Sprintf("'%s' is no whole number", brief(n.X)), "a factorial is taken of a whole number"))
}

func (e *elaborator) limitOrder(n int, at diag.Span) {
	if n > maxOrder {
		panic(newFault(diag.OrderTooHigh, at, fmt.Sprintf("a derivative of order %d is too high", n), "derivatives up to order 32 are read"))
	}
}

func (e *elaborator) evalPrime(n *Prime) form {
	f := e.eval(n.X)
	e.limitOrder(n.Count, n.At)
	for range n.Count {
		f = f.dt()
		e.limitJets(f, n.At)
	}
	return f.placed(n.At)
}

// placed returns f with a single term pointing at the whole expression.
func (f form) placed(at diag.Span) form {
	if len(f.terms) == 1 {
		t := f.terms[0]
		t.at = at
		return form{[]formTerm{t}}
	}
	return f
}

// standing returns f with all terms pointing at one place: an abbreviation is refused
// where it is used.
func (f form) standing(at diag.Span) form {
	terms := slices.Clone(f.terms)
	for i := range terms {
		terms[i].at = at
	}
	return form{terms}
}

func (e *elaborator) limitJets(f form, at diag.Span) {
	for _, t := range f.terms {
		e.limitOrder(max(t.u.Time, t.v.Time, t.u.Space, t.v.Space), at)
	}
	e.k.Budget().Check(len(f.terms))
}

// evalDeriv differentiates a function by an argument, or a perturbation by space.
func (e *elaborator) evalDeriv(n *Deriv) form {
	if n.Mark == ";" {
		panic(newFault(diag.NoMeaning, n.At, "a covariant derivative has no meaning in a quadratic Lagrangian", "a space derivative is written with a comma: zeta,i"))
	}
	if e.byArgument(n) {
		s, index := e.partial(n)
		return background(e.k.FuncJet(s.fn.Fn, index), n.At)
	}
	f := e.eval(n.X)
	for _, r := range n.Label.Text {
		if !isIndexLetter(r) {
			panic(e.notAnIndex(n))
		}
	}
	if _, high := f.degrees(); high == 0 && len(f.terms) > 0 {
		panic(newFault(diag.SpaceOfBackground, n.Label.At, fmt.Sprintf("'%s' depends on time alone and cannot be differentiated by '%s'", brief(n.X), n.Label.Text), "perturbations have space derivatives"))
	}
	for range n.Label.Text {
		f = f.dx()
		e.limitJets(f, n.At)
	}
	return f.placed(n.At)
}

// notAnIndex refuses a label that is neither an argument nor made of index letters.
func (e *elaborator) notAnIndex(n *Deriv) *fault {
	hint := "indices over space are the letters i to n and p to s"
	if s := e.functionOf(n.X); s != nil {
		hint = fmt.Sprintf("the arguments of %s are: ", s.name)
		for i, a := range s.fn.Fn.ArgNames {
			if i > 0 {
				hint += ", "
			}
			hint += a
		}
	}
	return newFault(diag.NotAnIndex, n.Label.At, fmt.Sprintf("'%s' cannot be differentiated by '%s'", brief(n), n.Label.Text), hint)
}
