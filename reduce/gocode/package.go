// Package gocode writes the result of a reduction as a Go package of its own, without
// dependencies: structs for the constants and for the values of the background at one time,
// the coefficients of the reduced action with their derivatives by the clock, the sound
// speed, the canonical variable and the mode equation; and a test file with exact
// expectations. The code is straight-line, shares common subexpressions and allocates
// nothing. The same result gives the same bytes.
package gocode

import (
	"bytes"
	"fmt"
	"go/format"
	"go/token"
	"strings"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/reduce"
)

// Package is a generated package.
type Package struct {
	Name  string
	Files []File // in the order of their names
}

// File is one file of a package, formatted.
type File struct {
	Name string
	Data []byte
}

// generator holds what the files of one package are written from.
type generator struct {
	r          *reduce.Result
	name       string
	quantities []quantity
	constants  []field.Gen // those that stand in the code
	background []field.Gen
	ids        map[field.Gen]string // of both
	hasK       bool
	show       show.Writer
}

// Generate writes the package for a result. It fails where nothing propagates, and with a
// *budget.Stop where a limit was reached.
func Generate(r *reduce.Result) (_ *Package, err error) {
	defer budget.Catch(&err)
	r.Model.K.Budget().Stage("writing Go code")
	q, err := contentsOf(r)
	if err != nil {
		return nil, err
	}
	g := &generator{r: r, name: PackageName(r.Model.Title), quantities: q, ids: map[field.Gen]string{},
		show: show.Writer{Width: 84, Conformal: r.Model.Clock == parse.Conformal}}
	g.collect()
	p := &Package{Name: g.name}
	for _, f := range []struct{ name, text string }{
		{"doc.go", g.doc()},
		{"go.mod", "module generated/" + g.name + "\n\ngo 1.21\n"},
		{"model.go", g.model()},
		{"model_test.go", g.test()},
	} {
		data := []byte(f.text)
		if strings.HasSuffix(f.name, ".go") {
			if data, err = format.Source(data); err != nil {
				return nil, fmt.Errorf("gocode: %s does not parse: %w", f.name, err)
			}
		}
		p.Files = append(p.Files, File{f.name, data})
	}
	return p, nil
}

// PackageName makes a package name of a model's title: the letters and digits before its
// first colon, in small letters.
func PackageName(title string) string {
	head, _, _ := strings.Cut(title, ":")
	var b strings.Builder
	for _, r := range strings.ToLower(head) {
		if 'a' <= r && r <= 'z' || '0' <= r && r <= '9' && b.Len() > 0 {
			b.WriteRune(r)
		}
	}
	name := b.String()
	if name == "" || name == "main" || name == "init" || name == "test" || token.IsKeyword(name) || len(name) > 40 {
		return "model"
	}
	return name
}

// collect finds the generators that the code needs and names them.
func (g *generator) collect() {
	f := g.r.Model.K
	seen := map[field.Gen]bool{}
	for _, q := range g.quantities {
		for _, e := range q.values {
			leaves(f, e, seen)
		}
	}
	for id := range field.Gen(f.NumGens()) {
		if !seen[id] {
			continue
		}
		switch in := f.Info(id); {
		case isPi(in):
		case in.Kind == field.Constant:
			g.constants = append(g.constants, id)
		case in.Kind == field.Wavenumber:
			g.hasK = true
		default:
			g.background = append(g.background, id)
		}
	}
	for _, gens := range [][]field.Gen{g.constants, g.background} {
		ids := show.GoIdentifiers(f, gens)
		for _, id := range gens {
			g.ids[id] = ids.Of(id)
		}
	}
}

func isPi(in field.Info) bool { return in.Kind == field.Constant && in.Name == "pi" }

// leaves adds the generators that e is computed from, looking into roots and functions.
func leaves(f *field.Field, e field.Elem, seen map[field.Gen]bool) {
	for _, id := range e.Gens() {
		switch in := f.Info(id); {
		case in.Kind == field.Root && in.Name == "cos":
			leaves(f, in.Angle, seen)
		case in.Kind == field.Root || in.Kind == field.Elementary:
			leaves(f, in.Arg, seen)
		default:
			seen[id] = true
		}
	}
}

