package series

// The ways to build an entire function: each knows its models, its exact Taylor
// coefficients and its derivative. The makers bring sums and products of polynomials
// together, so that structure stays visible.

import (
	"math/big"
	"slices"
	"strconv"
	"strings"
)

// polyNode is a polynomial.
type polyNode struct{ p UniPoly }

func (f polyNode) model(ev *evaluator, c Disc, rho mag) model {
	coefs := make([]Disc, len(f.p.c))
	for i, x := range f.p.c {
		coefs[i] = ev.rat(x)
	}
	return ev.polynomial(coefs, mag{}, c, rho)
}

func (f polyNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	out := make([]ExpSum, n)
	for j, p := 0, f.p.shift(a); j < n; j++ {
		out[j] = RatSum(p.Coef(j))
	}
	return out, true
}

func (f polyNode) deriv() node { return polyNode{f.p.Deriv()} }

func (f polyNode) text(arg string) string { return strings.ReplaceAll(f.p.String(), "s", arg) }

// expNode is eˢ.
type expNode struct{}

func (expNode) model(ev *evaluator, c Disc, rho mag) model { return ev.exponential(c, rho) }

func (expNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	out := make([]ExpSum, n)
	c := big.NewRat(1, 1)
	for j := range out {
		out[j] = expPower(a, c)
		c = new(big.Rat).Quo(c, big.NewRat(int64(j+1), 1))
	}
	return out, true
}

func (expNode) deriv() node            { return expNode{} }
func (expNode) text(arg string) string { return "exp(" + arg + ")" }

// sumNode is Σ f.
type sumNode struct{ list []node }

// makeSum collects the polynomials of the list into one.
func makeSum(list []node) node {
	var p UniPoly
	var rest []node
	for _, f := range list {
		switch f := f.(type) {
		case polyNode:
			p = p.Add(f.p)
		case sumNode:
			for _, g := range f.list {
				if q, ok := g.(polyNode); ok {
					p = p.Add(q.p)
				} else {
					rest = append(rest, g)
				}
			}
		default:
			rest = append(rest, f)
		}
	}
	switch {
	case len(rest) == 0:
		return polyNode{p}
	case !p.IsZero():
		rest = append(rest, polyNode{p})
	case len(rest) == 1:
		return rest[0]
	}
	return sumNode{rest}
}

func (f sumNode) model(ev *evaluator, c Disc, rho mag) model {
	out := ev.at(f.list[0], c, rho)
	for _, g := range f.list[1:] {
		out = ev.add(out, ev.at(g, c, rho))
	}
	return out
}

func (f sumNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	out := make([]ExpSum, n)
	for _, g := range f.list {
		t, ok := g.taylor(a, n)
		if !ok {
			return nil, false
		}
		for j := range out {
			out[j] = out[j].Add(t[j])
		}
	}
	return out, true
}

func (f sumNode) deriv() node {
	list := make([]node, len(f.list))
	for i, g := range f.list {
		list[i] = g.deriv()
	}
	return makeSum(list)
}

func (f sumNode) text(arg string) string {
	var b strings.Builder
	for i, g := range f.list {
		t := g.text(arg)
		if i > 0 && !strings.HasPrefix(t, "-") {
			b.WriteByte('+')
		}
		b.WriteString(t)
	}
	return b.String()
}

// productNode is Π f.
type productNode struct{ list []node }

// makeProduct collects the polynomials of the list into one, which stands first and undoes
// divisions by s as far as it holds that factor.
func makeProduct(list []node) node {
	p := IntUniPoly(1)
	var rest []node
	for _, f := range list {
		switch f := f.(type) {
		case polyNode:
			p = p.Mul(f.p)
		case productNode:
			for _, g := range f.list {
				if q, ok := g.(polyNode); ok {
					p = p.Mul(q.p)
				} else {
					rest = append(rest, g)
				}
			}
		default:
			rest = append(rest, f)
		}
	}
	for i, f := range rest { // s·(f/s) = f
		d, isDivision := f.(divideNode)
		q, divisible := p.divideByS()
		if isDivision && divisible && !p.IsZero() {
			return makeProduct(append([]node{polyNode{q}, d.f}, slices.Delete(rest, i, i+1)...))
		}
	}
	switch {
	case len(rest) == 0 || p.IsZero():
		return polyNode{p}
	case !p.Equal(IntUniPoly(1)):
		rest = append([]node{polyNode{p}}, rest...)
	case len(rest) == 1:
		return rest[0]
	}
	return productNode{rest}
}

func (f productNode) model(ev *evaluator, c Disc, rho mag) model {
	out := ev.at(f.list[0], c, rho)
	for _, g := range f.list[1:] {
		out = ev.mul(out, ev.at(g, c, rho))
	}
	return out
}

func (f productNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	out := make([]ExpSum, n)
	out[0] = RatSum(big.NewRat(1, 1))
	for _, g := range f.list {
		t, ok := g.taylor(a, n)
		if !ok {
			return nil, false
		}
		out = mulTaylor(out, t)
	}
	return out, true
}

func mulTaylor(x, y []ExpSum) []ExpSum {
	out := make([]ExpSum, len(x))
	for i := range x {
		if x[i].IsZero() {
			continue
		}
		for j := 0; i+j < len(out); j++ {
			out[i+j] = out[i+j].Add(x[i].Mul(y[j]))
		}
	}
	return out
}

