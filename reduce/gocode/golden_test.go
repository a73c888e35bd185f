package gocode

import (
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/rogpeppe/go-internal/txtar"
)

var update = flag.Bool("update", false, "write the golden files anew")

// TestGolden compares generated packages with those stored in testdata: the section
// input.act is the model, the others are the files that it gives, the test file left out.
func TestGolden(t *testing.T) {
	entries, err := os.ReadDir("testdata")
	if err != nil || len(entries) == 0 {
		t.Fatalf("no golden files: %v", err)
	}
	for _, entry := range entries {
		path := filepath.Join("testdata", entry.Name())
		if filepath.Ext(path) != ".txtar" {
			t.Errorf("%s is read by no test", path)
			continue
		}
		t.Run(strings.TrimSuffix(entry.Name(), ".txtar"), func(t *testing.T) {
			ar, err := txtar.ParseFile(path)
			if err != nil {
				t.Fatal(err)
			}
			if len(ar.Comment) == 0 || len(ar.Files) == 0 || ar.Files[0].Name != "input.act" {
				t.Fatalf("%s does not begin with its reason and input.act", path)
			}
			want := ar.Files[1:]
			var got []txtar.File
			for _, f := range generated(t, entry.Name(), string(ar.Files[0].Data)).Files {
				if !strings.HasSuffix(f.Name, "_test.go") {
					got = append(got, txtar.File{Name: f.Name, Data: f.Data})
				}
			}
			if *update {
				ar.Files = append(ar.Files[:1:1], got...)
				if err := os.WriteFile(path, txtar.Format(ar), 0o644); err != nil {
					t.Fatal(err)
				}
				return
			}
			if diff := cmp.Diff(want, got); diff != "" {
				t.Errorf("-want +got:\n%s", diff)
			}
		})
	}
}
