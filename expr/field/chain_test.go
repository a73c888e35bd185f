package field

import (
	"errors"
	"testing"
)

// When the first argument of a free function stops varying, the derivatives of its relation
// follow the next one.
func TestChainMovesToTheNextArgument(t *testing.T) {
	f := New(nil)
	chi, phi := f.Function("chi", Unknown), f.Function("phi", Unknown)
	fn := f.FreeFunction("f", []string{"chi", "phi"}, []Elem{f.Gen(chi), f.Gen(phi)}, Unknown)
	value := f.Gen(phi).Mul(f.Gen(phi))
	if err := f.RelateGen(f.FuncJetGen(fn, []int{0, 0}), value, 0); err != nil {
		t.Fatal(err)
	}
	if got := f.FuncJet(fn, []int{0, 1}); !got.Equal(f.Raw(f.FuncJetGen(fn, []int{0, 1}))) {
		t.Errorf("f,phi = %v while chi varies, want it free", got)
	}
	if err := f.RelateGen(f.JetGen(chi, 1), f.Int(0), 1); err != nil {
		t.Fatal(err)
	}
	if got, want := f.FuncJet(fn, []int{0, 1}), f.Gen(phi).Scale(2, 1); !got.Equal(want) {
		t.Errorf("f,phi = %v with chi at rest, want %v", got, want)
	}
}

// A value that leads back to itself is an error of the relations and ends no program.
func TestCycleIsCaught(t *testing.T) {
	f := New(nil)
	x := f.Function("x", Unknown)
	g := f.JetGen(x, 1)
	f.gens[x].rule = &rule{leader: x, value: f.Raw(g)} // as no relation can make it: x → x′
	f.epoch++
	err := func() (err error) {
		defer CatchCycle(&err)
		f.Jet(x, 2)
		return nil
	}()
	var stuck *Unsolvable
	if !errors.As(err, &stuck) || !stuck.Cyclic {
		t.Errorf("%v, want a cycle", err)
	}
}
