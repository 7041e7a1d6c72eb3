package casefile_test

import (
	"fmt"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// Every mistake is reported at its place, with what was probably meant.
func ExampleRead() {
	text := `[thermal.node.case]
capacitance = "100 J/K"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.joint]
between = ["case", "rom"]
valeu = "0.5 K/W"
`
	_, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	fmt.Print(casefile.Listing(diags))
	// Output:
	// case.toml:6:20: resistance "joint": node "rom" is not defined
	//   between = ["case", "rom"]
	//                      ^^^^^
	//   did you mean "room"?
	// case.toml:7:1: resistance "joint": "valeu" is not a key of resistance
	//   valeu = "0.5 K/W"
	//   ^^^^^
	//   did you mean "value"?
}

// A given value is varied without reading the case again.
func ExampleCase_Eval() {
	text := `[given]
r = "0.5 K/W"
[thermal.node.case]
capacitance = "100 J/K"
[thermal.node.room]
held = "20 °C"
[thermal.resistance.joint]
between = ["case", "room"]
value = "= 2 * r"
`
	c, _ := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	joint, _ := c.Element("resistance", "joint")
	slot := joint.Num("value")

	v, _ := c.Eval(nil)
	fmt.Println(v.Num[slot], "K/W")

	given := c.GivenValues()
	given[0], _ = quantity.Parse("0.7 K/W")
	v, _ = c.Eval(given)
	fmt.Println(v.Num[slot], "K/W")
	// Output:
	// 1 K/W
	// 1.4 K/W
}
