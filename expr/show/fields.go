package show

// Expressions that are linear or quadratic in perturbation fields. Where every coefficient
// is a polynomial in k², k² is written as −∂² acting on a field, or by partial integration
// as a product of two gradients; otherwise k stays.

import (
	"math/big"

	"remnant/expr/field"
	"remnant/expr/oper"
)

// LinearTerm is Coef·Dᵐ Name with m = Order.
type LinearTerm struct {
	Coef  field.Elem
	Name  string
	Order int
}

// Linear is Σ Coef·(∂²ⁿ) u⁽ᵐ⁾ in the order of the terms given. Terms without a value are
// left out; an empty sum is 0.
func Linear(terms []LinearTerm) Node {
	coefs := make([]field.Elem, len(terms))
	for i, t := range terms {
		coefs[i] = t.Coef
	}
	split, ok := splitAll(coefs)
	var out []Node
	for i, t := range terms {
		if t.Coef.IsZero() {
			continue
		}
		if !ok {
			out = append(out, fractionOf(t.Coef).times(Symbol(t.Name, t.Order), false))
			continue
		}
		for n, c := range split[i] {
			if c.IsZero() {
				continue
			}
			if n%2 != 0 {
				c = c.Neg()
			}
			out = append(out, fractionOf(c).times(Spatial(t.Name, t.Order, 2*n), false))
		}
	}
	return Sum(out...)
}

// Quadratic is Σ qₙ (u⁽ⁿ⁾)², highest n first, gradients before masses, without the ½ of the
// action.
func Quadratic(name string, q []field.Elem) Node {
	split, ok := splitAll(q)
	var out []Node
	for n := len(q) - 1; n >= 0; n-- {
		u := symbol{name: name, primes: n}
		out = append(out, bilinear(q[n], splitOf(split, n), ok, func(j int) Node { return square(j, u) })...)
	}
	return Sum(out...)
}

// Action is S = ∫dτ d³x ½ [ Σ qₙ (u⁽ⁿ⁾)² ] on the clock t, eta or N.
func Action(clock, name string, q []field.Elem) Node {
	return actionOf(clock, Quadratic(name, q))
}

func actionOf(clock string, twice Node) Node {
	half := quotient{Int(1), Int(2)}
	return equation{[]Node{Symbol("S", 0), Integral(clock, product{[]Node{half, bracket{twice}}, 1})}}
}

// QuadraticMatrix is Σ qₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁾ + Σ pₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁺¹⁾, highest derivatives first,
// without the ½ of the action; each pair of fields is written once.
func QuadraticMatrix(names []string, m oper.MatrixNormalForm) Node {
	var all []field.Elem
	collect := func(ms [][][]field.Elem) {
		for _, q := range ms {
			for _, row := range q {
				all = append(all, row...)
			}
		}
	}
	collect(m.Symmetric)
	collect(m.Antisymmetric)
	_, ok := splitAll(all)
	var out []Node
	for n := max(len(m.Symmetric), len(m.Antisymmetric)) - 1; n >= 0; n-- {
		if n < len(m.Antisymmetric) {
			out = append(out, antisymmetricTerms(names, m.Antisymmetric[n], n, ok)...)
		}
		if n < len(m.Symmetric) {
			out = append(out, symmetricTerms(names, m.Symmetric[n], n, ok)...)
		}
	}
	return Sum(out...)
}

// ActionMatrix is S = ∫dτ d³x ½ [ … ] for several fields.
func ActionMatrix(clock string, names []string, m oper.MatrixNormalForm) Node {
	return actionOf(clock, QuadraticMatrix(names, m))
}

// symmetricTerms is Σ q_ab u_a⁽ⁿ⁾ u_b⁽ⁿ⁾, squares first.
func symmetricTerms(names []string, q [][]field.Elem, n int, ok bool) []Node {
	var out []Node
	for a := range names {
		u := symbol{name: names[a], primes: n}
		out = append(out, bilinear(q[a][a], splitIf(q[a][a], ok), ok, func(j int) Node { return square(j, u) })...)
	}
	for a := range names {
		for b := a + 1; b < len(names); b++ {
			u, v := symbol{name: names[a], primes: n}, symbol{name: names[b], primes: n}
			twice := q[a][b].Scale(2, 1)
			out = append(out, bilinear(twice, splitIf(twice, ok), ok, func(j int) Node { return pair(j, u, v) })...)
		}
	}
	return out
}

