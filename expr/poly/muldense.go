// Products in an array of accumulators, for factors whose monomials fill their box.
//
// The products of two groups of terms (see box.go) are added into an array indexed by
// the inner monomial, all pairs of groups with the same outer monomial one after the
// other, and the array is read out from the top. A bitmap of what was touched spares
// reading an array that stays mostly empty. With all variables inner this is Kronecker's
// substitution. Cost: nm additions, a sort of the pairs of groups, and for each outer
// monomial a pass over the bitmap.

package poly

import (
	"cmp"
	"math"
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
	arrayMaxPairs    = 1 << 22
)

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
		if cost := c.cost(products); cost < least && c.groups[0]*c.groups[1] <= arrayMaxPairs {
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
	pairs := sortedPairs(gp, gq)
	chunks := min(float64(len(pairs)), c.outer)
	x.full = float64(len(p.co))*float64(len(q.co)) > arrayFull*chunks*float64(x.size)
	s := newSums(x.size, p.co, q.co)
	for i, k := range pairs {
		g, h := &gp[k.i], &gq[k.j]
		for t, base := range g.off {
			if !x.full {
				x.mark(base, h.off)
			}
			s.add(base, h.off, g.co[t], h.co)
			if t%256 == 0 {
				o.Budget.Check(len(b.exps))
			}
		}
		if i+1 == len(pairs) || pairs[i+1].key != k.key {
			x.drain(b, s, k.key)
		}
	}
}

// sortedPairs is all pairs of groups by decreasing outer monomial.
func sortedPairs(gp, gq []group) []pair {
	pairs := make([]pair, 0, len(gp)*len(gq))
	for i := range gp {
		for j := range gq {
			pairs = append(pairs, pair{gp[i].outer + gq[j].outer, int32(i), int32(j)})
		}
	}
	slices.SortFunc(pairs, func(a, b pair) int { return cmp.Compare(b.key, a.key) })
	return pairs
}
