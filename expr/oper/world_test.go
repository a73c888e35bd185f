package oper

import (
	"context"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/budget"
	"remnant/expr/field"
)

// world is a field to test with: time t with t' = 1, functions a > 0 with a' = aH, and H with
// its jets, and a constant m > 0.
type world struct {
	f       *field.Field
	T       field.Elem
	t, a, h field.Gen
	elems   []field.Elem
}

func newWorld() *world {
	f := field.New(budget.New(context.Background(), 3000))
	w := &world{f: f}
	w.t = f.Function("t", field.Unknown)
	w.a = f.Function("a", field.Positive)
	w.h = f.Function("H", field.Unknown)
	m := f.Constant("m", field.Positive)
	if err := f.RelateGen(f.JetGen(w.t, 1), f.Int(1), 1); err != nil {
		panic(err)
	}
	if err := f.RelateGen(f.JetGen(w.a, 1), f.Gen(w.a).Mul(f.Gen(w.h)), 2); err != nil {
		panic(err)
	}
	w.T = f.Gen(w.t)
	w.elems = []field.Elem{w.T, f.Gen(w.a), f.Gen(w.h), f.Gen(m)}
	return w
}

// check runs a property on random operators and gives up those that grow too large to be
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

func (w *world) drawPoly(t *rapid.T, name string) field.Elem {
	var sum field.Elem
	for range rapid.IntRange(0, 2).Draw(t, name+" terms") {
		term := w.f.Int(rapid.Int64Range(-3, 3).Draw(t, "coefficient"))
		for range rapid.IntRange(0, 2).Draw(t, "degree") {
			term = term.Mul(w.elems[rapid.IntRange(0, len(w.elems)-1).Draw(t, "generator")])
		}
		sum = sum.Add(term)
	}
	return sum
}

// drawElem is a random coefficient, one in three with a denominator.
func (w *world) drawElem(t *rapid.T, name string) field.Elem {
	e := w.drawPoly(t, name)
	if rapid.IntRange(0, 2).Draw(t, name+" fraction") == 0 {
		if d := w.drawPoly(t, name+" divisor"); !d.IsZero() {
			e = e.Div(d)
		}
	}
	return e
}

func (w *world) drawOper(t *rapid.T, name string, maxOrder int) Oper {
	c := make([]field.Elem, rapid.IntRange(0, maxOrder+1).Draw(t, name+" length"))
	for i := range c {
		c[i] = w.drawElem(t, name)
	}
	return New(c...)
}

func (w *world) drawMatrix(t *rapid.T, name string, n, maxOrder int) Matrix {
	m := NewMatrix(n, n)
	for i := range n {
		for j := range n {
			m.Set(i, j, w.drawOper(t, name, maxOrder))
		}
	}
	return m
}

// drawUnimodular is a random product of elementary matrices: units on the diagonal, and
// multiples of one row added to another.
func (w *world) drawUnimodular(t *rapid.T, name string, n int) Matrix {
	e := Identity(w.f, n)
	for range rapid.IntRange(0, 3).Draw(t, name+" steps") {
		i, j := rapid.IntRange(0, n-1).Draw(t, "row"), rapid.IntRange(0, n-1).Draw(t, "column")
		step := Identity(w.f, n)
		if i != j {
			step.Set(i, j, w.drawOper(t, name, 1))
		} else {
			unit := w.drawPoly(t, name)
			if unit.IsZero() {
				unit = w.f.Int(2)
			}
			step.Set(i, i, New(unit))
		}
		e = e.Mul(step)
	}
	return e
}

type fataler interface {
	Helper()
	Fatalf(string, ...any)
}

func same(t fataler, law string, a, b Oper) {
	t.Helper()
	for _, x := range []Oper{a, b} {
		if n := len(x.c); n > 0 && x.c[n-1].IsZero() {
			t.Fatalf("%s: %v begins with a zero", law, x)
		}
	}
	if !a.Equal(b) || !a.Sub(b).IsZero() {
		t.Fatalf("%s: %v and %v", law, a, b)
	}
}

func sameMatrix(t fataler, law string, a, b Matrix) {
	t.Helper()
	if !a.Equal(b) {
		t.Fatalf("%s:\n%v and\n%v", law, a, b)
	}
}
