package oper

// Linear algebra over the field of coefficients: null vectors, determinants and inverses of
// matrices of elements, by elimination with the pivot of fewest terms.

import "remnant/expr/field"

// NullVector finds v ≠ 0 with a·v = 0, or reports false if the columns of a are independent.
func NullVector(f *field.Field, a [][]field.Elem) (v []field.Elem, ok bool) {
	red, pivots := echelon(a)
	if len(a) == 0 {
		return nil, false
	}
	cols := len(a[0])
	isPivot := make([]bool, cols)
	for _, p := range pivots {
		isPivot[p] = true
	}
	for c := range cols {
		if isPivot[c] {
			continue
		}
		v = make([]field.Elem, cols)
		v[c] = f.Int(1)
		for r, p := range pivots {
			v[p] = red[r][c].Neg()
		}
		return v, true
	}
	return nil, false
}

// echelon brings a to reduced row echelon form, in a copy, and lists the pivot columns.
func echelon(a [][]field.Elem) (red [][]field.Elem, pivots []int) {
	for _, row := range a {
		red = append(red, append([]field.Elem(nil), row...))
	}
	if len(red) == 0 {
		return nil, nil
	}
	for c := range red[0] {
		r := len(pivots)
		best := -1
		for i := r; i < len(red); i++ {
			if !red[i][c].IsZero() && (best < 0 || red[i][c].Terms() < red[best][c].Terms()) {
				best = i
			}
		}
		if best < 0 {
			continue
		}
		red[r], red[best] = red[best], red[r]
		inv := red[r][c].Inv()
		for j := c; j < len(red[r]); j++ {
			red[r][j] = red[r][j].Mul(inv)
		}
		for i := range red {
			if i == r || red[i][c].IsZero() {
				continue
			}
			k := red[i][c]
			for j := c; j < len(red[i]); j++ {
				red[i][j] = red[i][j].Sub(k.Mul(red[r][j]))
			}
		}
		pivots = append(pivots, c)
	}
	return red, pivots
}

// Det is the determinant of a square matrix of elements.
func Det(f *field.Field, a [][]field.Elem) field.Elem {
	n := len(a)
	m := make([][]field.Elem, n)
	for i := range a {
		m[i] = append([]field.Elem(nil), a[i]...)
	}
	det := f.Int(1)
	for c := range n {
		best := -1
		for i := c; i < n; i++ {
			if !m[i][c].IsZero() && (best < 0 || m[i][c].Terms() < m[best][c].Terms()) {
				best = i
			}
		}
		if best < 0 {
			return field.Elem{}
		}
		if best != c {
			m[c], m[best] = m[best], m[c]
			det = det.Neg()
		}
		det = det.Mul(m[c][c])
		inv := m[c][c].Inv()
		for i := c + 1; i < n; i++ {
			if m[i][c].IsZero() {
				continue
			}
			k := m[i][c].Mul(inv)
			for j := c; j < n; j++ {
				m[i][j] = m[i][j].Sub(k.Mul(m[c][j]))
			}
		}
	}
	return det
}

// Inverse is the inverse of a square matrix of elements; false if it is singular.
func Inverse(f *field.Field, a [][]field.Elem) ([][]field.Elem, bool) {
	n := len(a)
	wide := make([][]field.Elem, n)
	for i := range a {
		wide[i] = append(append([]field.Elem(nil), a[i]...), make([]field.Elem, n)...)
		wide[i][n+i] = f.Int(1)
	}
	red, pivots := echelon(wide)
	if len(pivots) < n || pivots[n-1] != n-1 {
		return nil, false
	}
	out := make([][]field.Elem, n)
	for i := range out {
		out[i] = red[i][n:]
	}
	return out, true
}
