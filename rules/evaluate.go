package rules

// The value of a covariant Lagrangian in a frame: every node of the typed tree becomes a
// tensor of truncated quantities, its free indices named by letters.

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"remnant/expr/field"
	"remnant/parse"
	"remnant/parse/diag"
)

// labelled is a tensor with a letter for each index.
type labelled struct {
	tensor
	letters string
}

// evaluator holds the scalars of a model in a frame.
type evaluator struct {
	*frame
	source  *diag.Source
	scalars map[field.Gen]quantity
	cache   map[string]labelled // curvature by name
}

func plain(q quantity) labelled { return labelled{scalarTensor(q), ""} }

// scalar evaluates a node without free indices.
func (e *evaluator) scalar(t parse.Tensor) quantity { return e.value(t).tensor.scalar() }

func (e *evaluator) value(t parse.Tensor) labelled {
	e.k.Budget().Check(0)
	switch n := t.(type) {
	case *parse.TensorValue:
		return plain(background(n.Value))
	case *parse.TensorScalar:
		return plain(e.scalars[n.Field])
	case *parse.TensorKinetic:
		return plain(e.kinetic(e.scalars[n.Field]))
	case *parse.TensorFunction:
		return plain(e.function(n))
	case *parse.TensorCurvature:
		return e.selfTrace(labelled{e.curved(n.Name), n.Letters})
	case *parse.TensorSlice:
		return e.slice(n)
	case *parse.TensorGrad:
		return e.gradient(n)
	case *parse.TensorBox:
		return plain(e.boxed(n.Powers, e.scalar(n.X)))
	case *parse.TensorSum:
		return e.sum(n)
	case *parse.TensorProduct:
		return e.product(n)
	case *parse.TensorPower:
		return plain(e.power(n))
	case *parse.TensorElementary:
		return plain(e.elementary(n))
	}
	panic(fmt.Sprintf("rules: unknown node %T", t))
}

// kinetic is X = −½ ∂φ·∂φ = ½(e₀φ)² − ½(e₃φ)².
func (e *evaluator) kinetic(phi quantity) quantity {
	d0, d3 := e.e(0, phi), e.e(3, phi)
	return d0.mul(d0).sub(d3.mul(d3)).scale(e.k.Int(1).Scale(1, 2))
}

// curved is a curvature tensor, computed once.
func (e *evaluator) curved(name string) tensor {
	if t, ok := e.cache[name]; ok {
		return t.tensor
	}
	var t tensor
	switch name {
	case "R":
		t = scalarTensor(e.scalarCurvature())
	case "Ric":
		t = e.ricci()
	case "Riem":
		t = e.riemann()
	case "Weyl":
		t = e.weyl()
	case "G":
		t = e.einstein()
	}
	e.cache[name] = labelled{tensor: t}
	return t
}

func (e *evaluator) gradient(n *parse.TensorGrad) labelled {
	x := e.value(n.X)
	for _, l := range n.Letters {
		x = labelled{e.grad(x.tensor), x.letters + string(l)}
	}
	return e.selfTrace(x)
}

// selfTrace sums the letters that a tensor carries twice.
func (e *evaluator) selfTrace(x labelled) labelled {
	for i := 0; i < len(x.letters); i++ {
		j := strings.IndexByte(x.letters[i+1:], x.letters[i])
		if j < 0 {
			continue
		}
		j += i + 1
		rest := x.letters[:i] + x.letters[i+1:j] + x.letters[j+1:]
		return e.selfTrace(labelled{e.trace(x.tensor, i, j), rest})
	}
	return x
}

func (e *evaluator) boxed(powers []field.Elem, x quantity) quantity {
	var sum quantity
	for n, c := range powers {
		if n > 0 {
			x = e.box(x)
		}
		sum = sum.add(x.scale(c))
	}
	return sum
}

func (e *evaluator) sum(n *parse.TensorSum) labelled {
	var out labelled
	for i, t := range n.Terms {
		x := e.value(t)
		if i == 0 {
			out = labelled{newTensor(x.rank), x.letters}
		}
		x.each(func(index []int, q quantity) {
			to := make([]int, len(index))
			for s, l := range []byte(x.letters) {
				to[strings.IndexByte(out.letters, l)] = index[s]
			}
			out.accumulate(q, to)
		})
	}
	return out
}

// accumulate adds q to a component.
func (t tensor) accumulate(q quantity, index []int) {
	k := key(index...)
	if s := t.comp[k].add(q); s.isZero() {
		delete(t.comp, k)
	} else {
		t.comp[k] = s
	}
}

func (e *evaluator) product(n *parse.TensorProduct) labelled {
	out := plain(e.int(1))
	for _, f := range n.Factors {
		out = e.contract(out, e.value(f))
	}
	return out
}

