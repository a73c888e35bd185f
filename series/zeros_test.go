package series

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/budget"
	"remnant/expr/outside"
)

func rat(a, b int64) *big.Rat { return big.NewRat(a, b) }

func polynomial(c ...int64) Entire { return Polynomial(IntUniPoly(c...)) }

func rule(t testing.TB, name string, coef func(n int) *big.Rat, g Growth) Entire {
	t.Helper()
	f, err := Rule(name, coef, g)
	must(t, err)
	return f
}

// sinc is sin(√s)/√s.
func sinc(t testing.TB) Entire {
	return rule(t, "sinc", func(n int) *big.Rat {
		c := new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).MulRange(1, int64(2*n+1)))
		if n%2 == 1 {
			c.Neg(c)
		}
		return c
	}, Growth{rat(1, 1), rat(1, 4), 2, 1})
}

// airy solves d²y/ds² = s·y with y = 1, dy/ds = 0 at 0.
func airy(t testing.TB) Entire {
	return rule(t, "airy", func(n int) *big.Rat {
		c := rat(1, 1)
		if n%3 != 0 {
			return new(big.Rat)
		}
		for k := 3; k <= n; k += 3 {
			c.Quo(c, rat(int64(k*(k-1)), 1))
		}
		return c
	}, Growth{rat(1, 1), rat(1, 1), 2, 3})
}

// lambert is s·eˢ − c.
func lambert(c *big.Rat) Entire {
	s := polynomial(0, 1)
	return Sum(Product(s, Exp(s)), Polynomial(NewUniPoly(new(big.Rat).Neg(c))))
}

// proved is the answer about |s| < r, which must be complete.
func proved(t testing.TB, f Entire, r *big.Rat) Zeros {
	t.Helper()
	z, err := ZerosInDisc(f, new(big.Rat), r, ZeroOptions{})
	must(t, err)
	if !z.Proven || !z.Listed {
		t.Fatalf("zeros of %v for |s| < %v: %s", f, r, z.Reason)
	}
	n := 0
	for _, s := range z.List {
		n += s.Multiplicity
	}
	if n != z.Count {
		t.Errorf("zeros of %v for |s| < %v: %d counted, %d listed", f, r, z.Count, n)
	}
	return z
}

// near reports whether a known zero, given to 10⁻²⁰ of its size, lies in an enclosure.
func (s Zero) near(re, im *big.Rat) bool {
	x, y := new(big.Rat).Sub(re, s.Re), new(big.Rat).Sub(im, s.Im)
	tol := new(big.Rat).Add(new(big.Rat).Abs(re), new(big.Rat).Abs(im))
	r := tol.Mul(tol, new(big.Rat).SetFloat64(1e-20)).Add(tol, s.Radius)
	x, y = x.Mul(x, x), y.Mul(y, y)
	return x.Add(x, y).Cmp(r.Mul(r, r)) <= 0
}

type knownCase struct {
	Coefs    []string `json:"coefs,omitempty"`
	Function string   `json:"function,omitempty"`
	Radius   int64    `json:"radius,omitempty"`

	poly UniPoly
	f    Entire
}

func knownCases(t *testing.T) []knownCase {
	var out []knownCase
	for _, p := range []UniPoly{
		IntUniPoly(-2, 0, 1), IntUniPoly(1, 0, 1), IntUniPoly(0, 0, 0, 1), IntUniPoly(-2, 0, 1, 0, 0, 1),
		IntUniPoly(-1, 3, -3, 1), IntUniPoly(-6, 11, -6, 1).Mul(IntUniPoly(-6, 11, -6, 1)),
		IntUniPoly(1, -20, 0, 0, 1), IntUniPoly(-2, 0, 1).Mul(IntUniPoly(-3, 0, 1).Mul(IntUniPoly(-3, 0, 1))),
		NewUniPoly(rat(-1, 3), rat(7, 2), rat(1, 5), rat(-9, 4), rat(0, 1), rat(2, 7)),
		IntUniPoly(-1, 0, 18, 0, -48, 0, 32),                              // Chebyshev's T₆
		IntUniPoly(-2, 200, -5000, 0, 0, 0, 0, 1),                         // two close roots [Mignotte]
		IntUniPoly(120, -274, 225, -85, 15, -1).Mul(IntUniPoly(-1, 1000)), // 1…5 and 1/1000
	} {
		c := knownCase{poly: p}
		for _, x := range p.c {
			c.Coefs = append(c.Coefs, x.RatString())
		}
		out = append(out, c)
	}
	s := polynomial(0, 1)
	for _, r := range []int64{9, 50, 300} {
		out = append(out, knownCase{Function: "sinc", Radius: r, f: sinc(t)})
	}
	for _, r := range []int64{2, 8, 30} {
		out = append(out, knownCase{Function: "lambert 2", Radius: r, f: lambert(rat(2, 1))},
			knownCase{Function: "lambert -1/3", Radius: r, f: lambert(rat(-1, 3))},
			knownCase{Function: "1 + s exp(-s)", Radius: r,
				f: Sum(polynomial(1), Product(s, Exp(polynomial(0, -1))))})
	}
	for _, r := range []int64{2, 4, 6} {
		out = append(out, knownCase{Function: "airy", Radius: r, f: airy(t)})
	}
	return out
}

