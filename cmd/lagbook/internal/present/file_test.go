package present

import (
	"bytes"
	"errors"
	"io"
	"os"
	"path/filepath"
	"testing"
)

func say(text string) func(io.Writer) error {
	return func(w io.Writer) error {
		_, err := io.WriteString(w, text)
		return err
	}
}

func content(t *testing.T, path string) string {
	t.Helper()
	b, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

func alone(t *testing.T, dir string, want int) {
	t.Helper()
	list, err := os.ReadDir(dir)
	if err != nil || len(list) != want {
		t.Errorf("%d files are left, %v", len(list), err)
	}
}

func TestWriteFile(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "out.txt")
	for _, text := range []string{"first", "second"} {
		if err := WriteFile(path, nil, say(text)); err != nil {
			t.Fatal(err)
		}
		if got := content(t, path); got != text {
			t.Errorf("%q", got)
		}
	}
	alone(t, dir, 1)
}

func TestWriteFileKeepsTheOldOneOnFailure(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "out.txt")
	if err := os.WriteFile(path, []byte("old"), 0o600); err != nil {
		t.Fatal(err)
	}
	broken := errors.New("broken")
	err := WriteFile(path, nil, func(w io.Writer) error {
		_, _ = w.Write(bytes.Repeat([]byte("x"), 1<<20))
		return broken
	})
	if !errors.Is(err, broken) || content(t, path) != "old" {
		t.Errorf("%v, %q", err, content(t, path))
	}
	alone(t, dir, 1)
	if err := WriteFile(path, nil, say("new")); err != nil {
		t.Fatal(err)
	}
	if info, err := os.Stat(path); err != nil || info.Mode().Perm() != 0o600 {
		t.Errorf("mode %v, %v", info.Mode(), err)
	}
}

func TestWriteFileFollowsALink(t *testing.T) {
	dir := t.TempDir()
	real, link := filepath.Join(dir, "real"), filepath.Join(dir, "link")
	if err := os.WriteFile(real, []byte("old"), 0o644); err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink("real", link); err != nil {
		t.Fatal(err)
	}
	if err := WriteFile(link, nil, say("new")); err != nil {
		t.Fatal(err)
	}
	if info, err := os.Lstat(link); err != nil || info.Mode()&os.ModeSymlink == 0 || content(t, real) != "new" {
		t.Errorf("the link is gone, or %q", content(t, real))
	}
}

func TestWriteFileRefuses(t *testing.T) {
	dir := t.TempDir()
	if err := WriteFile(dir, nil, say("x")); err == nil {
		t.Error("a directory is written over")
	}
	if err := WriteFile(filepath.Join(dir, "none", "out"), nil, say("x")); err == nil {
		t.Error("a file in no directory")
	}
	alone(t, dir, 0)
}

func TestWriteFileToStdout(t *testing.T) {
	var b bytes.Buffer
	if err := WriteFile("-", &b, say("x")); err != nil || b.String() != "x" {
		t.Errorf("%q, %v", b.String(), err)
	}
	if err := WriteFile("-", failing{}, say("x")); !errors.Is(err, errFull) {
		t.Error(err)
	}
}

func TestWriteFileToADevice(t *testing.T) {
	if _, err := os.Stat("/dev/full"); err != nil {
		t.Log("no /dev/full here; only /dev/null is tried")
	} else if err := WriteFile("/dev/full", nil, say("x")); err == nil {
		t.Error("a full device takes it")
	}
	if err := WriteFile(os.DevNull, nil, say("x")); err != nil {
		t.Error(err)
	}
}
