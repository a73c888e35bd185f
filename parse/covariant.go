package parse

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// Elaboration of a covariant Lagrangian: S = ∫d⁴x √−g L with L a scalar built from curvature,
// scalar fields and their derivatives, free functions of these, and □.

// tensorRank is how many indices the tensors of the notation take.
var tensorRank = map[string]int{"Ric": 2, "Riem": 4, "Weyl": 4, "G": 2}

// covariant elaborates the Lagrangian and refuses what is no scalar.
func (e *elaborator) covariant(x Expr) Tensor {
	t := e.tensor(x)
	if free := freeLetters(t); len(free) > 0 {
		panic(newFault(diag.IndexOnce, x.Span(), fmt.Sprintf("index '%c' of the Lagrangian is free", free[0]),
			"a Lagrangian is a scalar: every index must stand twice in a product"))
	}
	return t
}

func (e *elaborator) tensor(x Expr) Tensor {
	if e.isADM() {
		if t, ok := e.adm(x); ok {
			return t
		}
	}
	switch n := x.(type) {
	case *Number:
		return &TensorValue{node{n.At}, e.k.Rat(n.Value)}
	case *Paren:
		return e.tensor(n.X)
	case *Name:
		return e.tensorName(n)
	case *Sign:
		if n.Minus {
			return e.negated(e.tensor(n.X), n.At)
		}
		return e.tensor(n.X)
	case *Sum:
		return e.tensorSum(n)
	case *Product:
		return e.tensorProduct(n)
	case *Power:
		return e.tensorPower(n)
	case *Factorial:
		return &TensorValue{node{n.At}, e.background(n, "a factorial")}
	case *Deriv:
		return e.tensorDeriv(n)
	case *Index:
		return e.tensorIndexed(n)
	case *Call:
		return e.tensorCall(n)
	case *Apply:
		return e.tensorApply(n)
	case *Prime:
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' is no scalar: a time derivative prefers a frame", brief(n)),
			"covariant derivatives are written phi;a, and X is −½ phi;a*phi;a"))
	}
	panic(newFault(diag.NoMeaning, x.Span(), fmt.Sprintf("'%s' has no meaning in a covariant Lagrangian", brief(x)), ""))
}

func (e *elaborator) negated(t Tensor, at diag.Span) Tensor {
	if v, ok := t.(*TensorValue); ok {
		return &TensorValue{node{at}, v.Value.Neg()}
	}
	return &TensorProduct{node{at}, []Tensor{&TensorValue{node{at}, e.k.Int(-1)}, t}}
}

func (e *elaborator) tensorName(n *Name) Tensor {
	switch n.Name {
	case "R":
		return &TensorCurvature{node{n.At}, "R", ""}
	case "X":
		return &TensorKinetic{node{n.At}, e.theScalar(n)}
	case "GB":
		return e.gaussBonnet(n.At)
	case "Ric", "Riem", "Weyl", "G":
		panic(newFault(diag.IndexMismatch, n.At, fmt.Sprintf("'%s' stands without its indices", n.Text),
			fmt.Sprintf("it takes %d: %s", tensorRank[n.Name], n.Name+"."+"abcd"[:tensorRank[n.Name]])))
	case "pi":
		return &TensorValue{node{n.At}, e.constantPi()}
	}
	s := e.lookup(n)
	switch s.kind {
	case symbolConstant:
		return &TensorValue{node{n.At}, e.k.Gen(s.gen)}
	case symbolBackground:
		e.refuseGeometry(n)
		return &TensorScalar{node{n.At}, s.gen}
	case symbolFunction:
		return e.tensorFunction(n)
	case symbolLet:
		return e.tensorLet(n, s)
	case symbolFormFactor:
		panic(e.formFactor(n))
	}
	panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' is %s and has no meaning in a covariant Lagrangian", n.Text, kindNames[s.kind]),
		"a scalar is built from R, Ric, Riem, Weyl, G, scalar fields, X and box"))
}

