package series

// Taylor models: a function on the disc |s − c| ≤ ρ as a polynomial in t = (s − c)/ρ with a
// bound of the error. Sums, products and compositions of models enclose those of the
// functions, and no derivative is ever needed on a whole disc. [MakinoBerz2003]

import (
	"math/big"

	"remnant/expr/budget"
)

// modelOrder is the number of coefficients of a model. The work per model grows with its
// square, and the discs that can be decided grow little beyond this.
const modelOrder = 10

// model says |f(c + ρt) − Σ a[j] tʲ| ≤ eps for |t| ≤ 1, for some numbers in the discs a[j].
// Errors of rounding stand in the radii of a, those of truncation, which fall with ρ, in eps.
type model struct {
	a   []Disc
	eps mag
}

// evaluator makes models with one precision.
type evaluator struct {
	Arith
	budget  *budget.Budget
	shifted int // coefficients that the last shift of a polynomial took
}

// constant is the model of a number.
func (ev *evaluator) constant(d Disc) model {
	m := model{a: make([]Disc, modelOrder)}
	m.a[0] = d
	return m
}

// linear is the model of p + q·t.
func (ev *evaluator) linear(p, q Disc) model {
	m := ev.constant(p)
	m.a[1] = q
	return m
}

func (ev *evaluator) rat(x *big.Rat) Disc { return ev.Rat(x, new(big.Rat)) }

// norm bounds |f| on the disc.
func (m model) norm() mag { return m.normFrom(0).add(m.eps) }

// normFrom bounds Σ_{j≥k} |a[j]|.
func (m model) normFrom(k int) mag {
	var n mag
	for _, d := range m.a[k:] {
		n = n.add(d.norm())
	}
	return n
}

func (ev *evaluator) add(f, g model) model {
	out := model{make([]Disc, modelOrder), f.eps.add(g.eps)}
	for j := range out.a {
		out.a[j] = ev.Add(f.a[j], g.a[j])
	}
	return out
}

func (ev *evaluator) scale(f model, k Disc) model {
	out := model{make([]Disc, modelOrder), f.eps.mul(k.norm())}
	for j := range out.a {
		out.a[j] = ev.Mul(f.a[j], k)
	}
	return out
}

func (ev *evaluator) mul(f, g model) model {
	out := model{a: make([]Disc, modelOrder)}
	var fn, gn [modelOrder]mag // norms of coefficients
	var tail [modelOrder + 1]mag
	var f1, g1 mag
	for j := range modelOrder {
		fn[j], gn[j] = f.a[j].norm(), g.a[j].norm()
		f1, g1 = f1.add(fn[j]), g1.add(gn[j])
	}
	for j := modelOrder - 1; j >= 0; j-- {
		tail[j] = tail[j+1].add(gn[j]) // Σ_{i≥j} |g.a[i]|
	}
	for i, x := range f.a {
		if fn[i].isZero() {
			continue
		}
		for j := 0; i+j < modelOrder; j++ {
			if !gn[j].isZero() {
				out.a[i+j] = ev.Add(out.a[i+j], ev.Mul(x, g.a[j]))
			}
		}
		out.eps = out.eps.add(fn[i].mul(tail[modelOrder-i]))
	}
	out.eps = out.eps.add(f1.mul(g.eps)).add(g1.mul(f.eps)).add(f.eps.mul(g.eps))
	return out
}

// horner is Σ c[n] gⁿ.
func (ev *evaluator) horner(c []Disc, g model) model {
	if len(c) == 0 {
		return ev.constant(Disc{})
	}
	out := ev.constant(c[len(c)-1])
	for n := len(c) - 2; n >= 0; n-- {
		ev.budget.Check(modelOrder)
		out = ev.mul(out, g)
		out.a[0] = ev.Add(out.a[0], c[n])
	}
	return out
}

// at is the model of the node f on |s − c| ≤ ρ; c has no radius.
func (ev *evaluator) at(f node, c Disc, rho mag) model {
	ev.budget.Check(modelOrder)
	return f.model(ev, c, rho)
}

// compose is the model of f∘g for the model g: f is taken on the smallest disc that g is
// known to map to.
func (ev *evaluator) compose(f node, g model) model {
	c := g.a[0].exactMid()
	h := model{append([]Disc(nil), g.a...), g.eps}
	h.a[0] = Disc{rad: g.a[0].rad}
	size := h.norm()
	if size.isZero() {
		size = mag{0.5, -4 * int(ev.prec)}
	}
	outer := ev.at(f, c, size)
	inv, _ := ev.Inv(ev.mag(size))
	out := ev.horner(outer.a, ev.scale(h, inv))
	out.eps = out.eps.add(outer.eps)
	return out
}

