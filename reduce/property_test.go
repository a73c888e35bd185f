package reduce

// What must not change the result: total derivatives, redefinitions of eliminated fields, the
// order of elimination. And three counts of the degrees of freedom that must agree.

import (
	"fmt"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
	"remnant/expr/oper"
)

// coefficient draws a small background expression in the functions of the shipped models.
func coefficient(t *rapid.T, names []string) string {
	s := fmt.Sprint(rapid.SampledFrom([]int{-3, -1, 1, 2}).Draw(t, "number"))
	for range rapid.IntRange(0, 2).Draw(t, "factors") {
		s += "*" + rapid.SampledFrom(names).Draw(t, "factor")
	}
	return "(" + s + ")"
}

func TestTotalDerivativesDoNotMatter(t *testing.T) {
	base := `model "Knot"
background a, H, eps
given a' = a*H
given H' = -eps*H^2
fields alpha, psi, zeta
keep zeta
lagrangian quadratic =
    a^3*( -3*zeta'^2 + 6*H*alpha*zeta' - (3 - eps)*H^2*alpha^2 )
  + a*( zeta,i*zeta,i + 2*alpha,i*zeta,i )
  + 2*a*psi,ii*( zeta' - H*alpha )
`
	want := mustReduce(t, model(t, "knot.act", base))
	functions := []string{"a", "H", "eps", "eps'", "1/H"}
	first := []string{"alpha", "psi", "zeta", "zeta'", "alpha'", "zeta,ii", "psi,ii"}
	second := []string{"alpha", "psi", "zeta", "zeta'", "alpha'", "zeta,jj", "psi,jj"}
	rapid.Check(t, func(rt *rapid.T) {
		u, v := rapid.SampledFrom(first).Draw(rt, "u"), rapid.SampledFrom(second).Draw(rt, "v")
		text := base + fmt.Sprintf("  + ( %s*%s*%s )'\n", coefficient(rt, functions), u, v)
		text += fmt.Sprintf("  + ( %s*zeta*alpha,l ),l\n", coefficient(rt, functions))
		m := model(t, "knot.act", text)
		got := mustReduce(t, m)
		// the fields K differ as objects; compare through the notation's text
		if g, w := got.Initial.D.String(), want.Initial.D.String(); g != w {
			rt.Fatalf("𝒟 changed:\n%s\n%s", g, w)
		}
		if got.Single.Kinetic.String() != want.Single.Kinetic.String() {
			rt.Fatalf("𝒦 = %v, want %v", got.Single.Kinetic, want.Single.Kinetic)
		}
	})
}

// eliminateBy removes every field but keep, by pivots that choose picks.
func eliminateBy(s System, keep string, choose func([]pivot) pivot) System {
	for {
		all := s.pivots(s.index(keep))
		if len(all) == 0 {
			return s
		}
		s = s.solve(choose(all)).after
	}
}

func TestOrderOfEliminationDoesNotMatter(t *testing.T) {
	for _, name := range []string{"plover.act", "dunlin.act", "heron.act"} {
		t.Run(name, func(t *testing.T) {
			m := load(t, name)
			r := mustReduce(t, m)
			rapid.Check(t, func(rt *rapid.T) {
				s := eliminateBy(r.Initial, "zeta", func(all []pivot) pivot {
					return all[rapid.IntRange(0, len(all)-1).Draw(rt, "pivot")]
				})
				if !s.D.Equal(r.Remaining.D) {
					rt.Fatalf("another order leaves %v, want %v", s.D, r.Remaining.D)
				}
			})
		})
	}
}

// A unimodular redefinition of the eliminated fields, also by derivatives of the kept one,
// leaves the operator of the kept field as it is.
func TestRedefinitionsDoNotMatter(t *testing.T) {
	m := load(t, "plover.act")
	want := mustReduce(t, m).Remaining
	initial := Quadratic(m)
	pool := []field.Elem{eval(t, m, "a"), eval(t, m, "H"), eval(t, m, "eps"), eval(t, m, "1/a^2"), eval(t, m, "k^2")}
	rapid.Check(t, func(rt *rapid.T) {
		s := initial
		for range rapid.IntRange(1, 3).Draw(rt, "redefinitions") {
			i := rapid.IntRange(0, 1).Draw(rt, "eliminated") // alpha or psi
			j := rapid.SampledFrom(others(3, i)).Draw(rt, "by")
			c := rapid.SampledFrom(pool).Draw(rt, "coefficient")
			e := oper.Identity(m.K, 3)
			e.Set(i, j, oper.Mono(c, rapid.IntRange(0, 1).Draw(rt, "order")))
			s.D = s.D.Congruence(e)
		}
		e := &elimination{now: s, keep: "zeta", fields: s.Names, taken: map[string]bool{"alpha": true, "psi": true, "zeta": true}}
		if err := e.run(); err != nil {
			rt.Fatal(err)
		}
		if len(e.now.Names) != 1 || !e.now.D.Equal(want.D) {
			rt.Fatalf("what remains is %v:\n%v, want\n%v", e.now.Names, e.now.D, want.D)
		}
	})
}

