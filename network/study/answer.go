package study

// Caution stands under every answer.
const Caution = "This is a calculation, not an approval: local codes and standards, the maker's data and the judgement of a " +
	"licensed practitioner come first. Check the inputs, and measure before you rely on it."

// A Warning is a doubt that travels with an answer.
type Warning struct {
	Code string `json:"code"`
	Text string `json:"text"`
}

// Evidence stands at the end of every answer: what to doubt, how the initial
// state was found, and the caution.
type Evidence struct {
	Warnings []Warning `json:"warnings"`
	Start    string    `json:"start"`
	Linear   string    `json:"-"` // what the answer rests on, in the words of the page
	*Marched           // nil where nothing was marched
	Caution  string    `json:"caution"`
}

// Poles answers the verb poles: transfer functions, and the modes of the whole network.
type Poles struct {
	Title     string     `json:"title"`
	About     string     `json:"about,omitempty"` // the state that the modes of a nonlinear case belong to
	Transfers []Transfer `json:"transfers"`
	Modes     []Mode     `json:"modes"`
	Range     *Range     `json:"linear_range,omitempty"` // of a nonlinear case, about the start: over what change of the loads it holds

	Each []*Poles `json:"-"` // under each scenario, where several change the network
	Evidence
}

// A Mode is one pole of the whole network and the nodes that move together in it.
type Mode struct {
	Scenario string `json:"scenario,omitempty"` // where scenarios change the network
	Pole
	Moves  []Move  `json:"moves"`  // largest first, relative to the largest; below 0.1 left out
	Shares []Share `json:"shares"` // of the rise of each transfer function above
}

// A Share says how much of the final rise of an output, after a step of an
// input, a mode carries.
type Share struct {
	Input  string  `json:"input"`
	Output string  `json:"output"`
	Share  float64 `json:"share"`
}

// A Move says how far a node moves in a mode, relative to the node that moves
// most; negative: against it. Inside names the part that a node lies in where the
// case does not name the node itself.
type Move struct {
	Node   string  `json:"node"`
	Size   float64 `json:"size"`
	Inside string  `json:"inside,omitempty"`
}

// A Pole is a pole or zero in 1/s. Times are in s, the natural frequency in rad/s.
type Pole struct {
	Re               float64  `json:"re"`
	Im               float64  `json:"im"`
	Multiplicity     int      `json:"multiplicity"`
	TimeConstant     *float64 `json:"time_constant,omitempty"` // −1/re of a real pole that is not 0; negative where it grows
	DampingRatio     *float64 `json:"damping_ratio,omitempty"` // 0 where re is 0 within its error bound
	NaturalFrequency *float64 `json:"natural_frequency,omitempty"`
	ErrorBound       *float64 `json:"error_bound,omitempty"` // radius of the disc that holds the pole, 1/s
	Share            *float64 `json:"share,omitempty"`       // of the final rise after a step, carried by this pole
}

// A Zero is a zero, or a pole that a zero cancels.
type Zero struct {
	Re           float64 `json:"re"`
	Im           float64 `json:"im"`
	Multiplicity int     `json:"multiplicity"`
}

// A Transfer is one transfer function. Residues[i][k] is [re, im] of the
// coefficient of 1/(s−p_i)^(k+1); the polynomials ascend and the denominator is monic.
// Where the form is improper, the relative degree is negative.
type Transfer struct {
	Input          string         `json:"input"`
	Output         string         `json:"output"`
	Scenario       string         `json:"scenario,omitempty"` // where scenarios change the network
	About          string         `json:"about,omitempty"`    // of a network that switches or is not linear: start, or a time
	Unit           string         `json:"unit"`
	Gain           *float64       `json:"gain,omitempty"`
	Form           string         `json:"form"`
	RelativeDegree int            `json:"relative_degree"`
	Poles          []Pole         `json:"poles"`
	Zeros          []Zero         `json:"zeros"`
	Cancelled      []Zero         `json:"cancelled"`
	Residues       [][][2]float64 `json:"residues"`
	Numerator      []float64      `json:"numerator,omitempty"`
	Denominator    []float64      `json:"denominator,omitempty"`
	Polynomial     []float64      `json:"polynomial,omitempty"` // of an improper transfer function: what it tends to for large s, ascending
	Behaviour      string         `json:"behaviour,omitempty"`  // absent where nothing is stored: the output follows at once
	Step           *Step          `json:"step,omitempty"`
}

