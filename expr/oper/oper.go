// Package oper is the algebra of linear differential operators over a differential field,
// K[D] with D c = c D + D(c), and of matrices of them. Spatial derivatives are powers of the
// wave number in the coefficients; D is the time derivative [Ore1933].
package oper

import (
	"strings"

	"remnant/expr/field"
)

// Oper is Σ cᵢDⁱ, coefficients on the left. It is immutable; the last coefficient is not
// zero. The zero value is the zero operator.
type Oper struct {
	c []field.Elem
}

// New is the operator with the given coefficients of 1, D, D², …
func New(c ...field.Elem) Oper {
	n := len(c)
	for n > 0 && c[n-1].IsZero() {
		n--
	}
	return Oper{c[:n:n]}
}

// Mono is c·Dⁿ.
func Mono(c field.Elem, n int) Oper {
	cs := make([]field.Elem, n+1)
	cs[n] = c
	return New(cs...)
}

// Order is the highest power of D; −1 for zero.
func (a Oper) Order() int { return len(a.c) - 1 }

// Coef is the coefficient of Dⁱ.
func (a Oper) Coef(i int) field.Elem {
	if i < 0 || i >= len(a.c) {
		return field.Elem{}
	}
	return a.c[i]
}

// Lead is the coefficient of the highest power of D.
func (a Oper) Lead() field.Elem { return a.Coef(a.Order()) }

// IsZero reports whether a is zero.
func (a Oper) IsZero() bool { return len(a.c) == 0 }

// Equal reports whether a and b are the same operator.
func (a Oper) Equal(b Oper) bool {
	if len(a.c) != len(b.c) {
		return false
	}
	for i := range a.c {
		if !a.c[i].Equal(b.c[i]) {
			return false
		}
	}
	return true
}

// Terms is the size of a: the terms of all its coefficients.
func (a Oper) Terms() int {
	n := 0
	for _, c := range a.c {
		n += c.Terms()
	}
	return n
}

// Map applies fn to every coefficient.
func (a Oper) Map(fn func(field.Elem) field.Elem) Oper {
	out := make([]field.Elem, len(a.c))
	for i, c := range a.c {
		out[i] = fn(c)
	}
	return New(out...)
}

// Apply is a acting on the function u of the field.
func (a Oper) Apply(u field.Elem) field.Elem {
	var sum field.Elem
	for _, c := range a.c {
		sum = sum.Add(c.Mul(u))
		u = u.D()
	}
	return sum
}

// String writes a for tests and debugging.
func (a Oper) String() string {
	if a.IsZero() {
		return "0"
	}
	var parts []string
	for i, c := range a.c {
		if !c.IsZero() {
			parts = append(parts, "["+c.String()+"]"+strings.Repeat("D", i))
		}
	}
	return strings.Join(parts, " + ")
}
