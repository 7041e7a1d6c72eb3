package thermal

import "lagbook/network/casefile"

// scaleField is the key of a part whose conductance or capacity rate switches.
func scaleField() casefile.Field {
	return casefile.ScaleField("multiplies what it conducts or carries, in steps: a fan that stops, a door that opens; 0 opens the branch")
}
