package quantity_test

import (
	"fmt"

	"lagbook/network/quantity"
)

func ExampleParse() {
	v, err := quantity.Parse("1 BTU/(h·ft²·°F)")
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(v.SI, quantity.UnitOf(v.Dim))

	_, err = quantity.Parse("0.8 W/m·K")
	fmt.Println(err)
	// Output:
	// 5.678263341113488 W/(m²·K)
	// how much of "W/m·K" is below the line is not clear; expected parentheses around what is; did you mean "0.8 W/(m·K)"?
}

func ExampleValue_Want() {
	resistance := quantity.Dim{-1, -2, 3, 1}
	v, _ := quantity.Parse("0.35 W/K")
	_, err := v.Want(resistance, quantity.Plain)
	fmt.Println(err)
	// Output:
	// "0.35 W/K" is a thermal conductance (W/K); expected a thermal resistance (K/W); did you mean "= 1/(0.35 W/K)"?
}

func ExampleCompile() {
	names := []string{"outside", "wall"}
	known := func(name string) (int, bool) {
		for i, n := range names {
			if n == name {
				return i, true
			}
		}
		return 0, false
	}
	outside, _ := quantity.Parse("-5 °C")
	wall, _ := quantity.Parse("240 mm")

	for _, text := range []string{"= outside - 12 K", "= wall / (0.8 W/(m·K) * 6 m²)", "= 5 % * outside"} {
		e, err := quantity.Compile(text, known)
		if err != nil {
			fmt.Println(err)
			continue
		}
		v, err := e.Eval([]quantity.Value{outside, wall})
		if err != nil {
			fmt.Println(err)
			continue
		}
		fmt.Println(quantity.Print{}.Format(v.SI, v.Dim, v.Kind))
	}
	// Output:
	// -17 °C
	// 50 mK/W
	// "5 % * outside" is a part or a multiple of a level; expected a difference: level − level, or 5 K
}

func ExampleScale_Full() {
	s, _ := quantity.NewScale("°C", quantity.Level)
	fmt.Println(s.Of(313.15), s.Full(313.15))
	// Output:
	// 40 40
}

func ExampleDuration() {
	fmt.Println(quantity.Duration(792), quantity.Duration(93960), quantity.Duration(0.0123))
	// Output:
	// 13.2 min 26.1 h 12.3 ms
}
