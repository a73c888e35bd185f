package main

// Writing results. A file is complete or not there: it is written under another name beside
// its place and then renamed.

import (
	"fmt"
	"os"
	"path/filepath"
)

// emit writes a result to standard output.
func emit(std streams, data []byte) error {
	if _, err := std.out.Write(data); err != nil {
		return &refusal{"cannot write to standard output: " + reason(err), ""}
	}
	return nil
}

// deliver writes a result to the file at path, or to standard output if path is empty or
// "-".
func deliver(std streams, path string, data []byte) error {
	if path == "" || path == "-" {
		return emit(std, data)
	}
	return writeFile(path, data)
}

// writeFile replaces the file at path. A link is followed; what is no regular file, such as a
// device, is written to as it stands.
func writeFile(path string, data []byte) error {
	if real, err := filepath.EvalSymlinks(path); err == nil {
		path = real
	}
	mode := os.FileMode(0o666)
	info, err := os.Stat(path)
	switch {
	case err == nil && info.IsDir():
		return cannotWrite(path, "it is a folder")
	case err == nil && !info.Mode().IsRegular():
		if err := os.WriteFile(path, data, mode); err != nil {
			return cannotWrite(path, reason(err))
		}
		return nil
	case err == nil:
		mode = info.Mode().Perm()
	}
	temp, err := writeBeside(path, data, mode)
	if err == nil {
		if err = os.Rename(temp, path); err != nil {
			os.Remove(temp)
		}
	}
	if err != nil {
		return cannotWrite(path, reason(err))
	}
	return nil
}

// writeBeside writes a new file into the folder of path; on failure it leaves nothing.
func writeBeside(path string, data []byte, mode os.FileMode) (name string, err error) {
	name = filepath.Join(filepath.Dir(path), fmt.Sprintf(".%s.%d.tmp", filepath.Base(path), os.Getpid()))
	f, err := os.OpenFile(name, os.O_WRONLY|os.O_CREATE|os.O_EXCL, mode)
	if err != nil {
		return "", err
	}
	_, err = f.Write(data)
	if cerr := f.Close(); err == nil {
		err = cerr
	}
	if err != nil {
		os.Remove(name)
		return "", err
	}
	return name, nil
}

func cannotWrite(path, why string) error {
	return &refusal{fmt.Sprintf("cannot write %s: %s", path, why), ""}
}
