// Package casefile turns the text of a case into values, elements and questions,
// and every mistake in it into a diagnostic with its place.
//
// # The way of a text
//
//	text ─▶ scan ─▶ tree ─▶ fields ─▶ slots, waves ─▶ Case ─▶ Eval ─▶ Values
//	        bounds  places  tables of   numbers in SI     Build ─▶ Network, Setters
//	                        the domains
//
// A scanner of its own (scan.go) reads TOML into a tree in which every key and
// value knows its place, and bounds size, depth, keys and values before memory is
// taken for them. What may stand in a case is not written here: a domain hands
// over a Vocabulary, tables of keys with dimension, kind and range, and one
// function that builds an element. The same tables check, suggest and list.
//
// # Slots
//
// Every number of a case, inside waveforms too, has a Slot; every waveform a
// WaveSlot. Expressions are compiled once. Eval fills all slots, in SI: from the
// given values as written, or from others, which is what sizing and sweeps do.
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
