package main

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"syscall"

	"lagbook/cmd/lagbook/internal/present"
)

// answer prints an answer: as JSON itself, in the other formats the document
// made from it. The bytes are complete before the first is written.
func (a *app) answer(answer any, doc func() present.Doc) error {
	var b bytes.Buffer
	if a.format == "json" {
		e := json.NewEncoder(&b)
		e.SetEscapeHTML(false)
		e.SetIndent("", " ")
		if err := e.Encode(answer); err != nil {
			return &fault{exitCase, err.Error()}
		}
	} else {
		d := doc()
		d.Width = a.columns()
		if err := present.Encode(&b, a.format, d); err != nil {
			return &fault{exitCase, err.Error()}
		}
	}
	return a.publish(b.Bytes())
}

// widestPage is how much of a wide terminal a page uses.
const widestPage = 160

// columns is the width of a page of text: that of the terminal it is printed
// on, else 0, the width a file is written in, so that the same case makes the
// same file wherever it is run.
func (a *app) columns() int {
	f, ok := a.out.(*os.File)
	if !ok || a.file != "" {
		return 0
	}
	return min(terminalWidth(f), widestPage)
}

// publish writes the finished bytes to where they are wanted.
func (a *app) publish(b []byte) error {
	write := func(w io.Writer) error {
		_, err := w.Write(b)
		return err
	}
	if a.file == "" || a.file == "-" {
		err := write(a.out)
		switch {
		case errors.Is(err, syscall.EPIPE):
			return err // whoever read has seen enough
		case err != nil:
			return &fault{exitCase, fmt.Sprintf("cannot write to standard output: %v", last(err))}
		}
		return nil
	}
	a.filing.Lock()
	defer a.filing.Unlock()
	if err := present.WriteFile(a.file, a.out, write); err != nil {
		return &fault{exitCase, fmt.Sprintf("cannot write %s: %v", a.file, last(err))}
	}
	return nil
}

// keepsInput refuses to write over the case, or over a data file beside it.
func (a *app) keepsInput(name string, data []string) error {
	out, err := os.Stat(a.file)
	if a.file == "" || a.file == "-" || err != nil {
		return nil // nothing there to lose
	}
	files := []string{name}
	for _, d := range data {
		files = append(files, filepath.Join(filepath.Dir(name), d))
	}
	for _, f := range files {
		if in, err := os.Stat(f); err == nil && os.SameFile(in, out) && out.Mode().IsRegular() {
			return &fault{exitUsage, fmt.Sprintf("-o %s would write over %s, which the case is read from: choose another name", a.file, f)}
		}
	}
	return nil
}

// last is the innermost error: what went wrong, without the system call's name.
func last(err error) error {
	for {
		inner := errors.Unwrap(err)
		if inner == nil {
			return err
		}
		err = inner
	}
}
