// Packed monomials. A layout says where in a monomial's words the exponent of each
// variable lies; everything else here moves exponents between layouts.
//
// The exponent of the lowest variable lies in the highest bits of the first word, so
// that the lexicographic order of monomials is the order of their words read as
// unsigned integers, and the product of monomials is the sum of their words. The top
// bit of every field, its guard, is zero in a valid monomial: a − b divides without
// borrow exactly when no guard bit is set in the difference ([MonaganPearce2011]).

package poly

import (
	"errors"
	"math/bits"
	"slices"

	"remnant/expr/budget"
)

// Var is a variable. A lower number ranks higher in the term order.
type Var uint32

// Power is a power of one variable. A monomial is a slice of powers with increasing
// Var and positive Exp; the empty slice is 1.
type Power struct {
	Var Var
	Exp uint32
}

// field is the place of one exponent: mask applies after the shift.
type field struct {
	mask  uint64
	word  uint32
	shift uint8
}

// layout is the packing of monomials in the variables vars. It is immutable and shared.
type layout struct {
	vars  []Var // increasing
	field []field
	guard []uint64 // the guard bits of each word
	over  []uint64 // the bits of each word that a sum of two exponents must leave zero
	words int      // at least 1
	width uint     // of all fields, 0 if they differ
}

// constLayout is the layout of constants: one word, always zero.
var constLayout = &layout{guard: []uint64{0}, over: []uint64{0}, words: 1}

// errExponent is the cause reported when an exponent leaves the range of uint32.
var errExponent = errors.New("an exponent is greater than 4294967295")

// exponentOverflow stops the computation; it is an ordinary error to whoever catches
// the budget's Stop.
func exponentOverflow() {
	panic(&budget.Stop{Reason: budget.Interrupted, Cause: errExponent})
}

// newLayout is the canonical layout of vars for exponents of at most need bits: as few
// words as possible, and then fields as wide as possible, all of one width.
func newLayout(vars []Var, need int) *layout {
	n := len(vars)
	if n == 0 {
		return constLayout
	}
	words := wordsNeeded(n, need)
	per := (n + words - 1) / words
	width := 64 / per
	l := &layout{vars: vars, field: make([]field, n), guard: make([]uint64, words), over: make([]uint64, words), words: words, width: uint(width)}
	for i := range n {
		l.place(i, i/per, 64-width*(i%per+1), width)
	}
	return l
}

// wordsNeeded is the number of words of the canonical layout.
func wordsNeeded(n, need int) int {
	per := 64 / (max(need, 1) + 1)
	return max(1, (n+per-1)/per)
}

// tightLayout packs the i-th variable into exactly width[i]+1 bits of a single word, or
// returns nil if that is impossible.
func tightLayout(vars []Var, width []int) *layout {
	total := len(vars)
	for _, w := range width {
		total += w
	}
	if total > 64 {
		return nil
	}
	l := &layout{vars: vars, field: make([]field, len(vars)), guard: make([]uint64, 1), over: make([]uint64, 1), words: 1}
	at := 64
	for i, w := range width {
		at -= w + 1
		l.place(i, 0, at, w+1)
	}
	return l
}

// place puts variable i into the width bits of a word that begin at shift.
func (l *layout) place(i, word, shift, width int) {
	l.field[i] = field{mask: ^uint64(0) >> (64 - width), word: uint32(word), shift: uint8(shift)}
	l.guard[word] |= 1 << (shift + width - 1)
	top := min(width-1, 32)
	l.over[word] |= (^uint64(0) >> (64 - width) &^ (1<<top - 1)) << shift
}

// same reports whether two canonical layouts pack alike.
func (l *layout) same(m *layout) bool {
	return l == m || l.words == m.words && slices.Equal(l.vars, m.vars)
}

// exp is the exponent of the i-th variable in the monomial e.
func (l *layout) exp(e []uint64, i int) uint64 {
	f := &l.field[i]
	return e[f.word] >> f.shift & f.mask
}

// index is the position of v among the variables, or -1.
func (l *layout) index(v Var) int {
	if i, ok := slices.BinarySearch(l.vars, v); ok {
		return i
	}
	return -1
}

// contains reports whether all of vars, increasing, are among the variables of l.
func (l *layout) contains(vars []Var) bool {
	i := 0
	for _, v := range l.vars {
		if i < len(vars) && vars[i] == v {
			i++
		}
	}
	return i == len(vars)
}

// orOf is the bitwise or of all monomials: field by field it is zero exactly where the
// variable is absent, and as long in bits as the greatest exponent.
func (l *layout) orOf(exps []uint64) []uint64 {
	or := make([]uint64, l.words)
	if l.words == 1 {
		or[0] = or1(exps)
		return or
	}
	for i := 0; i < len(exps); i += l.words {
		for j := range or {
			or[j] |= exps[i+j]
		}
	}
	return or
}

func or1(exps []uint64) uint64 {
	var or uint64
	for _, e := range exps {
		or |= e
	}
	return or
}

