package main

// What the page of a reduction says, section by section.

import (
	"fmt"
	"math/big"
	"path/filepath"
	"slices"
	"strings"

	"remnant/expr/field"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/reduce"
	"remnant/series"
)

// findings is a reduction with what the command line asked for beside it.
type findings struct {
	*reduce.Result
	expansions []*reduce.Expansion
	values     *reduce.Values
	lowered    *reduce.Lowered
	check      *reduce.GaugeCheck
	steps      bool // show the action after each step
	full       bool // write out long expressions that follow from others
	elided     bool // a long solution was left out
}

// Expressions that follow from others on the page are written out up to longExpression
// terms, and conditions up to longCondition.
const (
	longExpression = 40
	longCondition  = 6
)

// long reports whether expressions are too long to be repeated on a page.
func (f *findings) long(es ...field.Elem) bool {
	n := 0
	for _, e := range es {
		n += e.Terms()
	}
	return !f.full && n > longExpression
}

// pageOf writes the page.
func pageOf(f *findings) *page {
	short := *f
	short.Result = f.Result.Abbreviated()
	f = &short
	p := &page{title: titleOf(f.Model), head: f.head()}
	for _, s := range []*section{f.solved(), f.remains(), f.effective(), f.series(), f.atPoint(), checkSection(f.check)} {
		if s != nil {
			p.sections = append(p.sections, *s)
		}
	}
	return p
}

// clockName is the clock's symbol.
func clockName(c parse.Clock) string {
	return [...]string{parse.Cosmic: "t", parse.Conformal: "eta", parse.Efolds: "N"}[c]
}

// titleOf is the model's title, or the name of its file.
func titleOf(m *parse.Model) string {
	if m.Title != "" {
		return m.Title
	}
	name := filepath.Base(m.Source.Name)
	return strings.TrimSuffix(name, filepath.Ext(name))
}

func (f *findings) head() []row {
	rows := append([]row{clockRow(f.Model.Clock)}, variantRows(f.Model)...)
	rows = append(rows, conditionRows(f.Model.K, f.Assumptions)...)
	var lets []phrase
	for _, l := range f.Abbreviations {
		lets = append(lets, compare(show.Symbol(l.Name, 0), equals, show.Elem(l.Value)))
	}
	if len(lets) > 0 {
		rows = append(rows, row{label: words("let"), value: join(",  ", lets...)})
	}
	return rows
}

func clockRow(c parse.Clock) row {
	symbol := maths(show.Symbol(clockName(c), 0))
	kind := [...]string{parse.Cosmic: "cosmic", parse.Conformal: "conformal", parse.Efolds: "e-folds"}[c]
	return row{label: words("clock"), value: join("", symbol, words(" ("+kind+"), prime = d/d"), symbol)}
}

// conditionRows are the background relations and what is assumed.
func conditionRows(k *field.Field, assumptions []field.Assumption) []row {
	var rows []row
	var relations, assumed []phrase
	for _, r := range k.Rules() {
		relations = append(relations, compare(show.Generator(k, r.Leader), equals, show.Elem(r.Value)))
	}
	for _, a := range assumptions {
		op := unequal
		if a.Positive {
			op = greater
		}
		assumed = append(assumed, compare(show.Elem(a.Factor), op, show.Int(0)))
	}
	if len(relations) > 0 {
		rows = append(rows, row{label: words("relations"), value: join(",  ", relations...)})
	}
	if len(assumed) > 0 {
		rows = append(rows, row{label: words("assumed"), value: join(",  ", assumed...)})
	}
	return rows
}

// solved lists the steps of the elimination.
func (f *findings) solved() *section {
	if len(f.Steps) == 0 {
		return nil
	}
	s := &section{heading: words("Solved")}
	var rows []row
	number := 0
	for _, st := range f.Steps {
		for _, sol := range st.Solutions {
			number++
			rows = append(rows, f.solutionRow(st, sol, number))
		}
		if f.steps {
			s.blocks = append(s.blocks, block{rows: rows}, f.actionBlock(st.After()))
			rows = nil
		}
	}
	if rows != nil {
		s.blocks = append(s.blocks, block{rows: rows})
	}
	return s
}

// longSolution is the size, in terms, from which the solution of a constraint is left out of
// the page.
const longSolution = 150

