package main

import (
	"fmt"
	"path/filepath"
	"runtime/debug"
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/present"

	"github.com/spf13/cobra"
)

// formats are what --format takes: the document formats, and the answers
// themselves as JSON.
func formats() []string {
	f := present.Formats()
	return slices.Insert(slices.Clone(f), 3, "json")
}

// extensions choose the format of -o FILE where --format is not given.
var extensions = map[string]string{
	".txt": "text", ".md": "markdown", ".csv": "csv", ".json": "json", ".html": "html", ".tex": "latex",
}

// root returns the command with all its verbs.
func (a *app) root() *cobra.Command {
	root := &cobra.Command{
		Use:     "lagbook VERB [CASE.toml] [flags]",
		Short:   "Answers about thermal and hydraulic networks from their poles",
		Long:    "lagbook reads a case file of thermal or hydraulic resistances, capacitances and\ninertances, reduces it to transfer functions and answers from the poles: how\nslow, how hot, how much pressure, when, and whether the limits hold. CASE.toml\nmay be - for standard input; without a case the embedded demo is used.",
		Example: "  lagbook demo",
		Args:    cobra.ArbitraryArgs,
		RunE: func(c *cobra.Command, args []string) error {
			if len(args) == 0 {
				return c.Help()
			}
			return unknownVerb(c, args[0])
		},
		PersistentPreRunE: func(c *cobra.Command, args []string) error { return a.checkFlags(c) },
		SilenceUsage:      true,
		SilenceErrors:     true,
	}
	root.SetIn(a.in)
	root.SetOut(a.out)
	root.SetErr(a.err)
	root.SetHelpFunc(a.help)
	root.SetFlagErrorFunc(flagFault)

	f := root.PersistentFlags()
	f.StringVar(&a.format, "format", "text", "`FORMAT` to print in: "+strings.Join(formats(), ", "))
	f.StringVarP(&a.file, "output", "o", "", "write to `FILE`, whole or not at all; its ending chooses the format unless --format does")
	f.BoolVarP(&a.quiet, "quiet", "q", false, "no notes on standard error; errors stay")
	f.BoolVar(&a.version, "version", false, "print the version and stop")
	_ = root.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(formats(), cobra.ShellCompDirectiveNoFileComp))

	root.AddCommand(a.demo(), a.check(), a.poles(), a.table(), a.limits(), a.size(), a.cycle(), a.frequency(), a.plot(), a.compare(), a.materials(), a.man())
	for _, n := range notBuilt {
		root.AddCommand(n.command())
	}
	root.SetHelpCommand(a.helpVerb())
	root.InitDefaultCompletionCmd()
	if c, _, err := root.Find([]string{"completion"}); err == nil && c != root {
		c.Short = "completion of verbs and flags for a shell"
		c.Example = "  lagbook completion bash"
	}
	return root
}

// checkFlags settles the format before anything is read.
func (a *app) checkFlags(c *cobra.Command) error {
	if a.version {
		if err := a.publish([]byte("lagbook " + version() + "\n")); err != nil {
			return err
		}
		return &fault{code: exitDone}
	}
	if !c.Flags().Changed("format") {
		if f, ok := extensions[strings.ToLower(filepath.Ext(a.file))]; ok {
			a.format = f
		}
	}
	if !slices.Contains(formats(), a.format) {
		return &fault{exitUsage, fmt.Sprintf("format %q is not known: use one of %s", a.format, strings.Join(formats(), ", "))}
	}
	if c.Flags().Changed("output") && a.file == "" {
		return &fault{exitUsage, "-o wants the name of a file"}
	}
	return nil
}

// version is that of the module, as the Go tool recorded it.
func version() string {
	if b, ok := debug.ReadBuildInfo(); ok && b.Main.Version != "" {
		return b.Main.Version
	}
	return "(devel)"
}