func (f productNode) deriv() node {
	var sum []node
	for i, g := range f.list {
		part := append([]node{g.deriv()}, f.list[:i]...)
		sum = append(sum, makeProduct(append(part, f.list[i+1:]...)))
	}
	return makeSum(sum)
}

func (f productNode) text(arg string) string {
	parts := make([]string, len(f.list))
	for i, g := range f.list {
		parts[i] = "(" + g.text(arg) + ")"
	}
	return strings.Join(parts, "*")
}

// powerNode is fᵏ, k ≥ 2.
type powerNode struct {
	f node
	k int
}

func makePower(f node, k int) node {
	if p, ok := f.(polyNode); ok || k == 0 {
		out := IntUniPoly(1)
		for range k {
			out = out.Mul(p.p)
		}
		return polyNode{out}
	}
	if k == 1 {
		return f
	}
	return powerNode{f, k}
}

func (f powerNode) model(ev *evaluator, c Disc, rho mag) model {
	m := ev.at(f.f, c, rho)
	out := m
	for range f.k - 1 {
		out = ev.mul(out, m)
	}
	return out
}

func (f powerNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	t, ok := f.f.taylor(a, n)
	if !ok {
		return nil, false
	}
	out := t
	for range f.k - 1 {
		out = mulTaylor(out, t)
	}
	return out, true
}

func (f powerNode) deriv() node {
	k := polyNode{IntUniPoly(int64(f.k))}
	return makeProduct([]node{k, makePower(f.f, f.k-1), f.f.deriv()})
}

func (f powerNode) text(arg string) string {
	return "(" + f.f.text(arg) + ")^" + strconv.Itoa(f.k)
}

// divideNode is f(s)/s with f(0) = 0.
type divideNode struct{ f node }

// makeDivide is f/s; the caller has proved f(0) = 0.
func makeDivide(f node) node {
	switch f := f.(type) {
	case polyNode:
		q, _ := f.p.divideByS()
		return polyNode{q}
	case productNode:
		if p, ok := f.list[0].(polyNode); ok {
			if q, ok := p.p.divideByS(); ok {
				return makeProduct(append([]node{polyNode{q}}, f.list[1:]...))
			}
		}
	}
	return divideNode{f}
}

func (f divideNode) model(ev *evaluator, c Disc, rho mag) model { return ev.divide(f.f, c, rho) }

func (f divideNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	if a.Sign() == 0 {
		t, ok := f.f.taylor(a, n+1)
		if !ok {
			return nil, false
		}
		return t[1:], true
	}
	t, ok := f.f.taylor(a, n)
	if !ok {
		return nil, false
	}
	// (a + δ) Σ gⱼδʲ = Σ fⱼδʲ.
	inv := new(big.Rat).Inv(a)
	out := make([]ExpSum, n)
	for j := range out {
		out[j] = t[j]
		if j > 0 {
			out[j] = out[j].Add(out[j-1].Scale(big.NewRat(-1, 1)))
		}
		out[j] = out[j].Scale(inv)
	}
	return out, true
}

// deriv: (f/s)' = (f' − f/s)/s, whose numerator vanishes at 0.
func (f divideNode) deriv() node {
	minus := makeProduct([]node{polyNode{IntUniPoly(-1)}, f})
	return makeDivide(makeSum([]node{f.f.deriv(), minus}))
}

func (f divideNode) text(arg string) string { return "(" + f.f.text(arg) + ")/(" + arg + ")" }

// composeNode is outer(inner(s)).
type composeNode struct{ outer, inner node }

func makeCompose(outer, inner node) node {
	p, isPoly := inner.(polyNode)
	if isPoly && p.p.Equal(IntUniPoly(0, 1)) {
		return outer
	}
	switch f := outer.(type) {
	case polyNode:
		if isPoly {
			return polyNode{f.p.Compose(p.p)}
		}
		if f.p.Degree() < 1 {
			return f
		}
	case composeNode:
		return makeCompose(f.outer, makeCompose(f.inner, inner))
	case expNode:
		if isPoly && p.p.IsZero() {
			return polyNode{IntUniPoly(1)}
		}
	case productNode:
		return makeProduct(composeAll(f.list, inner))
	case sumNode:
		return makeSum(composeAll(f.list, inner))
	case powerNode:
		return makePower(makeCompose(f.f, inner), f.k)
	}
	return composeNode{outer, inner}
}

func composeAll(list []node, inner node) []node {
	out := make([]node, len(list))
	for i, f := range list {
		out[i] = makeCompose(f, inner)
	}
	return out
}

func (f composeNode) model(ev *evaluator, c Disc, rho mag) model {
	return ev.compose(f.outer, ev.at(f.inner, c, rho))
}

func (f composeNode) taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	in, ok := f.inner.taylor(a, n)
	if !ok {
		return nil, false
	}
	b, ok := in[0].Rat()
	if !ok {
		return nil, false
	}
	out, ok := f.outer.taylor(b, n)
	if !ok {
		return nil, false
	}
	h := append([]ExpSum{{}}, in[1:]...)
	sum := make([]ExpSum, n)
	for j := n - 1; j >= 0; j-- {
		sum = mulTaylor(sum, h)
		sum[0] = sum[0].Add(out[j])
	}
	return sum, true
}

func (f composeNode) deriv() node {
	return makeProduct([]node{makeCompose(f.outer.deriv(), f.inner), f.inner.deriv()})
}

func (f composeNode) text(arg string) string {
	in := f.inner.text(arg)
	if _, ok := f.outer.(expNode); !ok {
		in = "(" + in + ")"
	}
	return f.outer.text(in)
}
