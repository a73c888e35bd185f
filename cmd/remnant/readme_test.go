package main

// What README.md and DEVELOPERS.md promise: the page shown is the page printed, and every
// source cited in a doc comment stands in the bibliography.

import (
	"bytes"
	"io/fs"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

func readFile(t *testing.T, name string) string {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "..", name))
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

// The pages and models that README.md shows are those that are printed and shipped.
func TestReadmeShowsThePages(t *testing.T) {
	readme := readFile(t, "README.md")
	for _, page := range []struct{ command, model string }{{"reduce", "plover.act"}, {"expand", "kestrel.act"}} {
		var out, errs bytes.Buffer
		path := filepath.Join("..", "..", "testdata", page.model)
		if got := run([]string{page.command, path}, streams{in: strings.NewReader(""), out: &out, err: &errs}); got != statusDone {
			t.Fatalf("exit status %d: %s", got, errs.String())
		}
		if !strings.Contains(readme, "```\n"+out.String()+"```\n") {
			t.Errorf("README.md does not show what is printed:\n%s", out.String())
		}
		block := "```\n" + regexp.MustCompile(` +#.*`).ReplaceAllString(readFile(t, filepath.Join("testdata", page.model)), "") + "```\n"
		if !strings.Contains(readme, block) {
			t.Errorf("README.md does not show the model without its comments:\n%s", block)
		}
	}
}

func TestCommandsStandInReadme(t *testing.T) {
	readme := readFile(t, "README.md")
	for _, c := range newRoot(streams{}).Commands() {
		if name := c.Name(); name != "version" && !strings.Contains(readme, "`remnant "+name) {
			t.Errorf("README.md does not mention remnant %s", name)
		}
	}
}

var citation = regexp.MustCompile(`\[([A-Z][A-Za-z]*[0-9]{4}[a-z]?)[],]`)

func TestBibliography(t *testing.T) {
	developers := readFile(t, "DEVELOPERS.md")
	cited := map[string]bool{}
	err := fs.WalkDir(os.DirFS(filepath.Join("..", "..")), ".", func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || !strings.HasSuffix(path, ".go") {
			return err
		}
		for _, m := range citation.FindAllStringSubmatch(readFile(t, path), -1) {
			if !cited[m[1]] && !strings.Contains(developers, "\n| "+m[1]+" | ") {
				t.Errorf("%s cites %s, which is not in the bibliography of DEVELOPERS.md", path, m[1])
			}
			cited[m[1]] = true
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if len(cited) < 5 {
		t.Errorf("only %d works are cited", len(cited))
	}
}
