package field

// Arithmetic. Sums settle equal denominators first; products cancel crosswise before they
// multiply, so that no common factor is ever multiplied in.

import (
	"math/big"

	"remnant/expr/poly"
)

// Neg is −e.
func (e Elem) Neg() Elem {
	e.num = e.num.Neg()
	return e
}

// Sub is a − b.
func (a Elem) Sub(b Elem) Elem { return a.Add(b.Neg()) }

// Add is a + b.
func (a Elem) Add(b Elem) Elem {
	switch {
	case a.IsZero():
		return b
	case b.IsZero():
		return a
	}
	a, b = a.live(), b.live()
	f := a.f
	if f == nil {
		f = b.f
	}
	if a.sameDen(b) {
		return Elem{f: f, num: a.num.Add(b.num), den: a.den}.cancel(a.den.pow).cancelInt()
	}
	an, bn := a.num, b.num
	den, tied, am, bm := mergePowers(a.den.pow, b.den.pow)
	for _, p := range am {
		an = f.mulPower(an, p.id, p.exp)
	}
	for _, p := range bm {
		bn = f.mulPower(bn, p.id, p.exp)
	}
	in, ai, bi := lcmInt(a.den.int, b.den.int)
	if ai != nil {
		an = an.MulInt(ai)
	}
	if bi != nil {
		bn = bn.MulInt(bi)
	}
	e := Elem{f: f, num: an.Add(bn), den: denominator{in, den}}
	f.ops.Budget.Check(e.num.Len())
	return e.cancel(tied).cancelInt()
}

// mergePowers is the least common multiple of two products of powers, the powers that have
// one exponent in both, and what each product lacks.
func mergePowers(a, b []power) (lcm, tied, aLacks, bLacks []power) {
	i, j := 0, 0
	for i < len(a) || j < len(b) {
		switch {
		case j == len(b) || i < len(a) && a[i].id < b[j].id:
			lcm, bLacks = append(lcm, a[i]), append(bLacks, a[i])
			i++
		case i == len(a) || b[j].id < a[i].id:
			lcm, aLacks = append(lcm, b[j]), append(aLacks, b[j])
			j++
		default:
			switch d := a[i].exp - b[j].exp; {
			case d == 0:
				lcm, tied = append(lcm, a[i]), append(tied, a[i])
			case d > 0:
				lcm, bLacks = append(lcm, a[i]), append(bLacks, power{a[i].id, d})
			default:
				lcm, aLacks = append(lcm, b[j]), append(aLacks, power{a[i].id, -d})
			}
			i, j = i+1, j+1
		}
	}
	return
}

func lcmInt(a, b *big.Int) (lcm, aLacks, bLacks *big.Int) {
	switch {
	case a == nil && b == nil:
		return nil, nil, nil
	case a == nil:
		return b, b, nil
	case b == nil:
		return a, nil, a
	case a.Cmp(b) == 0:
		return a, nil, nil
	}
	g := new(big.Int).GCD(nil, nil, a, b)
	aLacks = new(big.Int).Quo(b, g)
	bLacks = new(big.Int).Quo(a, g)
	return new(big.Int).Mul(a, aLacks), aLacks, bLacks
}

// cancel divides numerator and denominator by the given powers of the denominator as far
// as they go.
func (e Elem) cancel(which []power) Elem {
	if e.IsZero() {
		return Elem{}
	}
	var gone map[int32]int32
	for _, p := range which {
		var n int32
		if fc := e.f.factors[p.id]; fc.mono {
			n = min(p.exp, int32(e.num.MinDegree(fc.v)))
			if n > 0 {
				e.num, _ = e.num.DivMono([]poly.Power{{Var: fc.v, Exp: uint32(n)}})
			}
		} else {
			e.num, n = e.f.divideBy(e.num, fc.p, p.exp)
		}
		if n > 0 {
			if gone == nil {
				gone = map[int32]int32{}
			}
			gone[p.id] = n
		}
	}
	if gone == nil {
		return e
	}
	left := make([]power, 0, len(e.den.pow))
	for _, p := range e.den.pow {
		if p.exp -= gone[p.id]; p.exp > 0 {
			left = append(left, p)
		}
	}
	e.den.pow = left
	return e
}

// cancelInt divides out the common integer of numerator and denominator.
func (e Elem) cancelInt() Elem {
	if e.den.int == nil || e.IsZero() {
		return e
	}
	g := new(big.Int).GCD(nil, nil, e.num.Content(), e.den.int)
	if !isOne(g) {
		e.num, _ = e.num.DivExactInt(g)
		e.den.int = new(big.Int).Quo(e.den.int, g)
	}
	if isOne(e.den.int) {
		e.den.int = nil
	}
	return e
}

func isOne(n *big.Int) bool { return n.IsInt64() && n.Int64() == 1 }