// TestZerosAgainstSymPy compares real roots and zeros of entire functions in growing discs.
func TestZerosAgainstSymPy(t *testing.T) {
	cases := knownCases(t)
	var in bytes.Buffer
	enc := json.NewEncoder(&in)
	for _, c := range cases {
		must(t, enc.Encode(c))
	}
	out := strings.Split(strings.TrimSpace(string(outside.SymPy(t, "testdata/zeros.py", in.Bytes()))), "\n")
	if len(out) != len(cases) {
		t.Fatalf("%d answers to %d cases", len(out), len(cases))
	}
	for i, c := range cases {
		if c.Coefs != nil {
			checkRoots(t, c.poly, out[i])
		} else {
			checkZeros(t, c, out[i])
		}
	}
}

func checkRoots(t *testing.T, p UniPoly, answer string) {
	t.Helper()
	var known [][]any
	must(t, json.Unmarshal([]byte(answer), &known))
	roots, err := RealRoots(p, rat(1, 1<<30), nil)
	must(t, err)
	if len(roots) != len(known) {
		t.Fatalf("%v: %d real roots, SymPy has %s", p, len(roots), answer)
	}
	for i, r := range roots {
		x, _ := new(big.Rat).SetString(known[i][0].(string))
		near := Zero{Re: middle(r.Lo, r.Hi), Im: new(big.Rat), Radius: new(big.Rat).Sub(r.Hi, r.Lo)}
		if !near.near(x, new(big.Rat)) || float64(r.Multiplicity) != known[i][1].(float64) {
			t.Errorf("%v: root %d in [%v, %v] of multiplicity %d, SymPy has %v", p, i, r.Lo, r.Hi, r.Multiplicity, known[i])
		}
	}
	checkRealZeros(t, p, roots)
}

// checkRealZeros compares Sturm's roots with the enclosures in a disc that holds all.
func checkRealZeros(t *testing.T, p UniPoly, roots []RealRoot) {
	t.Helper()
	z := proved(t, Polynomial(p), rootBound(p.integral()))
	if z.Count != p.Degree() {
		t.Errorf("%v has %d zeros", p, z.Count)
	}
	for _, r := range roots {
		n := 0
		for _, s := range z.List {
			far := new(big.Rat).Abs(new(big.Rat).Sub(s.Re, middle(r.Lo, r.Hi)))
			width := new(big.Rat).Add(s.Radius, new(big.Rat).Sub(r.Hi, r.Lo))
			if s.Real && s.Multiplicity == r.Multiplicity && far.Cmp(width) <= 0 {
				n++
			}
		}
		if n != 1 {
			t.Errorf("%v: the root in [%v, %v] has %d enclosures", p, r.Lo, r.Hi, n)
		}
	}
}

func checkZeros(t *testing.T, c knownCase, answer string) {
	t.Helper()
	var known [][2]string
	must(t, json.Unmarshal([]byte(answer), &known))
	z := proved(t, c.f, rat(c.Radius, 1))
	if z.Count != len(known) || len(z.List) != len(known) {
		t.Errorf("%s, |s| < %d: %d zeros, mpmath has %d", c.Function, c.Radius, z.Count, len(known))
	}
	for _, k := range known {
		re, _ := new(big.Rat).SetString(k[0])
		im, _ := new(big.Rat).SetString(k[1])
		n := 0
		for _, s := range z.List {
			if s.near(re, im) {
				n++
				if real := ratFloat(im) == 0 || strings.HasPrefix(k[1], "0.0"); s.Real != real && s.Real {
					t.Errorf("%s: %v is called real", c.Function, k)
				}
			}
		}
		if n != 1 {
			t.Errorf("%s, |s| < %d: the zero %v lies in %d enclosures", c.Function, c.Radius, k, n)
		}
	}
}

