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

// A Shown is one thing asked for by name: a node, a difference "a - b", or the
// flow of a part.
type Shown struct {
	Text   string // as written; the column's name
	Node   string // full names, as the network has them
	Minus  string // the second node of a difference, or ""
	FlowOf string // the part, source or held node whose flow is meant, or ""
	Dim    quantity.Dim
	Kind   quantity.Kind // Level, Difference, or Plain for a flow
	Ref    network.Ref
}

// AskTransfer names an input and an output.
type AskTransfer struct {
	From     string
	To       Shown
	About    Slot // s, where HasAbout; else the network just before t = 0
	HasAbout bool
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
	Ref             network.Ref
}

// LimitKind is what a limit demands.
type LimitKind uint8

const (
	StayBelow LimitKind = iota
	StayAbove
	Reach
	Settle
	OvershootBelow
)

// String returns the key that states it.
func (k LimitKind) String() string { return limitKeys[k] }

// AskLimit is one [limit.NAME]. All of Of are levels, or all are differences
// (so are rises, where Above is stated), or all are flows. Level is in their
// unit: of stay_below, stay_above and reach a value of that kind; of settle and
// overshoot_below the band, a difference or, where Percent, a fraction of the
// final change. Margin is a difference for stay_below and stay_above, a time for
// reach and settle, and like Level for overshoot_below.
type AskLimit struct {
	Name      string
	Of        []Shown
	Above     string
	Kind      LimitKind
	Level     Slot
	Percent   bool
	Within    Slot
	After     Slot
	Until     Slot
	Margin    Slot
	HasWithin bool
	HasAfter  bool
	HasUntil  bool
	HasMargin bool
	Ref       network.Ref
}