// contract multiplies two tensors and sums the letters that they share.
func (e *evaluator) contract(x, y labelled) labelled {
	var shared []byte
	for _, l := range []byte(x.letters) {
		if strings.IndexByte(y.letters, l) >= 0 {
			shared = append(shared, l)
		}
	}
	keep := func(letters string) (rest string) {
		for _, l := range []byte(letters) {
			if !slices.Contains(shared, l) {
				rest += string(l)
			}
		}
		return rest
	}
	xl, yl := keep(x.letters), keep(y.letters)
	out := labelled{newTensor(len(xl) + len(yl)), xl + yl}
	x.each(func(i []int, p quantity) {
		y.each(func(j []int, q quantity) {
			sign := 1
			for _, l := range shared {
				a := i[strings.IndexByte(x.letters, l)]
				if a != j[strings.IndexByte(y.letters, l)] {
					return
				}
				sign *= eta(a)
			}
			var index []int
			for s, l := range []byte(x.letters) {
				if !slices.Contains(shared, l) {
					index = append(index, i[s])
				}
			}
			for s, l := range []byte(y.letters) {
				if !slices.Contains(shared, l) {
					index = append(index, j[s])
				}
			}
			r := p.mul(q)
			if sign < 0 {
				r = r.neg()
			}
			out.accumulate(r, index)
		})
	})
	return out
}

// function is a free function at perturbed arguments, to second order.
func (e *evaluator) function(n *parse.TensorFunction) quantity {
	deltas := make([]quantity, len(n.Args))
	for i, a := range n.Args {
		deltas[i] = e.scalar(a).perturbation()
	}
	at := func(more ...int) field.Elem {
		index := slices.Clone(n.Index)
		for _, i := range more {
			index[i]++
		}
		return e.k.FuncJet(n.Fn, index)
	}
	sum := background(at())
	for i, d := range deltas {
		if d.isZero() {
			continue
		}
		sum = sum.add(d.scale(at(i)))
		for j := range i + 1 {
			c := at(i, j)
			if i == j {
				c = c.Scale(1, 2)
			}
			sum = sum.add(d.mul(deltas[j]).scale(c))
		}
	}
	return sum
}

// power is x^r. A root or an inverse needs a background value that is not zero.
func (e *evaluator) power(n *parse.TensorPower) quantity {
	x, r := e.scalar(n.X), n.Exponent
	if r.IsInt() && r.Sign() >= 0 {
		return e.pow(x, int(r.Num().Int64()))
	}
	if x.bg.IsZero() {
		panic(e.refuse(VanishingBackground, n.X.Span(), "this vanishes on the background and cannot be raised to the power "+r.RatString(),
			"what stands in a denominator or under a root must not vanish on the background"))
	}
	e.k.AssumeNonzero(x.bg, "the Lagrangian divides by it")
	if r.IsInt() {
		return e.pow(x, int(r.Num().Int64()))
	}
	if r.Denom().Cmp(big.NewInt(2)) != 0 {
		panic(e.refuse(diag.BadExponent, n.Span(), "only square roots are supported", "exponents are whole or half-whole numbers"))
	}
	root, err := e.k.Sqrt(x.bg)
	if err != nil {
		panic(e.refuse(diag.BadArgument, n.X.Span(), err.Error(), "this cannot be computed exactly"))
	}
	f := root.Pow(int(r.Num().Int64()))
	f1 := f.Mul(e.k.Rat(r)).Div(x.bg)
	f2 := f1.Mul(e.k.Rat(new(big.Rat).Sub(r, big.NewRat(1, 1)))).Div(x.bg)
	return e.compose(x, f, f1, f2)
}

// elementary is an elementary function at a perturbed argument, by its first two derivatives.
func (e *evaluator) elementary(n *parse.TensorElementary) quantity {
	x := e.scalar(n.X)
	of := func(name string) field.Elem {
		v, err := e.k.Elementary(name, x.bg)
		if err != nil {
			panic(e.refuse(diag.BadArgument, n.X.Span(), err.Error(), "this cannot be computed exactly"))
		}
		return v
	}
	f := of(n.Name)
	var f1, f2 field.Elem
	switch n.Name {
	case "exp":
		f1, f2 = f, f
	case "log":
		f1 = x.bg.Inv()
		f2 = f1.Mul(f1).Neg()
	case "sin":
		f1, f2 = of("cos"), f.Neg()
	case "cos":
		f1, f2 = of("sin").Neg(), f.Neg()
	case "tanh":
		f1 = e.k.Int(1).Sub(f.Mul(f))
		f2 = f.Mul(f1).Scale(-2, 1)
	}
	return e.compose(x, f, f1, f2)
}

func (e *evaluator) refuse(kind diag.Kind, at diag.Span, summary, hint string) diag.List {
	return diag.List{{Kind: kind, Source: e.source, Span: at, Summary: summary, Hint: hint}}
}
