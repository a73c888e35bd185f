package series

import (
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
)

// drawSmall is a random polynomial in ε and η without constant term.
func (w *world) drawSmall(t *rapid.T, name string) field.Elem {
	var sum field.Elem
	for range rapid.IntRange(1, 3).Draw(t, name+" terms") {
		term := w.f.Int(rapid.Int64Range(-3, 3).Draw(t, "coefficient"))
		g := []field.Elem{w.Eps, w.Eta}[rapid.IntRange(0, 1).Draw(t, "parameter")]
		term = term.Mul(g.Pow(rapid.IntRange(1, 2).Draw(t, "exponent")))
		sum = sum.Add(term.Mul(w.X.Pow(rapid.IntRange(0, 1).Draw(t, "x"))))
	}
	return sum
}

// Each function of a series solves its own differential equation along the background: this
// uses D, which the method does not.
func TestElementaryFunctionsSolveTheirEquations(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := newWorld(nilTB{})
		must(nilTB{}, w.f.RelateGen(w.f.JetGen(w.x, 1), w.X.Mul(w.H), 4))
		g, _ := Small(w.f, []field.Gen{w.eps, w.eta})
		constant := []field.Elem{{}, w.X, w.X.Inv()}[rapid.IntRange(0, 2).Draw(t, "constant term")]
		u := expand(t, g, constant.Add(w.drawSmall(t, "argument")), Exact)
		of := func(name string, u Series) Series {
			s, err := u.Elementary(name, 4)
			if err != nil {
				t.Fatalf("%s(%v): %v", name, u, err)
			}
			return holds(t, s)
		}
		d := func(s Series) Series {
			ds, err := s.D(Exact)
			if err != nil {
				t.Fatalf("D of %v: %v", s, err)
			}
			return ds
		}
		same := func(law string, x, y Series) {
			t.Helper()
			if !x.Equal(y) {
				t.Fatalf("%s with u = %v: %v and %v", law, u, x, y)
			}
			if min(x.Order(), y.Order()) < 4 {
				t.Fatalf("%s: known to order %d and %d only", law, x.Order(), y.Order())
			}
		}
		du := d(u)
		exp, sin, cos, tanh := of("exp", u), of("sin", u), of("cos", u), of("tanh", u)
		same("(exp u)' = u' exp u", d(exp), du.Mul(exp))
		same("(sin u)' = u' cos u", d(sin), du.Mul(cos))
		same("(cos u)' = −u' sin u", d(cos), du.Mul(sin).Neg())
		same("sin² + cos² = 1", sin.Mul(sin).Add(cos.Mul(cos)), g.Int(1))
		same("(tanh u)' = u'(1 − tanh²)", d(tanh), du.Mul(g.Int(1).Sub(tanh.Mul(tanh))))
		same("log exp u = u", of("log", exp).Add(constantLog(t, g, exp, constant)), u)
		v := g.Int(2).Add(u).Mul(g.Int(2).Add(u)).Add(g.Int(1))
		if !v.Lead().IsZero() && v.Valuation() == 0 {
			log := of("log", v)
			same("v (log v)' = v'", v.Mul(d(log)), d(v))
			root := of("sqrt", v)
			same("(√v)² = v", root.Mul(root), v)
		}
	})
}

// constantLog mends log exp c, which the field does not know to be c.
func constantLog(t fataler, g *Grading, exp Series, c field.Elem) Series {
	t.Helper()
	first, _ := exp.Coef(0)
	log, err := g.f.Elementary("log", first)
	if err != nil {
		t.Fatalf("%v", err)
	}
	return g.make(0, []field.Elem{c.Sub(log)}, Exact, nil)
}

// Elements that hold roots and functions expand as the functions of their expanded
// arguments.
func TestExpandingRootsAndFunctions(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := newWorld(nilTB{})
		g, _ := Small(w.f, []field.Gen{w.eps, w.eta})
		name := rapid.SampledFrom([]string{"sqrt", "exp", "sin", "cos", "tanh", "log"}).Draw(t, "function")
		arg := w.X.Add(w.drawSmall(t, "argument"))
		val, err := w.f.Elementary(name, arg)
		if err != nil {
			t.Fatalf("%v", err)
		}
		q := w.drawElem(t, "factor")
		e := val.Mul(q).Add(w.f.Int(3).Sub(w.Eps).Inv())
		got := holds(t, expand(t, g, e, 3))
		direct, err := expand(t, g, arg, Exact).Elementary(name, 9)
		if err != nil {
			t.Fatalf("%v", err)
		}
		want := direct.Mul(expand(t, g, q, 9)).Add(expand(t, g, w.f.Int(3).Sub(w.Eps).Inv(), 9))
		if !got.Equal(want) || got.Order() < 3 {
			t.Fatalf("%v expands to %v, want %v", e, got, want)
		}
	})
}

// A numerator that starts far above its lowest term: √(1−ε) − 1 + ε/2 + ε²/8 = −ε³/16 + ….
func TestCancellationIsFollowed(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	one := w.f.Int(1)
	root, err := w.f.Sqrt(one.Sub(w.Eps))
	must(t, err)
	e := root.Sub(one).Add(w.Eps.Scale(1, 2)).Add(w.Eps.Pow(2).Scale(1, 8))
	s := holds(t, expand(t, g, e.Pow(-1).Mul(w.Eps.Pow(3)), 2))
	if c, known := s.Coef(0); !known || !c.Equal(w.f.Int(-16)) || s.Order() != 2 {
		t.Errorf("ε³/(√(1−ε) − 1 + ε/2 + ε²/8) = %v", s)
	}
	if c, known := s.Coef(1); !known || !c.Equal(w.Eps.Scale(10, 1)) {
		t.Errorf("its first correction is %v", c) // (1 − 5ε/8)⁻¹ · −16: from −ε³/16 − 5ε⁴/128
	}
}

// Roots of homogeneous radicands are homogeneous themselves.
func TestHomogeneousRoots(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	root, err := w.f.Sqrt(w.Eps.Pow(2).Add(w.Eta.Pow(2)))
	must(t, err)
	s := holds(t, expand(t, g, root.Div(w.f.Int(1).Sub(root)), 4))
	for _, term := range s.Terms() {
		if !term.Coef.Equal(root.Pow(term.Power)) {
			t.Errorf("part %d is %v", term.Power, term.Coef)
		}
	}
	if s.Valuation() != 1 || len(s.Terms()) != 3 {
		t.Errorf("r/(1−r) = %v", s)
	}
	under := w.Eps.Pow(2).Mul(w.X.Add(w.Eta))
	rooted, err := w.f.Sqrt(under)
	must(t, err)
	s = holds(t, expand(t, g, rooted, 4))
	if s.Valuation() != 1 || !s.Mul(s).Equal(expand(t, g, under, 9)) {
		t.Errorf("√(%v) = %v", under, s)
	}
}
