// Evaluation of a polynomial at many points, one variable after the other.
//
// The monomials are arranged as a trie: level 0 branches by the exponent of the main
// variable x, level i by that of y_i; below the last level hang the terms, which may
// still differ in variables that only ever take one value. Putting a value for y_i adds
// the nodes of level i into their parents, so that each variable is eliminated on ever
// fewer nodes, and points that agree in the later variables share that work.

package poly

import (
	"cmp"
	"math/bits"
	"slices"
)

// trie is the monomials of one polynomial.
type trie struct {
	level []level
	leaf  []int32 // the node of the last level above each term
	fixed []int   // indices, in the polynomial's layout, of variables with one value
	d     *data
}

// level is the nodes of one level.
type level struct {
	exp []uint32 // exponent of the level's variable
	up  []int32  // parent; unused in level 0
	x   []uint32 // exponent of x
}

// newTrie arranges d by order, whose first variable is x. A variable of order need not
// occur in d; those that do but are not in order are fixed.
func newTrie(d *data, order []Var) *trie {
	t := &trie{level: make([]level, len(order)), leaf: make([]int32, d.len()), d: d}
	at := make([]int, len(order)) // index in the layout, or −1
	for i, v := range order {
		at[i] = d.lay.index(v)
	}
	for i := range d.lay.vars {
		if !slices.Contains(at, i) {
			t.fixed = append(t.fixed, i)
		}
	}
	keys := sortKeys(d, at)
	prev := make([]uint64, 0, len(order))
	cur := make([]uint64, len(order))
	for _, k := range keys {
		m := d.mono(int(k.term))
		for i, a := range at {
			cur[i] = 0
			if a >= 0 {
				cur[i] = d.lay.exp(m, a)
			}
		}
		same := 0
		for same < len(prev) && prev[same] == cur[same] {
			same++
		}
		t.grow(cur, same)
		t.leaf[k.term] = int32(len(t.level[len(order)-1].exp) - 1)
		prev = append(prev[:0], cur...)
	}
	return t
}

// grow adds the nodes for a monomial that agrees with the one before up to level same.
func (t *trie) grow(exp []uint64, same int) {
	for i := same; i < len(exp); i++ {
		l := &t.level[i]
		l.exp = append(l.exp, uint32(exp[i]))
		l.x = append(l.x, uint32(exp[0]))
		up := int32(0)
		if i > 0 {
			up = int32(len(t.level[i-1].exp) - 1)
		}
		l.up = append(l.up, up)
	}
}

// sortKey orders the terms of a trie.
type sortKey struct {
	key  uint64
	term int32
}

// sortKeys is the terms of d sorted by the exponents of the variables with the given
// indices, the first being most significant.
func sortKeys(d *data, at []int) []sortKey {
	keys := make([]sortKey, d.len())
	deg := d.lay.degrees(d.exps)
	total := 0
	for _, a := range at {
		if a >= 0 {
			total += bits.Len64(deg[a])
		}
	}
	for i := range keys {
		keys[i].term = int32(i)
		if total > 64 {
			continue
		}
		m := d.mono(i)
		for _, a := range at {
			if a >= 0 {
				keys[i].key = keys[i].key<<bits.Len64(deg[a]) | d.lay.exp(m, a)
			}
		}
	}
	if total <= 64 {
		slices.SortFunc(keys, func(a, b sortKey) int { return cmp.Compare(a.key, b.key) })
		return keys
	}
	slices.SortStableFunc(keys, func(a, b sortKey) int {
		ma, mb := d.mono(int(a.term)), d.mono(int(b.term))
		for _, k := range at {
			if k < 0 {
				continue
			}
			if c := cmp.Compare(d.lay.exp(ma, k), d.lay.exp(mb, k)); c != 0 {
				return c
			}
		}
		return 0
	})
	return keys
}

// values is a trie with values modulo a prime: val[i] holds, for the nodes of level i,
// the coefficients once y_{i+1}, y_{i+2}, … have the values of the base point.
type values struct {
	*trie
	f   primeField
	val [][]uint64
	// work space of a stage
	node, ratio []uint64
}

// newValues puts the base point into t, or only the fixed variables if base is nil. The function fixed gives the value of a variable
// with one value.
func newValues(t *trie, f primeField, base []uint64, fixed func(Var) uint64) *values {
	v := &values{trie: t, f: f, val: make([][]uint64, len(t.level))}
	last := len(t.level) - 1
	c := f.coefs(t.d)
	l := t.d.lay
	deg := l.degrees(t.d.exps)
	for _, k := range t.fixed {
		pow := f.powers(fixed(l.vars[k]), int(deg[k]))
		for i := range c {
			if e := l.exp(t.d.mono(i), k); e > 0 {
				c[i] = f.mul(c[i], pow[e])
			}
		}
	}
	for i := range v.val {
		v.val[i] = make([]uint64, len(t.level[i].exp))
	}
	for i, x := range c {
		g := t.leaf[i]
		v.val[last][g] = f.add(v.val[last][g], x)
	}
	for i := last; i > 0 && base != nil; i-- {
		v.fold(v.val[i-1], i, base[i])
	}
	return v
}

// fold adds the nodes of level i, with y_i = x, into dst, the nodes of level i−1.
func (v *values) fold(dst []uint64, i int, x uint64) {
	l, f := &v.level[i], v.f
	pow := f.powers(x, int(maxExp(l.exp)))
	val := v.val[i]
	clear(dst)
	for g, e := range l.exp {
		u := l.up[g]
		dst[u] = f.add(dst[u], f.mul(val[g], pow[e]))
	}
}

func maxExp(e []uint32) uint32 {
	m := uint32(0)
	for _, x := range e {
		m = max(m, x)
	}
	return m
}

// ratios sets ratio to the value of y_1…y_i at beta for each node of level i: the factor
// by which the node's share grows from one point of a geometric sequence to the next.
func (v *values) ratios(i int, beta []uint64) {
	r := []uint64{}
	for k := 0; k <= i; k++ {
		l := &v.level[k]
		next := make([]uint64, len(l.exp))
		var pow []uint64
		if k > 0 {
			pow = v.f.powers(beta[k], int(maxExp(l.exp)))
		}
		for g, e := range l.exp {
			if k == 0 {
				next[g] = v.f.one
			} else {
				next[g] = v.f.mul(r[l.up[g]], pow[e])
			}
		}
		r = next
	}
	v.ratio = r
}

// image multiplies every node by its ratio and writes the sums, by power of x, to dst.
func (v *values) image(i int, dst []uint64) {
	clear(dst)
	f := v.f
	x := v.level[i].x
	ratio := v.ratio[:len(v.node)]
	for g, c := range v.node {
		c = f.mul(c, ratio[g])
		v.node[g] = c
		dst[x[g]] = f.add(dst[x[g]], c)
	}
}

// sum writes node values of level i to dst by power of x.
func (v *values) sum(i int, node, dst []uint64) {
	clear(dst)
	for g, c := range node {
		x := v.level[i].x[g]
		dst[x] = v.f.add(dst[x], c)
	}
}

// node0 is room for the values of the nodes of level i, from which image goes on.
func (v *values) node0(i int) []uint64 {
	if n := len(v.level[i].exp); cap(v.node) < n {
		v.node = make([]uint64, n)
	} else {
		v.node = v.node[:n]
	}
	return v.node
}
