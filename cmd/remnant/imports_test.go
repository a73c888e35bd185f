package main

// Which package may import which, as data. Imports go one way:
//
//	cmd → reduce → rules → parse → expr,  reduce → series → expr
//
// and expr imports nothing of ours. A new module of others has to be entered here.

import (
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

const module = "remnant"

// layers lists for each part of the tree the parts that it may import beside itself.
var layers = map[string][]string{
	"cmd":    {"reduce", "rules", "parse", "series", "expr"},
	"reduce": {"rules", "parse", "series", "expr"},
	"rules":  {"parse", "expr"},
	"parse":  {"expr"},
	"series": {"expr"},
	"expr":   {},
}

// modules lists the modules of others, with the parts of the tree that may import them; a
// test may import those for "test" too.
var modules = map[string][]string{
	"github.com/alecthomas/participle/v2": {"parse"},
	"github.com/google/go-cmp":            {"test"},
	"github.com/rogpeppe/go-internal":     {"test"},
	"github.com/schollz/progressbar/v3":   {"cmd"},
	"github.com/spf13/cobra":              {"cmd"},
	"golang.org/x/exp":                    {"test"},
	"golang.org/x/term":                   {"cmd"},
	"pgregory.net/rapid":                  {"test"},
}

// generators of random values are libraries for tests, without being test files.
var testSupport = []string{"expr/ringtest", "parse/parsetest"}

func TestImports(t *testing.T) {
	root := filepath.Join("..", "..")
	used := map[string]bool{}
	files := 0
	err := fs.WalkDir(os.DirFS(root), ".", func(name string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if d.IsDir() && name != "." && (strings.HasPrefix(d.Name(), ".") || d.Name() == "testdata") {
			return fs.SkipDir
		}
		if strings.HasSuffix(name, ".go") {
			files++
			checkFile(t, root, name, used)
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if files < 50 {
		t.Errorf("only %d files were looked at", files)
	}
	for m := range modules {
		if !used[m] {
			t.Errorf("module %s is allowed and never used", m)
		}
	}
}

func checkFile(t *testing.T, root, name string, used map[string]bool) {
	t.Helper()
	f, err := parser.ParseFile(token.NewFileSet(), filepath.Join(root, name), nil, parser.ImportsOnly)
	if err != nil {
		t.Error(err)
		return
	}
	own, _, _ := strings.Cut(name, "/")
	isTest := strings.HasSuffix(name, "_test.go") || slices.Contains(testSupport, path.Dir(name))
	for _, spec := range f.Imports {
		target, err := strconv.Unquote(spec.Path.Value)
		if err != nil {
			t.Fatal(err)
		}
		switch first, rest, _ := strings.Cut(target, "/"); {
		case first == module:
			part, _, _ := strings.Cut(rest, "/")
			if part != own && !slices.Contains(layers[own], part) {
				t.Errorf("%s imports %s; %s may import %v", name, target, own, layers[own])
			}
		case strings.Contains(first, "."):
			checkModule(t, name, own, target, isTest, used)
		}
	}
}

func checkModule(t *testing.T, name, own, target string, isTest bool, used map[string]bool) {
	t.Helper()
	for m, parts := range modules {
		if target != m && !strings.HasPrefix(target, m+"/") {
			continue
		}
		used[m] = true
		if !slices.Contains(parts, own) && !(isTest && slices.Contains(parts, "test")) {
			t.Errorf("%s imports %s, which is for %v", name, target, parts)
		}
		return
	}
	t.Errorf("%s imports %s, of a module that is not allowed", name, target)
}
