package reduce

// An auxiliary field: its diagonal entry is a function c ≠ 0. Its own equation gives
// φ_p = −c⁻¹ Σ 𝒟_pq φ_q, and what is left is the Schur complement 𝒟_rs − 𝒟_rp c⁻¹ 𝒟_ps. The
// inverse is exact, so Det 𝒟 only loses the unit c. The step does not apply to an entry that
// holds a derivative: that field may carry initial data.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
)

func (s System) solveAuxiliary(p int) Step {
	c := s.D.At(p, p).Coef(0)
	minus := c.Inv().Neg()
	row := make([]oper.Oper, len(s.Names))
	for q := range row {
		row[q] = s.D.At(p, q).Scale(minus)
	}
	after := s.without(p)
	for r, from := range others(len(s.Names), p) {
		for t, to := range others(len(s.Names), p) {
			after.D.Set(r, t, lowest(after.D.At(r, t).Add(s.D.At(from, p).Mul(row[to]))))
		}
	}
	return Step{
		Kind:      Auxiliary,
		Solutions: []Solution{{s.Names[p], s.Names[p], s.combination(row, p)}},
		Nonzero:   c.Vanishable(),
		after:     after,
	}
}

// others lists 0 … n−1 without the given places.
func others(n int, without ...int) []int {
	var out []int
	for i := range n {
		skip := false
		for _, w := range without {
			skip = skip || i == w
		}
		if !skip {
			out = append(out, i)
		}
	}
	return out
}

func lowest(a oper.Oper) oper.Oper { return a.Map(field.Elem.Lowest) }
