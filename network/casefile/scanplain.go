package casefile

import (
	"strconv"
	"strings"
	"time"
	"unicode/utf8"

	"lagbook/network/quantity"
)

// begins reports whether what is next looks like a key or a header.
func (s *scanner) begins() bool {
	rest := s.text[s.pos:]
	if strings.HasPrefix(rest, "[") {
		rest = strings.TrimLeft(rest, "[")
	}
	return rest != "" && bare(rest[0]) && !digit(rest[0])
}

// plain reads a value without quotes: a number, a word, a date.
func (s *scanner) plain() *node {
	from := s.pos
	for s.pos < len(s.text) && plainByte(s.text[s.pos]) {
		s.pos++
	}
	if day := s.text[from:s.pos]; len(day) == 10 && day[4] == '-' && day[7] == '-' && s.pos+3 < len(s.text) &&
		s.text[s.pos] == ' ' && digit(s.text[s.pos+1]) && digit(s.text[s.pos+2]) && s.text[s.pos+3] == ':' {
		for s.pos++; s.pos < len(s.text) && plainByte(s.text[s.pos]); { // a date and a time
			s.pos++
		}
	}
	word := s.text[from:s.pos]
	n := s.newNode(plainKind(word), from)
	n.end, n.text = int32(s.pos), word
	ok := n.kind != kindString && !s.unitFollows()
	if !ok {
		return s.unquoted(from, n)
	}
	if !n.inRange() {
		s.fault(Diagnostic{Code: "range", Text: quoted(word) + " is beyond the range of numbers"}, from, s.pos)
		return nil
	}
	return n
}

// unitFollows reports something between the value and the end of it that can
// only be a unit or more of a word.
func (s *scanner) unitFollows() bool {
	rest := strings.TrimLeft(s.text[s.pos:], " \t")
	if rest == "" {
		return false
	}
	switch rest[0] {
	case '#', '\n', '\r', ',', ']', '}':
		if rest[0] != ',' || s.depth == 0 {
			return rest[0] == ','
		}
		// 0,9 inside braces: a key cannot follow so closely, a decimal comma was meant
		return s.braces && len(rest) > 1 && digit(rest[1]) && rest == s.text[s.pos:]
	}
	return true
}

// unquoted reports a value that needs quotes: 0.35 K/W, steady, 0,35.
// What was meant is clear enough to read on.
func (s *scanner) unquoted(from int, n *node) *node {
	end := s.restOfLine(from)
	if s.depth > 0 {
		if k := strings.IndexAny(s.text[from:end], ",]}"); k >= 0 {
			if s.braces && s.text[from+k] == ',' && digit(s.text[from]) && from+k+1 < end && digit(s.text[from+k+1]) {
				more := strings.IndexAny(s.text[from+k+1:end], ",]}")
				if more < 0 {
					more = end - from - k - 1
				}
				k += 1 + more
			}
			end = from + len(strings.TrimRight(s.text[from:from+k], " \t"))
		}
	}
	end = max(end, from+1)
	for end < len(s.text) && !utf8.RuneStart(s.text[end]) {
		end++
	}
	word := s.text[from:end]
	d := Diagnostic{Code: "unquoted", Text: "a text is written in quotes", Fix: `"` + word + `"`}
	switch {
	case strings.ContainsAny(word, "\"'\\=") || strings.TrimLeft(word, " ,;:") == "":
		d.Code, d.Text, d.Fix = "syntax", quoted(word)+" is not a value", ""
		if rest, ok := strings.CutPrefix(word, "="); ok && !strings.ContainsAny(rest, "\"'\\") {
			d.Text, d.Fix = "an expression is written in quotes", `"= `+strings.TrimSpace(rest)+`"`
		} else if inner := strings.Trim(word, "“”„‘’"); inner != word && !strings.ContainsAny(inner, "\"'\\=") {
			d.Fix = `"` + inner + `"`
		}
	case strings.ContainsAny(word, "“”„‘’"):
		d.Text = "the quotes of a value are straight"
		d.Fix = `"` + strings.Trim(word, "“”„‘’") + `"`
	case thousands(word):
		d.Code, d.Text, d.Fix = "syntax", quoted(word)+" is not a number", ""
		d.Hint = "decimals follow a point; no sign stands between thousands"
	case nearNumber(word) != "":
		d.Code, d.Text, d.Fix = "syntax", quoted(word)+" is not a number", nearNumber(word)
	case strings.ContainsAny(word, "*/^()+") && isExpression(word):
		d.Text, d.Fix = "an expression is written in quotes", `"= `+word+`"`
	case digit(word[0]) || strings.IndexByte("+-.", word[0]) >= 0:
		d.Text = "a value with its unit is written in quotes"
	}
	if i := strings.IndexFunc(word, func(r rune) bool { return r < ' ' && r != '\t' || r == 0x7f }); i >= 0 {
		d = controlFault(word[i])
	}
	s.fault(d, from, end)
	if d.Fix == "" {
		s.pos = from
		return nil
	}
	s.pos = end
	return n
}

// isExpression reports a text that reckons with names, not one quantity.
func isExpression(word string) bool {
	if _, err := quantity.Parse(word); err == nil {
		return false
	}
	_, err := quantity.Compile(word, func(string) (int, bool) { return 0, true })
	return err == nil
}

