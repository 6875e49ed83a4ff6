package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"testing"
)

// Target: "clampback --help" in under 30 ms, the process included.
func BenchmarkHelp(b *testing.B) {
	program := filepath.Join(b.TempDir(), "clampback")
	build := exec.Command("go", "build", "-trimpath", "-o", program, ".")
	build.Env = append(os.Environ(), "CGO_ENABLED=0") // as make build does
	if output, err := build.CombinedOutput(); err != nil {
		b.Fatalf("%v: %s", err, output)
	}
	for b.Loop() {
		if err := exec.Command(program, "--help").Run(); err != nil {
			b.Fatal(err)
		}
	}
}
