package field

import (
	"errors"
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/poly"
)

func (w *world) fn(t fataler, name string, e Elem) Elem {
	t.Helper()
	v, err := w.f.Elementary(name, e)
	if err != nil {
		t.Fatalf("%s(%v): %v", name, e, err)
	}
	return canonical(t, v)
}

func TestRootsOfNumbers(t *testing.T) {
	w := newWorld()
	rat := func(a, b int64) Elem { return w.f.Rat(big.NewRat(a, b)) }
	root2 := w.fn(t, "sqrt", rat(2, 1))
	same(t, "√8 = 2√2", w.fn(t, "sqrt", rat(8, 1)), root2.Scale(2, 1))
	same(t, "√(1/2) = √2/2", w.fn(t, "sqrt", rat(1, 2)), root2.Scale(1, 2))
	same(t, "√(9/4) = 3/2", w.fn(t, "sqrt", rat(9, 4)), rat(3, 2))
	root3 := w.fn(t, "sqrt", rat(3, 1))
	same(t, "√6 = √2√3", w.fn(t, "sqrt", rat(6, 1)), root2.Mul(root3))
	same(t, "√(3/2) = √2√3/2", w.fn(t, "sqrt", rat(3, 2)), root2.Mul(root3).Scale(1, 2))
	same(t, "1/(√3 − √2) = √3 + √2", root3.Sub(root2).Inv(), root3.Add(root2))
	same(t, "√1000003² ", w.fn(t, "sqrt", rat(1000003, 1)).Pow(2), rat(1000003, 1))
	same(t, "√0", w.fn(t, "sqrt", Elem{}), Elem{})
	if len(w.f.roots) != 3 {
		t.Errorf("%d roots were adjoined, want 3", len(w.f.roots))
	}
	if len(w.f.Assumptions()) != 0 {
		t.Errorf("roots of numbers assume %v", w.f.Assumptions())
	}
	for _, r := range []Elem{root2, root3, root2.Mul(root3)} {
		same(t, "D of a number", r.D(), Elem{})
	}
}

// The square root is the positive one, however the basis of factors writes the radicand, and
// the second time as well as the first.
func TestRootsArePositive(t *testing.T) {
	for _, factorFirst := range []bool{false, true} {
		w := newWorld()
		m, h, q := w.f.Gen(w.m), w.f.Gen(w.h), w.f.Gen(w.q)
		u := w.f.Int(1).Sub(h) // the basis holds H − 1
		if factorFirst {
			u.Inv()
		}
		s := w.fn(t, "sqrt", u)
		same(t, "√(1−H) again", w.fn(t, "sqrt", u), s)
		same(t, "√(1/(1−H)) = 1/√(1−H)", w.fn(t, "sqrt", u.Inv()), s.Inv())
		same(t, "√(m²/(1−H)³) = m/√(1−H)³", w.fn(t, "sqrt", m.Pow(2).Div(u.Pow(3))), m.Div(s.Pow(3)))
		sm := w.fn(t, "sqrt", m)
		same(t, "√m √(1−H)", w.fn(t, "sqrt", m.Mul(u)), sm.Mul(s))
		if n := len(w.f.Assumptions()); n != 0 {
			t.Errorf("%d assumptions, but the signs follow: %v", n, w.f.Assumptions())
		}
		same(t, "√q² = q", w.fn(t, "sqrt", q.Pow(2)), q)
		as := w.f.Assumptions()
		if len(as) != 1 || !as[0].Positive || !as[0].Factor.Equal(q) {
			t.Errorf("√q² assumes %v, want q > 0", as)
		}
		n := w.f.Gen(w.f.Function("n", Negative))
		same(t, "√n² = −n for n < 0", w.fn(t, "sqrt", n.Pow(2)), n.Neg())
	}
}

// Where a root leaves through roots known before, the sign follows from all their radicands.
func TestSignThroughEarlierRoots(t *testing.T) {
	w := newWorld()
	h, q, phi := w.f.Gen(w.h), w.f.Gen(w.q), w.f.Gen(w.phi)
	u := w.f.Int(1).Sub(h)
	a, b := w.fn(t, "sqrt", u.Mul(q)), w.fn(t, "sqrt", q)
	same(t, "√(1−H)", w.fn(t, "sqrt", u), a.Div(b))
	same(t, "√((1−H)q) again", w.fn(t, "sqrt", u.Mul(q)), a)
	if n := len(w.f.Assumptions()); n != 0 {
		t.Errorf("%d assumptions, but the signs follow: %v", n, w.f.Assumptions())
	}
	c := w.fn(t, "sqrt", phi.Mul(q))
	same(t, "√φ = √(φq)/√q", w.fn(t, "sqrt", phi), c.Div(b))
}

