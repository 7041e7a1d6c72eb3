package casefile_test

import (
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"lagbook/network/casefile"
)

// chained is profiles each made of the one before, of which load is the last.
func chained(n int, first, expression string) string {
	var b strings.Builder
	b.WriteString("[profile]\np0 = { " + first + " }\n")
	for i := 1; i < n; i++ {
		fmt.Fprintf(&b, "p%d = \"= %s\"\n", i, strings.ReplaceAll(expression, "@", fmt.Sprintf("p%d", i-1)))
	}
	fmt.Fprintf(&b, "load = \"= p%d * 1 A\"\n", n-1)
	return b.String()
}

// TestHostileProfiles reads profiles of many points, long chains of them, and expressions
// that would grow without end: none may take long or panic, and what cannot be kept is
// refused with a reason.
func TestHostileProfiles(t *testing.T) {
	dir := t.TempDir()
	var b strings.Builder
	b.WriteString("t / s,I / A\n")
	for i := range 100_000 {
		fmt.Fprintf(&b, "%d,%d\n", i, i*i%17)
	}
	if err := os.WriteFile(filepath.Join(dir, "log.csv"), []byte(b.String()), 0o644); err != nil {
		t.Fatal(err)
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	log := "[profile.load]\nfile = \"log.csv\"\n"
	ramp := "[profile.load]\npoints = [[\"0 s\", \"0 A\"], [\"10 s\", \"3 A\"]]\n"
	points, sine := `points = [["0 s", 0], ["10 s", 3]]`, `sine = { mean = 0, amplitude = 0.5, period = "7 s" }`
	for name, x := range map[string]struct{ profiles, drive, want string }{
		"many points squared":           {log, "= r*load^2", ""},
		"a long sum of many points":     {log, "= v0*(load" + strings.Repeat("+load", 380) + ")", "too many pieces"},
		"a high power of many points":   {log, "= 1 W*(load/(1 A))^12", ""},
		"many points sampled":           {log, "= 1 W*exp(-load/(1 A))", "too much to sample"},
		"a chain of sums":               {chained(5000, points, "@ + 1"), "= v0*load", ""},
		"a chain of squares":            {chained(500, points, "0.1*@^2"), "= v0*load", "more than 400 steps"},
		"a chain of squares of a sine":  {chained(50, sine, "@^2 + @"), "= v0*load", "more than 400 steps"},
		"a chain that bends and bends":  {chained(500, points, "abs(@ - 0.37)"), "= v0*load", ""},
		"a huge power":                  {ramp, "= 1 W*(load/(1 A))^1e9", "not a finite number"},
		"a high power":                  {ramp, "= 1 W*(load/(3 A))^400", "sampled"},
		"a power below zero":            {ramp, "= 1 W*(load/(1 A))^-1e9", "not a finite number"},
		"a power of nothing":            {ramp, "= 1 W*(load/(1 A))^0", ""},
		"a sine too fast to be sampled": {"[profile.load]\nsine = { mean = \"0 A\", amplitude = \"1 A\", period = \"1 ns\" }\n[profile.up]\npoints = [[\"0 s\", 1], [\"1 s\", 2]]\n", "= v0*load*up", "pieces"},
		"the largest numbers":           {strings.ReplaceAll(ramp, "3 A", "1e200 A"), "= r*load^2", "not a finite number"},
		"periods that hardly meet":      {"[profile]\nload.pulse = { low = \"0 A\", high = \"1 A\", width = \"0.1 s\", period = \"1 s\" }\nother.pulse = { low = 0, high = 1, width = \"0.1 s\", period = \"0.99999 s\" }\n", "= v0*load*other", ""},
		"the same instant":              {"[profile.load]\npoints = [[\"0 s\", \"0 A\"], [\"1e-300 s\", \"3 A\"]]\n", "= r*load^2", "not a finite number"},
	} {
		t.Run(strings.ReplaceAll(name, " ", "-"), func(t *testing.T) {
			begun := time.Now()
			c, diags := casefile.Read("case.toml", []byte(profiled(x.profiles, fmt.Sprintf("%q", x.drive), `"20 °C"`)), root, testVocabulary()...)
			if took := time.Since(begun); took > hangs && !raceDetector {
				t.Errorf("it takes %v", took)
			}
			says := casefile.Listing(diags)
			if x.want == "" && c == nil || !strings.Contains(says, x.want) {
				t.Errorf("it says\n%s", says[:min(len(says), 1000)])
			}
		})
	}
}

// FuzzReadProfile reads anything with the words of profiles.
func FuzzReadProfile(f *testing.F) { fuzzRead(f, archives[2], wholeProfile) }

// wholeProfile is a good case with profiles of many forms.
var wholeProfile = profiled(loads, `"= v0 * ramp + r * (swing + fade)^2 * shift * beat / (1 + shift) + 1 W * sqrt(abs(shift - 2)) + 1 V * min(ramp, day)"`,
	`"= max(outside, inside + 2 K)"`)
