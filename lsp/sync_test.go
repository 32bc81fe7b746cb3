package lsp

import (
	"strings"
	"testing"
	"unicode/utf16"
	"unicode/utf8"

	"go.lsp.dev/protocol"
	"pgregory.net/rapid"

	"inkjoule/lang"
)

// awkward are the runes that make columns differ: two-byte, three-byte and
// four-byte ones, a combining mark, line ends, a byte order mark.
var awkward = []rune("ab µΩ²😀\u0301°\r\n\n\ufeff")

var encodings = []encoding{utf8Bytes, utf16Units, utf32Points}

// units counts a text in an encoding, independently of the mapper.
func units(text string, enc encoding) int {
	switch enc {
	case utf8Bytes:
		return len(text)
	case utf32Points:
		return utf8.RuneCountInString(text)
	}
	return len(utf16.Encode([]rune(text)))
}

// positionOf finds the position of an offset the simple way: the lines before
// it are cut off and what is left is counted.
func positionOf(text string, offset int, enc encoding) protocol.Position {
	before := text[:offset]
	line := strings.Count(strings.ReplaceAll(before, "\r\n", "\n"), "\n")
	line += strings.Count(strings.ReplaceAll(before, "\r\n", ""), "\r")
	last := strings.LastIndexAny(before, "\r\n") + 1
	return protocol.Position{Line: uint32(line), Character: uint32(units(before[last:], enc))}
}

// boundary reports whether a client can name the offset: between code points
// and not within a CRLF.
func boundary(text string, at int) bool {
	if at > 0 && at < len(text) && text[at-1] == '\r' && text[at] == '\n' {
		return false
	}
	return at == len(text) || utf8.RuneStart(text[at])
}

func drawBoundary(t *rapid.T, text string, from int, label string) int {
	at := rapid.IntRange(from, len(text)).Draw(t, label)
	for !boundary(text, at) {
		at++
	}
	return at
}

// TestEditsKeepTheText holds that after any ranged edits the text is the one
// that the client has.
func TestEditsKeepTheText(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		enc := rapid.SampledFrom(encodings).Draw(t, "encoding")
		draw := rapid.StringOfN(rapid.RuneFrom(awkward), 0, 30, -1)
		text := draw.Draw(t, "text")
		src := lang.NewSource(text)
		for range 15 {
			var batch []edit
			for range rapid.IntRange(1, 3).Draw(t, "cursors") {
				start := drawBoundary(t, text, 0, "start")
				end := drawBoundary(t, text, start, "end")
				put := draw.Draw(t, "put")
				batch = append(batch, edit{
					Range: &protocol.Range{Start: positionOf(text, start, enc), End: positionOf(text, end, enc)},
					Text:  put,
				})
				text = text[:start] + put + text[end:]
			}
			if src = apply(src, enc, batch); src.Text != text {
				t.Fatalf("server has %q, client %q after %+v", src.Text, text, batch)
			}
		}
	})
}

// TestOffsetsRoundTrip holds that every offset that a client can name comes
// back from its position, in all encodings, and that the running mapper gives
// the same positions.
func TestOffsetsRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.StringOfN(rapid.RuneFrom(awkward), 0, 40, -1).Draw(t, "text")
		for _, enc := range encodings {
			m := newMapper(lang.NewSource(text), enc)
			running := m.ascending()
			for at := 0; at <= len(text); at++ {
				if !boundary(text, at) {
					continue
				}
				p := m.OffsetToPosition(at)
				if want := positionOf(text, at, enc); p != want {
					t.Fatalf("%q offset %d: position %v, want %v", text, at, p, want)
				}
				if q := running.OffsetToPosition(at); q != p {
					t.Fatalf("%q offset %d: running mapper gives %v, want %v", text, at, q, p)
				}
				if back := m.PositionToOffset(p); back != at {
					t.Fatalf("%q offset %d: comes back as %d", text, at, back)
				}
			}
		}
	})
}

