package diag

import (
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

// find returns the span of the n-th occurrence of piece, from 0.
func find(s *Source, piece string, n int) Span {
	start := 0
	for ; n > 0; n-- {
		start += strings.Index(s.Text[start:], piece) + len(piece)
	}
	start += strings.Index(s.Text[start:], piece)
	return Span{start, start + len(piece)}
}

func TestRender(t *testing.T) {
	for _, c := range []struct{ why, text, at, want string }{
		{"the form of the manual", "\n\n\n\n\n\n\n\n  + a*( zeta,i*zeta,q )\n", "q",
			"x.act:9:21: wrong\n   9 |   + a*( zeta,i*zeta,q )\n     |                     ^ hint\n"},
		{"Greek letters and symbols take one column", "ζ'' + □ + !\n", "!",
			"x.act:1:11: wrong\n   1 | ζ'' + □ + !\n     |           ^ hint\n"},
		{"a tab stays a tab", "\tx\t!\n", "!",
			"x.act:1:4: wrong\n   1 | \tx\t!\n     | \t \t^ hint\n"},
		{"a combining mark takes no column", "e\u0301 !\n", "!",
			"x.act:1:3: wrong\n   1 | e\u0301 !\n     |   ^ hint\n"},
		{"a wide character takes two columns and counts once", "# 漢 !\n", "!",
			"x.act:1:5: wrong\n   1 | # 漢 !\n     |      ^ hint\n"},
		{"the end of the file", "abc", "",
			"x.act:1:4: wrong\n   1 | abc\n     |    ^ hint\n"},
		{"the end of a file that ends with its line", "abc\n", "",
			"x.act:2:1: wrong\n   2 | \n     | ^ hint\n"},
		{"DOS line ends are not drawn", "a !\r\nb\r\n", "!",
			"x.act:1:3: wrong\n   1 | a !\n     |   ^ hint\n"},
		{"a control character is not sent to the terminal", "\x1b[2J !\n", "!",
			"x.act:1:6: wrong\n   1 | \ufffd[2J !\n     |      ^ hint\n"},
	} {
		s := NewSource("x.act", c.text)
		at := Span{len(c.text), len(c.text)}
		if c.at != "" {
			at = find(s, c.at, 0)
		}
		var b strings.Builder
		if err := Render(&b, List{{Source: s, Span: at, Summary: "wrong", Hint: "hint"}}); err != nil {
			t.Fatal(err)
		}
		if diff := cmp.Diff(c.want, b.String()); diff != "" {
			t.Errorf("%s:\n%s", c.why, diff)
		}
	}
}

func TestRenderRelatedPlaces(t *testing.T) {
	s := NewSource("x.act", "one\ntwo\n")
	var b strings.Builder
	d := Diagnostic{Source: s, Span: find(s, "two", 0), Summary: "wrong", Related: []Related{{find(s, "one", 0), "see here"}}}
	if err := Render(&b, List{d}); err != nil {
		t.Fatal(err)
	}
	want := "x.act:2:1: wrong\n   2 | two\n     | ^\n   1 | one\n     | ^ see here\n"
	if diff := cmp.Diff(want, b.String()); diff != "" {
		t.Error(diff)
	}
}

func TestLongLinesAreShortened(t *testing.T) {
	s := NewSource("x.act", strings.Repeat("a", 100000)+"!"+strings.Repeat("b", 100000))
	var b strings.Builder
	if err := Render(&b, List{{Source: s, Span: find(s, "!", 0), Summary: "wrong"}}); err != nil {
		t.Fatal(err)
	}
	lines := strings.Split(b.String(), "\n")
	if len(b.String()) > 1000 {
		t.Errorf("%d bytes are drawn", len(b.String()))
	}
	if at := []rune(lines[1])[strings.Index(lines[2], "^")]; at != '!' {
		t.Errorf("the caret stands under %c", at)
	}
}

func TestPositionAndLines(t *testing.T) {
	s := NewSource("x.act", "ab\n\ncd")
	for _, c := range []struct{ offset, line, column int }{{0, 1, 1}, {2, 1, 3}, {3, 2, 1}, {4, 3, 1}, {6, 3, 3}, {99, 3, 3}} {
		if line, column := s.Position(c.offset); line != c.line || column != c.column {
			t.Errorf("byte %d is at %d:%d, expected %d:%d", c.offset, line, column, c.line, c.column)
		}
	}
}

func TestListIsAnError(t *testing.T) {
	s := NewSource("x.act", "ab\ncd\n")
	list := List{{Source: s, Span: Span{3, 4}, Summary: "second"}, {Source: s, Span: Span{0, 1}, Summary: "first"}}
	list.Sort()
	if got, want := list.Err().Error(), "x.act:1:1: first (and 1 more)"; got != want {
		t.Errorf("%q, expected %q", got, want)
	}
	if List(nil).Err() != nil {
		t.Error("an empty list is an error")
	}
}
