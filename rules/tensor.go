package rules

// Tensors as components in the orthonormal frame. A component that is not stored is zero
// identically.

import "slices"

// tensor holds the components of a tensor with lowered frame indices.
type tensor struct {
	rank int
	comp map[uint32]quantity
}

func newTensor(rank int) tensor { return tensor{rank, map[uint32]quantity{}} }

func key(index ...int) uint32 {
	var k uint32
	for _, i := range index {
		k = k<<2 | uint32(i)
	}
	return k
}

func (t tensor) at(index ...int) quantity { return t.comp[key(index...)] }

func (t tensor) set(q quantity, index ...int) {
	if !q.isZero() {
		t.comp[key(index...)] = q
	}
}

// each visits the components that are not zero, in order.
func (t tensor) each(visit func(index []int, q quantity)) {
	keys := make([]uint32, 0, len(t.comp))
	for k := range t.comp {
		keys = append(keys, k)
	}
	slices.Sort(keys)
	index := make([]int, t.rank)
	for _, k := range keys {
		for i := range index {
			index[i] = int(k >> (2 * (t.rank - 1 - i)) & 3)
		}
		visit(index, t.comp[k])
	}
}

// scalar is the value of a tensor of rank 0.
func (t tensor) scalar() quantity { return t.comp[0] }

func scalarTensor(q quantity) tensor {
	t := newTensor(0)
	t.set(q)
	return t
}

// grad is ∇_a T, the index of the derivative last: ∇_a T_{b…} = e_a T_{b…} − Γ^c_ab T_{c…} − ….
func (f *frame) grad(t tensor) tensor {
	out := newTensor(t.rank + 1)
	add := func(q quantity, index []int) {
		k := key(index...)
		if s := out.comp[k].add(q); s.isZero() {
			delete(out.comp, k)
		} else {
			out.comp[k] = s
		}
	}
	t.each(func(index []int, q quantity) {
		for a := range 4 {
			add(f.e(a, q), append(slices.Clone(index), a))
		}
		for slot := range index {
			c := index[slot]
			f.connection.each(func(g []int, gamma quantity) { // Γ_cab, c the upper index lowered
				if g[0] != c {
					return
				}
				to := append(slices.Clone(index), g[1])
				to[slot] = g[2]
				q := gamma.mul(q)
				if eta(c) > 0 {
					q = q.neg()
				}
				add(q, to)
			})
		}
	})
	return out
}

// hessian and □ of a scalar.
func (f *frame) box(q quantity) quantity {
	return f.trace(f.grad(f.grad(scalarTensor(q))), 0, 1).scalar()
}

// trace contracts two indices.
func (f *frame) trace(t tensor, i, j int) tensor {
	out := newTensor(t.rank - 2)
	t.each(func(index []int, q quantity) {
		if index[i] != index[j] {
			return
		}
		if eta(index[i]) < 0 {
			q = q.neg()
		}
		var rest []int
		for s, v := range index {
			if s != i && s != j {
				rest = append(rest, v)
			}
		}
		k := key(rest...)
		if s := out.comp[k].add(q); s.isZero() {
			delete(out.comp, k)
		} else {
			out.comp[k] = s
		}
	})
	return out
}
