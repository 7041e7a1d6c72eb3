package matrix

import "math"

// modRepeated is Σ (multiplicity − 1) over the roots of p: the degree of its common
// divisor with its derivative.
func modRepeated(p []residue) int {
	if len(p) < 3 {
		return 0
	}
	d := make([]residue, len(p)-1)
	for k := range d {
		d[k] = modMul(p[k+1], residue(k+1))
	}
	return modCommon(p, modTrim(d))
}

// settleMultiple gathers roots whose discs overlap, and where the exact number of
// repeated roots is that of these groups takes every group for one root, which
// is its mean: a defective m-fold root is scattered over ε^(1/m), its mean is
// not. count is asked only where discs overlap.
func settleMultiple(roots []*Root, count func() int) {
	group, repeated := overlapping(roots)
	if repeated == 0 || count() != repeated {
		return
	}
	for g := range roots {
		var re, im, err float64
		var size int
		for k, r := range roots {
			if group[k] == g {
				re, im, err = re+r.Re, im+r.Im, max(err, r.mean)
				size++
			}
		}
		if size < 2 {
			continue
		}
		re, im = re/float64(size), im/float64(size)
		err += ulps(2, math.Hypot(re, im))
		for k, r := range roots {
			if group[k] == g {
				r.Re, r.Im, r.Radius = re, im, err
			}
		}
	}
}

// overlapping numbers the groups of roots linked by overlapping discs; repeated is
// the number of roots less that of groups.
func overlapping(roots []*Root) (group []int, repeated int) {
	group = make([]int, len(roots))
	for k := range group {
		group[k] = k
	}
	for i, p := range roots {
		for j, q := range roots[:i] {
			reach := p.Radius + q.Radius
			if math.Abs(p.Re-q.Re) > reach || group[i] == group[j] || math.Hypot(p.Re-q.Re, p.Im-q.Im) > reach {
				continue
			}
			from, to := max(group[i], group[j]), min(group[i], group[j])
			for k := range group {
				if group[k] == from {
					group[k] = to
				}
			}
			repeated++
		}
	}
	return group, repeated
}
