package study_test

import (
	"encoding/json"
	"math"
	"strings"
	"testing"

	"lagbook/network/study"
)

func bands(t *testing.T, texts ...string) []study.Band {
	t.Helper()
	var list []study.Band
	for _, s := range texts {
		b, err := study.ParseBand(s)
		if err != nil {
			t.Fatal(err)
		}
		list = append(list, b)
	}
	return list
}

// body is 2 K/W/(1 + 200 s·iω) from the load, 1/(1 + 200 s·iω) from the room.
func TestFrequencyOfOneStore(t *testing.T) {
	q := study.FrequencyQuestion{At: bands(t, "1 h", "0.1 rad/s")}
	if err := q.ParseRipple("5 W", "0.1 K"); err != nil {
		t.Fatal(err)
	}
	a, err := model(t, body+"[[transfer]]\nfrom = \"load\"\nto = \"body\"\n[[transfer]]\nfrom = \"room\"\nto = \"body\"\n").Frequency(q)
	if err != nil {
		t.Fatal(err)
	}
	load, room := a.Transfers[0], a.Transfers[1]
	for i, omega := range []float64{2 * math.Pi / 3600, 0.1} {
		x, y := load.Points[i], room.Points[i]
		share, angle := 1/math.Hypot(1, 200*omega), math.Atan(200*omega)
		near(t, "gain", x.Gain, 2*share, 1e-15)
		near(t, "phase", x.Phase, -angle*180/math.Pi, 1e-13)
		near(t, "lag", x.Lag, angle/omega, 1e-11)
		near(t, "decrement", x.Decrement, share, 1e-15)
		near(t, "gain of the room", y.Gain, share, 1e-15)
		near(t, "period", &x.Period, 2*math.Pi/omega, 1e-12)
	}
	if load.Unit != "K/W" || room.Unit != "1" || len(load.Corners) != 1 || load.Peak != nil {
		t.Errorf("%+v", load)
	}
	near(t, "corner", &load.Corners[0].Omega, 1/200.0, 1e-17)
	near(t, "cut-off", &load.Cutoff.Omega, 1/200.0, 1e-17)
	// 5 W · 2 K/W / |1 + 200 iω| = 0.1 K
	near(t, "ripple", load.Below.Omega, math.Sqrt(100*100-1)/200, 1e-13)
	if room.Below != nil {
		t.Errorf("a ripple in W answered from a temperature: %+v", room.Below)
	}
}

// Without --at: round periods on both sides of the corner.
func TestFrequencyUnasked(t *testing.T) {
	a, err := model(t, body).Frequency(study.FrequencyQuestion{})
	if err != nil {
		t.Fatal(err)
	}
	p := a.Transfers[0].Points
	corner := 2 * math.Pi * 200
	if len(p) < 4 || len(p) > 20 || p[0].Period < 3*corner || p[len(p)-1].Period > corner/3 {
		t.Errorf("%d periods, from %v to %v s", len(p), p[0].Period, p[len(p)-1].Period)
	}
	b, err := json.Marshal(a)
	if err != nil || strings.Contains(string(b), "null") {
		t.Errorf("%s, %v", b, err)
	}
}

// An unstable network has no steady swing: the numbers are given, and said to be formal.
func TestFrequencyUnstable(t *testing.T) {
	a, err := model(t, body+"slope = \"1 W/K\"\nabout = \"20 °C\"\n[run]\nstart = \"20 °C\"\nto = \"10 min\"\n").Frequency(study.FrequencyQuestion{At: bands(t, "1 min")})
	if err != nil {
		t.Fatal(err)
	}
	if len(a.Warnings) == 0 || a.Warnings[0].Code != "no-steady-swing" || a.Transfers[0].Cutoff != nil {
		t.Errorf("%+v", a)
	}
}

// Refused: too many points, amplitudes that fit no transfer function, or none at all.
func TestFrequencyRefuses(t *testing.T) {
	m := model(t, body)
	if _, err := m.Frequency(study.FrequencyQuestion{At: bands(t, "1 µHz..1 MHz"), PerDecade: 1e6}); err == nil {
		t.Error("twelve million points")
	}
	q := study.FrequencyQuestion{}
	if err := q.ParseRipple("5 W", "1 W"); err != nil {
		t.Fatal(err)
	}
	if _, err := m.Frequency(q); err == nil || !strings.Contains(err.Error(), "no transfer function") {
		t.Errorf("%v", err)
	}
	for _, r := range [][2]string{{"5 m", "1 K"}, {"5 W", "−1 K"}, {"5 W", "0 K"}, {"5 W", "5 °C"}, {"x", "1 K"}} {
		if err := new(study.FrequencyQuestion).ParseRipple(r[0], r[1]); err == nil {
			t.Errorf("ripple %q below %q is taken", r[0], r[1])
		}
	}
}
