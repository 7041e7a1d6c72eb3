package main

import (
	"fmt"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"
)

// man prints a manual page in roff: of the command, or of one verb.
func (a *app) man() *cobra.Command {
	return &cobra.Command{
		Use:     "man [VERB]",
		Short:   "the manual page in roff, of lagbook or of one verb",
		Example: "  lagbook man > lagbook.1",
		Hidden:  true,
		Args:    cobra.MaximumNArgs(1),
		RunE: func(c *cobra.Command, args []string) error {
			page := c.Root()
			if len(args) == 1 {
				v, _, err := c.Root().Find(args)
				if err != nil || v == c.Root() {
					return unknownVerb(c.Root(), args[0])
				}
				page = v
			}
			return a.publish([]byte(roff(page)))
		},
	}
}

// roff writes one page with the man macros; it carries no date, so that the same
// program gives the same bytes.
func roff(c *cobra.Command) string {
	var b strings.Builder
	title := strings.ReplaceAll(c.CommandPath(), " ", "-")
	fmt.Fprintf(&b, ".TH %q 1\n.SH NAME\n%s \\- %s\n", strings.ToUpper(title), roffText(title), roffText(c.Short))
	fmt.Fprintf(&b, ".SH SYNOPSIS\n.B %s\n", roffText(useLine(c)))
	fmt.Fprintf(&b, ".SH DESCRIPTION\n%s\n", roffText(firstOf(c.Long, c.Short)))
	if !c.HasParent() {
		b.WriteString(".SH VERBS\n")
		for _, name := range verbs {
			if v, _, err := c.Find([]string{name}); err == nil && v != c {
				fmt.Fprintf(&b, ".TP\n.B %s\n%s\n", roffText(v.Name()), roffText(v.Short))
			}
		}
	}
	b.WriteString(".SH OPTIONS\n")
	roffFlag := func(f *pflag.Flag) {
		name, usage := pflag.UnquoteUsage(f)
		fmt.Fprintf(&b, ".TP\n.B \\-\\-%s\n", roffText(strings.TrimSpace(f.Name+" "+strings.ToUpper(name))))
		b.WriteString(roffText(usage) + "\n")
	}
	c.LocalFlags().VisitAll(roffFlag)
	c.InheritedFlags().VisitAll(roffFlag)
	if c.Example != "" {
		fmt.Fprintf(&b, ".SH EXAMPLE\n.nf\n%s\n.fi\n", roffText(c.Example))
	}
	fmt.Fprintf(&b, ".SH EXIT STATUS\n.nf\n%s.fi\n", roffText(statuses))
	return b.String()
}

// roffText escapes what roff would take for a request or a macro's dash.
func roffText(s string) string {
	s = strings.ReplaceAll(s, `\`, `\e`)
	s = strings.ReplaceAll(s, "-", `\-`)
	lines := strings.Split(s, "\n")
	for i, l := range lines {
		if strings.HasPrefix(l, ".") || strings.HasPrefix(l, "'") {
			lines[i] = `\&` + l
		}
	}
	return strings.Join(lines, "\n")
}
