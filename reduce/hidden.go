package reduce

// Hidden constraints. No field can be solved for algebraically, but the highest derivatives
// do not fix all fields.
//
// Give each field an integer weight mᵢ with ord 𝒟_pq ≤ m_p + m_q; the leading matrix holds the
// coefficients of D^(m_p+m_q). It is the symbol of 𝒟 up to signs, and self-adjointness makes its
// right and left null spaces one. For a null vector v take q with v_q ≠ 0 of largest m_q (of
// equals not the kept field), scale v_q = 1, and put 𝒟 → E†𝒟E with φᵢ → φᵢ + vᵢ D^(m_q−mᵢ) φ_q for
// i ≠ q. E is unimodular, so Det 𝒟 stays. In row and column q all terms of order mᵢ + m_q cancel,
// and the order of the self-adjoint entry (q,q) is even, hence at most 2m_q − 2: m_q may fall by
// one. A null vector with one entry needs no redefinition. The sum of the weights falls in
// every round and is bounded below by ½ deg Det 𝒟, so it ends: with a regular leading matrix,
// where deg Det 𝒟 = 2Σmᵢ, or with a zero row, a gauge direction. Compare the Popov form
// [BeckermannChengLabahn2006].

import (
	"slices"

	"remnant/expr/field"
	"remnant/expr/oper"
)

// startWeights are the smallest weights of the plain kind: the order of each field's row.
func (s System) startWeights() []int {
	m := make([]int, len(s.Names))
	for i := range m {
		for j := range m {
			m[i] = max(m[i], s.D.At(i, j).Order())
		}
	}
	return m
}

// leading is the matrix of the coefficients of D^(m_p+m_q).
func (s System) leading(m []int) [][]field.Elem {
	out := make([][]field.Elem, len(m))
	for p := range m {
		out[p] = make([]field.Elem, len(m))
		for q := range m {
			out[p][q] = s.D.At(p, q).Coef(m[p] + m[q])
		}
	}
	return out
}

// lowerWeights lowers the weights of fields whose column of the leading matrix vanishes, the
// largest first, of equals not the kept one, as far as they go.
func (s System) lowerWeights(m []int, keep int) {
	for {
		lead, q := s.leading(m), -1
		for i := range m {
			if columnVanishes(lead, i) && !s.rowVanishes(i) &&
				(q < 0 || m[i] > m[q] || m[i] == m[q] && q == keep) {
				q = i
			}
		}
		if q < 0 {
			return
		}
		m[q]--
	}
}

func columnVanishes(lead [][]field.Elem, q int) bool {
	for p := range lead {
		if !lead[p][q].IsZero() {
			return false
		}
	}
	return true
}

func (s System) rowVanishes(i int) bool {
	for j := range s.Names {
		if !s.D.At(i, j).IsZero() {
			return false
		}
	}
	return true
}

// hiddenVector finds a null vector of the leading matrix and the field whose weight it
// lowers. It reports false, and the weights, if the leading matrix is regular.
func (s System) hiddenVector(keep int) (v []field.Elem, q int, m []int, ok bool) {
	m = s.startWeights()
	s.lowerWeights(m, keep)
	if v, ok = oper.NullVector(s.K, s.leading(m)); ok {
		q = loweredField(v, m, keep)
	}
	return v, q, m, ok
}

// redefine shifts fields along the null vector v, whose places are the first of the system;
// name gives the shifted fields their new names.
func (s System) redefine(v []field.Elem, q int, m []int, name func(string) string) Step {
	step := Step{Kind: Redefined, Nonzero: v[q].Vanishable()}
	e := oper.Identity(s.K, len(s.Names))
	after := System{K: s.K, Names: append([]string(nil), s.Names...)}
	inv := v[q].Inv()
	for i := range v {
		if i == q || v[i].IsZero() {
			continue
		}
		shift := oper.Mono(v[i].Mul(inv).Lowest(), m[q]-m[i])
		step.Nonzero = append(step.Nonzero, denominators(shift.Lead())...)
		e.Set(i, q, shift)
		after.Names[i] = name(s.Names[i])
		step.Solutions = append(step.Solutions, Solution{Name: s.Names[i], Sum: []Addend{
			{oper.New(s.K.Int(1)), after.Names[i]}, {shift, s.Names[q]}}})
	}
	after.D = s.D.Congruence(e).Map(lowest)
	step.after = after
	return step
}

// loweredField picks the field whose weight the null vector v lowers: of those in v with the
// largest weight not the kept one, then one whose entry is sure not to vanish, then the one
// with the smallest entry, then the first.
func loweredField(v []field.Elem, m []int, keep int) int {
	rank := func(i int) []int {
		kept := 0
		if i == keep {
			kept = 1
		}
		return []int{-m[i], kept, len(v[i].Vanishable()), v[i].Terms(), i}
	}
	q := -1
	for i := range v {
		if !v[i].IsZero() && (q < 0 || slices.Compare(rank(i), rank(q)) < 0) {
			q = i
		}
	}
	return q
}

// denominators lists the factors that a division put into the denominator of c and that
// could vanish.
func denominators(c field.Elem) []field.Elem {
	if c.IsZero() {
		return nil
	}
	d, err := c.Field().Poly(c.Den())
	if err != nil || d.IsZero() {
		return nil
	}
	return d.Vanishable()
}
