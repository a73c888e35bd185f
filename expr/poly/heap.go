// Heaps of rows, by which products and quotients find the next monomial.
//
// A row is the product of one term with the successive terms of a polynomial, and its
// head is the first product that has not been used. Rows whose heads have the same
// monomial, where they meet in the heap, are chained and leave it together (Johnson
// 1974; [MonaganPearce2011]). One heap serves monomials of one word, the other, without
// chains, those of any number of words.

package poly

import "sync"

// checkEvery is the number of terms of a result between two looks at the budget.
const checkEvery = 1 << 12

// entry is a heap element on one-word monomials: a chain of rows whose heads have the
// monomial key.
type entry struct {
	key   uint64
	chain int32
}

// rowHeap is a heap of chained rows, greatest key first.
type rowHeap struct {
	heap []entry
	next []int32 // the next row in a chain, or −1
}

// push adds row with monomial key, chaining it to an equal key if one is met.
func (h *rowHeap) push(key uint64, row int32) {
	if len(h.heap) > 0 && h.heap[0].key == key {
		h.next[row] = h.heap[0].chain
		h.heap[0].chain = row
		return
	}
	i := len(h.heap)
	for j := i; j > 0; {
		up := (j - 1) / 2
		k := h.heap[up].key
		if k == key {
			h.next[row] = h.heap[up].chain
			h.heap[up].chain = row
			return
		}
		if k > key {
			break
		}
		j = up
	}
	h.next[row] = -1
	h.heap = append(h.heap, entry{})
	for i > 0 {
		up := (i - 1) / 2
		if h.heap[up].key > key {
			break
		}
		h.heap[i] = h.heap[up]
		i = up
	}
	h.heap[i] = entry{key, row}
}

// pop removes the greatest entry and returns its chain.
func (h *rowHeap) pop() int32 {
	heap := h.heap
	chain := heap[0].chain
	n := len(heap) - 1
	last := heap[n]
	heap = heap[:n]
	h.heap = heap
	if n == 0 {
		return chain
	}
	// Move the hole to the bottom along the greater children, then the last entry up.
	i := 0
	for {
		c := 2*i + 1
		if c+1 < n {
			if heap[c].key < heap[c+1].key {
				c++
			}
		} else if c >= n {
			break
		}
		heap[i] = heap[c]
		i = c
	}
	for i > 0 {
		up := (i - 1) / 2
		if heap[up].key >= last.key {
			break
		}
		heap[i] = heap[up]
		i = up
	}
	heap[i] = last
	return chain
}

// workspace is a heap with the positions of its rows. Small products are the commonest
// operation of all, so workspaces are used again.
type workspace struct {
	rowHeap
	at    []int32 // at[i] is the position of row i's head in the longer factor
	ready []int32 // rows that have given their head
}

var workspaces = sync.Pool{New: func() any { return new(workspace) }}

// newWorkspace has n rows, none of them begun, and an empty heap.
func newWorkspace(n int) *workspace {
	w := workspaces.Get().(*workspace)
	if cap(w.at) < n {
		*w = workspace{rowHeap{make([]entry, 0, n), make([]int32, n)}, make([]int32, n), make([]int32, 0, n)}
	}
	w.heap, w.ready = w.heap[:0], w.ready[:0]
	w.next, w.at = w.next[:n], w.at[:n]
	clear(w.at)
	return w
}

// release gives the workspace back, unless it is large.
func (w *workspace) release() {
	if cap(w.at) <= checkEvery {
		workspaces.Put(w)
	}
}

// rows is the heap for monomials of any number of words: each row keeps the monomial of
// its head.
type rows struct {
	words int
	key   []uint64 // words for each row
	heap  []int32
}

func newRows(n, words int) *rows {
	return &rows{words: words, key: make([]uint64, 0, n*words), heap: make([]int32, 0, n)}
}

func (h *rows) mono(r int32) []uint64 {
	return h.key[int(r)*h.words : (int(r)+1)*h.words]
}

// push sets the head of row r to a·b and adds it to the heap. A new row has the next
// number.
func (h *rows) push(r int32, a, b []uint64) {
	if int(r)*h.words == len(h.key) {
		h.key = append(h.key, a...)
	}
	k := h.mono(r)
	for i := range k {
		k[i] = a[i] + b[i]
	}
	i := len(h.heap)
	h.heap = append(h.heap, r)
	for i > 0 {
		up := (i - 1) / 2
		if compareMono(h.mono(h.heap[up]), k) >= 0 {
			break
		}
		h.heap[i] = h.heap[up]
		i = up
	}
	h.heap[i] = r
}

// pop removes the row with the greatest head.
func (h *rows) pop() int32 {
	top := h.heap[0]
	n := len(h.heap) - 1
	last := h.heap[n]
	h.heap = h.heap[:n]
	i := 0
	for c := 1; c < n; c = 2*i + 1 {
		if c+1 < n && compareMono(h.mono(h.heap[c]), h.mono(h.heap[c+1])) < 0 {
			c++
		}
		if compareMono(h.mono(last), h.mono(h.heap[c])) >= 0 {
			break
		}
		h.heap[i] = h.heap[c]
		i = c
	}
	if n > 0 {
		h.heap[i] = last
	}
	return top
}

// topIs reports whether the greatest head is the monomial e.
func (h *rows) topIs(e []uint64) bool {
	return len(h.heap) > 0 && compareMono(h.mono(h.heap[0]), e) == 0
}
