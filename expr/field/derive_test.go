package field

import (
	"errors"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/poly"
)

func derivation(t *rapid.T, w *world) {
	a, b := w.drawElem(t, "a"), w.drawElem(t, "b")
	same(t, "D(a + b) = Da + Db", a.Add(b).D(), a.D().Add(b.D()))
	same(t, "D(ab) = (Da)b + a(Db)", a.Mul(b).D(), a.D().Mul(b).Add(a.Mul(b.D())))
	if !b.IsZero() {
		same(t, "D(a/b) = ((Da)b − a(Db))/b²", a.Div(b).D(), a.D().Mul(b).Sub(a.Mul(b.D())).Div(b.Pow(2)))
		same(t, "D(b⁻³) = −3b⁻⁴Db", b.Pow(-3).D(), b.Pow(-4).Mul(b.D()).Scale(-3, 1))
	}
	same(t, "two derivatives", a.Dn(2), a.D().D())
}

func TestDerivation(t *testing.T) {
	check(t, func(t *rapid.T) { derivation(t, newWorld()) })
}

func TestDerivationWithRootsAndFunctions(t *testing.T) {
	check(t, func(t *rapid.T) { derivation(t, newWorld().adjoin()) })
}

func TestDerivationModuloRelations(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		w.relate(t)
		derivation(t, w)
	})
}

// relate adds some of the relations of a scalar field on the cosmic clock.
func (w *world) relate(t fataler) {
	f := w.f
	a, h, m := f.Gen(w.a), f.Gen(w.h), f.Gen(w.m)
	phi1 := f.Jet(w.phi, 1)
	for i, err := range []error{
		f.RelateGen(f.JetGen(w.a, 1), a.Mul(h), 0),
		f.RelateGen(f.JetGen(w.h, 1), phi1.Pow(2).Div(m.Pow(2)).Scale(-1, 2), 1),
		f.RelateGen(f.JetGen(w.phi, 2), h.Mul(phi1).Scale(-3, 1).Sub(f.FuncJet(w.V, []int{1})), 2),
	} {
		if err != nil {
			t.Fatalf("relation %d: %v", i, err)
		}
	}
	for i, e := range w.elems {
		n, err := e.Normal()
		if err != nil {
			t.Fatalf("%v", err)
		}
		w.elems[i] = n
	}
}

func TestChainRule(t *testing.T) {
	w := newWorld()
	f := w.f
	phi1, phi2, phi3 := f.Jet(w.phi, 1), f.Jet(w.phi, 2), f.Jet(w.phi, 3)
	p := func(i, j int) Elem { return f.FuncJet(w.P, []int{i, j}) }
	dX := phi1.Mul(phi2)
	same(t, "DX = φ'φ''", w.X.D(), dX)
	same(t, "D P = P,φ φ' + P,X φ'φ''", p(0, 0).D(), p(1, 0).Mul(phi1).Add(p(0, 1).Mul(dX)))
	same(t, "D P,X = P,φX φ' + P,XX φ'φ''", p(0, 1).D(), p(1, 1).Mul(phi1).Add(p(0, 2).Mul(dX)))
	want := p(2, 0).Mul(phi1.Pow(2)).Add(p(1, 1).Mul(phi1).Mul(dX).Scale(2, 1)).Add(p(0, 2).Mul(dX.Pow(2))).
		Add(p(1, 0).Mul(phi2)).Add(p(0, 1).Mul(phi2.Pow(2).Add(phi1.Mul(phi3))))
	same(t, "D² P", p(0, 0).Dn(2), want)
	same(t, "D V,φφ = V,φφφ φ'", f.FuncJet(w.V, []int{2}).D(), f.FuncJet(w.V, []int{3}).Mul(phi1))
	same(t, "constants", f.Gen(w.k).Mul(f.Gen(w.q)).D(), Elem{})
}

// The Taylor series of D e along a random background is the derivative of that of e: Taylor
// never applies D to an expression.
func TestTaylorOfDerivative(t *testing.T) {
	const m = poly.Mersenne61
	const order = 3
	lucky := 0
	check(t, func(t *rapid.T) {
		w := newWorld()
		if rapid.Bool().Draw(t, "roots and functions") {
			w.adjoin()
		}
		if rapid.Bool().Draw(t, "relations") {
			w.relate(t)
		}
		e := w.drawElem(t, "e")
		b := w.f.RandomBackground(m, rapid.Uint64().Draw(t, "seed"))
		c, err := b.Taylor(e, order+1)
		if errors.Is(err, ErrUnlucky) {
			return
		}
		d, err := b.Taylor(e.D(), order)
		if err != nil {
			t.Fatalf("%v has a Taylor series and its derivative %v has none: %v", e, e.D(), err)
		}
		lucky++
		for i, v := range d {
			if want := m.Mul(uint64(i+1), c[i+1]); v != want {
				t.Fatalf("D of %v = %v: coefficient %d is %d, want %d", e, e.D(), i, v, want)
			}
		}
	})
	if lucky == 0 {
		t.Error("no random background was regular")
	}
}
