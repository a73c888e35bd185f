package main

// What the page of an expansion says: the background equations as derived and what each was
// solved for, then the quadratic action. A long factor of a coefficient gets a name, so that
// the action can be read at a glance; one factor has one name wherever it stands.

import (
	"fmt"
	"slices"
	"strings"

	"remnant/expr/field"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/reduce"
	"remnant/rules"
)

// expansionPage writes the page of a model expanded in one sector or in all.
func expansionPage(list []*reduce.Expanded, checks []*reduce.GaugeCheck, full bool) *page {
	x := list[0]
	var assumed []field.Assumption
	for _, y := range list {
		assumed = joinAssumptions(assumed, y.Assumptions)
	}
	p := &page{title: titleOf(x.Model)}
	if len(list) > 1 {
		p.head = sectorsHead(x.Model, assumed)
	} else {
		p.head = append([]row{clockRow(x.Model.Clock)}, variantRows(x.Model)...)
		if expandable(x.Model) {
			p.head = append(p.head, perturbedRow(x.Model))
		}
		p.head = append(p.head, conditionRows(x.Model.K, assumed)...)
	}
	if len(x.Background) > 0 {
		p.sections = append(p.sections, backgroundSection(x))
	}
	for i, y := range list {
		own := []section{quadraticSection(y, full)}
		if c := checkSection(checks[i]); c != nil {
			own = append(own, *c)
		}
		if len(list) > 1 {
			own = headed(sectorWord[y.Model.Sector], own)
		}
		p.sections = append(p.sections, own...)
	}
	return p
}

// backgroundSection lists the background equations in the order in which they were solved.
func backgroundSection(x *reduce.Expanded) section {
	s := section{heading: words("Background equations")}
	var rows []row
	var idle []phrase
	for _, eq := range x.Background {
		from := maths(show.Symbol(eq.From, 0))
		r := row{label: join("", words("from "), from), value: compare(withoutUnits(x.Model, eq.Value), equals, show.Int(0)), note: solvedNote(x.Model, eq)}
		if !eq.Solved && !eq.Value.IsZero() {
			idle = append(idle, from)
		}
		rows = append(rows, r)
	}
	s.blocks = append(s.blocks, block{rows: rows})
	if x.Model.Covariant != nil {
		s.blocks = append(s.blocks, block{sentence: bianchiPhrase(idle)})
	} else {
		s.blocks = append(s.blocks, block{sentence: words("The functions of time are given and not varied: these equations are conditions on them.")})
	}
	return s
}

// bianchiPhrase says which equations were not needed; the identity is verified by the
// expansion, which fails without it.
func bianchiPhrase(idle []phrase) phrase {
	out := words("The Bianchi identity between these equations was verified: one of them follows from the others")
	switch len(idle) {
	case 0:
		return append(out, piece{words: "."})
	case 1:
		return join("", out, words(", here that from "), idle[0], words("."))
	}
	return join("", out, words(". Those from "), join(" and ", idle...), words(" say nothing more."))
}

// solvedNote says what an equation was solved for.
func solvedNote(m *parse.Model, eq rules.Equation) phrase {
	switch {
	case eq.Value.IsZero():
		return words("holds on this background")
	case !eq.Solved:
		return words("holds by those before")
	}
	text := "solved for "
	if !eq.Value.Has(eq.Leader) {
		text = "with those before solved for "
	}
	note := join("", words(text), maths(show.Generator(m.K, eq.Leader)))
	if n := needs(leadFactors(eq)); len(n) > 0 {
		note = join(", needs ", note, n)
	}
	return note
}

// withoutUnits lays out the left side of e = 0 without numbers, without powers of the scale
// factor and the lapse, which do not vanish, and with a positive term in front.
func withoutUnits(m *parse.Model, e field.Elem) show.Node {
	e = e.Lowest()
	if e.IsZero() {
		return show.Int(0)
	}
	number, factors := e.Factors()
	e = e.Div(m.K.Rat(number))
	units := append(m.A.Gens(), m.Lapse.Gens()...)
	slices.Sort(units)
	for _, g := range slices.Compact(units) {
		for _, f := range factors {
			if f.P.IsMono() && f.P.Has(g) {
				e = e.Div(m.K.Gen(g).Pow(f.Exp))
			}
		}
	}
	if strings.HasPrefix(show.ASCII(show.Elem(e), 0), "-") {
		e = e.Neg()
	}
	return show.Elem(e)
}

// leadFactors are what an equation was divided by when it was solved.
func leadFactors(eq rules.Equation) []field.Elem {
	num := eq.Reduced.Num()
	c := num.CoeffsIn(eq.Leader)
	lead, err := eq.Reduced.Field().Poly(c[len(c)-1])
	if err != nil {
		return nil
	}
	return lead.Vanishable()
}

