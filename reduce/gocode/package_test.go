package gocode

import (
	"bytes"
	"context"
	"errors"
	"go/format"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"remnant/expr/budget"
	"remnant/parse"
	"remnant/parse/diag"
	"remnant/reduce"
)

// generated reduces a model and writes its package.
func generated(t *testing.T, name, text string) *Package {
	t.Helper()
	m, err := parse.Load(diag.NewSource(name, text), nil)
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	r, err := reduce.Reduce(m)
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	p, err := Generate(r)
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	return p
}

// withoutCode lists the shipped models that leave nothing to generate, with the reason.
var withoutCode = map[string]string{
	"wagtail.act":     "nothing propagates",
	"siskin.act":      "a form factor",
	"siskin-flat.act": "a form factor",
}

// functionsModel has roots and elementary functions in its coefficients.
const functionsModel = `model "Fieldfare: roots and functions"
constants M > 0, lambda > 0
background a, phi, eps > 0
functions V(phi)
fields u
lagrangian quadratic = a^3*sqrt(1 + eps)*exp(-lambda*phi/M)*u'^2/2 - a*cos(phi/M)^2*u,i*u,i/2 - a^3*(tanh(phi) + log(1 + phi^2) + pi*sin(phi) + V,phi,phi)*u^2/2
keep u
`

// fourthModel has an equation of motion of fourth order, with names that meet in Go.
const fourthModel = `model "Snipe: an oscillator of fourth order with a gradient"
constants m > 0, M > 0
background a
fields x
lagrangian quadratic = x''^2/(2*M^2) - (1 + m^2)*x'^2/2 + m^2*x^2/2 + a*x,i*x,i/2
keep x
`

// TestGeneratedPackages generates every shipped model and runs what was generated.
func TestGeneratedPackages(t *testing.T) {
	files, err := filepath.Glob("../../testdata/*.act")
	if err != nil || len(files) == 0 {
		t.Fatalf("no shipped models: %v", err)
	}
	root := t.TempDir()
	write(t, filepath.Join(root, "go.mod"), []byte("module generated\n\ngo 1.21\n"))
	add := func(name, text string) {
		p := generated(t, name, text)
		checkFormat(t, p)
		if again := generated(t, name, text); !samePackage(p, again) {
			t.Errorf("%s: a second run writes other bytes", name)
		}
		for _, f := range p.Files {
			if f.Name != "go.mod" {
				write(t, filepath.Join(root, strings.TrimSuffix(name, ".act"), f.Name), f.Data)
			}
		}
	}
	for _, file := range files {
		name := filepath.Base(file)
		text, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		if _, without := withoutCode[name]; !without {
			add(name, string(text))
		}
	}
	add("fieldfare.act", functionsModel)
	add("fourth.act", fourthModel)
	runGo(t, root, "vet", "./...")
	runGo(t, root, "test", "-vet=off", "-ldflags=-s -w", "./...")
}

// TestOwnModule: a package passes its own test where it stands alone.
func TestOwnModule(t *testing.T) {
	text, err := os.ReadFile("../../testdata/plover.act")
	if err != nil {
		t.Fatal(err)
	}
	p := generated(t, "plover.act", string(text))
	if p.Name != "plover" {
		t.Errorf("the package is called %q", p.Name)
	}
	dir := t.TempDir()
	for _, f := range p.Files {
		write(t, filepath.Join(dir, f.Name), f.Data)
	}
	runGo(t, dir, "test", "-vet=off", ".")
}

