package present

import (
	"bufio"
	"errors"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strconv"
)

// WriteFile calls write with a writer whose bytes become the file at path, all
// of them or none: they go to a temporary neighbour that is synced and takes
// the name of path only once write and every step after it has succeeded. A
// file that was there keeps its permissions and, on failure, its content; a
// link stays a link. What is no regular file, such as /dev/full, is written to
// directly.
//
// Where path is "-" the bytes go to stdout.
func WriteFile(path string, stdout io.Writer, write func(io.Writer) error) error {
	if path == "-" {
		return buffered(stdout, write)
	}
	if real, err := filepath.EvalSymlinks(path); err == nil {
		path = real
	}
	old, err := os.Stat(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return replace(path, nil, write)
	case err != nil:
		return err
	case old.IsDir():
		return &fs.PathError{Op: "write", Path: path, Err: errors.New("is a directory")}
	case !old.Mode().IsRegular():
		return writeThrough(path, write)
	}
	return replace(path, old, write)
}

// replace writes a neighbour of path and renames it.
func replace(path string, old fs.FileInfo, write func(io.Writer) error) (err error) {
	f, err := neighbour(path)
	if err != nil {
		return err
	}
	defer func() {
		if err != nil {
			f.Close()
			os.Remove(f.Name())
		}
	}()
	if err = buffered(f, write); err != nil {
		return err
	}
	if old != nil {
		if err = f.Chmod(old.Mode().Perm()); err != nil {
			return err
		}
	}
	if err = f.Sync(); err != nil {
		return err
	}
	if err = f.Close(); err != nil {
		return err
	}
	return os.Rename(f.Name(), path)
}

// neighbour creates a hidden file beside path, with the permissions a new file
// gets here.
func neighbour(path string) (*os.File, error) {
	dir, base := filepath.Split(path)
	for n := 0; ; n++ {
		name := filepath.Join(dir, "."+base+"."+strconv.Itoa(os.Getpid())+"."+strconv.Itoa(n))
		f, err := os.OpenFile(name, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
		if !errors.Is(err, fs.ErrExist) || n == maxNeighbours {
			return f, err
		}
	}
}

const maxNeighbours = 100

func buffered(w io.Writer, write func(io.Writer) error) error {
	b := bufio.NewWriterSize(w, 1<<16)
	if err := write(b); err != nil {
		return err
	}
	return b.Flush()
}

func writeThrough(path string, write func(io.Writer) error) error {
	f, err := os.OpenFile(path, os.O_WRONLY, 0)
	if err != nil {
		return err
	}
	if err := buffered(f, write); err != nil {
		f.Close()
		return err
	}
	return f.Close()
}