// divide is the model of f(s)/s on |s − c| ≤ ρ for a function with f(0) = 0.
//
// Away from 0 it is the product with the geometric series of 1/s. Near 0 the model of f is
// taken around 0, where the division is a shift of coefficients: the error R of that model
// vanishes at 0, so that |R/s| is largest on the edge.
func (ev *evaluator) divide(f node, c Disc, rho mag) model {
	if far := c.midDown(); rho.mul(mag{0.75, 2}).less(far) {
		return ev.mul(ev.at(f, c, rho), ev.reciprocal(c, rho))
	}
	wide := c.midUp().add(rho)
	m := ev.at(f, Disc{}, wide)
	inv, _ := ev.Inv(ev.mag(wide))
	rounding := m.a[0].norm()
	for _, d := range m.a[1:] {
		rounding = rounding.add(d.rad)
	}
	shifted := make([]Disc, modelOrder-1)
	for j := range shifted {
		shifted[j] = ev.Mul(m.a[j+1].exactMid(), inv)
	}
	shifted[0] = shifted[0].enlarge(rounding.mul(inv.norm()))
	// s = wide·t' with t' = (c + ρt)/wide.
	out := ev.horner(shifted, ev.linear(ev.Mul(c, inv), ev.Mul(ev.mag(rho), inv)))
	out.eps = out.eps.add(m.eps.mul(inv.norm()))
	return out
}

// reciprocal is the model of 1/s on a disc away from 0: Σ (−ρ/c)ʲ tʲ / c.
func (ev *evaluator) reciprocal(c Disc, rho mag) model {
	inv, _ := ev.Inv(c)
	q := ev.Mul(ev.Neg(ev.mag(rho)), inv)
	out := model{a: make([]Disc, modelOrder)}
	term := inv
	for j := range out.a {
		out.a[j] = term
		term = ev.Mul(term, q)
	}
	// The rest is the next term over 1 − |ρ/c| ≥ 1/2.
	out.eps = term.norm().mul(mag{0.5, 2})
	return out
}

// polynomial is the model of Σ coefs[n] sⁿ; rest bounds what the terms left out add on the
// disc. As many coefficients at c are found as it takes to see how small those beyond the
// model are; the bound by absolute values alone would be far too large where terms cancel.
func (ev *evaluator) polynomial(coefs []Disc, rest mag, c Disc, rho mag) model {
	n := max(modelOrder, ev.shifted/2)
	for {
		a, dropped := ev.shift(coefs, n, c, rho)
		out := model{a[:modelOrder:modelOrder], dropped}
		size := out.normFrom(0)
		for _, d := range a[modelOrder:] {
			out.eps = out.eps.add(d.norm())
		}
		if n >= len(coefs) || !size.mul(mag{0.5, -11}).less(dropped) {
			ev.shifted = n
			out.a[0] = out.a[0].enlarge(rest)
			return out
		}
		n *= 2
	}
}

// shift is the first n coefficients in t of Σ coefs[k] (c + ρt)ᵏ by Horner's rule, and a bound
// of the sum of all others.
func (ev *evaluator) shift(coefs []Disc, n int, c Disc, rho mag) (a []Disc, dropped mag) {
	a = make([]Disc, n)
	r := ev.mag(rho)
	reach := c.midUp().add(rho)
	for k := len(coefs) - 1; k >= 0; k-- {
		ev.budget.Check(n)
		top := min(len(coefs)-1-k, n-1) // a[top] is the last that can differ from 0
		if top == n-1 {
			dropped = dropped.mul(reach).add(a[n-1].norm().mul(rho))
		}
		for j := top; j >= 1; j-- {
			a[j] = ev.Add(ev.Mul(a[j], c), ev.Mul(a[j-1], r))
		}
		a[0] = ev.Add(ev.Mul(a[0], c), coefs[k])
	}
	return a, dropped
}

// exponential is the model of eˢ.
func (ev *evaluator) exponential(c Disc, rho mag) model {
	out := model{a: make([]Disc, modelOrder)}
	r := ev.mag(rho)
	term := ev.Exp(c)
	for j := range out.a {
		out.a[j] = term
		term = ev.Mul(ev.Mul(term, r), ev.reciprocalInt(j+1))
	}
	// Σ_{j≥J} ρʲ/j! ≤ ρᴶ/J!·e^ρ.
	out.eps = term.norm().mul(rho.exp())
	return out
}

// derivative bounds f' on the disc around the same centre that has half the radius: the
// error R of the polynomial is analytic and at most E, so |R'| ≤ 4E/3ρ there (Schwarz, Pick).
func (ev *evaluator) derivative(m model, rho mag) Disc {
	inv, _ := ev.Inv(ev.mag(rho))
	e := m.eps
	for _, d := range m.a {
		e = e.add(d.rad)
	}
	var spread mag
	for j := 2; j < modelOrder; j++ { // j|a_j| 2^(1−j)
		spread = spread.add(m.a[j].midUp().mul(magInt(j)).mul(mag{0.5, 2 - j}))
	}
	out := m.a[1].exactMid().enlarge(spread).enlarge(e.mul(mag{0.75, 1}))
	return ev.Mul(out, inv)
}

// pellet decides whether the k-th coefficient dominates the rest, so that f has exactly k
// zeros in the disc by Rouché's theorem. rounding is the share that only a higher precision
// can lower. [Marden1966], section 31; [BeckerSagraloffSharmaYap2018]
func (m model) pellet(k int) (proved bool, rounding, lead mag) {
	var rest mag
	for j, d := range m.a {
		rounding = rounding.add(d.rad)
		if j != k {
			rest = rest.add(d.midUp())
		}
	}
	lead = m.a[k].midDown()
	// A margin of a tenth bounds the argument on the disc for k = 0: see winding.
	return rest.add(rounding).add(m.eps).mul(mag{0.556, 1}).less(lead), rounding, lead
}
