package lang

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"github.com/alecthomas/participle/v2/lexer"
)

func isDigit(c byte) bool { return '0' <= c && c <= '9' }

// lineEnd is the length of the line end that s begins with, else 0.
func lineEnd(s string) int {
	switch {
	case strings.HasPrefix(s, "\r\n"):
		return 2
	case strings.HasPrefix(s, "\n"), strings.HasPrefix(s, "\r"):
		return 1
	}
	return 0
}

// blank is the length of the blank that s begins with, else 0. The blanks of
// typesetting (no-break, thin) separate a number from its unit too.
func blank(s string) int {
	if s == "" {
		return 0
	}
	if s[0] == ' ' || s[0] == '\t' {
		return 1
	}
	if s[0] < utf8.RuneSelf {
		return 0
	}
	r, size := utf8.DecodeRuneInString(s)
	if r == '\ufeff' || unicode.Is(unicode.Zs, r) {
		return size
	}
	return 0
}

// columns is the width of leading blanks; a tab reaches the next multiple of four.
func columns(s string) int {
	n := 0
	for i := 0; i < len(s); i++ {
		switch {
		case s[i] == '\t':
			n += 4 - n%4
		case utf8.RuneStart(s[i]):
			n++
		}
	}
	return n
}

// operatorOf is the canonical form of an operator or bracket of one character,
// 0 if the character is none.
func operatorOf(r rune) rune {
	switch r {
	case '+', '-', '*', '/', '^', '=', '<', '>', '(', ')', '[', ']', '|', ',', ':', '.', '·', '×', '±':
		return r
	case '−':
		return '-'
	case '⋅':
		return '·'
	case '≤', '≥', '≪', '≫':
		return r
	}
	return 0
}

const superscriptDigits = "⁰¹²³⁴⁵⁶⁷⁸⁹"

func isSuperscript(r rune) bool {
	return r == '⁻' || r == '⁺' || r >= '²' && strings.ContainsRune(superscriptDigits, r)
}

// superscripts is the length of the run of superscripts at the start of s.
func superscripts(s string) int {
	for i, r := range s {
		if !isSuperscript(r) {
			return i
		}
	}
	return len(s)
}

func isSubscript(r rune) bool { return '₀' <= r && r <= '₉' }

func isCurly(r rune) bool {
	switch r {
	case '“', '”', '„', '‟', '«', '»', '‘', '’', '‚':
		return true
	}
	return false
}

// wordEnd is the end of the word that begins at at; at itself if none does.
func wordEnd(text string, at int) int {
	if at >= len(text) {
		return at
	}
	r, _ := utf8.DecodeRuneInString(text[at:])
	if !unicode.IsLetter(r) {
		return at
	}
	return wordPart(text, at)
}

// wordPart is the end of the run of characters that may stand inside a word.
func wordPart(text string, at int) int {
	for at < len(text) {
		c := text[at]
		if 'a' <= c && c <= 'z' || 'A' <= c && c <= 'Z' || isDigit(c) || c == '_' {
			at++
			continue
		}
		if c < utf8.RuneSelf {
			break
		}
		r, size := utf8.DecodeRuneInString(text[at:])
		if !unicode.IsLetter(r) && !unicode.IsMark(r) && r != '′' && !isSubscript(r) {
			break
		}
		at += size
	}
	return at
}

// touch reports whether nothing stands between two tokens.
func touch(a, b *lexer.Token) bool { return a.Pos.Offset+len(a.Value) == b.Pos.Offset }

// is reports whether the token is the operator or word with this text; the
// twins of an operator count as it.
func is(t *lexer.Token, text string) bool {
	switch t.Type {
	case tokWord:
		return t.Value == text
	case tokOp:
		return t.Value == text || canonicalOp(t.Value) == text
	}
	return false
}

// canonicalOp is the spelling under which the tree keeps an operator.
func canonicalOp(s string) string {
	switch s {
	case "−":
		return "-"
	case "⋅":
		return "·"
	case "≤":
		return "<="
	case "≥":
		return ">="
	case "≪":
		return "<<"
	case "≫":
		return ">>"
	case "+/-":
		return "±"
	}
	return s
}
