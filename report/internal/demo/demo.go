// Package demo gives the tests of the reports the demo plant, read and planned.
package demo

import (
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
	data, err := os.ReadFile(filepath.Join(filepath.Dir(here), "..", "..", "..", "testdata", "demo", "tarn40.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	joints, err := register.Read(register.Source{Name: "tarn40.yaml", Data: data})
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
