package series

import (
	"errors"
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// quotient is f/p, which must be entire.
func quotient(t testing.TB, f Entire, p UniPoly) Entire {
	t.Helper()
	q, err := Quotient(f, p, nil)
	must(t, err)
	return q
}

// drawFunction builds a function with exact values at many rational points.
func drawFunction(r *rapid.T, depth int) Entire {
	p := func() Entire {
		c := rapid.SliceOfN(rapid.Int64Range(-3, 3), 1, 3).Draw(r, "coefs")
		return Polynomial(IntUniPoly(c...).Scale(rat(1, rapid.Int64Range(1, 3).Draw(r, "den"))))
	}
	kind := "poly"
	if depth > 0 {
		kind = rapid.SampledFrom([]string{"poly", "exp", "sum", "product", "power", "inside", "removable"}).Draw(r, "kind")
	}
	switch kind {
	case "exp":
		return Exp(p())
	case "sum":
		return Sum(drawFunction(r, depth-1), drawFunction(r, depth-1))
	case "product":
		return Product(drawFunction(r, depth-1), drawFunction(r, depth-1))
	case "power":
		return drawFunction(r, depth-1).Pow(rapid.IntRange(0, 3).Draw(r, "power"))
	case "inside":
		return drawFunction(r, depth-1).Of(p())
	case "removable": // (f(s) − f(a))/(s − a) for rational f(a)
		f, a := drawFunction(r, depth-1), rat(rapid.Int64Range(-2, 2).Draw(r, "at"), 2)
		v, ok := f.Taylor(a, 1)
		if !ok {
			return f
		}
		x, ok := v[0].Rat()
		if !ok {
			return f
		}
		q, err := Quotient(Sum(f, Polynomial(NewUniPoly(x.Neg(x)))), NewUniPoly(new(big.Rat).Neg(a), rat(1, 1)), nil)
		if err != nil {
			r.Fatalf("a removable singularity: %v", err)
		}
		return q
	}
	return p()
}

// meets reports whether a disc can hold the exact value v.
func meets(d Disc, v ExpSum) bool {
	fine := NewArith(400)
	e := v.Enclose(fine)
	return !d.rad.add(e.rad).less(fine.Sub(d.exactMid(), e.exactMid()).midDown())
}

// TestEnclosuresHoldExactValues: values in discs, and Taylor coefficients by derivatives.
func TestEnclosuresHoldExactValues(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		f := drawFunction(r, 3)
		bits := rapid.SampledFrom([]int{53, 120}).Draw(r, "bits")
		x := rat(rapid.Int64Range(-8, 8).Draw(r, "x"), 4)
		off := rat(rapid.Int64Range(-5, 5).Draw(r, "off"), rapid.SampledFrom([]int64{5, 50, 5000}).Draw(r, "scale"))
		at := new(big.Rat).Add(x, off)
		d, err := f.Enclose(x, new(big.Rat), new(big.Rat).Abs(off), bits, nil)
		if err != nil {
			r.Fatal(err)
		}
		if v, ok := f.Taylor(at, 1); ok && !meets(d, v[0]) {
			r.Errorf("%v at %v is %v, outside of %v", f, at, v[0], d)
		}
		taylor, ok := f.Taylor(x, 3)
		if !ok {
			return
		}
		g, factorial := f, rat(1, 1)
		for j := range taylor {
			d, err := g.Enclose(x, new(big.Rat), new(big.Rat), bits, nil)
			if err != nil {
				r.Fatal(err)
			}
			if !meets(d, taylor[j].Scale(factorial)) {
				r.Errorf("derivative %d of %v at %v is not %v·%v but %v", j, f, x, factorial, taylor[j], d)
			}
			g, factorial = g.Deriv(), new(big.Rat).Mul(factorial, rat(int64(j+1), 1))
		}
	})
}

// TestModels checks what a Taylor model claims, at exact points of its disc: the polynomial
// with its errors holds the value, and on half the disc the derivative lies in its bound.
func TestModels(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		f := drawFunction(r, 3)
		ev := &evaluator{Arith: NewArith(rapid.SampledFrom([]int{53, 120}).Draw(r, "bits"))}
		x := rat(rapid.Int64Range(-8, 8).Draw(r, "x"), 4)
		rho := rapid.SampledFrom([]int{-8, -3, -1, 0, 1}).Draw(r, "log rho")
		m := ev.at(f.node(), ev.rat(x), mag{0.5, rho + 1})
		quarter := rat(1<<(rho+8), 4<<8)
		for k := int64(-4); k <= 4; k++ {
			at := new(big.Rat).Mul(quarter, rat(k, 1))
			at.Add(at, x)
			sum, tt := Disc{}, ev.rat(rat(k, 4))
			for j := modelOrder - 1; j >= 0; j-- {
				sum = ev.Add(ev.Mul(sum, tt), m.a[j])
			}
			if v, ok := f.Taylor(at, 2); !ok {
				continue
			} else if !meets(sum.enlarge(m.eps), v[0]) {
				r.Errorf("%v at %v is %v, its model around %v has %v", f, at, v[0], x, sum.enlarge(m.eps))
			} else if d := ev.derivative(m, mag{0.5, rho + 1}); k*k <= 4 && !meets(d, v[1]) {
				r.Errorf("the derivative of %v at %v is %v, its bound around %v is %v", f, at, v[1], x, d)
			}
		}
	})
}

