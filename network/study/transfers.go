package study

import (
	"fmt"

	"lagbook/laplace"
)

// transfers finds the transfer functions wanted. Of those that nobody asked for by name,
// the ones that are identically zero are left out: nothing leads from the input to the
// output.
func (m *Model) transfers() ([]pair, []*laplace.Transfer, []Warning, error) {
	pairs, warn, err := m.pairs()
	if err != nil {
		return nil, nil, nil, err
	}
	asked := len(m.Case.Questions.Transfers) > 0
	var kept []pair
	var list []*laplace.Transfer
	for _, p := range pairs {
		h, err := m.transferOf(p)
		if err != nil {
			return nil, nil, nil, fmt.Errorf("transfer from %s to %s: %w", p.in.Name, p.show.name, err)
		}
		if asked || !h.Zero {
			kept, list = append(kept, p), append(list, h)
		}
	}
	return kept, list, warn, nil
}
