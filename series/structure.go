package series

// Structure: an entire function as P·exp(g)·Π rᵢ^kᵢ with a polynomial P. The exponential has
// no zeros, so where no r is left the zeros are those of P and nothing has to be evaluated.

import (
	"math/big"
	"slices"
)

// structure is poly·exp(Σ exps)·Π rest.
type structure struct {
	poly UniPoly
	exps []node
	rest []powerNode
}

// Structure is P, g and whether f = P·exp(g).
func (f Entire) Structure() (p UniPoly, g Entire, ok bool) {
	s := structureOf(f.node())
	return s.poly, Entire{makeSum(s.exps)}, len(s.rest) == 0
}

// node is the function itself.
func (s structure) node() node {
	list := []node{polyNode{s.poly}}
	if len(s.exps) > 0 {
		list = append(list, makeCompose(expNode{}, makeSum(s.exps)))
	}
	for _, r := range s.rest {
		list = append(list, makePower(r.f, r.k))
	}
	return makeProduct(list)
}

// structureOf tries the normal form of exponentials first, then takes the function apart.
func structureOf(n node) structure {
	if s, ok := structureOfExpPoly(n); ok {
		return s
	}
	one := IntUniPoly(1)
	switch f := n.(type) {
	case polyNode:
		return structure{poly: f.p}
	case expNode:
		return structure{poly: one, exps: []node{polyNode{IntUniPoly(0, 1)}}}
	case composeNode:
		if _, ok := f.outer.(expNode); ok {
			return structure{poly: one, exps: []node{f.inner}}
		}
		if p, ok := f.outer.(polyNode); ok {
			return structureOfPolynomial(p.p, f.inner)
		}
		if q, ok := f.inner.(polyNode); ok {
			return structureOf(f.outer).compose(q)
		}
	case productNode:
		out := structure{poly: one}
		for _, g := range f.list {
			out = out.times(structureOf(g))
		}
		return out
	case powerNode:
		out, s := structure{poly: one}, structureOf(f.f)
		for range f.k {
			out = out.times(s)
		}
		return out
	case divideNode:
		s := structureOf(f.f)
		if p, ok := s.poly.divideByS(); ok {
			s.poly = p
			return s
		}
	}
	return structure{poly: one, rest: []powerNode{{n, 1}}}
}

// structureOfPolynomial is that of p(g) for a g that is no polynomial: p(g) = Π (g − r)^k over
// the rational zeros r, and what remains of p.
func structureOfPolynomial(p UniPoly, g node) structure {
	out := structure{poly: IntUniPoly(1)}
	for {
		r, q, ok := rationalRoot(p, nil)
		if !ok {
			break
		}
		part := makeSum([]node{g, polyNode{NewUniPoly(new(big.Rat).Neg(r))}})
		out, p = out.times(structureOf(part)), q
	}
	if p.Degree() < 1 {
		out.poly = out.poly.Mul(p)
		return out
	}
	return out.times(structure{IntUniPoly(1), nil, []powerNode{{composeNode{polyNode{p}, g}, 1}}})
}

// compose is the structure of f(q(s)).
func (s structure) compose(q polyNode) structure {
	out := structure{poly: s.poly.Compose(q.p)}
	for _, e := range s.exps {
		out.exps = append(out.exps, makeCompose(e, q))
	}
	for _, r := range s.rest {
		out.rest = append(out.rest, powerNode{composeNode{r.f, q}, r.k})
	}
	return out
}

// times is the structure of the product; equal factors come together, and a factor s of the
// polynomial undoes a division.
func (s structure) times(t structure) structure {
	out := structure{s.poly.Mul(t.poly), slices.Concat(s.exps, t.exps), slices.Clone(s.rest)}
	for _, r := range t.rest {
		i := slices.IndexFunc(out.rest, func(o powerNode) bool { return same(o.f, r.f) })
		if i < 0 {
			out.rest = append(out.rest, r)
		} else {
			out.rest[i].k += r.k
		}
	}
	return out.cancel()
}

// cancel uses factors s of the polynomial to undo divisions by s.
func (s structure) cancel() structure {
	if s.poly.IsZero() {
		return s
	}
	for i, r := range s.rest {
		f, isDivision := r.f.(divideNode)
		p, divisible := s.poly.divideByS()
		if !isDivision || !divisible {
			continue
		}
		s.poly = p
		s.rest = slices.Delete(slices.Clone(s.rest), i, i+1)
		if r.k > 1 {
			s.rest = append(s.rest, powerNode{f, r.k - 1})
		}
		return s.times(structureOf(f.f))
	}
	return s
}

// same reports whether two nodes are built alike; rules are alike only if they are one.
func same(a, b node) bool {
	switch f := a.(type) {
	case polyNode:
		g, ok := b.(polyNode)
		return ok && f.p.Equal(g.p)
	case expNode:
		_, ok := b.(expNode)
		return ok
	case *ruleNode:
		g, ok := b.(*ruleNode)
		return ok && f == g
	case sumNode:
		g, ok := b.(sumNode)
		return ok && slices.EqualFunc(f.list, g.list, same)
	case productNode:
		g, ok := b.(productNode)
		return ok && slices.EqualFunc(f.list, g.list, same)
	case powerNode:
		g, ok := b.(powerNode)
		return ok && f.k == g.k && same(f.f, g.f)
	case divideNode:
		g, ok := b.(divideNode)
		return ok && same(f.f, g.f)
	case composeNode:
		g, ok := b.(composeNode)
		return ok && same(f.outer, g.outer) && same(f.inner, g.inner)
	}
	return false
}
