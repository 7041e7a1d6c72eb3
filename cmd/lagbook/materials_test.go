package main

import (
	"bytes"
	"encoding/json"
	"strings"
	"testing"
)

// The verb materials lists fluids with their sources, in every format, and finds them
// by words.
func TestMaterialsListsFluids(t *testing.T) {
	for _, format := range []string{"text", "markdown", "csv", "json", "html", "latex"} {
		var out, said bytes.Buffer
		if code := run([]string{"materials", "oil", "vg", "46", "--format", format}, strings.NewReader(""), &out, &said); code != 0 {
			t.Errorf("%s: exit %d\n%s", format, code, said.String())
		}
		for _, want := range []string{"oil VG 46", "typical"} {
			if !strings.Contains(out.String(), want) {
				t.Errorf("%s: %q is not in\n%s", format, want, out.String())
			}
		}
	}
	if a := handbook("vg 46"); len(a.Fluids) != 2 || len(a.Materials) != 0 || len(a.Fluids[0].Sources) != 3 {
		t.Errorf("%d fluids, %d materials", len(a.Fluids), len(a.Materials))
	}
	all := handbook("")
	if len(all.Fluids) != 15 || len(all.Materials) == 0 {
		t.Errorf("%d fluids, %d materials of all", len(all.Fluids), len(all.Materials))
	}
	for _, f := range all.Fluids {
		if first, last := f.Points[0], f.Points[len(f.Points)-1]; first.Temperature != f.Range[0] || last.Temperature != f.Range[1] {
			t.Errorf("%s is listed from %g to %g K", f.Key, first.Temperature, last.Temperature)
		}
	}
	text, err := json.Marshal(all.Fluids[0])
	if err != nil || !strings.Contains(string(text), `"vapour_pressure":`) || strings.Contains(string(text), "null") {
		t.Errorf("water as JSON: %v\n%s", err, text)
	}
}
