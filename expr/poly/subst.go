// Polynomials seen as polynomials in one variable: coefficients, derivative,
// substitution; and the renaming of variables.

package poly

import (
	"math/big"
	"math/bits"
	"slices"
)

// coefAt is the coefficient of one power of a variable.
type coefAt struct {
	exp  uint64
	coef Poly
}

// coeffsIn is the coefficients that are not zero, by increasing power of v.
func (p Poly) coeffsIn(v Var) []coefAt {
	if p.d == nil {
		return nil
	}
	l := p.d.lay
	k := l.index(v)
	if k < 0 {
		return []coefAt{{0, p}}
	}
	var exps []uint64
	for i := range p.d.len() {
		e := l.exp(p.d.mono(i), k)
		if j, ok := slices.BinarySearch(exps, e); !ok {
			exps = slices.Insert(exps, j, e)
		}
	}
	parts := make([]builder, len(exps))
	f := l.field[k]
	for i := range p.d.len() {
		m := p.d.mono(i)
		j, _ := slices.BinarySearch(exps, l.exp(m, k))
		b := &parts[j]
		b.exps = append(b.exps, m...)
		b.exps[len(b.exps)-l.words+int(f.word)] &^= f.mask << f.shift
		if p.d.bg == nil {
			b.word(p.d.co[i])
		} else {
			b.big(p.d.bg[i])
		}
	}
	out := make([]coefAt, len(exps))
	for j := range parts {
		parts[j].lay = l
		out[j] = coefAt{exps[j], parts[j].canonical()}
	}
	return out
}

// CoeffsIn is the coefficients by power of v: p = Σ c[i]·vⁱ, with len(c) the degree plus
// 1; empty for the polynomial 0.
func (p Poly) CoeffsIn(v Var) []Poly {
	parts := p.coeffsIn(v)
	if len(parts) == 0 {
		return nil
	}
	out := make([]Poly, parts[len(parts)-1].exp+1)
	for _, c := range parts {
		out[c.exp] = c.coef
	}
	return out
}

// FromCoeffsIn is Σ c[i]·vⁱ. The coefficients may contain v.
func FromCoeffsIn(v Var, c []Poly) Poly {
	terms := make([]Poly, 0, len(c))
	for i, x := range c {
		if !x.IsZero() {
			terms = append(terms, x.MulMono(power(v, uint64(i))))
		}
	}
	return Sum(terms)
}

// power is the monomial vᵉ.
func power(v Var, e uint64) []Power {
	if e == 0 {
		return nil
	}
	if e>>32 != 0 {
		exponentOverflow()
	}
	return []Power{{v, uint32(e)}}
}

// Deriv is ∂p/∂v.
func (p Poly) Deriv(v Var) Poly {
	if !p.Has(v) {
		return Poly{}
	}
	l := p.d.lay
	k := l.index(v)
	f := l.field[k]
	b := newBuilder(l, p.d.len())
	for i := range p.d.len() {
		m := p.d.mono(i)
		e := l.exp(m, k)
		if e == 0 {
			continue
		}
		b.exps = append(b.exps, m...)
		b.exps[len(b.exps)-l.words+int(f.word)] -= 1 << f.shift
		if p.d.bg == nil {
			var a acc
			a.addMul(p.d.co[i], int64(e))
			b.acc(&a)
		} else {
			b.big(new(big.Int).Mul(p.d.bg[i], new(big.Int).SetUint64(e)))
		}
	}
	return b.canonical()
}

// Subst is p with q in the place of v, without limits; see Ops.Subst.
func (p Poly) Subst(v Var, q Poly) Poly { return Ops{}.Subst(p, v, q) }

// Subst is p with q in the place of v. Method: Horner's rule.
func (o Ops) Subst(p Poly, v Var, q Poly) Poly {
	if !p.Has(v) {
		return p
	}
	c := p.coeffsIn(v)
	r := c[len(c)-1].coef
	for i := len(c) - 1; i >= 0; i-- {
		gap := c[i].exp
		if i > 0 {
			gap -= c[i-1].exp
		}
		r = o.Mul(r, o.Pow(q, int(gap)))
		if i > 0 {
			r = r.Add(c[i-1].coef)
		}
	}
	return r
}

// Rename is p with the variable f(v) in the place of every v. Variables that f maps to
// the same one become equal.
func (p Poly) Rename(f func(Var) Var) Poly {
	if p.IsConst() {
		return p
	}
	l := p.d.lay
	vars, rising := make([]Var, len(l.vars)), true
	for i, v := range l.vars {
		vars[i] = f(v)
		rising = rising && (i == 0 || vars[i-1] < vars[i])
	}
	if rising {
		m := *l
		m.vars = vars
		return Poly{d: &data{lay: &m, exps: p.d.exps, co: p.d.co, bg: p.d.bg}}
	}
	return p.permute(vars)
}

// permute is p with vars[i] in the place of its i-th variable.
func (p Poly) permute(vars []Var) Poly {
	l := p.d.lay
	set := slices.Clone(vars)
	slices.Sort(set)
	set = slices.Compact(set)
	to := make([]int, len(vars))
	sums := make([]uint64, len(set))
	for i, d := range l.degrees(p.d.exps) {
		to[i], _ = slices.BinarySearch(set, vars[i])
		sums[to[i]] += d
	}
	m := newLayout(set, bits.Len64(slices.Max(sums)))
	exps := make([]uint64, 0, p.d.len()*m.words)
	for i := range p.d.len() {
		clear(sums)
		e := p.d.mono(i)
		for k := range vars {
			sums[to[k]] += l.exp(e, k)
		}
		if slices.Max(sums)>>32 != 0 {
			exponentOverflow()
		}
		exps = append(exps, m.pack(sums)...)
	}
	return collect(m, exps, p.d.coef)
}
