package casetest

import (
	"fmt"
	"regexp"
	"strings"
)

// A Piece is a stretch of a case with its names marked, {core} those that it defines and
// <base> those that it is joined by:
//
//	[thermal.resistance.{foot}]
//	between = ["{can}", "<base>"]
//
// It is written as a part, or by hand as what a use of the part stands for.
type Piece string

var (
	pieceHeader = regexp.MustCompile(`\[(\w+)\.(\w+)\.\{(\w+)\}\]`)
	pieceOwn    = regexp.MustCompile(`\{(\w+)\}`)
	piecePort   = regexp.MustCompile(`<(\w+)>`)
)

// Part writes the piece as the part of a name.
func (p Piece) Part(name string) string {
	text := pieceHeader.ReplaceAllString(string(p), "[part."+name+".$1.$2.$3]")
	return piecePort.ReplaceAllString(pieceOwn.ReplaceAllString(text, "$1"), "$1")
}

// ByHand writes what a use stands for, its ports joined in pairs: "base", "plate".
func (p Piece) ByHand(use string, join ...string) string {
	text := pieceHeader.ReplaceAllString(string(p), `[$1.$2."`+use+`.$3"]`)
	text = pieceOwn.ReplaceAllString(text, use+".$1")
	for i := 0; i < len(join); i += 2 {
		text = strings.ReplaceAll(text, "<"+join[i]+">", join[i+1])
	}
	return text
}

// Use writes a use of a part, joined in the same way.
func Use(name, part string, join ...string) string {
	var pairs []string
	for i := 0; i < len(join); i += 2 {
		pairs = append(pairs, fmt.Sprintf("%s = %q", join[i], join[i+1]))
	}
	return fmt.Sprintf("[use.%s]\npart = %q\njoin = { %s }\n", name, part, strings.Join(pairs, ", "))
}
