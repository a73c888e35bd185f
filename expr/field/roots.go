package field

// Square roots: a generator s with s² = r, r a square-free polynomial in the other
// generators. Numerators are of degree at most one in every root and denominators hold none,
// so that zero is recognised by its numerator. A radicand that is a square times a product
// of earlier ones gives no new root; that keeps the extension a field.

import (
	"fmt"
	"math/big"

	"remnant/expr/poly"
)

// maxRoots bounds the roots of one field: independence is checked against every product of
// the earlier ones.
const maxRoots = 8

// Sqrt is the positive square root of e. Factors that leave the root are assumed positive,
// and recorded so where their sign is not declared. It fails for a negative number and for a
// radicand that itself holds a root.
func (f *Field) Sqrt(e Elem) (Elem, error) {
	if e.IsZero() {
		return e, nil
	}
	e = e.Lowest()
	for _, g := range f.roots {
		if e.Has(g) {
			return Elem{}, fmt.Errorf("a square root inside a square root is not yet supported")
		}
	}
	content, powers := f.factorise(e.num)
	if content.Sign() < 0 && len(powers) == 0 && len(e.den.pow) == 0 {
		return Elem{}, fmt.Errorf("the square root of a negative number is not real")
	}
	out, rad := f.Int(1), poly.FromInt(int64(content.Sign()))
	n := new(big.Int).Mul(new(big.Int).Abs(content), e.DenInt())
	root, free := squareFreeInt(n)
	out = out.Mul(f.Rat(new(big.Rat).SetFrac(root, e.DenInt())))
	rad = rad.MulInt(free)
	var left []power
	for _, p := range append(powers, negated(e.den.pow)...) {
		q := Elem{f: f, num: f.factors[p.id].p}
		half := p.exp >> 1 // floor, also for negative exponents
		left = append(left, power{p.id, half})
		out = out.Mul(q.Pow(int(half)))
		if p.exp%2 != 0 {
			rad = f.ops.Mul(rad, q.num)
		}
	}
	out = f.positive(out, big.NewInt(1), left, []poly.Poly{rad})
	if rad.IsOne() {
		return out, nil
	}
	if f.polySign(rad) == Negative {
		return Elem{}, fmt.Errorf("the square root of a negative quantity is not real")
	}
	s, err := f.rootOf(rad)
	if err != nil {
		return Elem{}, err
	}
	for _, g := range s.Gens() {
		if in := f.gens[g]; in.Kind == Root && in.Name == "cos" {
			f.assumePositive(f.Raw(g), "it leaves a square root")
		}
	}
	return out.Mul(s), nil
}

func negated(ps []power) []power {
	out := make([]power, len(ps))
	for i, p := range ps {
		out[i] = power{p.id, -p.exp}
	}
	return out
}

// squareFreeInt is n = root²·free, free without the square of a prime below 2¹⁰; a larger
// square is found if it is all that is left.
func squareFreeInt(n *big.Int) (root, free *big.Int) {
	root, free = big.NewInt(1), new(big.Int).Set(n)
	rest, r := new(big.Int), new(big.Int)
	for d := int64(2); d < 1<<10; d++ {
		sq := big.NewInt(d * d)
		for {
			rest.QuoRem(free, sq, r)
			if r.Sign() != 0 {
				break
			}
			free.Set(rest)
			root.Mul(root, big.NewInt(d))
		}
	}
	if s := new(big.Int).Sqrt(free); new(big.Int).Mul(s, s).Cmp(free) == 0 {
		root.Mul(root, s)
		free.SetInt64(1)
	}
	return root, free
}

// rootOf is the positive root of the polynomial r, through earlier roots where r times a
// product of their radicands is a square.
func (f *Field) rootOf(r poly.Poly) (Elem, error) {
	n := len(f.roots)
	for _, g := range f.roots {
		if f.gens[g].Arg.num.Equal(r) {
			return f.Raw(g), nil
		}
	}
	for set := range 1 << n {
		radicands, prod, by := []poly.Poly{r}, r, f.Int(1)
		for i, g := range f.roots {
			if set>>i&1 == 1 {
				radicands = append(radicands, f.gens[g].Arg.num)
				prod = f.ops.Mul(prod, f.gens[g].Arg.num)
				by = by.Mul(f.Raw(g))
			}
		}
		if t, ok := prod.IsSquare(); ok {
			content, powers := f.factorise(t)
			return f.positive(Elem{f: f, num: t}, content, powers, radicands).Div(by), nil
		}
	}
	if n == maxRoots {
		return Elem{}, fmt.Errorf("more than %d independent square roots are not supported", maxRoots)
	}
	g := f.add(generator{Info: Info{Kind: Root, Name: "sqrt", Arg: Elem{f: f, num: r}, Sign: Positive}})
	f.roots = append(f.roots, g)
	return f.Raw(g), nil
}

// reduceRoots brings the numerator to degree at most one in every root.
func (e Elem) reduceRoots() Elem {
	if e.f == nil || len(e.f.roots) == 0 || e.IsZero() {
		return e
	}
	for _, g := range e.f.roots {
		if e.num.Degree(g) < 2 {
			continue
		}
		r := e.f.gens[g].Arg
		even, odd := e.f.splitRoot(e.num, g, r)
		sum := even.Add(odd.Mul(e.f.Raw(g)))
		e = sum.Mul(Elem{f: e.f, num: poly.FromInt(1), den: e.den})
	}
	return e
}

// splitRoot writes p as even + odd·s with s² = r.
func (f *Field) splitRoot(p poly.Poly, s Gen, r Elem) (even, odd Elem) {
	pow := f.Int(1)
	for i, c := range p.CoeffsIn(s) {
		if i > 0 && i%2 == 0 {
			pow = pow.Mul(r)
		}
		part := Elem{f: f, num: c}.Mul(pow)
		if i%2 == 0 {
			even = even.Add(part)
		} else {
			odd = odd.Add(part)
		}
	}
	return even, odd
}

// rationalise finds up and p without roots such that 1/num = up/p.
func (f *Field) rationalise(num poly.Poly) (up Elem, p poly.Poly) {
	up, p = f.Int(1), num
	for i := len(f.roots) - 1; i >= 0; i-- {
		g := f.roots[i]
		if !p.Has(g) {
			continue
		}
		even, odd := f.splitRoot(p, g, f.gens[g].Arg)
		conj := even.Sub(odd.Mul(f.Raw(g)))
		norm := even.Mul(even).Sub(odd.Mul(odd).Mul(f.gens[g].Arg))
		// radicands are polynomials, and so are even, odd and the norm
		up, p = up.Mul(conj), norm.num
	}
	return up, p
}
