package material

import "strings"

// Keys returns every name a case may give: the keys in the order of the handbook.
func Keys() []string {
	all := All()
	keys := make([]string, len(all))
	for i := range all {
		keys[i] = all[i].Key
	}
	return keys
}

// Categories returns the categories in the order in which they first appear.
func Categories() []string {
	var list []string
	seen := map[string]bool{}
	for _, m := range All() {
		if !seen[m.Category] {
			seen[m.Category] = true
			list = append(list, m.Category)
		}
	}
	return list
}

// Search returns the materials in whose key, name, category or phase every one
// of the words occurs, whatever the case of its letters: "steel", "plastic nylon",
// "liquid". Words that begin a key come before the rest; otherwise the order is
// that of the handbook. No words: every material.
func Search(words string) []Material {
	want := strings.Fields(strings.ToLower(words))
	var first, rest []Material
	for _, m := range All() {
		if !m.holds(want) {
			continue
		}
		if len(want) > 0 && strings.HasPrefix(strings.ToLower(m.Key), want[0]) {
			first = append(first, m)
		} else {
			rest = append(rest, m)
		}
	}
	return append(first, rest...)
}

// SearchJoints returns the joints in whose description every word occurs.
func SearchJoints(words string) []Joint {
	want := strings.Fields(strings.ToLower(words))
	var found []Joint
	for _, j := range Joints() {
		if allIn(want, strings.ToLower(j.Interface)) {
			found = append(found, j)
		}
	}
	return found
}

// SearchSurfaces returns the surfaces in whose description every word occurs.
func SearchSurfaces(words string) []Surface {
	want := strings.Fields(strings.ToLower(words))
	var found []Surface
	for _, s := range Surfaces() {
		if allIn(want, strings.ToLower(s.Name)) {
			found = append(found, s)
		}
	}
	return found
}

func (m *Material) holds(words []string) bool {
	return allIn(words, strings.ToLower(m.Key+" "+m.Name+" "+m.Category+" "+m.Phase.String()))
}

func allIn(words []string, text string) bool {
	for _, w := range words {
		if !strings.Contains(text, w) {
			return false
		}
	}
	return true
}
