package lsp

import (
	"strings"

	"go.lsp.dev/protocol"
)

// card is a short text with a head, as hover and completion show it. It is
// written as Markdown or as plain text, whichever the client renders.
type card struct {
	head  string // as in a note
	parts []part
}

// part is a line `label: text`, or a paragraph where there is no label. Code
// is set as it stands, in lines of its own.
type part struct{ label, text, code string }

func (c *card) line(label, text string) {
	if text != "" {
		c.parts = append(c.parts, part{label: label, text: text})
	}
}

func (c *card) paragraph(text string) { c.line("", text) }

func (c *card) example(code string) {
	if code != "" {
		c.parts = append(c.parts, part{code: strings.Trim(code, "\n")})
	}
}

// content writes the card in a format.
func (c *card) content(markdown bool) *protocol.MarkupContent {
	if markdown {
		return &protocol.MarkupContent{Kind: protocol.MarkupKindMarkdown, Value: c.markdown()}
	}
	return &protocol.MarkupContent{Kind: protocol.MarkupKindPlainText, Value: c.plain()}
}

func (c *card) markdown() string {
	var b strings.Builder
	if c.head != "" {
		b.WriteString(fence(c.head) + "\n")
	}
	for i, p := range c.parts {
		switch {
		case p.code != "":
			b.WriteString("\n" + fence(p.code) + "\n")
		case p.label == "":
			b.WriteString("\n" + escape(p.text) + "\n")
		default:
			if i == 0 || c.parts[i-1].label == "" {
				b.WriteByte('\n')
			}
			b.WriteString("*" + escape(p.label) + "*: " + escape(p.text) + "  \n")
		}
	}
	return strings.TrimRight(b.String(), " \n")
}

func (c *card) plain() string {
	var b strings.Builder
	if c.head != "" {
		b.WriteString(c.head + "\n")
	}
	for _, p := range c.parts {
		switch {
		case p.code != "":
			b.WriteString("\n" + p.code + "\n")
		case p.label == "":
			b.WriteString(p.text + "\n")
		default:
			b.WriteString(p.label + ": " + p.text + "\n")
		}
	}
	return strings.TrimRight(b.String(), "\n")
}

// fence sets code apart, with a fence longer than any in it.
func fence(code string) string {
	mark := "```"
	for strings.Contains(code, mark) {
		mark += "`"
	}
	return mark + "joule\n" + code + "\n" + mark
}

// escape keeps text from being read as Markdown or HTML.
func escape(text string) string {
	var b strings.Builder
	for i, r := range text {
		switch {
		case r == '<':
			b.WriteString("&lt;")
			continue
		case r == '&':
			b.WriteString("&amp;")
			continue
		case strings.ContainsRune("\\`*_[]#~|>", r), i == 0 && strings.ContainsRune("-+", r):
			b.WriteByte('\\')
		}
		b.WriteRune(r)
	}
	return b.String()
}
