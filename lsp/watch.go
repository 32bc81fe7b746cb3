package lsp

import (
	"path/filepath"
	"time"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"

	"inkjoule/check/project"
)

// pollInterval is how often the files behind open notes are looked at where the
// client does not watch files.
const pollInterval = 2 * time.Second

// surroundings follow what changes around the open documents: settings,
// folders, files.
func surroundings() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			if to.Workspace == nil {
				to.Workspace = &protocol.WorkspaceOptions{}
			}
			to.Workspace.WorkspaceFolders = &protocol.WorkspaceFoldersServerCapabilities{
				Supported: ptr(true), ChangeNotifications: protocol.Boolean(true),
			}
		},
		events: map[string]event{
			protocol.MethodInitialized:                        initialized,
			protocol.MethodWorkspaceDidChangeConfiguration:    on(didChangeConfiguration),
			protocol.MethodWorkspaceDidChangeWorkspaceFolders: on(didChangeFolders),
			protocol.MethodWorkspaceDidChangeWatchedFiles:     on(didChangeFiles),
		},
	}
}

// initialized begins the work that needs the client's answers, beside the
// reading goroutine.
func initialized(s *session, _ jsonrpc2.RawMessage) error {
	s.behind(func() {
		s.register()
		s.pullSettings()
		if !s.now().client.pulls { // such a client asks by itself
			s.survey()
		}
	})
	if !s.now().client.can("workspace.didChangeWatchedFiles.dynamicRegistration") {
		s.behind(s.poll)
	}
	return nil
}

// register asks the client to report what it watches only on demand.
func (s *session) register() {
	c := s.now().client
	var all []protocol.Registration
	add := func(method string, options any) {
		r := protocol.Registration{ID: source + "-" + method, Method: method}
		if options != nil {
			raw, err := protocol.Marshal(options)
			if err != nil {
				return
			}
			r.RegisterOptions = raw
		}
		all = append(all, r)
	}
	if c.can("workspace.didChangeWatchedFiles.dynamicRegistration") {
		add(protocol.MethodWorkspaceDidChangeWatchedFiles, watched())
	}
	if c.can("workspace.didChangeConfiguration.dynamicRegistration") {
		add(protocol.MethodWorkspaceDidChangeConfiguration, &protocol.DidChangeConfigurationRegistrationOptions{
			Section: protocol.String(source),
		})
	}
	if len(all) > 0 {
		s.say(protocol.MethodClientRegisterCapability, &protocol.RegistrationParams{Registrations: all}, nil)
	}
}

// watched are the files whose change can change a finding.
func watched() *protocol.DidChangeWatchedFilesRegistrationOptions {
	var out protocol.DidChangeWatchedFilesRegistrationOptions
	for _, glob := range []string{"**/*.joule", "**/*.joule.md", "**/*.csv", "**/" + project.ConfigName} {
		out.Watchers = append(out.Watchers, protocol.FileSystemWatcher{GlobPattern: protocol.Pattern(glob)})
	}
	return &out
}

// say asks the client; a refusal is logged.
func (s *session) say(method string, params, result any) bool {
	err := s.peer.ask(s.ctx, method, params, result)
	if err != nil && s.ctx.Err() == nil {
		s.log.Warn("the client did not answer as it should", "method", method, "error", err)
	}
	return err == nil
}

// pullSettings asks for this section of the settings.
func (s *session) pullSettings() {
	if !s.now().client.can("workspace.configuration") {
		return
	}
	var sent []any
	params := &protocol.ConfigurationParams{Items: []protocol.ConfigurationItem{{Section: ptr(source)}}}
	if s.say(protocol.MethodWorkspaceConfiguration, params, &sent) && len(sent) > 0 {
		s.configure(sent[0])
	}
}

// configure takes over settings and shows what follows from them.
func (s *session) configure(sent any) {
	var before, after settings
	v := s.change(func(v *view) {
		before = v.settings
		v.settings = defaults().with(sent)
		after = v.settings
	})
	if before == after {
		return
	}
	if v.client.can("workspace.inlayHint.refreshSupport") {
		s.say(protocol.MethodWorkspaceInlayHintRefresh, nil, nil)
	}
	if before.workspace != after.workspace {
		s.survey()
	}
}

// configured are DidChangeConfigurationParams with settings of any shape.
type configured struct {
	Settings any `json:"settings"`
}

func didChangeConfiguration(s *session, p *configured) error {
	s.behind(func() {
		if s.now().client.can("workspace.configuration") {
			s.pullSettings()
			return
		}
		s.configure(p.Settings)
	})
	return nil
}

func didChangeFolders(s *session, p *protocol.DidChangeWorkspaceFoldersParams) error {
	s.change(func(v *view) {
		var kept []folder
		for _, f := range v.folders {
			if !inList(p.Event.Removed, f) {
				kept = append(kept, f)
			}
		}
		for _, f := range p.Event.Added {
			kept = appendFolder(kept, string(f.URI))
		}
		v.folders = kept
	})
	s.survey()
	return nil
}

// inList reports whether a folder is in a list of the client's.
func inList(list []protocol.WorkspaceFolder, f folder) bool {
	for _, w := range list {
		if folder(filepath.Clean(w.URI.FsPath())) == f {
			return true
		}
	}
	return false
}

func didChangeFiles(s *session, p *protocol.DidChangeWatchedFilesParams) error {
	var touched []*snapshot
	s.change(func(v *view) {
		for _, c := range p.Changes {
			if filepath.Base(c.URI.FsPath()) == project.ConfigName {
				touched = append(touched, v.renewAll()...)
				break
			}
			if v.docs[c.URI] == nil { // unsaved text overrides the disk
				touched = append(touched, v.renew(c.URI)...)
			}
		}
	})
	s.touched(touched)
	s.survey()
	return nil
}

// renewAll makes new snapshots of all open documents.
func (v *view) renewAll() []*snapshot {
	var out []*snapshot
	for u, old := range v.docs {
		out = append(out, v.again(u, old))
	}
	return out
}

// poll looks after the files that open notes refer to, and their
// configurations, for clients that do not watch files.
func (s *session) poll() {
	tick := time.NewTicker(pollInterval)
	defer tick.Stop()
	for {
		select {
		case <-s.ctx.Done():
			return
		case <-tick.C:
			s.pollOnce()
		}
	}
}

func (s *session) pollOnce() {
	v := s.now()
	var stale []*snapshot
	for _, doc := range v.docs {
		if doc.reading.finished() && !v.fresh(doc) {
			stale = append(stale, doc)
		}
	}
	if len(stale) == 0 {
		return
	}
	var touched []*snapshot
	s.change(func(v *view) {
		for _, doc := range stale {
			if v.docs[doc.uri] == doc {
				touched = append(touched, v.again(doc.uri, doc))
			}
		}
	})
	s.touched(touched)
}

// fresh reports whether all that an analysis has read is as it was.
func (v *view) fresh(doc *snapshot) bool {
	for u, before := range doc.files.stamps() {
		if v.stampOf(u) != before {
			return false
		}
	}
	return doc.config == configStamp(doc.home)
}

// configStamp is the stamp of the configuration that holds for a note.
func configStamp(h home) stamp {
	if h.root == "" {
		return stamp{}
	}
	return fileStamp(project.Find(filepath.Dir(h.file(h.path))))
}