// TestPositionsOutsideTheText holds what the protocol says of them.
func TestPositionsOutsideTheText(t *testing.T) {
	const text = "a😀b\r\ncd"
	for _, c := range []struct {
		enc  encoding
		p    protocol.Position
		want int
	}{
		{utf16Units, protocol.Position{Line: 0, Character: 99}, 6},              // end of the line, before CRLF
		{utf16Units, protocol.Position{Line: 9, Character: 0}, len(text)},       // end of the text
		{utf16Units, protocol.Position{Line: 0, Character: 2}, 1},               // between the surrogates
		{utf8Bytes, protocol.Position{Line: 0, Character: 3}, 1},                // inside the four bytes
		{utf32Points, protocol.Position{Line: 0, Character: 2}, 5},              // after the emoji
		{utf8Bytes, protocol.Position{Line: 0, Character: 1 << 31}, 6},          // huge
		{utf16Units, protocol.Position{Line: 1 << 31, Character: 0}, len(text)}, // huge
	} {
		if got := newMapper(lang.NewSource(text), c.enc).PositionToOffset(c.p); got != c.want {
			t.Errorf("encoding %d %v: offset %d, want %d", c.enc, c.p, got, c.want)
		}
	}
}

// TestMapperSurvivesAnyBytes holds that invalid UTF-8 is counted like the
// replacement character and never panics.
func TestMapperSurvivesAnyBytes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := string(rapid.SliceOf(rapid.Byte()).Draw(t, "text"))
		at := rapid.IntRange(-5, len(text)+5).Draw(t, "at")
		for _, enc := range encodings {
			m := newMapper(lang.NewSource(text), enc)
			p := m.OffsetToPosition(at)
			if back := m.PositionToOffset(p); back > max(0, at) {
				t.Fatalf("%q: offset %d comes back as %d", text, at, back)
			}
		}
	})
}

// TestSyncOverTheWire edits a document as an editor does and compares what is
// diagnosed, in each encoding.
func TestSyncOverTheWire(t *testing.T) {
	for _, c := range []struct {
		name   string
		offers []string
		column int // of the `!` after "µΩ²😀"
	}{
		{"utf-8", []string{"utf-16", "utf-8"}, 2 + 2 + 2 + 4},
		{"utf-16", nil, 5},
		{"utf-16", []string{"utf-16"}, 5},
		{"utf-32", []string{"utf-32"}, 4},
	} {
		t.Run(c.name, func(t *testing.T) {
			e := launch(t, Options{Analyser: atOnce(letters)})
			result := e.start(object{"general": object{"positionEncodings": c.offers}})
			if got := result["capabilities"].(object)["positionEncoding"]; got != c.name {
				t.Fatalf("encoding %v, want %s", got, c.name)
			}
			const uri = "file:///a.joule"
			e.open(uri, "x\r\nµΩ²😀\r\n")
			e.change(uri, 2, object{"range": between(1, c.column, 1, c.column), "text": "!"})
			d := e.diagnosed(uri, 2)
			if len(d.Diagnostics) != 1 || d.Diagnostics[0].Range.Start.Line != 1 || d.Diagnostics[0].Range.Start.Character != c.column {
				t.Errorf("diagnostics %+v, want one at 1:%d", d.Diagnostics, c.column)
			}
			e.quit()
		})
	}
}

// TestUnreadableChange holds that a change that can't be read never becomes the
// whole text.
func TestUnreadableChange(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.start(object{})
	const uri = "file:///a.joule"
	e.open(uri, "!!")
	e.change(uri, 2, object{"range": between(-1, 0, 0, 0), "text": "?"})
	e.change(uri, 3, object{"range": between(0, 0, 0, 0), "text": "!"})
	if d := e.diagnosed(uri, 3); len(d.Diagnostics) != 3 {
		t.Errorf("%d diagnostics, want 3", len(d.Diagnostics))
	}
	e.quit()
}

// TestSaveFindsALostEdit holds that a text that went out of step is taken from
// the save.
func TestSaveFindsALostEdit(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.start(object{})
	const uri = "file:///a.joule"
	e.open(uri, "!")
	e.diagnosed(uri, 1)
	e.notify("textDocument/didSave", object{"textDocument": object{"uri": uri}, "text": "!!!"})
	e.await("diagnostics of the saved text", func(m message) bool {
		return m.Method == "textDocument/publishDiagnostics" && strings.Count(string(m.Params), "exclamation mark") == 3
	})
	e.quit()
}
