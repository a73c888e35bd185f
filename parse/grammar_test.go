package parse

import (
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf8"

	"golang.org/x/exp/ebnf"

	"remnant/parse/diag"
)

func readGrammar(t *testing.T) ebnf.Grammar {
	t.Helper()
	g, err := ebnf.Parse("grammar.ebnf", strings.NewReader(Grammar()))
	if err != nil {
		t.Fatal(err)
	}
	if err := ebnf.Verify(g, "File"); err != nil {
		t.Fatal(err)
	}
	return g
}

// sentence derives a random text from a production. Beyond some depth every choice is
// the shortest one, so that it ends.
type sentence struct {
	g   ebnf.Grammar
	rng *rand.Rand
	out strings.Builder
}

func (s *sentence) derive(x ebnf.Expression, depth int, lexical bool) {
	switch n := x.(type) {
	case ebnf.Alternative:
		s.derive(s.choose(n, depth), depth+1, lexical)
	case ebnf.Sequence:
		for _, y := range n {
			s.derive(y, depth+1, lexical)
		}
	case *ebnf.Name:
		lower := n.String[0] >= 'a'
		s.derive(s.g[n.String].Expr, depth+1, lower)
		if lower && !lexical && n.String != "line_end" {
			s.out.WriteByte(' ')
		}
	case *ebnf.Token:
		s.out.WriteString(n.String)
		if last, _ := utf8.DecodeLastRuneInString(n.String); !lexical && isNamePart(last) {
			s.out.WriteByte(' ')
		}
	case *ebnf.Range:
		lo, _ := utf8.DecodeRuneInString(n.Begin.String)
		hi, _ := utf8.DecodeRuneInString(n.End.String)
		s.out.WriteRune(lo + rune(s.rng.IntN(int(hi-lo)+1)))
	case *ebnf.Group:
		s.derive(n.Body, depth+1, lexical)
	case *ebnf.Option:
		if depth < 40 && s.rng.IntN(2) == 0 {
			s.derive(n.Body, depth+1, lexical)
		}
	case *ebnf.Repetition:
		for depth < 40 && s.rng.IntN(3) == 0 {
			s.derive(n.Body, depth+1, lexical)
		}
	default:
		panic(fmt.Sprintf("unknown node %T of the grammar", x))
	}
}

// choose picks an alternative; deep down the first, which in this grammar never recurses.
func (s *sentence) choose(n ebnf.Alternative, depth int) ebnf.Expression {
	if depth > 40 {
		return n[0]
	}
	return n[s.rng.IntN(len(n))]
}

// refusedByLimit tells sentences that only a limit refuses: that on a numeral's exponent.
func refusedByLimit(list diag.List) bool {
	for _, d := range list {
		if d.Kind != diag.NumberTooLarge {
			return false
		}
	}
	return len(list) > 0
}

func TestRandomSentencesParse(t *testing.T) {
	g := readGrammar(t)
	for seed := range uint64(400) {
		s := &sentence{g: g, rng: rand.New(rand.NewPCG(seed, 1))}
		s.derive(g["Statement"].Expr, 0, false)
		text := s.out.String()
		file, list := Parse(diag.NewSource("sentence.act", text))
		if len(list) > 0 {
			if refusedByLimit(list) {
				continue
			}
			var b strings.Builder
			diag.Render(&b, list)
			t.Fatalf("seed %d: a sentence of the grammar does not parse:\n%s\n%s", seed, text, b.String())
		}
		checkLayout(t, file)
	}
}

// wrapped puts a sentence of a production into a statement.
var wrapped = map[string]string{
	"File": "%s", "Symbol": "constants %s", "Function": "functions %s", "Argument": "functions f(%s)",
	"Rule": "formfactor F(box): %s", "Equation": "numbers %s", "Target": "let x = box%s", "ItemTarget": "numbers x = box%s",
	"Suffix": "let x = u%s", "ItemSuffix": "numbers x = u%s", "Exponent": "let x = 2^%s", "ItemExponent": "numbers x = 2^%s",
}

func TestExamplesParse(t *testing.T) {
	g := readGrammar(t)
	have := map[string]bool{}
	for _, x := range Examples() {
		have[x.Production] = true
		if g[x.Production] == nil {
			t.Errorf("an example for %s, which is no production", x.Production)
		}
		form := wrapped[x.Production]
		switch {
		case form != "":
		case strings.HasPrefix(x.Production, "Item"):
			form = "numbers x = %s"
		case strings.Contains("Sum Product Signed Power Postfix Primary", x.Production):
			form = "let x = %s"
		default:
			form = "%s"
		}
		if _, list := Parse(diag.NewSource("example.act", fmt.Sprintf(form, x.Text))); len(list) > 0 {
			t.Errorf("%s: %v", x.Production, list)
		}
	}
	for name := range g {
		if name[0] < 'a' && !have[name] {
			t.Errorf("no example for %s", name)
		}
	}
}

func shippedFiles(t testing.TB) []string {
	t.Helper()
	files, err := filepath.Glob("../testdata/*.act")
	if err != nil || len(files) == 0 {
		t.Fatal("no shipped models found", err)
	}
	return files
}

func readSource(t testing.TB, name string) *diag.Source {
	t.Helper()
	text, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	return diag.NewSource(filepath.Base(name), string(text))
}
