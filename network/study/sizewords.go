package study

import (
	"fmt"
	"math"
	"strings"
)

// found puts the size in a sentence.
func (z *sizing) found(s *Size, p sized, want string, end sized) string {
	text := fmt.Sprintf("the %s %s that meets %s is %s; %s", want, z.ask.Vary, z.limitsWords(), z.value(p.v), z.stands(p))
	if p.v == end.v {
		text = fmt.Sprintf("%s, the %s of the range, meets %s already; %s", z.value(p.v), want, z.limitsWords(), z.stands(p))
	}
	return text + z.other(s)
}

// limitsWords are the limits that are to be met, with the margin asked for.
func (z *sizing) limitsWords() string {
	words := "every limit"
	switch n := len(z.ask.ToMeet); {
	case n == 1:
		words = "limit " + z.ask.ToMeet[0]
	case n > 1:
		words = "limits " + join(z.ask.ToMeet)
	}
	if z.ask.HasMargin {
		words += " with the margin asked for"
	}
	return words
}

// other says where else the margin crosses, where it does so more than once.
func (z *sizing) other(s *Size) string {
	if len(s.Crossings) < 2 {
		return ""
	}
	var list []string
	for _, c := range s.Crossings {
		list = append(list, "met "+c.Met+" "+z.value(c.Value))
	}
	return fmt.Sprintf("; the margin is not monotonic, it crosses %d times: %s", len(list), strings.Join(list, ", "))
}

// nothing says that no value of the range meets the limits, and what comes nearest.
func (z *sizing) nothing(p sized, list []sized) string {
	lo, hi := z.value(list[0].v), z.value(list[len(list)-1].v)
	if math.IsInf(p.least, -1) {
		return fmt.Sprintf("no %s from %s to %s meets %s; %s", z.ask.Vary, lo, hi, z.limitsWords(), z.stands(p))
	}
	return fmt.Sprintf("no %s from %s to %s meets %s; nearest comes %s, where %s stands in the way: %s", z.ask.Vary, lo, hi, z.limitsWords(), z.value(p.v), z.where(p), p.limit.Text)
}

// where names the limit that decides, with its scenario.
func (z *sizing) where(p sized) string {
	if p.scenario == "" {
		return p.limit.Name
	}
	return p.limit.Name + " under " + p.scenario
}