func TestRootLaws(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		x, y := w.drawElem(t, "x"), w.drawElem(t, "y")
		root := func(e Elem) Elem {
			s, err := w.f.Sqrt(e)
			if err != nil {
				if e.Sign() != Negative {
					t.Fatalf("√(%v): %v", e, err)
				}
				t.Skip("a negative radicand")
			}
			return s
		}
		sx := root(x)
		same(t, "(√x)² = x", sx.Mul(sx), x)
		sy := root(y)
		same(t, "√(xy)² = xy", root(x.Mul(y)).Pow(2), x.Mul(y))
		prod := root(x.Mul(y))
		if !prod.Equal(sx.Mul(sy)) && !prod.Equal(sx.Mul(sy).Neg()) {
			t.Fatalf("√x√y = %v and √(xy) = %v", sx.Mul(sy), prod)
		}
		if !x.IsZero() {
			same(t, "D√x = (Dx)/(2√x)", sx.D(), x.D().Div(sx.Scale(2, 1)))
		}
	})
}

// For positive x and y the roots multiply without a sign.
func TestRootOfProduct(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		w.elems = []Elem{w.f.Gen(w.m), w.f.Gen(w.k), w.f.Gen(w.a), w.f.Gen(w.h).Pow(2)}
		positive := func(name string) Elem {
			return w.drawPoly(t, name).Pow(2).Add(w.f.Gen(w.m)).Mul(rapid.SampledFrom(w.elems[:3]).Draw(t, "unit"))
		}
		x, y := positive("x"), positive("y")
		sx, sy, sxy := w.fn(t, "sqrt", x), w.fn(t, "sqrt", y), w.fn(t, "sqrt", x.Mul(y))
		same(t, "√x√y = √(xy)", sx.Mul(sy), sxy)
		same(t, "√(x/y) = √x/√y", w.fn(t, "sqrt", x.Div(y)), sx.Div(sy))
	})
}

func TestIdentitiesOfFunctions(t *testing.T) {
	w := newWorld()
	f := w.f
	one := f.Int(1)
	h, phi, m := f.Gen(w.h), f.Gen(w.phi), f.Gen(w.m)
	sin, cos := w.fn(t, "sin", phi), w.fn(t, "cos", phi)
	same(t, "sin² + cos² = 1", sin.Pow(2).Add(cos.Pow(2)), one)
	same(t, "sin(−φ) = −sin φ", w.fn(t, "sin", phi.Neg()), sin.Neg())
	same(t, "cos(−φ) = cos φ", w.fn(t, "cos", phi.Neg()), cos)
	same(t, "tanh(−H) = −tanh H", w.fn(t, "tanh", h.Neg()), w.fn(t, "tanh", h).Neg())
	same(t, "1/(1 − sin) = (1 + sin)/cos²", one.Sub(sin).Inv(), one.Add(sin).Div(cos.Pow(2)))
	same(t, "1/cos = cos/cos²", cos.Inv().Mul(cos), one)
	e := w.fn(t, "exp", phi.Add(h.Div(m)))
	same(t, "exp(u) exp(−u) = 1", e.Mul(w.fn(t, "exp", phi.Add(h.Div(m)).Neg())), one)
	same(t, "exp(φ) exp(H/m) = exp(φ + H/m)", w.fn(t, "exp", phi).Mul(w.fn(t, "exp", h.Div(m))), e)
	same(t, "exp(3φ) = exp(φ)³", w.fn(t, "exp", phi.Scale(3, 1)), w.fn(t, "exp", phi).Pow(3))
	same(t, "exp 0 = 1", w.fn(t, "exp", Elem{}), one)
	same(t, "log 1 = 0", w.fn(t, "log", one), Elem{})
	same(t, "sin 0 = 0", w.fn(t, "sin", Elem{}), Elem{})
	same(t, "cos 0 = 1", w.fn(t, "cos", Elem{}), one)
	if w.fn(t, "exp", phi).Sign() != Positive {
		t.Error("an exponential is not known to be positive")
	}
}

