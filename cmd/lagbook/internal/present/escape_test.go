package present

import (
	"bytes"
	"cmp"
	"encoding/csv"
	"html"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"
	"unicode"
)

var hostile = []string{
	"", " ", "a", "node_one", "=1+1", "+1", "-1", "-1.5e-7", "-1.5e-1.5e-7", "1e-1-5", "--", "@x", "'=1", "''", "a,b\"c\"", "a|b", "\\|", "\\", "`x`", "*b* _c_ [d](e) <f> ~g~ $h$",
	"# head", "1. one", "- x", "<script>alert(1)</script>", "&amp;", "\" onload=\"", "-->", "]]>", "50 %", "\\input{x}", "{", "}", "$x$", "^~", "?`", "!`", "``x''", ",,", "<<x>>",
	"K/W", "m²·K/W", "µ μ Ω Ω Δ °C ⁻¹ − – ≤", "\\letter{65E5}", "日本", "é", "\x00\x1b[31m\x7f", "\xff\xfe", "a\r\nb\tc", "\u202eabc", "\u2028", "\ufeff", "\u00a0x", "é", "👩‍🔧", "\ufffd",
}

func seed(f *testing.F) {
	for _, s := range hostile {
		f.Add(s)
	}
}

// What a page shows is on one line, has nothing that acts on a terminal, and
// is what was written where that is so already.
func FuzzText(f *testing.F) {
	seed(f)
	f.Fuzz(func(t *testing.T, s string) {
		got := clean(s)
		if clean(got) != got {
			t.Fatalf("%q: cleaned twice", s)
		}
		for _, r := range got {
			if unicode.IsControl(r) || r == '\u2028' || r == '\u202e' {
				t.Fatalf("%q: %q", s, got)
			}
		}
		if strings.IndexFunc(s, func(r rune) bool { return !unicode.IsPrint(r) || r == '\ufffd' }) < 0 && got != s {
			t.Fatalf("%q: %q", s, got)
		}
	})
}

// What a page sets differs from what was written in signs and powers of numbers
// and in spaces that do not break, in nothing else; and it is set once.
func FuzzPolish(f *testing.F) {
	seed(f)
	back := strings.NewReplacer("×10", "e", "⁻", "-", "⁰", "0", "¹", "1", "²", "2", "³", "3", "⁴", "4", "⁵", "5", "⁶", "6", "⁷", "7", "⁸", "8", "⁹", "9", "−", "-", nbspText, " ")
	power := regexp.MustCompile(`e\+?(-?)0*([0-9])`)
	plain := func(s string) string { return power.ReplaceAllString(back.Replace(s), "e$1$2") }
	f.Fuzz(func(t *testing.T, s string) {
		got := polish(s)
		if plain(got) != plain(clean(s)) {
			t.Fatalf("%q: %q", s, got)
		}
		if polish(got) != got {
			t.Fatalf("%q: %q, then %q", s, got, polish(got))
		}
	})
}

func unescapeMarkdown(s string) string {
	var b strings.Builder
	after := false
	for _, r := range s {
		if r == '\\' && !after {
			after = true
			continue
		}
		after = false
		b.WriteRune(r)
	}
	return b.String()
}

// markdownCells splits a row at the bars that are not escaped.
func markdownCells(row string) []string {
	var cells []string
	var b strings.Builder
	after := false
	for _, r := range row {
		if r == '|' && !after {
			cells = append(cells, b.String())
			b.Reset()
			continue
		}
		after = r == '\\' && !after
		b.WriteRune(r)
	}
	return cells
}

func FuzzMarkdown(f *testing.F) {
	seed(f)
	f.Fuzz(func(t *testing.T, s string) {
		want := clean(s)
		if got := unescapeMarkdown(escapeMarkdown(s)); got != want {
			t.Fatalf("%q: %q", s, got)
		}
		if got := unescapeMarkdown(markdownStart(escapeMarkdown(s))); got != strings.TrimLeft(want, " ") {
			t.Fatalf("%q at a start: %q", s, got)
		}
		var b bytes.Buffer
		d := Doc{Parts: []Part{Table{Columns: []Column{{"a", Left}, {s, Right}, {"c", Left}}, Rows: [][]string{{"x", s, "y"}}}}}
		if err := Markdown(&b, d); err != nil {
			t.Fatal(err)
		}
		lines := strings.Split(strings.TrimSuffix(b.String(), "\n"), "\n")
		if len(lines) != 3 {
			t.Fatalf("%q: %d lines", s, len(lines))
		}
		for line, shown := range map[string]string{lines[0]: plainSpaces(polishHead(s)), lines[2]: plainSpaces(polish(s))} {
			cells := markdownCells(line)
			if len(cells) != 4 || strings.Trim(unescapeMarkdown(cells[2]), " ") != strings.Trim(shown, " ") {
				t.Fatalf("%q: %q", s, line)
			}
		}
	})
}

