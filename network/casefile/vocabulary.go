package casefile

import (
	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/quantity"
)

// A Vocabulary is what a domain hands over: the tables a case may contain.
type Vocabulary struct {
	Domain   string // "thermal"; "" for tables at the top of the file
	Measures Measures
	Head     []Field                              // keys in [domain] itself. The words `pressures` and `atmosphere` say how the case means a level of pressure
	OneOf    [][]string                           // of the keys in Head, as of a Table
	Tables   []Table                              // a domain calls its nodes "node"; none: the domain is its Head alone, [air]
	Check    func(c *Case, v Values) []Diagnostic // what only all values together show; called where everything else is in order; may be nil
	NotBuilt []string                             // words that are agreed but not built yet, refused by name: "heater", "resistance.radiation", "resistance.film.natural"
}

// Measures say what the nodes and branches of a domain carry.
type Measures struct {
	Level     quantity.Dim // of a node: temperature, pressure
	Flow      quantity.Dim // of a branch: heat flow, volume flow
	LevelWord string       // "temperature"
	FlowWord  string       // "heat"
	StoreWord string       // what a node with a capacity is: "heat store"
	Lump      string       // all stores taken as one: "mass"
	StoreKey  string       // the key that gives it one: "capacitance"
	StoreAlso []string     // other keys that do: "tank", "gas"
	Sample    string       // a level as people type it: "20 °C"
}

// A Table describes one kind of element.
type Table struct {
	Name   string // "resistance" in [thermal.resistance.NAME]
	Fields []Field
	OneOf  [][]string // each group lists the ways to state one thing, of which exactly one must be given: {{"value", "conductance", "layer"}}; "" in a group: or none
	// Readings are what can be asked of an element beside its flow, in the order in which
	// messages list them. Build registers those that the element at hand has, with Shows.
	Readings []Reading
	Stage    int // elements are built stage by stage: 0 nodes, 1 parts between nodes, 2 parts that refer to other parts
	Help     string
	Build    func(e *Element, c *Case, b *network.Builder) (Setter, []Diagnostic)
	Derive   func(e *Element, c *Case, v Values) []Derivation // for check and the note; may be nil
}

// A Setter writes an element's values into the network's parameters. It is
// called once for each set of given values: arithmetic only, no allocation.
type Setter func(v Values, p *network.Params) error

// A Derivation shows how one parameter follows from what was typed.
type Derivation struct {
	Quantity string // "resistance of joint"
	Formula  string // "1/(h·A)"
	Numbers  string // "1/(9 kW/(m²·K) · 6 cm²)"
	Source   string // of the property or of the element, "" if none stated
	SI       float64
	Dim      quantity.Dim
	Kind     quantity.Kind
}

// FieldType says what stands after a key.
type FieldType uint8

const (
	Number  FieldType = iota // a quantity or an expression
	Count                    // a whole number
	Name                     // one name
	Names                    // a list of names
	Wave                     // a waveform
	Group                    // an inline table with fields of its own
	Pairs                    // a list of [first, second] quantities
	Groups                   // a list of inline tables
	Word                     // one of Words
	Text                     // free text
	Numbers                  // a list of quantities; one alone is a list of one
	Flag                     // true or false

	loose FieldType = 255 // of the questions: read where its dimension is known
)

// A Field describes one key. Min and Max bound a Number (in SI), a Count, each of
// Numbers, the first of Pairs, and every value a Wave states; of Names and Groups
// they bound the number of items: between has Min 2 and Max 2. A list has at least
// one item. In Names with a Max of 2, the ends of a part, no name may come twice.
// That a Level lies above absolute zero, or above vacuum, casefile sees to by
// itself. A Level that is a pressure is gauge or absolute as the case states it.
//
// In the place of the plain value of a Number, a Count, a Wave or a Word there may stand a
// table with the keys of Or: held = {level = "2 m"}. In the place of a Number, or of
// a Word with Second, points against something else, where Against says what:
// conductivity = [["20 °C", "15 W/(m·K)"], …] or {points = […], source = "…"}, their
// first numbers going up. Element.Plain tells which it is; the paths are then
// "held.level" and "conductivity.points[1].first", …".second".
//
// A key `source` may stand beside the fields of every table and group, and a
// Number may be written {value = …, source = "…"}; neither is listed in Fields.
type Field struct {
	Name       string
	Type       FieldType
	Dim        quantity.Dim
	Also       []quantity.Dim // Number: other dimensions it may have, plain; Element.DimOf tells which. The zero one: a bare number
	Kind       quantity.Kind
	Unit       string // that messages propose; "": the SI unit, or the customary one. "rpm" says that the number counts turns, and refuses radians; "N·s/m" and "Hz" make their messages speak of damping and frequency
	Second     *Field // Pairs, and Word with Against: the second of each pair
	Items      int    // Numbers and Pairs: so many and no other number of items; 0: any
	Ascending  bool   // Numbers, and the first of Pairs: each is greater than the one before
	Min, Max   float64
	HasMin     bool
	HasMax     bool
	MinOpen    bool // Min itself is refused
	Structural bool // shapes the network: cannot be varied
	Required   bool
	Fields     []Field    // Group, Groups
	OneOf      [][]string // Group, Groups, and the keys of Or: as of a Table
	Or         []Field    // Number, Count, Wave, Word: keys of a table that may stand in place of the value
	Against    *Field     // Number, Word: what points that may stand in place of the value go by
	Drives     string     // Wave: the word of the input that this is, in "opening of NAME"; Build registers it with Driven
	With       []string   // keys that must be given beside it: about beside slope
	clock      bool       // Number, and the first of Pairs: a time of day may stand there
	Words      []string
	Refers     string // Name, Names: the table of this domain they name
	// Look, of a Name that is not one of the case's parts, says what is wrong with it. It is
	// asked of parts that are at fault otherwise, too.
	Look func(e *Element, c *Case, path string) []Diagnostic
	Help string
}

// A Slot indexes Values.Num, a WaveSlot Values.Wave.
type (
	Slot     int32
	WaveSlot int32
)

// Values are all numbers of a case, in SI.
type Values struct {
	Num  []float64
	Wave []laplace.Waveform
}
