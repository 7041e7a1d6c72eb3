// Package demo holds the cases that the command runs and copies when it is
// given none: whole jobs as a practitioner would write them, with a hand check
// in their comments. All their data are invented.
package demo

import "embed"

// Cases are the files, each a case: servo-drive.toml, the one shown first,
// curing-oven.toml, oven-door.toml, wash-tank.toml and wash-line.toml.
//
//go:embed *.toml
var Cases embed.FS

// Names of cases: Main is shown first, in Round something repeats, in Swing something
// swings.
const (
	Main  = "servo-drive.toml"
	Round = "oven-door.toml"
	Swing = "wash-line.toml"
)
