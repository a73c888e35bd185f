package parse

import (
	"context"
	"errors"
	"fmt"
	"strings"
	"testing"
	"time"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/parse/diag"
)

func load(t testing.TB, text string) *Model {
	t.Helper()
	m, err := Load(diag.NewSource("test.act", text), nil)
	if err != nil {
		var list diag.List
		if errors.As(err, &list) {
			var b strings.Builder
			diag.Render(&b, list)
			t.Fatalf("refused:\n%s\n%s", text, b.String())
		}
		t.Fatal(err)
	}
	return m
}

// terms writes the Lagrangian of a model: coefficient, and for each factor the field with
// its orders in time and space.
func terms(m *Model) string {
	var lines []string
	for _, q := range m.Quadratic {
		lines = append(lines, fmt.Sprintf("%v: %s %s", q.Coef, factorText(m, q.U), factorText(m, q.V)))
	}
	return strings.Join(lines, "; ")
}

func factorText(m *Model, f Factor) string {
	return fmt.Sprintf("%s%d,%d", m.Fields[f.Field].Name, f.Time, f.Space)
}

// equal checks that an element of the model is the one that an expression spells.
func equal(t *testing.T, m *Model, what string, got field.Elem, spelled string) {
	t.Helper()
	want, err := m.Evaluate(diag.NewSource("spelled", spelled))
	if err != nil {
		t.Fatal(err)
	}
	if !got.Equal(want) {
		t.Errorf("%s is %v, expected %v", what, got, want)
	}
}

func TestQuadraticForms(t *testing.T) {
	const head = "background a, b, H\nconstants m, M > 0\nfields u, v\n"
	for _, c := range []struct{ why, lagrangian, want string }{
		{"a term with both orders", "b*u'*v,ii", "b: u1,0 v0,2"},
		{"factors in the order of declaration", "b*v*u", "b: u0,0 v0,0"},
		{"a prime acts on a bracket", "(b*u)'*v", "b': u0,0 v0,0; b: u1,0 v0,0"},
		{"Leibniz with two fields", "(u*v)'", "1: u1,0 v0,0; 1: u0,0 v1,0"},
		{"a space derivative of a bracket", "(b*u*v,i),i", "b: u0,1 v0,1; b: u0,0 v0,2"},
		{"a background has no space derivative", "(b*u),i*v,i", "b: u0,1 v0,1"},
		{"squares of brackets", "(u + 2*v)^2", "1: u0,0 u0,0; 4: u0,0 v0,0; 4: v0,0 v0,0"},
		{"like terms are added, and cancel", "u*v + v*u - 2*u*v + u^2", "1: u0,0 u0,0"},
		{"many indices", "u,ij*v,ij + u,ii*v,jj + u,iijj*v", "2: u0,2 v0,2; 1: u0,4 v0,0"},
		{"division", "u^2/b/2", "(1)/2/(b): u0,0 u0,0"},
		{"a half power", "sqrt(M^2)*u^2 + M^(4/2)*u'^2", "M: u0,0 u0,0; M^2: u1,0 u1,0"},
		{"powers of one term", "(b*u')^2", "b^2: u1,0 u1,0"},
		{"the zeroth power is one", "u^0*b^0*v^2", "1: v0,0 v0,0"},
		{"k is a constant", "(k*u)'*k*u'", "k^2: u1,0 u1,0"},
		{"an index within a power", "(u,i)^2 + v,i^2", "1: u0,1 u0,1; 1: v0,1 v0,1"},
		{"pi is a constant", "(pi*u)'*u/π", "1: u0,0 u1,0"},
		{"sums of squares of roots", "(1 + sqrt(2))^2*u^2 - 2*√2*u^2", "3: u0,0 u0,0"},
		{"factorials and decimals", "3!*u^2 + 0.5*v^2", "6: u0,0 u0,0; (1)/2: v0,0 v0,0"},
	} {
		m := load(t, head+"lagrangian quadratic = "+c.lagrangian+" + 0*u*v")
		if got := terms(m); got != c.want {
			t.Errorf("%s: %s\n got %s\nwant %s", c.why, c.lagrangian, got, c.want)
		}
	}
}

