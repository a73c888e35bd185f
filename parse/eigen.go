package parse

import (
	"fmt"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// Eigenfunction is a relation box[O] = r₁O + r₂ for a scalar O on the background, with
// constants r₁ and r₂.
type Eigenfunction struct {
	Scalar Tensor // R or a scalar field
	R1, R2 field.Elem
	Span   diag.Span
}

// eigenfunction reads given box[O] = r1*O + r2 and adds the relation that it is on the
// background.
func (e *elaborator) eigenfunction(s *Statement, left *Apply) {
	if e.form != "covariant" {
		panic(newFault(diag.WrongForm, left.At, "a relation for box belongs to the covariant form", "relations for functions of time and their derivatives are read"))
	}
	if n, ok := left.Operator.(*Name); !ok || n.Name != "box" {
		panic(newFault(diag.NotYetSupported, left.Operator.Span(), "a relation for this operator is not yet supported", "the form is: given box[R] = r1*R + r2"))
	}
	scalar := e.tensor(left.X)
	value, ok := e.onBackground(scalar)
	if !ok {
		panic(newFault(diag.NotYetSupported, left.X.Span(), fmt.Sprintf("box of '%s' cannot be related yet", brief(left.X)), "R or a scalar field stands in the brackets"))
	}
	r1, r2, ok := e.linearIn(e.tensor(s.Given.Right.X), scalar)
	if !ok {
		panic(newFault(diag.Unsolvable, s.Given.Right.X.Span(), fmt.Sprintf("this is not linear in '%s' with constant coefficients", brief(left.X)), "the form is: given box[R] = r1*R + r2"))
	}
	e.model.Eigenfunctions = append(e.model.Eigenfunctions, Eigenfunction{scalar, r1, r2, s.At})
	e.model.Relations = append(e.model.Relations, RelationDecl{Text: String(left) + " = " + String(s.Given.Right.X), Span: s.At})
	rest := e.backgroundBox(value).Sub(r1.Mul(value)).Sub(r2)
	if err := e.k.Relate(rest, len(e.model.Relations)-1); err != nil {
		panic(e.relationFault(err, s.At))
	}
}

// onBackground is the background value of R or of a scalar field.
func (e *elaborator) onBackground(t Tensor) (field.Elem, bool) {
	switch n := t.(type) {
	case *TensorScalar:
		return e.k.Gen(n.Field), true
	case *TensorCurvature:
		if n.Name == "R" {
			return e.ricci(n.At), true
		}
	}
	return field.Elem{}, false
}

// backgroundBox is □̄u = −(N̄a³)⁻¹ D(a³N̄⁻¹ D u) of a function of time.
func (e *elaborator) backgroundBox(u field.Elem) field.Elem {
	m := e.model
	a3 := m.A.Pow(3)
	return a3.Div(m.Lapse).Mul(u.D()).D().Div(m.Lapse.Mul(a3)).Neg()
}

// linearIn writes t as r₁·O + r₂ with constants; false if it is not of that form.
func (e *elaborator) linearIn(t, scalar Tensor) (r1, r2 field.Elem, ok bool) {
	switch n := t.(type) {
	case *TensorValue:
		return field.Elem{}, n.Value, true
	case *TensorSum:
		for _, s := range n.Terms {
			a, b, ok := e.linearIn(s, scalar)
			if !ok {
				return r1, r2, false
			}
			r1, r2 = r1.Add(a), r2.Add(b)
		}
		return r1, r2, true
	case *TensorProduct:
		r2 = e.k.Int(1)
		for _, f := range n.Factors {
			a, b, ok := e.linearIn(f, scalar)
			if !ok || !a.IsZero() && !r1.IsZero() {
				return r1, r2, false
			}
			r1, r2 = r1.Mul(b).Add(r2.Mul(a)), r2.Mul(b)
		}
		return r1, r2, true
	}
	return e.k.Int(1), field.Elem{}, SameScalar(t, scalar)
}

// SameScalar reports whether two nodes are the same scalar, R or a field.
func SameScalar(a, b Tensor) bool {
	switch x := a.(type) {
	case *TensorScalar:
		y, ok := b.(*TensorScalar)
		return ok && x.Field == y.Field
	case *TensorCurvature:
		y, ok := b.(*TensorCurvature)
		return ok && x.Name == "R" && y.Name == "R"
	case *TensorProduct:
		return len(x.Factors) == 1 && SameScalar(x.Factors[0], b)
	}
	return false
}
