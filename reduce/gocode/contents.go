package gocode

// What a package holds: the functions that are generated for a result, each with its values,
// its formula and its words.

import (
	"fmt"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/reduce"
)

// quantity is one generated function: a number, an array or a matrix.
type quantity struct {
	name   string
	doc    string // what it is, as a predicate: "is the coefficient of …"
	rows   int    // 0: a number or an array
	cols   int    // 0: a number
	values []field.Elem
	form   show.Node // what the doc comment shows; nil: each value
	mode   bool      // an equation of motion: values are coefficients
	order  int       // mode: of the equation
}

// scalar reports whether the quantity is one number.
func (q quantity) scalar() bool { return q.cols == 0 && !q.mode }

func number(name, doc string, e field.Elem) quantity {
	return quantity{name: name, doc: doc, values: []field.Elem{e}}
}

// withDerivative is the number and its derivative by the clock.
func withDerivative(name, doc string, e field.Elem) []quantity {
	return []quantity{number(name, doc, e),
		number("D"+name, "is the derivative of "+name+" by the clock", e.D().Lowest())}
}

func contentsOf(r *reduce.Result) ([]quantity, error) {
	switch {
	case r.Single != nil:
		return singleContents(r.Variable, r.Single), nil
	case r.Several != nil:
		return severalContents(r)
	case r.FormFactor != nil:
		return nil, fmt.Errorf("code for an action with a form factor is not yet supported")
	}
	return nil, fmt.Errorf("nothing propagates in this model, so there is no code to write")
}

func singleContents(u string, s *reduce.Single) []quantity {
	var out []quantity
	if s.Kinetic != nil {
		out = append(out, withDerivative("Kinetic", "is 𝒦, the coefficient of the squared velocity", *s.Kinetic)...)
		out = append(out, withDerivative("Gradient", "is 𝒢, the coefficient of the squared gradient", *s.Gradient)...)
		out = append(out, withDerivative("Mass", "is ℳ, the coefficient of the squared field", *s.Mass)...)
	} else {
		for n, q := range s.Q {
			doc := fmt.Sprintf("is q%s of L = ½ Σ qₙ (u⁽ⁿ⁾)²", show.UnicodeName(fmt.Sprintf("_%d", n))[1:])
			out = append(out, withDerivative(fmt.Sprintf("Q%d", n), doc, q)...)
		}
	}
	if s.SoundSpeed2 != nil {
		out = append(out, number("SoundSpeedSquared", "is c_s², the squared sound speed in units of that of light", *s.SoundSpeed2))
	}
	if s.ZSquared != nil {
		out = append(out, number("ZSquared", "is z² = 𝒦N̄/a; v = zu is the canonical variable", *s.ZSquared))
	}
	if s.ZppOverZ != nil {
		out = append(out, number("ZppOverZ", "is z″/z, where a prime is a derivative by conformal time", *s.ZppOverZ))
	}
	if n := len(s.EquationOfMotion) - 1; n > 0 {
		out = append(out, modeEquation(u, s.EquationOfMotion))
	}
	return out
}

// modeEquation gives the highest derivative from the lower ones: values are −cᵢ.
func modeEquation(u string, c []field.Elem) quantity {
	n := len(c) - 1
	q := quantity{name: "ModeEquation", mode: true, order: n,
		doc: "gives the highest time derivative of the field from the lower ones"}
	var terms []show.LinearTerm
	for i := n - 1; i >= 0; i-- {
		terms = append(terms, show.LinearTerm{Coef: c[i].Neg(), Name: u, Order: i})
	}
	for i := range n {
		q.values = append(q.values, c[i].Neg())
	}
	q.form = show.Equation(show.Symbol(u, n), show.Linear(terms))
	return q
}

