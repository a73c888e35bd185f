// Building polynomials: terms in decreasing order through a builder, or terms in any
// order through FromTerms.

package poly

import (
	"math/big"
	"math/bits"
	"slices"
)

// builder collects the terms of a polynomial in decreasing order and keeps the
// coefficients canonical: words until the first that does not fit.
type builder struct {
	lay  *layout
	exps []uint64
	co   []int64
	bg   []*big.Int // in use from the first big coefficient on; then co is nil
}

// newBuilder has room for n terms.
func newBuilder(l *layout, n int) builder {
	return builder{lay: l, exps: make([]uint64, 0, n*l.words), co: make([]int64, 0, n)}
}

// reserve makes room for n terms in an empty builder.
func (b *builder) reserve(n int) {
	b.exps, b.co = make([]uint64, 0, n*b.lay.words), make([]int64, 0, n)
}

// clip gives back room of which less than half is used.
func (b *builder) clip() {
	if 2*len(b.exps) < cap(b.exps) {
		b.exps, b.co, b.bg = exact(b.exps), exact(b.co), exact(b.bg)
	}
}

// exact is a copy of s without spare room.
func exact[E any](s []E) []E {
	if s == nil {
		return nil
	}
	return append(make([]E, 0, len(s)), s...)
}

func (b *builder) len() int {
	if b.bg != nil {
		return len(b.bg)
	}
	return len(b.co)
}

// word appends the coefficient c, not zero; the monomial is appended by the caller.
func (b *builder) word(c int64) {
	if b.bg != nil {
		b.bg = append(b.bg, big.NewInt(c))
		return
	}
	b.co = append(b.co, c)
}

// big appends the coefficient c, not zero, which the builder keeps.
func (b *builder) big(c *big.Int) {
	if b.bg == nil {
		if w, ok := fitsWord(c); ok {
			b.co = append(b.co, w)
			return
		}
		b.bg, b.co = bigs(b.co), nil
	}
	b.bg = append(b.bg, c)
}

// acc appends the sum a, not zero.
func (b *builder) acc(a *acc) {
	if w, ok := a.word(); ok {
		b.word(w)
		return
	}
	b.big(a.big())
}

// poly is the polynomial collected so far, its layout taken to be canonical.
func (b *builder) poly() Poly {
	if b.len() == 0 {
		return Poly{}
	}
	return Poly{d: &data{lay: b.lay, exps: b.exps, co: b.co, bg: b.bg}}
}

// canonical is poly for a layout that may be too wide.
func (b *builder) canonical() Poly {
	if b.len() == 0 {
		return Poly{}
	}
	l := b.lay
	or := l.orOf(b.exps)
	if c := l.shrink(or); c != l {
		b.exps, b.lay = l.repack(b.exps, c), c
	}
	return b.poly()
}

// FromInt is the constant c.
func FromInt(c int64) Poly { return FromBig(big.NewInt(c)) }

// FromBig is the constant c.
func FromBig(c *big.Int) Poly { return monomial(c, nil) }

// FromVar is the variable v.
func FromVar(v Var) Poly { return FromMono([]Power{{v, 1}}) }

// FromMono is the monomial m with coefficient 1.
func FromMono(m []Power) Poly { return monomial(bigOne, m) }

var bigOne = big.NewInt(1)

// monomial is c·m.
func monomial(c *big.Int, m []Power) Poly {
	if c.Sign() == 0 {
		return Poly{}
	}
	l, e := packPowers(m)
	b := builder{lay: l, exps: e}
	if w, ok := fitsWord(c); ok {
		b.word(w)
	} else {
		b.big(new(big.Int).Set(c))
	}
	return b.poly()
}

// packPowers is the canonical layout of the monomial m and m in it. Zero exponents are
// dropped; variables that are out of order or repeated are put right.
func packPowers(m []Power) (*layout, []uint64) {
	if !isMonomial(m) {
		m = normalMono(m)
	}
	if len(m) == 0 {
		return constLayout, []uint64{0}
	}
	vars, exp, need := make([]Var, len(m)), make([]uint64, len(m)), 0
	for i, p := range m {
		vars[i], exp[i] = p.Var, uint64(p.Exp)
		need = max(need, bits.Len32(p.Exp))
	}
	l := newLayout(vars, need)
	return l, l.pack(exp)
}

// isMonomial reports whether m has increasing variables and positive exponents.
func isMonomial(m []Power) bool {
	for i, p := range m {
		if p.Exp == 0 || i > 0 && m[i-1].Var >= p.Var {
			return false
		}
	}
	return true
}

// normalMono sorts m and merges equal variables.
func normalMono(m []Power) []Power {
	m = slices.Clone(m)
	slices.SortStableFunc(m, func(a, b Power) int { return int(int64(a.Var) - int64(b.Var)) })
	out := m[:0]
	for _, p := range m {
		switch {
		case p.Exp == 0:
		case len(out) > 0 && out[len(out)-1].Var == p.Var:
			e := uint64(out[len(out)-1].Exp) + uint64(p.Exp)
			if e>>32 != 0 {
				exponentOverflow()
			}
			out[len(out)-1].Exp = uint32(e)
		default:
			out = append(out, p)
		}
	}
	return out
}

// FromTerms is the sum of terms, which may stand in any order and repeat monomials.
// Cost: a sort.
func FromTerms(terms []Term) Poly {
	if len(terms) == 1 {
		return monomial(terms[0].Coef, terms[0].Mono)
	}
	var vars []Var
	need := 0
	monos := make([][]Power, len(terms))
	for i, t := range terms {
		m := t.Mono
		if !isMonomial(m) {
			m = normalMono(m)
		}
		monos[i] = m
		for _, p := range m {
			vars = append(vars, p.Var)
			need = max(need, bits.Len32(p.Exp))
		}
	}
	slices.Sort(vars)
	l := newLayout(slices.Compact(vars), need)
	exps := make([]uint64, len(terms)*l.words)
	for i, m := range monos {
		e, k := exps[i*l.words:], 0
		for _, p := range m {
			for l.vars[k] != p.Var {
				k++
			}
			f := &l.field[k]
			e[f.word] |= uint64(p.Exp) << f.shift
		}
	}
	return collect(l, exps, func(i int) *big.Int { return terms[i].Coef })
}

// collect sorts monomials and adds the coefficients of equal ones.
func collect(l *layout, exps []uint64, coef func(int) *big.Int) Poly {
	n, w := len(exps)/l.words, l.words
	order := make([]int, n)
	for i := range order {
		order[i] = i
	}
	at := func(i int) []uint64 { return exps[i*w : i*w+w] }
	slices.SortStableFunc(order, func(i, j int) int { return compareMono(at(j), at(i)) })
	b := newBuilder(l, n)
	for i := 0; i < n; {
		e := at(order[i])
		sum := new(big.Int).Set(coef(order[i]))
		for i++; i < n && compareMono(at(order[i]), e) == 0; i++ {
			sum.Add(sum, coef(order[i]))
		}
		if sum.Sign() != 0 {
			b.exps = append(b.exps, e...)
			b.big(sum)
		}
	}
	return b.canonical()
}
