package series

// Powers, roots and elementary functions of a series. Each solves a linear equation of first
// order in the bookkeeping parameter λ: with θ = λ d/dλ, which multiplies the part of weight
// n by n, y = u^α has u θy = α y θu, e^u has θe = e θu, and so on. Equating weights gives the
// part of weight n from those below, in n products [Knuth1997, 4.7].

import (
	"fmt"
	"math/big"

	"remnant/expr/field"
)

// relative is the number of weights, from the first term of s on, that a result may have
// which is to be truncated at order and starts at weight val. It fails with *Endless where
// there is no bound.
func (s Series) relative(val, order int) (int, error) {
	known := shift(s.order, -s.Valuation())
	wanted := shift(order, -val)
	n := min(known, wanted)
	if n == Exact {
		return 0, &Endless{}
	}
	return max(n, 0), nil
}

// power is s^α for a rational α such that α times the weight of the first term is whole and
// the power of the first coefficient is in the field.
func (s Series) power(alpha *big.Rat, order int) (Series, error) {
	if s.IsZero() {
		return Series{}, &NoLead{s.order}
	}
	lead, val, err := s.leadPower(alpha)
	if err != nil {
		return Series{}, err
	}
	if len(s.coefs) == 1 && s.order == Exact {
		return s.g.make(val, []field.Elem{lead}, Exact, s.support).Truncate(order), nil
	}
	n, err := s.relative(val, order)
	if err != nil {
		return Series{}, err
	}
	out := s.binomial(alpha, n)
	for i := range out {
		out[i] = out[i].Mul(lead)
	}
	return s.g.make(val, out, shift(n, val), s.support), nil
}

// leadPower is the power of the first term of s and its weight.
func (s Series) leadPower(alpha *big.Rat) (lead field.Elem, val int, err error) {
	c := s.coefs[0]
	if alpha.IsInt() {
		n := int(alpha.Num().Int64())
		if n < 0 {
			s.g.f.AssumeNonzero(c, "a series is divided by its first term")
		}
		return c.Pow(n), n * s.val, nil
	}
	if s.val%2 != 0 {
		return lead, 0, fmt.Errorf("the square root of %v has no power series: its first term %v is no square", s.Elem(), c)
	}
	root, err := s.g.f.Sqrt(c)
	if err != nil {
		return lead, 0, err
	}
	if w, ok := s.g.elemGrade(root); !ok || w != s.val/2 {
		return lead, 0, fmt.Errorf("the square root of %v has no power series: the root of its first term is %v", s.Elem(), root)
	}
	return root.Pow(int(alpha.Num().Int64())), int(alpha.Num().Int64()) * s.val / 2, nil
}

// binomial is the first n parts of (s/lead)^α: with s/lead = Σ aₖ, a₀ = 1,
// b₀ = 1 and m·b_m = Σ_{k=1..m} (αk − (m−k)) aₖ b_{m−k}.
func (s Series) binomial(alpha *big.Rat, n int) []field.Elem {
	f := s.g.f
	inv := s.coefs[0].Inv()
	a := make([]field.Elem, min(n, len(s.coefs)))
	for k := 1; k < len(a); k++ {
		a[k] = s.coefs[k].Mul(inv)
	}
	b := make([]field.Elem, n)
	for m := range b {
		if m == 0 {
			b[0] = f.Int(1)
			continue
		}
		var parts []field.Elem
		for k := 1; k <= m && k < len(a); k++ {
			if a[k].IsZero() || b[m-k].IsZero() {
				continue
			}
			w := new(big.Rat).Mul(alpha, big.NewRat(int64(k), 1))
			w.Sub(w, big.NewRat(int64(m-k), 1))
			w.Quo(w, big.NewRat(int64(m), 1))
			parts = append(parts, a[k].Mul(b[m-k]).Mul(f.Rat(w)))
		}
		b[m] = field.Sum(parts)
	}
	return b
}

// Sqrt is the square root of s, truncated at order: positive where its first term is. The
// first term must be the square of a homogeneous element, or the root of one of weight 0,
// which may adjoin a root to the field.
func (s Series) Sqrt(order int) (Series, error) {
	if s.IsZero() && s.order == Exact {
		return s, nil
	}
	if s.IsZero() {
		return Series{}, fmt.Errorf("the square root of a series of which no term is known, up to order %d", s.order)
	}
	return s.power(big.NewRat(1, 2), order)
}

// Elementary is exp, log, sin, cos, tanh or sqrt of s, truncated at order. The argument of a
// function must have no part of negative weight, and that of log must start at weight 0; its
// part of weight 0 goes into the coefficients: exp(c + δ) = exp(c)(1 + δ + …).
func (s Series) Elementary(name string, order int) (Series, error) {
	if name == "sqrt" {
		return s.Sqrt(order)
	}
	v := s.Valuation()
	if v < 0 || name == "log" && v != 0 {
		return Series{}, fmt.Errorf("%s(%v) has no power series: its argument starts at order %d", name, s.Elem(), v)
	}
	if s.order <= 0 {
		return Series{}, fmt.Errorf("%s of a series of which not even the constant term is known", name)
	}
	c, _ := s.Coef(0)
	first, err := s.startOf(name, c)
	if err != nil {
		return Series{}, err
	}
	known := min(s.order, order)
	if s.order == Exact && (s.IsZero() || s.val == 0 && len(s.coefs) == 1) {
		return s.g.make(0, first[:1], Exact, s.support).Truncate(order), nil
	}
	if known == Exact {
		return Series{}, &Endless{}
	}
	known = max(known, 0)
	return s.g.make(0, s.solve(name, first, known), known, s.support), nil
}

