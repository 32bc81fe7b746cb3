package report

import (
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"net/url"
	"strings"
	"unicode"
	"unicode/utf8"

	"inkjoule/check"
)

// The objects of SARIF 2.1.0 that are written, with the members that are used.
type (
	sarifText struct {
		Text string `json:"text"`
	}
	sarifHelp struct {
		Text     string `json:"text"`
		Markdown string `json:"markdown"`
	}
	sarifTool struct {
		Driver sarifDriver `json:"driver"`
	}
	sarifDriver struct {
		Name    string      `json:"name"`
		Version string      `json:"version"`
		Rules   []sarifRule `json:"rules"`
	}
	sarifRule struct {
		ID       string       `json:"id"`
		Short    sarifText    `json:"shortDescription"`
		Full     sarifText    `json:"fullDescription"`
		Help     sarifHelp    `json:"help"`
		Defaults sarifDefault `json:"defaultConfiguration"`
	}
	sarifDefault struct {
		Level   string `json:"level"`
		Enabled bool   `json:"enabled"`
	}
	sarifResult struct {
		Rule         string             `json:"ruleId"`
		Index        int                `json:"ruleIndex"`
		Level        string             `json:"level"`
		Message      sarifText          `json:"message"`
		Locations    []sarifLocation    `json:"locations"`
		Fingerprints map[string]string  `json:"partialFingerprints"`
		Related      []sarifLocation    `json:"relatedLocations,omitempty"`
		Suppressions []sarifSuppression `json:"suppressions"`
		Fixes        []sarifFix         `json:"fixes,omitempty"`
	}
	sarifLocation struct {
		ID       int           `json:"id,omitempty"`
		Physical sarifPhysical `json:"physicalLocation"`
		Message  *sarifText    `json:"message,omitempty"`
	}
	sarifPhysical struct {
		Artifact sarifArtifact `json:"artifactLocation"`
		Region   *sarifRegion  `json:"region,omitempty"`
	}
	sarifArtifact struct {
		URI string `json:"uri"`
	}
	sarifRegion struct {
		StartLine   int        `json:"startLine"`
		StartColumn int        `json:"startColumn"`
		EndLine     int        `json:"endLine"`
		EndColumn   int        `json:"endColumn"`
		Snippet     *sarifText `json:"snippet,omitempty"`
	}
	sarifSuppression struct {
		Kind          string         `json:"kind"`
		Justification string         `json:"justification"`
		Location      *sarifLocation `json:"location,omitempty"`
	}
	sarifFix struct {
		Description sarifText     `json:"description"`
		Changes     []sarifChange `json:"artifactChanges"`
	}
	sarifChange struct {
		Artifact     sarifArtifact      `json:"artifactLocation"`
		Replacements []sarifReplacement `json:"replacements"`
	}
	sarifReplacement struct {
		Deleted  sarifRegion `json:"deletedRegion"`
		Inserted sarifText   `json:"insertedContent"`
	}
	sarifInvocation struct {
		Successful    bool                `json:"executionSuccessful"`
		Notifications []sarifNotification `json:"toolExecutionNotifications"`
	}
	sarifNotification struct {
		Level   string    `json:"level"`
		Message sarifText `json:"message"`
	}
)

// sarifRules explains every finding that there can be.
func sarifRules(c *check.Catalogue) []sarifRule {
	out := []sarifRule{}
	for _, r := range c.All() {
		out = append(out, sarifRule{
			ID: r.Name, Short: sarifText{sentence(r.Title)}, Full: sarifText{sentence(r.Sees)},
			Help: sarifHelp{helpOf(r, "%s: %s\n"), helpOf(r, "**%s:** %s\n\n")}, Defaults: sarifDefault{sarifLevel(r.Severity), !r.Off},
		})
	}
	return out
}

// helpOf explains a rule in paragraphs of one form.
func helpOf(r *check.Rule, form string) string {
	var b strings.Builder
	for _, p := range []struct{ head, text string }{
		{"Fires", r.Sees}, {"Silent", r.Silent}, {"Physics", r.Formula}, {"Remedy", r.Remedy}, {"Source", r.Source},
	} {
		if p.text != "" {
			fmt.Fprintf(&b, form, p.head, sentence(p.text))
		}
	}
	return strings.TrimSpace(b.String())
}

// sentence makes a text begin with a capital letter and end with a full stop.
func sentence(s string) string {
	s = oneLine(s)
	if r, size := utf8.DecodeRuneInString(s); size > 0 && unicode.IsLower(r) && startsPlainWord(s) {
		s = string(unicode.ToUpper(r)) + s[size:]
	}
	if s != "" && !strings.ContainsAny(s[len(s)-1:], ".!?:") {
		s += "."
	}
	return s
}

// startsPlainWord reports a first word of letters alone that is longer than a
// letter: a symbol of a note keeps its case.
func startsPlainWord(s string) bool {
	word, _, _ := strings.Cut(s, " ")
	return len(word) > 1 && strings.Trim(word, "abcdefghijklmnopqrstuvwxyz,") == "" || word == "a"
}

// fingerprint names a finding so that it is found again in a note whose lines
// have moved: by its rule, its statement and the text marked in it, blanks left
// out, and by a count where the same stands several times.
func (s *sarifWriter) fingerprint(n *Note, f *check.Finding) string {
	bare := func(text string) string { return strings.Join(strings.Fields(text), " ") }
	statement := ""
	if st := n.StmtAt(f.Span.Start); st != nil {
		statement = bare(st.Text)
	}
	text := n.Script.Source.Text
	key := strings.Join([]string{n.Path, f.Rule, statement, bare(text[f.Span.Start:max(f.Span.Start, f.Span.End)])}, "\x00")
	s.seen[key]++
	sum := sha256.Sum256(fmt.Appendf(nil, "%s\x00%d", key, s.seen[key]))
	return hex.EncodeToString(sum[:16])
}

// uriOf is the path as a URI reference.
func uriOf(path string) string {
	if len(path) > 1 && path[1] == ':' || strings.HasPrefix(path, "/") {
		return (&url.URL{Scheme: "file", Path: "/" + strings.TrimPrefix(path, "/")}).String()
	}
	return (&url.URL{Path: path}).String()
}
