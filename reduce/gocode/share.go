package gocode

// Straight-line code with common subexpressions computed once.
//
// Values become a graph whose equal nodes are one. An element is a rational number times
// powers of known factors; each factor is written by Horner's rule in several variables
// (the variable that stands in most terms is drawn out first), powers by repeated squaring
// and one division ends each quotient. What is used more than once, and what would make a
// line too long, gets a local variable. The order depends on the values alone.

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// operation is what a node of the graph does.
type operation uint8

const (
	opConst operation = iota
	opLeaf
	opNeg
	opAdd
	opSub
	opMul
	opDiv
	opCall
)

// node is one operation on earlier nodes; text is a constant, a leaf or a function.
type node struct {
	op   operation
	a, b int
	text string
}

// sharer builds the graph.
type sharer struct {
	f     *field.Field
	leaf  func(field.Gen) string
	nodes []node
	index map[node]int
	polys map[uint64][]sharedPoly
	// roundings bounds for each node how many factors 1 + δ, |δ| ≤ 2⁻⁵³, each term of its
	// expansion has met, functions' own errors apart.
	roundings []int
}

type sharedPoly struct {
	p    poly.Poly
	node signed
}

func newSharer(f *field.Field, leaf func(field.Gen) string) *sharer {
	return &sharer{f: f, leaf: leaf, index: map[node]int{}, polys: map[uint64][]sharedPoly{}}
}

// signed is a node or its negative.
type signed struct {
	neg bool
	id  int
}

func (s *sharer) add(n node) int {
	if (n.op == opAdd || n.op == opMul) && n.a > n.b {
		n.a, n.b = n.b, n.a
	}
	if id, ok := s.index[n]; ok {
		return id
	}
	id := len(s.nodes)
	s.nodes = append(s.nodes, n)
	s.index[n] = id
	s.roundings = append(s.roundings, s.countRoundings(n))
	return id
}

func (s *sharer) countRoundings(n node) int {
	switch n.op {
	case opConst:
		if len(n.text) > 15 { // may not be a float64
			return 1
		}
	case opNeg:
		return s.roundings[n.a]
	case opAdd, opSub:
		return max(s.roundings[n.a], s.roundings[n.b]) + 1
	case opMul, opDiv:
		return s.roundings[n.a] + s.roundings[n.b] + 1
	}
	return 0
}

func (s *sharer) constant(n *big.Int) int { return s.add(node{op: opConst, text: n.String()}) }

func (s *sharer) isOne(id int) bool { return s.nodes[id].op == opConst && s.nodes[id].text == "1" }

func (s *sharer) mul(a, b int) int {
	switch {
	case s.isOne(a):
		return b
	case s.isOne(b):
		return a
	}
	return s.add(node{op: opMul, a: a, b: b})
}

// pow is the n-th power of a node, n ≥ 1.
func (s *sharer) pow(id, n int) int {
	switch {
	case n == 1:
		return id
	case n%2 == 0:
		half := s.pow(id, n/2)
		return s.mul(half, half)
	}
	return s.mul(s.pow(id, n-1), id)
}

func (s *sharer) sum(x, y signed) signed {
	switch {
	case !x.neg && !y.neg:
		return signed{false, s.add(node{op: opAdd, a: x.id, b: y.id})}
	case x.neg && y.neg:
		return signed{true, s.add(node{op: opAdd, a: x.id, b: y.id})}
	case y.neg:
		return signed{false, s.add(node{op: opSub, a: x.id, b: y.id})}
	}
	return signed{false, s.add(node{op: opSub, a: y.id, b: x.id})}
}

func (s *sharer) scale(c *big.Int, id int) signed {
	return signed{c.Sign() < 0, s.mul(s.constant(new(big.Int).Abs(c)), id)}
}

// plain is the node without a sign beside it.
func (s *sharer) plain(x signed) int {
	if x.neg {
		return s.add(node{op: opNeg, a: x.id})
	}
	return x.id
}

// elem is the node of an element.
func (s *sharer) elem(e field.Elem) int { return s.plain(s.signedElem(e)) }

func (s *sharer) signedElem(e field.Elem) signed {
	if e.IsZero() {
		return signed{false, s.constant(new(big.Int))}
	}
	s.f = e.Field()
	r, factors := e.Factors()
	num, den := s.constant(new(big.Int).Abs(r.Num())), s.constant(r.Denom())
	neg := false
	for _, fp := range factors {
		x := s.signedPoly(fp.P)
		neg = neg != (x.neg && fp.Exp%2 != 0)
		if fp.Exp > 0 {
			num = s.mul(num, s.pow(x.id, fp.Exp))
		} else {
			den = s.mul(den, s.pow(x.id, -fp.Exp))
		}
	}
	if !s.isOne(den) {
		num = s.add(node{op: opDiv, a: num, b: den})
	}
	return signed{neg != (r.Sign() < 0), num}
}

