package main

import (
	"strings"

	"lagbook/network/study"
)

// polynomial writes ascending coefficients, highest power first.
func polynomial(p study.Printer, c []float64) string {
	var words []string
	for k := len(c) - 1; k >= 0; k-- {
		if c[k] == 0 {
			continue
		}
		power := map[bool]string{true: "s"}[k > 0]
		if k > 1 {
			power += raised(k)
		}
		sign, size := " + ", c[k]
		if size < 0 {
			sign, size = " − ", -size
		}
		word := p.Number(size)
		switch {
		case k > 0 && size == 1:
			word = power
		case k > 0:
			word += "·" + power
		}
		words = append(words, sign, word)
	}
	if len(words) == 0 {
		return "0"
	}
	words[0] = strings.TrimPrefix(strings.TrimSpace(words[0]), "+")
	return strings.Join(words, "")
}

// raised writes an exponent, which has one digit here.
func raised(k int) string { return string([]rune("⁰¹²³⁴⁵⁶⁷⁸⁹")[k]) }
