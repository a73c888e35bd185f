package rules

import (
	"errors"
	"testing"

	"remnant/parse/diag"
	"remnant/parse/parsetest"
)

// The example in the comment of each kind is refused for that kind.
func TestKindExamples(t *testing.T) {
	for _, x := range parsetest.KindExamples(t, "refusal.go", 5) {
		t.Run(x.Name, func(t *testing.T) {
			_, err := Expand(load(t, x.Text))
			var list diag.List
			if !errors.As(err, &list) || list[0].Kind != x.Kind {
				t.Errorf("%v, want a refusal %q", err, x.Kind)
			}
		})
	}
}