// Step measures the response to a unit step from rest; times in s, overshoot in per cent.
type Step struct {
	Final       *float64 `json:"final,omitempty"`
	RiseTime    *float64 `json:"rise_time,omitempty"`
	Settling2   *float64 `json:"settling_time_2pct,omitempty"`
	Settling5   *float64 `json:"settling_time_5pct,omitempty"`
	Overshoot   *float64 `json:"overshoot_pct,omitempty"`
	Undershoot  *float64 `json:"undershoot_pct,omitempty"`
	Peak        *float64 `json:"peak,omitempty"`
	PeakTime    *float64 `json:"peak_time,omitempty"`
	TouchesBand bool     `json:"touches_band,omitempty"` // an extremum meets the band: the settling time may jump by one swing
}

// Tables answers the verb table.
type Tables struct {
	Title    string     `json:"title"`
	Tables   []Table    `json:"tables"`
	Measured []Measured `json:"measured,omitempty"`

	Results []Result `json:"results,omitempty"`
	Finds   []Find   `json:"finds,omitempty"`
	Evidence
}

// A Table holds rows of [time, values...], in SI.
type Table struct {
	Title    string      `json:"title"`
	Scenario string      `json:"scenario,omitempty"`
	Columns  []Column    `json:"columns"`
	Rows     [][]float64 `json:"rows"`
	Marks    []Mark      `json:"marks"` // what happened by a row

	ValidUntil *float64 `json:"valid_until,omitempty"` // s; rows that were asked for after it do not exist
}

// A Column names what a column holds. Kind is level or difference where the unit alone does not say.
type Column struct {
	Name string `json:"name"`
	Unit string `json:"unit"`
	Kind string `json:"kind,omitempty"`
}

// A Mark says what happened at a row, or since the row before it.
type Mark struct {
	Row  int    `json:"row"`
	Text string `json:"text"`
}

// Limits answers the verb limits.
type Limits struct {
	Title  string  `json:"title"`
	Limits []Limit `json:"limits"`
	Met    bool    `json:"met"` // all of them

	Results []Result `json:"results,omitempty"`
	Finds   []Find   `json:"finds,omitempty"`
	Evidence
}

// A Limit is one verdict. Value and Margin are in Unit, Level in LevelUnit,
// At and FirstOutside in s.
type Limit struct {
	Name         string   `json:"name"`
	Scenario     string   `json:"scenario,omitempty"`
	Demand       string   `json:"demand"` // stay_below, stay_above, reach, settle, overshoot_below
	Of           string   `json:"of"`
	Kind         string   `json:"kind,omitempty"`
	Level        *float64 `json:"level,omitempty"`
	LevelUnit    string   `json:"level_unit,omitempty"`
	Percentage   bool     `json:"level_of_change,omitempty"` // the level is a fraction of the final change
	Within       *float64 `json:"within,omitempty"`
	LessThan     *float64 `json:"less_than,omitempty"` // s: of time_above
	PerDay       bool     `json:"per_day,omitempty"`   // that is meant of every day
	In           string   `json:"in,omitempty"`        // cycle: of the periodic state, At within its period
	Among        int      `json:"among,omitempty"`     // outputs that the limit is on: Of is the worst
	After        *float64 `json:"after,omitempty"`
	Until        *float64 `json:"until,omitempty"`
	Met          bool     `json:"met"`
	NotJudged    bool     `json:"not_judged,omitempty"` // neither met nor not met: the march had to stop before it could tell, or there is no cycle
	Value        *float64 `json:"value,omitempty"`
	At           *float64 `json:"at,omitempty"`
	Margin       *float64 `json:"margin,omitempty"`
	MarginAsked  *float64 `json:"margin_asked,omitempty"`
	Percent      *float64 `json:"percent,omitempty"` // the margin as a share of the way from the start value to the level
	Unit         string   `json:"unit"`
	Governs      bool     `json:"governs"`
	Worst        bool     `json:"worst,omitempty"` // of the scenarios that the limit is judged under
	FirstOutside *float64 `json:"first_outside,omitempty"`
	Text         string   `json:"text"` // the verdict in a sentence
}

// Check answers the verb check: the network as understood, in SI.
type Check struct {
	Title string `json:"title"`
	Understood
	Flows []Flows `json:"flows,omitempty"` // where they were asked for
	Evidence
}

