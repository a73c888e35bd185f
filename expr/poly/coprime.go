// Gcd-free bases: given polynomials, pairwise coprime ones of which the given are
// products ([BachDriscollShallit1993]).

package poly

import (
	"math/big"
	"slices"
)

// IndexPower is a power of one element of a basis.
type IndexPower struct{ Index, Exp int }

// Refinement writes a polynomial and the elements of a basis over a finer basis.
type Refinement struct {
	// Basis is pairwise coprime; its elements are primitive, not constant, of positive
	// leading coefficient. Elements that were not split keep their order; parts stand
	// where the whole stood, and what is new in p stands last.
	Basis []Poly
	// Unit and Powers give p = Unit·Π Basis[Index]ᴱˣᵖ, the index increasing.
	Unit   *big.Int
	Powers []IndexPower
	// Old[i] gives the i-th element of the old basis in the same way, with unit 1.
	Old [][]IndexPower
}

// Refine is the refinement of a basis by p without limits; see Ops.Refine.
func Refine(basis []Poly, p Poly) Refinement { return Ops{}.Refine(basis, p) }

// Refine refines a basis by p, which must not be 0. The basis must be one as described
// at Refinement. Common parts are divided out until everything is coprime; elements of
// the basis that p does not meet are not touched. Cost: a gcd and a few divisions for
// every element that p meets, and a gcd for every other.
func (o Ops) Refine(basis []Poly, p Poly) Refinement {
	if p.IsZero() {
		panic("poly: refinement by zero")
	}
	unit, p := p.PrimitivePart()
	r := Refinement{Unit: unit, Old: make([][]IndexPower, len(basis))}
	for i, b := range basis {
		var parts []part
		parts, p = o.split(b, p)
		slices.SortStableFunc(parts, func(x, y part) int { return x.poly.Compare(y.poly) })
		for _, x := range parts {
			k := len(r.Basis)
			r.Basis = append(r.Basis, x.poly)
			r.Old[i] = append(r.Old[i], IndexPower{k, x.inOld})
			if x.inNew > 0 {
				r.Powers = append(r.Powers, IndexPower{k, x.inNew})
			}
		}
	}
	if !p.IsConst() {
		r.Powers = append(r.Powers, IndexPower{len(r.Basis), 1})
		r.Basis = append(r.Basis, p)
	}
	return r
}

// part is an element of a finer basis with its exponents in the old element and in p.
type part struct {
	poly         Poly
	inOld, inNew int
}

// split writes b = Π polyⁱⁿᴼˡᵈ and p = rest·Π polyⁱⁿᴺᵉʷ with pairwise coprime parts that
// are all coprime to rest.
func (o Ops) split(b, p Poly) (parts []part, rest Poly) {
	rest = one
	for _, x := range o.insert([]part{{b, 1, 0}}, part{p, 0, 1}) {
		if x.inOld > 0 {
			parts = append(parts, x)
		} else {
			rest = o.Mul(rest, o.Pow(x.poly, x.inNew))
		}
	}
	return parts, rest
}

// insert adds x to a pairwise coprime list and keeps it so. It ends because a common
// factor that is found counts in fewer elements afterwards, so that the sum of degrees
// falls.
func (o Ops) insert(list []part, x part) []part {
	for i := 0; i < len(list) && !x.poly.IsConst(); i++ {
		y := list[i]
		if q, ok := o.DivExact(x.poly, y.poly); ok {
			x.poly = q
			list[i].inOld += x.inOld
			list[i].inNew += x.inNew
			i--
			continue
		}
		g := o.Gcd(x.poly, y.poly)
		if g.IsOne() {
			continue
		}
		// y = g·(y/g) and x = g·(x/g); the three may still meet one another, but of
		// them only x/g can meet the rest of the list.
		local := []part{{g, x.inOld + y.inOld, x.inNew + y.inNew}}
		local = o.insert(local, part{o.quo(y.poly, g), y.inOld, y.inNew})
		list = slices.Replace(list, i, i+1, local...)
		x.poly = o.quo(x.poly, g)
		i--
	}
	if x.poly.IsConst() {
		return list
	}
	return append(list, x)
}

// CoprimeBasis is the gcd-free basis of the polynomials ps, those that are 0 left out:
// pairwise coprime, and each of ps is an integer times a product of its elements. It is
// sorted by Compare.
func CoprimeBasis(ps []Poly) []Poly {
	var basis []Poly
	for _, p := range ps {
		if !p.IsZero() {
			basis = Refine(basis, p).Basis
		}
	}
	slices.SortFunc(basis, Poly.Compare)
	return basis
}
