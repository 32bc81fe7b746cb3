package lang

import (
	"strconv"
	"strings"

	"github.com/alecthomas/participle/v2/lexer"
)

func itoa(n int) string { return strconv.Itoa(n) }

// deeperMessage is said of a definition that is indented deeper than the one
// above; line is 1-based, 0 where the statement does not know where it stands.
func deeperMessage(line int) string {
	if line == 0 {
		return "indented deeper than the line above, so it continues it"
	}
	return "indented deeper than line " + itoa(line) + ", so it continues it"
}

const deeperDetail = "start a new statement in the column of the one above; continue a chain of equals with `= …`"

// opensDefinition reports tokens that begin NAME [(PARAM, …)] [in MEDIUM] [, KIND] =.
func opensDefinition(toks []lexer.Token) bool {
	at := func(i int) *lexer.Token {
		if i < len(toks) {
			return &toks[i]
		}
		return &noToken
	}
	if !isWordToken(at(0)) {
		return false
	}
	i := 1
	if is(at(1), "(") && touch(at(0), at(1)) {
		for i = 2; isWordToken(at(i)) || is(at(i), ","); i++ {
		}
		if !is(at(i), ")") {
			return false
		}
		i++
	}
	if is(at(i), "in") {
		i += 2
	}
	if is(at(i), ",") {
		for i++; at(i).Type == tokWord || is(at(i), "-"); i++ {
		}
	}
	return is(at(i), "=")
}

// noDeeperStart fails where a line of the definition read since the given token
// begins like a definition of its own: never a second member of a chain.
func (r *reader) noDeeperStart(from int) {
	if r.broken != nil {
		return
	}
	toks := r.toks[from : r.at+1]
	depth := 0
	for i := 1; i < len(toks); i++ {
		switch before, t := &toks[i-1], &toks[i]; {
		case is(t, "("), is(t, "["):
			depth++
		case is(t, ")"), is(t, "]"):
			depth--
		case depth == 0 && t.Pos.Line != before.Pos.Line && t.Type == tokWord && !is(before, "at") && opensDefinition(toks[i:]):
			r.broken = &breakage{at: from + i, message: deeperMessage(0), detail: deeperDetail}
			return
		}
	}
}

// lineState knows of the text read so far whether a line can end here: no
// bracket or quotation is open and no operator waits for its operand.
type lineState struct {
	depth int
	quote bool
	last  string // the last operator or word, "" for what can end a statement
}

// goesOn reports that the next line must belong to this text.
func (l *lineState) goesOn() bool { return l.depth > 0 || l.quote || l.last != "" }

// read goes over more text.
func (l *lineState) read(text string) {
	for i := 0; i < len(text); {
		c := text[i]
		end := i + 1
		switch {
		case l.quote:
			l.quote = c != '"'
			l.last = ""
		case c == '#':
			end = i + strings.IndexAny(text[i:]+"\n", "\r\n")
		case c == '"':
			l.quote = true
		case wordEnd(text, i) > i:
			end = wordEnd(text, i)
			l.last = waitingWord(text[i:end])
		case c == '(' || c == '[':
			l.depth++
		case c == ')' || c == ']':
			l.depth--
			l.last = ""
		case strings.IndexByte("=+-*/^,<>", c) >= 0:
			l.last = text[i:end]
		case c != ' ' && c != '\t' && c != '\r' && c != '\n':
			l.last = ""
		}
		i = end
	}
}

// waitingWord is the word itself if a line cannot end with it.
func waitingWord(word string) string {
	switch word {
	case "at", "for", "from", "to", "in", "over", "per":
		return word
	}
	return ""
}