// TestBox checks □ = −(N̄a³)⁻¹D(a³/N̄)D + ∂²/a² by its terms in each clock.
func TestBox(t *testing.T) {
	for _, c := range []struct {
		clock string
		want  [3]string // coefficients of u'', u', ∂²u
	}{
		{"cosmic", [3]string{"-1", "-3*H", "1/a^2"}},
		{"conformal", [3]string{"-1/a^2", "-2*H/a^2", "1/a^2"}},
		{"efolds", [3]string{"-H^2", "-3*H^2 - H*H'", "1/a^2"}},
	} {
		m := load(t, "clock "+c.clock+"\nbackground a\nfields u, v\nlagrangian quadratic = v*box[u]")
		if len(m.Quadratic) != 3 {
			t.Fatalf("%s: %s", c.clock, terms(m))
		}
		for _, q := range m.Quadratic {
			switch q.U {
			case Factor{0, 2, 0}:
				equal(t, m, c.clock+": of u''", q.Coef, c.want[0])
			case Factor{0, 1, 0}:
				equal(t, m, c.clock+": of u'", q.Coef, c.want[1])
			case Factor{0, 0, 2}:
				equal(t, m, c.clock+": of ∂²u", q.Coef, c.want[2])
			default:
				t.Errorf("%s: a term in %s", c.clock, factorText(m, q.U))
			}
		}
	}
}

func TestOperatorsCompose(t *testing.T) {
	const head = "background a\nconstants m\nfields u, v\nlagrangian quadratic = "
	for _, c := range []struct{ why, a, b string }{
		{"a power", "v*box^2[u]", "v*box[box[u]]"},
		{"a sum", "v*(box - m^2)[u]", "v*box[u] - m^2*v*u"},
		{"a product", "v*(box - m^2)*(2*box + a)[u]", "2*v*box[box[u]] + v*box[a*u] - 2*m^2*v*box[u] - m^2*a*v*u"},
		{"a coefficient from the left", "v*(a*box)[u]", "a*v*box[u]"},
		{"a product of fields", "box[u*v]", "box[u]*v + u*box[v] - 2*u'*v' + 2*u,i*v,i/a^2"},
		{"a background", "box[a]*u*v", "-(a'' + 3*H*a')*u*v"},
		{"the zeroth power", "v*box^0[u]", "v*u"},
		{"a quotient", "v*(box/m)[u]", "v*box[u]/m"},
	} {
		m := load(t, head+c.a+" - ("+c.b+") + 0*u*v")
		if len(m.Quadratic) != 0 {
			t.Errorf("%s: %s is not %s: %s", c.why, c.a, c.b, terms(m))
		}
	}
}

func TestClocks(t *testing.T) {
	const body = "background a, phi\nfields u\nlagrangian quadratic = u'^2"
	for _, c := range []struct{ clock, lapse, da, ricci, x, dt string }{
		{"cosmic", "1", "a*H", "6*(H' + 2*H^2)", "phi'^2/2", "1"},
		{"conformal", "a", "a*H", "6*(H' + H^2)/a^2", "phi'^2/a^2/2", "a"},
		{"efolds", "1/H", "a", "6*H^2*(2 + H'/H)", "H^2*phi'^2/2", "1/H"},
	} {
		m := load(t, "clock "+c.clock+"\nfunctions f(R), P(phi, X), g(t)\n"+body)
		if m.Clock.String() != c.clock {
			t.Errorf("%s: the clock is %v", c.clock, m.Clock)
		}
		equal(t, m, c.clock+": the lapse", m.Lapse, c.lapse)
		equal(t, m, c.clock+": a'", m.A.D(), c.da)
		arg := func(i, j int) field.Elem {
			x, err := m.Functions[i].Fn.Args[j].Normal()
			if err != nil {
				t.Fatal(err)
			}
			return x
		}
		equal(t, m, c.clock+": R", arg(0, 0), c.ricci)
		equal(t, m, c.clock+": X", arg(1, 1), c.x)
		equal(t, m, c.clock+": t'", arg(2, 0).D(), c.dt)
	}
}

