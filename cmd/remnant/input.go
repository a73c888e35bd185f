package main

// Reading files: models, and points for --at.

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"strings"

	"remnant/expr/budget"
	"remnant/parse/diag"
)

// maxInput bounds what is read of one file. It is far above the size that the notation
// accepts, so that the refusal comes from there.
const maxInput = 64 << 20

// readSource reads a file whole; "-" is standard input.
func readSource(std streams, path string) (*diag.Source, error) {
	if path == "-" {
		return readStandardInput(std)
	}
	info, err := os.Stat(path)
	if err == nil && info.IsDir() {
		return nil, &refusal{fmt.Sprintf("cannot read %s: it is a folder", path), "the name of a file is expected"}
	}
	var text []byte
	if err == nil {
		text, err = readBounded(path)
	}
	if err != nil {
		return nil, &refusal{fmt.Sprintf("cannot read %s: %s", path, reason(err)), ""}
	}
	return diag.NewSource(path, string(text)), nil
}

// readStandardInput reads to the end, which may never come: an interrupt ends it too.
func readStandardInput(std streams) (*diag.Source, error) {
	var text []byte
	var err error
	read := make(chan struct{})
	go func() {
		defer close(read)
		text, err = io.ReadAll(io.LimitReader(std.in, maxInput))
	}()
	select {
	case <-std.stop:
		return nil, &budget.Stop{Stage: "reading standard input", Reason: budget.Interrupted, Cause: errInterrupted}
	case <-read:
	}
	if err != nil {
		return nil, &refusal{"cannot read standard input: " + reason(err), ""}
	}
	return diag.NewSource("standard input", string(text)), nil
}

func readBounded(path string) ([]byte, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return io.ReadAll(io.LimitReader(f, maxInput))
}

// pointSource is the text of --at: itself, or the file behind @.
func pointSource(std streams, at string) (*diag.Source, error) {
	if path, ok := strings.CutPrefix(at, "@"); ok {
		return readSource(std, path)
	}
	return diag.NewSource("--at", at), nil
}

// reason is the system's word for an error, without the operation and the path.
func reason(err error) string {
	var path *fs.PathError
	var link *os.LinkError
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return "no such file or folder"
	case errors.Is(err, fs.ErrPermission):
		return "permission denied"
	case errors.As(err, &path):
		return path.Err.Error()
	case errors.As(err, &link):
		return link.Err.Error()
	}
	return err.Error()
}