// Understood is the network as understood.
type Understood struct {
	Nodes     []CheckNode   `json:"nodes"`
	Branches  []CheckBranch `json:"branches"`
	State     []CheckValue  `json:"state"`               // what else is known of t = 0: "level of t1"
	Nonlinear []string      `json:"nonlinear,omitempty"` // the parts whose laws are not linear
	Inputs    []CheckInput  `json:"inputs"`
	Given     []CheckGiven  `json:"given"`

	Profiles  []CheckProfile  `json:"profiles,omitempty"`
	Uses      []CheckUse      `json:"uses,omitempty"`
	Scenarios []CheckScenario `json:"scenarios,omitempty"`

	Notes     []string `json:"notes"`
	LeavesOut []string `json:"leaves_out"`
}

// A CheckNode is one node: held, stored or massless.
type CheckNode struct {
	Name        string   `json:"name"`
	Domain      string   `json:"domain"`
	Kind        string   `json:"kind"`
	Capacitance *float64 `json:"capacitance,omitempty"` // of a vessel: its compliance
	Unit        string   `json:"unit"`                  // of the capacitance: J/K, m³/Pa
	Start       *float64 `json:"start,omitempty"`       // level at t = 0
	LevelUnit   string   `json:"level_unit"`            // K, Pa
	From        string   `json:"from,omitempty"`        // how the capacitance follows: formula and numbers
	Source      string   `json:"source,omitempty"`
}

// A CheckBranch is one part between nodes. Flow is positive from From to To.
type CheckBranch struct {
	Name     string  `json:"name"`
	Part     string  `json:"part"` // resistance, impedance, wall, stream, source …
	From     string  `json:"from,omitempty"`
	To       string  `json:"to,omitempty"`
	Quantity string  `json:"quantity"`
	Value    float64 `json:"value"`
	Unit     string  `json:"unit"`
	Kind     string  `json:"kind,omitempty"`
	Formula  string  `json:"formula,omitempty"`
	Numbers  string  `json:"numbers,omitempty"`
	Source   string  `json:"source,omitempty"`

	Flow     *float64 `json:"flow,omitempty"` // just before t = 0; in the first line of a part
	FlowUnit string   `json:"flow_unit,omitempty"`
}

// A CheckValue is something of a part just before t = 0: a reading, or in words that it
// is shut.
type CheckValue struct {
	Name  string   `json:"name"` // "level of t1"
	Value *float64 `json:"value,omitempty"`
	Unit  string   `json:"unit,omitempty"`
	Kind  string   `json:"kind,omitempty"`
	State string   `json:"state,omitempty"` // "shut"
}

// A CheckInput is one driven quantity, its waveform in words.
type CheckInput struct {
	Name string `json:"name"`
	Held bool   `json:"held"` // a level, not a flow
	What string `json:"what"` // "heat into junction", "pressure of header"
	Wave string `json:"wave"`
}

// A CheckGiven is one named value.
type CheckGiven struct {
	Name   string  `json:"name"`
	Value  float64 `json:"value"`
	Unit   string  `json:"unit"`
	Kind   string  `json:"kind,omitempty"`
	Text   string  `json:"text"`
	Source string  `json:"source,omitempty"`
}

// A HandLine is what an engineer would reckon on paper, beside what was computed.
// Off is (hand − computed)/computed; of a level, of the rise. Where flows are
// balanced, Computed is 0 and Hand is what is left over.
type HandLine struct {
	What     string   `json:"what"`
	Numbers  string   `json:"numbers"`
	Hand     float64  `json:"hand"`
	Computed *float64 `json:"computed,omitempty"`
	Unit     string   `json:"unit"`
	Off      *float64 `json:"off,omitempty"`
	Remark   string   `json:"remark"`
}

// Page answers the verb demo: everything a design note opens with.
type Page struct {
	Title     string     `json:"title"`
	About     string     `json:"about,omitempty"` // the state that the modes of a nonlinear case belong to
	Limits    []Limit    `json:"limits"`
	Met       bool       `json:"met"` // all limits
	Transfers []Transfer `json:"transfers"`
	Modes     []Mode     `json:"modes"`
	Range     *Range     `json:"linear_range,omitempty"` // as of Poles
	Tables    []Table    `json:"tables"`
	Measured  []Measured `json:"measured,omitempty"`
	Results   []Result   `json:"results,omitempty"`
	Finds     []Find     `json:"finds,omitempty"`
	Hand      []HandLine `json:"hand_check"`
	Each      []*Poles   `json:"-"` // under each scenario, where several change the network
	Understood
	Evidence
}