func TestFlatSpace(t *testing.T) {
	m := load(t, "fields u\nlagrangian quadratic = (u'^2 - t^2*u,i*u,i)/2")
	if !m.A.IsOne() || !m.Lapse.IsOne() {
		t.Errorf("a = %v, N = %v, expected 1", m.A, m.Lapse)
	}
	equal(t, m, "d(t²)/dt", m.Quadratic[1].Coef.D(), "-t")
}

func TestRelations(t *testing.T) {
	m := load(t, `background a, H, eps, phi
constants M > 0
functions V(phi)
given a' = a*H
given V = 3*M^2*H^2 - phi'^2/2
given V,phi = -3*H*phi' - phi''
fields u
lagrangian quadratic = H'*u'^2 + (V,phi)*u^2 + a''*u*u'`)
	equal(t, m, "H'", m.Quadratic[0].Coef, "-phi'^2/(2*M^2)")
	equal(t, m, "a''", m.Quadratic[2].Coef, "a*H^2 - a*phi'^2/(2*M^2)")
	if len(m.Relations) != 3 || m.Relations[0].Text != "a' = a*H" || m.Relations[0].Auto {
		t.Errorf("relations %v", m.Relations)
	}
}

func TestMinkowski(t *testing.T) {
	m := load(t, "background a\ngiven a' = 0\nfields u\nlagrangian quadratic = u'^2 + H*u^2")
	if got := terms(m); got != "1: u1,0 u1,0" {
		t.Errorf("H does not vanish: %s", got)
	}
}

func TestFunctions(t *testing.T) {
	m := load(t, `functions P(phi, X), V(phi) = m^2*phi^2/2, Q(chi, X(chi), X(phi))
constants m > 0
background a, phi, chi
fields u
let y = Q(chi, X(chi), X(phi))*X(chi) + sin(phi)^2 + cos(phi)^2
lagrangian quadratic = P,X,X*u'^2 + P(φ, X)*u^2 + P'*u*u' + (V(phi),phi)*u*u'' + X*u'*u''`)
	equal(t, m, "P,X,X", m.Quadratic[0].Coef, "(P,X),X")
	equal(t, m, "P(phi, X)", m.Quadratic[1].Coef, "P")
	equal(t, m, "P'", m.Quadratic[2].Coef, "P,phi*phi' + P,X*phi'*phi''")
	equal(t, m, "V,phi", m.Quadratic[3].Coef, "V,phi")
	equal(t, m, "X", m.Quadratic[4].Coef, "phi'^2/2")
	equal(t, m, "X(chi)", m.Lets[0].Value, "Q*chi'^2/2 + 1")
	equal(t, m, "the definition of V", m.Functions[1].Value, "m^2*phi^2/2")
	if m.Functions[0].Definition != nil || m.Functions[1].Definition == nil {
		t.Error("V is defined and P is not")
	}
	if names := fmt.Sprint(m.Functions[2].Fn.ArgNames); names != "[chi X(chi) X(phi)]" {
		t.Errorf("the arguments of Q are %s", names)
	}
}

func TestDefinitionsOfTheirArguments(t *testing.T) {
	m := load(t, "background a, phi\nconstants m\nfunctions f(R) = R + R^2/(6*m^2), P(phi, X) = X^2/m - phi\nfields u\nlagrangian quadratic = f*P*u'^2")
	equal(t, m, "f", m.Functions[0].Value, "6*(H' + 2*H^2) + 6*(H' + 2*H^2)^2/m^2")
	equal(t, m, "P", m.Functions[1].Value, "phi'^4/(4*m) - phi")
}

