package study

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
)

// Preferred numbers in a decade: E12 and E24 of IEC 60063:2015, R10 and R20 of ISO 3:1973.
var preferred = map[string]string{
	"E12": "1.0 1.2 1.5 1.8 2.2 2.7 3.3 3.9 4.7 5.6 6.8 8.2",
	"E24": "1.0 1.1 1.2 1.3 1.5 1.6 1.8 2.0 2.2 2.4 2.7 3.0 3.3 3.6 3.9 4.3 4.7 5.1 5.6 6.2 6.8 7.5 8.2 9.1",
	"R10": "1.00 1.25 1.60 2.00 2.50 3.15 4.00 5.00 6.30 8.00",
	"R20": "1.00 1.12 1.25 1.40 1.60 1.80 2.00 2.24 2.50 2.80 3.15 3.55 4.00 4.50 5.00 5.60 6.30 7.10 8.00 9.00",
}

// maxPreferred is how many values of a series are tried: the next ones are taken only where
// the margin is not monotonic.
const maxPreferred = 100

// inSeries lists the numbers of a series from lo to hi, both positive, lowest first.
func inSeries(series string, lo, hi float64) (list []float64) {
	from, to := int(math.Floor(math.Log10(lo)))-1, int(math.Ceil(math.Log10(hi)))+1
	for e := from; e <= to; e++ {
		for _, mantissa := range strings.Fields(preferred[series]) {
			x, err := strconv.ParseFloat(mantissa+"e"+strconv.Itoa(e), 64)
			if err == nil && x >= lo && x <= hi {
				list = append(list, x)
			}
		}
	}
	return list
}

// prefer rounds the size to its series, to the side on which the limits are met, and tries
// what comes out.
func (z *sizing) prefer(s *Size, p sized, want string) (sized, error) {
	per := z.ask.PerUnit
	lo, hi := s.Range[0]/per, s.Range[1]/per
	if want == theSmallest {
		lo = p.v / per * (1 - 4e-16)
	} else {
		hi = p.v / per * (1 + 4e-16)
	}
	lo = math.Max(lo, hi*1e-12) // of a range that begins at 0
	list := inSeries(z.ask.Series, lo, hi)
	if want == theLargest {
		slices.Reverse(list)
	}
	for i, x := range list {
		if i == maxPreferred {
			break
		}
		q := z.at(x * per)
		if !q.meets() {
			continue
		}
		c := z.choice(strings.TrimSpace(strconv.FormatFloat(x, 'g', -1, 64)+" "+z.ask.Unit), q)
		s.Choice = &c
		s.Text += fmt.Sprintf("; of %s take %s, where %s", z.ask.Series, c.Name, z.stands(q))
		return q, nil
	}
	s.Met = false
	s.Text += fmt.Sprintf("; no value of %s on that side of it within the range meets them", z.ask.Series)
	return p, nil
}
