package parsetest

import (
	"os"
	"regexp"
	"strings"
	"testing"

	"remnant/parse/diag"
)

// KindExample is the smallest example of a refusal, from the comment of its kind.
type KindExample struct {
	Name string
	Kind diag.Kind
	Text string // a model that is refused for that kind
}

var kindComment = regexp.MustCompile(`(?m)^\t// (\w+): .*\n(?:\t// .*\n)*\t//\n\t// Example:\n((?:\t//\t.*\n)+)\t\w+ +diag\.Kind = "([^"]+)"`)

// KindExamples reads the examples in the comments of the kinds that a Go file declares. There
// must be as many as want says.
func KindExamples(t testing.TB, file string, want int) []KindExample {
	t.Helper()
	text, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	var out []KindExample
	for _, f := range kindComment.FindAllStringSubmatch(string(text), -1) {
		out = append(out, KindExample{f[1], diag.Kind(f[3]), strings.ReplaceAll(f[2], "\t//\t", "")})
	}
	if len(out) != want {
		t.Fatalf("%s holds %d examples, want %d", file, len(out), want)
	}
	return out
}
