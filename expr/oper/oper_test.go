package oper

import (
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
)

func TestRingAxioms(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a, b, c := w.drawOper(t, "a", 2), w.drawOper(t, "b", 2), w.drawOper(t, "c", 2)
		before := a.String() + b.String()
		unit := New(w.f.Int(1))
		same(t, "a + b = b + a", a.Add(b), b.Add(a))
		same(t, "(a + b) + c = a + (b + c)", a.Add(b).Add(c), a.Add(b.Add(c)))
		same(t, "(ab)c = a(bc)", a.Mul(b).Mul(c), a.Mul(b.Mul(c)))
		same(t, "a(b + c) = ab + ac", a.Mul(b.Add(c)), a.Mul(b).Add(a.Mul(c)))
		same(t, "(a + b)c = ac + bc", a.Add(b).Mul(c), a.Mul(c).Add(b.Mul(c)))
		same(t, "a − a = 0", a.Sub(a), Oper{})
		same(t, "1a = a", unit.Mul(a), a)
		same(t, "a1 = a", a.Mul(unit), a)
		if !a.IsZero() && !b.IsZero() && a.Mul(b).Order() != a.Order()+b.Order() {
			t.Fatalf("orders %d and %d multiply to %d", a.Order(), b.Order(), a.Mul(b).Order())
		}
		if before != a.String()+b.String() {
			t.Fatalf("operands changed: %s", before)
		}
	})
}

// A product acts as one factor after the other: D c = c D + c' is the derivation of the
// field.
func TestProductActs(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a, b := w.drawOper(t, "a", 2), w.drawOper(t, "b", 2)
		u := w.f.Gen(w.h).Mul(w.T).Add(w.f.Gen(w.a).Inv())
		if x, y := a.Mul(b).Apply(u), a.Apply(b.Apply(u)); !x.Equal(y) {
			t.Fatalf("(ab)u = %v, a(bu) = %v", x, y)
		}
		if x, y := a.D().Apply(u), a.Apply(u).D(); !x.Equal(y) {
			t.Fatalf("(Da)u = %v, D(au) = %v", x, y)
		}
	})
}

func TestAdjoint(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a, b := w.drawOper(t, "a", 3), w.drawOper(t, "b", 2)
		same(t, "(ab)† = b†a†", a.Mul(b).Adjoint(), b.Adjoint().Mul(a.Adjoint()))
		same(t, "(a + b)† = a† + b†", a.Add(b).Adjoint(), a.Adjoint().Add(b.Adjoint()))
		same(t, "a†† = a", a.Adjoint().Adjoint(), a)
		same(t, "D† = −D", Mono(w.f.Int(1), 1).Adjoint(), Mono(w.f.Int(-1), 1))
		same(t, "(a†a)† = a†a", a.Adjoint().Mul(a).Adjoint(), a.Adjoint().Mul(a))
	})
}

// v·au − (a†v)·u is a total derivative. With u and v jets of free functions the Lagrange
// bilinear concomitant is Σᵢ Σ_{j<i} (−1)ʲ (cᵢv)⁽ʲ⁾ u⁽ⁱ⁻¹⁻ʲ⁾.
func TestAdjointByParts(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		u, v := w.f.Gen(w.f.Function("u", field.Unknown)), w.f.Gen(w.f.Function("v", field.Unknown))
		a := w.drawOper(t, "a", 3)
		var boundary field.Elem
		for i := range a.Order() + 1 {
			for j := range i {
				term := a.Coef(i).Mul(v).Dn(j).Mul(u.Dn(i - 1 - j))
				if j%2 != 0 {
					term = term.Neg()
				}
				boundary = boundary.Add(term)
			}
		}
		got := v.Mul(a.Apply(u)).Sub(a.Adjoint().Apply(v).Mul(u))
		if !got.Equal(boundary.D()) {
			t.Fatalf("v·au − (a†v)·u = %v is not D of %v", got, boundary)
		}
	})
}

func TestDivision(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a, b := w.drawOper(t, "a", 3), w.drawOper(t, "b", 2)
		if b.IsZero() {
			return
		}
		q, r := DivRight(a, b)
		same(t, "a = qb + r", q.Mul(b).Add(r), a)
		if r.Order() >= b.Order() {
			t.Fatalf("remainder %v of division by %v", r, b)
		}
		q, r = DivLeft(a, b)
		same(t, "a = bq + r", b.Mul(q).Add(r), a)
		if r.Order() >= b.Order() {
			t.Fatalf("remainder %v of division by %v from the left", r, b)
		}
		q, r = DivRight(a.Mul(b), b)
		same(t, "ab/b", q, a)
		same(t, "ab/b leaves nothing", r, Oper{})
		q, r = DivLeft(b.Mul(a), b)
		same(t, "b\\ba", q, a)
		same(t, "b\\ba leaves nothing", r, Oper{})
	})
}

