package main

import (
	"bytes"
	"context"
	"errors"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// asProgram makes the test binary behave as the program itself, so that exit
// status, streams and signals are those of a process.
const asProgram = "INKJOULE_TEST_AS_PROGRAM"

func TestMain(m *testing.M) {
	if os.Getenv(asProgram) != "" {
		main()
	}
	os.Exit(m.Run())
}

// call is one run of the program.
type call struct {
	args   []string
	in     string
	env    []string
	status int
	out    string
	err    string
}

// run runs the program in a folder.
func (c *call) run(t *testing.T, dir string) *call {
	t.Helper()
	program, err := os.Executable()
	if err != nil {
		t.Fatal(err)
	}
	cmd := exec.CommandContext(t.Context(), program, c.args...)
	cmd.Dir = dir
	cmd.Env = append(append(os.Environ(), asProgram+"=1", "NO_COLOR="), c.env...)
	cmd.Stdin = strings.NewReader(c.in)
	var out, fault bytes.Buffer
	cmd.Stdout, cmd.Stderr = &out, &fault
	err = cmd.Run()
	var exit *exec.ExitError
	if err != nil && !errors.As(err, &exit) {
		t.Fatal(err)
	}
	c.status, c.out, c.err = cmd.ProcessState.ExitCode(), out.String(), fault.String()
	return c
}

// inside runs a command line without a process.
func inside(t *testing.T, in string, args ...string) *call {
	t.Helper()
	var out, fault bytes.Buffer
	w := &world{in: strings.NewReader(in), out: &out, err: &fault, getenv: func(string) string { return "" }}
	status := execute(context.Background(), w, args)
	return &call{status: status, out: out.String(), err: fault.String()}
}

// folder makes a folder with files.
func folder(t *testing.T, files map[string]string) string {
	t.Helper()
	dir := t.TempDir()
	for path, text := range files {
		path = filepath.Join(dir, path)
		if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	return dir
}

const (
	clean    = "Field\n\n    E = 12 kV / 3 mm = 4.0 kV/mm\n"
	wrong    = "Field\n\n    E = 12 kV / 3 mm = 4.5 kV/mm\n"
	cautious = "Field\n\n    d = 3 mm\n    assume d > 4 mm\n"
	advised  = "Field\n\n    E = 12 kV / 3 mm\n"
)