// thousands reports a number like 1,000, of which nobody can say whether it is
// one or a thousand.
func thousands(word string) bool {
	whole, rest, ok := strings.Cut(word, ",")
	return ok && len(rest) == 3 && digits(whole, "0123456789") && digits(rest, "0123456789")
}

// nearNumber returns the number a word was meant to be: .5, 5., 0,35, 007.
func nearNumber(word string) string {
	if thousands(word) {
		return ""
	}
	try := strings.Replace(word, ",", ".", 1)
	f, err := strconv.ParseFloat(strings.ReplaceAll(try, "_", ""), 64)
	if err != nil || f != f || f > 1e300 || f < -1e300 {
		return ""
	}
	return strconv.FormatFloat(f, 'g', -1, 64)
}

func digit(c byte) bool { return c >= '0' && c <= '9' }

// plainByte reports a character of a number, a date, true, false, inf or nan,
// and of what was meant as a word.
func plainByte(c byte) bool {
	return c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || digit(c) || c == '+' || c == '-' || c == '.' || c == '_' || c == ':'
}

// plainKind tells what a word without quotes is; kindString where it is nothing.
func plainKind(w string) kind {
	if w == "true" || w == "false" {
		return kindBoolean
	}
	if isInteger(w) {
		return kindInteger
	}
	if isFloat(w) {
		return kindFloat
	}
	if isDate(w) {
		return kindDate
	}
	return kindString
}

// isInteger follows the grammar of TOML: 12, +3, -1_000, 0xff, 0o17, 0b1.
func isInteger(w string) bool {
	if len(w) > 2 && w[0] == '0' {
		switch w[1] {
		case 'x':
			return digits(w[2:], "0123456789abcdefABCDEF")
		case 'o':
			return digits(w[2:], "01234567")
		case 'b':
			return digits(w[2:], "01")
		}
	}
	w = unsigned(w)
	return digits(w, "0123456789") && (len(w) == 1 || w[0] != '0')
}

// isFloat follows the grammar of TOML: 1.5, 1e9, -2.5e-3, inf, nan.
func isFloat(w string) bool {
	w = unsigned(w)
	if w == "inf" || w == "nan" {
		return true
	}
	mantissa, exponent := w, ""
	if k := strings.IndexAny(w, "eE"); k >= 0 {
		mantissa, exponent = w[:k], unsigned(w[k+1:])
		if !digits(exponent, "0123456789") {
			return false
		}
	}
	whole, fraction, dot := strings.Cut(mantissa, ".")
	if dot && !digits(fraction, "0123456789") || !dot && exponent == "" {
		return false
	}
	return digits(whole, "0123456789") && (len(whole) == 1 || whole[0] != '0')
}

func unsigned(w string) string {
	if w != "" && (w[0] == '+' || w[0] == '-') {
		return w[1:]
	}
	return w
}

// digits reports whether w is digits of a set with single underscores between.
func digits(w, set string) bool {
	if w == "" || w[len(w)-1] == '_' {
		return false
	}
	under := true
	for i := 0; i < len(w); i++ {
		if w[i] == '_' {
			if under {
				return false
			}
			under = true
			continue
		}
		if strings.IndexByte(set, w[i]) < 0 {
			return false
		}
		under = false
	}
	return true
}

// isDate reports a date, a time, or both, as TOML writes them.
func isDate(w string) bool {
	if len(w) < 5 || !digit(w[0]) || !digit(w[1]) {
		return false
	}
	w = strings.Map(func(r rune) rune {
		switch r {
		case 't', ' ':
			return 'T'
		case 'z':
			return 'Z'
		}
		return r
	}, w)
	for _, layout := range []string{"2006-01-02T15:04:05.999999999Z07:00", "2006-01-02T15:04:05.999999999", "2006-01-02", "15:04:05.999999999",
		"2006-01-02T15:04Z07:00", "2006-01-02T15:04", "15:04"} {
		if _, err := time.Parse(layout, w); err == nil {
			return hours(w)
		}
	}
	return false
}

// hours reports whether the hour is written with two digits; time.Parse takes one.
func hours(w string) bool {
	if k := strings.IndexByte(w, ':'); k >= 0 {
		return k == 2 || k > 2 && digit(w[k-2]) && digit(w[k-1]) && !strings.Contains(w, ",")
	}
	return true
}

// inRange reports whether a number fits an int64 or a float64.
func (n *node) inRange() bool {
	switch n.kind {
	case kindInteger:
		_, err := strconv.ParseInt(n.text, 0, 64)
		return err == nil
	case kindFloat:
		_, err := strconv.ParseFloat(unsigned(strings.ReplaceAll(n.text, "_", "")), 64)
		return err == nil
	}
	return true
}

// number returns the value of a number or whole number.
func (n *node) number() float64 {
	if n.kind == kindInteger {
		i, _ := strconv.ParseInt(n.text, 0, 64)
		return float64(i)
	}
	f, _ := strconv.ParseFloat(unsigned(strings.ReplaceAll(n.text, "_", "")), 64)
	if n.text[0] == '-' {
		return -f
	}
	return f
}
