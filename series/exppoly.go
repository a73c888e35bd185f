package series

// The normal form of functions made of polynomials and exponentials: (Σ Pᵢ exp(gᵢ))/D with
// polynomials P, D and exponents g that are different functions as far as their form shows.
// It sees through sums, brackets and divisions, so that 1 − 6sF(s) is recognised as
// P·exp(g) when F was made for that. An exponent is a polynomial and a linear combination of
// atoms, functions that are not looked into.

import (
	"math/big"
	"slices"
)

// maxExpTerms is the number of terms beyond which no normal form is made.
const maxExpTerms = 64

// expPoly is (Σ terms)/den, den ≠ 0.
type expPoly struct {
	terms []expPolyTerm
	den   UniPoly
}

type expPolyTerm struct {
	p   UniPoly // not 0
	exp exponent
}

// exponent is p + Σ k·atom, the atoms pairwise different.
type exponent struct {
	p     UniPoly
	atoms []exponentAtom
}

type exponentAtom struct {
	k *big.Rat
	n node
}

// add joins two exponents.
func (e exponent) add(f exponent) exponent {
	out := exponent{e.p.Add(f.p), slices.Clone(e.atoms)}
	for _, a := range f.atoms {
		i := slices.IndexFunc(out.atoms, func(b exponentAtom) bool { return same(a.n, b.n) })
		if i < 0 {
			out.atoms = append(out.atoms, a)
			continue
		}
		k := new(big.Rat).Add(out.atoms[i].k, a.k)
		if k.Sign() == 0 {
			out.atoms = slices.Delete(out.atoms, i, i+1)
		} else {
			out.atoms[i].k = k
		}
	}
	return out
}

// equal reports whether the forms are the same up to order.
func (e exponent) equal(f exponent) bool {
	if !e.p.Equal(f.p) || len(e.atoms) != len(f.atoms) {
		return false
	}
	for _, a := range e.atoms {
		if !slices.ContainsFunc(f.atoms, func(b exponentAtom) bool { return a.k.Cmp(b.k) == 0 && same(a.n, b.n) }) {
			return false
		}
	}
	return true
}

// nodes is the exponent as a list of summands.
func (e exponent) nodes() []node {
	var out []node
	if !e.p.IsZero() {
		out = append(out, polyNode{e.p})
	}
	for _, a := range e.atoms {
		out = append(out, makeProduct([]node{polyNode{NewUniPoly(a.k)}, a.n}))
	}
	return out
}

// exponentOf splits a function into a polynomial and atoms.
func exponentOf(n node) exponent {
	if x, ok := expPolyOf(n); ok {
		if p, ok := x.polynomial(); ok {
			return exponent{p: p}
		}
	}
	switch f := n.(type) {
	case sumNode:
		var out exponent
		for _, g := range f.list {
			out = out.add(exponentOf(g))
		}
		return out
	case productNode:
		if p, ok := f.list[0].(polyNode); ok && p.p.Degree() == 0 {
			out := exponentOf(makeProduct(f.list[1:]))
			k := p.p.c[0]
			out.p = out.p.Scale(k)
			for i := range out.atoms {
				out.atoms[i].k = new(big.Rat).Mul(out.atoms[i].k, k)
			}
			return out
		}
	}
	return exponent{atoms: []exponentAtom{{big.NewRat(1, 1), n}}}
}

// polynomial is x as a polynomial, if it is one.
func (x expPoly) polynomial() (UniPoly, bool) {
	switch {
	case len(x.terms) == 0:
		return UniPoly{}, true
	case len(x.terms) == 1 && x.terms[0].exp.equal(exponent{}):
		return x.terms[0].p.quo(x.den)
	}
	return UniPoly{}, false
}

// expPolyOf is the normal form of n, if it is made of polynomials and exponentials and does
// not grow too large.
func expPolyOf(n node) (expPoly, bool) {
	one := IntUniPoly(1)
	switch f := n.(type) {
	case polyNode:
		return expPolyOfTerm(f.p, exponent{}), true
	case expNode:
		return expPolyOfTerm(one, exponent{p: IntUniPoly(0, 1)}), true
	case sumNode:
		return foldExpPoly(f.list, expPoly{den: one}, expPoly.add)
	case productNode:
		return foldExpPoly(f.list, expPolyOfTerm(one, exponent{}), expPoly.mul)
	case powerNode:
		return foldExpPoly(slices.Repeat([]node{f.f}, f.k), expPolyOfTerm(one, exponent{}), expPoly.mul)
	case divideNode:
		x, ok := expPolyOf(f.f)
		x.den = x.den.Mul(IntUniPoly(0, 1))
		return x, ok
	case composeNode:
		return expPolyOfComposition(f)
	}
	return expPoly{}, false
}

