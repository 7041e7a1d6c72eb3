package casefile

import (
	"fmt"
	"slices"
	"sort"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Severity says whether a case can still be used.
type Severity uint8

const (
	Error   Severity = iota // the case cannot be used
	Warning                 // the case can be used, but look at this
)

func (s Severity) String() string {
	if s == Warning {
		return "warning"
	}
	return "error"
}

// MarshalText makes a severity a word in JSON.
func (s Severity) MarshalText() ([]byte, error) { return []byte(s.String()), nil }

// A Diagnostic is one thing to say about a case file, with its place. Columns
// and lengths count characters, not bytes, from 1. A diagnostic about the case
// as a whole has Line 0.
type Diagnostic struct {
	File     string   `json:"file"`
	Line     int      `json:"line,omitempty"`
	Col      int      `json:"column,omitempty"`
	Len      int      `json:"length,omitempty"`
	Severity Severity `json:"severity"`
	Code     string   `json:"code"`            // stable, one for each kind of mistake: "unknown-name"
	Thing    string   `json:"thing,omitempty"` // what it is about: resistance "paste"
	Text     string   `json:"text"`            // what is wrong: node "cse" is not defined
	Found    string   `json:"found,omitempty"`
	Want     string   `json:"want,omitempty"`
	Fix      string   `json:"fix,omitempty"`    // put in place of the Len characters at Line:Col, it removes the fault
	Hint     string   `json:"hint,omitempty"`   // advice that is not a replacement
	Source   string   `json:"source,omitempty"` // the line, shortened about the place where it is very long

	at    int32 // byte offset, for file order
	under int   // characters of Source before the underlined part
}

// Error returns the message without the line it is about.
func (d Diagnostic) Error() string {
	var b strings.Builder
	b.WriteString(d.File)
	if d.Line > 0 {
		fmt.Fprintf(&b, ":%d:%d", d.Line, d.Col)
	}
	b.WriteString(": ")
	if d.Severity == Warning {
		b.WriteString("warning: ")
	}
	if d.Thing != "" {
		b.WriteString(d.Thing + ": ")
	}
	b.WriteString(d.Text)
	return b.String()
}

// String returns the message, the line it is about, the place underlined, and
// what to write instead; lines end without a newline after the last.
func (d Diagnostic) String() string {
	var b strings.Builder
	b.WriteString(d.Error())
	if d.Source != "" {
		b.WriteString("\n  " + d.Source + "\n  ")
		n := 0
		for _, r := range d.Source {
			if n++; n > d.under {
				break
			}
			if r == '\t' {
				b.WriteByte('\t') // keeps the underline below its text at any tab width
			} else {
				b.WriteByte(' ')
			}
		}
		room := utf8.RuneCountInString(d.Source) - d.under
		b.WriteString(strings.Repeat("^", max(1, min(d.Len, room))))
	}
	if d.Fix != "" {
		b.WriteString("\n  did you mean " + shownFix(d.Fix) + "?")
	}
	if d.Hint != "" {
		b.WriteString("\n  " + d.Hint)
	}
	return b.String()
}

// shownFix puts a replacement in quotes unless it brings its own.
func shownFix(fix string) string {
	if strings.IndexByte("\"'[{", fix[0]) >= 0 || isNumber(fix) {
		return fix
	}
	return `"` + fix + `"`
}

// Shown is how many diagnostics a listing spells out before it only counts.
const shownAtMost = 20

// Listing returns diagnostics as a user reads them: in file order, the first
// twenty spelled out, then a count. It is empty where the list is.
func Listing(list []Diagnostic) string {
	var b strings.Builder
	for i, d := range list {
		if i == shownAtMost {
			fmt.Fprintf(&b, "and %d more\n", len(list)-i)
			break
		}
		b.WriteString(d.String())
		b.WriteByte('\n')
	}
	return b.String()
}

// Failed reports whether the list holds an error.
func Failed(list []Diagnostic) bool {
	for _, d := range list {
		if d.Severity == Error {
			return true
		}
	}
	return false
}

// inFileOrder sorts by place, keeping the order of finding where places are equal. What
// is said twice of one place, by two parts that find it wrong, is said once.
func inFileOrder(list []Diagnostic) []Diagnostic {
	sort.SliceStable(list, func(i, j int) bool { return list[i].at < list[j].at })
	return slices.Compact(list)
}

// A span is a stretch of the text, in bytes.
type span struct{ at, end int32 }

// A source is the text of a case with what is needed to find lines in it.
type source struct {
	file  string
	text  string
	keys  int     // how many there are
	lines []int32 // byte offset at which each line begins; made when first needed
}

// count finds where the lines begin, once.
func (s *source) count() {
	if s.lines != nil {
		return
	}
	s.lines = append(make([]int32, 0, 1+strings.Count(s.text, "\n")), 0)
	for i := 0; i < len(s.text); i++ {
		if s.text[i] == '\n' {
			s.lines = append(s.lines, int32(i+1))
		}
	}
}

// place fills in where d is.
func (s *source) place(d Diagnostic, at span) Diagnostic {
	d.File = s.file
	d.at = at.at
	if len(d.Fix) > longestFix {
		d.Fix = ""
	}
	s.count()
	k := sort.Search(len(s.lines), func(i int) bool { return s.lines[i] > at.at }) - 1
	first := int(s.lines[k])
	line := s.text[first:]
	if i := strings.IndexByte(line, '\n'); i >= 0 {
		line = strings.TrimSuffix(line[:i], "\r")
	}
	from := min(int(at.at)-first, len(line))
	to := max(from, min(int(at.end)-first, len(line))) // a value over several lines: its first
	d.Line = k + 1
	d.Col = utf8.RuneCountInString(line[:from]) + 1
	if k == 0 && strings.HasPrefix(line, bom) && from >= len(bom) {
		d.Col-- // a byte order mark is not a character anyone sees
	}
	d.Len = max(1, utf8.RuneCountInString(line[from:to]))
	d.Source, d.under = window(line, from)
	return d
}

// longestFix is how many bytes a suggestion may have that a user can still read.
const longestFix = 200

const bom = "\ufeff"

// window returns the line, or the part of a long one about the byte from, with
// what a terminal would act on replaced, and the number of characters before it.
func window(line string, from int) (string, int) {
	const before, after = 60, 100
	lead := ""
	if from > before && len(line) > before+after {
		cut := from - before
		for cut < from && !utf8.RuneStart(line[cut]) {
			cut++
		}
		line, from, lead = line[cut:], from-cut, "…"
	}
	tail := ""
	if len(line) > from+after {
		cut := from + after
		for cut > from && !utf8.RuneStart(line[cut]) {
			cut--
		}
		line, tail = line[:cut], "…"
	}
	if strings.HasPrefix(line, bom) {
		line, from = line[len(bom):], max(0, from-len(bom))
	}
	under := utf8.RuneCountInString(line[:from]) + utf8.RuneCountInString(lead)
	return lead + printable(line) + tail, under
}

// printable replaces characters that a terminal would act on or not show.
func printable(s string) string {
	for _, r := range s {
		if r != '\t' && (!unicode.IsGraphic(r) || r == utf8.RuneError) {
			return strings.Map(func(r rune) rune {
				if r == '\t' || unicode.IsGraphic(r) {
					return r
				}
				return utf8.RuneError
			}, s)
		}
	}
	return s
}

// quoted returns s as a message names it: in quotes, shortened, harmless.
func quoted(s string) string { return `"` + brief(s) + `"` }

// brief returns s on one line, shortened, without what a terminal acts on.
func brief(s string) string {
	const most = 60
	if len(s) > most {
		cut := most
		for !utf8.RuneStart(s[cut]) {
			cut--
		}
		s = s[:cut] + "…"
	}
	return strings.ReplaceAll(printable(s), "\t", " ")
}
