package field

import (
	"testing"
)

// benchmarked gives two fractions of the size that an elimination meets: dozens of terms
// above, powers of three factors below.
func benchmarked(b *testing.B) (w *world, x, y Elem) {
	b.Helper()
	w = newWorld()
	w.f.SetBudget(nil)
	f := w.f
	m, a, h, k := f.Gen(w.m), f.Gen(w.a), f.Gen(w.h), f.Gen(w.k)
	phi1 := f.Jet(w.phi, 1)
	pX := f.FuncJet(w.P, []int{0, 1})
	theta := m.Pow(2).Mul(h).Sub(phi1.Mul(pX))
	sigma := k.Pow(2).Mul(m.Pow(2)).Add(a.Pow(2).Mul(phi1.Pow(2)).Mul(pX))
	x = theta.Add(h).Add(k).Pow(4).Div(theta.Pow(2).Mul(sigma))
	y = sigma.Add(theta.Mul(a)).Add(f.Int(1)).Pow(3).Div(theta.Mul(sigma.Pow(2)).Mul(h))
	b.ReportAllocs()
	return w, x, y
}

func BenchmarkAdd(b *testing.B) {
	_, x, y := benchmarked(b)
	for b.Loop() {
		x.Add(y)
	}
	b.ReportMetric(float64(x.Num().Len()), "terms")
}

func BenchmarkMul(b *testing.B) {
	_, x, y := benchmarked(b)
	for b.Loop() {
		x.Mul(y)
	}
	b.ReportMetric(float64(x.Num().Len()), "terms")
}

func BenchmarkInv(b *testing.B) {
	_, x, _ := benchmarked(b)
	for b.Loop() {
		x.Inv()
	}
}

func BenchmarkD(b *testing.B) {
	_, x, _ := benchmarked(b)
	for b.Loop() {
		x.D()
	}
	b.ReportMetric(float64(x.Num().Len()), "terms")
}
