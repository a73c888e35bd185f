package parse

import (
	"strings"
	"testing"
	"time"

	"remnant/parse/diag"
)

// outline writes a tree with every node in brackets, so that precedence shows.
func outline(x Expr) string {
	switch n := x.(type) {
	case *Number:
		return n.Value.RatString()
	case *Name:
		return n.Name
	case *Paren:
		return outline(n.X)
	case *Sign:
		return "(" + string(mark(n.Minus, '-', '+')) + " " + outline(n.X) + ")"
	case *Sum:
		var parts []string
		for i, t := range n.Terms {
			if i > 0 {
				parts = append(parts, string(mark(t.Minus, '-', '+')))
			}
			parts = append(parts, outline(t.X))
		}
		return "(" + strings.Join(parts, " ") + ")"
	case *Product:
		var parts []string
		for i, f := range n.Factors {
			if i > 0 {
				parts = append(parts, string(mark(f.Over, '/', '*')))
			}
			parts = append(parts, outline(f.X))
		}
		return "(" + strings.Join(parts, " ") + ")"
	case *Power:
		return "(" + outline(n.Base) + " ^ " + outline(n.Exponent) + ")"
	case *Factorial:
		return "(" + outline(n.X) + " !)"
	case *Prime:
		return "(" + outline(n.X) + strings.Repeat("'", n.Count) + ")"
	case *Deriv:
		return "(" + outline(n.X) + n.Mark + n.Label.Name + ")"
	case *Index:
		return "(" + outline(n.X) + "." + outline(n.Label) + ")"
	case *Call:
		var parts []string
		for _, a := range n.Args {
			parts = append(parts, outline(a))
		}
		return outline(n.Fun) + "{" + strings.Join(parts, " ") + "}"
	case *Apply:
		return "<" + outline(n.Operator) + " on " + outline(n.X) + ">"
	}
	panic("unknown node")
}

func TestPrecedence(t *testing.T) {
	for _, c := range []struct{ why, in, want string }{
		{"products before sums, from the left", "a+b*c-d/e*f", "(a + (b * c) - (d / e * f))"},
		{"powers associate to the right", "a^b^c", "(a ^ (b ^ c))"},
		{"an exponent may be signed", "a^-b^-2", "(a ^ (- (b ^ (- 2))))"},
		{"a sign is looser than a power", "-a^2", "(- (a ^ 2))"},
		{"a sign is tighter than a product", "-a*b", "((- a) * b)"},
		{"a factorial is tighter than a power", "2^n!", "(2 ^ (n !))"},
		{"a factorial is looser than a prime", "a'!", "((a') !)"},
		{"a prime is tighter than a power", "zeta'^2", "((zeta') ^ 2)"},
		{"primes add up, however they are typed", "zeta''′″", "(zeta''''')"},
		{"suffixes from the left", "V,phi'", "((V,phi)')"},
		{"a bracket takes suffixes", "(a^2*u')'", "(((a ^ 2) * (u'))')"},
		{"derivatives by arguments and by space are one mark", "P,X,X*psi,ij", "(((P,X),X) * (psi,ij))"},
		{"covariant derivatives", "phi;ab", "(phi;ab)"},
		{"tensors", "Ric.ab*K.ij", "((Ric.ab) * (K.ij))"},
		{"a Taylor number is no decimal", "F.2(r)", "(F.2){r}"},
		{"a decimal is exact", "0.25*2e-2", "(1/4 * 1/50)"},
		{"a comma in arguments separates, in a bracket it differentiates", "f(a,(V,phi))", "f{a (V,phi)}"},
		{"in the bracket of an operator it differentiates", "f(a,box[V,phi])", "f{a <box on (V,phi)>}"},
		{"the bracket closes the operator", "box[u]", "<box on u>"},
		{"a power of an operator", "u*box^2[u]", "(u * <(box ^ 2) on u>)"},
		{"what follows acts on the result", "box[u]'^2", "((<box on u>') ^ 2)"},
		{"factors with box compose", "u*(box - m^2)*exp(-box/M^2)[u]", "(u * <((box - (m ^ 2)) * exp{((- box) / (M ^ 2))}) on u>)"},
		{"a factor without box stops them", "box*m*box[u]", "(box * m * <box on u>)"},
		{"so does a division", "u/box[v]", "(u / <box on v>)"},
		{"and an operator that is closed", "box[u]*box[v]", "(<box on u> * <box on v>)"},
		{"a sign stays outside of the operator", "-box[u]^2", "(- (<box on u> ^ 2))"},
		{"operators act on operators' results", "box[box[u]]", "<box on <box on u>>"},
		{"symbols", "□[ζ]·½ − √2×ℋ", "((<box on zeta> * 1/2) - (sqrt{2} * H))"},
		{"a root of a bracket", "√(a+b)'", "(sqrt{(a + b)}')"},
	} {
		file, list := Parse(diag.NewSource("expr.act", "let x = "+c.in))
		if len(list) > 0 {
			t.Errorf("%s: %s: %v", c.why, c.in, list)
			continue
		}
		if got := outline(file.Statements[0].Let.Value.X); got != c.want {
			t.Errorf("%s: %s\n got %s\nwant %s", c.why, c.in, got, c.want)
		}
	}
}