// Mul is a·b.
func (a Elem) Mul(b Elem) Elem {
	if a.IsZero() || b.IsZero() {
		return Elem{}
	}
	a, b = a.live(), b.live()
	f := a.f
	if f == nil {
		f = b.f
	}
	ac := Elem{f: f, num: a.num, den: b.den}.cancel(b.den.pow).cancelInt()
	bc := Elem{f: f, num: b.num, den: a.den}.cancel(a.den.pow).cancelInt()
	e := Elem{f: f, num: f.ops.Mul(ac.num, bc.num)}
	e.den.pow = addPowers(ac.den.pow, bc.den.pow)
	switch {
	case ac.den.int == nil:
		e.den.int = bc.den.int
	case bc.den.int == nil:
		e.den.int = ac.den.int
	default:
		e.den.int = new(big.Int).Mul(ac.den.int, bc.den.int)
	}
	f.ops.Budget.Check(e.num.Len())
	return e.reduceRoots()
}

func addPowers(a, b []power) []power {
	if len(a) == 0 {
		return b
	}
	if len(b) == 0 {
		return a
	}
	out := make([]power, 0, len(a)+len(b))
	i, j := 0, 0
	for i < len(a) && j < len(b) {
		switch {
		case a[i].id < b[j].id:
			out = append(out, a[i])
			i++
		case a[i].id > b[j].id:
			out = append(out, b[j])
			j++
		default:
			out = append(out, power{a[i].id, a[i].exp + b[j].exp})
			i, j = i+1, j+1
		}
	}
	return append(append(out, a[i:]...), b[j:]...)
}

// Inv is 1/e. It panics if e is zero: callers ask IsZero first, and say what they divide by.
func (e Elem) Inv() Elem {
	if e.IsZero() {
		panic("field: division by zero")
	}
	f, e := e.f, e.live()
	up, num := f.rationalise(e.num)
	content, powers := f.factorise(num)
	out := Elem{f: f, num: up.num, den: denominator{new(big.Int).Abs(content), powers}}
	if content.Sign() < 0 {
		out.num = out.num.Neg()
	}
	// factorise may have split factors below e; its numerator stays the one that was inverted
	for _, p := range f.livePowers(e.den.pow) {
		out.num = f.mulPower(out.num, p.id, p.exp)
	}
	if e.den.int != nil {
		out.num = out.num.MulInt(e.den.int)
	}
	out = out.cancel(out.den.pow).cancelInt()
	for _, p := range up.den.pow {
		out = out.Mul(f.factorElem(p.id, -p.exp))
	}
	return out.reduceRoots()
}

// factorElem is a power of a factor, of either sign, as an element.
func (f *Field) factorElem(id, exp int32) Elem {
	if exp >= 0 {
		return Elem{f: f, num: f.mulPower(poly.FromInt(1), id, exp)}
	}
	return Elem{f: f, num: poly.FromInt(1), den: denominator{pow: []power{{id, -exp}}}}
}

// Div is a/b. It panics if b is zero.
func (a Elem) Div(b Elem) Elem {
	if a.IsZero() {
		return Elem{}
	}
	return a.Mul(b.Inv())
}

// Pow is eⁿ, n of either sign. 0⁰ is 1.
func (e Elem) Pow(n int) Elem {
	if n < 0 {
		return e.Inv().Pow(-n)
	}
	if n == 0 {
		return Elem{f: e.f, num: poly.FromInt(1)}
	}
	out, base := Elem{f: e.f, num: poly.FromInt(1)}, e
	for ; n > 0; n >>= 1 {
		if n&1 == 1 {
			out = out.Mul(base)
		}
		if n > 1 {
			base = base.Mul(base)
		}
	}
	return out
}

// Scale is e·n/d for integers n and d ≠ 0.
func (e Elem) Scale(n, d int64) Elem {
	if e.IsZero() {
		return e
	}
	return e.Mul(e.f.Rat(big.NewRat(n, d)))
}

// Sum adds many elements, pairwise by halves so that sizes stay balanced.
func Sum(es []Elem) Elem {
	switch len(es) {
	case 0:
		return Elem{}
	case 1:
		return es[0]
	}
	m := len(es) / 2
	return Sum(es[:m]).Add(Sum(es[m:]))
}

// Lowest divides out every common divisor of the numerator and the denominator, also such
// as no factor of the basis shows yet: it refines the basis by them. Arithmetic alone
// cancels whole factors only.
func (e Elem) Lowest() Elem {
	if e.f == nil || e.num.IsConst() {
		return e
	}
	e = e.live()
	e = e.cancel(e.den.pow)
	for again := true; again; {
		again = false
		for _, p := range e.den.pow {
			fc := e.f.factors[p.id]
			if fc.mono || !shareVars(fc.p, e.num) {
				continue
			}
			if g := e.f.ops.Gcd(fc.p, e.num); !g.IsConst() {
				_, g = g.PrimitivePart()
				e.f.refine(g)
				e, again = e.live(), true
				break
			}
		}
	}
	return e
}
