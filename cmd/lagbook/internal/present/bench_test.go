package present

import (
	"io"
	"strconv"
	"testing"
)

func BenchmarkEncode(b *testing.B) {
	for _, rows := range []int{20, 1000} {
		t := Table{Columns: []Column{{"t / s", Point}, {"a / °C", Point}, {"b / °C", Point}, {"c / °C", Point}}}
		for i := range rows {
			t.Rows = append(t.Rows, []string{strconv.Itoa(i), "12.5", "13.25", "143.3"})
		}
		for _, format := range Formats() {
			b.Run(format+"/rows="+strconv.Itoa(rows), func(b *testing.B) {
				for b.Loop() {
					if err := Encode(io.Discard, format, Doc{Parts: []Part{t}}); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
