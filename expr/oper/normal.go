package oper

// The unique normal form of a self-adjoint operator or matrix: what integration by parts
// makes of a quadratic Lagrangian. Two Lagrangians differ by total derivatives exactly when
// their operators are equal, and so when these forms are.

import (
	"fmt"

	"remnant/expr/field"
)

// NormalForm writes the self-adjoint a as Σ (−D)ⁿ qₙ Dⁿ, so that L = ½ Σ qₙ (u⁽ⁿ⁾)². It
// fails if a is not self-adjoint.
func (a Oper) NormalForm() ([]field.Elem, error) {
	q := make([]field.Elem, a.Order()/2+1)
	if a.IsZero() {
		q = nil
	}
	for !a.IsZero() {
		n := a.Order()
		if n%2 != 0 {
			return nil, fmt.Errorf("oper: an operator of odd order %d is not self-adjoint", n)
		}
		c := a.Lead()
		if n/2%2 != 0 {
			c = c.Neg()
		}
		q[n/2] = c
		a = a.Sub(sandwich(c, n/2, n/2))
		if a.Order() >= n {
			return nil, fmt.Errorf("oper: the operator is not self-adjoint")
		}
	}
	return q, nil
}

// FromNormalForm is Σ (−D)ⁿ qₙ Dⁿ.
func FromNormalForm(q []field.Elem) Oper {
	var a Oper
	for n, c := range q {
		a = a.Add(sandwich(c, n, n))
	}
	return a
}

// sandwich is (−D)ⁱ c Dʲ.
func sandwich(c field.Elem, i, j int) Oper {
	out := Mono(c, j)
	for range i {
		out = out.D().Neg()
	}
	return out
}

// MatrixNormalForm is the normal form of a self-adjoint matrix: symmetric qₙ and
// antisymmetric pₙ with L = ½ Σ qₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁾ + ½ Σ pₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁺¹⁾.
type MatrixNormalForm struct {
	Symmetric     [][][]field.Elem // [n][a][b]
	Antisymmetric [][][]field.Elem
}

// Matrix is the self-adjoint matrix of size n with this normal form.
func (f MatrixNormalForm) Matrix(n int) Matrix {
	m := NewMatrix(n, n)
	add := func(list [][][]field.Elem, odd int) {
		for half, q := range list {
			for a := range n {
				for b := range n {
					if c := q[a][b]; !c.IsZero() {
						m.Set(a, b, m.At(a, b).Add(normalTerm(c, 2*half+odd)))
					}
				}
			}
		}
	}
	add(f.Symmetric, 0)
	add(f.Antisymmetric, 1)
	return m
}

// NormalForm is the normal form of the self-adjoint matrix m. It fails if m is not
// self-adjoint.
func (m Matrix) NormalForm() (MatrixNormalForm, error) {
	if !m.IsSelfAdjoint() {
		return MatrixNormalForm{}, fmt.Errorf("oper: the matrix is not self-adjoint")
	}
	top := m.Order()
	out := MatrixNormalForm{
		Symmetric:     zeros(top/2+1, m.Rows()),
		Antisymmetric: zeros((top+1)/2, m.Rows()),
	}
	for n := top; n >= 0; n-- {
		half, into := n/2, out.Symmetric
		if n%2 != 0 {
			into = out.Antisymmetric
		}
		rest := m.Clone()
		for a := range m.Rows() {
			for b := range m.Rows() {
				c := m.At(a, b).Coef(n)
				if c.IsZero() {
					continue
				}
				if half%2 != 0 {
					c = c.Neg()
				}
				into[half][a][b] = c
				rest.Set(a, b, rest.At(a, b).Sub(normalTerm(c, n)))
			}
		}
		m = rest
	}
	return out, nil
}

// normalTerm is the operator that a normal-form coefficient of total order n stands for:
// (−D)ᵐ c Dᵐ for n = 2m, and ½[(−D)ᵐ c Dᵐ⁺¹ − (−D)ᵐ⁺¹ c Dᵐ] for n = 2m + 1.
func normalTerm(c field.Elem, n int) Oper {
	half := n / 2
	if n%2 == 0 {
		return sandwich(c, half, half)
	}
	return sandwich(c, half, half+1).Sub(sandwich(c, half+1, half)).Scale(c.Field().Int(1).Scale(1, 2))
}

func zeros(n, size int) [][][]field.Elem {
	out := make([][][]field.Elem, n)
	for i := range out {
		out[i] = make([][]field.Elem, size)
		for a := range out[i] {
			out[i][a] = make([]field.Elem, size)
		}
	}
	return out
}