// gaussBonnet is Riem.abcd*Riem.abcd - 4*Ric.ab*Ric.ab + R^2.
func (e *elaborator) gaussBonnet(at diag.Span) Tensor {
	square := func(c int64, name, letters string) Tensor {
		t := &TensorCurvature{node{at}, name, letters}
		return &TensorProduct{node{at}, []Tensor{&TensorValue{node{at}, e.k.Int(c)}, t, t}}
	}
	return &TensorSum{node{at}, []Tensor{square(1, "Riem", "abcd"), square(-4, "Ric", "ab"), square(1, "R", "")}}
}

// refuseGeometry refuses the scale factor and the rate, which are parts of the metric.
func (e *elaborator) refuseGeometry(n *Name) {
	if n.Name == "a" || n.Name == "H" {
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' is part of the metric and no scalar", n.Text),
			"the metric enters through R, Ric, Riem, Weyl, G and covariant derivatives"))
	}
}

// tensorLet elaborates an abbreviation at each use: its indices are its own.
func (e *elaborator) tensorLet(n *Name, s *symbol) Tensor {
	t := e.tensor(s.let.Value.X)
	if free := freeLetters(t); len(free) > 0 {
		panic(newFault(diag.IndexOnce, n.At, fmt.Sprintf("index '%c' of '%s' is free", free[0], n.Text), "an abbreviation is a scalar here"))
	}
	return t
}

// theScalar is the scalar of a bare X: the only one that is declared.
func (e *elaborator) theScalar(n *Name) field.Gen {
	var found []field.Gen
	for _, b := range e.model.Background {
		if b.Name != "a" && b.Name != "H" {
			found = append(found, b.Gen)
		}
	}
	if len(found) != 1 {
		panic(newFault(diag.WrongArguments, n.At, "it is not clear which scalar X belongs to", "with several scalars write X(phi)"))
	}
	return found[0]
}

// tensorFunction is a free function with the derivatives that x writes.
func (e *elaborator) tensorFunction(x Expr) Tensor {
	s, index := e.partial(x)
	f := &TensorFunction{node: node{x.Span()}, Fn: s.fn.Fn, Index: index}
	for _, a := range s.args {
		f.Args = append(f.Args, e.tensorArgument(a, x))
	}
	return f
}

// tensorArgument is what a function depends on, as a scalar.
func (e *elaborator) tensorArgument(a *Argument, use Expr) Tensor {
	name := &Name{node{use.Span()}, a.Word.Text, a.Word.Name()}
	switch {
	case e.isADM():
		return e.admName(name)
	case a.Of != nil:
		return &TensorKinetic{node{use.Span()}, e.lookup(&Name{node{use.Span()}, a.Of.Text, a.Of.Name()}).gen}
	case name.Name == "t":
		panic(newFault(diag.NoMeaning, use.Span(), fmt.Sprintf("'%s' depends on time by itself and is no scalar", brief(use)), "functions of scalar fields, X and R are"))
	}
	return e.tensorName(name)
}

func (e *elaborator) tensorSum(n *Sum) Tensor {
	out := &TensorSum{node: node{n.At}}
	want := ""
	for i, s := range n.Terms {
		t := e.tensor(s.X)
		free := freeLetters(t)
		if i == 0 {
			want = free
		} else if free != want {
			panic(newFault(diag.IndexMismatch, s.X.Span(), fmt.Sprintf("'%s' has other free indices than the terms before it", brief(s.X)),
				"every term of a sum has the same free indices: "+indexList(want)))
		}
		if s.Minus {
			t = e.negated(t, s.X.Span())
		}
		out.Terms = append(out.Terms, t)
	}
	return e.folded(out, out.Terms, field.Elem.Add)
}

// folded is the value of a sum or product of constants, and t itself where it holds more.
func (e *elaborator) folded(t Tensor, parts []Tensor, join func(a, b field.Elem) field.Elem) Tensor {
	var v field.Elem
	for i, p := range parts {
		c, ok := p.(*TensorValue)
		if !ok {
			return t
		}
		if i == 0 {
			v = c.Value
		} else {
			v = join(v, c.Value)
		}
	}
	return &TensorValue{node{t.Span()}, v}
}

