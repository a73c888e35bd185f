package gocode

import (
	"math"
	"math/big"
	"testing"

	"remnant/expr/field"
)

// TestFunctions: values by identities that join the functions, and against package math.
func TestFunctions(t *testing.T) {
	close := func(a, b *big.Float) bool {
		diff := newFloat().Sub(a, b)
		return diff.Sign() == 0 || diff.MantExp(nil)-max(a.MantExp(nil), b.MantExp(nil)) < -precision+80
	}
	for _, v := range []float64{-29.5, -3.25, -1, -0.125, 0.0078125, 0.5, 1, 2.875, 17} {
		x := newFloat().SetFloat64(v)
		e := exp(x)
		if inv := exp(newFloat().Neg(x)); !close(newFloat().Mul(e, inv), newFloat().SetInt64(1)) {
			t.Errorf("exp(%v)·exp(−%v) is not 1", v, v)
		}
		approx, _ := e.Float64()
		if !close(log(e, approx), x) {
			t.Errorf("log(exp(%v)) is not %v", v, v)
		}
		s, c := sin(x), cos(x)
		if !close(newFloat().Add(newFloat().Mul(s, s), newFloat().Mul(c, c)), newFloat().SetInt64(1)) {
			t.Errorf("sin² + cos² is not 1 at %v", v)
		}
		for name, want := range map[string]float64{
			"exp": math.Exp(v), "sin": math.Sin(v), "cos": math.Cos(v), "tanh": math.Tanh(v),
		} {
			value, gain := function(name, x, v)
			got, _ := value.Float64()
			if math.Abs(got-want) > 4e-16*math.Abs(want) || gain < 0 {
				t.Errorf("%s(%v) = %v, want %v", name, v, got, want)
			}
		}
	}
	if got, _ := pi().Float64(); got != math.Pi {
		t.Errorf("pi = %v", got)
	}
	if s := sin(pi()); s.Sign() != 0 && s.MantExp(nil) > -precision+16 {
		t.Errorf("sin π = %v", s)
	}
}

func TestUnfitPoints(t *testing.T) {
	f := field.New(nil)
	g := f.Constant("x", field.Unknown)
	x := f.Gen(g)
	root, err := f.Sqrt(x)
	if err != nil {
		t.Fatal(err)
	}
	logarithm, err := f.Elementary("log", x)
	if err != nil {
		t.Fatal(err)
	}
	exponential, err := f.Elementary("exp", x.Scale(100, 1))
	if err != nil {
		t.Fatal(err)
	}
	tests := []struct {
		why string
		e   field.Elem
		at  int64
	}{
		{"a pole", x.Sub(f.Int(2)).Inv(), 2},
		{"a zero, where no relative tolerance holds", x.Sub(f.Int(2)), 2},
		{"the root of a negative number", root, -1},
		{"the logarithm of a negative number", logarithm, -1},
		{"the logarithm of one, where relative errors have no bound", logarithm, 1},
		{"a value beyond float64", exponential, 3},
	}
	for _, tt := range tests {
		p := &point{f: f, at: map[field.Gen]*big.Rat{g: big.NewRat(tt.at, 1)},
			values: map[field.Gen]inexact{}, s: newSharer(f, leafName)}
		if x, err := p.expect(tt.e); err == nil {
			t.Errorf("%s: %v at %d is expected to be %v", tt.why, tt.e, tt.at, x.value)
		}
	}
}
