package reduce

// Solutions with the Laplacian on the left: where every term divides by k² and k stands in no
// other denominator, ψ = −ρ/k² is better read as ∂²ψ = ρ.

import (
	"remnant/expr/field"
	"remnant/expr/show"
)

// TimesLaplacian multiplies a solution by the power of −k² = ∂² that clears its denominators
// of k, and gives the order of derivatives that stands on the left: ∂ⁿ. It is 0, and the sum is
// as it was, where no power does.
func (s Solution) TimesLaplacian(k field.Elem) (n int, sum []Addend) {
	gen := k.Num().Vars()[0]
	for _, a := range s.Sum {
		for i := 0; i <= a.Coef.Order(); i++ {
			if c := a.Coef.Coef(i).Lowest(); !c.IsZero() {
				n = max(n, c.Den().MinDegree(gen))
			}
		}
	}
	if n == 0 || n%2 != 0 {
		return 0, s.Sum
	}
	laplacian := k.Pow(2).Neg().Pow(n / 2)
	for _, a := range s.Sum {
		moved := a.Coef.Map(func(c field.Elem) field.Elem { return c.Mul(laplacian).Lowest() })
		for i := 0; i <= moved.Order(); i++ {
			if _, ok := show.Laplacians(moved.Coef(i)); !ok {
				return 0, s.Sum
			}
		}
		sum = append(sum, Addend{Coef: moved, Name: a.Name})
	}
	return n, sum
}
