// Package poly holds sparse multivariate polynomials over the integers: arithmetic,
// exact division, greatest common divisors, factor refinement, evaluation.
//
// A polynomial is a value: no operation changes its operands, and values may be shared
// between goroutines. There is no ring object; variables are numbers, each polynomial
// knows the variables that occur in it, and operations bring their operands to a common
// packing.
//
// Methods that can be costly exist twice, as a method of Poly (or a function) without
// limits and as a method of Ops with a budget.
package poly

import (
	"iter"
	"math/big"
	"slices"

	"remnant/expr/budget"
)

// Poly is a polynomial. The zero value is the polynomial 0. Compare with Equal: the
// type is deliberately not comparable with ==.
//
// Representation: terms in one array, strictly decreasing in the lexicographic order in
// which lower variables rank higher. Invariants, on which Equal and Hash rest:
//
//   - no coefficient is zero, and the polynomial 0 has no data;
//   - the layout is newLayout(the variables that occur, bits of the greatest exponent);
//   - coefficients are words (co) if all of them fit, else all are big (bg).
type Poly struct {
	_ [0]func() // forbids ==
	d *data
}

type data struct {
	lay  *layout
	exps []uint64   // lay.words for each term
	co   []int64    // nil if some coefficient does not fit a word
	bg   []*big.Int // else nil; the integers are never changed
}

// Term is a coefficient times a monomial.
type Term struct {
	Coef *big.Int
	Mono []Power
}

// Ops performs the costly operations under a budget: they panic with a *budget.Stop
// when it is spent. The zero value has no limits.
type Ops struct{ Budget *budget.Budget }

func (d *data) len() int {
	if d.bg != nil {
		return len(d.bg)
	}
	return len(d.co)
}

// mono is the monomial of term i.
func (d *data) mono(i int) []uint64 {
	w := d.lay.words
	return d.exps[i*w : i*w+w]
}

// coef is the coefficient of term i, not to be changed.
func (d *data) coef(i int) *big.Int {
	if d.bg != nil {
		return d.bg[i]
	}
	return big.NewInt(d.co[i])
}

// bigs is the coefficients as big integers, not to be changed.
func (d *data) bigs() []*big.Int {
	if d.bg != nil {
		return d.bg
	}
	return bigs(d.co)
}

// sign is the sign of the coefficient of term i.
func (d *data) sign(i int) int {
	if d.bg != nil {
		return d.bg[i].Sign()
	}
	if d.co[i] < 0 {
		return -1
	}
	return 1
}

// Terms yields monomials and coefficients in decreasing order. The slice is valid only
// during the step; neither may be modified.
func (p Poly) Terms() iter.Seq2[[]Power, *big.Int] {
	return func(yield func([]Power, *big.Int) bool) {
		if p.d == nil {
			return
		}
		buf := make([]Power, 0, len(p.d.lay.vars))
		for i := range p.d.len() {
			buf = p.d.lay.powers(buf[:0], p.d.mono(i))
			if !yield(buf, p.d.coef(i)) {
				return
			}
		}
	}
}

// Len is the number of terms.
func (p Poly) Len() int {
	if p.d == nil {
		return 0
	}
	return p.d.len()
}

// IsZero reports whether p is 0.
func (p Poly) IsZero() bool { return p.d == nil }

// IsOne reports whether p is 1.
func (p Poly) IsOne() bool {
	return p.IsConst() && p.d != nil && p.d.co != nil && p.d.co[0] == 1
}

// IsConst reports whether no variable occurs in p.
func (p Poly) IsConst() bool { return p.d == nil || len(p.d.lay.vars) == 0 }

// Const is the value of a constant polynomial, and whether p is one. The integer is new.
func (p Poly) Const() (*big.Int, bool) {
	if p.d == nil {
		return new(big.Int), true
	}
	if !p.IsConst() {
		return nil, false
	}
	return new(big.Int).Set(p.d.coef(0)), true
}

// IsMono reports whether p has exactly one term.
func (p Poly) IsMono() bool { return p.Len() == 1 }