func severalContents(r *reduce.Result) ([]quantity, error) {
	var out []quantity
	names := r.Remaining.Names
	add := func(letter, what string, ms [][][]field.Elem) {
		for n, m := range ms {
			name := fmt.Sprintf("%s%d", letter, n)
			doc := fmt.Sprintf("is the %s matrix of the products %s in L", what, derivativesOf(letter, n))
			out = append(out, matrix(name, doc, m), matrix("D"+name, "is the derivative of "+name+" by the clock", derivative(m)))
		}
	}
	add("Q", "symmetric", r.Several.Form.Symmetric)
	add("P", "antisymmetric", r.Several.Form.Antisymmetric)
	if c := r.Several.SoundSpeeds; c != nil {
		out = append(out, quantity{name: "SoundSpeedPolynomial", cols: len(c), values: c,
			doc: "holds the coefficients of 1, c², c⁴, … in the equation whose roots are the squared sound speeds"})
	}
	if q, ok := modeEquations(r.Model.K, names, r.Remaining.D); ok {
		out = append(out, q)
	}
	if len(out) == 0 {
		return nil, fmt.Errorf("the action of what remains vanishes, so there is no code to write")
	}
	return out, nil
}

// derivativesOf names the products of fields that a matrix of the normal form multiplies.
func derivativesOf(letter string, n int) string {
	u := func(n int, index string) string {
		if n == 0 {
			return "u" + index
		}
		return "u" + index + "⁽" + string([]rune("⁰¹²³⁴⁵⁶⁷⁸⁹")[n%10]) + "⁾"
	}
	if letter == "Q" {
		return "½ " + u(n, "ᵃ") + " " + u(n, "ᵇ")
	}
	return "½ " + u(n, "ᵃ") + " " + u(n+1, "ᵇ")
}

func matrix(name, doc string, m [][]field.Elem) quantity {
	q := quantity{name: name, doc: doc, rows: len(m), cols: len(m)}
	for _, row := range m {
		q.values = append(q.values, row...)
	}
	return q
}

func derivative(m [][]field.Elem) [][]field.Elem {
	out := make([][]field.Elem, len(m))
	for i, row := range m {
		for _, e := range row {
			out[i] = append(out[i], e.D().Lowest())
		}
	}
	return out
}

// maxSystem is the number of fields up to which the accelerations are solved for in closed
// form.
const maxSystem = 3

// modeEquations solves 𝒟u = 0 for the second derivatives, where the matrix of their
// coefficients is regular: values are the rows of −A₂⁻¹A₀, then those of −A₂⁻¹A₁.
func modeEquations(k *field.Field, names []string, d oper.Matrix) (quantity, bool) {
	n := len(names)
	if d.Order() != 2 || n > maxSystem {
		return quantity{}, false
	}
	coef := func(i int) [][]field.Elem {
		m := make([][]field.Elem, n)
		for a := range m {
			for b := range n {
				m[a] = append(m[a], d.At(a, b).Coef(i))
			}
		}
		return m
	}
	inv, ok := oper.Inverse(k, coef(2))
	if !ok {
		return quantity{}, false
	}
	q := quantity{name: "ModeEquations", mode: true, order: 2, rows: n, cols: n,
		doc: "gives the second time derivatives of the fields from the lower ones"}
	for i := range 2 {
		low := coef(i)
		for a := range n {
			for b := range n {
				var sum field.Elem
				for c := range n {
					sum = sum.Add(inv[a][c].Mul(low[c][b]))
				}
				q.values = append(q.values, sum.Neg().Lowest())
			}
		}
	}
	return q, true
}

// clockSymbol is the name of the time variable, and what it is called.
func clockSymbol(c parse.Clock) (symbol, words string) {
	switch c {
	case parse.Conformal:
		return "eta", "conformal time η"
	case parse.Efolds:
		return "N", "the number of e-folds N"
	}
	return "t", "cosmic time t"
}

// actionOf lays out the action of what remains.
func actionOf(r *reduce.Result) show.Node {
	clock, _ := clockSymbol(r.Model.Clock)
	if r.Single != nil {
		return show.Action(clock, r.Variable, r.Single.Q)
	}
	return show.ActionMatrix(clock, r.Remaining.Names, r.Several.Form)
}
