package main

import (
	"fmt"
	"strings"

	"lagbook/network/quantity"

	"github.com/spf13/cobra"
)

// An unbuilt verb is agreed on but not there yet. It is refused by name, so that
// nobody takes it for a misspelling.
type unbuilt struct{ name, does string }

var notBuilt = []unbuilt{
	{"sweep", "a result over a range of values"},
	{"tolerance", "sensitivity, worst case, Monte Carlo"},
	{"fit", "a network from a measured curve"},
	{"note", "the design note"},
	{"verify", "the published checks, run here"},
	{"new", "a commented starter case"},
}

func (n unbuilt) command() *cobra.Command {
	return &cobra.Command{
		Use: n.name, Hidden: true, DisableFlagParsing: true,
		RunE: func(*cobra.Command, []string) error {
			return &fault{exitUsage, fmt.Sprintf("%s (%s) is not built yet", n.name, n.does)}
		},
	}
}

// unknownVerb names the verb that was probably meant.
func unknownVerb(c *cobra.Command, word string) error {
	var names []string
	for _, v := range c.Commands() {
		names = append(names, v.Name())
	}
	text := fmt.Sprintf("%q is not a verb", word)
	near, ok := quantity.Nearest(word, names)
	switch {
	case ok:
		text += fmt.Sprintf("; did you mean %q?", near)
	case strings.HasSuffix(word, ".toml"):
		text += fmt.Sprintf(": the verb comes first, as in \"lagbook demo %s\"", word)
	default:
		text += `: "lagbook help" lists them`
	}
	return &fault{exitUsage, text}
}