func (f *findings) solutionRow(st reduce.Step, sol reduce.Solution, number int) row {
	n, sum := sol.TimesLaplacian(f.Model.Wavenumber)
	r := row{number: number, label: maths(show.Spatial(sol.Name, 0, n)), value: compare(nil, equals, reduce.SumNode(sum))}
	size := 0
	for _, a := range sum {
		size += a.Coef.Terms()
	}
	if size > longSolution && !f.full {
		r.value, f.elided = words(fmt.Sprintf("an expression of %d terms, which --full writes out", size)), true
	}
	switch {
	case st.Kind == reduce.Redefined:
		r.note = words("redefines it, to expose a hidden constraint")
	case sol.Equation == "":
		r.note = join("", words("exchanges it for "), maths(show.Symbol(sol.Sum[0].Name, 0)))
	default:
		r.note = join("", words("from the "), maths(show.Symbol(sol.Equation, 0)), words(" equation"))
	}
	if n := needs(st.Nonzero); len(n) > 0 {
		r.note = join(", needs ", r.note, n)
	}
	return r
}

// needs lists factors that a step divides by; long ones stand at the head of the page.
func needs(factors []field.Elem) phrase {
	var list []phrase
	long := false
	for _, x := range factors {
		if x.Terms() > longCondition {
			long = true
			continue
		}
		list = append(list, compare(show.Elem(x), unequal, show.Int(0)))
	}
	if long {
		list = append(list, words("a longer factor assumed above"))
	}
	return join(", ", list...)
}

// actionBlock is the action of a system.
func (f *findings) actionBlock(s reduce.System) block {
	if len(s.Names) == 0 {
		return block{sentence: words("The action is zero.")}
	}
	form, err := s.Form()
	if err != nil {
		panic(err) // every step keeps the matrix self-adjoint
	}
	if len(s.Names) == 1 {
		q := make([]field.Elem, len(form.Symmetric))
		for n := range q {
			q[n] = form.Symmetric[n][0][0]
		}
		return block{display: show.Action(clockName(f.Model.Clock), s.Names[0], q)}
	}
	return block{display: show.ActionMatrix(clockName(f.Model.Clock), s.Names, form)}
}

var numerals = []string{"no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten"}

func degrees(n int) string {
	count := fmt.Sprint(n)
	if n < len(numerals) {
		count = numerals[n]
	}
	if n == 1 {
		return count + " degree of freedom"
	}
	return count + " degrees of freedom"
}

// remains is the result itself.
func (f *findings) remains() *section {
	if f.FormFactor != nil {
		return f.nonLocal()
	}
	var names []phrase
	for _, n := range f.Remaining.Names {
		names = append(names, maths(show.Symbol(n, 0)))
	}
	s := &section{}
	if f.DegreesOfFreedom == 0 {
		s.heading = words("Remains: nothing propagates (confirmed independently)")
	} else {
		s.heading = join("", words("Remains: "), list(names), words(", "+degrees(f.DegreesOfFreedom)+" (confirmed independently)"))
	}
	if rows := f.names(); len(rows) > 0 {
		s.blocks = append(s.blocks, block{rows: rows})
	}
	switch {
	case len(names) == 0:
		s.blocks = append(s.blocks, block{sentence: words("All fields are fixed by the constraints, and the action that is left is zero.")})
	case f.Single != nil && f.long(f.Single.Q...):
		s.blocks = append(s.blocks, f.actionByCoefficients())
	default:
		s.blocks = append(s.blocks, f.actionBlock(f.Remaining))
	}
	if rows := f.quantities(); len(rows) > 0 {
		s.blocks = append(s.blocks, block{rows: rows})
	}
	if f.Single != nil {
		rows, short := f.equations()
		s.blocks = append(s.blocks, block{rows: rows})
		if short || f.long(f.Single.Q...) || f.elided {
			s.blocks = append(s.blocks, block{sentence: words("Long expressions are given by others on this page; --full writes them out.")})
		}
	}
	return s
}

