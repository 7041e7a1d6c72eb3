package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"

	"lagbook/network/quantity"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"
)

// help prints the help of one verb, or of the command. It is a function, not a
// template, to keep the template engine's reflection out of the binary.
func (a *app) help(c *cobra.Command, _ []string) {
	var b bytes.Buffer
	writeHelp(&b, c)
	a.helped = a.publish(b.Bytes())
}

// helpVerb is the verb help, which refuses what is no verb.
func (a *app) helpVerb() *cobra.Command {
	return &cobra.Command{
		Use:     "help [VERB]",
		Short:   "what a verb does, with an example",
		Example: "  lagbook help table",
		Args:    cobra.MaximumNArgs(1),
		RunE: func(c *cobra.Command, args []string) error {
			v, _, err := c.Root().Find(args)
			switch {
			case err != nil || len(args) > 0 && v == c.Root():
				return unknownVerb(c.Root(), args[0])
			case v.RunE != nil && v.DisableFlagParsing:
				return v.RunE(v, nil) // a verb not built yet says so
			}
			a.help(v, nil)
			return nil
		},
	}
}

// verbs are the verbs in the order in which a user meets them.
var verbs = []string{"demo", "check", "poles", "table", "limits", "size", "cycle", "frequency", "plot", "compare", "materials", "completion", "help"}

func writeHelp(w io.Writer, c *cobra.Command) {
	fmt.Fprintf(w, "%s\n\nUsage:\n  %s\n", firstOf(c.Long, c.Short), useLine(c))
	switch {
	case !c.HasParent():
		fmt.Fprintln(w, "\nVerbs:")
		for _, name := range verbs {
			if v, _, err := c.Find([]string{name}); err == nil && v != c {
				fmt.Fprintf(w, "  %-11s %s\n", v.Name(), v.Short)
			}
		}
	case c.HasAvailableSubCommands():
		fmt.Fprintln(w, "\nOf these:")
		for _, v := range c.Commands() {
			fmt.Fprintf(w, "  %-11s %s\n", v.Name(), v.Short)
		}
	}
	fmt.Fprintln(w, "\nFlags:")
	c.LocalFlags().VisitAll(func(f *pflag.Flag) { flagLine(w, f) })
	c.InheritedFlags().VisitAll(func(f *pflag.Flag) { flagLine(w, f) })
	if c.Example != "" {
		fmt.Fprintf(w, "\nExample:\n%s\n", c.Example)
	}
	if !c.HasParent() {
		fmt.Fprint(w, "\nExit status:\n", statuses)
	}
}

// statuses are the exit statuses in words, for help and the manual.
const statuses = `  0    done
  1    the case cannot be read or computed
  2    wrong usage
  3    a limit is not met
  130  interrupted
`

// useLine is the line of usage, without cobra's own additions.
func useLine(c *cobra.Command) string {
	if c.HasParent() {
		return c.Root().Name() + " " + c.Use
	}
	return c.Use
}

func flagLine(w io.Writer, f *pflag.Flag) {
	if f.Hidden {
		return
	}
	name, usage := pflag.UnquoteUsage(f)
	left := "      --" + f.Name
	if f.Shorthand != "" {
		left = "  -" + f.Shorthand + ", --" + f.Name
	}
	if name != "" {
		left += " " + strings.ToUpper(name)
	}
	fmt.Fprintf(w, "%-24s %s\n", left, usage)
}

func firstOf(a, b string) string {
	if a != "" {
		return a
	}
	return b
}

// flagFault says which flag was probably meant, or what the flag takes.
func flagFault(c *cobra.Command, err error) error {
	var unknown *pflag.NotExistError
	var value *pflag.InvalidValueError
	text := err.Error()
	switch {
	case errors.As(err, &unknown):
		var names []string
		c.Flags().VisitAll(func(f *pflag.Flag) { names = append(names, f.Name) })
		if near, ok := quantity.Nearest(unknown.GetSpecifiedName(), names); ok {
			return &fault{exitUsage, text + fmt.Sprintf("; did you mean --%s?", near)}
		}
	case errors.As(err, &value):
		text = fmt.Sprintf("--%s %q is no %s", value.GetFlag().Name, value.GetValue(), flagWants[value.GetFlag().Value.Type()])
	}
	verb := ""
	if c.HasParent() {
		verb = " " + c.Name()
	}
	return &fault{exitUsage, fmt.Sprintf("%s: \"lagbook help%s\" lists the flags", text, verb)}
}

// flagWants puts the types of flags that can fail in words.
var flagWants = map[string]string{"int": "whole number", "bool": "true or false"}
