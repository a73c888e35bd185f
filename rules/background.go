package rules

// The background equations: the Euler–Lagrange expressions of A, ζ and the scalars at first
// order, made into oriented relations. The Bianchi identity makes one of them follow from
// the others; it is verified before it is used.

import (
	"errors"
	"fmt"
	"slices"

	"remnant/expr/field"
	"remnant/expr/poly"
	"remnant/parse"
	"remnant/parse/diag"
)

// Equation is a background equation: Value = 0, found by varying From.
type Equation struct {
	From    string
	Value   field.Elem // as derived
	Leader  field.Gen  // what it was solved for
	Solved  bool       // false: it follows from the equations and relations before it
	Reduced field.Elem // what was left of it by those before, where it was solved
}

// firstOrder expands the Lagrangian in uniform A, ζ and scalars, on which k = 0 depends, and
// returns their Euler–Lagrange expressions in that order.
func (x *expansion) firstOrder() ([]Equation, error) {
	names := []string{"A", "zeta"}
	for _, s := range x.scalars {
		names = append(names, "d"+x.m.K.Info(s).Name)
	}
	r := *x.ring
	r.uniform = true
	e := x.evaluator(&r, names)
	l, _ := x.lagrangian(e)
	var out []Equation
	for i, n := range names {
		out = append(out, Equation{From: n, Value: r.euler(l, i, x.density)})
	}
	if x.m.ADM != nil {
		return out, nil
	}
	return out, x.bianchi(out)
}

// bianchi verifies the identity that invariance under a change of the time variable gives,
// δA = N̄⁻¹(N̄T)′, δζ = (a′/a)T, δφ = φ′T:
//
//	−N̄ (E_A/N̄)′ + (a′/a) E_ζ + Σ φ′ E_φ = 0.
func (x *expansion) bianchi(eqs []Equation) error {
	n := x.m.Lapse
	sum := eqs[0].Value.Div(n).D().Mul(n).Neg()
	sum = sum.Add(x.m.A.D().Div(x.m.A).Mul(eqs[1].Value))
	for i, s := range x.scalars {
		sum = sum.Add(x.m.K.Jet(s, 1).Mul(eqs[i+2].Value))
	}
	if !sum.IsZero() {
		return fmt.Errorf("rules: the background equations violate the Bianchi identity by %v; this is a fault of the program, please report the model", sum)
	}
	return nil
}

// solve makes the equations relations of the field, each reduced by those before. One that can
// be solved for nothing waits until the others are; the Bianchi identity then makes its
// derivative vanish, and it may fix a function of X alone without its derivatives.
func (x *expansion) solve(eqs []Equation) error {
	var waiting []int
	for i := range eqs {
		err := x.solveOne(&eqs[i], eqs, false)
		var stuck *field.Unsolvable
		if errors.As(err, &stuck) {
			waiting = append(waiting, i)
		} else if err != nil {
			return err
		}
	}
	for _, i := range waiting {
		if err := x.solveOne(&eqs[i], eqs, true); err != nil {
			return x.relationError(eqs[i], eqs[i].Reduced, err)
		}
	}
	return nil
}

func (x *expansion) solveOne(eq *Equation, eqs []Equation, last bool) error {
	k := x.m.K
	k.Budget().Stage("solving the background equation of " + eq.From)
	e, err := eq.Value.Normal()
	if err != nil {
		return x.noSolution(*eq, eq.Value)
	}
	e = e.Lowest()
	eq.Reduced = e
	if e.IsZero() {
		return nil
	}
	if len(e.Vanishable()) == 0 { // it cannot vanish
		return x.noSolution(*eq, e)
	}
	number := len(x.m.Relations)
	eq.Leader, err = x.orient(e, number, eqs, last)
	var stuck *field.Unsolvable
	if errors.As(err, &stuck) {
		return err
	}
	if err != nil {
		return x.relationError(*eq, e, err)
	}
	x.m.Relations = append(x.m.Relations, parse.RelationDecl{Text: "the equation of " + eq.From, Auto: true})
	eq.Solved = true
	return nil
}