func TestAbbreviations(t *testing.T) {
	m := load(t, `background a, eps
fields u
let q = eps*a^2
given eps' = q
let w = u' - H*u
lagrangian quadratic = (w^2 + q'*u^2)/eps`)
	if len(m.Lets) != 2 || !m.Lets[0].Background || m.Lets[1].Background {
		t.Fatalf("abbreviations %+v", m.Lets)
	}
	equal(t, m, "q", m.Lets[0].Value, "eps*a^2")
	equal(t, m, "q'/eps + H²/eps", m.Quadratic[2].Coef, "a^4 + 2*H*a^2 + H^2/eps")
}

func TestDivisionsAreRecorded(t *testing.T) {
	m := load(t, "background a, b, c > 0\nfields u\nlagrangian quadratic = u'^2/(b*c) + u^2*(1 + c)^-1 + u*u'/a")
	got := m.K.Assumptions()
	if len(got) != 1 || got[0].Factor.String() != "b" {
		t.Errorf("assumptions %v, expected b ≠ 0 alone", got)
	}
}

func TestKeepSmallNumbers(t *testing.T) {
	m := load(t, `model "Dotterel"
constants M > 0, n
background a, phi, eps
fields u, v
lagrangian quadratic = u'^2 + v'^2
keep w = a*u' + v,ii/H
small eps, n to order 3
numbers M = 1, n = sqrt(2)/3, phi(0) = 27/5, phi'(0) = -1/10^6`)
	if m.Title != "Dotterel" || m.SmallOrder != 3 || len(m.Small) != 2 {
		t.Errorf("title %q, order %d, %d small parameters", m.Title, m.SmallOrder, len(m.Small))
	}
	k := m.Keep
	if k == nil || k.Name != "w" || k.Field != -1 || len(k.Definition) != 2 || k.Definition[1].U != (Factor{1, 0, 2}) {
		t.Fatalf("keep %+v", k)
	}
	equal(t, m, "the coefficient of u'", k.Definition[0].Coef, "a")
	var got []string
	for _, n := range m.Numbers {
		info := m.K.Info(n.Gen)
		got = append(got, fmt.Sprintf("%s %d %v", info.Name, info.Order, n.Initial))
	}
	if s := strings.Join(got, "; "); s != "M 0 false; n 0 false; phi 0 true; phi 1 true" {
		t.Errorf("numbers %s", s)
	}
	equal(t, m, "n", m.Numbers[1].Value, "sqrt(2)/3")
}

func TestPoint(t *testing.T) {
	m := load(t, "background a, phi\nfunctions V(phi)\nconstants M\nfields u\nlagrangian quadratic = V*u'^2\n")
	list, err := m.Point(diag.NewSource("--at", "H = 1/10; φ' = 1/3; k = 2; M = 2e-1; V,phi = -3; V = 1"))
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, p := range list {
		info := m.K.Info(p.Gen)
		got = append(got, fmt.Sprintf("%s %d %v = %v", info.Name, info.Order, info.Index, p.Value))
	}
	want := "H 0 [] = (1)/10; phi 1 [] = (1)/3; k 0 [] = 2; M 0 [] = (1)/5; V 0 [1] = -3; V 0 [0] = 1"
	if s := strings.Join(got, "; "); s != want {
		t.Errorf("\n got %s\nwant %s", s, want)
	}
	lines, err := m.Point(diag.NewSource("point.txt", "# a comment\nH = 1\n\n  a = 2; M = 3\n"))
	if err != nil || len(lines) != 3 {
		t.Errorf("%d assignments from lines, %v", len(lines), err)
	}
	m = load(t, "background a, phi\nfields u\nlet w = "+strings.Repeat(" ", 40)+"a*u\nlagrangian quadratic = w'^2\n")
	for _, c := range []struct{ text, want string }{
		{"H = w", "--at:1:5: 'w' is a perturbation and cannot stand in a value"},
		{"x = 1", "--at:1:1: 'x' is not declared"},
		{"H", "--at:1:2: a value is missing"},
		{"H = ", "--at:1:4: the expression ends too early"},
		{"H = 1, a = 2", "--at:1:6: ',' cannot stand here"},
		{"H = a", "--at:1:5: 'a' is no number"},
		{"a*H = 1", "--at:1:1: 'a*H' cannot be given a value"},
		{"H = 1 2", "--at:1:7: '*' is missing before '2'"},
	} {
		if _, err := m.Point(diag.NewSource("--at", c.text)); err == nil || err.Error() != c.want {
			t.Errorf("%s: %v, expected %s", c.text, err, c.want)
		}
	}
}

