package main

import (
	"bytes"
	"io"
	"os"
	"path/filepath"
	"testing"
	"time"
)

// An interrupt is answered at once, with its own status, and leaves no file.
func TestInterrupt(t *testing.T) {
	in, keep := io.Pipe() // a case that never comes
	defer keep.Close()
	dir := t.TempDir()
	done := make(chan int, 1)
	var out, errw bytes.Buffer
	go func() { done <- run([]string{"table", "-", "-o", filepath.Join(dir, "out.csv")}, in, &out, &errw) }()
	if _, err := keep.Write([]byte("title = ")); err != nil { // the command reads: it is ready to be interrupted
		t.Fatal(err)
	}
	self, err := os.FindProcess(os.Getpid())
	if err != nil {
		t.Fatal(err)
	}
	if err := self.Signal(os.Interrupt); err != nil {
		t.Fatal(err)
	}
	select {
	case code := <-done:
		if code != exitInterrupted {
			t.Errorf("exit %d, want %d", code, exitInterrupted)
		}
	case <-time.After(5 * time.Second):
		t.Fatal("the interrupt is not answered")
	}
	files, err := os.ReadDir(dir)
	if err != nil || len(files) > 0 {
		t.Errorf("left behind: %v, %v", files, err)
	}
	if out.Len() > 0 {
		t.Errorf("printed %q", out.String())
	}
}