// Sign is the sign of the leading coefficient: −1, 0 or 1.
func (p Poly) Sign() int {
	if p.d == nil {
		return 0
	}
	return p.d.sign(0)
}

// LeadCoef is the coefficient of the greatest monomial, 0 for the polynomial 0. The
// integer is new.
func (p Poly) LeadCoef() *big.Int {
	if p.d == nil {
		return new(big.Int)
	}
	return new(big.Int).Set(p.d.coef(0))
}

// Vars is the variables that occur in p, in increasing order.
func (p Poly) Vars() []Var {
	if p.d == nil {
		return nil
	}
	return slices.Clone(p.d.lay.vars)
}

// Has reports whether v occurs in p.
func (p Poly) Has(v Var) bool { return p.d != nil && p.d.lay.index(v) >= 0 }

// Degree is the degree in v, −1 for the polynomial 0.
func (p Poly) Degree(v Var) int {
	if p.d == nil {
		return -1
	}
	k := p.d.lay.index(v)
	if k < 0 {
		return 0
	}
	m := uint64(0)
	for i := range p.d.len() {
		m = max(m, p.d.lay.exp(p.d.mono(i), k))
	}
	return int(m)
}

// MinDegree is the least exponent of v in any term, −1 for the polynomial 0.
func (p Poly) MinDegree(v Var) int {
	if p.d == nil {
		return -1
	}
	k := p.d.lay.index(v)
	if k < 0 {
		return 0
	}
	m := ^uint64(0)
	for i := range p.d.len() {
		m = min(m, p.d.lay.exp(p.d.mono(i), k))
	}
	return int(m)
}

// TotalDegree is the greatest sum of exponents, −1 for the polynomial 0.
func (p Poly) TotalDegree() int {
	if p.d == nil {
		return -1
	}
	m := uint64(0)
	for i := range p.d.len() {
		e, s := p.d.mono(i), uint64(0)
		for k := range p.d.lay.vars {
			s += p.d.lay.exp(e, k)
		}
		m = max(m, s)
	}
	return int(m)
}

// Equal reports whether p and q are the same polynomial.
func (p Poly) Equal(q Poly) bool {
	if p.d == q.d {
		return true
	}
	if p.d == nil || q.d == nil || p.d.len() != q.d.len() || (p.d.bg == nil) != (q.d.bg == nil) {
		return false
	}
	if !p.d.lay.same(q.d.lay) || !slices.Equal(p.d.exps, q.d.exps) {
		return false
	}
	if p.d.bg == nil {
		return slices.Equal(p.d.co, q.d.co)
	}
	return slices.EqualFunc(p.d.bg, q.d.bg, func(a, b *big.Int) bool { return a.Cmp(b) == 0 })
}

// common brings the monomials of two polynomials to one canonical layout of the union
// of their variables, without changing them.
func common(p, q *data) (l *layout, pe, qe []uint64) {
	if p.lay.same(q.lay) {
		return p.lay, p.exps, q.exps
	}
	l = p.lay.join(q.lay, max(p.need(), q.need()))
	return l, p.lay.repack(p.exps, l), q.lay.repack(q.exps, l)
}

// need is the bit length of the greatest exponent in d.
func (d *data) need() int { return d.lay.need(d.lay.orOf(d.exps)) }

// join is the canonical layout of the variables of l and m for exponents of need bits;
// it is l or m itself if that is the one.
func (l *layout) join(m *layout, need int) *layout {
	vars := l.union(m)
	words := wordsNeeded(len(vars), need)
	for _, k := range []*layout{l, m} {
		if len(k.vars) == len(vars) && k.words == words {
			return k
		}
	}
	return newLayout(vars, need)
}

// admit is the monomials of d in the layout l, if that has one word and they fit.
func (l *layout) admit(d *data) (exps []uint64, ok bool) {
	switch {
	case l.words > 1:
		return nil, false
	case l.same(d.lay):
		return d.exps, true
	case len(d.lay.vars) == 0:
		return make([]uint64, d.len()), true
	case !l.contains(d.lay.vars) || d.need() >= int(l.width):
		return nil, false
	}
	return d.lay.repack(d.exps, l), true
}
