package matrix

// resized returns a slice of length n, v where it is long enough; what is in it is of
// no use.
func resized[T any](v []T, n int) []T {
	if cap(v) < n {
		return make([]T, n)
	}
	return v[:n]
}

// resizedRows does so for a number of rows of length n.
func resizedRows(v [][]float64, rows, n int) [][]float64 {
	if cap(v) < rows {
		v = append(make([][]float64, 0, rows), v[:cap(v)]...)
	}
	v = v[:rows]
	for i := range v {
		v[i] = resized(v[i], n)
	}
	return v
}
