package field

// Background relations. A relation is oriented: its leader, a jet in which it is linear, is
// replaced by the rest. Derivatives of a relation replace the derivatives of the leader:
// x⁽ⁿ⁾ of x, and of a free function the derivative by its first argument that varies. The set is
// kept coherent and autoreduced [BoulierLazardOllivierPetitot1995], for the one derivation D:
// relations hold along the background only, so that ∂/∂φ is never applied to one.
//
// When a new leader lies below a standing one, or stands in its value, the standing relation
// is taken back and posted again; what is left of it, if anything, is a new relation with a
// leader of its own. It is a contradiction if no jet is left, or only factors that were
// assumed non-zero.

import (
	"fmt"
	"slices"

	"remnant/expr/poly"
)

type rule struct {
	leader  Gen
	value   Elem
	sources []int
	closed  bool // derivatives of the leader are not replaced: the relation's derivative holds anyway
}

// Rule is a relation as it stands: leader → value.
type Rule struct {
	Leader  Gen
	Value   Elem
	Sources []int // numbers, as given to Relate, of the relations that it follows from
}

// Contradiction says that relations cannot hold together.
type Contradiction struct {
	Sources []int // the relations that led there
	Follows Elem  // what would have to vanish
	Assumed bool  // it was assumed non-zero; else it is a non-zero number or holds no jet
}

func (c *Contradiction) Error() string {
	return fmt.Sprintf("the relations contradict each other: %v = 0 would follow", c.Follows)
}

// Unsolvable says that a relation is linear in none of its jets, or does not settle.
type Unsolvable struct {
	Sources []int
	Rest    Elem // what should vanish and has no leader
	Cyclic  bool // the relations replace each other without end
}

func (u *Unsolvable) Error() string {
	if u.Cyclic {
		return "the relations replace each other without end"
	}
	return fmt.Sprintf("no leader can be chosen in %v = 0", u.Rest)
}

// posted is a relation rest = 0 that waits to be worked in.
type posted struct {
	rest    Elem
	leader  Gen
	hasLead bool
	sources []int
	closed  bool
}

// maxSettling bounds the relations posted while one is worked in.
const maxSettling = 400

// RelateGen adds the relation g = rhs with leader g; source is the caller's number for it.
func (f *Field) RelateGen(g Gen, rhs Elem, source int) error {
	return f.settle([]posted{{rest: f.Raw(g).Sub(rhs), leader: g, hasLead: true, sources: []int{source}}})
}

// Relate adds the relation e = 0; the leader is the highest jet in which it is linear.
func (f *Field) Relate(e Elem, source int) error {
	return f.settle([]posted{{rest: e, sources: []int{source}}})
}

// Rules lists the relations that stand, in the order in which their leaders were declared.
func (f *Field) Rules() []Rule {
	var out []Rule
	for _, g := range f.gens {
		if r := g.rule; r != nil {
			out = append(out, Rule{r.leader, r.value, r.sources})
		}
	}
	slices.SortStableFunc(out, func(a, b Rule) int {
		if d := int(f.gens[a.Leader].base) - int(f.gens[b.Leader].base); d != 0 {
			return d
		}
		return f.gens[a.Leader].Order - f.gens[b.Leader].Order
	})
	return out
}

// settle works relations in until none is left to do. If one cannot be, the field stays as it
// was.
func (f *Field) settle(queue []posted) (err error) {
	undo := f.snapshot()
	defer func() {
		if err != nil {
			undo()
		}
	}()
	defer CatchCycle(&err)
	for n := 0; len(queue) > 0; n++ {
		if n == maxSettling {
			return &Unsolvable{Sources: queue[0].sources, Rest: queue[0].rest, Cyclic: true}
		}
		p := queue[0]
		queue = queue[1:]
		more, err := f.workIn(p)
		if err != nil {
			return err
		}
		queue = append(more, queue...)
	}
	return nil
}

// snapshot returns a function that brings relations and assumptions back to what they are now.
func (f *Field) snapshot() (undo func()) {
	rules := map[Gen]*rule{}
	for g, gen := range f.gens {
		if gen.rule != nil {
			rules[Gen(g)] = gen.rule
		}
	}
	assumptions := slices.Clone(f.assumptions)
	return func() {
		for g, gen := range f.gens {
			gen.rule = rules[Gen(g)]
		}
		f.assumptions = assumptions
		f.epoch++
	}
}

