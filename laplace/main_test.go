package laplace

import (
	"flag"
	"os"
	"testing"
)

// Property tests draw the same cases in every run, so that what is tested does not
// depend on chance; -rapid.seed or RAPID_SEED asks for others.
func TestMain(m *testing.M) {
	flag.Parse()
	if seed := flag.Lookup("rapid.seed").Value; seed.String() == "0" {
		if err := seed.Set("1"); err != nil {
			panic(err)
		}
	}
	os.Exit(m.Run())
}
