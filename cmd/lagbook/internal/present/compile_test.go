package present

import (
	"bytes"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"
)

var overfull = regexp.MustCompile(`Overfull \\hbox \(([0-9.]+)pt too wide\)`)

// Where pdflatex is installed it sets a page of everything, with hostile names
// and texts, without an error and without a line that leaves the page.
func TestLaTeXCompiles(t *testing.T) {
	compiler, err := exec.LookPath("pdflatex")
	if err != nil {
		t.Log("no pdflatex here; its pages are only compared with those read before")
		return
	}
	d := rich()
	d.Title, d.Label, d.About = strings.Join(hostile, " "), "invented data", []Fact{{"author", "A. N. Other"}, {"date", "2025-03-10"}}
	for _, s := range hostile {
		d.Parts = append(d.Parts, Heading{1, s}, Paragraph{s}, List{[]string{s}}, Facts{[]Fact{{s, s}}}, Formula{s}, Warning{s},
			Table{Caption: s, Columns: []Column{{s, Left}, {s, Right}, {s, Point}}, Rows: [][]string{{s, s, s}, {"-1", "-1.5e-7", "-0.805 %"}}, Marks: []string{s}})
	}
	d.Parts = append(d.Parts, wide(), List{}, Facts{}, Table{Columns: []Column{{"a", Left}}}, Caution{"the end"})
	dir := t.TempDir()
	var page bytes.Buffer
	if err := LaTeX(&page, d); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(filepath.Join(dir, "page.tex"), page.Bytes(), 0o644); err != nil {
		t.Fatal(err)
	}
	run := exec.Command(compiler, "-interaction=nonstopmode", "-halt-on-error", "page.tex")
	run.Dir = dir
	if out, err := run.CombinedOutput(); err != nil {
		t.Fatalf("%v\n%.3000s", err, out[max(0, len(out)-3000):])
	}
	log, err := os.ReadFile(filepath.Join(dir, "page.log"))
	if err != nil {
		t.Fatal(err)
	}
	for _, m := range overfull.FindAllSubmatch(log, -1) {
		if pt, err := strconv.ParseFloat(string(m[1]), 64); err != nil || pt > 10 {
			t.Errorf("%s", m[0])
		}
	}
}

// wide is a table that no page holds as it is: words to break, and more columns
// of numbers than fit side by side.
func wide() Table {
	t := Table{Caption: "Wide", Columns: []Column{{"t / min", Point}, {"how the number follows from the others", Left}}}
	row := []string{"12.25", "ρ·c·t·A = 7900 kg/m³ · 477 J/(kg·K) · 1 mm · 9 m², as the drawing of the wall has it"}
	for range 12 {
		t.Columns = append(t.Columns, Column{"flow of the outer film / W", Point})
		row = append(row, "-1234.5")
	}
	for range 50 {
		t.Rows = append(t.Rows, row)
	}
	return t
}

// No line of a text page is wider than the page, and no quantity is parted.
func TestTablesKeepToThePage(t *testing.T) {
	for _, columns := range []int{0, 60, 100, 160} {
		d := rich()
		d.Width = columns
		d.Parts = append(d.Parts, wide())
		var b bytes.Buffer
		if err := Text(&b, d); err != nil {
			t.Fatal(err)
		}
		if columns == 0 {
			columns = defaultWidth
		}
		for line := range strings.Lines(b.String()) {
			line = strings.TrimSuffix(line, "\n")
			if width(line) > columns {
				t.Errorf("%d columns: %q takes %d", columns, line, width(line))
			}
			if regexp.MustCompile(`(7900|477| 9| 1)$`).MatchString(line) {
				t.Errorf("%d columns: a number without its unit: %q", columns, line)
			}
		}
	}
}