// leaf is the expression of a generator in a function of p, b and k.
func (g *generator) leaf(id field.Gen) string {
	switch in := g.r.Model.K.Info(id); {
	case isPi(in):
		return "math.Pi"
	case in.Kind == field.Wavenumber:
		return "k"
	case in.Kind == field.Constant:
		return "p." + g.ids[id]
	}
	return "b." + g.ids[id]
}

// needsK reports whether k stands in one of the values.
func (g *generator) needsK(values []field.Elem) bool {
	seen := map[field.Gen]bool{}
	for _, e := range values {
		leaves(g.r.Model.K, e, seen)
	}
	for id := range seen {
		if g.r.Model.K.Info(id).Kind == field.Wavenumber {
			return true
		}
	}
	return false
}

// arguments is the list of parameters of a function of the values, or of a call of it.
func (g *generator) arguments(values []field.Elem, call bool) string {
	switch k := g.needsK(values); {
	case call && k:
		return "p, b, k"
	case call:
		return "p, b"
	case k:
		return "p *Params, b *Background, k float64"
	}
	return "p *Params, b *Background"
}

// doc is doc.go.
func (g *generator) doc() string {
	m := g.r.Model
	var b bytes.Buffer
	title := m.Title
	if title == "" {
		title = "a model without a title"
	}
	para := func(format string, args ...any) {
		writeComment(&b, fmt.Sprintf(format, args...))
		b.WriteString("//\n")
	}
	_, clock := clockSymbol(m.Clock)
	para("Package %s holds the reduced quadratic action of %q, generated by remnant.", g.name, title)
	if g.r.Single != nil {
		para("What remains is %s:", show.UnicodeName(g.r.Variable))
	} else {
		var names []string
		for _, n := range g.r.Remaining.Names {
			names = append(names, show.UnicodeName(n))
		}
		para("What remains are %s, in this order:", strings.Join(names, ", "))
	}
	g.formula(&b, actionOf(g.r))
	b.WriteString("//\n")
	para("Conventions: signature (−,+,+,+), ħ = c = 1; ds² = −N̄²dτ² + a²dx², where τ is %s, by "+
		"which a prime and the letter D in a name differentiate; k is the comoving wave number, so that "+
		"−∂² is k². Values of the background are those of one time; jets of free functions are "+
		"taken on the background. All numbers are in one system of units, which the caller chooses.", clock)
	if len(m.Relations) > 0 {
		para("Background relations, by which the formulas were simplified and which the values of the " +
			"background are expected to fulfil:")
		for _, rel := range m.Relations {
			fmt.Fprintf(&b, "//\t%s\n", strings.Join(strings.Fields(rel.Text), " "))
		}
		b.WriteString("//\n")
	}
	if len(g.r.Assumptions) > 0 {
		para("Assumed on the way:")
		for _, a := range g.r.Assumptions {
			sign := " ≠ 0"
			if a.Positive {
				sign = " > 0"
			}
			wr := g.show
			wr.Width = 0
			fmt.Fprintf(&b, "//\t%s%s\n", wr.Text(show.Elem(a.Factor)), sign)
		}
		b.WriteString("//\n")
	}
	para("No function allocates. Where a denominator vanishes the result is an infinity or NaN. The " +
		"package is a module of its own; without its go.mod it belongs to the module around it.")
	return strings.TrimSuffix(b.String(), "//\n") + "package " + g.name + "\n"
}

// maxFormula is the number of lines up to which a formula is printed.
const maxFormula = 40

// formula writes a formula as a block of a comment.
func (g *generator) formula(b *bytes.Buffer, n show.Node) {
	lines := strings.Split(g.show.Text(n), "\n")
	if len(lines) > maxFormula {
		fmt.Fprintf(b, "//\n//\t(a formula of %d lines)\n", len(lines))
		return
	}
	b.WriteString("//\n")
	for _, l := range lines {
		b.WriteString("//\t" + l + "\n")
	}
}

// writeComment wraps words to a comment.
func writeComment(b *bytes.Buffer, text string) {
	const width = 92
	line := "//"
	for _, word := range strings.Fields(text) {
		if n := len([]rune(line)); n > 2 && n+1+len([]rune(word)) > width {
			b.WriteString(line + "\n")
			line = "//"
		}
		line += " " + word
	}
	b.WriteString(line + "\n")
}
