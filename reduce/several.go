package reduce

// What is said of several remaining fields: the normal form of the matrix, and the sound
// speeds as the roots of det(𝒢a²/N̄² − c²𝒦) = 0.

import (
	"math/big"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
)

// Several describes what remains when it is more than one field.
type Several struct {
	Form oper.MatrixNormalForm

	// SoundSpeeds holds c₀, c₁, …: Σ cᵢ (c²)ⁱ = 0 is the equation of the sound speeds squared,
	// without common factors. It is nil where the system has not the form of second order with
	// a regular kinetic matrix free of k and q₀ linear in k².
	SoundSpeeds []field.Elem

	// GradientMinors are those of the gradient matrix a²𝒢/N̄²: with a positive kinetic matrix, all
	// are positive exactly where every sound speed squared is.
	GradientMinors []field.Elem

	// Roots are the sound speeds squared where two fields have them without a root.
	Roots []field.Elem

	// Minors are the leading principal minors of the kinetic matrix q₁: all are positive
	// exactly where there is no ghost. Nil where SoundSpeeds is.
	Minors []field.Elem
}

func analyseSeveral(m *parse.Model, d System) (*Several, error) {
	form, err := d.Form()
	if err != nil {
		return nil, err
	}
	s := &Several{Form: form}
	if len(form.Symmetric) == 2 {
		s.soundSpeeds(m, form.Symmetric[1], form.Symmetric[0])
	}
	return s, nil
}

func (s *Several) soundSpeeds(m *parse.Model, kin, q0 [][]field.Elem) {
	k := wavenumberGen(m)
	n := len(kin)
	grad := make([][]field.Elem, n)
	for a := range n {
		grad[a] = make([]field.Elem, n)
		for b := range n {
			c, ok := coefficientsInK2(q0[a][b], k)
			if !ok || len(c) > 2 || kin[a][b].Has(k) {
				return
			}
			if len(c) == 2 {
				grad[a][b] = c[1].Neg().Mul(m.A.Div(m.Lapse).Pow(2))
			}
		}
	}
	if oper.Det(m.K, kin).IsZero() {
		return
	}
	s.Minors, s.GradientMinors = leadingMinors(m.K, kin), leadingMinors(m.K, grad)
	s.SoundSpeeds = monicPencil(m.K, grad, kin)
	s.Roots = rationalRoots(s.SoundSpeeds)
}

// leadingMinors are the determinants of the leading square blocks.
func leadingMinors(k *field.Field, a [][]field.Elem) []field.Elem {
	var out []field.Elem
	for i := 1; i <= len(a); i++ {
		block := make([][]field.Elem, i)
		for r := range i {
			block[r] = a[r][:i]
		}
		out = append(out, oper.Det(k, block).Lowest())
	}
	return out
}

// rationalRoots solves x² + c₁x + c₀ = 0 where the discriminant is a square; nil elsewhere.
func rationalRoots(c []field.Elem) []field.Elem {
	if len(c) != 3 {
		return nil
	}
	middle := c[1].Scale(-1, 2)
	quarter := middle.Mul(middle).Sub(c[0]) // a quarter of the discriminant
	root, ok := squareRoot(quarter)
	if !ok {
		return nil
	}
	return []field.Elem{middle.Add(root).Lowest(), middle.Sub(root).Lowest()}
}

// squareRoot is a root of e that needs none to be written; false if there is no such.
func squareRoot(e field.Elem) (field.Elem, bool) {
	if e.IsZero() {
		return e, true
	}
	k := e.Field()
	r, factors := e.Factors()
	num, den := new(big.Int).Sqrt(new(big.Int).Abs(r.Num())), new(big.Int).Sqrt(r.Denom())
	root := new(big.Rat).SetFrac(num, den)
	if new(big.Rat).Mul(root, root).Cmp(r) != 0 {
		return e, false
	}
	out := k.Rat(root)
	for _, f := range factors {
		q, err := k.Poly(f.P)
		if err != nil || f.Exp%2 != 0 {
			return e, false
		}
		out = out.Mul(q.Pow(f.Exp / 2))
	}
	return out, true
}

// monicPencil gives the coefficients of det(g − x·k)/det(−k) by powers of x: the
// characteristic polynomial of k⁻¹g, by the method of Faddeev and LeVerrier.
func monicPencil(f *field.Field, g, k [][]field.Elem) []field.Elem {
	inv, _ := oper.Inverse(f, k)
	n := len(k)
	a := product(inv, g)
	c := make([]field.Elem, n+1)
	c[n] = f.Int(1)
	m := make([][]field.Elem, n)
	for i := range m {
		m[i] = make([]field.Elem, n)
	}
	for step := 1; step <= n; step++ {
		m = product(a, m)
		for i := range m {
			m[i][i] = m[i][i].Add(c[n-step+1])
		}
		var trace field.Elem
		for i, row := range product(a, m) {
			trace = trace.Add(row[i])
		}
		c[n-step] = trace.Scale(-1, int64(step)).Lowest()
	}
	return c
}

func product(a, b [][]field.Elem) [][]field.Elem {
	out := make([][]field.Elem, len(a))
	for i := range a {
		out[i] = make([]field.Elem, len(b[0]))
		for j := range out[i] {
			var sum field.Elem
			for l := range b {
				sum = sum.Add(a[i][l].Mul(b[l][j]))
			}
			out[i][j] = sum
		}
	}
	return out
}
