package lsp

import (
	"encoding/json"
	"errors"
	"slices"
	"strings"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
)

// hello is what initialize brings. It is read leniently: a field of the wrong
// type counts as absent, since no editor can be asked to correct it.
type hello struct {
	ProcessID        *int     `json:"processId"`
	RootURI          string   `json:"rootUri"`
	RootPath         string   `json:"rootPath"`
	WorkspaceFolders []place  `json:"workspaceFolders"`
	Capabilities     any      `json:"capabilities"`
	Options          any      `json:"initializationOptions"`
	ClientInfo       identity `json:"clientInfo"`
}

type place struct {
	URI string `json:"uri"`
}

type identity struct {
	Name    string `json:"name"`
	Version string `json:"version"`
}

// readHello reads the parameters of initialize.
func readHello(raw jsonrpc2.RawMessage) (*hello, error) {
	h := &hello{}
	err := json.Unmarshal(raw, h)
	var wrongType *json.UnmarshalTypeError
	if err != nil && !errors.As(err, &wrongType) {
		return nil, jsonrpc2.NewError(jsonrpc2.InvalidParams, "the parameters of initialize can't be read")
	}
	return h, nil
}

// client is what the other side can do. Every question has an answer: a
// capability that was not sent, or is of the wrong type, is absent.
type client struct {
	name  string
	caps  any // as decoded from JSON
	enc   encoding
	pulls bool // it asks for diagnostics; nothing is pushed
}

func newClient(h *hello) *client {
	c := &client{name: h.ClientInfo.Name, caps: h.Capabilities}
	c.enc = c.preferred()
	// Without refresh, a pulling client would never learn that the change of
	// one note has changed the findings of another.
	c.pulls = c.has("textDocument.diagnostic") && c.can("workspace.diagnostics.refreshSupport")
	return c
}

// find returns the value at a dotted path of capabilities, or nil.
func (c *client) find(path string) any {
	at := c.caps
	for name := range strings.SplitSeq(path, ".") {
		object, ok := at.(map[string]any)
		if !ok {
			return nil
		}
		at = object[name]
	}
	return at
}

// can reports whether a capability is true.
func (c *client) can(path string) bool { return c.find(path) == true }

// has reports whether a capability is an object.
func (c *client) has(path string) bool { _, ok := c.find(path).(map[string]any); return ok }

// list returns a capability that is a list of strings; others are left out.
func (c *client) list(path string) []string {
	all, _ := c.find(path).([]any)
	var out []string
	for _, v := range all {
		if s, ok := v.(string); ok {
			out = append(out, s)
		}
	}
	return out
}

// knows reports whether a capability is a list that holds the number.
func (c *client) knows(path string, n int) bool {
	all, _ := c.find(path).([]any)
	return slices.Contains(all, any(float64(n)))
}

// preferred picks the position encoding: UTF-8 needs no conversion, UTF-16 is
// what every client has.
func (c *client) preferred() encoding {
	offered := c.list("general.positionEncodings")
	switch {
	case slices.Contains(offered, string(protocol.PositionEncodingKindUTF8)):
		return utf8Bytes
	case slices.Contains(offered, string(protocol.PositionEncodingKindUTF16)) || len(offered) == 0:
		return utf16Units
	case slices.Contains(offered, string(protocol.PositionEncodingKindUTF32)):
		return utf32Points
	}
	return utf16Units
}

func (c *client) encodingKind() protocol.PositionEncodingKind {
	switch c.enc {
	case utf8Bytes:
		return protocol.PositionEncodingKindUTF8
	case utf32Points:
		return protocol.PositionEncodingKindUTF32
	}
	return protocol.PositionEncodingKindUTF16
}

// markdown reports whether the client renders Markdown at a capability that
// lists content formats. A client that lists none gets plain text, except that
// some list none and render Markdown: those that do so are not known by name.
func (c *client) markdown(path string) bool {
	formats := c.list(path)
	return len(formats) > 0 && formats[0] == string(protocol.MarkupKindMarkdown)
}
