package reduce

// A multiplier: 𝒟_λλ = 0 and 𝒟_λμ = c is a function. The λ equation gives μ, the μ equation
// gives λ. With d = 𝒟_μμ, of any order, the block [[0,c],[c,d]] has the exact inverse
// [[−c⁻¹dc⁻¹, c⁻¹],[c⁻¹, 0]], so Det 𝒟 only loses the unit −c². The step does not apply where λ
// meets every partner through a derivative; that is a hidden constraint.

import "remnant/expr/oper"

func (s System) solveMultiplier(l, m int) Step {
	c := s.D.At(l, m).Coef(0)
	inv := c.Inv()
	n := len(s.Names)
	rest := others(n, l, m)
	mu, lambda := make([]oper.Oper, n), make([]oper.Oper, n)
	for _, q := range rest {
		// c μ + Σ 𝒟_λq φ_q = 0,  c λ + d μ + Σ 𝒟_μq φ_q = 0
		mu[q] = s.D.At(l, q).Scale(inv.Neg())
		lambda[q] = lowest(s.D.At(m, q).Add(s.D.At(m, m).Mul(mu[q])).Scale(inv.Neg()))
	}
	after := s.without(l, m)
	for r, from := range rest {
		for t, to := range rest {
			gain := s.D.At(from, l).Mul(lambda[to]).Add(s.D.At(from, m).Mul(mu[to]))
			after.D.Set(r, t, lowest(after.D.At(r, t).Add(gain)))
		}
	}
	return Step{
		Kind: Multiplier,
		Solutions: []Solution{
			{s.Names[m], s.Names[l], s.combination(mu)},
			{s.Names[l], s.Names[m], s.combination(lambda)},
		},
		Nonzero: c.Vanishable(),
		after:   after,
	}
}
