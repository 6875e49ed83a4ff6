package main

import (
	"os"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"clampback": main})
}

// TestScripts runs the commands as a user does: every output, error text and
// exit status that a user meets has a script.
func TestScripts(t *testing.T) {
	demo, err := os.ReadFile("../../testdata/demo/tarn40.yaml")
	if err != nil {
		t.Fatal(err)
	}
	testscript.Run(t, testscript.Params{
		Dir: "testdata/script",
		Setup: func(e *testscript.Env) error {
			return os.WriteFile(e.WorkDir+"/tarn40.yaml", demo, 0o644)
		},
	})
}