// CatchCycle, deferred, turns the panic of a value that leads back to itself into *err. The
// relations are kept so that none does; a value that still would must not hang.
func CatchCycle(err *error) {
	switch v := recover().(type) {
	case nil:
	case *Unsolvable:
		*err = v
	default:
		panic(v)
	}
}

// workIn reduces one relation, makes it a rule and returns the relations to post again.
func (f *Field) workIn(p posted) ([]posted, error) {
	sources := p.sources
	for _, g := range p.rest.Gens() {
		sources = mergeSources(sources, f.sourcesOf(g, nil))
	}
	rest, err := p.rest.Normal()
	if err != nil {
		return nil, &Contradiction{Sources: sources, Follows: p.rest}
	}
	if rest.IsZero() {
		return nil, nil
	}
	rest = rest.Lowest()
	n, assumed := f.squareFreeUnknown(rest)
	asked := p.hasLead && f.canLead(p.leader, n) || p.closed && n.Degree(p.leader) == 1 // also a constant, where one is asked for
	if n.IsConst() || !f.holdsJet(n) && !asked {
		follows := rest
		if !n.IsConst() {
			follows = Elem{f: f, num: n}
		}
		return nil, &Contradiction{Sources: sources, Follows: follows, Assumed: assumed}
	}
	leader, ok := p.leader, asked
	if !ok {
		if leader, ok = f.chooseLeader(n); !ok {
			return nil, &Unsolvable{Sources: sources, Rest: Elem{f: f, num: n}}
		}
	}
	c := n.CoeffsIn(leader)
	lead := Elem{f: f, num: c[1]}
	f.AssumeNonzero(lead, "the relation for "+f.plainName(leader)+" divides by it")
	value := Elem{f: f, num: c[0].Neg()}.Div(lead).Lowest()
	return f.install(&rule{leader, value, sources, p.closed && !f.canLead(leader, n)}), nil
}

// squareFreeUnknown is the product of the factors of e that are not known to be non-zero,
// each once, and whether a factor was left out because it was assumed non-zero.
func (f *Field) squareFreeUnknown(e Elem) (poly.Poly, bool) {
	_, powers := f.factorise(e.num)
	n, assumed := poly.FromInt(1), false
	for _, p := range powers {
		q := f.factors[p.id].p
		switch {
		case f.polySign(q) != Unknown:
		case f.assumedNonzero(q):
			assumed = true
		default:
			n = f.ops.Mul(n, q)
		}
	}
	return n, assumed
}

func (f *Field) holdsJet(n poly.Poly) bool {
	for _, g := range n.Vars() {
		if k := f.gens[g].Kind; k != Constant && k != Wavenumber {
			return true
		}
	}
	return false
}

// canLead reports whether n is linear in g and holds no derivative of g.
func (f *Field) canLead(g Gen, n poly.Poly) bool {
	if f.gens[g].Kind == Wavenumber || n.Degree(g) != 1 {
		return false
	}
	for _, h := range n.Vars() {
		if h != g && (f.isDerivative(h, g) || f.argumentHolds(h, g)) {
			return false
		}
	}
	return true
}

// isDerivative reports whether h is a time derivative of g, or h = g.
func (f *Field) isDerivative(h, g Gen) bool {
	a, b := f.gens[h], f.gens[g]
	if a.Kind != b.Kind {
		return false
	}
	switch a.Kind {
	case Function:
		return a.base == b.base && a.Order >= b.Order
	case FreeFunction:
		i, ok := f.chain(a.Fn)
		if a.Fn != b.Fn || !ok {
			return h == g
		}
		return a.Index[i] >= b.Index[i] && slices.Equal(without(a.Index, i), without(b.Index, i))
	}
	return h == g
}

// argumentHolds reports whether g or a derivative of it stands inside the function or root h.
func (f *Field) argumentHolds(h, g Gen) bool {
	gen := f.gens[h]
	if gen.Kind != Root && gen.Kind != Elementary {
		return false
	}
	for _, x := range gen.Arg.Gens() {
		if f.isDerivative(x, g) || f.argumentHolds(x, g) {
			return true
		}
	}
	return false
}

// chain is the argument of fn whose derivatives follow from D: the first that varies.
func (f *Field) chain(fn *FreeFunc) (int, bool) {
	for i, a := range fn.Args {
		if varies(a) {
			return i, true
		}
	}
	return 0, false
}

