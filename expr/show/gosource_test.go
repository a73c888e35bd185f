package show_test

import (
	"fmt"
	"go/constant"
	"go/token"
	"go/types"
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
	"remnant/expr/poly"
	"remnant/expr/show"
)

// TestGoSourceHasTheValue: Go's own constant arithmetic gives the source the value of the
// element, symbols standing for numbers.
func TestGoSourceHasTheValue(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w, err := newWorld(menagerie)
		if err != nil {
			t.Fatal(err)
		}
		e := drawElem(t, w, rapid.IntRange(0, 3).Draw(t, "size"))
		src := show.GoSource(show.Elem(e), func(name string, primes int, by []string) string {
			return fmt.Sprintf("%d.0", valueOf(name, primes, by))
		})
		if strings.Contains(src, "math.") {
			return
		}
		want, ok := valueAt(w.f, e)
		if !ok {
			return
		}
		tv, err := types.Eval(token.NewFileSet(), nil, token.NoPos, src)
		if err != nil {
			t.Fatalf("%s: %v", src, err)
		}
		got, ok := new(big.Rat).SetString(constant.ToFloat(tv.Value).ExactString())
		if !ok || got.Cmp(want) != 0 {
			t.Fatalf("%s is %v, want %v", src, got, want)
		}
	})
}

// valueOf gives every symbol a number of its own.
func valueOf(name string, primes int, by []string) int {
	n := 2 + 7*primes
	for _, s := range append([]string{name}, by...) {
		for _, r := range s {
			n = (n*31 + int(r)) % 97
		}
	}
	return n + 1
}

func valueAt(f *field.Field, e field.Elem) (*big.Rat, bool) {
	if e.IsZero() {
		return new(big.Rat), true
	}
	at := func(g poly.Var) *big.Rat {
		in := f.Info(g)
		var by []string
		for i, n := range in.Index {
			for range n {
				by = append(by, in.Fn.ArgNames[i])
			}
		}
		return big.NewRat(int64(valueOf(in.Name, in.Order, by)), 1)
	}
	den := e.Den().EvalRat(at)
	if den.Sign() == 0 {
		return nil, false
	}
	return new(big.Rat).Quo(e.Num().EvalRat(at), den), true
}

func TestGoIdentifiers(t *testing.T) {
	f := field.New(nil)
	gens := []field.Gen{
		f.Constant("m", field.Unknown), f.Constant("M", field.Unknown),
		f.Function("phi", field.Unknown), f.Function("u_1", field.Unknown), f.Function("u1", field.Unknown),
	}
	gens = append(gens, f.JetGen(gens[2], 1), f.JetGen(gens[2], 4), f.Function("DPhi", field.Unknown))
	fn := f.FreeFunction("P", []string{"phi", "X"}, []field.Elem{f.Gen(gens[2]), f.Gen(gens[0])}, field.Unknown)
	gens = append(gens, f.FuncJetGen(fn, []int{0, 0}), f.FuncJetGen(fn, []int{1, 2}))
	want := []string{"SmallM", "M", "Phi", "U1", "U1No2", "DSmallPhi", "D4Phi", "DPhi", "P", "PPhiXX"}
	ids := show.GoIdentifiers(f, gens)
	for i, g := range gens {
		if got := ids.Of(g); i < len(want) && got != want[i] {
			t.Errorf("generator %d is %q, want %q", i, got, want[i])
		}
	}
	if got := ids.Symbol("phi", 4, nil); got != "D4Phi" {
		t.Errorf("φ⁽⁴⁾ is %q", got)
	}
}
