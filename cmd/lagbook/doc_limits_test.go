package main

import (
	"testing"

	"lagbook/network/study"
)

// Limits that are not judged count neither as met nor as not met.
func TestVerdictOfNotJudged(t *testing.T) {
	met, failed, open := study.Limit{Met: true}, study.Limit{}, study.Limit{NotJudged: true}
	for _, c := range []struct {
		limits []study.Limit
		want   string
	}{
		{[]study.Limit{met, failed, open}, "1 of 3 limits met, 1 NOT met, 1 not judged"},
		{[]study.Limit{met, open}, "1 of 2 limits met, 1 not judged"},
		{[]study.Limit{open}, "the limit is not judged"},
		{[]study.Limit{failed}, "the limit is NOT met"},
	} {
		if got := verdict(c.limits)[0].Value; got != c.want {
			t.Errorf("%q, want %q", got, c.want)
		}
	}
	if got := metWords(open); got != "not judged" {
		t.Error(got)
	}
}
