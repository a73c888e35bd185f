package oper

import (
	"testing"

	"remnant/expr/field"
)

// benchmarked gives operators of orders 4 and 2 with coefficients of the size that an
// elimination meets: fractions over H and over a polynomial of two terms.
func benchmarked(b *testing.B) (w *world, x, y Oper) {
	b.Helper()
	w = newWorld()
	w.f.SetBudget(nil)
	one := w.f.Int(1)
	a, h, m := w.elems[1], w.elems[2], w.elems[3]
	theta := m.Mul(h).Add(a)
	x = New(a.Add(h).Pow(2).Div(theta), h.Mul(a).Add(m).Div(h), a.Pow(3).Div(theta.Pow(2)), h.Inv(), one.Add(a.Mul(h)))
	y = New(m.Div(theta), a.Mul(h).Add(m), theta)
	b.ReportAllocs()
	b.ResetTimer()
	return w, x, y
}

func BenchmarkMul(b *testing.B) {
	_, x, y := benchmarked(b)
	for b.Loop() {
		x.Mul(y)
	}
}

func BenchmarkAdjoint(b *testing.B) {
	_, x, _ := benchmarked(b)
	for b.Loop() {
		x.Adjoint()
	}
}

func BenchmarkDivRight(b *testing.B) {
	_, x, y := benchmarked(b)
	for b.Loop() {
		DivRight(x, y)
	}
}

func BenchmarkNormalForm(b *testing.B) {
	_, x, _ := benchmarked(b)
	s := x.Add(x.Adjoint())
	for b.Loop() {
		if _, err := s.NormalForm(); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkDetDegree(b *testing.B) {
	w, _, y := benchmarked(b)
	m := NewMatrix(2, 2)
	one := w.f.Int(1)
	for i, c := range []field.Elem{one, w.elems[1]} {
		m.Set(i, 0, y.Scale(c))
		m.Set(i, 1, y.Scale(c.Mul(w.T)).Add(New(w.elems[2])))
	}
	s := m.Adjoint().Mul(m)
	for b.Loop() {
		DetDegree(w.f, s)
	}
}