func TestDerivativesOfFunctions(t *testing.T) {
	w := newWorld()
	f := w.f
	h, m := f.Gen(w.h), f.Gen(w.m)
	u := h.Div(m).Add(f.Gen(w.phi).Pow(2))
	du := u.D()
	one := f.Int(1)
	log := w.fn(t, "log", u)
	sin, cos, tanh, exp := w.fn(t, "sin", u), w.fn(t, "cos", u), w.fn(t, "tanh", u), w.fn(t, "exp", u)
	same(t, "exp", exp.D(), du.Mul(exp))
	same(t, "log", log.D(), du.Div(u))
	same(t, "sin", sin.D(), du.Mul(cos))
	same(t, "cos", cos.D(), du.Mul(sin).Neg())
	same(t, "tanh", tanh.D(), du.Mul(one.Sub(tanh.Pow(2))))
	same(t, "sin of a negative argument", w.fn(t, "sin", u.Neg()).D(), du.Mul(cos).Neg())
	same(t, "exp of log", exp.Mul(log).D(), du.Mul(exp).Mul(log).Add(du.Mul(exp).Div(u)))
	as := f.Assumptions()
	if len(as) != 1 || !as[0].Positive || !as[0].Factor.Equal(u) {
		t.Errorf("log u assumes %v, want u > 0", as)
	}
}

func TestRefusedFunctions(t *testing.T) {
	w := newWorld()
	f := w.f
	h := f.Gen(w.h)
	nested := w.fn(t, "sqrt", h).Add(f.Int(1))
	w.fn(t, "exp", h)
	for _, c := range []struct {
		name string
		arg  Elem
		says string
	}{
		{"sqrt", f.Int(-4), "not real"},
		{"sqrt", nested, "square root inside a square root"},
		{"log", Elem{}, "logarithm of zero"},
		{"exp", h.Scale(1, 2), "smaller exponential first"},
		{"sinh", h, `"sinh"`},
	} {
		if v, err := f.Elementary(c.name, c.arg); err == nil || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s(%v) is %v with error %v, want %q", c.name, c.arg, v, err, c.says)
		}
	}
	var err error
	for i := int64(2); err == nil && i < 40; i++ {
		_, err = f.Sqrt(h.Add(f.Int(i)))
	}
	if err == nil || !strings.Contains(err.Error(), "independent square roots") {
		t.Errorf("forty roots: %v", err)
	}
}

// Roots and functions follow a relation on their argument.
func TestFunctionsFollowRelations(t *testing.T) {
	w := newWorld()
	f := w.f
	h, m, phi := f.Gen(w.h), f.Gen(w.m), f.Gen(w.phi)
	root, sin := w.fn(t, "sqrt", h.Add(m)), w.fn(t, "sin", h)
	e := root.Mul(h).Add(sin.Div(root))
	if err := f.RelateGen(w.h, phi.Pow(2).Sub(m), 1); err != nil {
		t.Fatal(err)
	}
	n, err := e.Normal()
	if err != nil {
		t.Fatal(err)
	}
	want := phi.Mul(phi.Pow(2).Sub(m)).Add(w.fn(t, "sin", phi.Pow(2).Sub(m)).Div(phi))
	same(t, "√(H + m) and sin H at H = φ² − m", n, want)
}

// Values along a random background satisfy the laws, so the series of roots and functions
// are those of roots and functions.
func TestTaylorSeriesOfFunctions(t *testing.T) {
	const p, n = poly.Mersenne61, 4
	w := newWorld()
	h := w.f.Gen(w.h)
	root, sin, cos := w.fn(t, "sqrt", h), w.fn(t, "sin", h), w.fn(t, "cos", h)
	for seed := range uint64(20) {
		b := w.f.RandomBackground(p, seed)
		s, err := b.Taylor(root, n)
		if errors.Is(err, ErrUnlucky) {
			continue
		}
		arg, _ := b.Taylor(h, n)
		sq := b.mul(s, s)
		for i := range sq {
			if sq[i] != arg[i] {
				t.Fatalf("seed %d: (√H)² has coefficient %d = %d, want %d", seed, i, sq[i], arg[i])
			}
		}
		x, err1 := b.Taylor(sin, n)
		y, err2 := b.Taylor(cos, n)
		if err1 != nil || err2 != nil {
			continue
		}
		sum := b.add(b.mul(x, x), b.mul(y, y))
		for i, v := range sum {
			if want := []uint64{1, 0, 0, 0, 0}[i]; v != want {
				t.Fatalf("seed %d: sin² + cos² has coefficient %d = %d", seed, i, v)
			}
		}
		return
	}
	t.Fatal("no background has a root")
}