// Forms with known content: propagating and auxiliary fields, hidden by unimodular
// congruences. The weights, the count of solutions and the degree of the determinant agree
// with what was put in.
func TestCountsAgree(t *testing.T) {
	m := load(t, "plover.act")
	f := m.K
	pool := []field.Elem{f.Int(1), f.Int(-2), eval(t, m, "a"), eval(t, m, "H"), eval(t, m, "eps"), eval(t, m, "1 + eps"), eval(t, m, "k^2")}
	draw := func(rt *rapid.T) field.Elem { return rapid.SampledFrom(pool).Draw(rt, "coefficient") }
	rapid.Check(t, func(rt *rapid.T) {
		n := rapid.IntRange(1, 3).Draw(rt, "fields")
		s := System{K: f, D: oper.NewMatrix(n, n)}
		dof := 0
		for i := range n {
			s.Names = append(s.Names, fmt.Sprint("x", i))
			order := rapid.IntRange(0, 2).Draw(rt, "order")
			dof += order
			q := make([]field.Elem, order+1)
			for j := range q {
				q[j] = draw(rt)
			}
			s.D.Set(i, i, oper.FromNormalForm(q))
		}
		for range rapid.IntRange(0, 2).Draw(rt, "congruences") {
			if n == 1 {
				break
			}
			i := rapid.IntRange(0, n-1).Draw(rt, "row")
			j := rapid.SampledFrom(others(n, i)).Draw(rt, "column")
			e := oper.Identity(f, n)
			e.Set(i, j, oper.Mono(draw(rt), rapid.IntRange(0, 1).Draw(rt, "power")))
			s.D = s.D.Congruence(e)
		}
		count, err := s.CountSolutions()
		if err != nil || count.Gauge != 0 || count.Solutions != 2*dof {
			rt.Fatalf("count %+v (%v), want %d solutions\n%v", count, err, 2*dof, s.D)
		}
		if d := oper.DetDegree(f, s.D); d != 2*dof {
			rt.Fatalf("deg Det = %d, want %d\n%v", d, 2*dof, s.D)
		}
		e := &elimination{now: s, fields: s.Names, taken: map[string]bool{}}
		if err := e.run(); err != nil {
			rt.Fatal(err)
		}
		sum := 0
		for _, w := range e.weights {
			sum += w
		}
		if sum != dof {
			rt.Fatalf("the weights %v of %v add to %d, want %d\n%v", e.weights, e.now.Names, sum, dof, s.D)
		}
	})
}

// A gauge direction is found by both routes: (u' − c v)² and its like.
func TestGaugeDirectionsAreFound(t *testing.T) {
	m := load(t, "plover.act")
	f := m.K
	s := System{K: f, Names: []string{"u", "v"}, D: oper.NewMatrix(2, 2)}
	row := []oper.Oper{oper.Mono(f.Int(1), 1), oper.New(eval(t, m, "a"))}
	for i := range 2 {
		for j := range 2 {
			s.D.Set(i, j, row[i].Adjoint().Mul(row[j]))
		}
	}
	if c, err := s.CountSolutions(); err != nil || c.Gauge != 1 {
		t.Errorf("count %+v (%v), want one gauge direction", c, err)
	}
	if d := oper.DetDegree(f, s.D); d != -1 {
		t.Errorf("deg Det = %d, want the zero determinant", d)
	}
	e := &elimination{now: s, fields: s.Names, taken: map[string]bool{}}
	err, ok := e.run().(*GaugeError)
	if !ok {
		t.Fatal("no gauge direction was found")
	}
	// along the direction found, 𝒟 vanishes
	dir := oper.NewMatrix(2, 1)
	for _, a := range err.Direction {
		dir.Set(s.index(a.Name), 0, a.Coef)
	}
	if z := s.D.Mul(dir); !z.Equal(oper.NewMatrix(2, 1)) || dir.Order() < 0 {
		t.Errorf("𝒟 does not vanish along %v: %v", dir, z)
	}
}
