package main

// The commands as scripts: testdata/script/*.txtar hold files, command lines, and what is
// expected on standard output and standard error, of the exit status, and of files left.

import (
	"bytes"
	"errors"
	"io"
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/rogpeppe/go-internal/testscript"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"remnant": main})
}

func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 filepath.Join("testdata", "script"),
		RequireExplicitExec: true,
		RequireUniqueNames:  true,
		UpdateScripts:       os.Getenv("UPDATE_SCRIPTS") != "" && os.Getenv("CI") == "",
		Setup:               shippedModels,
		Condition:           condition,
		Cmds: map[string]func(*testscript.TestScript, bool, []string){
			"status":    status,
			"interrupt": interrupt,
			"onlyfiles": onlyFiles,
			"repeat":    repeat,
			"binary":    binaryFile,
		},
	})
}

// condition knows [root]: permissions do not bind the user.
func condition(name string) (bool, error) {
	if name == "root" {
		return os.Getuid() == 0, nil
	}
	return false, errors.New("unknown condition " + name)
}

// shippedModels puts the models of the project beside the files of a script.
func shippedModels(env *testscript.Env) error {
	models, err := filepath.Glob(filepath.Join("..", "..", "testdata", "*.act"))
	if err != nil {
		return err
	}
	dir := filepath.Join(env.WorkDir, "shipped")
	if err := os.Mkdir(dir, 0o777); err != nil {
		return err
	}
	for _, m := range models {
		data, err := os.ReadFile(m)
		if err != nil {
			return err
		}
		if err := os.WriteFile(filepath.Join(dir, filepath.Base(m)), data, 0o666); err != nil {
			return err
		}
	}
	env.Setenv("NO_COLOR", "1")
	return nil
}

// status N COMMAND… runs a command that must end with exit status N.
func status(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: status N command…")
	}
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	if got := exitStatus(ts, ts.Exec(args[1], args[2:]...)); got != want {
		ts.Fatalf("exit status %d, want %d", got, want)
	}
}

func exitStatus(ts *testscript.TestScript, err error) int {
	var exit *exec.ExitError
	switch {
	case err == nil:
		return 0
	case errors.As(err, &exit):
		return exit.ExitCode()
	}
	ts.Fatalf("%v", err)
	return -1
}

// interrupt N COMMAND… starts a command, sends it an interrupt once it has had time to
// start its work, and expects exit status N. Its standard error becomes a file "interrupted".
func interrupt(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: interrupt N command…")
	}
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	program, err := lookIn(ts.Getenv("PATH"), args[1])
	ts.Check(err)
	cmd := exec.Command(program, args[2:]...)
	cmd.Dir = ts.MkAbs(".")
	var stderr, stdout bytes.Buffer
	cmd.Stderr, cmd.Stdout = &stderr, &stdout
	input, err := cmd.StdinPipe() // open as long as the command runs
	ts.Check(err)
	defer input.Close()
	ts.Check(cmd.Start())
	time.Sleep(time.Second)
	ts.Check(cmd.Process.Signal(os.Interrupt))
	if got := exitStatus(ts, cmd.Wait()); got != want {
		ts.Fatalf("exit status %d, want %d\n%s", got, want, stderr.String())
	}
	if stdout.Len() > 0 {
		ts.Fatalf("standard output is not empty: %s", stdout.String())
	}
	ts.Check(os.WriteFile(ts.MkAbs("interrupted"), stderr.Bytes(), 0o666))
}

func lookIn(path, program string) (string, error) {
	for _, dir := range filepath.SplitList(path) {
		full := filepath.Join(dir, program)
		if info, err := os.Stat(full); err == nil && info.Mode()&0o111 != 0 {
			return full, nil
		}
	}
	return "", exec.ErrNotFound
}

// onlyfiles DIR NAME… expects exactly these entries in a folder, so that nothing
// half-written is left.
func onlyFiles(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 1 {
		ts.Fatalf("usage: onlyfiles dir name…")
	}
	entries, err := os.ReadDir(ts.MkAbs(args[0]))
	ts.Check(err)
	var names []string
	for _, e := range entries {
		names = append(names, e.Name())
	}
	if got, want := strings.Join(names, " "), strings.Join(args[1:], " "); got != want {
		ts.Fatalf("%s holds %q, want %q", args[0], got, want)
	}
}

// repeat COMMAND… runs a command twice, which must print the same bytes.
func repeat(ts *testscript.TestScript, neg bool, args []string) {
	ts.Check(ts.Exec(args[0], args[1:]...))
	first := ts.ReadFile("stdout")
	ts.Check(ts.Exec(args[0], args[1:]...))
	if first == "" || first != ts.ReadFile("stdout") {
		ts.Fatalf("two runs print unlike results")
	}
}

// binary NAME writes a file that is no text.
func binaryFile(ts *testscript.TestScript, neg bool, args []string) {
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), []byte("\x7fELF\x00\x01\x02"), 0o666))
}

// TestScriptsAreRead fails for a file in testdata that no test reads.
func TestScriptsAreRead(t *testing.T) {
	err := filepath.WalkDir("testdata", func(path string, d fs.DirEntry, err error) error {
		if err == nil && !d.IsDir() && (filepath.Ext(path) != ".txtar" || filepath.Dir(path) != filepath.Join("testdata", "script")) {
			t.Errorf("no test reads %s", path)
		}
		return err
	})
	if err != nil {
		t.Error(err)
	}
}

// TestInternalFault makes the program fail inside, by a writer that panics.
func TestInternalFault(t *testing.T) {
	var stderr bytes.Buffer
	got := run([]string{"version"}, streams{in: strings.NewReader(""), out: panicking{}, err: &stderr})
	if got != statusInternal {
		t.Errorf("exit status %d, want %d", got, statusInternal)
	}
	if !strings.Contains(stderr.String(), "please report it together with the model") {
		t.Errorf("standard error: %s", stderr.String())
	}
}

type panicking struct{}

func (panicking) Write([]byte) (int, error) { panic("out of ink") }

// TestBrokenOutput reports a standard output that cannot be written.
func TestBrokenOutput(t *testing.T) {
	var stderr bytes.Buffer
	got := run([]string{"version"}, streams{in: strings.NewReader(""), out: failing{}, err: &stderr})
	if got != statusRefused || !strings.Contains(stderr.String(), "cannot write to standard output: "+io.ErrShortWrite.Error()) {
		t.Errorf("exit status %d, standard error: %s", got, stderr.String())
	}
}

type failing struct{}

func (failing) Write([]byte) (int, error) { return 0, io.ErrShortWrite }