// TestExactTaylor compares coefficients with those worked out by hand.
func TestExactTaylor(t *testing.T) {
	s := polynomial(0, 1)
	f := quotient(t, Sum(Exp(polynomial(0, -1)), polynomial(-1)), IntUniPoly(0, 1)) // (e^−s − 1)/s
	for _, c := range []struct {
		f    Entire
		at   *big.Rat
		want string
	}{
		{f, rat(0, 1), "-1 1/2 -1/6 1/24"},
		{f.ScaleArgument(rat(1, 2)), rat(0, 1), "-1 1/4 -1/24 1/192"},
		{f, rat(1, 1), "1*exp(-1)-1 -2*exp(-1)+1 5/2*exp(-1)-1 -8/3*exp(-1)+1"},
		{sinc(t), rat(0, 1), "1 -1/6 1/120 -1/5040"},
		{sinc(t).Deriv(), rat(0, 1), "-1/6 1/60 -1/1680 1/90720"},
		{Exp(Product(s, s)), rat(0, 1), "1 0 1 0"},
		{Exp(sinc(t)), rat(0, 1), "1*exp(1) -1/6*exp(1) 1/45*exp(1) -107/45360*exp(1)"},
		{Product(Exp(s), Exp(polynomial(1, -1))), rat(3, 1), "1*exp(1) 0 0 0"},
		{Entire{}, rat(3, 1), "0 0 0 0"},
	} {
		got, ok := c.f.Taylor(c.at, 4)
		var text []string
		for _, x := range got {
			text = append(text, x.String())
		}
		if strings.Join(text, " ") != c.want || !ok {
			t.Errorf("%v at %v: %v, want %v", c.f, c.at, strings.Join(text, " "), c.want)
		}
	}
	for _, c := range []struct {
		f  Entire
		at *big.Rat
	}{{sinc(t), rat(1, 1)}, {Exp(Exp(s)), rat(1, 1)}} {
		if _, ok := c.f.Taylor(c.at, 1); ok {
			t.Errorf("%v at %v has no exact value here", c.f, c.at)
		}
	}
}

// TestPoles: a quotient that is not entire is refused, with the place.
func TestPoles(t *testing.T) {
	e := Exp(polynomial(0, 1))
	for _, c := range []struct {
		f      Entire
		p      UniPoly
		want   string
		proven bool
	}{
		{polynomial(1), IntUniPoly(0, 1), "a pole at s = 0: 1 does not vanish there", true},
		{Sum(e, polynomial(-1)), IntUniPoly(0, 0, 1), "a pole at s = 0: (exp(s)-1)/(s) does not vanish there", true},
		{e, IntUniPoly(-2, 3), "a pole at s = 2/3: exp(s) does not vanish there", true},
		{sinc(t), IntUniPoly(-1, 1), "a pole at s = 1: sinc(s) does not vanish there", true},
		{e, IntUniPoly(-2, 0, 1), "a pole at s = about -1.414214: exp(s) does not vanish there", true},
		{e, IntUniPoly(1, 0, 1), "a pole at s = about 0.000000-1.000000i: exp(s) does not vanish there", true},
		{Sum(Exp(polynomial(-2, 0, 1)), polynomial(-1)), IntUniPoly(-2, 0, 1),
			"a possible pole at s = about -1.414214: exp(s^2-2)-1 could not be shown to vanish there", false},
	} {
		_, err := Quotient(c.f, c.p, nil)
		var pole *PoleError
		if !errors.As(err, &pole) || err.Error() != c.want || pole.Proven != c.proven {
			t.Errorf("(%v)/(%v): %v, want %s", c.f, c.p, err, c.want)
		}
	}
	if _, err := Quotient(e, UniPoly{}, nil); !errors.Is(err, ErrZeroDivisor) {
		t.Errorf("division by 0: %v", err)
	}
	q := quotient(t, Product(polynomial(-2, 0, 1), e), IntUniPoly(-4, 0, 2))
	if p, g, ok := q.Structure(); !ok || !p.Equal(NewUniPoly(rat(1, 2))) || g.String() != "s" {
		t.Errorf("(s² − 2)eˢ/(2s² − 4) = %v", q)
	}
}