// need is the bit length of the greatest exponent among monomials with this or.
func (l *layout) need(or []uint64) int {
	n := 0
	for i := range l.vars {
		n = max(n, bits.Len64(l.exp(or, i)))
	}
	return n
}

// degrees is the greatest exponent of each variable.
func (l *layout) degrees(exps []uint64) []uint64 { return l.extremes(exps, 0) }

// valuations is the least exponent of each variable.
func (l *layout) valuations(exps []uint64) []uint64 { return l.extremes(exps, ^uint64(0)) }

// extremes is the greatest exponents for invert = 0, the least ones for its complement.
func (l *layout) extremes(exps []uint64, invert uint64) []uint64 {
	out := make([]uint64, len(l.vars))
	if l.width == 0 {
		for i := range out {
			f := l.field[i]
			for k := int(f.word); k < len(exps); k += l.words {
				if x := exps[k] >> f.shift & f.mask; k == int(f.word) || x^invert > out[i]^invert {
					out[i] = x
				}
			}
		}
		return out
	}
	// All fields of a word at once: with the guard bits set in a, the guard of a − b
	// remains where a ≥ b; from the guard the mask of the field's other bits is made.
	var buf [4]uint64
	best := append(buf[:0], exps[:l.words]...)
	for j := range best {
		a, g := best[j], l.guard[j]
		for k := j + l.words; k < len(exps); k += l.words {
			b := exps[k]
			ge := ((a | g) - b) & g
			m := (ge - ge>>(l.width-1)) ^ invert
			a = a&m | b&^m
		}
		best[j] = a
	}
	for i := range out {
		out[i] = l.exp(best, i)
	}
	return out
}

// pack writes one exponent for each variable as a monomial.
func (l *layout) pack(exp []uint64) []uint64 {
	e := make([]uint64, l.words)
	for i, x := range exp {
		f := &l.field[i]
		e[f.word] |= x << f.shift
	}
	return e
}

// repack writes monomials of layout l in layout m. A variable that m lacks must have
// exponent zero throughout. The result may share memory with exps.
func (l *layout) repack(exps []uint64, m *layout) []uint64 {
	if l == m {
		return exps
	}
	n := len(exps) / l.words
	out := make([]uint64, n*m.words)
	j := 0
	for i, v := range l.vars {
		for j < len(m.vars) && m.vars[j] < v {
			j++
		}
		if j == len(m.vars) || m.vars[j] != v {
			continue
		}
		f, g := l.field[i], m.field[j]
		src, dst := int(f.word), int(g.word)
		for range n {
			out[dst] |= exps[src] >> f.shift & f.mask << g.shift
			src += l.words
			dst += m.words
		}
	}
	return out
}

// union is the increasing list of the variables of two layouts.
func (l *layout) union(m *layout) []Var {
	if len(m.vars) == 0 || slices.Equal(l.vars, m.vars) {
		return l.vars
	}
	if len(l.vars) == 0 {
		return m.vars
	}
	out := make([]Var, 0, len(l.vars)+len(m.vars))
	i, j := 0, 0
	for i < len(l.vars) && j < len(m.vars) {
		switch a, b := l.vars[i], m.vars[j]; {
		case a < b:
			out, i = append(out, a), i+1
		case a > b:
			out, j = append(out, b), j+1
		default:
			out, i, j = append(out, a), i+1, j+1
		}
	}
	return append(append(out, l.vars[i:]...), m.vars[j:]...)
}

// powers appends the monomial e to dst as a list of powers.
func (l *layout) powers(dst []Power, e []uint64) []Power {
	for i, v := range l.vars {
		if x := l.exp(e, i); x != 0 {
			dst = append(dst, Power{v, uint32(x)})
		}
	}
	return dst
}

// compareMono orders two monomials of equal layout.
func compareMono(a, b []uint64) int {
	for i, x := range a {
		if y := b[i]; x != y {
			if x < y {
				return -1
			}
			return 1
		}
	}
	return 0
}

// divides reports whether the monomial b divides a, both in layout l, and writes the
// quotient to q.
func (l *layout) divides(q, a, b []uint64) bool {
	ok := uint64(0)
	for i := range q {
		q[i] = a[i] - b[i]
		// A borrow from a field sets its guard bit; a borrow from the highest field of
		// a word is caught by the guard as well, its result being negative.
		ok |= q[i] & l.guard[i]
	}
	return ok == 0
}

// shrink is the canonical layout of monomials with the given or, l itself if that is it.
func (l *layout) shrink(or []uint64) *layout {
	n := 0
	for i := range l.vars {
		if l.exp(or, i) != 0 {
			n++
		}
	}
	if n == len(l.vars) {
		if n == 0 || l.width > 0 && (l.words == 1 || wordsNeeded(n, l.need(or)) == l.words) {
			return l
		}
		return newLayout(l.vars, l.need(or))
	}
	vars := make([]Var, 0, n)
	for i, v := range l.vars {
		if l.exp(or, i) != 0 {
			vars = append(vars, v)
		}
	}
	return newLayout(vars, l.need(or))
}