// names says what a new or redefined variable stands for.
func (f *findings) names() []row {
	var rows []row
	if sum := f.DefinitionSum(); sum != nil {
		rows = append(rows, row{label: words("where"), value: compare(show.Symbol(f.Requested, 0), equals, reduce.SumNode(sum))})
	}
	if sum := f.RequestedSum(); sum != nil {
		rows = append(rows, row{label: words("asked for"), value: compare(show.Symbol(f.Requested, 0), equals, reduce.SumNode(sum))})
	}
	return rows
}

// actionByCoefficients is the action by the names of the coefficients below it, for one
// Fourier mode.
func (f *findings) actionByCoefficients() block {
	u := func(n int) show.Node { return show.Power(show.Symbol(f.Variable, n), 2) }
	if f.Single.Kinetic == nil {
		return f.actionByOrders()
	}
	slow := show.Product(show.Symbol("gradient", 0), wave(2))
	if !f.Single.Mass.IsZero() {
		slow = show.Sum(slow, show.Symbol("mass", 0))
	}
	twice := show.Sum(show.Product(show.Symbol("kinetic", 0), u(1)), show.Neg(show.Product(slow, u(0))))
	return block{display: show.Equation(show.Symbol("S", 0),
		show.Integral(clockName(f.Model.Clock), show.Product(show.Rat(big.NewRat(1, 2)), show.Bracket(twice))))}
}

// actionByOrders is S = ∫ ½ [ Σ qₙ (u⁽ⁿ⁾)² ].
func (f *findings) actionByOrders() block {
	var terms []show.Node
	for n := len(f.Single.Q) - 1; n >= 0; n-- {
		terms = append(terms, show.Product(show.Symbol(fmt.Sprint("q", n), 0), show.Power(show.Symbol(f.Variable, n), 2)))
	}
	half := show.Rat(big.NewRat(1, 2))
	return block{display: show.Equation(show.Symbol("S", 0),
		show.Integral(clockName(f.Model.Clock), show.Product(half, show.Bracket(show.Sum(terms...)))))}
}

// quantities are the rows of what the action is made of, stability beside it.
func (f *findings) quantities() []row {
	var rows []row
	switch {
	case f.Single != nil:
		rows = f.shortSpeed(singleRows(f.Single))
	case f.Several != nil:
		rows = severalRows(f.Several)
	}
	var weak []phrase
	for _, s := range f.Stability {
		if s.Concern == reduce.StrongCoupling {
			weak = append(weak, f.vanishing(s.Condition))
			continue
		}
		rows = place(rows, s, f.full)
	}
	if len(weak) > 0 {
		rows = append(rows, row{label: words("strong coupling"), value: join("", words("where "), join(" or ", weak...))})
	}
	return rows
}

func singleRows(s *reduce.Single) []row {
	var rows []row
	add := func(label string, e field.Elem) {
		rows = append(rows, row{label: words(label), value: maths(show.Elem(e))})
	}
	switch {
	case s.Kinetic != nil:
		add("kinetic", *s.Kinetic)
		add("gradient", *s.Gradient)
		add("mass", *s.Mass)
	case len(s.Q) == 2:
		add("kinetic", s.Q[1])
		rows = append(rows, coefficientRow("q0", s.Q[0]))
	default:
		for n := len(s.Q) - 1; n >= 0; n-- {
			rows = append(rows, coefficientRow(fmt.Sprint("q", n), s.Q[n]))
		}
	}
	switch {
	case s.SoundSpeed2 != nil:
		add("sound speed²", *s.SoundSpeed2)
	case s.GrowthInK > 0:
		rows = append(rows, row{label: words("sound speed²"), value: words("unbounded")})
	}
	return rows
}

func coefficientRow(name string, e field.Elem) row {
	return row{label: maths(show.Symbol(name, 0)), value: maths(show.Elem(e))}
}

func severalRows(s *reduce.Several) []row {
	if s.SoundSpeeds == nil {
		return nil
	}
	if s.Roots != nil {
		var speeds []phrase
		for _, c := range s.Roots {
			speeds = append(speeds, maths(show.Elem(c)))
		}
		return []row{{label: words("sound speeds²"), value: list(speeds)}}
	}
	var terms []show.Node
	for i := len(s.SoundSpeeds) - 1; i >= 0; i-- {
		power := show.Int(1)
		if i > 0 {
			power = show.Power(show.Symbol("c_s", 0), 2*i)
		}
		terms = append(terms, show.Product(show.Elem(s.SoundSpeeds[i]), power))
	}
	return []row{{label: words("sound speeds"), value: compare(show.Sum(terms...), equals, show.Int(0))}}
}

