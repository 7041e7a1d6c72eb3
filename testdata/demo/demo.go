// Package demo holds the cases that the command runs and copies when it is
// given none: whole jobs as a practitioner would write them, with a hand check
// in their comments. All their data are invented.
package demo

import "embed"

// Cases are the files, each a case or a log that one is set against.
//
//go:embed *.toml *.csv
var Cases embed.FS

// Names of cases: Main is shown first, in Round something repeats, in Swing something
// swings, Duties has scenarios and Revised is a later state of it.
const (
	Main    = "servo-drive.toml"
	Round   = "oven-door.toml"
	Swing   = "wash-line.toml"
	Duties  = "cell-row.toml"
	Revised = "cell-row-revised.toml"
)