func expPolyOfTerm(p UniPoly, e exponent) expPoly {
	x := expPoly{den: IntUniPoly(1)}
	if !p.IsZero() {
		x.terms = []expPolyTerm{{p, e}}
	}
	return x
}

func expPolyOfComposition(f composeNode) (expPoly, bool) {
	if _, ok := f.outer.(expNode); ok {
		return expPolyOfTerm(IntUniPoly(1), exponentOf(f.inner)), true
	}
	if p, ok := f.outer.(polyNode); ok {
		x, ok := expPolyOf(f.inner)
		out := expPoly{den: IntUniPoly(1)}
		for i := p.p.Degree(); i >= 0 && ok; i-- {
			if out, ok = out.mul(x); ok {
				out, ok = out.add(expPolyOfTerm(NewUniPoly(p.p.c[i]), exponent{}))
			}
		}
		return out, ok
	}
	q, ok := f.inner.(polyNode)
	if !ok || q.p.Degree() < 1 {
		return expPoly{}, false
	}
	x, ok := expPolyOf(f.outer)
	return x.substitute(q), ok
}

// substitute is x(q(s)) for a q that is not constant.
func (x expPoly) substitute(q polyNode) expPoly {
	out := expPoly{den: x.den.Compose(q.p)}
	for _, t := range x.terms {
		u := expPolyTerm{t.p.Compose(q.p), exponent{p: t.exp.p.Compose(q.p)}}
		for _, a := range t.exp.atoms {
			u.exp.atoms = append(u.exp.atoms, exponentAtom{a.k, makeCompose(a.n, q)})
		}
		out.terms = append(out.terms, u)
	}
	return out
}

// foldExpPoly joins the forms of a list by op.
func foldExpPoly(list []node, x expPoly, op func(a, b expPoly) (expPoly, bool)) (expPoly, bool) {
	for _, g := range list {
		y, ok := expPolyOf(g)
		if !ok {
			return expPoly{}, false
		}
		if x, ok = op(x, y); !ok {
			return expPoly{}, false
		}
	}
	return x, true
}

// add is x + y; false if it has too many terms.
func (x expPoly) add(y expPoly) (expPoly, bool) {
	out := expPoly{den: x.den}
	left, right := IntUniPoly(1), IntUniPoly(1)
	if !x.den.Equal(y.den) {
		out.den, left, right = x.den.Mul(y.den), y.den, x.den
	}
	for _, t := range x.terms {
		out.put(t.p.Mul(left), t.exp)
	}
	for _, t := range y.terms {
		out.put(t.p.Mul(right), t.exp)
	}
	return out.reduced(), len(out.terms) <= maxExpTerms
}

// mul is x·y; false if it has too many terms.
func (x expPoly) mul(y expPoly) (expPoly, bool) {
	if len(x.terms)*len(y.terms) > maxExpTerms {
		return expPoly{}, false
	}
	out := expPoly{den: x.den.Mul(y.den)}
	for _, t := range x.terms {
		for _, u := range y.terms {
			out.put(t.p.Mul(u.p), t.exp.add(u.exp))
		}
	}
	return out.reduced(), true
}

// put adds the term p·exp(e).
func (x *expPoly) put(p UniPoly, e exponent) {
	i := slices.IndexFunc(x.terms, func(t expPolyTerm) bool { return t.exp.equal(e) })
	if i < 0 {
		x.terms = append(x.terms, expPolyTerm{p, e})
		return
	}
	x.terms[i].p = x.terms[i].p.Add(p)
	if x.terms[i].p.IsZero() {
		x.terms = slices.Delete(x.terms, i, i+1)
	}
}

// reduced divides out the denominator where it divides every term.
func (x expPoly) reduced() expPoly {
	if x.den.Degree() < 1 {
		return x
	}
	out := expPoly{den: IntUniPoly(1)}
	for _, t := range x.terms {
		q, ok := t.p.quo(x.den)
		if !ok {
			return x
		}
		out.terms = append(out.terms, expPolyTerm{q, t.exp})
	}
	return out
}

// structureOfExpPoly is the structure of a function whose normal form has at most one term.
func structureOfExpPoly(n node) (structure, bool) {
	x, ok := expPolyOf(n)
	if !ok || len(x.terms) > 1 {
		return structure{}, false
	}
	if len(x.terms) == 0 {
		return structure{}, true
	}
	p, ok := x.terms[0].p.quo(x.den)
	return structure{poly: p, exps: x.terms[0].exp.nodes()}, ok
}