func indexList(letters string) string {
	if letters == "" {
		return "none"
	}
	return strings.Join(strings.Split(letters, ""), ", ")
}

func (e *elaborator) tensorProduct(n *Product) Tensor {
	out := &TensorProduct{node: node{n.At}}
	for _, f := range n.Factors {
		t := e.tensor(f.X)
		if f.Over {
			t = e.inverted(t, f.X)
		}
		out.Factors = append(out.Factors, t)
	}
	e.countLetters(out, n)
	return e.folded(out, out.Factors, field.Elem.Mul)
}

// inverted is 1/t for a scalar t.
func (e *elaborator) inverted(t Tensor, x Expr) Tensor {
	if v, ok := t.(*TensorValue); ok {
		return &TensorValue{v.node, e.inverse(v.Value, x, "")}
	}
	e.onlyScalarHere(t, x, "a denominator")
	return &TensorPower{node{x.Span()}, t, big.NewRat(-1, 1)}
}

func (e *elaborator) onlyScalarHere(t Tensor, x Expr, where string) {
	if free := freeLetters(t); free != "" {
		panic(newFault(diag.IndexMismatch, x.Span(), fmt.Sprintf("'%s' has a free index and cannot stand in %s", brief(x), where), "a scalar stands here"))
	}
}

// countLetters refuses an index that stands more than twice in a product.
func (e *elaborator) countLetters(p *TensorProduct, n *Product) {
	count := map[rune]int{}
	for i, f := range p.Factors {
		for _, l := range freeLetters(f) {
			if count[l]++; count[l] > 2 {
				panic(newFault(diag.IndexTooOften, n.Factors[i].X.Span(), fmt.Sprintf("index '%c' of '%s' stands %s", l, brief(n), often(count[l])),
					"every index must stand twice in a product"))
			}
		}
		for _, l := range summedLetters(f) {
			if count[l] += 2; count[l] > 2 {
				panic(newFault(diag.IndexTooOften, n.Factors[i].X.Span(), fmt.Sprintf("index '%c' of '%s' stands %s", l, brief(n), often(count[l])),
					"every index must stand twice in a product"))
			}
		}
	}
}

func (e *elaborator) tensorPower(n *Power) Tensor {
	x := e.tensor(n.Base)
	r := e.exponent(n.Exponent)
	e.limitPower(r.Num(), n)
	if v, ok := x.(*TensorValue); ok && r.IsInt() {
		if r.Sign() < 0 {
			e.inverse(v.Value, n.Base, "")
		}
		return &TensorValue{node{n.At}, v.Value.Pow(int(r.Num().Int64()))}
	}
	if free := freeLetters(x); free != "" {
		if _, bracketed := n.Base.(*Paren); !bracketed && r.Cmp(big.NewRat(2, 1)) == 0 {
			return &TensorProduct{node{n.At}, []Tensor{x, x}} // phi;a^2 is phi;a*phi;a
		}
		panic(newFault(diag.IndexTooOften, n.At, fmt.Sprintf("a power repeats the free index '%c' of '%s'", free[0], brief(n.Base)),
			"write the product out, each index twice"))
	}
	return &TensorPower{node{n.At}, x, r}
}

func (e *elaborator) tensorDeriv(n *Deriv) Tensor {
	if n.Mark == "," {
		if e.byArgument(n) {
			return e.tensorFunction(n)
		}
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' has no meaning in a covariant Lagrangian", brief(n)),
			"a comma differentiates by an argument, V,phi; covariant derivatives are written phi;a"))
	}
	e.spaceTimeLetters(n.Label.Name, n.Label.At)
	x := e.tensor(n.X)
	g := &TensorGrad{node{n.At}, x, n.Label.Name}
	e.atMostTwice(freeLetters(x)+n.Label.Name, n)
	return g
}

