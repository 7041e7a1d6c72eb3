package main

import (
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"lagbook/hydraulic"
	"lagbook/network/casefile"
	"lagbook/network/study"
	"lagbook/testdata/demo"
	"lagbook/thermal"

	"github.com/spf13/cobra"
)

// mostBytes is one more than a case file may have; the reader refuses the rest.
const mostBytes = 1<<20 + 1

// model reads, checks and builds the case that args name: a file, "-", or the
// embedded demo. Diagnostics go to standard error.
func (a *app) model(args []string) (*study.Model, error) { return a.modelOr(demo.Main, args) }

// modelOr is model for a verb that shows more of another of the embedded cases.
func (a *app) modelOr(example string, args []string) (*study.Model, error) {
	name, src, dir, err := a.source(example, args)
	if err != nil {
		return nil, &fault{exitCase, err.Error()}
	}
	if dir != nil {
		defer dir.Close()
	}
	c, ds := casefile.Read(name, src, dir, vocabulary()...)
	if casefile.Failed(ds) {
		a.diagnose(ds)
		return nil, &fault{code: exitCase}
	}
	if err := a.keepsInput(name, c.Files()); err != nil {
		return nil, err
	}
	m, more := study.New(c)
	ds = append(ds, more...)
	if casefile.Failed(ds) {
		a.diagnose(ds)
		return nil, &fault{code: exitCase}
	}
	a.diagnose(unanswered(m, ds))
	return m, nil
}

// unanswered leaves out what every answer says itself.
func unanswered(m *study.Model, ds []casefile.Diagnostic) []casefile.Diagnostic {
	answered := map[string]bool{}
	for _, d := range m.Remarks() {
		answered[d.Error()] = true
	}
	return slices.DeleteFunc(ds, func(d casefile.Diagnostic) bool { return answered[d.Error()] })
}

// vocabulary is what a case may be made of.
func vocabulary() []casefile.Vocabulary {
	return append(thermal.Vocabulary(), hydraulic.Vocabulary()...)
}

// oneCase refuses more than one case.
func oneCase(c *cobra.Command, args []string) error {
	if len(args) > 1 {
		return &fault{exitUsage, fmt.Sprintf("%s takes one case file, not %d: %s", c.Name(), len(args), strings.Join(args, ", "))}
	}
	return nil
}

// source returns the text of the case and the directory its files may be read from.
func (a *app) source(example string, args []string) (name string, src []byte, dir *os.Root, err error) {
	switch {
	case len(args) == 0:
		a.note("no case given: this is the embedded demo, %s", example)
		src, err = demo.Cases.ReadFile(example)
		return example, src, nil, err
	case args[0] == "-":
		src, err = io.ReadAll(io.LimitReader(a.in, mostBytes))
		return "standard input", src, nil, err
	}
	name = args[0]
	if src, err = readCase(name); err != nil {
		return name, nil, nil, err
	}
	dir, err = os.OpenRoot(filepath.Dir(name))
	return name, src, dir, err
}

// readCase reads a case file, which must be a regular file: a directory, a
// device or a pipe that never ends is refused.
func readCase(name string) ([]byte, error) {
	info, err := os.Stat(name)
	if err != nil {
		return nil, plain(name, err)
	}
	if !info.Mode().IsRegular() {
		return nil, fmt.Errorf("%s: not a regular file (\"-\" reads standard input)", name)
	}
	f, err := os.Open(name)
	if err != nil {
		return nil, plain(name, err)
	}
	defer f.Close()
	src, err := io.ReadAll(io.LimitReader(f, mostBytes))
	if err != nil {
		return nil, plain(name, err)
	}
	return src, nil
}

// plain drops the name of the system call from an error about a file.
func plain(name string, err error) error {
	var p *os.PathError
	if errors.As(err, &p) {
		err = p.Err
	}
	return fmt.Errorf("%s: %w", name, err)
}

// diagnose prints what is wrong, or worth a word, about a case file: as JSON
// where the results are JSON.
func (a *app) diagnose(ds []casefile.Diagnostic) {
	if a.quiet {
		ds = onlyErrors(ds)
	}
	if len(ds) == 0 {
		return
	}
	if a.format != "json" {
		fmt.Fprint(a.err, casefile.Listing(ds))
		return
	}
	e := json.NewEncoder(a.err)
	e.SetEscapeHTML(false)
	_ = e.Encode(map[string]any{"diagnostics": ds}) // standard error: nowhere left to complain
}

func onlyErrors(ds []casefile.Diagnostic) []casefile.Diagnostic {
	var errs []casefile.Diagnostic
	for _, d := range ds {
		if d.Severity == casefile.Error {
			errs = append(errs, d)
		}
	}
	return errs
}

// note says something on standard error that is no result.
func (a *app) note(format string, args ...any) {
	if !a.quiet {
		fmt.Fprintf(a.err, "lagbook: "+format+"\n", args...)
	}
}

// failed turns an error of the study into diagnostics with places where the case
// can name one.
func (a *app) failed(m *study.Model, err error) error {
	if err == nil {
		return nil
	}
	var refused *study.Refusal
	if errors.As(err, &refused) {
		a.diagnose(refused.Diagnostics)
		return &fault{code: exitCase}
	}
	if ds := m.Case.Explain(err); len(ds) > 0 {
		if in := (*study.Under)(nil); errors.As(err, &in) {
			ds = under(in.Scenario, ds)
		}
		a.diagnose(ds)
		return &fault{code: exitCase}
	}
	return &fault{exitCase, strings.TrimPrefix(err.Error(), "network: ")}
}
