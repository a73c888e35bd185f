package parse

import (
	"fmt"

	"remnant/parse/diag"
)

// The rules of summation. An index that stands twice in one product is summed; one that
// stands once there is free, and must be free in every term of a sum; in the end nothing
// may be free. A bracket keeps its own sums to itself: (psi,ii)*(zeta,ii) is a product of
// two Laplacians, psi,ii*zeta,ii is refused.

// use is a place where an index stands.
type use struct {
	letter rune
	at     diag.Span
	of     Expr // what carries it
}

// checkIndices refuses an expression in which an index is not summed.
func (e *elaborator) checkIndices(x Expr) {
	switch n := x.(type) {
	case *Paren:
		e.checkIndices(n.X)
		return
	case *Sum:
		for _, t := range n.Terms {
			e.checkIndices(t.X)
		}
		return
	}
	if free := e.free(x); len(free) > 0 {
		panic(indexFault(diag.IndexOnce, free[len(free)-1], "once"))
	}
}

// manyUses bounds how often a power repeats the indices of its base here: more than
// enough to be refused.
const manyUses = 5

func often(n int) string {
	switch n {
	case 3:
		return "three times"
	case 4:
		return "four times"
	}
	return "too often"
}

func indexFault(kind diag.Kind, u use, count string) *fault {
	return newFault(kind, u.at, fmt.Sprintf("'%s' cannot be differentiated by '%c'", brief(u.of), u.letter),
		fmt.Sprintf("index %c stands %s; every index must stand twice in a product", u.letter, count))
}

// free returns the indices of x that are not summed within it.
func (e *elaborator) free(x Expr) []use {
	switch n := x.(type) {
	case *Paren:
		return e.free(n.X)
	case *Sign:
		return e.free(n.X)
	case *Prime:
		return e.free(n.X)
	case *Sum:
		return e.freeSum(n)
	case *Product:
		var all []use
		for _, f := range n.Factors {
			uses := e.uses(f.X)
			if f.Over {
				e.noneFree(sum(uses), "a divisor")
				continue
			}
			all = append(all, uses...)
		}
		return sum(all)
	case *Power:
		e.noneFree(e.free(n.Exponent), "an exponent")
		return sum(e.uses(n))
	case *Deriv:
		return sum(e.uses(n))
	case *Call:
		for _, a := range n.Args {
			e.noneFree(e.free(a), "an argument")
		}
	case *Factorial:
		e.noneFree(e.free(n.X), "a factorial")
	case *Apply:
		return e.free(n.X)
	case *Index:
		if e.formSymbol(n.X) == nil {
			panic(e.indexed(n))
		}
	}
	return nil
}

// uses returns every index as a factor of a product shows it: those of a derivative each
// time they are written, those of a bracket only where they are free.
func (e *elaborator) uses(x Expr) []use {
	switch n := x.(type) {
	case *Deriv:
		if n.Mark != "," || e.byArgument(n) {
			return nil
		}
		all := e.uses(n.X)
		for i, r := range n.Label.Text {
			if !isIndexLetter(r) {
				panic(e.notAnIndex(n))
			}
			at := diag.Span{Start: n.Label.At.Start + i, End: n.Label.At.Start + i + len(string(r))}
			all = append(all, use{r, at, n})
		}
		return all
	case *Prime:
		return e.uses(n.X)
	case *Sign:
		return e.uses(n.X)
	case *Power:
		base := e.uses(n.Base)
		if _, isBracket := n.Base.(*Paren); isBracket {
			base = e.free(n.Base)
		}
		var all []use
		for range min(smallWhole(n.Exponent), manyUses) {
			all = append(all, base...)
		}
		return all
	}
	return e.free(x)
}

// smallWhole is the exponent if it is written as a whole number, and otherwise one.
func smallWhole(x Expr) int {
	if n, ok := x.(*Number); ok && n.Value.IsInt() && n.Value.Num().IsInt64() {
		return int(min(n.Value.Num().Int64(), manyUses))
	}
	return 1
}

// freeSum returns the free indices that all terms of a sum have in common.
func (e *elaborator) freeSum(n *Sum) []use {
	first := e.free(n.Terms[0].X)
	for _, t := range n.Terms[1:] {
		next := e.free(t.X)
		if u, ok := missing(first, next); ok {
			panic(mismatch(u))
		}
		if u, ok := missing(next, first); ok {
			panic(mismatch(u))
		}
	}
	return first
}

func mismatch(u use) *fault {
	return newFault(diag.IndexMismatch, u.at, fmt.Sprintf("index %c stands once in this term of a sum and not so in another", u.letter),
		"every index must stand twice in a product, or once in each term of a bracket")
}

// missing returns an index of a that b lacks.
func missing(a, b []use) (use, bool) {
	for _, u := range a {
		found := false
		for _, v := range b {
			found = found || u.letter == v.letter
		}
		if !found {
			return u, true
		}
	}
	return use{}, false
}

// sum pairs the indices of a product and returns those that stand once.
func sum(all []use) []use {
	count := map[rune]int{}
	for _, u := range all {
		count[u.letter]++
	}
	var free []use
	for _, u := range all {
		switch n := count[u.letter]; {
		case n == 1:
			free = append(free, u)
		case n > 2:
			panic(indexFault(diag.IndexTooOften, nthUse(all, u.letter, 2), often(n)))
		}
	}
	return free
}

// nthUse returns the n-th use of a letter, from 0.
func nthUse(all []use, letter rune, n int) use {
	for _, u := range all {
		if u.letter == letter {
			if n == 0 {
				return u
			}
			n--
		}
	}
	return all[0]
}

func (e *elaborator) noneFree(free []use, what string) {
	if len(free) > 0 {
		panic(newFault(diag.IndexOnce, free[0].at, fmt.Sprintf("%s cannot carry the index %c", what, free[0].letter),
			"every index must stand twice in a product"))
	}
}
