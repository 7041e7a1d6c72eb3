//go:build !amd64

package matrix

func sumTwice(m int, x []float64, col []int, hi, lo, high, low []float64) {
	sumTwiceGo(0, m, x, col, hi, lo, high, low)
}