// antisymmetricTerms is Σ p_ab u_a⁽ⁿ⁾ u_b⁽ⁿ⁺¹⁾ = Σ_{a<b} p_ab (u_a⁽ⁿ⁾u_b⁽ⁿ⁺¹⁾ − u_b⁽ⁿ⁾u_a⁽ⁿ⁺¹⁾).
func antisymmetricTerms(names []string, p [][]field.Elem, n int, ok bool) []Node {
	var out []Node
	for a := range names {
		for b := a + 1; b < len(names); b++ {
			u, dv := symbol{name: names[a], primes: n}, symbol{name: names[b], primes: n + 1}
			v, du := symbol{name: names[b], primes: n}, symbol{name: names[a], primes: n + 1}
			out = append(out, bilinear(p[a][b], splitIf(p[a][b], ok), ok, func(j int) Node {
				return Sum(pair(j, u, dv), Neg(pair(j, v, du)))
			})...)
		}
	}
	return out
}

// bilinear is c times a product of two fields; split, if ok, holds the coefficients of k²ʲ,
// and fields(j) is the product with j derivatives on each.
func bilinear(c field.Elem, split []field.Elem, ok bool, fields func(j int) Node) []Node {
	if c.IsZero() {
		return nil
	}
	if !ok {
		return []Node{fractionOf(c).times(fields(0), true)}
	}
	var out []Node
	for j := len(split) - 1; j >= 0; j-- {
		if !split[j].IsZero() {
			out = append(out, fractionOf(split[j]).times(fields(j), true))
		}
	}
	return out
}

// square is (∂ʲu)².
func square(j int, u symbol) Node {
	if j == 0 {
		return Power(u, 2)
	}
	return contracted{j, u, u}
}

// pair is ∂ʲu·∂ʲv.
func pair(j int, u, v symbol) Node {
	if j == 0 {
		return Product(u, v)
	}
	return contracted{j, u, v}
}

// splitAll writes every element as a polynomial in k²; false if one is none.
func splitAll(es []field.Elem) ([][]field.Elem, bool) {
	out := make([][]field.Elem, len(es))
	for i, e := range es {
		var ok bool
		if out[i], ok = Laplacians(e); !ok {
			return nil, false
		}
	}
	return out, true
}

func splitOf(split [][]field.Elem, n int) []field.Elem {
	if n < len(split) {
		return split[n]
	}
	return nil
}

func splitIf(e field.Elem, ok bool) []field.Elem {
	if !ok {
		return nil
	}
	s, _ := Laplacians(e)
	return s
}

// Laplacians writes e = Σ cₙ k²ⁿ with coefficients free of k; false if e is no polynomial in
// k².
func Laplacians(e field.Elem) ([]field.Elem, bool) {
	f := e.Field()
	if f == nil || e.IsZero() {
		return nil, true
	}
	e = e.Lowest()
	var k field.Gen
	found := false
	for _, g := range e.Gens() {
		if f.Info(g).Kind == field.Wavenumber {
			k, found = g, true
		}
	}
	if !found {
		return []field.Elem{e}, true
	}
	den := f.Rat(new(big.Rat).SetInt(e.DenInt()))
	_, factors := e.Factors()
	for _, fp := range factors {
		if fp.Exp > 0 {
			continue
		}
		if fp.P.Has(k) {
			return nil, false
		}
		d, err := f.Poly(fp.P)
		if err != nil {
			return nil, false
		}
		den = den.Mul(d.Pow(-fp.Exp))
	}
	var out []field.Elem
	for n, c := range e.Num().CoeffsIn(k) {
		if n%2 != 0 {
			if !c.IsZero() {
				return nil, false
			}
			continue
		}
		p, err := f.Poly(c)
		if err != nil {
			return nil, false
		}
		out = append(out, p.Div(den))
	}
	return out, true
}
