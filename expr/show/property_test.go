package show_test

import (
	"strings"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
	"remnant/expr/show"
)

const menagerie = `constants M > 0, m, lambda_1
background a > 0, eps, phi, u_1, u1, dchi
functions V(phi), P(phi, X), f(u_1)`

// drawElem draws an element of small size, biased to shared factors and single terms.
func drawElem(t *rapid.T, w *world, depth int) field.Elem {
	leaves := []string{
		"M", "m", "lambda_1", "a", "eps", "phi'", "phi''", "phi''''", "k", "k^2", "V", "V,phi",
		"P,X", "P,phi,X", "f,u_1", "u_1", "u1'", "dchi", "exp(lambda_1*phi)", "sqrt(eps)",
		"sqrt(2)", "sin(phi)", "cos(phi)", "log(a)", "tanh(phi/M)", "exp(V,phi/M)",
	}
	if depth == 0 {
		if rapid.Bool().Draw(t, "number") {
			return w.f.Int(1).Scale(int64(rapid.IntRange(-3, 3).Draw(t, "n")), int64(rapid.IntRange(1, 4).Draw(t, "d")))
		}
		e, err := w.read(rapid.SampledFrom(leaves).Draw(t, "leaf"))
		if err != nil {
			t.Fatal(err)
		}
		return e
	}
	x, y := drawElem(t, w, depth-1), drawElem(t, w, rapid.IntRange(0, depth-1).Draw(t, "depth"))
	switch rapid.IntRange(0, 4).Draw(t, "op") {
	case 0:
		return x.Sub(y)
	case 1:
		return x.Add(y)
	case 2:
		if !y.IsZero() {
			return x.Div(y)
		}
	}
	return x.Mul(y)
}

// TestNotationReadsBack: what Notation writes has the value it was written for; brackets
// are balanced in every form, and a second layout is the same.
func TestNotationReadsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w, err := newWorld(menagerie)
		if err != nil {
			t.Fatal(err)
		}
		e := drawElem(t, w, rapid.IntRange(0, 3).Draw(t, "size"))
		n := show.Elem(e)
		text := show.Notation(n)
		back, err := w.read(text)
		if err != nil {
			t.Fatal(err)
		}
		if !back.Equal(e) {
			t.Fatalf("%s reads back as %v, want %v", text, back, e)
		}
		if again := show.Notation(show.Elem(back)); again != text {
			t.Fatalf("laid out again: %s, before: %s", again, text)
		}
		for _, s := range []string{text, show.Text(n, 0), show.ASCII(n, 0), show.LaTeX(n), show.GoSource(n, show.GoName)} {
			if !balanced(s) {
				t.Fatalf("brackets do not match in %s", s)
			}
		}
	})
}

// balanced reports whether brackets of every kind close in order; \left and \right must
// pair as well.
func balanced(s string) bool {
	var open []rune
	for _, r := range s {
		switch r {
		case '(', '[', '{':
			open = append(open, r)
		case ')', ']', '}':
			if len(open) == 0 || strings.IndexRune("([{", open[len(open)-1]) != strings.IndexRune(")]}", r) {
				return false
			}
			open = open[:len(open)-1]
		}
	}
	return len(open) == 0 && strings.Count(s, `\left`) == strings.Count(s, `\right`)
}

// TestWrapped: breaking lines changes nothing but blanks, and keeps to the width unless a
// single term is longer.
func TestWrapped(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w, err := newWorld(menagerie)
		if err != nil {
			t.Fatal(err)
		}
		n := show.Elem(drawElem(t, w, 3))
		width := rapid.IntRange(10, 60).Draw(t, "width")
		flat, wrapped := show.Text(n, 0), show.Text(n, width)
		if strings.Join(strings.Fields(flat), "") != strings.Join(strings.Fields(wrapped), "") {
			t.Fatalf("%s\nis broken into\n%s", flat, wrapped)
		}
		for i, line := range strings.Split(wrapped, "\n") {
			if i > 0 && !strings.HasPrefix(line, "    + ") && !strings.HasPrefix(line, "    − ") {
				t.Fatalf("line %q does not begin at a sign", line)
			}
			terms := strings.Count(line, " + ") + strings.Count(line, " − ")
			if i > 0 {
				terms-- // its own sign
			}
			if n := len([]rune(line)); n > width && terms > 0 {
				t.Fatalf("line %q has %d columns and could be broken at %d", line, n, width)
			}
		}
	})
}

func TestNames(t *testing.T) {
	tests := []struct{ name, unicode, latex, goName, why string }{
		{"eps", "ε", `\epsilon`, "Eps", "a Greek letter"},
		{"dphi", "δφ", `\delta\phi`, "Dphi", "a perturbation"},
		{"deltaphi", "δφ", `\delta\phi`, "Deltaphi", "a perturbation, as typed in Greek"},
		{"delta", "δ", `\delta`, "Delta", "the letter, not δ of something"},
		{"u_1", "u₁", `u_{1}`, "U1", "an index"},
		{"eps2", "ε₂", `\epsilon_{2}`, "Eps2", "digits are an index"},
		{"M_pl", "M_pl", `M_{\mathit{pl}}`, "MPl", "an index in letters"},
		{"alphaB", "α_B", `\alpha_{B}`, "AlphaB", "a capital behind a Greek letter is an index"},
		{"GT", "GT", `\mathit{GT}`, "GT", "a word in capitals"},
		{"Theta", "Θ", `\Theta`, "Theta", "a capital"},
		{"cs", "cs", `\mathit{cs}`, "Cs", "a word is one symbol"},
		{"box", "□", `\Box`, "Box", "a symbol"},
	}
	for _, tt := range tests {
		if got := show.UnicodeName(tt.name); got != tt.unicode {
			t.Errorf("UnicodeName(%q) = %q, want %q: %s", tt.name, got, tt.unicode, tt.why)
		}
		if got := show.LaTeX(show.Symbol(tt.name, 0)); got != tt.latex {
			t.Errorf("LaTeX of %q is %q, want %q: %s", tt.name, got, tt.latex, tt.why)
		}
		if got := show.GoName(tt.name, 0, nil); got != tt.goName {
			t.Errorf("GoName(%q) = %q, want %q: %s", tt.name, got, tt.goName, tt.why)
		}
	}
}

func TestConformalHubbleRate(t *testing.T) {
	wr := show.Writer{Conformal: true}
	n := show.Product(show.Symbol("a", 0), show.Symbol("H", 1))
	if got, want := wr.Text(n), "aℋ'"; got != want {
		t.Errorf("Text = %q, want %q", got, want)
	}
	if got, want := wr.LaTeX(n), `a \mathcal{H}'`; got != want {
		t.Errorf("LaTeX = %q, want %q", got, want)
	}
}
