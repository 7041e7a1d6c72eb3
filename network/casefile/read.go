package casefile

import (
	"fmt"
	"os"
	"slices"
	"strconv"
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A reader turns the tree of one file into a Case.
type reader struct {
	c          *Case
	src        *source
	fsys       *os.Root
	voc        []Vocabulary
	domains    []*Vocabulary // that the file has tables of
	diags      []Diagnostic
	silent     bool // errors beyond maxDiagnostics are not listed
	givenIndex map[string]int
	known      []quantity.Value          // of the given, as written
	parsed     map[string]quantity.Value // by text
	forms      map[*Field]*waveFields

	profileFields []*Field        // one for each dimension and kind
	blamed        map[string]bool // names that a faulty part may have meant: faults that follow are not reported
	second        map[string]bool // table.name of elements whose name is taken
	lost          map[string]bool // names of parts in tables that could not be read
	later         bool            // names may come from uses that could not be read
	anything      bool            // a faulty part may have meant any name
	endless       bool            // [run] to is stated and at fault
	rows          int             // read from data files so far
	breaks        int             // pieces of waveforms so far
	work          int             // pieces that expressions of waveforms went through
	files         map[string]*csvFile
	elems         []Element // slabs of what every element needs
	entries       []entry
	unready       map[string]bool // domains whose head is at fault: nothing of them is built, and nothing said of what they lack
	usage
	asking
}

// Read reads a case. name is how messages call the file; fsys is the directory
// beside it, from which data files may be read, nil for none; voc are the tables
// of the domains. The diagnostics come in file order; where one of them is an
// Error the case is nil, otherwise they are warnings.
//
// A Case does not change after Read: Eval, Build and Explain may be called by
// several goroutines.
func Read(name string, src []byte, fsys *os.Root, voc ...Vocabulary) (*Case, []Diagnostic) {
	r := &reader{src: &source{file: name}, fsys: fsys, voc: voc, givenIndex: map[string]int{},
		forms: map[*Field]*waveFields{}, blamed: map[string]bool{}, second: map[string]bool{}, lost: map[string]bool{}, unready: map[string]bool{}, files: map[string]*csvFile{}}
	if len(src) > maxBytes {
		r.src.text = string(src[:maxBytes+1])
	} else {
		r.src.text = string(src)
	}
	r.c = &Case{File: name, src: r.src, voc: voc, nodes: map[string]network.NodeID{}}
	root, faults := r.src.load()
	r.diags = faults
	if faults == nil {
		keys := r.src.keys
		r.c.slots, r.c.refs, r.c.byName = make([]slot, 0, keys/4), make([]place, 0, keys/4), make(map[elementName]*Element, keys/4)
		r.parsed = make(map[string]quantity.Value, keys/8)
		r.read(root)
	}
	r.same.spell(r.c, r.diags)
	r.diags = inFileOrder(r.diags)
	if r.silent {
		r.diags = append(r.diags, Diagnostic{File: name, Code: "too-many", Text: fmt.Sprintf("more than %d faults; the others are not listed", maxDiagnostics)})
	}
	if Failed(r.diags) {
		return nil, r.diags
	}
	r.src.count() // now, so that a case can be used by several goroutines
	return r.c, r.diags
}

// read goes through the top of the file.
func (r *reader) read(root *node) {
	r.readParts(root)
	r.nameProfiles(root.table.find("profile"))
	if k := root.table.find("given"); k != nil {
		r.readGiven(k)
	}
	r.usesGiven()
	r.heads(root)
	r.usedDomains()
	if k := root.table.find("run"); k != nil {
		r.run(k)
	}
	r.findHorizon(root)
	r.readProfiles()
	var asked []*key
	for i := range root.table.keys {
		k := &root.table.keys[i]
		switch {
		case k.name == "given" || k.name == "profile" || k.name == "part" || k.name == "use":
		case r.about(k):
		case askedWord(k.name):
			asked = append(asked, k)
		case r.domainTables(k):
		default:
			r.unknownTop(k)
		}
	}
	r.expand()
	slices.SortStableFunc(r.c.Elements, inFile)
	r.references()
	r.build()
	r.questions(asked)
	r.sizes(asked)
	if !Failed(r.diags) {
		r.trial()
	}
	if !Failed(r.diags) {
		r.trialScenarios()
	}
	if !Failed(r.diags) {
		r.unused()
		r.unusedProfiles()
		r.unusedParts()
	}
}

// maxDiagnostics is how many things are said about one file. A file with more
// is not a case with mistakes in it; each costs a look at its line and at all
// names that might have been meant.
const maxDiagnostics = 100

// full reports whether no more will be said.
func (r *reader) full() bool { return len(r.diags) >= maxDiagnostics }

// report adds a diagnostic.
func (r *reader) report(d Diagnostic) {
	if r.full() {
		r.silent = r.silent || d.Severity == Error
		return
	}
	if !r.same.repeats(d, r.useFor(d), len(r.diags)) {
		r.diags = append(r.diags, d)
	}
}

func (r *reader) reportAll(list []Diagnostic) {
	for _, d := range list {
		r.report(d)
	}
}

// at adds a diagnostic at a place.
func (r *reader) at(s span, d Diagnostic) {
	if r.full() {
		r.report(d)
		return
	}
	r.report(r.src.place(d, s))
}

// line returns the number of the line of a place.
func (r *reader) line(s span) string { return strconv.Itoa(r.src.place(Diagnostic{}, s).Line) }

// about reads the keys that say what the case is about.
func (r *reader) about(k *key) bool {
	switch k.name {
	case "title":
		r.text(k, &r.c.Title)
	case "author":
		r.text(k, &r.c.Author)
	case "date":
		r.text(k, &r.c.Date)
	case "revision":
		r.text(k, &r.c.Revision)
	case "references":
		r.texts(k, &r.c.References)
	case "leaves_out":
		r.texts(k, &r.c.LeavesOut)
	default:
		return false
	}
	return true
}

func (r *reader) text(k *key, to *string) {
	if k.value.kind != kindString && !(k.value.kind == kindDate && k.name == "date") {
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, "a text in quotes")
		return
	}
	*to = k.value.text
}

