package matrix

// Balance is a set of stores that exchange in proportion to differences,
//
//	C[i] x[i]' = Σ_j F[i,j] (x[j] − x[i]) − Leak[i] x[i] + f[i],
//
// kept in the form in which it is stated: the diagonal sum Σ F + Leak is never
// formed, so that no slow pole is lost in it. F need not be symmetric (a stream
// carries one way), and Leak may be negative (a store that feeds itself).
type Balance struct {
	N    int
	C    []float64 // capacity of each store, length N, positive
	F    []float64 // exchange, N×N row-major; F[i*N+j] acts on x[j]−x[i] in the balance of i; the diagonal is ignored
	Leak []float64 // exchange with the reference 0, length N
}
