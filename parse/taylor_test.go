package parse

import (
	"math/big"
	"math/rand/v2"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// An independent route to the value of a Lagrangian. Background functions and fields are
// given as polynomials in t and one coordinate x; the expression is computed with them as
// it stands, tree node by tree node, by arithmetic of truncated Taylor series. It must
// agree with the elaborated terms, evaluated with the derivatives of the same polynomials.

// taylorOrder bounds the powers of t and of x that are kept, and so the derivatives.
const taylorOrder = 7

// taylor is Σ c[i][j] tⁱxʲ.
type taylor [taylorOrder + 1][taylorOrder + 1]*big.Rat

func newTaylor(c func(i, j int) int64) *taylor {
	var s taylor
	for i := range s {
		for j := range s[i] {
			s[i][j] = big.NewRat(c(i, j), 1)
		}
	}
	return &s
}

func (s *taylor) each(c func(i, j int) *big.Rat) *taylor {
	var out taylor
	for i := range s {
		for j := range s[i] {
			out[i][j] = c(i, j)
		}
	}
	return &out
}

func (s *taylor) plus(r *taylor, sign int64) *taylor {
	return s.each(func(i, j int) *big.Rat {
		v := new(big.Rat).Mul(big.NewRat(sign, 1), r[i][j])
		return v.Add(v, s[i][j])
	})
}

func (s *taylor) times(r *taylor) *taylor {
	return s.each(func(i, j int) *big.Rat {
		sum := new(big.Rat)
		for p := 0; p <= i; p++ {
			for q := 0; q <= j; q++ {
				if s[p][q].Sign() != 0 && r[i-p][j-q].Sign() != 0 {
					sum.Add(sum, new(big.Rat).Mul(s[p][q], r[i-p][j-q]))
				}
			}
		}
		return sum
	})
}

// inverse is 1/s for a series in t alone: r₀ = 1/s₀, rᵢ = −(Σ_{p≥1} s_p r_{i−p})/s₀.
func (s *taylor) inverse() *taylor {
	r := newTaylor(func(i, j int) int64 { return 0 })
	r[0][0].Inv(s[0][0])
	for i := 1; i <= taylorOrder; i++ {
		for p := 1; p <= i; p++ {
			r[i][0].Sub(r[i][0], new(big.Rat).Mul(s[p][0], r[i-p][0]))
		}
		r[i][0].Mul(r[i][0], r[0][0])
	}
	return r
}

func (s *taylor) dt() *taylor {
	return s.each(func(i, j int) *big.Rat {
		if i == taylorOrder {
			return new(big.Rat)
		}
		return new(big.Rat).Mul(big.NewRat(int64(i+1), 1), s[i+1][j])
	})
}

func (s *taylor) dx() *taylor {
	return s.each(func(i, j int) *big.Rat {
		if j == taylorOrder {
			return new(big.Rat)
		}
		return new(big.Rat).Mul(big.NewRat(int64(j+1), 1), s[i][j+1])
	})
}

// at is ∂ₜᵐ∂ₓⁿ s at t = x = 0.
func (s *taylor) at(m, n int) *big.Rat {
	v := new(big.Int).Mul(new(big.Int).MulRange(1, int64(m)), new(big.Int).MulRange(1, int64(n)))
	return new(big.Rat).Mul(new(big.Rat).SetInt(v), s[m][n])
}

// direct computes an expression as it stands.
func direct(x Expr, values map[string]*taylor) *taylor {
	switch n := x.(type) {
	case *Number:
		return newTaylor(func(i, j int) int64 {
			if i+j == 0 {
				return n.Value.Num().Int64()
			}
			return 0
		})
	case *Name:
		return values[n.Name]
	case *Paren:
		return direct(n.X, values)
	case *Sum:
		out := direct(n.Terms[0].X, values)
		for _, t := range n.Terms[1:] {
			sign := int64(1)
			if t.Minus {
				sign = -1
			}
			out = out.plus(direct(t.X, values), sign)
		}
		return out
	case *Product:
		out := direct(n.Factors[0].X, values)
		for _, f := range n.Factors[1:] {
			y := direct(f.X, values)
			if f.Over {
				y = y.inverse()
			}
			out = out.times(y)
		}
		return out
	case *Prime:
		out := direct(n.X, values)
		for range n.Count {
			out = out.dt()
		}
		return out
	case *Deriv:
		out := direct(n.X, values)
		for range n.Label.Text {
			out = out.dx()
		}
		return out
	case *Apply: // box u = −a⁻³(a³u')' + ∂²u/a²
		u, a := direct(n.X, values), values["a"]
		cube := a.times(a).times(a)
		space := u.dx().dx().times(a.inverse()).times(a.inverse())
		return space.plus(cube.times(u.dt()).dt().times(cube.inverse()), -1)
	}
	panic("a node that the test does not make")
}

// genLinear draws an expression of first order with the given free index, or without.
func genLinear(t *rapid.T, depth int) string {
	if depth == 0 {
		return rapid.SampledFrom([]string{"u", "v"}).Draw(t, "field")
	}
	x := genLinear(t, depth-1)
	switch rapid.IntRange(0, 5).Draw(t, "linear") {
	case 0:
		return "(" + x + ")'"
	case 1:
		return genBackground(t) + "*" + x
	case 2:
		return "(" + x + " - " + genLinear(t, depth-1) + ")"
	case 3:
		return "(" + x + "),jj"
	case 4:
		return "box[" + x + "]"
	}
	return "(" + x + "/" + genDivisor(t) + ")'"
}

// genDivisor draws a background expression that does not vanish at t = 0.
func genDivisor(t *rapid.T) string {
	return rapid.SampledFrom([]string{"a", "b", "(a*b + 2)", "3"}).Draw(t, "divisor")
}

func genBackground(t *rapid.T) string {
	return rapid.SampledFrom([]string{"a", "b", "(a*b + 2)", "b'", "3", "(1/a)'"}).Draw(t, "background")
}

func genQuadratic(t *rapid.T, depth int) string {
	x, y := genLinear(t, depth), genLinear(t, depth)
	switch rapid.IntRange(0, 4).Draw(t, "quadratic") {
	case 0:
		return "(" + x + ")*(" + y + ")"
	case 1:
		return "(" + x + "),i*(" + y + "),i"
	case 2:
		return "((" + x + ")*(" + y + "))'/a"
	case 3:
		return "((" + x + ")*(" + y + "),i),i"
	}
	return "(" + genBackground(t) + "*(" + x + ")*(" + y + ") + (" + x + "),ij*(" + y + "),ij)"
}

func TestElaborationAgainstTaylorSeries(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		lagrangian := genQuadratic(t, rapid.IntRange(0, 2).Draw(t, "depth")) + " + u*u"
		m, err := Load(diag.NewSource("random.act", "background a, b, H\nfields u, v\nlagrangian quadratic = "+lagrangian+" + 0*v"), nil)
		if err != nil {
			t.Fatalf("%s: %v", lagrangian, err)
		}
		seed := rapid.Uint64().Draw(t, "seed")
		rng := rand.New(rand.NewPCG(seed, 2))
		values := map[string]*taylor{}
		for _, name := range []string{"a", "b", "u", "v"} {
			inX := name == "u" || name == "v"
			values[name] = newTaylor(func(i, j int) int64 {
				switch {
				case i+j == 0:
					return 2
				case j > 0 && !inX:
					return 0
				}
				return rng.Int64N(7) - 3
			})
		}
		file, _ := Parse(m.Source)
		want := direct(file.Statements[2].Lagrangian.Value.X, values).at(0, 0)
		got := new(big.Rat)
		for _, q := range m.Quadratic {
			v := evalAt(m, q.Coef, values)
			v.Mul(v, values[m.Fields[q.U.Field].Name].at(q.U.Time, q.U.Space))
			got.Add(got, v.Mul(v, values[m.Fields[q.V.Field].Name].at(q.V.Time, q.V.Space)))
		}
		if got.Cmp(want) != 0 {
			t.Fatalf("%s\nis %v by its terms and %v directly; terms %s", lagrangian, got, want, terms(m))
		}
	})
}

// evalAt is the value of a coefficient at t = 0.
func evalAt(m *Model, e field.Elem, values map[string]*taylor) *big.Rat {
	at := func(g field.Gen) *big.Rat {
		info := m.K.Info(g)
		return values[info.Name].at(info.Order, 0)
	}
	return new(big.Rat).Quo(e.Num().EvalRat(at), e.Den().EvalRat(at))
}
