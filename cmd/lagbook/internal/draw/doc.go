// Package draw makes the pictures of the command: a response against time, gain and
// phase, poles and zeros in the s-plane, and |H(s)| over it.
//
// Every picture is 160 mm wide, the text width of an A4 page, and is meant to be read
// in grey print: curves differ by their dashes, are named at their right ends instead
// of in a legend, and limits carry hatching on the side that is forbidden.
//
// The drawing goes through the vector canvas of gonum/plot (packages vg, draw, vgsvg,
// vgimg) and not through its plot type: importing that would parse twelve typefaces
// whenever the command starts, for tables too. One typeface is linked, Liberation
// Sans; it is read when a picture is drawn. An SVG names it with Arial and Helvetica,
// which have the same widths, as alternatives, so that the file stays small and its
// text can be searched; a PNG has it drawn in.
//
// The same curves give the same bytes: no dates, no random names, a fixed order.
package draw
