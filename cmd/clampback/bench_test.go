package main

import (
	"os/exec"
	"path/filepath"
	"testing"
)

// Target: "clampback --help" in under 30 ms, the process included.
func BenchmarkHelp(b *testing.B) {
	program := filepath.Join(b.TempDir(), "clampback")
	if output, err := exec.Command("go", "build", "-o", program, ".").CombinedOutput(); err != nil {
		b.Fatalf("%v: %s", err, output)
	}
	for b.Loop() {
		if err := exec.Command(program, "--help").Run(); err != nil {
			b.Fatal(err)
		}
	}
}
