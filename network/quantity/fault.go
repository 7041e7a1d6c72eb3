package quantity

// A fault is a SyntaxError in the making: it may know how to replace the place
// it points at.
type fault struct {
	off, n  int
	found   string
	want    string
	name    string // an unknown name of an expression
	replace string
	fix     bool // replacing the place is likely what was meant
}

// at shifts a fault into a longer text.
func (f *fault) at(off int) *fault {
	f.off += off
	return f
}

// syntax turns a fault found in src into the error shown, with the whole text
// as it should be where mending every fault in turn leads to a good one.
func (f *fault) syntax(src string, try func(string) *fault) *SyntaxError {
	return &SyntaxError{
		Off: f.off, Len: f.n, Found: f.found, Want: f.want, Name: f.name,
		Suggest: mend(src, f, try),
	}
}

// maxMends bounds how many faults one suggestion repairs: every misspelt
// symbol of a long compound unit, and its missing parentheses.
const maxMends = 8

func mend(src string, f *fault, try func(string) *fault) string {
	for range maxMends {
		if !f.fix {
			return ""
		}
		src = src[:f.off] + f.replace + src[f.off+f.n:]
		if f = try(src); f == nil {
			return src
		}
	}
	return ""
}