// TestOwnTestFails: the generated test notices a wrong coefficient.
func TestOwnTestFails(t *testing.T) {
	text, err := os.ReadFile("../../testdata/plover.act")
	if err != nil {
		t.Fatal(err)
	}
	p := generated(t, "plover.act", string(text))
	dir := t.TempDir()
	for _, f := range p.Files {
		if f.Name == "model.go" {
			wrong := bytes.Replace(f.Data, []byte("return 2 *"), []byte("return 2.0000000000001 *"), 1)
			if bytes.Equal(wrong, f.Data) {
				t.Fatalf("nothing to spoil in\n%s", f.Data)
			}
			f.Data = wrong
		}
		write(t, filepath.Join(dir, f.Name), f.Data)
	}
	if out, err := goCommand(dir, "test", "-vet=off", ".").CombinedOutput(); err == nil || !bytes.Contains(out, []byte("within")) {
		t.Errorf("a wrong factor passes: %v\n%s", err, out)
	}
}

func TestNothingToWrite(t *testing.T) {
	text, err := os.ReadFile("../../testdata/wagtail.act")
	if err != nil {
		t.Fatal(err)
	}
	m, err := parse.Load(diag.NewSource("wagtail.act", string(text)), nil)
	if err != nil {
		t.Fatal(err)
	}
	r, err := reduce.Reduce(m)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := Generate(r); err == nil || !strings.Contains(err.Error(), "nothing propagates") {
		t.Errorf("err = %v", err)
	}
}

// TestGenerateIsBounded: an interrupted run ends with an error and no package.
func TestGenerateIsBounded(t *testing.T) {
	text, err := os.ReadFile("../../testdata/curlew.act")
	if err != nil {
		t.Fatal(err)
	}
	m, err := parse.Load(diag.NewSource("curlew.act", string(text)), nil)
	if err != nil {
		t.Fatal(err)
	}
	r, err := reduce.Reduce(m)
	if err != nil {
		t.Fatal(err)
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	m.K.SetBudget(budget.New(ctx, 0))
	var stop *budget.Stop
	if p, err := Generate(r); !errors.As(err, &stop) || p != nil {
		t.Errorf("package %v, error %v", p, err)
	} else if stop.Stage != "writing Go code" {
		t.Errorf("stopped while %s", stop.Stage)
	}
}

func TestPackageName(t *testing.T) {
	tests := []struct{ title, want, why string }{
		{"Plover: two auxiliary fields", "plover", "what stands before the colon"},
		{"Little Ringed Plover", "littleringedplover", "blanks go"},
		{"3 Plovers", "plovers", "no digit leads"},
		{"func: a word of the language", "model", "a keyword"},
		{"Grünfink", "grnfink", "letters of Go's file systems only"},
		{"", "model", "no title"},
	}
	for _, tt := range tests {
		if got := PackageName(tt.title); got != tt.want {
			t.Errorf("PackageName(%q) = %q, want %q: %s", tt.title, got, tt.want, tt.why)
		}
	}
}

func checkFormat(t *testing.T, p *Package) {
	t.Helper()
	for _, f := range p.Files {
		if !strings.HasSuffix(f.Name, ".go") {
			continue
		}
		formatted, err := format.Source(f.Data)
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(formatted, f.Data) {
			t.Errorf("%s/%s is not formatted", p.Name, f.Name)
		}
	}
}

func samePackage(a, b *Package) bool {
	return a.Name == b.Name && slices.EqualFunc(a.Files, b.Files, func(x, y File) bool {
		return x.Name == y.Name && bytes.Equal(x.Data, y.Data)
	})
}

func write(t *testing.T, path string, data []byte) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, data, 0o644); err != nil {
		t.Fatal(err)
	}
}

func goCommand(dir string, args ...string) *exec.Cmd {
	cmd := exec.Command("go", args...)
	cmd.Dir = dir
	cmd.Env = append(os.Environ(), "GOFLAGS=", "GOWORK=off", "GOPROXY=off", "GOTOOLCHAIN=local")
	return cmd
}

func runGo(t *testing.T, dir string, args ...string) {
	t.Helper()
	if out, err := goCommand(dir, args...).CombinedOutput(); err != nil {
		t.Errorf("go %s: %v\n%s", strings.Join(args, " "), err, out)
	}
}