// TestStructure: W = (s − 1)·exp(g) has one zero in every disc that holds 1, also where the
// form hides it.
func TestStructure(t *testing.T) {
	s := polynomial(0, 1)
	g := polynomial(0, -3, 0, 2)
	w := Product(polynomial(-1, 1), Exp(g))
	f, err := Quotient(Sum(polynomial(1), w), IntUniPoly(0, 6), nil)
	must(t, err)
	nested := Product(polynomial(-1, 1), Exp(Sum(sinc(t), Exp(s).Times(rat(2, 1)))))
	e := Exp(sinc(t))
	hidden, err := Quotient(Sum(e, Product(polynomial(-1, 1), e)), IntUniPoly(0, 1), nil)
	must(t, err)
	for _, c := range []struct {
		f     Entire
		count int
		why   string
	}{
		{w, 1, "as it is written"},
		{Sum(polynomial(-1), Product(polynomial(0, 6), f)), 1, "W = 6sF − 1 for the F that solves it"},
		{nested, 1, "an exponent that is no polynomial"},
		{hidden, 0, "(e^g + (s−1)e^g)/s = e^g"},
		{Sum(Product(Exp(s), Exp(s)), Exp(polynomial(0, 2))), 0, "e^s·e^s + e^2s"},
	} {
		for _, r := range []int64{2, 100, 1_000_000} {
			z := proved(t, c.f, rat(r, 1))
			if !z.ByStructure || z.Count != c.count {
				t.Errorf("%s: %d zeros for |s| < %d, by structure: %v", c.why, z.Count, r, z.ByStructure)
			}
		}
	}
	_, err = ZerosInDisc(Sum(Product(Exp(s), Exp(s)), Exp(polynomial(0, 2)).Times(rat(-1, 1))), new(big.Rat), rat(1, 1), ZeroOptions{})
	if zero := (*ZeroFunctionError)(nil); !errors.As(err, &zero) {
		t.Errorf("the function 0: %v", err)
	}
}

// TestSlope: signs of the derivative at real zeros, of simple functions by hand.
func TestSlope(t *testing.T) {
	for _, c := range []struct {
		f      Entire
		slopes []int
	}{
		{Product(polynomial(-6, 11, -6, 1), Exp(polynomial(0, 1))), []int{1, -1, 1}},
		{sinc(t), []int{-1, 1, -1}},
		{Sum(polynomial(-2), Exp(polynomial(0, 1))), []int{1}},
		{Product(polynomial(-1, 1).Pow(2), polynomial(-2, 0, 1)), []int{-1, 0, 1}},
	} {
		var got []int
		for _, s := range proved(t, c.f, rat(90, 1)).List {
			if s.Real {
				got = append(got, s.Slope)
			}
		}
		if fmt.Sprint(got) != fmt.Sprint(c.slopes) {
			t.Errorf("%v: slopes %v, want %v", c.f, got, c.slopes)
		}
	}
}

// TestMultiplicity: what structure proves is multiple, the rest is a cluster.
func TestMultiplicity(t *testing.T) {
	cosine := rule(t, "cos", func(n int) *big.Rat {
		if n%2 == 1 {
			return new(big.Rat)
		}
		c := new(big.Rat).SetFrac(big.NewInt(int64(1-n%4)), new(big.Int).MulRange(1, int64(n)))
		return c
	}, Growth{rat(1, 1), rat(1, 1), 1, 1})
	double := Sum(polynomial(1), cosine.Times(rat(-1, 1))) // 1 − cos s
	z := proved(t, double, rat(8, 1))
	if len(z.List) != 3 || z.Count != 6 {
		t.Fatalf("1 − cos s has %d zeros in %d places for |s| < 8", z.Count, len(z.List))
	}
	for i, s := range z.List {
		if s.Multiplicity != 2 || s.Cluster == s.Exact || s.Exact != (i == 1) {
			t.Errorf("1 − cos s: zero %d is %+v", i, s)
		}
	}
	for _, s := range proved(t, sinc(t).Pow(3), rat(50, 1)).List {
		if s.Multiplicity != 3 || s.Cluster {
			t.Errorf("sinc³: %+v", s)
		}
	}
	z = proved(t, Product(polynomial(0, 0, 1), Sum(Exp(polynomial(0, 1)), polynomial(-1))), rat(3, 1))
	if len(z.List) != 1 || z.List[0].Multiplicity != 3 || !z.List[0].Exact {
		t.Errorf("s²(eˢ − 1): %+v", z.List)
	}
}