func FuzzCSV(f *testing.F) {
	seed(f)
	f.Fuzz(func(t *testing.T, s string) {
		var b bytes.Buffer
		d := Doc{Parts: []Part{Table{Columns: []Column{{s, Left}, {"b", Left}}, Rows: [][]string{{"x", s}, {s, "y"}}}}}
		if err := CSV(&b, d); err != nil {
			t.Fatal(err)
		}
		records, err := csv.NewReader(&b).ReadAll()
		if err != nil || len(records) != 3 {
			t.Fatalf("%q: %q, %v", s, records, err)
		}
		for _, cell := range []string{records[0][0], records[1][1], records[2][0]} {
			if cell != "" && strings.ContainsRune("=+-@", rune(cell[0])) && !isNumber(cell) {
				t.Fatalf("%q: a spreadsheet takes %q for a formula", s, cell)
			}
			if got := unescapeCSV(cell); got != clean(s) {
				t.Fatalf("%q: %q", s, got)
			}
		}
	})
}

func unescapeCSV(s string) string {
	if body := strings.TrimLeft(s, "'"); body != s && body != "" && strings.ContainsRune("=+-@", rune(body[0])) {
		return s[1:]
	}
	return s
}

// tags lists the tags of a page, in order, with their attributes.
func tags(page string) (list []string, texts []string) {
	for page != "" {
		text, rest, ok := strings.Cut(page, "<")
		texts = append(texts, html.UnescapeString(text))
		if !ok {
			break
		}
		tag, after, _ := strings.Cut(rest, ">")
		list = append(list, tag)
		page = after
	}
	return list, texts
}

func FuzzHTML(f *testing.F) {
	seed(f)
	page := func(t *testing.T, s string) string {
		var b bytes.Buffer
		err := HTML(&b, Doc{Title: "t" + s, Parts: []Part{Heading{1, s}, Paragraph{s}, Facts{[]Fact{{s, s}}}, List{[]string{s}}, Warning{s}, Formula{s}, Caution{s},
			Table{Caption: "c" + s, Columns: []Column{{s, Left}, {s, Point}}, Rows: [][]string{{s, s}}}}})
		if err != nil {
			t.Fatal(err)
		}
		_, body, _ := strings.Cut(b.String(), "</style>")
		return body
	}
	f.Fuzz(func(t *testing.T, s string) {
		got, texts := tags(page(t, s))
		want, _ := tags(page(t, "x"))
		if !slices.Equal(got, want) {
			t.Fatalf("%q changes the page: %q", s, got)
		}
		if html.UnescapeString(escapeHTML(s)) != clean(s) {
			t.Fatalf("%q: %q", s, escapeHTML(s))
		}
		n := 0
		for _, text := range texts {
			if text == polish(s) {
				n++
			}
		}
		if n < 10 && clean(s) != "" && strings.TrimSpace(s) == s {
			t.Fatalf("%q stands %d times on the page", s, n)
		}
	})
}

// unescapeLaTeX reads back what escapeLaTeX writes, longest symbol first.
func unescapeLaTeX(t *testing.T, s string) string {
	type pair struct{ to, from string }
	pairs := []pair{{"", "{}"}}
	for r, m := range latexLetters {
		pairs = append(pairs, pair{string(r), m})
	}
	slices.SortFunc(pairs, func(a, b pair) int { return cmp.Or(len(b.from)-len(a.from), strings.Compare(a.from, b.from)) })
	var b strings.Builder
next:
	for s != "" {
		if rest, ok := strings.CutPrefix(s, `\letter{`); ok {
			hex, after, _ := strings.Cut(rest, "}")
			n, err := strconv.ParseInt(hex, 16, 32)
			if err != nil {
				t.Fatal(err)
			}
			b.WriteRune(rune(n))
			s = after
			continue
		}
		for _, p := range pairs {
			if rest, ok := strings.CutPrefix(s, p.from); ok {
				b.WriteString(p.to)
				s = rest
				continue next
			}
		}
		if strings.ContainsRune("\\{}$&#_%~^", rune(s[0])) {
			t.Fatalf("%.20q stands bare", s)
		}
		b.WriteByte(s[0])
		s = s[1:]
	}
	return b.String()
}

func FuzzLaTeX(f *testing.F) {
	seed(f)
	f.Fuzz(func(t *testing.T, s string) {
		out := escapeLaTeX(s)
		if got := unescapeLaTeX(t, out); got != clean(s) {
			t.Fatalf("%q: %q is read as %q", s, out, got)
		}
		for _, pair := range []string{"--", "``", "''", "?`", "!`", "<<", ">>", ",,"} {
			if strings.Contains(out, pair) {
				t.Fatalf("%q: %s would become one sign", s, pair)
			}
		}
	})
}