func TestCommonDivisorsAndMultiples(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		w.elems = w.elems[:1] // over ℚ(t): remainders grow fast
		common := w.drawOper(t, "common", 1)
		a, b := w.drawOper(t, "a", 1).Mul(common), w.drawOper(t, "b", 1).Mul(common)
		g, l := GCRD(a, b), LCLM(a, b)
		if a.IsZero() || b.IsZero() {
			if !l.IsZero() || !g.Equal(a.Add(b).Monic()) {
				t.Fatalf("gcrd %v and lclm %v of %v and %v", g, l, a, b)
			}
			return
		}
		divides := func(what string, x, y Oper) {
			t.Helper()
			if _, r := DivRight(y, x); !r.IsZero() {
				t.Fatalf("%s: %v leaves %v of %v", what, x, r, y)
			}
		}
		divides("gcrd divides a", g, a)
		divides("gcrd divides b", g, b)
		divides("a common right factor divides the gcrd", common, g)
		divides("a divides lclm", a, l)
		divides("b divides lclm", b, l)
		if !g.Lead().IsOne() || !l.Lead().IsOne() {
			t.Fatalf("gcrd %v or lclm %v is not monic", g, l)
		}
		if l.Order() != a.Order()+b.Order()-g.Order() {
			t.Fatalf("orders: a %d, b %d, gcrd %d, lclm %d", a.Order(), b.Order(), g.Order(), l.Order())
		}
		same(t, "gcrd is symmetric", g, GCRD(b, a))
		same(t, "lclm is symmetric", l, LCLM(b, a))
	})
}

// Known answers: the operators that kill 1 and t, and t and t².
func TestLCLMOfKnownSolutions(t *testing.T) {
	w := newWorld()
	one := w.f.Int(1)
	kills := func(u field.Elem) Oper { return New(u.D().Div(u).Neg(), one) } // D − u'/u
	t1, t2 := w.T, w.T.Pow(2)
	same(t, "kills 1 and t", LCLM(kills(one), kills(t1)), Mono(one, 2))
	got := LCLM(kills(t1), kills(t2)) // t²y'' − 2ty' + 2y
	same(t, "kills t and t²", got, New(w.f.Int(2).Div(t2), w.f.Int(-2).Div(t1), one))
	for _, u := range []field.Elem{t1, t2} {
		if v := got.Apply(u); !v.IsZero() {
			t.Errorf("lclm on %v is %v", u, v)
		}
	}
	same(t, "gcrd", GCRD(got, LCLM(kills(one), kills(t1))), kills(t1))
}

func TestNormalFormRoundTrip(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		q := make([]field.Elem, rapid.IntRange(0, 4).Draw(t, "length"))
		for i := range q {
			q[i] = w.drawElem(t, "q")
		}
		a := FromNormalForm(q)
		same(t, "a normal form is self-adjoint", a, a.Adjoint())
		got, err := a.NormalForm()
		if err != nil {
			t.Fatalf("%v has no normal form: %v", a, err)
		}
		for i := range max(len(got), len(q)) {
			var x, y field.Elem
			if i < len(got) {
				x = got[i]
			}
			if i < len(q) {
				y = q[i]
			}
			if !x.Equal(y) {
				t.Fatalf("q%d is %v, was %v", i, x, y)
			}
		}
		if len(got) > 0 && got[len(got)-1].IsZero() {
			t.Fatalf("the last coefficient of %v is zero", got)
		}
		b := w.drawOper(t, "b", 3)
		if b.Equal(b.Adjoint()) {
			return
		}
		if _, err := b.NormalForm(); err == nil {
			t.Fatalf("%v is not self-adjoint and has a normal form", b)
		}
	})
}

// L = c u u' is a total derivative up to −½c'u²: the operator of ½·2c u u' is cD + (cD)†.
func TestNormalFormIntegratesByParts(t *testing.T) {
	w := newWorld()
	c := w.f.Gen(w.h).Mul(w.T)
	d := Mono(c, 1)
	q, err := d.Add(d.Adjoint()).NormalForm()
	if err != nil || len(q) != 1 || !q[0].Equal(c.D().Neg()) {
		t.Errorf("2c u u' has the normal form %v, %v; want −c'", q, err)
	}
	dd := Mono(c, 2) // c u u'' = −c u'² + ½c''u²
	q, err = dd.Add(dd.Adjoint()).NormalForm()
	if err != nil || len(q) != 2 || !q[0].Equal(c.Dn(2)) || !q[1].Equal(c.Scale(-2, 1)) {
		t.Errorf("2c u u'' has the normal form %v, %v", q, err)
	}
}
