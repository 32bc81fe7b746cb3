package project

import (
	"path/filepath"
	"sync"

	"inkjoule/check"
)

// Configs finds and keeps the configuration of each folder. It may be used
// from several goroutines; make a new one to see files that changed.
type Configs struct {
	known *check.Catalogue

	mu       sync.Mutex
	byFolder map[string]*Config
	byPath   map[string]*Config
	faults   []error
}

// NewConfigs starts without any file read. The catalogue says which rule names
// a file may use.
func NewConfigs(known *check.Catalogue) *Configs {
	return &Configs{known: known, byFolder: map[string]*Config{}, byPath: map[string]*Config{}}
}

// For gives what holds for the files of a folder (absolute). A faulty file
// holds as far as it could be read; Faults tells what is wrong with it.
func (s *Configs) For(folder string) *Config {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.of(folder)
}

func (s *Configs) of(folder string) *Config {
	if c := s.byFolder[folder]; c != nil {
		return c
	}
	c := s.load(Find(folder))
	s.byFolder[folder] = c
	return c
}

func (s *Configs) load(path string) *Config {
	if c := s.byPath[path]; c != nil {
		return c
	}
	c := DefaultConfig()
	if path != "" {
		var err error
		if c, err = LoadConfig(path, s.known); err != nil {
			s.faults = append(s.faults, err)
		}
	}
	s.byPath[path] = c
	return c
}

// Faults gives what is wrong in the files read so far, each once.
func (s *Configs) Faults() []error {
	s.mu.Lock()
	defer s.mu.Unlock()
	return append([]error(nil), s.faults...)
}

// Excludes reports whether the configuration of a file's folder leaves the
// file (absolute) out.
func (s *Configs) Excludes(path string, folder bool) bool {
	return s.For(filepath.Dir(path)).Excludes(path, folder)
}
