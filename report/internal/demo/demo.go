// Package demo gives the tests of the reports the demo plant, read and planned.
package demo

import (
	"io/fs"
	"os"
	"path/filepath"
	"runtime"
	"testing"

	"clampback/planner"
	"clampback/planner/register"
)

// Joints returns the joints of the demo plant.
func Joints(t testing.TB) []planner.Joint {
	t.Helper()
	_, here, _, _ := runtime.Caller(0)
	folder := os.DirFS(filepath.Join(filepath.Dir(here), "..", "..", "..", "testdata", "demo"))
	open := func(name string) ([]byte, error) { return fs.ReadFile(folder, name) }
	var sources []register.Source
	for _, name := range []string{"tarn40.yaml", "tarn40-pipework.yaml"} {
		data, err := open(name)
		if err != nil {
			t.Fatal(err)
		}
		sources = append(sources, register.Source{Name: name, Data: data, Open: open})
	}
	joints, err := register.Read(sources...)
	if err != nil {
		t.Fatal(err)
	}
	return joints
}

// Plans returns the plans of the demo plant.
func Plans(t testing.TB) []planner.Plan {
	t.Helper()
	return PlanAll(t, Joints(t))
}

// PlanAll plans joints.
func PlanAll(t testing.TB, joints []planner.Joint) []planner.Plan {
	t.Helper()
	plans := make([]planner.Plan, len(joints))
	for i, j := range joints {
		var err error
		if plans[i], err = planner.Work(j); err != nil {
			t.Fatal(err)
		}
	}
	return plans
}
