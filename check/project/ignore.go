package project

import (
	"os"
	"path/filepath"
	"regexp"
	"strings"
)

// Patterns are the lines of one ignore file, in the syntax of gitignore(5):
// the last line that matches decides, `!` takes a path in again, a pattern
// with a slash before its end is anchored to the folder, one that ends in a
// slash matches folders only.
type Patterns struct {
	base  string // slash path of the folder to which they belong
	lines []pattern
}

type pattern struct {
	negated, folder bool
	match           *regexp.Regexp
}

// ParsePatterns reads ignore lines that hold for the folder base (absolute,
// with slashes). Lines that cannot match anything are dropped, as git does.
func ParsePatterns(base, text string) Patterns {
	p := Patterns{base: strings.TrimSuffix(base, "/")}
	for _, line := range strings.Split(text, "\n") {
		if one, ok := parsePattern(strings.TrimSuffix(line, "\r")); ok {
			p.lines = append(p.lines, one)
		}
	}
	return p
}

func parsePattern(line string) (pattern, bool) {
	line = trimBlanks(line)
	if line == "" || line[0] == '#' {
		return pattern{}, false
	}
	var p pattern
	if line[0] == '!' {
		p.negated, line = true, line[1:]
	}
	if strings.HasSuffix(line, "/") {
		p.folder, line = true, strings.TrimSuffix(line, "/")
	}
	if line == "" {
		return pattern{}, false
	}
	anchored := strings.Contains(line, "/")
	line = strings.TrimPrefix(line, "/")
	expr, ok := translate(line, anchored)
	if !ok {
		return pattern{}, false
	}
	re, err := regexp.Compile(expr)
	p.match = re
	return p, err == nil
}

// trimBlanks drops trailing blanks unless a backslash keeps them.
func trimBlanks(line string) string {
	for strings.HasSuffix(line, " ") {
		backslashes := 0
		for i := len(line) - 2; i >= 0 && line[i] == '\\'; i-- {
			backslashes++
		}
		if backslashes%2 == 1 {
			return line
		}
		line = line[:len(line)-1]
	}
	return line
}

// translate turns a glob into a regular expression over slash paths relative
// to the pattern's folder. False: the pattern can match nothing.
func translate(glob string, anchored bool) (string, bool) {
	var b strings.Builder
	b.WriteString("(?s)^")
	if !anchored {
		b.WriteString("(?:.*/)?")
	}
	for i := 0; i < len(glob); {
		n, ok := translateOne(&b, glob, i)
		if !ok {
			return "", false
		}
		i = n
	}
	b.WriteString("$")
	return b.String(), true
}

// translateOne writes the expression of the glob element at i and gives the
// index after it.
func translateOne(b *strings.Builder, glob string, i int) (int, bool) {
	switch c := glob[i]; c {
	case '*':
		return translateStars(b, glob, i), true
	case '?':
		b.WriteString("[^/]")
		return i + 1, true
	case '[':
		return translateClass(b, glob, i)
	case '\\':
		if i+1 == len(glob) {
			return 0, false
		}
		b.WriteString(regexp.QuoteMeta(glob[i+1 : i+2]))
		return i + 2, true
	default:
		b.WriteString(regexp.QuoteMeta(glob[i : i+1]))
		return i + 1, true
	}
}

// translateStars handles `*`, and `**` (or more) where it fills a whole segment.
func translateStars(b *strings.Builder, glob string, i int) int {
	end := i
	for end < len(glob) && glob[end] == '*' {
		end++
	}
	starts := i == 0 || glob[i-1] == '/'
	switch {
	case end-i >= 2 && starts && end == len(glob):
		b.WriteString(".+")
	case end-i >= 2 && starts && glob[end] == '/':
		b.WriteString("(?:.*/)?")
		return end + 1
	default:
		b.WriteString("[^/]*")
	}
	return end
}

// translateClass handles `[a-z]`, `[!a-z]` and `[[:digit:]]`.
func translateClass(b *strings.Builder, glob string, i int) (int, bool) {
	end := classEnd(glob, i)
	if end < 0 {
		return 0, false
	}
	body := glob[i+1 : end]
	negated := strings.HasPrefix(body, "!") || strings.HasPrefix(body, "^")
	if negated {
		body = body[1:]
	}
	b.WriteString("[")
	if negated {
		b.WriteString("^/")
	}
	b.WriteString(classBody(body))
	b.WriteString("]")
	return end + 1, true
}

// classEnd finds the bracket that closes the class opened at i; a bracket that
// comes first, one behind a backslash, and those of [:name:] do not close it.
func classEnd(glob string, i int) int {
	j := i + 1
	if j < len(glob) && (glob[j] == '!' || glob[j] == '^') {
		j++
	}
	for first := j; j < len(glob); j++ {
		switch {
		case glob[j] == '\\':
			j++
		case strings.HasPrefix(glob[j:], "[:"):
			if k := strings.Index(glob[j:], ":]"); k > 0 {
				j += k + 1
			}
		case glob[j] == ']' && j > first:
			return j
		}
	}
	return -1
}

func classBody(body string) string {
	var b strings.Builder
	for i := 0; i < len(body); i++ {
		if strings.HasPrefix(body[i:], "[:") {
			if k := strings.Index(body[i:], ":]"); k > 0 {
				b.WriteString(body[i : i+k+2])
				i += k + 1
				continue
			}
		}
		if body[i] == '\\' && i+1 < len(body) {
			i++
			b.WriteString(`\`)
		} else if strings.IndexByte(`[]^&~`, body[i]) >= 0 {
			b.WriteString(`\`)
		}
		b.WriteByte(body[i])
	}
	return b.String()
}

// verdict: -1 taken in again, 1 left out, 0 nothing matches.
func (p Patterns) verdict(path string, folder bool) int {
	relative, ok := strings.CutPrefix(path, p.base+"/")
	if !ok {
		return 0
	}
	for i := len(p.lines) - 1; i >= 0; i-- {
		l := p.lines[i]
		if (folder || !l.folder) && l.match.MatchString(relative) {
			if l.negated {
				return -1
			}
			return 1
		}
	}
	return 0
}

// Ignore is a stack of ignore files, outermost first.
type Ignore []Patterns

// With adds the ignore file of a folder, if there is one. The receiver is not
// changed.
func (g Ignore) With(folder string) Ignore {
	data, err := os.ReadFile(filepath.Join(folder, ".gitignore"))
	if err != nil {
		return g
	}
	return append(g[:len(g):len(g)], ParsePatterns(filepath.ToSlash(folder), string(data)))
}

// Skips reports whether a path (absolute) is left out. Its parents must have
// been asked before: what lies in a folder that is left out cannot return.
func (g Ignore) Skips(path string, folder bool) bool {
	path = filepath.ToSlash(path)
	for i := len(g) - 1; i >= 0; i-- {
		if v := g[i].verdict(path, folder); v != 0 {
			return v > 0
		}
	}
	return false
}