func TestShippedModelsElaborate(t *testing.T) {
	for _, name := range shippedFiles(t) {
		file, faults := Parse(readSource(t, name))
		if len(faults) > 0 {
			t.Errorf("%s: %v", name, faults)
			continue
		}
		_, err := Elaborate(file, nil)
		var list diag.List
		switch {
		case err == nil:
		case errors.As(err, &list) && len(list) == 1 && list[0].Kind == diag.NotYetSupported:
		default:
			t.Errorf("%s: %v", name, err)
		}
	}
}

func TestWorkIsBounded(t *testing.T) {
	src := diag.NewSource("big.act", "constants b, c, d, e\nfields u\nlagrangian quadratic = (b + c + d + e)^60*u'^2")
	_, err := Load(src, budget.New(context.Background(), 1000))
	var stop *budget.Stop
	if !errors.As(err, &stop) || stop.Reason != budget.Terms || stop.Stage != "reading the model" {
		t.Errorf("%v, expected a limit", err)
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := Load(src, budget.New(ctx, 0)); !errors.As(err, &stop) || stop.Reason != budget.Interrupted {
		t.Errorf("%v, expected an interruption", err)
	}
}

func TestElaborationIsDeterministic(t *testing.T) {
	src := readSource(t, "../testdata/plover.act")
	first := terms(load(t, src.Text))
	for range 5 {
		if again := terms(load(t, src.Text)); again != first {
			t.Fatalf("two readings differ:\n%s\n%s", first, again)
		}
	}
}

// TestLargeInputs: texts of a megabyte are read or refused in a time that grows with
// their length.
func TestLargeInputs(t *testing.T) {
	many := func(n int, item func(i int) string) string {
		var b strings.Builder
		for i := range n {
			b.WriteString(item(i))
		}
		return b.String()
	}
	const tail = "\nfields u\nlagrangian quadratic = u'^2\n"
	for _, c := range []struct {
		why, text string
		faults    int
	}{
		{"many declarations", "constants c" + many(50000, func(i int) string { return fmt.Sprintf(", c%d", i) }) + tail, 0},
		{"the same one many times", "constants c" + strings.Repeat(", c", 50000) + tail, maxFaults},
		{"many abbreviations", many(20000, func(i int) string { return fmt.Sprintf("let x%d = %d\n", i, i) }) + tail, 0},
		{"many unknown names", many(20000, func(i int) string { return fmt.Sprintf("let x%d = y%d\n", i, i) }) + tail, maxFaults},
		{"many statements that cannot be read", strings.Repeat("let 2\n", 20000) + tail, maxFaults},
		{"many terms", tail[:len(tail)-1] + strings.Repeat(" + u'^2", 20000) + "\n", 0},
		{"comments alone behind a model", tail + strings.Repeat("# comment\n", 100000), 0},
	} {
		start := time.Now()
		_, err := Load(diag.NewSource("large.act", c.text), nil)
		var list diag.List
		if err != nil && !errors.As(err, &list) || len(list) != c.faults {
			t.Errorf("%s: %d faults, expected %d: %v", c.why, len(list), c.faults, err)
		}
		if d := time.Since(start); d > 20*time.Second {
			t.Errorf("%s: took %v", c.why, d)
		}
	}
}
