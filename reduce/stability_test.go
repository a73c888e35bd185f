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