func (e *elaborator) tensorIndexed(n *Index) Tensor {
	name, ok := n.X.(*Name)
	rank := 0
	if ok {
		rank = tensorRank[name.Name]
	}
	if v, ok := e.formValue(n); ok {
		return &TensorValue{node{n.At}, v}
	}
	label, isName := n.Label.(*Name)
	if rank == 0 || !isName {
		if x, ok := n.X.(*Name); ok {
			if s := e.symbols[x.Name]; s != nil && s.kind == symbolFormFactor {
				panic(e.formFactor(n))
			}
		}
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' takes no indices", brief(n.X)), "Ric.ab, Riem.abcd, Weyl.abcd and G.ab do"))
	}
	e.spaceTimeLetters(label.Name, label.At)
	if len(label.Name) != rank {
		panic(newFault(diag.IndexMismatch, label.At, fmt.Sprintf("'%s' has %d indices", brief(n), len(label.Name)),
			fmt.Sprintf("%s takes %d: %s.%s", name.Name, rank, name.Name, "abcd"[:rank])))
	}
	e.atMostTwice(label.Name, n)
	return &TensorCurvature{node{n.At}, name.Name, label.Name}
}

// spaceTimeLetters refuses a letter that is no space-time index.
func (e *elaborator) spaceTimeLetters(label string, at diag.Span) {
	for _, l := range label {
		if l < 'a' || l > 'h' {
			panic(newFault(diag.NotAnIndex, at, fmt.Sprintf("'%c' is no space-time index", l), "space-time indices are the letters a to h"))
		}
	}
}

func (e *elaborator) atMostTwice(label string, x Expr) {
	for _, l := range label {
		if n := strings.Count(label, string(l)); n > 2 {
			panic(newFault(diag.IndexTooOften, x.Span(), fmt.Sprintf("index '%c' of '%s' stands %s", l, brief(x), often(n)), "every index must stand twice in a product"))
		}
	}
}

func (e *elaborator) tensorCall(n *Call) Tensor {
	if s := e.callee(n); s != nil {
		return e.tensorFunction(n)
	}
	if v, ok := e.formValue(n); ok {
		return &TensorValue{node{n.At}, v}
	}
	name, ok := n.Fun.(*Name)
	if ok && slices.Contains(elementaryNames, name.Name) && len(n.Args) == 1 {
		x := e.tensor(n.Args[0])
		e.onlyScalarHere(x, n.Args[0], name.Name)
		if name.Name == "sqrt" {
			return &TensorPower{node{n.At}, x, big.NewRat(1, 2)}
		}
		return &TensorElementary{node{n.At}, name.Name, x}
	}
	if ok && name.Name == "X" && len(n.Args) == 1 {
		if phi, ok := n.Args[0].(*Name); ok {
			e.refuseGeometry(phi)
			if s := e.lookup(phi); s.kind == symbolBackground {
				return &TensorKinetic{node{n.At}, s.gen}
			}
		}
		panic(newFault(diag.WrongArguments, n.At, fmt.Sprintf("'%s' is no kinetic term", brief(n)), "the form is X(phi) with a scalar declared in 'background'"))
	}
	if ok {
		e.tensorName(name)
	}
	panic(newFault(diag.NotAFunction, n.At, fmt.Sprintf("'%s' is not declared as a function", brief(n.Fun)), "multiplication is written: "+brief(n.Fun)+"*(…)"))
}

func (e *elaborator) tensorApply(n *Apply) Tensor {
	x := e.tensor(n.X)
	e.onlyScalarHere(x, n.X, "square brackets")
	if f, ok := e.tensorForm(n, x); ok {
		return f
	}
	return &TensorBox{node{n.At}, e.boxPowers(n.Operator), x}
}

