package gocode

// The generated model.go: structs, one function for each quantity, and one that computes
// all numbers together.

import (
	"bytes"
	"fmt"
	"strings"

	"remnant/expr/field"
	"remnant/expr/show"
)

func (g *generator) model() string {
	var b bytes.Buffer
	g.structs(&b)
	for _, q := range g.quantities {
		g.function(&b, q)
	}
	g.together(&b)
	head := "package " + g.name + "\n\n"
	if strings.Contains(b.String(), "math.") {
		head += "import \"math\"\n\n"
	}
	return head + b.String()
}

func (g *generator) structs(b *bytes.Buffer) {
	b.WriteString("// Params holds the constants of the model.\ntype Params struct {\n")
	g.fields(b, g.constants)
	b.WriteString("}\n\n// Background holds the values of the background at one time: functions, their derivatives by\n" +
		"// the clock, and free functions with their derivatives by their arguments.\ntype Background struct {\n")
	g.fields(b, g.background)
	b.WriteString("}\n\n")
}

func (g *generator) fields(b *bytes.Buffer, gens []field.Gen) {
	f := g.r.Model.K
	for _, id := range gens {
		text := g.show.Text(show.Generator(f, id))
		switch f.Info(id).Sign {
		case field.Positive:
			text += " > 0"
		case field.Negative:
			text += " < 0"
		}
		fmt.Fprintf(b, "%s float64 // %s\n", g.ids[id], text)
	}
}

func (g *generator) function(b *bytes.Buffer, q quantity) {
	writeComment(b, q.name+" "+q.doc+g.colon(q))
	g.formulas(b, q)
	code := shareSums(q.sums(), g.leaf)
	params := g.arguments(q.values, false)
	switch {
	case q.mode && q.cols > 0:
		fmt.Fprintf(b, "func %s(%s, u, du *[%d]float64) [%d]float64 {\n", q.name, params, q.rows, q.rows)
	case q.mode && q.order == 2:
		fmt.Fprintf(b, "func %s(%s, u, du float64) float64 {\n", q.name, params)
	case q.mode:
		fmt.Fprintf(b, "func %s(%s, u *[%d]float64) float64 {\n", q.name, params, q.order)
	default:
		fmt.Fprintf(b, "func %s(%s) %s {\n", q.name, params, q.goType())
	}
	for _, s := range code.Statements {
		b.WriteString(s + "\n")
	}
	b.WriteString("return " + q.result(code.Results) + "\n}\n\n")
}

// sums lists what the function returns: the values, or for an equation of motion the
// accelerations.
func (q quantity) sums() [][]addend {
	if !q.mode {
		out := make([][]addend, len(q.values))
		for i, e := range q.values {
			out[i] = []addend{{Coef: e}}
		}
		return out
	}
	if q.cols == 0 {
		var sum []addend
		for i := len(q.values) - 1; i >= 0; i-- {
			u := fmt.Sprintf("u[%d]", i)
			if q.order == 2 {
				u = []string{"u", "du"}[i]
			}
			sum = append(sum, addend{q.values[i], u})
		}
		return [][]addend{sum}
	}
	n := q.cols
	out := make([][]addend, n)
	for a := range n {
		for i, u := range []string{"u", "du"} {
			for c := range n {
				out[a] = append(out[a], addend{q.values[i*n*n+a*n+c], fmt.Sprintf("%s[%d]", u, c)})
			}
		}
	}
	return out
}

// colon ends the sentence before the formulas.
func (g *generator) colon(q quantity) string {
	switch {
	case q.mode && q.cols > 0:
		return ". The result is C₀u + C₁u', with the matrices"
	case q.mode && q.order > 2:
		return "; u holds u, u', …:"
	}
	return ":"
}

func (g *generator) formulas(b *bytes.Buffer, q quantity) {
	if q.form != nil {
		g.formula(b, q.form)
		return
	}
	if q.scalar() {
		g.formula(b, show.Elem(q.values[0]))
		return
	}
	empty := true
	for i, e := range q.values {
		if !e.IsZero() && !(q.rows > 0 && !q.mode && i/q.cols > i%q.cols) { // the rest by symmetry
			g.formula(b, show.Equation(show.Symbol(q.entryLabel(i), 0), show.Elem(e)))
			empty = false
		}
	}
	if empty {
		g.formula(b, show.Int(0))
	}
}

// entryLabel names an entry in a formula: [0,1].
func (q quantity) entryLabel(i int) string {
	switch n := q.cols; {
	case q.mode:
		return fmt.Sprintf("C%s[%d,%d]", []string{"₀", "₁"}[i/(n*n)], i/n%n, i%n)
	case q.rows > 0:
		return fmt.Sprintf("[%d,%d]", i/n, i%n)
	}
	return fmt.Sprintf("[%d]", i)
}

func (q quantity) goType() string {
	switch {
	case q.rows > 0:
		return fmt.Sprintf("[%d][%d]float64", q.rows, q.cols)
	case q.cols > 0:
		return fmt.Sprintf("[%d]float64", q.cols)
	}
	return "float64"
}

// result is the returned expression.
func (q quantity) result(values []string) string {
	switch {
	case q.mode && q.cols > 0:
		return fmt.Sprintf("[%d]float64{\n%s,\n}", q.cols, strings.Join(values, ",\n"))
	case q.mode:
		return values[0]
	case q.rows > 0:
		s := q.goType() + "{\n"
		for i := range q.rows {
			s += "{" + strings.Join(values[i*q.cols:(i+1)*q.cols], ", ") + "},\n"
		}
		return s + "}"
	case q.cols > 0:
		return q.goType() + "{" + strings.Join(values, ", ") + "}"
	}
	return values[0]
}

// numbers are the quantities that Evaluate computes.
func (g *generator) numbers() []quantity {
	var out []quantity
	for _, q := range g.quantities {
		if q.scalar() {
			out = append(out, q)
		}
	}
	return out
}

func (g *generator) numberValues() []field.Elem {
	var out []field.Elem
	for _, q := range g.numbers() {
		out = append(out, q.values[0])
	}
	return out
}

// together writes Coefficients and Evaluate.
func (g *generator) together(b *bytes.Buffer) {
	qs := g.numbers()
	if len(qs) == 0 {
		return
	}
	b.WriteString("// Coefficients holds the values of all functions that give a number.\ntype Coefficients struct {\n")
	for _, q := range qs {
		b.WriteString(q.name + " float64\n")
	}
	values := g.numberValues()
	fmt.Fprintf(b, "}\n\n// Evaluate computes all coefficients together, which costs less than one by one.\n"+
		"func Evaluate(%s) Coefficients {\n", g.arguments(values, false))
	code := Share(values, g.leaf)
	for _, s := range code.Statements {
		b.WriteString(s + "\n")
	}
	b.WriteString("return Coefficients{\n")
	for i, q := range qs {
		fmt.Fprintf(b, "%s: %s,\n", q.name, code.Results[i])
	}
	b.WriteString("}\n}\n")
}
