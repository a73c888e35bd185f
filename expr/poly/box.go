// Boxes: the numbering of monomials by their exponents in mixed radix, which turns a sum
// over monomials into an array.
//
// The variables are cut in two: the outer ones, which stand first in the term order, and
// the inner ones. A polynomial falls into groups of terms that agree in the outer
// variables; within a group a term is known by the number of its inner monomial.

package poly

import "math/bits"

// cut describes a choice of inner variables.
type cut struct {
	first  int
	size   int     // of the box
	groups [2]int  // groups of each factor
	outer  float64 // number of outer monomials in the product's box, at most
}

// cuts lists the possible choices for one-word operands whose product has the given
// degrees, the box growing.
func cuts(l *layout, deg []uint64, p, q []uint64) []cut {
	var out []cut
	size := 1
	for i := len(l.vars) - 1; i >= 0; i-- {
		if deg[i] >= uint64(arrayMaxBox) || size*int(deg[i]+1) > arrayMaxBox {
			break
		}
		size *= int(deg[i] + 1)
		c := cut{first: i, size: size, outer: 1}
		for k := range i {
			c.outer *= float64(deg[k] + 1)
		}
		c.groups = [2]int{countGroups(p, l.outerShift(i)), countGroups(q, l.outerShift(i))}
		out = append(out, c)
	}
	return out
}

// outerShift is the number of bits below the variables before the i-th.
func (l *layout) outerShift(i int) uint {
	if i == 0 {
		return 64
	}
	return uint(l.field[i-1].shift)
}

// countGroups is the number of runs that agree in the bits from shift on.
func countGroups(e []uint64, shift uint) int {
	n, last := 0, uint64(0)
	for i, x := range e {
		if x >>= shift; i == 0 || x != last {
			n, last = n+1, x
		}
	}
	return n
}

// box is the mixed-radix numbering of inner monomials.
type box struct {
	l      *layout
	first  int      // the first inner variable
	shift  uint     // the outer monomial is a key shifted by this
	size   int      // number of inner monomials
	stride []int32  // by variable; zero for outer ones
	key    []uint64 // the inner monomial of each number
	touch  []uint64 // bitmap of the numbers in use
	full   bool     // so many are in use that the bitmap is not kept
}

// newBox numbers the inner monomials of a cut; deg is the degrees of the product.
func newBox(l *layout, c cut, deg []uint64) *box {
	x := &box{l: l, first: c.first, shift: l.outerShift(c.first), size: c.size}
	x.stride = make([]int32, len(l.vars))
	x.key = make([]uint64, 1, c.size)
	for i := len(l.vars) - 1; i >= c.first; i-- {
		n := len(x.key)
		x.stride[i] = int32(n)
		step := uint64(1) << l.field[i].shift
		for k := range int(deg[i]) {
			for _, e := range x.key[k*n : k*n+n] {
				x.key = append(x.key, e+step)
			}
		}
	}
	x.touch = make([]uint64, c.size/64+1)
	return x
}

// group is the terms of a factor with one outer monomial.
type group struct {
	outer uint64
	off   []int32 // numbers of the inner monomials, decreasing
	co    []int64
}

// groups cuts terms into groups.
func (x *box) groups(exps []uint64, co []int64) []group {
	off := make([]int32, len(exps))
	for i := x.first; i < len(x.stride); i++ {
		f, s := x.l.field[i], x.stride[i]
		for k, e := range exps {
			off[k] += int32(e>>f.shift&f.mask) * s
		}
	}
	var out []group
	for from := 0; from < len(exps); {
		outer, to := exps[from]>>x.shift, from+1
		for to < len(exps) && exps[to]>>x.shift == outer {
			to++
		}
		out = append(out, group{outer, off[from:to], co[from:to]})
		from = to
	}
	return out
}

// mark notes that the numbers base + off are in use.
func (x *box) mark(base int32, off []int32) {
	t := x.touch
	for _, o := range off {
		k := uint32(base + o)
		t[k>>6] |= 1 << (k & 63)
	}
}

// drain moves the sums to the result, greatest monomial first, and clears them.
func (x *box) drain(b *builder, s sums, outer uint64) {
	top := outer << x.shift
	if x.full {
		for k := x.size - 1; k >= 0; k-- {
			if s.take(b, k) {
				b.exps = append(b.exps, top|x.key[k])
			}
		}
		return
	}
	for w := len(x.touch) - 1; w >= 0; w-- {
		m := x.touch[w]
		if m == 0 {
			continue
		}
		x.touch[w] = 0
		for m != 0 {
			k := bits.Len64(m) - 1
			m ^= 1 << k
			if k += w << 6; s.take(b, k) {
				b.exps = append(b.exps, top|x.key[k])
			}
		}
	}
}
