package oper

import (
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
)

func TestMatrixAlgebra(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a, b, c := w.drawMatrix(t, "a", 2, 1), w.drawMatrix(t, "b", 2, 1), w.drawMatrix(t, "c", 2, 1)
		sameMatrix(t, "(AB)C = A(BC)", a.Mul(b).Mul(c), a.Mul(b.Mul(c)))
		sameMatrix(t, "A(B + C) = AB + AC", a.Mul(b.Add(c)), a.Mul(b).Add(a.Mul(c)))
		sameMatrix(t, "(AB)† = B†A†", a.Mul(b).Adjoint(), b.Adjoint().Mul(a.Adjoint()))
		sameMatrix(t, "A†† = A", a.Adjoint().Adjoint(), a)
		sameMatrix(t, "1A = A", Identity(w.f, 2).Mul(a), a)
	})
}

func TestMatrixNormalFormRoundTrip(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a := w.drawMatrix(t, "a", 2, 2)
		m := a.Add(a.Adjoint())
		nf, err := m.NormalForm()
		if err != nil {
			t.Fatalf("%v", err)
		}
		for n, q := range nf.Symmetric {
			if !q[0][1].Equal(q[1][0]) {
				t.Fatalf("q%d is not symmetric: %v", n, q)
			}
		}
		for n, p := range nf.Antisymmetric {
			if !p[0][1].Equal(p[1][0].Neg()) || !p[0][0].IsZero() || !p[1][1].IsZero() {
				t.Fatalf("p%d is not antisymmetric: %v", n, p)
			}
		}
		sameMatrix(t, "back from the normal form", assemble(nf), m)
		if a.IsSelfAdjoint() {
			return
		}
		if _, err := a.NormalForm(); err == nil {
			t.Fatalf("a matrix that is not self-adjoint has a normal form:\n%v", a)
		}
	})
}

// assemble is the operator of L = ½Σ qₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁾ + ½Σ pₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁺¹⁾: the
// symmetric part of the sesquilinear form ½ u†(D†)ⁿ c Dᵐ u.
func assemble(nf MatrixNormalForm) Matrix {
	m := NewMatrix(2, 2)
	add := func(c [][]field.Elem, left, right int) {
		for a := range 2 {
			for b := range 2 {
				if c[a][b].IsZero() {
					continue
				}
				d := func(n int) Oper { return Mono(c[a][b].Field().Int(1), n) }
				half := New(c[a][b].Scale(1, 2))
				term := d(left).Adjoint().Mul(half).Mul(d(right))
				m.Set(a, b, m.At(a, b).Add(term))
				m.Set(b, a, m.At(b, a).Add(term.Adjoint()))
			}
		}
	}
	for n, q := range nf.Symmetric {
		add(q, n, n)
	}
	for n, p := range nf.Antisymmetric {
		add(p, n, n+1)
	}
	return m
}

func TestCongruence(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		w.elems = w.elems[:2]
		a := w.drawMatrix(t, "a", 2, 1)
		m := a.Add(a.Adjoint())
		e := w.drawUnimodular(t, "e", 2)
		c := m.Congruence(e)
		if !c.IsSelfAdjoint() {
			t.Fatalf("E†ME is not self-adjoint:\n%v", c)
		}
		if got := DetDegree(w.f, e); got != 0 {
			t.Fatalf("a unimodular matrix has degree %d:\n%v", got, e)
		}
		d, dc := DetDegree(w.f, m), DetDegree(w.f, c)
		if d != dc {
			t.Fatalf("degree %d becomes %d under\n%v", d, dc, e)
		}
		if d > 0 && d%2 != 0 {
			t.Fatalf("a self-adjoint matrix has the odd degree %d:\n%v", d, m)
		}
	})
}

func TestDetDegreeOfProduct(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		w.elems = w.elems[:1]
		a, b := w.drawMatrix(t, "a", 2, 1), w.drawMatrix(t, "b", 2, 1)
		da, db, dab := DetDegree(w.f, a), DetDegree(w.f, b), DetDegree(w.f, a.Mul(b))
		want := da + db
		if da < 0 || db < 0 {
			want = -1
		}
		if dab != want {
			t.Fatalf("degrees %d and %d multiply to %d:\n%v\n%v", da, db, dab, a, b)
		}
	})
}

