package reduce

import "testing"

// Conditions follow from declared signs; what is not declared is the condition.
func TestStability(t *testing.T) {
	const head = "constants M > 0, l < 0, c\nbackground a, e > 0, f\nfields u\nlagrangian quadratic = "
	type want struct {
		concern   Concern
		verdict   Verdict
		condition string
	}
	tests := []struct {
		why, lagrangian string
		want            []want
	}{
		{"all signs are declared", "a^3*M^2*e*u'^2 - a*e*u,i*u,i",
			[]want{{Ghost, Always, ""}, {GradientSign, Always, ""}}},
		{"a declared negative constant makes a ghost", "a^3*l*u'^2 - a*u,i*u,i",
			[]want{{Ghost, Never, ""}, {GradientSign, Always, ""}}},
		{"an even power has a sign, but can vanish", "a^3*f^2*u'^2 - a*u,i*u,i",
			[]want{{Ghost, Always, ""}, {GradientSign, Always, ""}, {StrongCoupling, While, "f"}}},
		{"an undeclared sign is the condition", "a^3*e*f*u'^2 + a*f^3*l*u,i*u,i",
			[]want{{Ghost, While, "f"}, {GradientSign, While, "f"}, {StrongCoupling, While, "f"}}},
		{"sums of one sign have it", "a^3*(M^2 + f^2)*u'^2 - a*(1 + e)*u,i*u,i",
			[]want{{Ghost, Always, ""}, {GradientSign, Always, ""}}},
		{"a negative mass term is slow", "a^3*u'^2 - a*u,i*u,i - a^3*l*u^2",
			[]want{{Ghost, Always, ""}, {GradientSign, Always, ""}, {MassSign, Never, ""}}},
		{"no gradient term, no gradient statement", "a^3*u'^2 - a^3*c*u^2",
			[]want{{Ghost, Always, ""}, {MassSign, While, "c"}}},
		{"a gradient of the wrong sign", "a^3*u'^2 + a*u,i*u,i",
			[]want{{Ghost, Always, ""}, {GradientSign, Never, ""}}},
	}
	for _, tc := range tests {
		t.Run(tc.why, func(t *testing.T) {
			m := model(t, "case.act", head+tc.lagrangian+"\nkeep u\n")
			got := mustReduce(t, m).Stability
			if len(got) != len(tc.want) {
				t.Fatalf("%d statements %+v, want %d", len(got), got, len(tc.want))
			}
			for i, w := range tc.want {
				if got[i].Concern != w.concern || got[i].Verdict != w.verdict {
					t.Errorf("statement %d: %+v, want %+v", i, got[i], w)
				}
				if w.condition != "" && !got[i].Condition.Equal(eval(t, m, w.condition)) {
					t.Errorf("condition %v, want %s", got[i].Condition, w.condition)
				}
			}
		})
	}
}

// Two fields with a kinetic mixing b: no ghost while 1 > 0 and 1 − b² > 0 (Sylvester).
func TestGhostsOfSeveralFields(t *testing.T) {
	m := model(t, "case.act", "background a, b\nfields u, v\nlagrangian quadratic = a^3*(u'^2 + v'^2 + 2*b*u'*v')/2 - a*(u,i*u,i + v,i*v,i)/2\n")
	r := mustReduce(t, m)
	g := r.Stability[0]
	if g.Concern != Ghost || g.Verdict != While || len(g.Minors) != 1 {
		t.Fatalf("%+v, want one condition", g)
	}
	if !g.Minors[0].Equal(eval(t, m, "1 - b^2")) {
		t.Errorf("condition %v > 0, want 1 − b²", g.Minors[0])
	}
}

// A kinetic matrix with a vanishing leading minor is indefinite, hence a ghost; both fields of
// the second model run away at large k; the third has the speeds 2 and 3.
func TestGradientsOfSeveralFields(t *testing.T) {
	tests := []struct {
		lagrangian      string
		ghost, gradient Verdict
		roots           []string
	}{
		{"x'*y' - x,i*y,i", Never, Always, []string{"a^2", "a^2"}},
		{"a^3*(x'^2 + y'^2)/2 + a*(x,i*x,i + y,i*y,i)/2", Always, Never, []string{"-1", "-1"}},
		{"x'^2 + y'^2 - (2*x,i*x,i + 3*y,i*y,i)/a^2", Always, Always, []string{"3", "2"}},
	}
	for _, tc := range tests {
		m := model(t, "case.act", "background a\nfields x, y\nlagrangian quadratic = "+tc.lagrangian+"\n")
		r := mustReduce(t, m)
		verdicts := map[Concern]Verdict{}
		for _, s := range r.Stability {
			verdicts[s.Concern] = s.Verdict
		}
		if verdicts[Ghost] != tc.ghost || verdicts[GradientSign] != tc.gradient {
			t.Errorf("%s: %+v, want ghost %d and gradient %d", tc.lagrangian, r.Stability, tc.ghost, tc.gradient)
		}
		for i, want := range tc.roots {
			if i >= len(r.Several.Roots) || !r.Several.Roots[i].Equal(eval(t, m, want)) {
				t.Errorf("%s: sound speeds squared %v, want %v", tc.lagrangian, r.Several.Roots, tc.roots)
			}
		}
	}
}

// Constants under a root may have none modulo one prime; others are tried.
func TestCountWithRoots(t *testing.T) {
	for _, n := range []string{"2", "3", "5", "6", "7", "10", "3*a", "21"} {
		r := mustReduce(t, model(t, "case.act", "background a\nfields x\nlagrangian quadratic = a^3*x'^2*sqrt("+n+") - sqrt(3)*a*x,i*x,i\n"))
		if r.DegreesOfFreedom != 1 {
			t.Errorf("√%s: %d degrees of freedom, want 1", n, r.DegreesOfFreedom)
		}
	}
}
