package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"sync"
	"syscall"
)

// Exit statuses, as README and help state them.
const (
	exitDone        = 0
	exitCase        = 1
	exitUsage       = 2
	exitLimit       = 3
	exitInterrupted = 130
)

// An app is one call of the command.
type app struct {
	in       io.Reader
	out, err io.Writer
	format   string
	file     string // -o; "" for standard output
	quiet    bool
	version  bool
	helped   error      // what printing help met
	filing   sync.Mutex // held while a file is written, so that an interrupt leaves none half written
}

// A fault ends a verb with an exit status. Text is not printed where it is "",
// because what there is to say has been said.
type fault struct {
	code int
	text string
}

func (f *fault) Error() string { return f.text }

// run is the command: it reads, computes and prints, or stops at once when
// interrupted. It returns the exit status.
func run(args []string, in io.Reader, out, errw io.Writer) int {
	a := &app{in: in, out: out, err: errw}
	stop := make(chan os.Signal, 1)
	signal.Notify(stop, os.Interrupt)
	defer signal.Stop(stop)
	done := make(chan int, 1)
	go func() { done <- a.execute(args) }()
	select {
	case code := <-done:
		return code
	case <-stop:
		a.filing.Lock() // a file begun is finished or removed first
		return exitInterrupted
	}
}

// execute runs the verb that args name and turns its error into a status.
func (a *app) execute(args []string) int {
	root := a.root()
	root.SetArgs(args)
	err := root.Execute()
	if err == nil {
		err = a.helped
	}
	var f *fault
	switch {
	case err == nil:
		return exitDone
	case errors.Is(err, syscall.EPIPE):
		return exitDone // whoever read has seen enough
	case errors.As(err, &f):
		if f.text != "" {
			fmt.Fprintln(a.err, "lagbook: "+f.text)
		}
		return f.code
	}
	fmt.Fprintf(a.err, "lagbook: %v\n", err)
	fmt.Fprintln(a.err, `"lagbook help" lists the verbs`)
	return exitUsage // cobra's own: an unknown verb or flag, too many arguments
}
