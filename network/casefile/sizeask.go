package casefile

import "lagbook/network"

// An AskSize is one [size.NAME]: the value of a given value at which limits are met. One of
// Range, Choose and Catalogue states what may be chosen.
type AskSize struct {
	Name        string
	Vary        string // the given value
	Range       [2]Slot
	HasRange    bool
	Choose      []Slot
	Catalogue   *Catalogue
	ToMeet      []string // the names of the limits; nil: all
	Margin      Slot     // in the unit of each limit's own margin or, where MarginShare, a fraction
	HasMargin   bool
	MarginShare bool
	Series      string  // "E12", "E24", "R10", "R20"; "" for none
	Unit        string  // in which the range is written: a series counts in it
	PerUnit     float64 // SI of one Unit
	Want        string  // "smallest", "largest"; "" where not said
	Source      string  // where it comes from, "" if not stated
	Ref         network.Ref
}

// A Catalogue is a list of parts, each of which sets given values.
type Catalogue struct {
	File    string
	Parts   []string // what each row is called
	Columns []CatalogueColumn
	Least   string    // the column of which less is better, "" for none
	Unit    string    // its unit, as the head of the file says
	Cost    []float64 // its numbers, as the file has them
}

// A CatalogueColumn holds one given value of each part, in SI.
type CatalogueColumn struct {
	Given  string
	Values []float64
}