// place puts a statement on stability beside the quantity it is about, or into a row of its
// own.
func place(rows []row, s reduce.Statement, full bool) []row {
	for _, label := range besides[s.Concern] {
		for i := range rows {
			if len(rows[i].label) == 1 && rows[i].label[0].words == label && rows[i].note == nil {
				rows[i].note = verdict(s, full)
				return rows
			}
		}
	}
	return append(rows, row{label: ownLabel[s.Concern], value: verdict(s, full)})
}

// besides lists the rows that a statement may stand beside, the best first.
var besides = map[reduce.Concern][]string{
	reduce.Ghost:        {"kinetic"},
	reduce.GradientSign: {"gradient", "sound speed²", "sound speeds²", "sound speeds"},
	reduce.MassSign:     {"mass"},
	reduce.Growth:       {"sound speed²"},
}

// ownLabel is the label of a statement in a row of its own.
var ownLabel = map[reduce.Concern]phrase{
	reduce.Ghost:        words("kinetic matrix"),
	reduce.GradientSign: join("", words("large "), maths(show.Symbol("k", 0))),
	reduce.MassSign:     join("", words("small "), maths(show.Symbol("k", 0))),
	reduce.Ostrogradsky: words("higher order"),
	reduce.Growth:       join("", words("large "), maths(show.Symbol("k", 0))),
}

// coefficientName is the coefficient whose sign a statement is about.
var coefficientName = map[reduce.Concern]string{
	reduce.Ghost: "kinetic coefficient", reduce.GradientSign: "gradient coefficient", reduce.MassSign: "mass coefficient",
}

// verdict is a statement in words.
func verdict(s reduce.Statement, full bool) phrase {
	fault := map[reduce.Concern]string{
		reduce.Ghost: "ghost", reduce.GradientSign: "gradient instability", reduce.MassSign: "tachyon",
	}[s.Concern]
	switch s.Concern {
	case reduce.Ostrogradsky:
		return words(fmt.Sprintf("an Ostrogradsky ghost: the equation of motion is of order %d", s.Number))
	case reduce.Growth:
		return join("", words("grows as "), maths(show.Power(show.Symbol("k", 0), s.Number)), words(" at large "), maths(show.Symbol("k", 0)))
	}
	switch s.Verdict {
	case reduce.Always:
		return words("no " + fault)
	case reduce.Never:
		return words("a " + fault)
	}
	conditions := s.Minors
	if len(conditions) == 0 {
		conditions = []field.Elem{s.Condition}
	}
	var list []phrase
	for _, c := range conditions {
		if name, ok := coefficientName[s.Concern]; ok && !full && len(s.Minors) == 0 && c.Terms() > longCondition {
			return words("no " + fault + " while the " + name + " is positive")
		}
		list = append(list, compare(show.Elem(c), greater, show.Int(0)))
	}
	return join("", words("no "+fault+" while "), join(" and ", list...))
}

// vanishing is the condition that a factor of the kinetic coefficient vanishes.
func (f *findings) vanishing(factor field.Elem) phrase {
	if !f.full && f.Single != nil && f.Single.Kinetic != nil && factor.Terms() > longCondition {
		return words("a longer factor of the kinetic coefficient vanishes")
	}
	return compare(show.Elem(factor), equals, show.Int(0))
}

// shortSpeed gives a long sound speed by the coefficients above it.
func (f *findings) shortSpeed(rows []row) []row {
	s := f.Single
	if s.Kinetic == nil || s.SoundSpeed2 == nil || !f.long(*s.SoundSpeed2) {
		return rows
	}
	last := &rows[len(rows)-1]
	last.value = join("", maths(show.Elem(f.Frame2())), words(" gradient/kinetic"))
	return rows
}

