package quantity

import "strconv"

// A SyntaxError says where a text stops being a quantity or an expression, and
// what to write instead.
type SyntaxError struct {
	Off, Len int    // the place, in bytes of the text given
	Found    string // what stands there
	Want     string // what may stand there
	Suggest  string // the whole text as it probably should be; "" where nothing is likely
	Name     string // the name of an expression that nothing defines, "" otherwise
}

func (e *SyntaxError) Error() string { return sentence(e.Found, e.Want, e.Suggest) }

// A DimensionError says that a quantity is of another dimension or kind than
// the place it stands in.
type DimensionError struct {
	Off, Len int    // the place in an expression, in bytes; 0, 0 where the whole text is meant
	Found    string // "0.35 W/K is a conductance (W/K)"
	Expected string // "a thermal resistance (K/W)"
	Suggest  string // a text that may stand in place of the whole; "" where nothing is likely
}

func (e *DimensionError) Error() string { return sentence(e.Found, e.Expected, e.Suggest) }

// A ValueError says that an expression has no value: a division by zero, the
// root of a negative number, an overflow.
type ValueError struct {
	Off, Len int
	Found    string
	Expected string
}

func (e *ValueError) Error() string { return sentence(e.Found, e.Expected, "") }

func sentence(found, want, suggest string) string {
	s := found
	if want != "" {
		s += "; expected " + want
	}
	if suggest != "" {
		s += "; did you mean " + strconv.Quote(suggest) + "?"
	}
	return s
}
