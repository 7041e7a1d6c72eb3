// Package casefile turns the text of a case into values, elements and questions,
// and every mistake in it into a diagnostic with its place.
//
// # The way of a text
//
//	text ─▶ scan ─▶ decode ─▶ tree ─▶ fields ─▶ slots, waves ─▶ Case ─▶ Eval ─▶ Values
//	        bounds  library   values  tables of   numbers in SI     Build ─▶ Network, Setters
//	        places            places  the domains
//
// The library BurntSushi/toml decodes the text (decode.go). It tells no place of
// a value, and takes minutes or the whole stack for texts made to that end, so a
// scanner goes first (scan.go): it holds the bounds on size, depth, keys and
// values, and notes where every key and value stands. What the library refuses
// becomes a diagnostic at that place (syntax.go).
//
// What may stand in a case is not written here: a domain hands over a Vocabulary,
// tables of keys with dimension, kind and range, and one function that builds an
// element. The same tables check, suggest and list.
//
// # Slots
//
// Every number of a case, inside waveforms too, has a Slot; every waveform a
// WaveSlot. Expressions are compiled once. Eval fills all slots, in SI: from the
// given values as written, or from others, which is what sizing and sweeps do.
//
// # In the place of a value
//
// Where a Field has Or, a table with keys of its own may stand instead of the value:
// held = {level = "2 m"}. Where it has Against, points against something else may:
// conductivity = [["20 °C", "15 W/(m·K)"], …]. An Element finds both under the path
// of the key, and Plain tells them from the value.
//
// # Readings and drives
//
// What can be asked of a part beside the level of a node is a reading: its flow, and
// what its table lists, "level of t1". What a part is driven by is an input by the same
// way of speaking, "opening of sv1". Build registers what the part at hand has, with
// Shows and Driven; Case.Showing and Case.Drive find it again.
//
// # Domains
//
// A file may hold several domains, thermal and hydraulic together. Names are
// unique in a domain; where two have a part of one name, questions, answers and
// the network call it "thermal:tank", its FullName.
//
// A level of pressure is gauge or absolute as the case states it (Pressures): a
// plain "2 bar" is meant so, "2 bar(g)" and "2 bar(a)" are converted with the
// atmosphere of the case. In a Field such a level is the kind quantity.Level.
//
// # Parts and uses
//
// [part.NAME.thermal.node.X] is written once and read with each [use.U] as element
// "U.X". A node that a part names and does not define is a port, which join ties to a
// node of the case or of another use. Given values of a use, from set or else
// [part.NAME.given], are entries of Case.Given of their own, "U.r", which in the part go
// before those of the case. Parts may use parts, four deep. Nothing is copied in the
// text: reader.scope is the use in force while a part is read, and names are looked up
// through it (use.go, usename.go, usegiven.go). A fault in a part stands at its place
// there and is said once, of the part where all uses have it, else of those that do
// (usefault.go).
//
// # What is asked
//
// Anything that can be shown is a Shown: a node, a difference, a reading, or a result,
// which is a quantity of its own made of others (AskResult). In the expression of a
// result a name is a node, a result, or else a given value; what has spaces, and a
// reading, stands between backquotes: "= `flow of foot` * lift". Questions.Results has
// each behind those it is made of.
//
// A scenario is the same network under other given values and profiles: Case.Under is
// Eval with it in force, and what is wrong then is found when the case is read. What a
// scenario sets holds where the case has an expression, too.
//
// A source, a heater, a surface may have the name of the node it acts on (beside.go).
//
// # Profiles
//
// A profile is a waveform under a name, of the dimension and kind that its values have.
// Where a waveform stands, an expression of profiles and given values may: units and
// levels are checked by the rules of numbers (quantity.Expr.Curves). Sums, products, whole
// powers and quotients stay in closed form through package laplace where they have one;
// of profiles that change in steps every expression does so too; min, max and abs of
// straight ones bend where they cross. What is left is sampled once, from the profiles as
// they stand: WaveInfo.Bound says by how much it may be off, and a warning
// "sampled-profile" says so to the user. Several given values and stand-ins of profiles go
// through Case.Eval and a scenario without another reading.
//
// Times of a waveform may be times of day where [run] states a clock.
//
// # Diagnostics
//
// All independent faults of a file are reported in one reading, in file order,
// each with line and column, the line underlined, and where one is likely the
// text to put in its place. A fault that only follows from another is not
// reported: where a part could not be read, nodes it may have joined are not
// called unconnected, and names it may have defined not unknown. Faults that
// package network finds come back with a network.Ref and are placed by Explain.
//
// # Not modelled
//
// Words agreed for later versions (size, tolerance) are refused by name. Data files are
// read from the directory of the case only.
//
// Read is where to start.
package casefile