// equations are the equation of motion and the canonical variable; short, if one of them is
// given by other expressions of the page.
func (f *findings) equations() (rows []row, short bool) {
	var motion phrase
	if eom := f.Single.EquationOfMotion; eom == nil || f.long(eom...) {
		motion, short = f.motionByCoefficients(), true
	} else {
		motion = f.motion()
	}
	rows = []row{{label: words("equation of motion"), value: motion}}
	freq, ok := f.Frequency2()
	if !ok {
		return rows, short
	}
	v := func(n int) show.Node { return show.Symbol("v", n) }
	z2 := show.Power(show.Symbol("z", 0), 2)
	curvature := show.Quotient(show.Symbol("z", 2), show.Symbol("z", 0))
	omega2 := show.Elem(freq)
	if f.Single.Mass != nil && f.Single.Mass.IsZero() && f.long(freq) {
		omega2, short = show.Product(show.Power(show.Symbol("c_s", 0), 2), show.Power(show.Symbol("k", 0), 2)), true
	}
	mode := show.Sum(v(2), show.Product(show.Sum(omega2, show.Neg(curvature)), v(0)))
	square := maths(show.Elem(*f.Single.ZSquared))
	if f.Single.Kinetic != nil && f.long(*f.Single.ZSquared) {
		square, short = join("", maths(show.Elem(f.Model.Lapse.Div(f.Model.A))), words(" kinetic")), true
	}
	second := words("½(z²)''/z² − ¼((z²)'/z²)²")
	if zpp := f.Single.ZppOverZ; zpp == nil || f.long(*zpp) {
		short = true
	} else {
		second = maths(show.Elem(*zpp))
	}
	canonical := join(", ",
		compare(v(0), equals, show.Product(show.Symbol("z", 0), show.Symbol(f.Variable, 0))),
		compare(mode, equals, show.Int(0)))
	rows = append(rows,
		row{label: words("canonical"), value: canonical, note: primes(f.Model.Clock)},
		row{label: maths(z2), value: square},
		row{label: maths(curvature), value: second})
	return rows, short
}

// motion is Σ cᵢ u⁽ⁱ⁾ = 0.
func (f *findings) motion() phrase {
	var terms []show.LinearTerm
	for i := len(f.Single.EquationOfMotion) - 1; i >= 0; i-- {
		terms = append(terms, show.LinearTerm{Coef: f.Single.EquationOfMotion[i], Name: f.Variable, Order: i})
	}
	return compare(show.Linear(terms), equals, show.Int(0))
}

// motionUnderived is Σ (−1)ⁿ (qₙ u⁽ⁿ⁾)⁽ⁿ⁾ = 0, by the names of the coefficients above it.
func (f *findings) motionUnderived() phrase {
	var out phrase
	if len(f.Single.Q) == 2 {
		return join("", words("(kinetic "), maths(show.Symbol(f.Variable, 1)), words(")' = "), maths(show.Symbol("q0", 0)), words(" "), maths(show.Symbol(f.Variable, 0)))
	}
	for n := len(f.Single.Q) - 1; n >= 0; n-- {
		sign := " + "
		switch {
		case n%2 != 0:
			sign = " − "
		case out == nil:
			sign = ""
		}
		out = join("", out, words(sign+"("), maths(show.Symbol(fmt.Sprint("q", n), 0)), words(" "), maths(show.Symbol(f.Variable, n)),
			words(")"+strings.Repeat("'", n)))
	}
	return append(out, piece{words: " = 0"})
}

// motionByCoefficients is (𝒦u′)′ = 𝒢∂²u − ℳu in words.
func (f *findings) motionByCoefficients() phrase {
	if f.Single.Kinetic == nil {
		return f.motionUnderived()
	}
	out := join("", words("(kinetic "), maths(show.Symbol(f.Variable, 1)), words(")' = gradient "), maths(show.Spatial(f.Variable, 0, 2)))
	if !f.Single.Mass.IsZero() {
		out = join("", out, words(" − mass "), maths(show.Symbol(f.Variable, 0)))
	}
	return out
}

// primes says what the primes of the canonical equation are, where the clock has others.
func primes(c parse.Clock) phrase {
	if c == parse.Conformal {
		return nil
	}
	return join("", words("primes here are d/d"), maths(show.Symbol("eta", 0)))
}

// series is a section of the expansions.
func (f *findings) series() *section {
	if len(f.expansions) == 0 {
		return nil
	}
	s := &section{heading: words("Series of the operator")}
	for _, x := range f.expansions {
		if x.In == "1/k" && isExact(x) { // as on large scales
			continue
		}
		s.blocks = append(s.blocks, block{sentence: expansionTitle(x)}, block{rows: f.expansionRows(x)})
	}
	return s
}