func (r *reader) texts(k *key, to *[]string) {
	if k.value.kind == kindString {
		*to = []string{k.value.text}
		return
	}
	if k.value.kind != kindArray {
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, "a list of texts in quotes")
		return
	}
	for _, n := range k.value.items {
		if n.kind != kindString {
			r.wrongType(owner{}, n, &Field{Name: k.name}, "a text in quotes")
			continue
		}
		*to = append(*to, n.text)
	}
}

// wrongType reports a value of another type than stands here.
func (r *reader) wrongType(o owner, n *node, f *Field, want string) {
	if r.full() {
		r.report(Diagnostic{})
		return
	}
	found := n.kind.a()
	d := Diagnostic{Code: "wrong-type", Thing: o.thing(), Text: label(f) + "this is " + found + "; expected " + want, Found: found, Want: want}
	r.at(n.span, d)
}

// Words agreed for the top of a case that a later version will read.
var notBuiltTop = []string{"tolerance", "air", "hydraulic", "pneumatic", "thermal"}

// words that [run], [[table]] and the like are read from.
var askedWords = []string{"run", "print", "show", "transfer", "table", "limit", "scenario", "result", "find", "size", "measured"}

func askedWord(w string) bool {
	for _, a := range askedWords {
		if a == w {
			return true
		}
	}
	return false
}

// topWords lists what may stand at the top of the file.
func (r *reader) topWords() []string {
	words := []string{"title", "author", "date", "revision", "references", "leaves_out", "given", "profile", "part", "use", "scenario", "run", "print", "transfer", "table", "result", "limit", "find", "size", "measured"}
	for i := range r.voc {
		if r.voc[i].Domain != "" {
			words = append(words, r.voc[i].Domain)
			continue
		}
		for j := range r.voc[i].Tables {
			words = append(words, r.voc[i].Tables[j].Name)
		}
	}
	return words
}

// missing reports whether a name that is not found may stand in something that
// could not be read: then its absence is not a fault of its own.
func (r *reader) missing(name string) bool {
	_, bare := r.c.domainOf(name)
	return r.later || r.noResults || r.lost[bare] || r.inAbsent(bare)
}

// lose notes the names of the parts in a table that cannot be read.
func (r *reader) lose(n *node) {
	r.blame(n)
	if n.table == nil {
		return
	}
	for i := range n.table.keys {
		r.lost[r.scope.in(n.table.keys[i].name)] = true
	}
}

// unknownTop reports a word at the top of the file that nothing reads.
func (r *reader) unknownTop(k *key) {
	r.blame(k.value)
	for i := range r.voc {
		if r.voc[i].Domain == "" && contains(r.voc[i].NotBuilt, k.name) {
			r.notBuilt(owner{}, k, k.name)
			return
		}
	}
	if contains(notBuiltTop, k.name) {
		r.notBuilt(owner{}, k, k.name)
		return
	}
	d := Diagnostic{Code: "unknown-key", Text: quoted(k.name) + " is not known here"}
	if near, ok := quantity.Nearest(k.name, r.topWords()); ok {
		d.Fix = near
	} else {
		d.Hint = "a case is made of " + strings.Join(r.topWords(), ", ")
	}
	r.at(k.span, d)
}

// notBuilt reports a word that is agreed but not built.
func (r *reader) notBuilt(o owner, k *key, word string) {
	r.at(k.span, Diagnostic{Code: "not-built", Thing: o.thing(), Text: quoted(word) + " is not known yet: this version does not build it"})
}

func contains(list []string, word string) bool {
	for _, s := range list {
		if s == word {
			return true
		}
	}
	return false
}
