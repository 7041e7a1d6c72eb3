package quantity

import "strings"

// Nearest returns the word of among that word was probably meant to be: one
// that differs in capitals only, or by at most two letters added, left out,
// changed or swapped with a neighbour; by at most one where word has three
// letters or fewer. Of equals the first counts.
func Nearest(word string, among []string) (string, bool) {
	limit := 2
	if len([]rune(word)) <= 3 {
		limit = 1
	}
	best, least := "", limit+1
	for _, w := range among {
		if w == word {
			continue
		}
		if strings.EqualFold(w, word) {
			return w, true
		}
		if n := distance([]rune(word), []rune(w), limit); n < least && n < len([]rune(w)) {
			best, least = w, n
		}
	}
	return best, best != ""
}

// distance counts the edits between a and b, a swap of neighbours as one
// (optimal string alignment); beyond limit it may stop early with limit+1.
func distance(a, b []rune, limit int) int {
	if len(a)-len(b) > limit || len(b)-len(a) > limit {
		return limit + 1
	}
	before := make([]int, len(b)+1)
	last := make([]int, len(b)+1)
	row := make([]int, len(b)+1)
	for j := range last {
		last[j] = j
	}
	for i := 1; i <= len(a); i++ {
		row[0] = i
		least := i
		for j := 1; j <= len(b); j++ {
			cost := 1
			if a[i-1] == b[j-1] {
				cost = 0
			}
			row[j] = min(last[j]+1, row[j-1]+1, last[j-1]+cost)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
			least = min(least, row[j])
		}
		if least > limit {
			return limit + 1
		}
		before, last, row = last, row, before
	}
	return last[len(b)]
}