// isExact reports whether an expansion leaves nothing out.
func isExact(x *reduce.Expansion) bool {
	return !slices.ContainsFunc(x.Coefs, func(c series.Coefficient) bool { return !c.Exact })
}

func expansionTitle(x *reduce.Expansion) phrase {
	switch {
	case x.In == "k" && isExact(x):
		return join("", words("in powers of "), maths(show.Symbol("k", 0)), words(": nothing is left out"))
	case x.In == "k":
		return join("", words("large scales, to order "), maths(wave(x.Order)))
	case x.In == "1/k":
		return join("", words("small scales, to order "), maths(leftOut(x, -x.Order)))
	}
	var names []phrase
	for _, n := range strings.Split(x.In, ", ") {
		names = append(names, maths(show.Symbol(n, 0)))
	}
	return join("", words("small "), list(names), words(fmt.Sprintf(", to order %d", x.Order)))
}

func (f *findings) expansionRows(x *reduce.Expansion) []row {
	var rows []row
	for i, p := range x.Places {
		var terms []show.Node
		for _, t := range x.Coefs[i].Terms {
			terms = append(terms, show.Elem(x.Value(t)))
		}
		value := formula{{node: show.Sum(terms...)}}
		if !x.Coefs[i].Exact {
			value = append(value, part{sign: plus}, part{order: leftOut(x, x.Coefs[i].Order)})
			if len(terms) == 0 {
				value = value[2:]
			}
		}
		rows = append(rows, row{label: f.placeLabel(p), value: phrase{{maths: value}}})
	}
	return rows
}

// wave is kⁿ, n ≥ 0.
func wave(n int) show.Node {
	if n == 0 {
		return show.Int(1)
	}
	return show.Power(show.Symbol("k", 0), n)
}

// leftOut is what stands in O(…).
func leftOut(x *reduce.Expansion, order int) show.Node {
	if x.In == "k" || x.In == "1/k" {
		if order < 0 {
			return show.Quotient(show.Int(1), wave(-order))
		}
		return wave(order)
	}
	if !strings.Contains(x.In, ",") {
		return show.Power(show.Symbol(x.In, 0), order)
	}
	return show.Int(int64(order)) // total degree
}

func (f *findings) placeLabel(p reduce.Place) phrase {
	letter := "q"
	if p.Antisymmetric {
		letter = "p"
	}
	label := maths(show.Symbol(fmt.Sprint(letter, p.N), 0))
	if f.Single == nil {
		names := f.Remaining.Names
		label = join("", label, words(" ("), maths(show.Symbol(names[p.A], 0)), words(", "), maths(show.Symbol(names[p.B], 0)), words(")"))
	}
	return label
}

// atPoint is a section of values.
func (f *findings) atPoint() *section {
	if f.values == nil {
		return nil
	}
	var point []phrase
	for _, a := range f.values.Point {
		point = append(point, compare(show.Generator(f.Model.K, a.Gen), equals, show.Elem(a.Value)))
	}
	s := &section{heading: join("", words("At "), list(point))}
	if f.values.Single != nil {
		rows := singleRows(f.values.Single)
		for i, c := range f.values.Single.EquationOfMotion {
			if i == len(f.values.Single.EquationOfMotion)-1 {
				break // it is 1
			}
			label := join("", words("equation of motion, coefficient of "), maths(show.Symbol(f.Variable, i)))
			rows = append(rows, row{label: label, value: maths(show.Elem(c))})
		}
		if z := f.values.Single; z.ZSquared != nil {
			rows = append(rows,
				row{label: maths(show.Power(show.Symbol("z", 0), 2)), value: maths(show.Elem(*z.ZSquared))},
				row{label: maths(show.Quotient(show.Symbol("z", 2), show.Symbol("z", 0))), value: maths(show.Elem(*z.ZppOverZ))})
		}
		s.blocks = append(s.blocks, block{rows: rows})
	}
	if f.values.Several != nil {
		system := f.values.Several
		s.blocks = append(s.blocks,
			block{display: show.ActionMatrix(clockName(f.Model.Clock), f.Remaining.Names, system.Form)},
			block{rows: severalRows(system)})
	}
	return s
}
