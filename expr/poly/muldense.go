// Products in an array of accumulators, for factors whose monomials fill their box.
//
// The variables are cut in two: the outer ones, which stand first in the term order, and
// the inner ones. A factor falls into groups of terms that agree in the outer variables.
// The products of two groups are added into an array indexed by the inner exponents in
// mixed radix, all pairs of groups with the same outer monomial one after the other, and
// the array is read out from the top. A bitmap of what was touched spares reading an
// array that stays mostly empty. With all variables inner this is Kronecker's
// substitution; with all outer it would be no method at all. Cost: nm additions, a sort
// of the pairs of groups, and for each outer monomial a pass over the bitmap.

package poly

import (
	"cmp"
	"math"
	"math/bits"
	"slices"
)

// Thresholds and costs of the chooser, in nanoseconds as measured; tests change them to
// force a method.
var (
	arrayMinProducts = 1024    // below, a heap
	arrayMaxBox      = 1 << 17 // accumulators: they should stay in the second-level cache
	costHeapProduct  = 9.0     // for each product, and
	costHeapLevel    = 3.0     // for each level of the heap
	costArrayProduct = 2.5
	costArrayPair    = 60.0 // for each pair of groups
	costArrayWord    = 1.0  // for each word of the bitmap that is read
	arrayFull        = 8.0  // products for each accumulator from which no bitmap is kept
)

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

// arrayCut is the cheapest choice of inner variables for a product, and whether that is
// cheaper than a heap.
func arrayCut(l *layout, p, q []uint64) (best cut, ok bool) {
	products := float64(len(p)) * float64(len(q))
	if products < float64(arrayMinProducts) {
		return best, false
	}
	deg := l.degrees(p)
	for i, d := range l.degrees(q) {
		deg[i] += d
	}
	least := products * (costHeapProduct + costHeapLevel*math.Log2(float64(min(len(p), len(q)))))
	for _, c := range cuts(l, deg, p, q) {
		if cost := c.cost(products); cost < least {
			least, best, ok = cost, c, true
		}
	}
	return best, ok
}

// cost estimates the time for a number of products.
func (c *cut) cost(products float64) float64 {
	pairs := float64(c.groups[0]) * float64(c.groups[1])
	return products*costArrayProduct + pairs*costArrayPair +
		min(pairs, c.outer)*float64(c.size/64+1)*costArrayWord + 2*float64(c.size)
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

// pair is two groups whose product has the outer monomial key.
type pair struct {
	key  uint64
	i, j int32
}

// mulArray multiplies word coefficients on one-word monomials by the given cut.
func (o Ops) mulArray(b *builder, p, q operand, c cut) {
	deg := b.lay.degrees(p.exps)
	for i, d := range b.lay.degrees(q.exps) {
		deg[i] += d
	}
	x := newBox(b.lay, c, deg)
	gp, gq := x.groups(p.exps, p.co), x.groups(q.exps, q.co)
	pairs := make([]pair, 0, len(gp)*len(gq))
	for i := range gp {
		for j := range gq {
			pairs = append(pairs, pair{gp[i].outer + gq[j].outer, int32(i), int32(j)})
		}
	}
	slices.SortFunc(pairs, func(a, b pair) int { return cmp.Compare(b.key, a.key) })
	// An upper bound of the bits of any sum, and of any product.
	product := maxBits(p.co) + maxBits(q.co)
	sum := product + bits.Len(uint(min(len(p.co), len(q.co))))
	var s sums
	switch {
	case sum <= 63:
		s = make(sums1, x.size)
	case product <= 63:
		s = make(sums2, x.size)
	default:
		s = make(sums3, x.size)
	}
	chunks := min(float64(len(pairs)), c.outer)
	x.full = float64(len(p.co))*float64(len(q.co)) > arrayFull*chunks*float64(x.size)
	for from := 0; from < len(pairs); {
		to := from
		for to < len(pairs) && pairs[to].key == pairs[from].key {
			g, h := &gp[pairs[to].i], &gq[pairs[to].j]
			for t, base := range g.off {
				if !x.full {
					x.mark(base, h.off)
				}
				s.add(base, h.off, g.co[t], h.co)
			}
			to++
		}
		x.drain(b, s, pairs[from].key)
		o.Budget.Check(len(b.exps))
		from = to
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

// sums is an array of accumulators.
type sums interface {
	// add adds c·co[i] to the accumulator base + off[i] for all i.
	add(base int32, off []int32, c int64, co []int64)
	// take clears an accumulator, appends its value to b and reports whether that is
	// not zero.
	take(b *builder, k int) bool
}

// sums1 is for sums of less than 64 bits.
type sums1 []int64

func (s sums1) add(base int32, off []int32, c int64, co []int64) {
	co = co[:len(off)]
	for i, o := range off {
		s[base+o] += c * co[i]
	}
}

func (s sums1) take(b *builder, k int) bool {
	v := s[k]
	s[k] = 0
	if v != 0 {
		b.word(v)
	}
	return v != 0
}

// sums2 is for products of less than 64 bits: two words, low first.
type sums2 [][2]uint64

func (s sums2) add(base int32, off []int32, c int64, co []int64) {
	co = co[:len(off)]
	for i, o := range off {
		x := c * co[i]
		a := &s[base+o]
		lo, carry := bits.Add64(a[0], uint64(x), 0)
		a[0] = lo
		a[1] += uint64(x>>63) + carry
	}
}

func (s sums2) take(b *builder, k int) bool {
	v := acc{lo: s[k][0], mid: s[k][1], hi: uint64(int64(s[k][1]) >> 63)}
	s[k] = [2]uint64{}
	if v.isZero() {
		return false
	}
	b.acc(&v)
	return true
}

// sums3 is for any word coefficients.
type sums3 []acc

func (s sums3) add(base int32, off []int32, c int64, co []int64) {
	co = co[:len(off)]
	for i, o := range off {
		s[base+o].addMul(c, co[i])
	}
}

func (s sums3) take(b *builder, k int) bool {
	v := s[k]
	s[k] = acc{}
	if v.isZero() {
		return false
	}
	b.acc(&v)
	return true
}