// orient chooses the leader of e = 0 and adds the relation: the first class that holds a
// jet in which e is linear. The last resorts are a function of X alone that stands beside its
// derivatives, and a rate that enters squared.
func (x *expansion) orient(e field.Elem, number int, eqs []Equation, last bool) (field.Gen, error) {
	k, rank := x.m.K, x.rank
	if x.m.ADM != nil {
		rank = func(g field.Gen) []int { return x.admRank(g, eqs) }
	}
	type candidate struct {
		gen  field.Gen
		rank []int
	}
	var all []candidate
	for _, g := range e.Num().Vars() {
		if r := rank(g); r != nil && k.CanLead(e, g) {
			// of equals the simplest coefficient
			all = append(all, candidate{g, slices.Insert(r, 2, -e.Num().CoeffsIn(g)[1].TotalDegree())})
		}
	}
	slices.SortFunc(all, func(a, b candidate) int { return slices.Compare(b.rank, a.rank) })
	for _, c := range all {
		err := k.RelateFor(e, c.gen, number)
		var stuck *field.Unsolvable
		if !errors.As(err, &stuck) {
			return c.gen, err
		}
	}
	if !last {
		return 0, &field.Unsolvable{Rest: e}
	}
	for _, g := range e.Num().Vars() {
		if in := k.Info(g); in.Kind == field.FreeFunction && slices.Max(in.Index) == 0 && e.Num().Degree(g) == 1 {
			if err := k.RelateClosed(e, g, number); err == nil {
				return g, nil
			}
		}
	}
	return x.orientSquare(e, number)
}

// rank orders what may lead: H⁽ⁿ⁾ with n ≥ 1, an undifferentiated function, a jet of a function
// of scalars alone, a constant, φ⁽ⁿ⁾ with n ≥ 1, a jet by scalars of a function that depends on
// more (its value fixes mixed jets too, by division by the rate of what it depends on); within
// a class the highest derivative, then the first.
func (x *expansion) rank(g field.Gen) []int {
	in := x.m.K.Info(g)
	switch in.Kind {
	case field.Function:
		switch {
		case in.Order == 0:
			return nil
		case in.Name == "H":
			return []int{5, in.Order, -int(g)}
		case in.Name != "a":
			return []int{1, in.Order, -int(g)}
		}
	case field.FreeFunction:
		class, total := 3, 0
		for i, n := range in.Index {
			total += n
			if x.isScalar(in.Fn.Args[i]) {
				continue
			}
			if n > 0 {
				return nil
			}
			class = 0
		}
		if total == 0 {
			return []int{4, 0, -int(g)}
		}
		return []int{class, total, -int(g)}
	case field.Constant:
		if in.Name != "pi" {
			return []int{2, 0, -int(g)}
		}
	}
	return nil
}

func (x *expansion) isScalar(arg field.Elem) bool {
	for _, s := range x.scalars {
		if arg.Equal(x.m.K.Gen(s)) {
			return true
		}
	}
	return false
}

// orientSquare solves c·H² + rest = 0 by H → √(−rest/c), where only H² enters.
func (x *expansion) orientSquare(e field.Elem, number int) (field.Gen, error) {
	k := x.m.K
	n := e.Num()
	for _, g := range n.Vars() {
		in := k.Info(g)
		c := n.CoeffsIn(g)
		if in.Kind != field.Function || in.Name == "a" || in.Name != "H" && in.Order == 0 || len(c) != 3 || !c[1].IsZero() || derivativeStands(k, n, g) {
			continue
		}
		lead, err := k.Poly(c[2])
		if err != nil {
			continue
		}
		rest, err := k.Poly(c[0])
		if err != nil {
			continue
		}
		k.AssumeNonzero(lead, "the relation for "+in.Name+" divides by it")
		root, err := k.Sqrt(rest.Neg().Div(lead))
		if err != nil {
			continue
		}
		return g, k.RelateGen(g, root, number)
	}
	return 0, &field.Unsolvable{Rest: e}
}

// derivativeStands reports whether a derivative of g stands in n beside g.
func derivativeStands(k *field.Field, n poly.Poly, g field.Gen) bool {
	for _, h := range n.Vars() {
		if h != g && k.Info(h).Kind == field.Function && k.Base(h) == k.Base(g) && k.Info(h).Order > k.Info(g).Order {
			return true
		}
	}
	return false
}

func (x *expansion) relationError(eq Equation, rest field.Elem, err error) error {
	var bad *field.Contradiction
	var stuck *field.Unsolvable
	switch {
	case errors.As(err, &bad):
		return x.noSolution(eq, bad.Follows)
	case errors.As(err, &stuck):
		return x.refuse(NoLeader, x.m.LagrangianSpan,
			fmt.Sprintf("the background equation of %s can be solved for none of its quantities: %s = 0", eq.From, show(rest)), x.neededRelation())
	}
	return err
}

// noSolution says which equation the declared background violates, and by what.
func (x *expansion) noSolution(eq Equation, left field.Elem) error {
	list := x.refuse(NoSolution, x.m.LagrangianSpan,
		fmt.Sprintf("the background does not solve the equation of %s: %s = 0 is left", eq.From, show(left)),
		"the relations of the background must allow a solution").(diag.List)
	for _, r := range x.m.Relations {
		if !r.Auto {
			list[0].Related = append(list[0].Related, diag.Related{Span: r.Span, Label: "this is given"})
		}
	}
	return list
}
