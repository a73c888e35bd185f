package reduce

import (
	"slices"
	"strings"
	"testing"
)

// quadraticFile writes an expansion as a model of the quadratic form: what was declared, the
// relations found as givens, the fields and the Lagrangian as printed.
func quadraticFile(d *ExpansionDocument, source, keep string) string {
	var b strings.Builder
	for _, line := range strings.Split(source, "\n") {
		for _, word := range []string{"clock ", "constants ", "background ", "functions "} {
			if strings.HasPrefix(line, word) {
				b.WriteString(line + "\n")
			}
		}
	}
	for _, r := range d.Relations {
		if !strings.HasPrefix(r.Equation, "a' = ") { // the clock brings it along
			b.WriteString("given " + r.Equation + "\n")
		}
	}
	b.WriteString("fields " + strings.Join(d.Fields, ", ") + "\nlagrangian quadratic = " + d.Lagrangian + "\n")
	if keep != "" {
		b.WriteString("keep " + keep + "\n")
	}
	return b.String()
}

// TestPrintedLagrangianReadsBack reduces the printed quadratic Lagrangian, with the printed
// relations given, and compares with the covariant model: the same operator remains.
func TestPrintedLagrangianReadsBack(t *testing.T) {
	for _, name := range []string{"kestrel", "lapwing", "redshank", "ruff", "sanderling", "tern", "puffin", "shearwater", "petrel", "godwit"} {
		t.Run(name, func(t *testing.T) {
			m := load(t, name+".act")
			x, err := new(Variants).Expand(m)
			if err != nil {
				t.Fatal(err)
			}
			keep := ""
			if m.Keep != nil {
				keep = m.Keep.Name
			}
			file := quadraticFile(x.Document(nil), m.Source.Text, keep)
			got, err := Reduce(model(t, "printed.act", file))
			if err != nil {
				t.Fatalf("%v\n%s", err, file)
			}
			want := mustReduce(t, m)
			sameOperator(t, want, got)
		})
	}
}

// sameOperator reads what the second reduction prints in the field of the first.
func sameOperator(t *testing.T, want, got *Result) {
	t.Helper()
	a, b := want.Document(nil, nil), got.Document(nil, nil)
	if a.DegreesOfFreedom != b.DegreesOfFreedom || !slices.Equal(a.Variables, b.Variables) {
		t.Fatalf("%d degrees of freedom of %v, want %d of %v", b.DegreesOfFreedom, b.Variables, a.DegreesOfFreedom, a.Variables)
	}
	compare := func(a, b []string) {
		t.Helper()
		if len(a) != len(b) {
			t.Fatalf("%d coefficients, want %d", len(b), len(a))
		}
		for i := range a {
			if !value(t, want.Model, a[i]).Equal(value(t, want.Model, b[i])) {
				t.Errorf("coefficient %d is %s, want %s", i, b[i], a[i])
			}
		}
	}
	compare(a.Operator.Single, b.Operator.Single)
	if a.Operator.Several == nil {
		return
	}
	for _, both := range [][2][][][]string{
		{a.Operator.Several.Symmetric, b.Operator.Several.Symmetric},
		{a.Operator.Several.Antisymmetric, b.Operator.Several.Antisymmetric},
	} {
		if len(both[0]) != len(both[1]) {
			t.Fatal("normal forms of unlike order")
		}
		for n := range both[0] {
			for row := range both[0][n] {
				compare(both[0][n][row], both[1][n][row])
			}
		}
	}
}
