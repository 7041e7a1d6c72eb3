package casefile

// kind is what TOML calls the type of a value.
type kind uint8

const (
	kindString kind = iota
	kindInteger
	kindFloat
	kindBoolean
	kindDate
	kindArray
	kindTable
)

// a names a kind as messages do.
func (k kind) a() string {
	return [...]string{"a text", "a whole number", "a number", "true or false", "a date or time", "a list", "a table"}[k]
}

// origin is how a table came to be, which decides whether more may be added.
type origin uint8

const (
	byPath   origin = iota // [a.b] made a
	byHeader               // [a]
	byDots                 // a.b = 1 made a
	byBraces               // a = {…}, complete at once
	byItem                 // [[a]]
)

// A node is one value of the file with its place.
type node struct {
	span
	kind  kind
	exact bool     // a string without escapes: its text stands in the file as it is, from inner on
	open  bool     // an array made by [[…]], to which more may be added
	inner int32    // where the text of a string begins
	text  string   // strings: as meant; numbers, words and dates: as written
	num   float64  // numbers
	items []*node  // arrays
	table *members // tables
}

// A key is one key of a table with its place and value.
type key struct {
	span
	name  string
	value *node
}

// members are the keys of a table in file order.
type members struct {
	made  origin
	keys  []key
	index map[string]int32 // made where there are many keys
}

const manyKeys = 12 // from here a map finds a key faster than looking through them

// find returns the key of that name, or nil. The pointer is good until the next add.
func (m *members) find(name string) *key {
	if m.index != nil {
		if i, ok := m.index[name]; ok {
			return &m.keys[i]
		}
		return nil
	}
	for i := range m.keys {
		if m.keys[i].name == name {
			return &m.keys[i]
		}
	}
	return nil
}

func (m *members) add(k key) {
	m.keys = append(m.keys, k)
	switch n := len(m.keys); {
	case m.index != nil:
		m.index[k.name] = int32(n - 1)
	case n == manyKeys:
		m.index = make(map[string]int32, 4*manyKeys)
		for i := range m.keys {
			m.index[m.keys[i].name] = int32(i)
		}
	}
}

// get returns the value of a key, or nil.
func (n *node) get(name string) *node {
	if n == nil || n.table == nil {
		return nil
	}
	if k := n.table.find(name); k != nil {
		return k.value
	}
	return nil
}

// part returns the place of some bytes of a string's text, or of the whole
// value where the file spells them with escapes.
func (n *node) part(off, length int) span {
	if !n.exact || off < 0 || length < 1 || off+length > len(n.text) {
		return n.span
	}
	return span{n.inner + int32(off), n.inner + int32(off+length)}
}
