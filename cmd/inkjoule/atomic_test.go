package main

import (
	"os"
	"runtime"
	"testing"
)

// A device is written to, never replaced: the run may be root's.
func TestDeviceIsNotReplaced(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("there is no device file to try")
	}
	before, err := os.Lstat(os.DevNull)
	if err != nil {
		t.Fatal(err)
	}
	f, err := createFile(os.DevNull)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := f.WriteString("x"); err != nil {
		t.Fatal(err)
	}
	if err := f.commit(); err != nil {
		t.Fatal(err)
	}
	after, err := os.Lstat(os.DevNull)
	if err != nil || after.Mode() != before.Mode() || after.Mode().IsRegular() {
		t.Errorf("%s was %v and is %v (%v)", os.DevNull, before.Mode(), after.Mode(), err)
	}
}
