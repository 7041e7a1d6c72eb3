package quantity

import (
	"errors"
	"math"
	"strings"
	"testing"
	"unicode/utf8"
)

var seeds = []string{
	"0.35 K/W", "40 °C", "-40 °F", "2 W·m⁻¹·K⁻¹", "2 W m^-1 K^-1", "2 W/m·K", "5 W/m2K", "5 US gal/min", "10 %", "90°", "2 bar(g)", "2 k°C",
	"1e-300 ym", "1e400", "((((", "1 ((%^9)^9)^9", "− 3 mK", "1,5 W", "5 deg C", "5 US fl oz", "\xff", "1 \xc2", "5 m^(-1)", "5 W/(m·(K))",
	"= roof * 2 mm", "= 2 mm^2/(k*area)", "= min(2,3; t)", "= -20 °C + 5 K", "= 2 ** 3", "= sqrt(2 m²)", "= 2^-3^2", "= a.b²", "= 20 W/m", "= 1/K",
}

// A text is either a finite quantity that what Full prints leads back to, or an
// error that points into it and whose suggestion is accepted.
func FuzzParse(f *testing.F) {
	for _, s := range seeds {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		v, err := Parse(s)
		if err != nil {
			checkSyntax(t, s, err, func(s string) error { _, err := Parse(s); return err })
			return
		}
		if math.IsInf(v.SI, 0) || math.IsNaN(v.SI) {
			t.Fatalf("%q = %v", s, v.SI)
		}
		if v.Exact != nil {
			if x, _ := v.Exact.Float64(); x != v.SI {
				t.Fatalf("%q = %v beside %v", s, v.SI, v.Exact)
			}
		}
		_ = Print{}.Format(v.SI, v.Dim, v.Kind)
		_, _ = v.Want(dimPower, Plain)
		_, _ = v.Want(dimKelvin, Level)
		_, unit := split(s)
		scale, err := NewScale(strings.TrimFunc(unit, isSpace), v.Kind)
		if err != nil || v.Exact == nil {
			return
		}
		back, err := Parse(scale.Full(v.SI) + " " + unit)
		if err != nil || back.SI != v.SI {
			t.Fatalf("%q = %v, printed as %s, read as %v, %v", s, v.SI, scale.Full(v.SI), back.SI, err)
		}
	})
}

// An expression compiles to something that evaluates to a finite quantity or
// says why not, or is refused with a place inside it.
func FuzzCompile(f *testing.F) {
	for _, s := range seeds {
		f.Add(s)
	}
	given := parsed(f, exprValues...)
	known := testNames(exprNames...)
	f.Fuzz(func(t *testing.T, s string) {
		e, err := Compile(s, known)
		if err != nil {
			checkSyntax(t, s, err, func(s string) error { _, err := Compile(s, known); return err })
			return
		}
		v, err := e.Eval(given)
		var de *DimensionError
		var ve *ValueError
		switch {
		case err == nil:
			if math.IsInf(v.SI, 0) || math.IsNaN(v.SI) {
				t.Fatalf("%q = %v", s, v.SI)
			}
		case errors.As(err, &de):
			inside(t, s, de.Off, de.Len)
		case errors.As(err, &ve):
			inside(t, s, ve.Off, ve.Len)
		default:
			t.Fatalf("%q: %v", s, err)
		}
	})
}

func checkSyntax(t *testing.T, s string, err error, try func(string) error) {
	var e *SyntaxError
	if !errors.As(err, &e) {
		t.Fatalf("%q: %v", s, err)
	}
	inside(t, s, e.Off, e.Len)
	if e.Found == "" || e.Want == "" || !utf8.ValidString(err.Error()) || len(err.Error()) > 400+4*len(e.Suggest) {
		t.Fatalf("%q: %q", s, err)
	}
	if e.Suggest != "" {
		if again := try(e.Suggest); again != nil {
			t.Fatalf("%q: the suggestion %q: %v", s, e.Suggest, again)
		}
	}
}

func inside(t *testing.T, s string, off, n int) {
	if off < 0 || n < 0 || off+n > len(s) {
		t.Fatalf("%q: place %d+%d", s, off, n)
	}
}
