package study

// Sizes answers the verb size.
type Sizes struct {
	Title string `json:"title"`
	Sizes []Size `json:"sizes"`
	Met   bool   `json:"met"` // all of them
	Evidence
}

// A Size is the value of a given value at which the limits are met. Value is that of the
// search, Choice what is taken for it from a series, a list or a catalogue. Where Met is
// false, they are what comes nearest. Margin is that of the governing limit at Value, or at
// the part chosen, in the limit's unit; MarginAsked what it must be at least.
type Size struct {
	Name           string     `json:"name"`
	Vary           string     `json:"vary"`
	Value          *float64   `json:"value,omitempty"` // absent where nothing could be computed
	Unit           string     `json:"unit"`
	Kind           string     `json:"kind,omitempty"`
	Range          []float64  `json:"range,omitempty"` // that was searched
	Choice         *Choice    `json:"choice,omitempty"`
	Met            bool       `json:"met"`
	Margin         *float64   `json:"margin,omitempty"`
	MarginAsked    *float64   `json:"margin_asked,omitempty"`
	MarginUnit     string     `json:"margin_unit,omitempty"`
	GoverningLimit string     `json:"governing_limit,omitempty"`
	Scenario       string     `json:"scenario,omitempty"`
	Crossings      []Crossing `json:"crossings"` // within the range, lowest first
	RunnersUp      []Choice   `json:"runners_up,omitempty"`
	Tried          int        `json:"tried"` // values that were computed
	Text           string     `json:"text"`  // the answer in a sentence

	Just bool `json:"-"` // the margin is the one asked for, but for rounding
}

// A Crossing is a value at which the limits begin, or cease, to be met.
type Crossing struct {
	Value    float64 `json:"value"`
	Met      string  `json:"met"` // above, below: on which side they are met
	Limit    string  `json:"limit"`
	Scenario string  `json:"scenario,omitempty"`
}

// A Choice is one value of a series or a list, or one part of a catalogue, as it was
// computed.
type Choice struct {
	Name     string   `json:"name"`
	Value    float64  `json:"value"`
	Met      bool     `json:"met"`
	Margin   *float64 `json:"margin,omitempty"` // of the limit that decides, in its unit
	Unit     string   `json:"margin_unit,omitempty"`
	Limit    string   `json:"limit,omitempty"`
	Scenario string   `json:"scenario,omitempty"`
	Sets     []Set    `json:"sets,omitempty"`  // of a catalogue: the given values
	Least    *float64 `json:"least,omitempty"` // in the column of which less is better

	LeastUnit string `json:"least_unit,omitempty"`
}

// A Set is a given value that a part sets, in SI.
type Set struct {
	Given string  `json:"given"`
	Value float64 `json:"value"`
	Unit  string  `json:"unit"`
	Kind  string  `json:"kind,omitempty"`
}
