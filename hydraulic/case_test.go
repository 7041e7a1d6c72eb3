package hydraulic

import (
	"os"
	"testing"

	"lagbook/network/casefile/casetest"
	"lagbook/testdata/demo"
)

// read reads a case that must be free of errors.
func read(t *testing.T, name, text string) *casetest.Model {
	t.Helper()
	return casetest.Read(t, name, text, Vocabulary()...)
}

// faults is everything said about a case, each with its code in front.
func faults(text string) string { return casetest.Said(text, Vocabulary()...) }

const published = "../testdata/hydraulic"

func TestPublished(t *testing.T) { casetest.Published(t, published, Vocabulary()...) }

func FuzzCase(f *testing.F) { casetest.Fuzz(f, Vocabulary(), demo.Cases, os.DirFS(published)) }
