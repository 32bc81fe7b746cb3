package main

import (
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

func TestConfigTellsWhatHoldsAndWhoSaysIt(t *testing.T) {
	dir := folder(t, map[string]string{
		"inkjoule.toml":     "fail-level = \"error\"\nexclude = [\"old/\"]\n[severity]\nrms-peak-mix = \"advice\"\n[budget]\nseconds = 0.5\n",
		"notes/a.joule":     clean,
		"bad/inkjoule.toml": "fail-level = \"sometimes\"\n",
	})
	got := inside(t, "", "config", filepath.Join(dir, "notes", "a.joule"))
	for _, want := range []string{
		`inkjoule\.toml`, `fail-level +error +file`, `severity\.rms-peak-mix +advice +file`, `exclude +old/ +file`,
		`budget\.steps +500000000 +default`, `budget\.seconds +0\.5 +file`, `budget\.memory-mib +256 +default`,
	} {
		if !regexp.MustCompile(want).MatchString(got.out) {
			t.Errorf("no %s in\n%s", want, got.out)
		}
	}
	if got.status != statusClean {
		t.Errorf("status %d", got.status)
	}
	if bad := inside(t, "", "config", filepath.Join(dir, "bad")); bad.status != statusTrouble || !strings.Contains(bad.err, ":1:") {
		t.Errorf("status %d, %q", bad.status, bad.err)
	}
	if lost := inside(t, "", "config", filepath.Join(dir, "lost")); lost.status != statusTrouble || !strings.Contains(lost.err, "does not exist") {
		t.Errorf("status %d, %q", lost.status, lost.err)
	}
}
