package rules

// The quadratic form of a Lagrangian's terms.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
)

// Form writes a Lagrangian quadratic in n fields as the self-adjoint matrix 𝒟 of S = ½∫Φᵀ𝒟Φ.
// A term c·DᵗU·DˢV, with p and q spatial derivatives, is i^p(−i)^q k^(p+q) =
// (−1)^((p−q)/2) k^(p+q) times as much for one Fourier mode; with B_UV = (−D)ᵗ c Dˢ the form is
// 𝒟 = B + B†.
func Form(m *parse.Model, terms []parse.Term, n int) oper.Matrix {
	b := oper.NewMatrix(n, n)
	for _, t := range terms {
		op := oper.Mono(t.Coef.Mul(Fourier(m.Wavenumber, t.U.Space, t.V.Space)), t.V.Time)
		for range t.U.Time {
			op = op.D().Neg()
		}
		b.Set(t.U.Field, t.V.Field, b.At(t.U.Field, t.V.Field).Add(op))
		m.K.Budget().Check(op.Terms())
	}
	return b.Add(b.Adjoint())
}

// Fourier is what p spatial derivatives on one factor and q on the other make of a term with
// all indices summed, for the mode with wave number k.
func Fourier(k field.Elem, p, q int) field.Elem {
	c := k.Pow(p + q)
	if (p-q)/2%2 != 0 {
		c = c.Neg()
	}
	return c
}
