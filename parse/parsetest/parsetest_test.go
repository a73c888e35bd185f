package parsetest

import (
	"testing"

	"github.com/google/go-cmp/cmp"

	"remnant/parse/diag"
)

func TestSplitKeepsLineNumbers(t *testing.T) {
	chunks, err := Split("x.act", "one # ERROR 1 \"a\" 4 \"b c\"\n---\ntwo\nthree # ERROR 2 \"d\"\n")
	if err != nil {
		t.Fatal(err)
	}
	if len(chunks) != 2 {
		t.Fatalf("%d chunks", len(chunks))
	}
	if diff := cmp.Diff([]Want{{1, 1, "a"}, {1, 4, "b c"}}, chunks[0].Wants); diff != "" {
		t.Error(diff)
	}
	if diff := cmp.Diff([]Want{{4, 2, "d"}}, chunks[1].Wants); diff != "" {
		t.Error(diff)
	}
	if text := chunks[1].Source.LineText(3); text != "two" {
		t.Errorf("line 3 is %q", text)
	}
}

func TestMalformedNotesAreRefused(t *testing.T) {
	if _, err := Split("x.act", "one # ERROR 1 a\n"); err == nil {
		t.Error("a note without quotation marks is accepted")
	}
}

// recorder counts the errors of a test that is itself under test.
type recorder struct {
	testing.TB
	errors int
}

func (r *recorder) Helper()               {}
func (r *recorder) Errorf(string, ...any) { r.errors++ }

func TestCheckFindsDifferences(t *testing.T) {
	src := diag.NewSource("x.act", "abc\ndef\n")
	fault := diag.Diagnostic{Source: src, Span: diag.Span{Start: 5, End: 6}, Summary: "a fault", Hint: "a hint"}
	for _, c := range []struct {
		why    string
		wants  []Want
		got    diag.List
		errors int
	}{
		{"as expected", []Want{{2, 2, "fault"}}, diag.List{fault}, 0},
		{"the hint counts too", []Want{{2, 2, "hint"}}, diag.List{fault}, 0},
		{"another column", []Want{{2, 1, "fault"}}, diag.List{fault}, 1},
		{"another text", []Want{{2, 2, "fate"}}, diag.List{fault}, 1},
		{"one too few", []Want{{2, 2, "fault"}, {2, 3, "x"}}, diag.List{fault}, 1},
		{"one too many", nil, diag.List{fault}, 1},
	} {
		r := &recorder{TB: t}
		Check(r, Chunk{src, c.wants}, c.got)
		if r.errors != c.errors {
			t.Errorf("%s: %d errors, expected %d", c.why, r.errors, c.errors)
		}
	}
}