// TestEdge: a zero on the edge is no count.
func TestEdge(t *testing.T) {
	e := func(f Entire, r *big.Rat) error {
		_, err := ZerosInDisc(f, new(big.Rat), r, ZeroOptions{})
		return err
	}
	for _, err := range []error{
		e(polynomial(-2, 1), rat(2, 1)),
		e(polynomial(2, 1), rat(2, 1)),
		e(polynomial(25, -6, 1), rat(5, 1)), // 3 ± 4i
		e(Sum(Exp(polynomial(-1, 1)), polynomial(-1)), rat(1, 1)),
	} {
		if edge := (*EdgeZeroError)(nil); !errors.As(err, &edge) {
			t.Errorf("a zero on the edge gives %v", err)
		}
	}
	for _, c := range []struct {
		r     *big.Rat
		count int
	}{{rat(5, 1), 0}, {rat(500001, 100000), 2}} {
		p := polynomial(25+1, -6, 1) // 3 ± i√17, |s|² = 26
		if z := proved(t, p, c.r); z.Count != 0 {
			t.Errorf("%d zeros for |s| < %v", z.Count, c.r)
		}
	}
	if z := proved(t, Sum(Exp(polynomial(-1, 1)), polynomial(-1)), rat(1_000_001, 1_000_000)); z.Count != 1 {
		t.Errorf("a zero close to the edge: %d", z.Count)
	}
}

// TestNotProven: a limit on the work ends in an honest answer.
func TestNotProven(t *testing.T) {
	z, err := ZerosInDisc(lambert(rat(2, 1)), new(big.Rat), rat(50, 1), ZeroOptions{Models: 60})
	must(t, err)
	if z.Proven || z.Reason == "" || z.Count != 0 {
		t.Errorf("60 models prove %+v", z)
	}
	huge := new(big.Rat).SetInt(new(big.Int).Exp(big.NewInt(10), big.NewInt(400), nil))
	z, err = ZerosInDisc(lambert(rat(2, 1)), new(big.Rat), huge, ZeroOptions{})
	must(t, err)
	if z.Proven || z.Reason == "" {
		t.Errorf("a disc of radius 10⁴⁰⁰: %+v", z)
	}
	z, err = ZerosInDisc(polynomial(-2, 0, 1), new(big.Rat), huge, ZeroOptions{})
	must(t, err)
	if !z.Proven || z.Listed || z.Count != 2 {
		t.Errorf("a polynomial in a disc of radius 10⁴⁰⁰: %+v", z)
	}
	z, err = ZerosInDisc(lambert(rat(2, 1)), new(big.Rat), rat(20, 1), ZeroOptions{Models: 500})
	must(t, err)
	if !z.Proven || z.Listed || z.Reason == "" || z.Count != 7 {
		t.Errorf("500 models prove %+v", z)
	}
}

// TestInterrupted: a cancelled run ends in a *budget.Stop.
func TestInterrupted(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	opt := ZeroOptions{Budget: budget.New(ctx, 0)}
	for _, f := range []Entire{lambert(rat(2, 1)), sinc(t), polynomial(-2, 0, 1)} {
		_, err := ZerosInDisc(f, new(big.Rat), rat(50, 1), opt)
		if stop := (*budget.Stop)(nil); !errors.As(err, &stop) {
			t.Errorf("%v: %v", f, err)
		}
	}
}