// generator is the node of a generator: a leaf, or a function of its argument.
func (s *sharer) generator(g field.Gen) int {
	in := s.f.Info(g)
	switch {
	case in.Name == "cos" && in.Kind == field.Root:
		return s.add(node{op: opCall, a: s.elem(in.Angle), text: "math.Cos"})
	case in.Kind == field.Root || in.Kind == field.Elementary:
		fn := "math." + strings.ToUpper(in.Name[:1]) + in.Name[1:]
		return s.add(node{op: opCall, a: s.elem(in.Arg), text: fn})
	}
	return s.add(node{op: opLeaf, text: s.leaf(g)})
}

// signedPoly is the node of a polynomial.
func (s *sharer) signedPoly(p poly.Poly) signed {
	if p.IsZero() {
		return signed{false, s.constant(new(big.Int))}
	}
	c, p := p.PrimitivePart()
	x := s.primitive(p)
	out := s.scale(c, x.id)
	return signed{out.neg != x.neg, out.id}
}

// primitive is the node of a primitive polynomial with positive leading coefficient.
func (s *sharer) primitive(p poly.Poly) signed {
	h := p.Hash()
	for _, known := range s.polys[h] {
		if known.p.Equal(p) {
			return known.node
		}
	}
	x := s.horner(p)
	s.polys[h] = append(s.polys[h], sharedPoly{p, x})
	return x
}

func (s *sharer) horner(p poly.Poly) signed {
	if mono := p.MonoContent(); len(mono) > 0 {
		rest, _ := p.DivMono(mono)
		x := s.primitive(rest)
		for _, m := range mono {
			x.id = s.mul(x.id, s.pow(s.generator(m.Var), int(m.Exp)))
		}
		return x
	}
	if c, ok := p.Const(); ok {
		return signed{false, s.constant(c)}
	}
	v, n := mostFrequent(p)
	if n == 1 {
		return s.termByTerm(p)
	}
	with, without, exp := splitBy(p, v)
	drawn := s.signedPoly(with)
	drawn.id = s.mul(drawn.id, s.pow(s.generator(v), exp))
	return s.sum(drawn, s.signedPoly(without))
}

// mostFrequent is the variable that stands in most terms, of equals the lowest, and in how
// many.
func mostFrequent(p poly.Poly) (poly.Var, int) {
	count := map[poly.Var]int{}
	for mono := range p.Terms() {
		for _, m := range mono {
			count[m.Var]++
		}
	}
	var best poly.Var
	n := 0
	for _, v := range p.Vars() {
		if count[v] > n {
			best, n = v, count[v]
		}
	}
	return best, n
}

// splitBy writes p = v^exp·with + without, v in no term of without, exp as high as it can be.
func splitBy(p poly.Poly, v poly.Var) (with, without poly.Poly, exp int) {
	var in, out []poly.Term
	for mono, c := range p.Terms() {
		t := poly.Term{Coef: new(big.Int).Set(c), Mono: slices.Clone(mono)}
		if i := slices.IndexFunc(mono, func(m poly.Power) bool { return m.Var == v }); i >= 0 {
			if e := int(mono[i].Exp); exp == 0 || e < exp {
				exp = e
			}
			in = append(in, t)
		} else {
			out = append(out, t)
		}
	}
	with, _ = poly.FromTerms(in).DivMono([]poly.Power{{Var: v, Exp: uint32(exp)}})
	return with, poly.FromTerms(out), exp
}

// termByTerm adds the terms, those with a plus sign first.
func (s *sharer) termByTerm(p poly.Poly) signed {
	var plus, minus []signed
	for mono, c := range p.Terms() {
		x := s.constant(big.NewInt(1))
		for _, m := range mono {
			x = s.mul(x, s.pow(s.generator(m.Var), int(m.Exp)))
		}
		if t := s.scale(c, x); t.neg {
			minus = append(minus, t)
		} else {
			plus = append(plus, t)
		}
	}
	all := append(plus, minus...)
	out := all[0]
	for _, t := range all[1:] {
		out = s.sum(out, t)
	}
	return out
}

// Straight is straight-line Go code for several values.
type Straight struct {
	Statements []string // definitions of local variables, in order
	Results    []string // an expression for each value
}

// addend is Coef times the Go expression Of; an empty Of is 1.
type addend struct {
	Coef field.Elem
	Of   string
}

// Share writes code for the values; leaf gives the Go expression of a generator that is no
// root and no function. The code allocates nothing and is a function of the values alone.
// Its cost follows the number of different subexpressions.
func Share(values []field.Elem, leaf func(field.Gen) string) Straight {
	sums := make([][]addend, len(values))
	for i, v := range values {
		sums[i] = []addend{{Coef: v}}
	}
	return shareSums(sums, leaf)
}

