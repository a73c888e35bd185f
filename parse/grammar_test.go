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

// TestStatementParser drives the statement grammar through its own lexer, without the
// pass that cuts a file into lines.
func TestStatementParser(t *testing.T) {
	s, err := statementParser.ParseString("one.act", "keep ζ = a*u  # a comment")
	if err != nil || s.Keep == nil || s.Keep.Word.Name() != "zeta" || String(s.Keep.Definition.X) != "a*u" {
		t.Errorf("%+v, %v", s, err)
	}
	for _, text := range []string{"", "keep", "keep $", "\x00"} {
		if _, err := statementParser.ParseString("bad.act", text); err == nil {
			t.Errorf("%q is read", text)
		}
	}
}

// wrapped puts a sentence of a production into a statement.
var wrapped = map[string]string{
	"File": "%s", "Symbol": "constants %s", "Function": "functions %s", "Argument": "functions f(%s)",
	"Arguments": "let x = f%s",
	"Rule":      "formfactor F(box): %s", "Equation": "numbers %s", "Target": "let x = box%s", "ItemTarget": "numbers x = box%s",
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
		src := diag.NewSource("example.act", fmt.Sprintf(form, x.Text))
		if _, list := Parse(src); len(list) > 0 {
			t.Errorf("%s: %v", x.Production, list)
		}
		checkDerivable(t, g, src)
		if r := recognise(g, x.Production, tokensOf(diag.NewSource("example.act", x.Text))); !r {
			t.Errorf("%s: %q is no sentence of it", x.Production, x.Text)
		}
	}
	for name := range g {
		if name[0] < 'a' && !have[name] {
			t.Errorf("no example for %s", name)
		}
	}
}

// recogniser decides whether tokens are a sentence of the grammar: for each node and place
// it finds all places where the node may end.
type recogniser struct {
	g      ebnf.Grammar
	tokens []string // class and text, such as "name zeta"
	memo   map[nodeAt]map[int]bool
}

type nodeAt struct {
	x  ebnf.Expression
	at int
}

func recognise(g ebnf.Grammar, production string, tokens []string) bool {
	r := &recogniser{g, tokens, map[nodeAt]map[int]bool{}}
	return r.ends(g[production].Expr, 0)[len(tokens)]
}

func (r *recogniser) ends(x ebnf.Expression, at int) map[int]bool {
	switch n := x.(type) {
	case ebnf.Alternative:
		all := map[int]bool{}
		for _, y := range n {
			r.join(all, r.ends(y, at))
		}
		return all
	case ebnf.Sequence:
		all := map[int]bool{at: true}
		for _, y := range n {
			next := map[int]bool{}
			for i := range all {
				r.join(next, r.ends(y, i))
			}
			all = next
		}
		return all
	case *ebnf.Name:
		if n.String[0] >= 'a' {
			return r.token(at, n.String+" ")
		}
		key := nodeAt{r.g[n.String], at}
		if r.memo[key] == nil {
			r.memo[key] = r.ends(r.g[n.String].Expr, at)
		}
		return r.memo[key]
	case *ebnf.Token:
		if at < len(r.tokens) && strings.HasSuffix(r.tokens[at], " "+n.String) {
			return map[int]bool{at + 1: true}
		}
		return nil
	case *ebnf.Group:
		return r.ends(n.Body, at)
	case *ebnf.Option:
		all := map[int]bool{at: true}
		r.join(all, r.ends(n.Body, at))
		return all
	case *ebnf.Repetition:
		all, open := map[int]bool{at: true}, []int{at}
		for ; len(open) > 0; open = open[1:] {
			for i := range r.ends(n.Body, open[0]) {
				if !all[i] {
					all[i] = true
					open = append(open, i)
				}
			}
		}
		return all
	}
	panic(fmt.Sprintf("unknown node %T of the grammar", x))
}

func (r *recogniser) join(all, more map[int]bool) {
	for i := range more {
		all[i] = true
	}
}

// token matches a token of a class; a whole number is a number too.
func (r *recogniser) token(at int, class string) map[int]bool {
	if at < len(r.tokens) && (strings.HasPrefix(r.tokens[at], class) || class == "number " && strings.HasPrefix(r.tokens[at], "whole ")) {
		return map[int]bool{at + 1: true}
	}
	return nil
}

// tokensOf lists the tokens of a text with the classes of the grammar.
func tokensOf(src *diag.Source) []string {
	s := &scanner{src: src}
	s.scan()
	var list []string
	for i, l := range s.lines {
		for _, tok := range l.tokens {
			text := tok.Value
			switch tok.Type {
			case tokenName:
				text = "name " + Canonical(text)
			case tokenString:
				text = "title " + text
			case tokenNumber:
				class := "number "
				if strings.Trim(text, "0123456789") == "" {
					class = "whole "
				}
				text = class + text
			case tokenMark:
				text = "mark " + canonicalMark(text)
			}
			list = append(list, text)
		}
		if i < len(s.lines)-1 || strings.HasSuffix(src.Text, "\n") {
			list = append(list, "line_end ")
		}
	}
	return list
}

// checkDerivable expects every line of a file that parses to be a sentence of the grammar.
func checkDerivable(t *testing.T, g ebnf.Grammar, src *diag.Source) {
	t.Helper()
	s := &scanner{src: src}
	s.scan()
	for _, l := range s.lines {
		line := src.Slice(l.span())
		if !recognise(g, "Statement", tokensOf(diag.NewSource(src.Name, line))) {
			t.Errorf("%s: this parses and is no sentence of the grammar:\n%s", src.Name, line)
		}
	}
}

func TestShippedFilesAreDerivable(t *testing.T) {
	g := readGrammar(t)
	for _, name := range shippedFiles(t) {
		checkDerivable(t, g, readSource(t, name))
	}
	chunks, err := filepath.Glob("testdata/errors/*.act")
	if err != nil {
		t.Fatal(err)
	}
	for _, name := range chunks { // what only later passes refuse is in the grammar too
		for _, text := range strings.Split(readSource(t, name).Text, "---\n") {
			src := diag.NewSource(name, text)
			if _, list := Parse(src); len(list) == 0 {
				checkDerivable(t, g, src)
			}
		}
	}
	if recognise(g, "Statement", tokensOf(diag.NewSource("x", "let x = a^2'"))) {
		t.Error("the grammar lets a prime follow a number")
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