func TestDetDegreeOfKnownMatrices(t *testing.T) {
	w := newWorld()
	f := w.f
	one := f.Int(1)
	d := func(n int) Oper { return Mono(one, n) }
	quadratic := func(rows ...[]Oper) Matrix { // Σ rowᵢ† rowᵢ
		m := NewMatrix(2, 2)
		for i, r := range rows {
			row := NewMatrix(1, 2)
			row.Set(0, 0, r[0])
			row.Set(0, 1, r[1])
			term := row.Adjoint().Mul(row)
			if i%2 == 1 {
				term = term.Map(Oper.Neg)
			}
			m = m.Add(term)
		}
		return m
	}
	for _, c := range []struct {
		why  string
		m    Matrix
		want int
	}{
		{"½(x' + ty')² − ½(x + ty)² looks like a degree of freedom and has none",
			quadratic([]Oper{d(1), Mono(w.T, 1)}, []Oper{New(one), New(w.T)}), 0},
		{"with a constant in place of t a gauge direction is left",
			quadratic([]Oper{d(1), Mono(f.Int(3), 1)}, []Oper{New(one), New(f.Int(3))}), -1},
		{"½x'² − ½(x + ty)² eliminates y and leaves ½x'²: one",
			quadratic([]Oper{d(1), {}}, []Oper{New(one), New(w.T)}), 2},
		{"the identity", Identity(f, 2), 0},
		{"zero", NewMatrix(2, 2), -1},
	} {
		if got := DetDegree(f, c.m); got != c.want {
			t.Errorf("%s: degree %d, want %d", c.why, got, c.want)
		}
	}
	m := NewMatrix(1, 1)
	m.Set(0, 0, New(one, w.T, one, f.Gen(w.h)))
	if got := DetDegree(f, m); got != 3 {
		t.Errorf("a single operator of order 3 has degree %d", got)
	}
}

func TestSubmatrix(t *testing.T) {
	w := newWorld()
	m := NewMatrix(2, 3)
	for i := range 2 {
		for j := range 3 {
			m.Set(i, j, Mono(w.f.Int(int64(10*i+j+1)), j))
		}
	}
	s := m.Submatrix([]int{1}, []int{2, 0})
	if s.Rows() != 1 || s.Cols() != 2 || !s.At(0, 0).Equal(m.At(1, 2)) || !s.At(0, 1).Equal(m.At(1, 0)) {
		t.Errorf("submatrix %v", s)
	}
	c := m.Clone()
	c.Set(0, 0, Oper{})
	if m.At(0, 0).IsZero() || m.Order() != 2 || NewMatrix(1, 1).Order() != -1 {
		t.Errorf("clone or order of %v", m)
	}
}

func drawRows(t *rapid.T, w *world, rows, cols int) [][]field.Elem {
	a := make([][]field.Elem, rows)
	for i := range a {
		a[i] = make([]field.Elem, cols)
		for j := range a[i] {
			a[i][j] = w.drawElem(t, "entry")
		}
	}
	if rapid.Bool().Draw(t, "dependent") && rows > 1 { // last row: a multiple of the first
		c := w.drawElem(t, "multiple")
		for j := range a[0] {
			a[rows-1][j] = a[0][j].Mul(c)
		}
	}
	return a
}

func times(a [][]field.Elem, v []field.Elem) []field.Elem {
	out := make([]field.Elem, len(a))
	for i := range a {
		for j := range v {
			out[i] = out[i].Add(a[i][j].Mul(v[j]))
		}
	}
	return out
}

func TestLinearAlgebra(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a := drawRows(t, w, 3, 3)
		det := Det(w.f, a)
		v, singular := NullVector(w.f, a)
		if singular != det.IsZero() {
			t.Fatalf("determinant %v and null vector %v", det, v)
		}
		if singular {
			zero := true
			for _, x := range v {
				zero = zero && x.IsZero()
			}
			if zero {
				t.Fatal("the null vector is zero")
			}
			for _, x := range times(a, v) {
				if !x.IsZero() {
					t.Fatalf("a·v has the entry %v", x)
				}
			}
		}
		inv, ok := Inverse(w.f, a)
		if ok == singular {
			t.Fatalf("inverse %v, singular %v", ok, singular)
		}
		for j := range inv {
			column := []field.Elem{inv[0][j], inv[1][j], inv[2][j]}
			for i, x := range times(a, column) {
				if want := map[bool]int64{true: 1, false: 0}[i == j]; !x.Equal(w.f.Int(want)) {
					t.Fatalf("a·a⁻¹ has %v at %d, %d", x, i, j)
				}
			}
		}
		// Laplace expansion by the first row
		var sum field.Elem
		for j := range 3 {
			k, l := (j+1)%3, (j+2)%3
			minor := a[1][k].Mul(a[2][l]).Sub(a[1][l].Mul(a[2][k]))
			sum = sum.Add(a[0][j].Mul(minor))
		}
		if !sum.Equal(det) {
			t.Fatalf("determinant %v, by minors %v", det, sum)
		}
	})
}
