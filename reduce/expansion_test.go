package reduce

import (
	"fmt"
	"reflect"
	"slices"
	"strings"
	"testing"

	"remnant/expr/field"
	"remnant/expr/show"
	"remnant/parse"
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
// relations given, and compares with the model itself: the same operator remains.
func TestPrintedLagrangianReadsBack(t *testing.T) {
	for _, name := range []string{"kestrel", "lapwing", "redshank", "ruff", "sanderling", "tern", "puffin", "shearwater", "petrel", "godwit", "knot"} {
		t.Run(name, func(t *testing.T) { readsBack(t, load(t, name+".act")) })
	}
	for _, v := range []struct {
		name   string
		gauge  parse.Gauge
		sector parse.Sector
	}{
		{"kestrel", parse.Flat, parse.ScalarSector}, {"kestrel", parse.Newtonian, parse.ScalarSector},
		{"ruff", parse.Flat, parse.ScalarSector}, {"ruff", parse.Unitary, parse.TensorSector},
		{"stilt", parse.Newtonian, parse.VectorSector}, {"stilt", parse.Newtonian, parse.TensorSector},
	} {
		t.Run(fmt.Sprint(v.name, " ", v.gauge, " ", v.sector), func(t *testing.T) {
			readsBack(t, load(t, v.name+".act").Variant(v.gauge, v.sector))
		})
	}
}

func readsBack(t *testing.T, m *parse.Model) {
	t.Helper()
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
	sameOperator(t, mustReduce(t, m), got)
}

// sameOperator reads what the second reduction prints in the field of the first.
func sameOperator(t *testing.T, want, got *Result) {
	t.Helper()
	a, b := want.Document(nil, nil), got.Document(nil, nil)
	polarisations := want.Model.Sector.Polarisations() // a quadratic model knows of none
	if a.DegreesOfFreedom != b.DegreesOfFreedom*polarisations || !slices.Equal(a.Variables, b.Variables) {
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

// expansionKeys are the keys of format 1, in their order.
var expansionKeys = []string{"format", "model", "clock", "gauge", "sector", "background", "relations", "lagrangian", "fields", "formFactors", "assumptions", "gaugeCheck"}

// Every key is there for a quadratic model too, which has no background equations.
func TestEveryKeyOfAnExpansionIsThere(t *testing.T) {
	for _, name := range []string{"kestrel", "plover", "shearwater"} {
		x, err := new(Variants).Expand(load(t, name+".act"))
		if err != nil {
			t.Fatal(err)
		}
		data, err := x.Document(nil).Encode()
		if err != nil {
			t.Fatal(err)
		}
		if got := keysOf(t, data); !slices.Equal(got, expansionKeys) {
			t.Errorf("%s: keys %v", name, got)
		}
	}
}

// A background equation in JSON reads back as the one derived.
func TestBackgroundReadsBack(t *testing.T) {
	m := load(t, "ruff.act")
	x, err := new(Variants).Expand(m)
	if err != nil {
		t.Fatal(err)
	}
	for i, eq := range x.Document(nil).Background {
		left, ok := strings.CutSuffix(eq.Equation, " = 0")
		if !ok || eq.From != x.Background[i].From {
			t.Fatalf("%+v", eq)
		}
		if got := value(t, x.Model, left); !got.IsZero() {
			t.Errorf("the equation of %s does not hold on the background that it gives: %v is left", eq.From, got)
		}
		fresh := load(t, "ruff.act") // where no relation is known
		if got := value(t, fresh, left); show.Notation(show.Elem(got)) != left {
			t.Errorf("the equation of %s reads back as %s, want %s", eq.From, show.Notation(show.Elem(got)), left)
		}
	}
}

// Variants share what they have in common and give what each gives alone.
func TestVariants(t *testing.T) {
	m := load(t, "redshank.act")
	var together Variants
	for _, s := range []parse.Sector{parse.ScalarSector, parse.VectorSector, parse.TensorSector} {
		for _, g := range []parse.Gauge{parse.Unitary, parse.Flat, parse.Newtonian, parse.Open} {
			x, err := together.Expand(m.Variant(g, s))
			if err != nil {
				t.Fatal(err)
			}
			alone, err := new(Variants).Expand(load(t, "redshank.act").Variant(g, s))
			if err != nil {
				t.Fatal(err)
			}
			if len(x.Lagrangian) != len(alone.Lagrangian) {
				t.Fatalf("%v, %v: %d products, alone %d", g, s, len(x.Lagrangian), len(alone.Lagrangian))
			}
			for i, p := range x.Lagrangian {
				q := alone.Lagrangian[i]
				c := value(t, x.Model, text(q.Coef))
				q.Coef, p.Coef = field.Elem{}, p.Coef.Sub(c).Lowest()
				if !reflect.DeepEqual(p, q) {
					t.Errorf("%v, %v: product %+v, alone %+v", g, s, p, q)
				}
			}
			if s == parse.ScalarSector && g != parse.Open {
				r, err := together.Reduce(m.Variant(g, s))
				if err != nil || r.DegreesOfFreedom != 1 {
					t.Errorf("%v: %v", g, err)
				}
			}
		}
		check, err := together.CheckGauge(m.Variant(parse.Unitary, s))
		if err != nil || !check.Holds() {
			t.Errorf("%v: the identities hold: %v", s, err)
		}
	}
}
