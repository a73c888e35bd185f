package oper

// Matrices over K[D].

import (
	"strings"

	"remnant/expr/field"
)

// Matrix is a rectangular matrix of operators. Set is for whoever made it; once handed on, a
// matrix is not changed.
type Matrix struct {
	rows, cols int
	e          []Oper
}

// NewMatrix is the zero matrix.
func NewMatrix(rows, cols int) Matrix {
	return Matrix{rows, cols, make([]Oper, rows*cols)}
}

// Identity is the identity matrix of size n over f.
func Identity(f *field.Field, n int) Matrix {
	m := NewMatrix(n, n)
	for i := range n {
		m.Set(i, i, New(f.Int(1)))
	}
	return m
}

func (m Matrix) Rows() int            { return m.rows }
func (m Matrix) Cols() int            { return m.cols }
func (m Matrix) At(i, j int) Oper     { return m.e[i*m.cols+j] }
func (m Matrix) Set(i, j int, a Oper) { m.e[i*m.cols+j] = a }
func (m Matrix) Clone() Matrix        { m.e = append([]Oper(nil), m.e...); return m }

// Order is the highest order of an entry; −1 for the zero matrix.
func (m Matrix) Order() int {
	n := -1
	for _, a := range m.e {
		n = max(n, a.Order())
	}
	return n
}

// Terms is the size of m.
func (m Matrix) Terms() int {
	n := 0
	for _, a := range m.e {
		n += a.Terms()
	}
	return n
}

// Map applies fn to every entry.
func (m Matrix) Map(fn func(Oper) Oper) Matrix {
	out := NewMatrix(m.rows, m.cols)
	for i, a := range m.e {
		out.e[i] = fn(a)
	}
	return out
}

// Equal reports whether m and n are the same matrix.
func (m Matrix) Equal(n Matrix) bool {
	if m.rows != n.rows || m.cols != n.cols {
		return false
	}
	for i := range m.e {
		if !m.e[i].Equal(n.e[i]) {
			return false
		}
	}
	return true
}

// Add is m + n. Shapes must agree.
func (m Matrix) Add(n Matrix) Matrix {
	if m.rows != n.rows || m.cols != n.cols {
		panic("oper: sum of matrices of unlike shapes")
	}
	out := NewMatrix(m.rows, m.cols)
	for i := range m.e {
		out.e[i] = m.e[i].Add(n.e[i])
	}
	return out
}

// Mul is the product m·n. Shapes must agree.
func (m Matrix) Mul(n Matrix) Matrix {
	if m.cols != n.rows {
		panic("oper: product of matrices of unlike shapes")
	}
	out := NewMatrix(m.rows, n.cols)
	for i := range m.rows {
		for j := range n.cols {
			var sum Oper
			for k := range m.cols {
				sum = sum.Add(m.At(i, k).Mul(n.At(k, j)))
			}
			out.Set(i, j, sum)
		}
	}
	return out
}

// Adjoint is the transposed matrix of the adjoint entries.
func (m Matrix) Adjoint() Matrix {
	out := NewMatrix(m.cols, m.rows)
	for i := range m.rows {
		for j := range m.cols {
			out.Set(j, i, m.At(i, j).Adjoint())
		}
	}
	return out
}

// IsSelfAdjoint reports whether m = m†.
func (m Matrix) IsSelfAdjoint() bool { return m.rows == m.cols && m.Equal(m.Adjoint()) }

// Congruence is E†·m·E: the quadratic form m under the redefinition Φ = E Φ̃.
func (m Matrix) Congruence(e Matrix) Matrix { return e.Adjoint().Mul(m).Mul(e) }

// Submatrix keeps the given rows and columns, in the given order.
func (m Matrix) Submatrix(rows, cols []int) Matrix {
	out := NewMatrix(len(rows), len(cols))
	for i, r := range rows {
		for j, c := range cols {
			out.Set(i, j, m.At(r, c))
		}
	}
	return out
}

// String writes m for tests and debugging.
func (m Matrix) String() string {
	var b strings.Builder
	for i := range m.rows {
		for j := range m.cols {
			b.WriteString("  " + m.At(i, j).String() + ";")
		}
		b.WriteString("\n")
	}
	return b.String()
}
