package reduce

import (
	"testing"

	"remnant/expr/field"
)

// TestExpandOnScales multiplies the series of 𝒦 = m²/(k² + m²) by its denominator: what is
// missing to m² is of the order that is said to be left out.
func TestExpandOnScales(t *testing.T) {
	r := mustReduce(t, load(t, "gannet.act"))
	k := r.Model.Wavenumber
	m2 := eval(t, r.Model, "m^2")
	for _, large := range []bool{true, false} {
		x, err := r.ExpandScales(4, large)
		if err != nil {
			t.Fatal(err)
		}
		for i, p := range x.Places {
			if p.N == 0 {
				if c := x.Coefs[i]; !c.Exact || !x.Sum(i).Equal(m2.Neg()) {
					t.Errorf("q₀ = %v, exact %v", x.Sum(i), c.Exact)
				}
				continue
			}
			rest := x.Sum(i).Mul(k.Pow(2).Add(m2)).Sub(m2)
			want := map[bool]string{true: "k^6/m^4", false: "-m^6/k^4"}[large]
			if !rest.Equal(eval(t, r.Model, want)) {
				t.Errorf("large scales %v: the remainder is %v, want %s", large, rest, want)
			}
			if order := map[bool]int{true: 6, false: -6}[large]; x.Coefs[i].Exact || x.Coefs[i].Order != order {
				t.Errorf("large scales %v: order %d is left out, want %d", large, x.Coefs[i].Order, order)
			}
		}
	}
}

// TestExpandSmall expands 1/(1 + g) in g; without small parameters there is nothing to do.
func TestExpandSmall(t *testing.T) {
	r := mustReduce(t, model(t, "test.act", "constants g, m\nfields u\nlagrangian quadratic = u'^2/2 - m^2*u^2/(2*(1 + g))\nsmall g to order 3"))
	x, err := r.ExpandSmall(3)
	if err != nil {
		t.Fatal(err)
	}
	want := eval(t, r.Model, "-m^2*(1 - g + g^2 - g^3)")
	if got := x.Sum(1); x.Places[1].N != 0 || !got.Equal(want) || x.Coefs[1].Order != 4 {
		t.Errorf("q₀ = %v + O(%d), want %v", got, x.Coefs[1].Order, want)
	}
	if none, err := mustReduce(t, load(t, "plover.act")).ExpandSmall(2); none != nil || err != nil {
		t.Errorf("a model without small parameters gives %v, %v", none, err)
	}
}

// TestExpandSeveral puts the places of several fields together again.
func TestExpandSeveral(t *testing.T) {
	r := mustReduce(t, load(t, "avocet.act"))
	x, err := r.ExpandScales(2, true)
	if err != nil {
		t.Fatal(err)
	}
	if len(x.Places) != 3+3+1 {
		t.Fatalf("%d places, want 7", len(x.Places))
	}
	for i, p := range x.Places {
		if got, want := x.Sum(i), r.coefficient(p); !got.Equal(want) {
			t.Errorf("%+v: %v, want %v", p, got, want)
		}
	}
	d := r.Document([]*Expansion{x}, nil)
	form := r.Several.Form
	for _, both := range []struct {
		text [][][]string
		want [][][]field.Elem
	}{
		{d.Series[0].Operator.Several.Symmetric, form.Symmetric},
		{d.Series[0].Operator.Several.Antisymmetric, form.Antisymmetric},
	} {
		for n := range both.want {
			for a := range both.want[n] {
				for b, want := range both.want[n][a] {
					if got := value(t, r.Model, both.text[n][a][b]); !got.Equal(want) {
						t.Errorf("n = %d, (%d, %d): %v, want %v", n, a, b, got, want)
					}
				}
			}
		}
	}
}
