// Package sparse holds square sparse matrices whose pattern is fixed while their
// numbers change, and their LU factorisation: an order that keeps fill small and the
// pattern of the factors are found once, numbers are put in again and again.
//
// A Matrix is stored by compressed columns, rows ascending; the diagonal is always in
// the pattern. Analyse takes the pattern and returns an LU, Factor puts in the numbers,
// Solve solves. Rows are scaled by powers of two, which rounds nothing. The order is by
// minimum degree on the pattern of A + Aᵀ; pivots are taken on the diagonal where they
// are not too small and are otherwise looked for in their column, in which case the
// pattern of the factors is found anew.
package sparse

import (
	"slices"
)

// A Matrix is a square matrix in compressed columns: column j holds the rows
// Row[Start[j]:Start[j+1]], ascending, with the values at the same places.
type Matrix struct {
	N     int
	Start []int32
	Row   []int32
	Val   []float64
}

// An Entry is a place in a matrix.
type Entry struct{ Row, Col int }

// New returns the matrix, all zero, of a pattern. Entries may be named more than once;
// the diagonal is added. It panics where an entry lies outside.
func New(n int, pattern []Entry) *Matrix {
	count := make([]int32, n+1)
	for _, e := range pattern {
		if e.Row < 0 || e.Col < 0 || e.Row >= n || e.Col >= n {
			panic("sparse: an entry outside the matrix")
		}
		count[e.Col+1]++
	}
	for j := range n {
		count[j+1] += count[j] + 1
	}
	rows := make([]int32, count[n])
	next := slices.Clone(count[:n])
	put := func(i, j int) { rows[next[j]] = int32(i); next[j]++ }
	for _, e := range pattern {
		put(e.Row, e.Col)
	}
	m := &Matrix{N: n, Start: make([]int32, n+1)}
	for j := range n {
		put(j, j)
		col := rows[count[j]:next[j]]
		slices.Sort(col)
		m.Row = append(m.Row, slices.Compact(col)...)
		m.Start[j+1] = int32(len(m.Row))
	}
	m.Val = make([]float64, len(m.Row))
	return m
}

// Slot returns the place of an entry in Val, −1 where the pattern does not have it.
func (m *Matrix) Slot(row, col int) int {
	k, ok := slices.BinarySearch(m.Row[m.Start[col]:m.Start[col+1]], int32(row))
	if !ok {
		return -1
	}
	return int(m.Start[col]) + k
}

// Like returns a matrix of the same pattern, sharing it, all zero.
func (m *Matrix) Like() *Matrix {
	return &Matrix{N: m.N, Start: m.Start, Row: m.Row, Val: make([]float64, len(m.Val))}
}

// Zero sets all values to 0.
func (m *Matrix) Zero() { clear(m.Val) }

// AddMul adds A x to y.
func (m *Matrix) AddMul(y, x []float64) {
	for j, v := range x[:m.N] {
		if v == 0 {
			continue
		}
		for p := m.Start[j]; p < m.Start[j+1]; p++ {
			y[m.Row[p]] += m.Val[p] * v
		}
	}
}