func TestSpans(t *testing.T) {
	src := diag.NewSource("spans.act", "let x = -a'*(b + c)^2*f(d, e),i\n  + box[ζ]!")
	file, list := Parse(src)
	if len(list) > 0 {
		t.Fatal(list)
	}
	var got []string
	Walk(file.Statements[0].Let.Value.X, func(x Expr) bool {
		got = append(got, src.Slice(x.Span()))
		return true
	})
	want := []string{
		"-a'*(b + c)^2*f(d, e),i\n  + box[ζ]!", "-a'*(b + c)^2*f(d, e),i", "-a'", "a'", "a",
		"(b + c)^2", "(b + c)", "b + c", "b", "c", "2", "f(d, e),i", "f(d, e)", "f", "d", "e",
		"box[ζ]!", "box[ζ]", "box", "ζ",
	}
	if strings.Join(got, "|") != strings.Join(want, "|") {
		t.Errorf("got  %q\nwant %q", got, want)
	}
}

// TestHostileInputs: deep and long texts are read or refused, at once and without a crash.
func TestHostileInputs(t *testing.T) {
	deep := func(n int, open, inner, shut string) string {
		return "let x = " + strings.Repeat(open, n) + inner + strings.Repeat(shut, n)
	}
	for _, c := range []struct {
		why, in string
		kind    diag.Kind // empty: it is read
	}{
		{"brackets at the limit", deep(1000, "(", "a", ")"), ""},
		{"brackets beyond the limit", deep(1001, "(", "a", ")"), diag.TooDeep},
		{"very many brackets", deep(3e5, "(", "a", ")"), diag.TooDeep},
		{"square brackets at the limit", deep(1000, "box[", "a", "]"), ""},
		{"arguments at the limit", deep(1000, "f(", "a", ")"), ""},
		{"signs in a row", deep(3e5, "-", "a", ""), diag.TooDeep},
		{"exponents in a row", deep(1e5, "a^", "a", ""), diag.TooDeep},
		{"primes in a row", deep(3e5, "", "a", "'"), diag.TooDeep},
		{"derivatives in a row", deep(1e5, "", "a", ",i"), diag.TooDeep},
		{"factorials in a row", deep(1e5, "", "a", "!"), diag.TooDeep},
		{"operands in a row", deep(1e5, "", "box", "[a]"), diag.TooDeep},
		{"a sum of many terms", deep(1e5, "", "a", " + a"), ""},
		{"a product of many factors", deep(1e5, "", "a", "*a"), ""},
		{"a long name", "let x = " + strings.Repeat("a", 1e6), ""},
		{"a long number", "let x = " + strings.Repeat("1", 1e6), diag.NumberTooLarge},
		{"a huge exponent", "let x = 2e999999999", diag.NumberTooLarge},
		{"a huge negative exponent", "let x = 2e-999999999", diag.NumberTooLarge},
		{"an exponent with leading zeros", "let x = 2e" + strings.Repeat("0", 500) + "1", ""},
		{"many faults", strings.Repeat("let x = $\n", 20000), diag.StrayCharacter},
		{"many open brackets on many lines", strings.Repeat("let x = (\n", 20000), diag.UnclosedBracket},
	} {
		start := time.Now()
		_, list := Parse(diag.NewSource("hostile.act", c.in))
		switch {
		case c.kind == "" && len(list) > 0:
			t.Errorf("%s: %v", c.why, list)
		case c.kind != "" && (len(list) == 0 || list[0].Kind != c.kind):
			t.Errorf("%s: %v, expected %q", c.why, list.Err(), c.kind)
		}
		if d := time.Since(start); d > 10*time.Second {
			t.Errorf("%s: took %v", c.why, d)
		}
	}
}

func TestOneFaultForAStatement(t *testing.T) {
	_, list := Parse(diag.NewSource("many.act", "let x = $ + ) + 2a\nlet y = 1\nlet z = 2b + $\n  + (c\nkeep 3 4\n"))
	var lines []int
	for _, d := range list {
		lines = append(lines, d.Source.Line(d.Span.Start))
	}
	if len(lines) != 3 || lines[0] != 1 || lines[1] != 3 || lines[2] != 5 {
		t.Errorf("faults on lines %v, expected one each on 1, 3 and 5: %v", lines, list)
	}
}