// startOf is the value of the function at c and, for sin and cos, of the other one.
func (s Series) startOf(name string, c field.Elem) ([]field.Elem, error) {
	names := []string{name}
	switch name {
	case "sin":
		names = append(names, "cos")
	case "cos":
		names = append(names, "sin")
	}
	out := make([]field.Elem, len(names))
	for i, n := range names {
		v, err := s.g.f.Elementary(n, c)
		if err != nil {
			return nil, err
		}
		if w, ok := s.g.elemGrade(v); !ok || w != 0 {
			return nil, fmt.Errorf("%s(%v) has no power series", n, c)
		}
		out[i] = v
	}
	return out, nil
}

// solve is the first n parts of the function of s.
func (s Series) solve(name string, first []field.Elem, n int) []field.Elem {
	u := make([]field.Elem, n) // the argument, dense from weight 0
	for i := range u {
		u[i], _ = s.Coef(i)
	}
	switch name {
	case "exp":
		y := make([]field.Elem, n)
		return fill(y, first[0], func(m int) field.Elem { return flow(u, y, m) })
	case "log":
		return s.solveLog(u, first[0])
	case "tanh":
		y, w := make([]field.Elem, n), make([]field.Elem, n) // w = 1 − y²
		return fill(y, first[0], func(m int) field.Elem {
			w[m-1] = convolution(y, y, m-1).Neg()
			if m == 1 {
				w[0] = w[0].Add(s.g.f.Int(1))
			}
			return flow(u, w, m)
		})
	}
	// sin θ-derives to cos, cos to −sin
	y, z := make([]field.Elem, n), make([]field.Elem, n)
	sign := int64(1)
	if name == "cos" {
		sign = -1
	}
	if n > 0 {
		z[0] = first[1]
	}
	return fill(y, first[0], func(m int) field.Elem {
		if m > 1 {
			z[m-1] = flow(u, y, m-1).Scale(-sign, 1)
		}
		return flow(u, z, m).Scale(sign, 1)
	})
}

// fill sets y₀ = first and then each part from those below.
func fill(y []field.Elem, first field.Elem, next func(m int) field.Elem) []field.Elem {
	for m := range y {
		if m == 0 {
			y[0] = first
		} else {
			y[m] = next(m)
		}
	}
	return y
}

// flow is the part of weight m of y where θy = w θu: (1/m) Σ k uₖ w_{m−k}.
func flow(u, w []field.Elem, m int) field.Elem {
	var parts []field.Elem
	for k := 1; k <= m; k++ {
		if !u[k].IsZero() && !w[m-k].IsZero() {
			parts = append(parts, u[k].Mul(w[m-k]).Scale(int64(k), int64(m)))
		}
	}
	return field.Sum(parts)
}

// solveLog is l = log u from u θl = θu: m u₀ l_m = m u_m − Σ_{0<k<m} k l_k u_{m−k}.
func (s Series) solveLog(u []field.Elem, first field.Elem) []field.Elem {
	if len(u) == 0 {
		return nil
	}
	s.g.f.AssumeNonzero(u[0], "a series is divided by its first term")
	inv := u[0].Inv()
	l := make([]field.Elem, len(u))
	return fill(l, first, func(m int) field.Elem {
		parts := []field.Elem{u[m]}
		for k := 1; k < m; k++ {
			if !l[k].IsZero() && !u[m-k].IsZero() {
				parts = append(parts, l[k].Mul(u[m-k]).Scale(int64(-k), int64(m)))
			}
		}
		return field.Sum(parts).Mul(inv)
	})
}

// Compose is Σ c(n) dⁿ, truncated at order, for a series d that starts above weight 0; c
// gives the coefficients, of weight 0, and ends by returning false. It must end if both d
// and order are exact.
func Compose(c func(n int) (field.Elem, bool), d Series, order int) (Series, error) {
	if d.Valuation() <= 0 {
		return Series{}, fmt.Errorf("a power series can only be composed with a series that starts above order 0, not with %v", d)
	}
	bound := min(order, d.order)
	sum, pow := d.g.Zero(Exact), d.g.Int(1)
	for n := 0; pow.Valuation() < bound; n++ {
		e, ok := c(n)
		if !ok {
			return sum.Truncate(order), nil
		}
		if w, flat := d.g.elemGrade(e); !flat || w != 0 {
			return Series{}, fmt.Errorf("the coefficient %v of a composed series is not of order 0", e)
		}
		sum = sum.Add(pow.Mul(d.g.make(0, []field.Elem{e}, Exact, d.g.baseGens(e))))
		pow = pow.Mul(d).Truncate(bound)
	}
	return sum.Add(d.g.Zero(pow.Valuation())).Truncate(order), nil
}
