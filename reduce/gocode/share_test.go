package gocode

import (
	"fmt"
	"go/parser"
	"math"
	"math/big"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
)

// aviary is a field of constants x0, x1, … to write code for.
func aviary(n int) (*field.Field, []field.Gen) {
	f := field.New(nil)
	var gens []field.Gen
	for i := range n {
		gens = append(gens, f.Constant(fmt.Sprintf("x%d", i), field.Unknown))
	}
	return f, gens
}

func leafName(g field.Gen) string { return fmt.Sprintf("x%d", g) }

// drawElem draws a rational function, with shared factors among its parts.
func drawElem(t *rapid.T, f *field.Field, gens []field.Gen, depth int) field.Elem {
	if depth == 0 {
		if rapid.Bool().Draw(t, "number") {
			return f.Int(int64(rapid.IntRange(-5, 5).Draw(t, "n")))
		}
		return f.Gen(rapid.SampledFrom(gens).Draw(t, "gen"))
	}
	x := drawElem(t, f, gens, depth-1)
	y := drawElem(t, f, gens, rapid.IntRange(0, depth-1).Draw(t, "depth"))
	switch op := rapid.IntRange(0, 5).Draw(t, "op"); {
	case op < 2:
		return x.Add(y)
	case op == 2:
		return x.Sub(y)
	case op == 3 && !y.IsZero():
		return x.Div(y)
	}
	return x.Mul(y)
}

// exactly evaluates a node with rational numbers.
func exactly(s *sharer, id int, at []*big.Rat) (*big.Rat, bool) {
	n := s.nodes[id]
	switch n.op {
	case opConst:
		r, ok := new(big.Rat).SetString(n.text)
		return r, ok
	case opLeaf:
		var i int
		fmt.Sscanf(n.text, "x%d", &i)
		return at[i], true
	}
	a, ok := exactly(s, n.a, at)
	if !ok || n.op == opNeg {
		return new(big.Rat).Neg(a), ok
	}
	b, ok := exactly(s, n.b, at)
	out := new(big.Rat)
	switch {
	case !ok:
		return out, false
	case n.op == opAdd:
		return out.Add(a, b), true
	case n.op == opSub:
		return out.Sub(a, b), true
	case n.op == opMul:
		return out.Mul(a, b), true
	case b.Sign() == 0:
		return out, false
	}
	return out.Quo(a, b), true
}

// floating evaluates a node with float64.
func floating(s *sharer, id int, at []float64) float64 {
	n := s.nodes[id]
	switch n.op {
	case opConst:
		r, _ := new(big.Rat).SetString(n.text)
		v, _ := r.Float64()
		return v
	case opLeaf:
		var i int
		fmt.Sscanf(n.text, "x%d", &i)
		return at[i]
	case opNeg:
		return -floating(s, n.a, at)
	}
	a, b := floating(s, n.a, at), floating(s, n.b, at)
	switch n.op {
	case opAdd:
		return a + b
	case opSub:
		return a - b
	case opMul:
		return a * b
	}
	return a / b
}

// TestGraph: the graph of an element has the element's value, in float64 within the
// tolerance that is promised, and its code is made of valid expressions.
func TestGraph(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		f, gens := aviary(4)
		e := drawElem(t, f, gens, 5)
		s := newSharer(f, leafName)
		id := s.elem(e)
		p := &point{f: f, at: map[field.Gen]*big.Rat{}, values: map[field.Gen]inexact{}, s: s}
		var at []*big.Rat
		var floats []float64
		for _, g := range gens {
			r := big.NewRat(int64(rapid.IntRange(-192, 192).Draw(t, "value")), 64)
			v, _ := r.Float64()
			p.at[g] = r
			at, floats = append(at, r), append(floats, v)
		}
		x, err := p.expect(e)
		if err != nil {
			return // not defined or ill-conditioned there
		}
		got, ok := exactly(s, id, at)
		if !ok || got.Cmp(x.exact) != 0 {
			t.Fatalf("graph of %v has the value %v, want %v", e, got, x.exact)
		}
		want, _ := x.exact.Float64()
		if v := floating(s, id, floats); math.Abs(v-want) > (x.tol+0x1p-53)*math.Abs(want) {
			t.Fatalf("%v is %v in float64, want %v within %g of it", e, v, want, x.tol)
		}
		code := Share([]field.Elem{e, e.Mul(e), e.Neg()}, leafName)
		for _, text := range code.Results {
			if _, err := parser.ParseExpr(text); err != nil {
				t.Fatalf("%q: %v", text, err)
			}
		}
	})
}

// TestSharing: values that have parts in common compute them once.
func TestSharing(t *testing.T) {
	f, g := aviary(3)
	x, y, z := f.Gen(g[0]), f.Gen(g[1]), f.Gen(g[2])
	sum := x.Add(y)
	tests := []struct {
		why    string
		values []field.Elem
		want   Straight
	}{
		{"a number", []field.Elem{f.Int(0), f.Int(-3), f.Int(2).Div(f.Int(3))},
			Straight{nil, []string{"0", "-3", "2.0 / 3"}}},
		{"a shared power", []field.Elem{x.Pow(4), x.Pow(2).Mul(y)},
			Straight{[]string{"t1 := x0 * x0"}, []string{"t1 * t1", "t1 * x1"}}},
		{"a shared factor", []field.Elem{sum.Pow(2).Mul(z), z.Div(sum)},
			Straight{[]string{"t1 := x0 + x1"}, []string{"x2 * (t1 * t1)", "x2 / t1"}}},
		{"a factor and a multiple of it", []field.Elem{sum, sum.Scale(2, 1)},
			Straight{[]string{"t1 := x0 + x1"}, []string{"t1", "2 * t1"}}},
		{"Horner's rule", []field.Elem{x.Pow(2).Mul(y).Add(x.Mul(z)).Add(f.Int(1))},
			Straight{nil, []string{"1 + x0*(x0*x1 + x2)"}}},
		{"a sign in front", []field.Elem{x.Neg().Div(y)},
			Straight{nil, []string{"-(x0 / x1)"}}},
	}
	for _, tt := range tests {
		got := Share(tt.values, leafName)
		if !slices.Equal(tt.want.Statements, got.Statements) || !slices.EqualFunc(tt.want.Results, got.Results, sameExpression) {
			t.Errorf("%s: %q\nwant %q", tt.why, got, tt.want)
		}
	}
}

// sameExpression compares without blanks, which gofmt decides on.
func sameExpression(a, b string) bool {
	strip := func(s string) string {
		return string(slices.DeleteFunc([]rune(s), func(r rune) bool { return r == ' ' }))
	}
	return strip(a) == strip(b)
}
