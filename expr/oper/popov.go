package oper

// Row reduction over K[D], after the Popov form [BeckermannChengLabahn2006].
//
// Give a square matrix row degrees dᵢ = max_j ord A_ij; the leading matrix holds the
// coefficients of D^dᵢ. If it has a left null vector w, take the row r with w_r ≠ 0 of the
// largest degree and replace it by Σ wᵢ D^(d_r−dᵢ) rowᵢ. This is a unimodular step up to the
// unit w_r ≠ 0, so the degree of the Dieudonné determinant stays; the leading terms of order
// d_r cancel, so d_r falls. The sum of the degrees is a natural number until a row vanishes,
// so it ends: with a regular leading matrix, where deg Det is the sum of the row degrees, or
// with a zero row, where Det is zero. Each step costs one elimination over K and one
// combination of rows.

import "remnant/expr/field"

// DetDegree is the degree in D of the Dieudonné determinant of the square matrix m; −1 if
// the determinant is zero.
func DetDegree(f *field.Field, m Matrix) int {
	m = m.Clone()
	for {
		deg := rowDegrees(m)
		sum := 0
		for _, d := range deg {
			if d < 0 {
				return -1
			}
			sum += d
		}
		w, ok := NullVector(f, leadingTransposed(m, deg))
		if !ok {
			return sum
		}
		r := -1
		for i := range w {
			if !w[i].IsZero() && (r < 0 || deg[i] > deg[r]) {
				r = i
			}
		}
		combineRows(m, w, deg, r)
	}
}

func rowDegrees(m Matrix) []int {
	deg := make([]int, m.Rows())
	for i := range deg {
		deg[i] = -1
		for j := range m.Cols() {
			deg[i] = max(deg[i], m.At(i, j).Order())
		}
	}
	return deg
}

func leadingTransposed(m Matrix, deg []int) [][]field.Elem {
	out := make([][]field.Elem, m.Cols())
	for j := range out {
		out[j] = make([]field.Elem, m.Rows())
		for i := range out[j] {
			out[j][i] = m.At(i, j).Coef(deg[i])
		}
	}
	return out
}

// combineRows replaces row r by Σ wᵢ D^(d_r−dᵢ) rowᵢ.
func combineRows(m Matrix, w []field.Elem, deg []int, r int) {
	for j := range m.Cols() {
		var sum Oper
		for i := range w {
			if !w[i].IsZero() {
				sum = sum.Add(Mono(w[i], deg[r]-deg[i]).Mul(m.At(i, j)))
			}
		}
		m.Set(r, j, sum)
	}
}