// shareSums writes code for sums of multiples of expressions.
func shareSums(sums [][]addend, leaf func(field.Gen) string) Straight {
	s := newSharer(nil, leaf)
	roots := make([]int, len(sums))
	for i, sum := range sums {
		roots[i] = s.plain(s.combination(sum))
	}
	w := straightWriter{s: s, temp: map[int]string{}}
	w.countUses(roots)
	var out Straight
	for _, id := range roots {
		out.Results = append(out.Results, w.result(id))
	}
	out.Statements = w.statements
	return out
}

// combination is the node of a sum of multiples, those that vanish left out.
func (s *sharer) combination(sum []addend) signed {
	var out signed
	empty := true
	for _, a := range sum {
		if a.Coef.IsZero() {
			continue
		}
		x := s.signedElem(a.Coef)
		if a.Of != "" {
			x.id = s.mul(x.id, s.add(node{op: opLeaf, text: a.Of}))
		}
		if empty {
			out, empty = x, false
		} else {
			out = s.sum(out, x)
		}
	}
	if empty {
		return signed{false, s.constant(new(big.Int))}
	}
	return out
}

// straightWriter prints a graph.
type straightWriter struct {
	s          *sharer
	uses       []int
	size       []int // operations that are written inline for the node
	temp       map[int]string
	statements []string
}

// maxInline is the number of operations in an expression above which it is cut.
const maxInline = 14

// countUses counts how often each node is needed, by the roots and by needed nodes.
func (w *straightWriter) countUses(roots []int) {
	w.uses, w.size = make([]int, len(w.s.nodes)), make([]int, len(w.s.nodes))
	var visit func(id int)
	visit = func(id int) {
		w.uses[id]++
		if w.uses[id] > 1 {
			return
		}
		n := w.s.nodes[id]
		switch n.op {
		case opConst, opLeaf:
			return
		case opNeg, opCall:
			visit(n.a)
		default:
			visit(n.a)
			visit(n.b)
		}
	}
	for _, id := range roots {
		visit(id)
	}
}

// Precedences of Go's operators, as far as they are needed.
const (
	goSum = iota + 1
	goProduct
	goUnary
	goAtom
)

// result is the expression of a value, which is cut only where it is used again.
func (w *straightWriter) result(id int) string {
	n := w.s.nodes[id]
	switch {
	case n.op == opConst || n.op == opLeaf || w.uses[id] > 1:
		text, _ := w.render(id)
		return text
	case n.op == opNeg && w.uses[n.a] == 1 && w.s.nodes[n.a].op == opDiv:
		return "-(" + w.result(n.a) + ")"
	}
	text, _ := w.operation(id, n)
	return text
}

// render is the expression of a node and its precedence; statements that it needs are
// written first.
func (w *straightWriter) render(id int) (string, int) {
	if name, ok := w.temp[id]; ok {
		return name, goAtom
	}
	n := w.s.nodes[id]
	if n.op == opConst || n.op == opLeaf {
		return n.text, goAtom
	}
	text, prec := w.operation(id, n)
	if w.uses[id] < 2 && w.size[id] <= maxInline {
		return text, prec
	}
	name := fmt.Sprintf("t%d", len(w.temp)+1)
	w.statements = append(w.statements, name+" := "+text)
	w.temp[id] = name
	w.size[id] = 0
	return name, goAtom
}

func (w *straightWriter) operation(id int, n node) (string, int) {
	if n.op == opMul && w.s.nodes[n.b].op == opConst { // numbers come first
		n.a, n.b = n.b, n.a
	}
	a, ap := w.render(n.a)
	w.size[id] = w.size[n.a] + 1
	switch n.op {
	case opNeg:
		return "-" + enclose(a, ap, goUnary), goUnary
	case opCall:
		return n.text + "(" + a + ")", goAtom
	}
	b, bp := w.render(n.b)
	w.size[id] += w.size[n.b]
	switch n.op {
	case opAdd:
		return enclose(a, ap, goSum) + " + " + enclose(b, bp, goProduct), goSum
	case opSub:
		return enclose(a, ap, goSum) + " - " + enclose(b, bp, goProduct), goSum
	case opDiv:
		if w.s.nodes[n.a].op == opConst {
			a += ".0" // a quotient of integers would be cut
		}
		return enclose(a, ap, goProduct) + " / " + enclose(b, bp, goUnary), goProduct
	}
	return enclose(a, ap, goProduct) + " * " + enclose(b, bp, goUnary), goProduct
}

func enclose(text string, prec, min int) string {
	if prec < min {
		return "(" + text + ")"
	}
	return text
}
