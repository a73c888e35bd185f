package field

import (
	"context"
	"math/big"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/budget"
	"remnant/expr/poly"
)

// check runs a property on random elements and gives up those that grow too large to be
// worth their time.
func check(t *testing.T, property func(*rapid.T)) {
	t.Helper()
	tried, stopped := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		var err error
		func() {
			defer budget.Catch(&err)
			property(t)
		}()
		tried++
		if err != nil {
			stopped++
		}
	})
	if 4*stopped > tried {
		t.Errorf("%d of %d cases were given up as too large", stopped, tried)
	}
}

// world is a field to test with: constants m > 0 and q, k, functions a > 0, H, φ with jets,
// and free functions P(φ, X), X = φ'²/2, and V(φ).
type world struct {
	f                  *Field
	m, q, k, a, h, phi Gen
	P, V               *FreeFunc
	X                  Elem
	elems              []Elem // what random elements are made of
}

func newWorld() *world {
	f := New(budget.New(context.Background(), 3000))
	w := &world{f: f}
	w.m = f.Constant("m", Positive)
	w.q = f.Constant("q", Unknown)
	w.k = f.Wavenumber("k")
	w.a = f.Function("a", Positive)
	w.h = f.Function("H", Unknown)
	w.phi = f.Function("phi", Unknown)
	w.X = f.Jet(w.phi, 1).Pow(2).Scale(1, 2)
	w.P = f.FreeFunction("P", []string{"phi", "X"}, []Elem{f.Gen(w.phi), w.X}, Unknown)
	w.V = f.FreeFunction("V", []string{"phi"}, []Elem{f.Gen(w.phi)}, Unknown)
	for _, g := range []Gen{w.m, w.q, w.k, w.a, w.h, w.phi} {
		w.elems = append(w.elems, f.Gen(g))
	}
	w.elems = append(w.elems, f.Jet(w.phi, 1), f.Jet(w.h, 1), f.FuncJet(w.P, []int{0, 1}), f.FuncJet(w.V, []int{1}))
	return w
}

// adjoin adds √(m² + H²), √(m·a), exp(φ), log(a) and tanh(H) to what elements are made of,
// and sin and cos of φ.
func (w *world) adjoin() *world {
	f := w.f
	m, h := f.Gen(w.m), f.Gen(w.h)
	w.elems = append(w.elems[:0], m, f.Gen(w.a), h, f.Jet(w.phi, 1))
	for _, c := range []struct {
		name string
		arg  Elem
	}{
		{"sqrt", m.Mul(m).Add(h.Mul(h))}, {"sqrt", m.Mul(f.Gen(w.a))}, {"exp", f.Gen(w.phi)},
		{"log", f.Gen(w.a)}, {"tanh", h}, {"sin", f.Gen(w.phi)}, {"cos", f.Gen(w.phi)},
	} {
		e, err := f.Elementary(c.name, c.arg)
		if err != nil {
			panic(err)
		}
		w.elems = append(w.elems, e)
	}
	return w
}

// drawPoly is a random polynomial of few terms.
func (w *world) drawPoly(t *rapid.T, name string) Elem {
	var sum Elem
	for range rapid.IntRange(0, 3).Draw(t, name+" terms") {
		term := w.f.Rat(big.NewRat(rapid.Int64Range(-4, 4).Draw(t, "coefficient"), rapid.Int64Range(1, 3).Draw(t, "over")))
		for range rapid.IntRange(0, 3).Draw(t, "degree") {
			term = term.Mul(rapid.SampledFrom(w.elems).Draw(t, "generator"))
		}
		sum = sum.Add(term)
	}
	return sum
}

// drawElem is a random fraction, often of a shared denominator.
func (w *world) drawElem(t *rapid.T, name string) Elem {
	e := w.drawPoly(t, name)
	for range rapid.IntRange(0, 2).Draw(t, name+" divisions") {
		var d Elem
		if rapid.Bool().Draw(t, "shared") {
			d = w.elems[0].Add(w.elems[3].Scale(2, 1))
		} else {
			d = w.drawPoly(t, name+" divisor")
		}
		if !d.IsZero() {
			e = e.Div(d)
		}
	}
	return e
}

type fataler interface {
	Helper()
	Fatalf(string, ...any)
}

// canonical checks the invariant of an element and of the basis of factors.
func canonical(t fataler, e Elem) Elem {
	t.Helper()
	if e.IsZero() {
		return e
	}
	e = e.live()
	if e.den.int != nil {
		if e.den.int.Cmp(big.NewInt(1)) <= 0 {
			t.Fatalf("%v has the integer %v below", e, e.den.int)
		}
		if g := new(big.Int).GCD(nil, nil, e.den.int, e.num.Content()); g.Cmp(big.NewInt(1)) != 0 {
			t.Fatalf("%v is not cancelled by %v", e, g)
		}
	}
	for i, p := range e.den.pow {
		if p.exp <= 0 || i > 0 && e.den.pow[i-1].id >= p.id {
			t.Fatalf("powers below %v are not in order: %v", e, e.den.pow)
		}
		q := e.f.factors[p.id].p
		if _, ok := e.num.DivExact(q); ok {
			t.Fatalf("%v is not cancelled by %v", e, e.f.Raw(0).f.factors[p.id].p)
		}
		if e.f.holdsRoot(q) {
			t.Fatalf("%v has a root below", e)
		}
	}
	for _, g := range e.f.roots {
		if e.num.Degree(g) > 1 {
			t.Fatalf("%v holds the square of a root", e)
		}
	}
	for _, g := range e.Gens() {
		if e.f.gens[g].rule != nil {
			t.Fatalf("%v holds the leader %v", e, e.f.Raw(g))
		}
	}
	return e
}

// coprime checks the basis: square-free, primitive, positive, pairwise coprime.
func coprime(t fataler, f *Field) {
	t.Helper()
	var live []poly.Poly
	for _, fc := range f.factors {
		if fc.split == nil {
			live = append(live, fc.p)
		}
	}
	for i, p := range live {
		if c, q := p.PrimitivePart(); c.Cmp(big.NewInt(1)) != 0 || !q.Equal(p) {
			t.Fatalf("factor %v is not primitive and positive", p)
		}
		if sq := p.SquareFree(); len(sq) != 1 || sq[0].Exp != 1 {
			t.Fatalf("factor %v is not square-free", p)
		}
		for _, q := range live[:i] {
			if !poly.Gcd(p, q).IsOne() {
				t.Fatalf("factors %v and %v have the common divisor %v", p, q, poly.Gcd(p, q))
			}
		}
	}
	for _, fc := range f.factors {
		if fc.split == nil {
			continue
		}
		prod := poly.FromInt(1)
		for _, s := range fc.split {
			prod = prod.Mul(f.pow(s.id, s.exp))
		}
		if !prod.Equal(fc.p) {
			t.Fatalf("factor %v was split into a product %v", fc.p, prod)
		}
	}
}

func same(t fataler, law string, a, b Elem) {
	t.Helper()
	canonical(t, a)
	canonical(t, b)
	if !a.Equal(b) {
		t.Fatalf("%s: %v and %v", law, a, b)
	}
}
