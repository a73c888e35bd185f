package main

// Writing a folder of files: all of them or none. A new folder is made under another name
// and renamed; into one that is there, all files are written beside their places first, and
// then renamed.

import (
	"fmt"
	"os"
	"path/filepath"
)

// outputFile is a file of a folder.
type outputFile struct {
	name string
	data []byte
}

func writeFolder(dir string, files []outputFile) error {
	dir = filepath.Clean(dir)
	info, err := os.Stat(dir)
	switch {
	case err == nil && !info.IsDir():
		return cannotWrite(dir, "it is no folder")
	case err == nil:
		err = fillFolder(dir, files)
	case os.IsNotExist(err):
		err = makeFolder(dir, files)
	}
	if err != nil {
		return cannotWrite(dir, reason(err))
	}
	return nil
}

func makeFolder(dir string, files []outputFile) error {
	temp := filepath.Join(filepath.Dir(dir), fmt.Sprintf(".%s.%d.tmp", filepath.Base(dir), os.Getpid()))
	if err := os.Mkdir(temp, 0o777); err != nil {
		return err
	}
	err := fillFolder(temp, files)
	if err == nil {
		err = os.Rename(temp, dir)
	}
	if err != nil {
		os.RemoveAll(temp)
	}
	return err
}

func fillFolder(dir string, files []outputFile) error {
	var temps []string
	clean := func() {
		for _, t := range temps {
			os.Remove(t)
		}
	}
	for _, f := range files {
		path := filepath.Join(dir, f.name)
		if info, err := os.Stat(path); err == nil && info.IsDir() {
			clean()
			return &os.PathError{Op: "write", Path: path, Err: fmt.Errorf("%s is a folder", f.name)}
		}
		temp, err := writeBeside(path, f.data, 0o666)
		if err != nil {
			clean()
			return err
		}
		temps = append(temps, temp)
	}
	for i, f := range files {
		if err := os.Rename(temps[i], filepath.Join(dir, f.name)); err != nil {
			clean()
			return err
		}
	}
	return nil
}