// TestTruncation: exp has no zeros, so all of its Taylor polynomials' are artefacts.
func TestTruncation(t *testing.T) {
	f := Exp(polynomial(0, -1))
	for _, n := range []int{5, 10, 20} {
		c, err := CompareTruncation(f, n, rat(50, 1), rat(1, 10), ZeroOptions{})
		must(t, err)
		if c.Function.Count != 0 || c.Polynomial.Count != n || c.Undecided != 0 {
			t.Errorf("order %d: %d zeros of exp, %d of the polynomial, %d undecided", n, c.Function.Count, c.Polynomial.Count, c.Undecided)
		}
		for _, s := range c.Polynomial.List {
			if !s.Artefact {
				t.Errorf("order %d: the zero %v %v is not marked", n, s.Re, s.Im)
			}
		}
	}
	w := Product(polynomial(-1, 1), f)
	c, err := CompareTruncation(w, 12, rat(50, 1), rat(1, 10), ZeroOptions{})
	must(t, err)
	kept := 0
	for _, s := range c.Polynomial.List {
		if !s.Artefact {
			kept++
			if !s.Real || !s.near(rat(1, 1), new(big.Rat)) && ratFloat(s.Re) < 0.9 {
				t.Errorf("(s−1)exp(−s), order 12: %v %v is kept", s.Re, s.Im)
			}
		}
	}
	if kept != 1 || c.Undecided != 0 {
		t.Errorf("(s−1)exp(−s), order 12: %d kept, %d undecided", kept, c.Undecided)
	}
}

// drawEntire is a small function that is no polynomial times an exponential.
func drawEntire(r *rapid.T, label string) Entire {
	p := func(l string) Entire {
		return polynomial(rapid.Int64Range(-3, 3).Draw(r, label+l+"0"), rapid.Int64Range(-2, 2).Draw(r, label+l+"1"))
	}
	k := rapid.SampledFrom([]int64{-2, -1, 1, 2}).Draw(r, label+"k")
	return Sum(Product(p("a"), Exp(polynomial(0, k))), p("b"))
}

// TestCountsAdd: the number in a square is the sum over sub-squares, and that of a product
// the sum over factors.
func TestCountsAdd(t *testing.T) {
	count := func(f Entire, x0, x1, y0, y1 int64) (int, bool) {
		n, err := CountInBox(f, Box{rat(x0, 100), rat(x1, 100), rat(y0, 100), rat(y1, 100)}, ZeroOptions{Models: 4000})
		return n, err == nil
	}
	check := func(r *rapid.T) {
		f, g := drawEntire(r, "f"), drawEntire(r, "g")
		x, y := rapid.Int64Range(-250, 250).Draw(r, "x"), rapid.Int64Range(-250, 250).Draw(r, "y")
		whole, ok := count(f, -312, 323, -331, 317)
		sum := 0
		for _, q := range [][4]int64{{-312, x, -331, y}, {x, 323, -331, y}, {-312, x, y, 317}, {x, 323, y, 317}} {
			n, part := count(f, q[0], q[1], q[2], q[3])
			sum, ok = sum+n, ok && part
		}
		if ok && sum != whole {
			r.Errorf("%v: %d zeros in a square, %d in its parts", f, whole, sum)
		}
		other, ok2 := count(g, -312, 323, -331, 317)
		both, ok3 := count(Product(f, g), -312, 323, -331, 317)
		if ok && ok2 && ok3 && both != whole+other {
			r.Errorf("(%v)·(%v): %d zeros, factors have %d and %d", f, g, both, whole, other)
		}
	}
	rapid.Check(t, check)
}

// BenchmarkOnePole proves that a W with one pole and a known form factor has one zero in a
// disc of radius 100: by structure, and by the argument principle for a form factor given
// by a rule.
func BenchmarkOnePole(b *testing.B) {
	byRule := rule(b, "E", func(n int) *big.Rat { // (1 − s) exp(−s/10)
		c := new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).MulRange(1, int64(n)))
		c.Mul(c, new(big.Rat).SetFrac(big.NewInt(1-2*int64(n%2)), new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(n)), nil)))
		return c.Mul(c, rat(int64(1+10*n), 1))
	}, Growth{rat(6, 1), rat(1, 5), 1, 1}) // 1 + 10n ≤ 6·2ⁿ
	for _, c := range []struct {
		name string
		f    Entire
	}{
		{"structure", Product(polynomial(-1, 1), Exp(polynomial(0, -1)))},
		{"rule", byRule},
		{"sum", Sum(Product(polynomial(-1, 1), Exp(polynomial(0, -1))), Exp(polynomial(0, -1).Of(polynomial(-3, 2)))).Times(rat(1, 7))},
	} {
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				z, err := ZerosInDisc(c.f, new(big.Rat), rat(100, 1), ZeroOptions{})
				if err != nil || !z.Proven {
					b.Fatal(z, err)
				}
			}
		})
	}
}
