package gocode

// The generated model_test.go: values at rational points, exact where no function stands in
// them, and a count of allocations.

import (
	"bytes"
	"fmt"
	"hash/fnv"
	"math/big"
	"math/rand/v2"
	"strconv"
	"strings"

	"remnant/expr/field"
)

// Each value is tested at pointsEach points; pointsTried are drawn at most.
const (
	pointsEach  = 3
	pointsTried = 120
)

// check compares a call with its expectation.
type check struct {
	label, call string
	want        string
	tol         float64
}

// entry is a value with the calls that compute it.
type entry struct {
	labels, calls []string
	value         field.Elem
	tested        int
}

func (g *generator) test() string {
	var b bytes.Buffer
	fmt.Fprintf(&b, "package %s\n\nimport (\n\"math/big\"\n\"testing\"\n)\n\n", g.name)
	b.WriteString(checkFunction)
	entries := g.entries()
	calls := g.pointTests(&b, entries)
	var untested []string
	for _, e := range entries {
		if e.tested == 0 {
			untested = append(untested, e.labels[0])
		}
	}
	if len(untested) > 0 {
		writeComment(&b, "No point was found at which these are defined and well-conditioned: "+strings.Join(untested, ", ")+".")
		b.WriteString("\n")
	}
	g.allocationTest(&b, calls)
	return b.String()
}

const checkFunction = `// check compares a value with the exact one: a fraction, or decimals to fifty digits. The
// tolerance is relative: the roundings of the code, times 2⁻⁵³, times the condition of the
// formula at the point, doubled.
func check(t *testing.T, what string, got float64, want string, tol float64) {
	t.Helper()
	exact, ok := new(big.Rat).SetString(want)
	if !ok {
		t.Fatalf("%s: %q is no number", what, want)
	}
	value := new(big.Rat).SetFloat64(got)
	if value == nil {
		t.Errorf("%s = %v, want %s", what, got, want)
		return
	}
	bound := new(big.Rat).SetFloat64(tol)
	bound.Mul(bound, exact).Abs(bound)
	if diff := value.Sub(value, exact); diff.Abs(diff).Cmp(bound) > 0 {
		t.Errorf("%s = %v, want %s within %g of it", what, got, want, tol)
	}
}

`

// entries lists every value of every quantity.
func (g *generator) entries() []*entry {
	var out []*entry
	for _, q := range g.quantities {
		for i, e := range q.values {
			x := &entry{labels: []string{q.name}, value: e}
			call := q.name + "(" + g.arguments(q.values, true)
			switch {
			case q.mode:
				x.labels[0], call = q.modeCall(call, i)
			case q.rows > 0:
				x.labels[0] += fmt.Sprintf("[%d][%d]", i/q.cols, i%q.cols)
				call += fmt.Sprintf(")[%d][%d]", i/q.cols, i%q.cols)
			case q.cols > 0:
				x.labels[0] += fmt.Sprintf("[%d]", i)
				call += fmt.Sprintf(")[%d]", i)
			default:
				call += ")"
			}
			x.calls = []string{call}
			if q.scalar() {
				x.labels = append(x.labels, "Evaluate."+q.name)
				x.calls = append(x.calls, "Evaluate("+g.arguments(g.numberValues(), true)+")."+q.name)
			}
			out = append(out, x)
		}
	}
	return out
}

// modeCall calls an equation of motion with one derivative of one field equal to 1 and all
// others 0, which picks coefficient i.
func (q quantity) modeCall(call string, i int) (label, text string) {
	unit := func(n, at int) string {
		xs := make([]string, n)
		for j := range xs {
			xs[j] = "0"
		}
		if at >= 0 {
			xs[at] = "1"
		}
		return strings.Join(xs, ", ")
	}
	label = fmt.Sprintf("%s, coefficient %d", q.name, i)
	if q.cols == 0 {
		if q.order == 2 {
			return label, call + ", " + unit(2, i) + ")"
		}
		return label, call + fmt.Sprintf(", &[%d]float64{%s})", q.order, unit(q.order, i))
	}
	n := q.cols
	a, c := i/n%n, i%n
	u, du := c, -1
	if i >= n*n {
		u, du = -1, c
	}
	return label, call + fmt.Sprintf(", &[%d]float64{%s}, &[%d]float64{%s})[%d]", n, unit(n, u), n, unit(n, du), a)
}

