// Package present turns a document into text, Markdown, CSV, HTML or LaTeX.
//
// A Doc holds what a page says, in order, as strings already rounded and with
// their units; this package decides only how it looks. JSON is not made from a
// Doc but by marshalling the answers themselves.
//
// Every encoder has one escape function, and nothing reaches the page around
// it: what a case file calls its nodes can change neither the structure of the
// page nor, in a spreadsheet, be taken for a formula.
package present

import (
	"fmt"
	"io"
	"strings"
)

// A Doc is one page.
type Doc struct {
	Title string
	About []Fact // who wrote the case, when, which revision: one line under the title
	Label string // what must be seen before any number, as "invented data"; "" for nothing
	Lang  string // of the words, as HTML has it; "" is "en"
	Width int    // columns of a page of text; 0 is 100. Running text stays within 80
	Parts []Part
}

// A Part is one of Heading, Paragraph, List, Facts, Table, Warning, Formula,
// Caution.
type Part interface{ part() }

// A Heading opens a section. Level 1 is the first below the title.
type Heading struct {
	Level int // 1 or 2; 0 counts as 1
	Text  string
}

// A Paragraph is running text; the encoders break its lines.
type Paragraph struct{ Text string }

// A List is a list of points.
type List struct{ Items []string }

// Facts are names with what they are: "Start", "steady state of …".
type Facts struct{ List []Fact }

// A Fact is one line of Facts.
type Fact struct{ Name, Value string }

// A Table has a heading for each column and a string for each cell. A short
// row is filled up with empty cells.
type Table struct {
	Caption string
	Columns []Column
	Rows    [][]string

	// Marks holds a remark for each row, "" for none: where a load changes.
	// nil: no row has one.
	Marks []string

	// Full, where not nil, replaces Rows in CSV: the same cells at full
	// precision, FullHead the headings that go with them.
	Full     [][]string
	FullHead []string
}

// A Column is the head of a column and where its cells stand.
type Column struct {
	Head  string
	Align Align
}

// Align says where the cells of a column stand.
type Align uint8

const (
	Left  Align = iota // text
	Right              // text pushed to the right
	Point              // numbers, decimal points in one line
)

// A Warning is said beside the result it concerns.
type Warning struct{ Text string }

// A Formula is a formula with its numbers put in, one line.
type Formula struct{ Text string }

// A Caution closes the page: what the answer is not.
type Caution struct{ Text string }

// byline is the line under the title: the label between two marks, then who and
// when; "" where there is nothing to say.
func byline(d Doc, open, close string, escape func(string) string) string {
	var words []string
	if d.Label != "" {
		words = append(words, open+escape(polish(d.Label))+close)
	}
	for _, f := range d.About {
		words = append(words, escape(polish(f.Name)+nbspText+polish(f.Value)))
	}
	return strings.Join(words, escape(" · "))
}

func (Heading) part()   {}
func (Paragraph) part() {}
func (List) part()      {}
func (Facts) part()     {}
func (Table) part()     {}
func (Warning) part()   {}
func (Formula) part()   {}
func (Caution) part()   {}

// Formats are the names Encode knows, in the order help lists them.
func Formats() []string { return []string{"text", "markdown", "csv", "html", "latex"} }

// Encode writes d in the format named. It returns an error where the format is
// not one of Formats or w fails.
func Encode(w io.Writer, format string, d Doc) error {
	switch format {
	case "text":
		return Text(w, d)
	case "markdown":
		return Markdown(w, d)
	case "csv":
		return CSV(w, d)
	case "html":
		return HTML(w, d)
	case "latex":
		return LaTeX(w, d)
	}
	return fmt.Errorf("format %q is not one of %s", format, strings.Join(Formats(), ", "))
}
