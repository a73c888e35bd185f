package show_test

import (
	"testing"

	"remnant/expr/field"
	"remnant/expr/show"
)

// A Lagrangian as products: like fields share the Laplacians, of unlike ones the second takes
// them with a sign each, and a named factor stands behind the coefficient.
func TestFieldProducts(t *testing.T) {
	k := field.New(nil)
	a := k.Gen(k.Function("a", field.Positive))
	p := func(c field.Elem, u string, i int, v string, j, n int) show.FieldProduct {
		return show.FieldProduct{Coef: c, U: u, V: v, UOrder: i, VOrder: j, Laplacians: n}
	}
	named := p(a.Pow(3).Scale(-1, 2), "A", 0, "zeta", 1, 0)
	named.Symbol = "c2"
	n := show.FieldProducts([]show.FieldProduct{
		p(a.Scale(-3, 1), "zeta", 1, "zeta", 1, 0),
		p(a, "zeta", 0, "zeta", 0, 1),
		p(a, "A", 0, "A", 0, 2),
		p(a.Scale(2, 1), "zeta", 1, "B", 0, 1),
		p(a.Inv(), "A", 0, "zeta", 0, 2),
		named,
	})
	for _, c := range []struct{ form, got, want string }{
		{"text", show.Text(n, 0), "−3a ζ'² + a (∂ζ)² + a (∂²A)² − 2a ζ'∂²B + A∂⁴ζ/a − a³c₂ Aζ'/2"},
		{"ASCII", show.ASCII(n, 0), "-3*a*zeta'^2 + a*grad(zeta)^2 + a*lap(A)^2 - 2*a*zeta'*lap(B) + A*lap^2(zeta)/a - a^3*c2*A*zeta'/2"},
		{"notation", show.Notation(n), "-3*a*zeta'^2 + a*zeta,i*zeta,i + a*A,ii*A,jj - 2*a*zeta'*B,ii + A*zeta,iijj/a - a^3*c2*A*zeta'/2"},
	} {
		if c.got != c.want {
			t.Errorf("%s: %s, want %s", c.form, c.got, c.want)
		}
	}
	if got := show.Text(show.FieldProducts(nil), 0); got != "0" {
		t.Errorf("no products: %s", got)
	}
}

// X(chi) is X to readers where a function has no other X; the notation knows it so too.
func TestArgumentX(t *testing.T) {
	k := field.New(nil)
	x, y := k.Gen(k.Function("x", field.Unknown)), k.Gen(k.Function("y", field.Unknown))
	one := k.FreeFunction("P", []string{"chi", "X(chi)"}, []field.Elem{x, y}, field.Unknown)
	two := k.FreeFunction("Q", []string{"X(phi)", "X(chi)"}, []field.Elem{x, y}, field.Unknown)
	for _, c := range []struct {
		e                     field.Elem
		text, latex, notation string
	}{
		{k.FuncJet(one, []int{1, 2}), "P,χXX", `P_{,\chi XX}`, "P,chi,X,X"},
		{k.FuncJet(two, []int{0, 1}), "Q,X_chi", `Q_{,X_{\chi}}`, "Q,X(chi)"},
	} {
		n := show.Elem(c.e)
		if got := show.Text(n, 0); got != c.text {
			t.Errorf("text %s, want %s", got, c.text)
		}
		if got := show.LaTeX(n); got != c.latex {
			t.Errorf("LaTeX %s, want %s", got, c.latex)
		}
		if got := show.Notation(n); got != c.notation {
			t.Errorf("notation %s, want %s", got, c.notation)
		}
	}
}
