package reduce

// Conditions for stability, from the declared signs. a, k and N̄ are positive. There is no
// ghost where 𝒦 > 0, at every k; then there is no gradient instability where −q₀ > 0 at large k
// (𝒢 > 0), and no slow instability where −q₀ > 0 at small k. Where 𝒦 can vanish the mode is
// strongly coupled there.

import (
	"remnant/expr/field"
	"remnant/parse"
)

// Concern is what a statement on stability is about.
type Concern uint8

const (
	Ghost          Concern = iota // the sign of 𝒦
	GradientSign                  // the sign of −q₀ at large k, where it grows with k against 𝒦
	MassSign                      // the sign of −q₀ at small k: a slow, tachyonic instability
	StrongCoupling                // 𝒦 can vanish
	Ostrogradsky                  // a mode of higher order
	Growth                        // −q₀/(k²q₁) grows without bound at large k
)

// Verdict says when the good case holds.
type Verdict uint8

const (
	Always Verdict = iota // it follows from the declared signs
	While                 // while Condition > 0
	Never                 // the opposite follows from the declared signs
)

// Statement is one statement on stability.
type Statement struct {
	Concern   Concern
	Verdict   Verdict
	Condition field.Elem   // While: what must be positive; StrongCoupling: the factor that may vanish
	Number    int          // Growth: the power of k; Ostrogradsky: the order of the equation of motion
	AtFinite  bool         // the statement is made at every k, not in a limit only
	Minors    []field.Elem // several fields: the minors that must all be positive
}

// positivity decides e > 0 from declared signs, or gives the product of the factors that it
// depends on.
func positivity(e field.Elem) (Verdict, field.Elem) {
	if e.IsZero() {
		return Never, field.Elem{}
	}
	switch e.Sign() {
	case field.Positive:
		return Always, field.Elem{}
	case field.Negative:
		return Never, field.Elem{}
	}
	f := e.Field()
	r, factors := e.Factors()
	cond := f.Int(int64(r.Sign()))
	for _, p := range factors {
		q, err := f.Poly(p.P)
		if err != nil || p.Exp%2 == 0 {
			continue
		}
		switch q.Sign() {
		case field.Unknown:
			cond = cond.Mul(q)
		case field.Negative:
			cond = cond.Neg()
		}
	}
	if v := cond.Sign(); v != field.Unknown { // only even powers were of unknown sign
		if v == field.Positive {
			return Always, field.Elem{}
		}
		return Never, field.Elem{}
	}
	return While, cond
}

func (s *Single) stability(m *parse.Model) []Statement {
	var out []Statement
	n := len(s.Q) - 1
	if n < 1 {
		return nil
	}
	top := s.Q[n]
	say := func(c Concern, e field.Elem, finite bool) {
		v, cond := positivity(e)
		out = append(out, Statement{Concern: c, Verdict: v, Condition: cond, AtFinite: finite})
	}
	if n > 1 {
		out = append(out, Statement{Concern: Ostrogradsky, Verdict: Never, Number: 2 * n})
	}
	if n == 1 {
		say(Ghost, top, true)
		out = append(out, s.gradientStatements(wavenumberGen(m))...)
	}
	for _, q := range top.Vanishable() {
		out = append(out, Statement{Concern: StrongCoupling, Verdict: While, Condition: q, AtFinite: true})
	}
	return out
}

// gradientStatements looks at −q₀: where there is no ghost, its sign is that of c_s² at large
// k and of the squared frequency at small k.
func (s *Single) gradientStatements(k field.Gen) []Statement {
	var out []Statement
	if s.GrowthInK > 0 {
		out = append(out, Statement{Concern: Growth, Number: s.GrowthInK})
	}
	minus := s.Q[0].Neg()
	say := func(c Concern, e field.Elem) {
		v, cond := positivity(e)
		out = append(out, Statement{Concern: c, Verdict: v, Condition: cond})
	}
	if minus.IsZero() {
		return out
	}
	high, n := leadingInK(minus, k)
	if _, n1 := leadingInK(s.Q[1], k); n > n1 {
		say(GradientSign, high)
	}
	low, l := trailingInK(minus, k)
	if _, l1 := trailingInK(s.Q[1], k); l <= l1 {
		say(MassSign, low)
	}
	return out
}

func (s *Several) stability(weights []int) []Statement {
	var out []Statement
	for _, w := range weights {
		if w > 1 {
			out = append(out, Statement{Concern: Ostrogradsky, Verdict: Never, Number: 2 * w})
		}
	}
	if len(s.Minors) == 0 {
		return out
	}
	ghost := allPositive(Statement{Concern: Ghost, AtFinite: true}, s.Minors)
	out = append(out, ghost)
	switch {
	case vanishes(s.GradientMinors):
	case s.Roots != nil:
		out = append(out, allPositive(Statement{Concern: GradientSign}, s.Roots))
	case ghost.Verdict != Never: // only then do the signs of the gradient matrix decide
		out = append(out, allPositive(Statement{Concern: GradientSign}, s.GradientMinors))
	}
	det := s.Minors[len(s.Minors)-1]
	for _, q := range det.Vanishable() {
		out = append(out, Statement{Concern: StrongCoupling, Verdict: While, Condition: q, AtFinite: true})
	}
	return out
}

// allPositive completes a statement that holds where all minors are positive.
func allPositive(s Statement, minors []field.Elem) Statement {
	for _, minor := range minors {
		switch v, cond := positivity(minor); v {
		case Never:
			s.Verdict, s.Minors = Never, nil
			return s
		case While:
			s.Minors = append(s.Minors, cond)
			s.Verdict = While
		}
	}
	return s
}

func vanishes(es []field.Elem) bool {
	for _, e := range es {
		if !e.IsZero() {
			return false
		}
	}
	return true
}