// varies reports whether an argument depends on time modulo the relations.
func varies(arg Elem) bool { return !arg.normalOrSelf().D().IsZero() }

// chainNumber is the argument of the chain; −1 if none varies.
func (f *Field) chainNumber(fn *FreeFunc) int {
	if i, ok := f.chain(fn); ok {
		return i
	}
	return -1
}

func without(index []int, i int) []int {
	return slices.Delete(slices.Clone(index), i, i+1)
}

// chooseLeader picks the highest jet that can lead: time derivatives before jets of free
// functions before undifferentiated functions, higher orders first, then the order of
// declaration.
func (f *Field) chooseLeader(n poly.Poly) (Gen, bool) {
	best, found := Gen(0), false
	for _, g := range n.Vars() {
		if k := f.gens[g].Kind; k != Function && k != FreeFunction || !f.canLead(g, n) {
			continue
		}
		if !found || f.ranks(g, best) {
			best, found = g, true
		}
	}
	return best, found
}

func (f *Field) ranks(g, h Gen) bool {
	a, b := f.rank(g), f.rank(h)
	return slices.Compare(a, b) > 0
}

func (f *Field) rank(g Gen) []int {
	gen := f.gens[g]
	switch {
	case gen.Kind == Function && gen.Order > 0:
		return []int{3, gen.Order, -int(gen.base)}
	case gen.Kind == FreeFunction:
		total := 0
		for _, n := range gen.Index {
			total += n
		}
		return append([]int{2, total}, append(gen.Index, -int(g))...)
	}
	return []int{1, 0, -int(gen.base)}
}

// install makes r stand and takes back the rules whose leader or value it touches, and those
// of free functions of which another argument now is the first that varies.
func (f *Field) install(r *rule) []posted {
	var again []posted
	takeBack := func(old *rule) {
		f.gens[old.leader].rule = nil
		again = append(again, posted{f.Raw(old.leader).Sub(old.value), old.leader, true, old.sources, old.closed})
	}
	chains := map[*FreeFunc]int{}
	for _, gen := range f.gens {
		if old := gen.rule; old != nil && f.touches(old, r.leader) {
			takeBack(old)
		} else if old != nil && gen.Kind == FreeFunction {
			chains[gen.Fn] = f.chainNumber(gen.Fn)
		}
	}
	f.gens[r.leader].rule = r
	f.epoch++
	for _, gen := range f.gens {
		if old := gen.rule; old != nil && old != r && gen.Kind == FreeFunction && chains[gen.Fn] != f.chainNumber(gen.Fn) {
			takeBack(old)
			f.epoch++
		}
	}
	gen, moves := f.gens[r.leader], true
	if gen.Kind == FreeFunction {
		_, moves = f.chain(gen.Fn)
	}
	if gen.Kind == Constant || !moves { // then D of the value must vanish too
		again = append(again, posted{rest: r.value.D(), sources: r.sources})
	}
	return again
}

func (f *Field) touches(old *rule, leader Gen) bool {
	if f.isDerivative(old.leader, leader) {
		return true
	}
	for _, g := range old.value.Gens() {
		if f.isDerivative(g, leader) || f.argumentHolds(g, leader) {
			return true
		}
	}
	return false
}

// value is generator g modulo the relations.
func (f *Field) value(g Gen) Elem {
	gen := f.gens[g]
	if gen.rule != nil {
		return gen.rule.value
	}
	if gen.value.epoch == f.epoch {
		return gen.value.elem
	}
	if gen.open {
		panic(&Unsolvable{Rest: f.Raw(g), Cyclic: true})
	}
	gen.open = true
	defer func() { gen.open = false }()
	v := f.Raw(g)
	switch gen.Kind {
	case Function:
		if f.hasLowerRule(g) {
			v = f.value(f.JetGen(g, gen.Order-1)).D()
		}
	case FreeFunction:
		v = f.freeJetValue(g)
	}
	gen.value = cached{f.epoch, v}
	return v
}

func (f *Field) hasLowerRule(g Gen) bool {
	base := f.gens[f.gens[g].base]
	for n := 0; n < f.gens[g].Order; n++ {
		if h, ok := base.jets[n]; ok && f.gens[h].rule != nil {
			return true
		}
	}
	return false
}

