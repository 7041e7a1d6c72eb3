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
// Words agreed for later versions (parts and uses, scenarios, profiles, results)
// are refused by name. Data files are read from the directory of the case only.
//
// Read is where to start.
package casefile