// TestFraction: common zeros go, poles stay and are enclosed.
func TestFraction(t *testing.T) {
	e := Exp(polynomial(0, -1))
	f, err := NewFraction(Sum(e, polynomial(-1)), IntUniPoly(0, 1, 1), nil) // (e^−s − 1)/(s(s + 1))
	must(t, err)
	if !f.Den().Equal(IntUniPoly(1, 1)) || !f.AnalyticAt(new(big.Rat)) || f.AnalyticAt(rat(-1, 1)) {
		t.Errorf("(e^−s − 1)/(s(s + 1)) = %v", f)
	}
	got, ok := f.Taylor(new(big.Rat), 3) // (−1 + s/2 − s²/6)(1 − s + s²)
	if want := []*big.Rat{rat(-1, 1), rat(3, 2), rat(-5, 3)}; !ok {
		t.Error("no Taylor coefficients")
	} else {
		for j := range want {
			if x, ok := got[j].Rat(); !ok || x.Cmp(want[j]) != 0 {
				t.Errorf("coefficient %d is %v, want %v", j, got[j], want[j])
			}
		}
	}
	if _, err := f.Entire(nil); err == nil || !strings.HasPrefix(err.Error(), "a pole at s = -1:") {
		t.Errorf("%v as an entire function: %v", f, err)
	}
	g, err := NewFraction(e, IntUniPoly(1, 1), nil)
	must(t, err)
	minus, err := NewFraction(e.Times(rat(-1, 1)), IntUniPoly(1, 1), nil)
	must(t, err)
	sum, err := g.Add(minus, nil)
	must(t, err)
	if !sum.Den().Equal(IntUniPoly(1)) {
		t.Errorf("f − f = %v", sum)
	}
	h, err := NewFraction(polynomial(-1, 1), IntUniPoly(-2, 0, 1).Mul(IntUniPoly(-2, 0, 1)), nil)
	must(t, err)
	poles, err := h.Poles(nil)
	must(t, err)
	if len(poles) != 2 || poles[0].Multiplicity != 2 || !poles[1].Real {
		t.Errorf("poles of %v: %+v", h, poles)
	}
	one, err := h.Mul(Fraction{Polynomial(IntUniPoly(-2, 0, 1)), IntUniPoly(1)}, nil)
	must(t, err)
	if !one.Den().Equal(IntUniPoly(-2, 0, 1)) {
		t.Errorf("a common irrational zero stays: %v", one)
	}
}

// TestGrowth: bounds that are found, and bounds that are wrong.
func TestGrowth(t *testing.T) {
	ratio := func(num, den UniPoly) (Growth, error) { return RatioGrowth(rat(1, 1), num, den, nil) }
	g, err := ratio(IntUniPoly(-1), IntUniPoly(6, 10, 4)) // −1/((2n+2)(2n+3))
	must(t, err)
	if g.P != 2 || g.Q != 1 || g.R.Cmp(rat(1, 4)) != 0 {
		t.Errorf("growth of sinc: %+v", g)
	}
	g, err = ratio(IntUniPoly(11, 10), IntUniPoly(10, 110, 100)) // (1 + 10n)/(10ⁿ n!)
	must(t, err)
	if g.P != 1 || g.R.Cmp(rat(11, 1)) > 0 {
		t.Errorf("growth of (1 + s)e^(s/10): %+v", g)
	}
	for _, c := range [][2]UniPoly{{IntUniPoly(1), IntUniPoly(2)}, {IntUniPoly(1, 1), IntUniPoly(2, 1)}, {IntUniPoly(1), IntUniPoly(-3, 1)}} {
		if _, err := ratio(c[0], c[1]); !errors.Is(err, ErrGrowth) {
			t.Errorf("ratio %v/%v: %v", c[0], c[1], err)
		}
	}
	wrong := rule(t, "wrong", func(n int) *big.Rat { return new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).MulRange(1, int64(n))) },
		Growth{rat(1, 1), rat(1, 2), 1, 1})
	_, err = ZerosInDisc(Sum(wrong, polynomial(3)), new(big.Rat), rat(2, 1), ZeroOptions{})
	if bad := (*GrowthError)(nil); !errors.As(err, &bad) || bad.N != 1 {
		t.Errorf("a bound that is broken: %v", err)
	}
	if _, err := Rule("none", nil, Growth{rat(1, 1), rat(1, 1), 0, 1}); err == nil {
		t.Error("a bound that does not fall is accepted")
	}
}

// TestRuleModels: the exponential by its Taylor rule against its exact values, where terms
// cancel and where they do not.
func TestRuleModels(t *testing.T) {
	f := rule(t, "e", func(n int) *big.Rat {
		return new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).MulRange(1, int64(n)))
	}, Growth{rat(1, 1), rat(1, 1), 1, 1})
	for _, bits := range []int{53, 100} {
		for _, x := range []int64{-30, -12, -1, 0, 2, 25} {
			for _, rho := range []mag{{0.5, -6}, {0.5, 0}, {0.5, 2}} {
				ev := &evaluator{Arith: NewArith(bits)}
				m := ev.at(f.node(), ev.rat(rat(x, 1)), rho)
				for k := int64(-2); k <= 2; k++ {
					r, _ := rho.exact().Rat(nil)
					at := r.Mul(r, rat(k, 2)).Add(r, rat(x, 1))
					sum := Disc{}
					for j := modelOrder - 1; j >= 0; j-- {
						sum = ev.Add(ev.Mul(sum, ev.rat(rat(k, 2))), m.a[j])
					}
					if v := expPower(at, rat(1, 1)); !meets(sum.enlarge(m.eps), v) {
						t.Errorf("%d bits: the model around %d with ρ = %v has %v at %v, not %v", bits, x, rho, sum.enlarge(m.eps), at, v)
					}
				}
			}
		}
	}
}
