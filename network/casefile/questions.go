package casefile

import (
	"lagbook/network"
	"lagbook/network/quantity"
)

// Questions are what a case asks.
type Questions struct {
	Transfers   []AskTransfer
	Tables      []AskTable
	Limits      []AskLimit
	Scenarios   []Scenario
	Results     []AskResult // each after those it is made of
	Finds       []AskFind
	Sizes       []AskSize
	Measured    []AskMeasured
	To          Slot // [run] to, s, where HasTo
	HasTo       bool
	Start       StartWord
	StartRef    network.Ref
	StartAt     Slot    // the level of [run] start, where Start is StartLevel
	StartDomain string  // whose level that is
	Clock       float64 // s after midnight at t = 0
	HasClock    bool
	Print       map[string]quantity.Print // by word: "temperature", "difference", "pressure", "time", …; PrintWord finds it
	Digits      int                       // 0: not asked
}

// StartWord is how [run] start is stated.
type StartWord uint8

const (
	StartUnsaid StartWord = iota // steady unless nodes have starts of their own
	StartSteady
	StartLevel  // a level for every node without a start of its own
	StartCycle  // the periodic state under the loads that repeat
	StartAtRest // nothing flows: every node without a start of its own stands at the level that holds it
)

// A Shown is one thing asked for by name: a node, a difference "a - b", a reading of a
// part, its flow included, or a result. Case.Showing(Part, Word) is what to show of a
// reading.
type Shown struct {
	Text   string // as written; the column's name
	Word   string // "flow", "level", "flow at valve_in"; "" for anything else
	Part   string // the full name of the part it is a reading of, or ""
	Node   string // full names, as the network has them
	Minus  string // the second node of a difference, or ""
	Result string // the name of the result it is, or ""; the others are empty then
	Dim    quantity.Dim
	Kind   quantity.Kind // Level, Difference, or Plain for a flow; of a reading or a result its own
	Ref    network.Ref
}

// AskTransfer names an input and an output.
type AskTransfer struct {
	From     string // the full name of a source or a held node, or of a drive: "opening of sv1"
	To       Shown
	About    Slot // s, where HasAbout; else the network just before t = 0
	HasAbout bool
	Source   string // where it comes from, "" if not stated
	Ref      network.Ref
}

// AskTable is one [[table]]. Either Times is given or Every, with From and To,
// which where they are not stated are 0 and the end of the run.
type AskTable struct {
	Title           string
	Show            []Shown
	Above           string
	Times           []Slot
	From, To, Every Slot
	HasFrom, HasTo  bool
	HasEvery        bool
	Peaks, Jumps    bool
	Source          string // where it comes from, "" if not stated
	Ref             network.Ref
}
