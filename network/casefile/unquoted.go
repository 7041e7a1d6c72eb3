package casefile

import (
	"strconv"
	"strings"
	"unicode/utf8"

	"lagbook/network/quantity"
)

// unquoted is about a value that begins at a place and needs quotes, or is no
// number: 0.35 K/W, steady, 0,35, 007.
func (f *fault) unquoted(from int) (Diagnostic, span) {
	end := f.endOfValue(from)
	word := f.full[from:end]
	if f.depth > 0 && strings.HasPrefix(strings.TrimLeft(f.full[from+len(bareStart(word)):], " \t"), "=") && begins(word) && f.beginsLine(from) {
		return f.neverClosed() // a list that swallows the lines below it
	}
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
	case f.mentions("datetime"):
		d.Code, d.Text, d.Fix = "syntax", quoted(word)+" is not a date or time", ""
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
	return d, span{int32(from), int32(end)}
}

// bareStart returns what of a text could be a key.
func bareStart(text string) string {
	n := 0
	for n < len(text) && bare(text[n]) {
		n++
	}
	return text[:n]
}

// beginsLine reports whether only blanks stand before a place on its line.
func (f *fault) beginsLine(at int) bool {
	before := strings.TrimRight(f.full[:at], " \t")
	return before == "" || before[len(before)-1] == '\n'
}

// endOfValue returns where a value without quotes was meant to end.
func (f *fault) endOfValue(from int) int {
	end := f.restOfLine(from)
	if f.depth > 0 {
		if k := strings.IndexAny(f.full[from:end], ",]}"); k >= 0 {
			if f.inBraces() && f.full[from+k] == ',' && digit(f.full[from]) && from+k+1 < end && digit(f.full[from+k+1]) {
				more := strings.IndexAny(f.full[from+k+1:end], ",]}")
				if more < 0 {
					more = end - from - k - 1
				}
				k += 1 + more
			}
			end = from + len(strings.TrimRight(f.full[from:from+k], " \t"))
		}
	}
	end = max(end, from+1)
	for end < len(f.full) && !utf8.RuneStart(f.full[end]) {
		end++
	}
	return end
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
	return ok && len(rest) == 3 && digits(whole) && digits(rest)
}

func digits(word string) bool { return word != "" && strings.Trim(word, "0123456789") == "" }

// nearNumber returns the number a word was meant to be: .5, 5., 0,35, 007.
func nearNumber(word string) string {
	if thousands(word) {
		return ""
	}
	try := strings.Replace(word, ",", ".", 1)
	x, err := strconv.ParseFloat(strings.ReplaceAll(try, "_", ""), 64)
	if err != nil || x != x || x > 1e300 || x < -1e300 {
		return ""
	}
	return strconv.FormatFloat(x, 'g', -1, 64)
}

// isNumber reports a text that stands for a number without quotes.
func isNumber(text string) bool {
	_, err := strconv.ParseFloat(text, 64)
	return err == nil && (digit(text[0]) || text[0] == '-')
}
