package parse

import (
	"math/big"
	"strings"
	"testing"

	"github.com/alecthomas/participle/v2/lexer"
	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"

	"remnant/parse/diag"
)

// sameTree compares trees without places.
var sameTree = cmp.Options{
	cmpopts.IgnoreTypes(diag.Span{}, lexer.Position{}, node{}),
	cmp.Comparer(func(a, b *big.Rat) bool { return a.Cmp(b) == 0 }),
}

// checkLayout lays a file out and expects the same tree, the same comments and, from a
// second pass, the same text.
func checkLayout(t *testing.T, file *File) string {
	t.Helper()
	text := Format(file)
	again, list := Parse(diag.NewSource(file.Source.Name, text))
	if len(list) > 0 {
		t.Fatalf("the layout of\n%s\ndoes not parse: %v\n%s", file.Source.Text, list, text)
	}
	if diff := cmp.Diff(file.Statements, again.Statements, sameTree); diff != "" {
		t.Fatalf("the layout of\n%s\nis another text:\n%s\n%s", file.Source.Text, text, diff)
	}
	if a, b := comments(file), comments(again); a != b {
		t.Fatalf("the layout of\n%s\nchanges the comments:\n%s\nfrom %q to %q", file.Source.Text, text, a, b)
	}
	if twice := Format(again); twice != text {
		t.Fatalf("a second layout differs:\n%s", cmp.Diff(text, twice))
	}
	return text
}

func comments(f *File) string {
	var b strings.Builder
	for _, c := range f.Comments {
		b.WriteString(c.Text + "\n")
	}
	return b.String()
}

func TestLayoutOfShippedModels(t *testing.T) {
	for _, name := range shippedFiles(t) {
		file, list := Parse(readSource(t, name))
		if len(list) > 0 {
			t.Errorf("%s: %v", name, list)
			continue
		}
		if text := checkLayout(t, file); text != file.Source.Text {
			t.Errorf("%s is not in its standard layout:\n%s", name, cmp.Diff(file.Source.Text, text))
		}
	}
}

func TestLayout(t *testing.T) {
	for _, c := range []struct{ why, in, want string }{
		{"marks are spaced, brackets are tight",
			"let  x=( a+b )*c -  d/ e", "let x = (a + b)*c - d/e\n"},
		{"names and numbers stay as typed; signs become ASCII",
			"let x = ½·ζ′ − 2e-5×□[u]", "let x = ½*ζ' - 2e-5*□[u]\n"},
		{"the root sign becomes the function",
			"let x = √2*√(1+a)", "let x = sqrt(2)*sqrt(1 + a)\n"},
		{"of several blank lines one is kept, none at either end",
			"\n\nclock cosmic\n\n\n\nkeep u\n\n", "clock cosmic\n\nkeep u\n"},
		{"comments between statements go to column 1, those of neighbours are aligned",
			"   # one\nclock cosmic # two\nkeep zeta_long # three\n", "# one\nclock cosmic    # two\nkeep zeta_long  # three\n"},
		{"a comment in a sum stays with its term",
			"let x = a + # first\n  # own line\n  b # last\n", "let x =\n    a  # first\n    # own line\n  + b  # last\n"},
		{"a comment before the first term",
			"let x = # why\n  a", "let x =  # why\n    a\n"},
		{"a list with comments has one item on a line",
			"constants M > 0, # mass\n  n", "constants\n    M > 0,  # mass\n    n\n"},
		{"a long list is filled",
			"fields " + strings.Repeat("abcdefghi, ", 9) + "z",
			"fields abcdefghi, abcdefghi, abcdefghi, abcdefghi, abcdefghi, abcdefghi, abcdefghi,\n    abcdefghi, abcdefghi, z\n"},
		{"a comment within a statement without parts",
			"keep # this\n  zeta", "keep zeta  # this\n"},
		{"a byte order mark and DOS line ends are no text",
			"\ufeffclock cosmic\r\nkeep u # x\r\n", "clock cosmic\nkeep u  # x\n"},
		{"functions, form factors, small, numbers",
			"functions P( phi,X(phi) ),V(phi)=phi^2\nformfactor F(box):F.n=1/(2*n+1)!\nformfactor G( □ )\nsmall eps,eta  to  order 2\nnumbers phi'(0)=-1/10^6,M=1",
			"functions P(phi, X(phi)), V(phi) = phi^2\nformfactor F(box): F.n = 1/(2*n + 1)!\nformfactor G(□)\nsmall eps, eta to order 2\nnumbers phi'(0) = -1/10^6, M = 1\n"},
	} {
		file, list := Parse(diag.NewSource("layout.act", c.in))
		if len(list) > 0 {
			t.Errorf("%s: %v", c.why, list)
			continue
		}
		if got := checkLayout(t, file); got != c.want {
			t.Errorf("%s:\n%s", c.why, cmp.Diff(c.want, got))
		}
	}
}

func TestLongTermsAreBroken(t *testing.T) {
	long := "let x = a*(" + strings.Repeat("bbbbbbbbbb*ccccccccc + ", 12) + "d) + e"
	file, list := Parse(diag.NewSource("long.act", long))
	if len(list) > 0 {
		t.Fatal(list)
	}
	for line := range strings.Lines(checkLayout(t, file)) {
		if len(line) > layoutWidth+1 {
			t.Errorf("a line of %d characters: %s", len(line)-1, line)
		}
	}
}