// lowerJet is the jet of the same free function with one derivative less by argument i, that
// of the chain.
func (f *Field) lowerJet(g Gen) (low Gen, i int, ok bool) {
	gen := f.gens[g]
	i, ok = f.chain(gen.Fn)
	if !ok || gen.Index[i] == 0 {
		return g, i, false
	}
	lower := slices.Clone(gen.Index)
	lower[i]--
	return f.FuncJetGen(gen.Fn, lower), i, true
}

// fixed reports whether a relation, or a derivative of one, gives the jet g.
func (f *Field) fixed(g Gen) bool {
	gen := f.gens[g]
	switch {
	case gen.rule != nil:
		return !gen.rule.closed
	case gen.Kind == Function:
		return f.hasLowerRule(g)
	case gen.Kind == FreeFunction:
		low, _, ok := f.lowerJet(g)
		return ok && f.fixed(low)
	}
	return false
}

// freeJetValue solves D f_J = Σ f_{J+i} D argᵢ for the jet along the chain, where f_J is
// known.
func (f *Field) freeJetValue(g Gen) Elem {
	gen := f.gens[g]
	low, i, ok := f.lowerJet(g)
	if !ok || !f.fixed(low) {
		return f.Raw(g)
	}
	lower := f.gens[low].Index
	rest := f.value(low).D()
	for j, arg := range gen.Fn.Args {
		if j != i && varies(arg) {
			rest = rest.Sub(f.FuncJet(gen.Fn, bump(lower, j)).Mul(arg.normalOrSelf().D()))
		}
	}
	speed := gen.Fn.Args[i].normalOrSelf().D()
	f.AssumeNonzero(speed, "the relation for "+f.plainName(g)+" divides by it")
	return rest.Div(speed)
}

// sourcesOf lists the relations that the value of g follows from.
func (f *Field) sourcesOf(g Gen, open []Gen) []int {
	if slices.Contains(open, g) {
		return nil
	}
	open = append(open, g)
	gen := f.gens[g]
	if gen.rule != nil {
		return gen.rule.sources
	}
	var out []int
	below := func(low Gen) {
		out = f.sourcesOf(low, open)
		for _, h := range f.value(low).Gens() {
			for _, next := range f.nextJets(h) {
				out = mergeSources(out, f.sourcesOf(next, open))
			}
		}
	}
	switch gen.Kind {
	case Function:
		if f.hasLowerRule(g) {
			below(f.JetGen(g, gen.Order-1))
		}
	case FreeFunction:
		if low, _, ok := f.lowerJet(g); ok && f.fixed(low) {
			below(low)
		}
	case Root, Elementary:
		for _, h := range gen.Arg.Gens() {
			out = mergeSources(out, f.sourcesOf(h, open))
		}
	}
	return out
}

func (f *Field) nextJets(g Gen) []Gen {
	if f.gens[g].Kind == Function {
		return []Gen{f.JetGen(g, f.gens[g].Order+1)}
	}
	return nil
}

func mergeSources(a, b []int) []int {
	out := append(slices.Clone(a), b...)
	slices.Sort(out)
	return slices.Compact(out)
}

// RelateFor adds the relation e = 0 with the given leader, where e is linear in it.
func (f *Field) RelateFor(e Elem, leader Gen, source int) error {
	return f.settle([]posted{{rest: e, leader: leader, hasLead: true, sources: []int{source}}})
}

// RelateClosed adds the relation e = 0 with a leader of which derivatives may stand in e too,
// such as P in 3M²H² + P − φ′²P,X = 0. It is for a relation whose own derivative follows from the
// relations that stand: only the leader is replaced, and none of its derivatives. It fails
// with *Unsolvable where e is not linear in the leader or the derivative does not follow.
func (f *Field) RelateClosed(e Elem, leader Gen, source int) error {
	undo := f.snapshot()
	err := f.settle([]posted{{rest: e, leader: leader, hasLead: true, sources: []int{source}, closed: true}})
	if err != nil {
		return err
	}
	left := f.genDeriv(leader).Sub(f.value(leader).D())
	if left, err = left.Normal(); err != nil || !left.IsZero() {
		undo()
		return &Unsolvable{Sources: []int{source}, Rest: left}
	}
	return nil
}

// CanLead reports whether the relation e = 0 could be solved for g: the numerator of e is
// linear in g and holds no derivative of g.
func (f *Field) CanLead(e Elem, g Gen) bool { return f.canLead(g, e.num) }