// boxPowers reads a polynomial in □ with constant coefficients.
func (e *elaborator) boxPowers(x Expr) []field.Elem {
	switch n := x.(type) {
	case *Paren:
		return e.boxPowers(n.X)
	case *Name:
		if n.Name == "box" {
			return []field.Elem{{}, e.k.Int(1)}
		}
	case *Sign:
		p := e.boxPowers(n.X)
		if n.Minus {
			return scalePowers(p, e.k.Int(-1))
		}
		return p
	case *Sum:
		var sum []field.Elem
		for _, t := range n.Terms {
			p := e.boxPowers(t.X)
			if t.Minus {
				p = scalePowers(p, e.k.Int(-1))
			}
			sum = addPowers(sum, p)
		}
		return sum
	case *Product:
		out := []field.Elem{e.k.Int(1)}
		for _, f := range n.Factors {
			p := e.boxPowers(f.X)
			if f.Over {
				if len(p) != 1 {
					panic(newFault(diag.NotYetSupported, f.X.Span(), "a power of box in a denominator is not yet supported", "polynomials in box act on what follows"))
				}
				p = []field.Elem{e.inverse(p[0], f.X, "")}
			}
			out = mulPowers(out, p)
			e.limitOrder(2*(len(out)-1), n.At)
		}
		return out
	case *Power:
		base, r := e.boxPowers(n.Base), e.exponent(n.Exponent)
		if r.IsInt() && r.Sign() >= 0 && r.Num().IsInt64() && (len(base) > 1 || r.Num().Int64() <= maxOrder) {
			out := []field.Elem{e.k.Int(1)}
			for range r.Num().Int64() {
				out = mulPowers(out, base)
				e.limitOrder(2*(len(out)-1), n.At)
			}
			return out
		}
	case *Call, *Index:
		panic(e.formFactor(x))
	}
	v := e.tensor(x)
	c, ok := v.(*TensorValue)
	if !ok {
		panic(newFault(diag.NotYetSupported, x.Span(), fmt.Sprintf("'%s' varies and cannot stand in an operator", brief(x)), "polynomials in box have constant coefficients"))
	}
	return []field.Elem{c.Value}
}

func scalePowers(p []field.Elem, c field.Elem) []field.Elem {
	out := make([]field.Elem, len(p))
	for i := range p {
		out[i] = p[i].Mul(c)
	}
	return out
}

func addPowers(p, q []field.Elem) []field.Elem {
	out := make([]field.Elem, max(len(p), len(q)))
	copy(out, p)
	for i := range q {
		out[i] = out[i].Add(q[i])
	}
	return out
}

func mulPowers(p, q []field.Elem) []field.Elem {
	out := make([]field.Elem, len(p)+len(q)-1)
	for i := range p {
		for j := range q {
			out[i+j] = out[i+j].Add(p[i].Mul(q[j]))
		}
	}
	return out
}

// letters lists the index letters of a node by what it is, those of a product unsummed.
func letters(t Tensor) string {
	switch n := t.(type) {
	case *TensorCurvature:
		return n.Letters
	case *TensorSlice:
		return n.Letters
	case *TensorGrad:
		return freeLetters(n.X) + n.Letters
	case *TensorSum:
		return freeLetters(n.Terms[0])
	case *TensorProduct:
		s := ""
		for _, f := range n.Factors {
			s += freeLetters(f)
		}
		return s
	}
	return ""
}

// freeLetters lists, sorted, the letters that stand once.
func freeLetters(t Tensor) string {
	all := letters(t)
	var free []rune
	for _, l := range all {
		if strings.Count(all, string(l)) == 1 {
			free = append(free, l)
		}
	}
	slices.Sort(free)
	return string(free)
}

// summedLetters lists the letters that a factor sums within itself and without a bracket of
// its own: those written twice on one tensor.
func summedLetters(t Tensor) string {
	switch t.(type) {
	case *TensorCurvature, *TensorSlice, *TensorGrad:
		all, out := letters(t), ""
		for _, l := range all {
			if strings.Count(all, string(l)) == 2 && !strings.ContainsRune(out, l) {
				out += string(l)
			}
		}
		return out
	}
	return ""
}
