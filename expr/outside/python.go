// Package outside runs the reference programs that tests compare with.
package outside

import (
	"bytes"
	"os"
	"os/exec"
	"sync"
	"testing"
)

// hasSymPy asks once: the import takes its time.
var hasSymPy = sync.OnceValue(func() error { return exec.Command("python3", "-c", "import sympy").Run() })

// SymPy runs a Python script that uses SymPy, with in as its standard input, and returns its
// output. On a machine without SymPy the test is skipped with that reason; where the
// environment variable CI is set, it fails.
func SymPy(t testing.TB, script string, in []byte) []byte {
	t.Helper()
	if err := hasSymPy(); err != nil {
		if os.Getenv("CI") != "" {
			t.Fatalf("python3 with sympy is needed where CI is set: %v", err)
		}
		t.Skipf("no comparison: python3 with sympy does not run here: %v", err)
	}
	cmd := exec.Command("python3", script)
	cmd.Stdin = bytes.NewReader(in)
	var problems bytes.Buffer
	cmd.Stderr = &problems
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("%s: %v\n%s", script, err, problems.Bytes())
	}
	return out
}
