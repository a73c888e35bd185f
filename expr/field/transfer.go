package field

// Elements of one field evaluated in another: every generator is given a value there.

import (
	"math/big"

	"remnant/expr/poly"
)

// Transfer is the value in f of the element e of another field, whose generators take the
// values that at gives. It fails with *ErrZeroDivisor, naming the factor's value, where the
// denominator becomes zero.
func (f *Field) Transfer(e Elem, at func(Gen) Elem) (Elem, error) {
	if e.f == nil {
		return e, nil
	}
	e = e.live()
	num := f.evaluate(e.num, at)
	if num.IsZero() {
		return num, nil
	}
	if e.den.int != nil {
		num = num.Mul(f.Rat(new(big.Rat).SetFrac(big.NewInt(1), e.den.int)))
	}
	for _, p := range e.den.pow {
		q := f.evaluate(e.f.factors[p.id].p, at)
		if q.IsZero() {
			return Elem{}, &ErrZeroDivisor{q}
		}
		num = num.Mul(q.Pow(-int(p.exp)))
	}
	return num, nil
}

// evaluate is a polynomial at elements of f, by Horner's rule in one variable after the
// other; the coefficients of a variable are added over a common denominator.
func (f *Field) evaluate(p poly.Poly, at func(Gen) Elem) Elem {
	vars := p.Vars()
	if len(vars) == 0 {
		c, _ := p.Const()
		return f.Rat(new(big.Rat).SetInt(c))
	}
	v := vars[0]
	x := at(v)
	var out Elem
	c := p.CoeffsIn(v)
	for i := len(c) - 1; i >= 0; i-- {
		out = out.Mul(x)
		if !c[i].IsZero() {
			out = out.Add(f.evaluate(c[i], at))
		}
	}
	return out
}