// pointTests writes a test for each point that is needed, and returns the calls of the first.
func (g *generator) pointTests(b *bytes.Buffer, entries []*entry) int {
	h := fnv.New64a()
	h.Write([]byte(g.r.Model.Title))
	rnd := rand.New(rand.NewPCG(h.Sum64(), 1))
	gens := append(append([]field.Gen(nil), g.constants...), g.background...)
	if g.hasK {
		for id := range field.Gen(g.r.Model.K.NumGens()) {
			if g.r.Model.K.Info(id).Kind == field.Wavenumber {
				gens = append(gens, id)
			}
		}
	}
	s := newSharer(g.r.Model.K, g.leaf)
	n := 0
	for range pointsTried {
		p := drawPoint(g.r.Model.K, gens, s, rnd)
		var checks []check
		for _, e := range entries {
			if e.tested == pointsEach {
				continue
			}
			x, err := p.expect(e.value)
			if err != nil {
				continue
			}
			e.tested++
			for i := range e.calls {
				checks = append(checks, check{e.labels[i], e.calls[i], x.text(), x.tol})
			}
		}
		if len(checks) == 0 {
			continue
		}
		n++
		fmt.Fprintf(b, "func TestPoint%d(t *testing.T) {\n", n)
		g.pointValues(b, p)
		for _, c := range checks {
			fmt.Fprintf(b, "check(t, %q, %s, %q, %.3g)\n", c.label, c.call, c.want, c.tol)
		}
		b.WriteString("}\n\n")
		if all(entries, pointsEach) {
			break
		}
	}
	return n
}

func all(entries []*entry, n int) bool {
	for _, e := range entries {
		if e.tested < n {
			return false
		}
	}
	return true
}

// pointValues declares p, b and k.
func (g *generator) pointValues(b *bytes.Buffer, p *point) {
	literal := func(name string, gens []field.Gen) string {
		s := "&" + name + "{"
		for i, id := range gens {
			if i > 0 {
				s += ", "
			}
			s += g.ids[id] + ": " + decimal(p.at[id])
		}
		return s + "}"
	}
	fmt.Fprintf(b, "p := %s\nb := %s\n", literal("Params", g.constants), literal("Background", g.background))
	for id, v := range p.at {
		if g.r.Model.K.Info(id).Kind == field.Wavenumber { // there is one
			fmt.Fprintf(b, "const k = %s\n", decimal(v))
		}
	}
}

// decimal is a dyadic rational in full.
func decimal(r *big.Rat) string {
	v, _ := r.Float64()
	return strconv.FormatFloat(v, 'g', -1, 64)
}

// maxFraction is the number of characters up to which a fraction is written as one.
const maxFraction = 240

// text is the value as big.Rat reads it.
func (x expectation) text() string {
	if x.exact != nil {
		if s := x.exact.RatString(); len(s) <= maxFraction {
			return s
		}
	}
	return x.value.Text('e', 50)
}

// allocationTest writes the test that nothing is allocated, at the last point.
func (g *generator) allocationTest(b *bytes.Buffer, points int) {
	if points == 0 {
		return
	}
	b.WriteString("func TestNothingIsAllocated(t *testing.T) {\np, b := &Params{}, &Background{}\n")
	if g.hasK {
		b.WriteString("const k = 1\n")
	}
	b.WriteString("var sum float64\nn := testing.AllocsPerRun(10, func() {\n")
	done := map[string]bool{}
	for _, e := range g.entries() {
		for _, c := range e.calls {
			fn, _, _ := strings.Cut(c, "(")
			if !done[fn] {
				done[fn] = true
				fmt.Fprintf(b, "sum += %s\n", c)
			}
		}
	}
	b.WriteString("})\nif n != 0 {\nt.Errorf(\"%v allocations, want none (%v)\", n, sum)\n}\n}\n")
}