// quadraticSection is the quadratic action.
func quadraticSection(x *reduce.Expanded, full bool) section {
	s := section{heading: words("Second order, up to total derivatives, before anything is eliminated")}
	if !expandable(x.Model) {
		s.heading = words("Quadratic action")
		s.blocks = append(s.blocks, block{sentence: words("The Lagrangian is quadratic as it stands, and there is nothing to expand. Up to total derivatives it is:")})
	}
	if len(x.Lagrangian) == 0 {
		s.blocks = append(s.blocks, block{sentence: words("The quadratic action is zero.")})
		return s
	}
	names := &factorNames{k: x.Model.K, stem: nameStem(x.Model)}
	var list []show.FieldProduct
	if !full {
		names.choose(x.Lagrangian)
	}
	for _, p := range x.Lagrangian {
		q := x.Show(p)
		q.Coef, q.Symbol = names.split(p.Coef)
		list = append(list, q)
	}
	body := show.Bracket(show.FieldProducts(list))
	s.blocks = append(s.blocks, block{display: show.Equation(show.Symbol("S", 0), show.Integral(clockName(x.Model.Clock), body))})
	if rows := names.rows(); rows != nil {
		s.blocks = append(s.blocks, block{rows: rows})
	}
	for _, n := range x.NonLocal {
		s.blocks = append(s.blocks, block{sentence: nonLocalPhrase(x, n)})
	}
	return s
}

// nonLocalPhrase says what a form factor adds to the action.
func nonLocalPhrase(x *reduce.Expanded, n rules.NonLocal) phrase {
	y := maths(show.Symbol(x.Form.Names[n.Field], 0))
	form := join("", maths(show.Symbol(n.Form.Name, 0)), words("(□)"))
	weighted := join("", words("("), maths(show.Elem(n.Weight)), words(" "), form, words(")⁻¹"))
	if n.Weight.IsOne() {
		weighted = join("", form, words("⁻¹"))
	}
	return join("", words("and −½∫√−g "), y, words(" "), weighted, words(" "), y,
		words(", where "), y, words(" stands for what "), form, words(" acts on: its own equation gives it back."))
}

// factorNames names the long factors of coefficients.
type factorNames struct {
	k       *field.Field
	stem    string
	factors []field.Elem
}

// choose names the factors of more than longCondition terms, and those of more than half as
// many that stand in several coefficients.
func (n *factorNames) choose(list []reduce.Product) {
	var longs []field.Elem
	for _, p := range list {
		_, long := n.parts(p.Coef)
		longs = append(longs, long)
	}
	for i, f := range longs {
		repeated := slices.ContainsFunc(longs[i+1:], func(g field.Elem) bool { _, ok := g.Div(f).Rat(); return ok })
		known := slices.ContainsFunc(n.factors, func(g field.Elem) bool { _, ok := g.Div(f).Rat(); return ok })
		if !known && (f.Terms() > longCondition || repeated && f.Terms() > longCondition/2) {
			n.factors = append(n.factors, f)
		}
	}
}

// parts writes c as a product: numbers and single quantities, and the rest.
func (n *factorNames) parts(c field.Elem) (short, long field.Elem) {
	r, factors := c.Factors()
	short, long = n.k.Rat(r), n.k.Int(1)
	for _, f := range factors {
		p, err := n.k.Poly(f.P)
		switch {
		case err != nil:
			return c, n.k.Int(1)
		case f.P.IsMono():
			short = short.Mul(p.Pow(f.Exp))
		default:
			long = long.Mul(p.Pow(f.Exp))
		}
	}
	return short, long
}

// split takes a named factor out of c; without one the name is empty.
func (n *factorNames) split(c field.Elem) (rest field.Elem, name string) {
	short, long := n.parts(c)
	for i, f := range n.factors {
		if q, ok := long.Div(f).Rat(); ok {
			return short.Mul(n.k.Rat(q)), n.name(i)
		}
	}
	return c, ""
}

func (n *factorNames) name(i int) string { return fmt.Sprint(n.stem, i+1) }

func (n *factorNames) rows() []row {
	var rows []row
	for i, f := range n.factors {
		rows = append(rows, row{label: maths(show.Symbol(n.name(i), 0)), value: compare(nil, equals, show.Elem(f))})
	}
	return rows
}

// nameStem is a letter that begins no numbered name of the model.
func nameStem(m *parse.Model) string {
	var taken []string
	for _, list := range [][]parse.Declared{m.Constants, m.Background} {
		for _, d := range list {
			taken = append(taken, d.Name)
		}
	}
	for _, f := range m.Functions {
		taken = append(taken, f.Name)
	}
	for _, f := range m.Fields {
		taken = append(taken, f.Name)
	}
	stem := "c"
	for _, s := range []string{"c", "g", "b", "C", "coefficient_"} {
		stem = s
		if !slices.ContainsFunc(taken, func(name string) bool {
			rest, ok := strings.CutPrefix(name, s)
			return ok && strings.Trim(rest, "_0123456789") == ""
		}) {
			break
		}
	}
	return stem
}
