package matrix

func chaseRows(a []float64, stride, k, cols int, c []float64) {
	if !useAVX || k == 0 || cols == 0 {
		chaseRowsGo(a, stride, k, cols, c)
		return
	}
	_, _ = a[(k+1)*stride+cols-1], c[k*reflectorSize-1]
	chaseRowsAVX(&a[0], stride, k, cols, &c[0])
}

func chaseColumns(a []float64, stride, k, rows int, c []float64) {
	if !useAVX || k == 0 || rows == 0 {
		chaseColumnsGo(a, stride, k, rows, c)
		return
	}
	_, _ = a[(rows-1)*stride+k+1], c[k*reflectorSize-1]
	chaseColumnsAVX(&a[0], stride, k, rows, &c[0])
}

func sumRows(a []float64, stride, rows, cols int, f, y []float64) {
	if !useAVX || rows == 0 || cols == 0 {
		sumRowsGo(a, stride, rows, cols, f, y)
		return
	}
	_, _, _ = a[(rows-1)*stride+cols-1], f[rows-1], y[cols-1]
	sumRowsAVX(&a[0], stride, rows, cols, &f[0], &y[0])
}

//go:noescape
func chaseRowsAVX(a *float64, stride, k, cols int, c *float64)

//go:noescape
func chaseColumnsAVX(a *float64, stride, k, rows int, c *float64)

//go:noescape
func sumRowsAVX(a *float64, stride, rows, cols int, f, y *float64)
