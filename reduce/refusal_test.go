package reduce

import (
	"context"
	"errors"
	"os"
	"strings"
	"testing"

	"remnant/expr/budget"
	"remnant/parse"
	"remnant/parse/diag"
	"remnant/parse/parsetest"
)

// The example in the comment of each kind is refused for that kind.
func TestKindExamples(t *testing.T) {
	for _, x := range parsetest.KindExamples(t, "refusal.go", 2) {
		t.Run(x.Name, func(t *testing.T) {
			_, err := Reduce(model(t, "example.act", x.Text))
			var list diag.List
			if !errors.As(err, &list) || list[0].Kind != x.Kind {
				t.Errorf("%v, want a refusal %q", err, x.Kind)
			}
		})
	}
}

func refusal(t *testing.T, text string) diag.Diagnostic {
	t.Helper()
	_, err := Reduce(model(t, "case.act", text))
	var list diag.List
	if !errors.As(err, &list) || len(list) != 1 {
		t.Fatalf("%v, want one refusal", err)
	}
	return list[0]
}

func TestKeptFieldNamesWhatPropagates(t *testing.T) {
	d := refusal(t, "background a, H, eps\ngiven a' = a*H\ngiven H' = -eps*H^2\nfields alpha, zeta\nlagrangian quadratic = a^3*eps*(zeta' - H*alpha)*zeta' + a^3*alpha^2\nkeep alpha\n")
	if d.Source.Slice(d.Span) != "alpha" || !strings.Contains(d.Hint, "'zeta'") {
		t.Errorf("%q at %q, hint %q", d.Summary, d.Source.Slice(d.Span), d.Hint)
	}
}

func TestGaugeDirectionIsNamed(t *testing.T) {
	d := refusal(t, "background c > 0\nfields u, v\nlagrangian quadratic = (u' - c*v)^2/2\n")
	if !strings.Contains(d.Summary, "δu = cξ, δv = ξ' + c'/c ξ") && !strings.Contains(d.Summary, "δu = ξ, δv = ξ'/c") {
		t.Errorf("summary %q", d.Summary)
	}
}

func TestNothingPropagates(t *testing.T) {
	r := mustReduce(t, model(t, "case.act", "constants m > 0\nfields u, v\nlagrangian quadratic = u*v' - m*u^2 + v^2\nkeep u\n"))
	if r.DegreesOfFreedom != 1 {
		t.Errorf("u v' is a first-order action of one degree of freedom, found %d", r.DegreesOfFreedom)
	}
	r = mustReduce(t, model(t, "case.act", "constants m > 0\nfields u, v\nlagrangian quadratic = m*u*v + u^2\nkeep u\n"))
	if r.DegreesOfFreedom != 0 || r.Variable != "" || r.Single != nil {
		t.Errorf("%d degrees of freedom in %q, want none", r.DegreesOfFreedom, r.Variable)
	}
}

// Work is bounded by terms and by the context, and says where it stopped.
func TestLimits(t *testing.T) {
	text, err := os.ReadFile("../testdata/curlew.act")
	if err != nil {
		t.Fatal(err)
	}
	run := func(b *budget.Budget) error {
		m, err := parse.Load(diag.NewSource("curlew.act", string(text)), nil)
		if err != nil {
			t.Fatal(err)
		}
		m.K.SetBudget(b)
		_, err = Reduce(m)
		return err
	}
	var stop *budget.Stop
	if err := run(budget.New(context.Background(), 10)); !errors.As(err, &stop) || stop.Reason != budget.Terms || stop.Stage == "" {
		t.Errorf("%v, want a stop for terms at a named stage", err)
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if err := run(budget.New(ctx, 0)); !errors.As(err, &stop) || stop.Reason != budget.Interrupted || stop.Stage == "" {
		t.Errorf("%v, want an interruption at a named stage", err)
	}
	if err := run(budget.New(context.Background(), 0)); err != nil {
		t.Errorf("without limits: %v", err)
	}
}
