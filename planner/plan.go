package planner

import (
	"slices"
	"strings"

	"clampback/planner/quantity"
	"clampback/planner/stiffness"
)

// Plan is what Work makes of a joint, and its record in JSON. It is a plain value;
// the keys of the JSON form carry their unit. Torques are N.m here, N.mm inside the
// calculation.
type Plan struct {
	ID            string        `json:"id"`
	Name          string        `json:"name"`
	Count         int           `json:"count"`
	Feasible      bool          `json:"feasible"`
	Binds         []string      `json:"binds"` // what limits the window; of an infeasible joint, each reason
	Stiffness     Stiffness     `json:"stiffness"`
	WorkBack      WorkBack      `json:"work_back"`
	Preload       Preload       `json:"preload"`
	Torque        Torque        `json:"torque"`
	Angle         Angle         `json:"angle"`
	ResidualClamp ResidualClamp `json:"residual_clamp"`
	Checks        []Check       `json:"checks"`
	Trace         []Line        `json:"trace"`
	Assumptions   []string      `json:"assumptions"`
	Governing     []Governing   `json:"governing,omitempty"` // of a joint planned from its load cases: who decides what

	CheckedAt   Setting           `json:"-"` // the setting that preloads and checks were worked out at
	SnugTooHigh bool              `json:"-"` // the stated snug torque leaves nothing to tighten up to
	Joint       Joint             `json:"-"` // what was planned, completed by the assumptions
	Diagram     stiffness.Diagram `json:"-"` // points of the joint diagram
	Fatigue     *Fatigue          `json:"-"` // nil: not cyclic
	AngleWindow quantity.Range    `json:"-"` // where the angle setting may lie, deg; torque and angle only
}

// Setting says which torque or angle preloads and checks were worked out at.
type Setting int

// The settings. Where the window holds none, the others show how far it is.
const (
	AtTarget   Setting = iota // the setting in the window, which checks may still fail
	AtUpperEnd                // no setting in the window: what is tolerated at most
	AtLowerEnd                // nothing is tolerated: what would be needed
)

// Stiffness is the joint as springs.
type Stiffness struct {
	BoltCompliance    float64 `json:"bolt_compliance_mm_per_N"`    // delta_S
	ClampedCompliance float64 `json:"clamped_compliance_mm_per_N"` // delta_P
	LoadFactor        float64 `json:"load_factor"`                 // Phi
}

// WorkBack is the way from the clamp needed in service to the preload needed
// at assembly: RequiredPreload is the sum of the lines before it.
type WorkBack struct {
	RequiredResidualClamp float64 `json:"required_residual_clamp_N"` // F_Kerf
	LoadRelief            float64 `json:"load_relief_N"`             // (1 - Phi) F_Amax
	EmbeddingLoss         float64 `json:"embedding_loss_N"`          // F_Z
	ClosingLoss           float64 `json:"closing_loss_N"`            // F_L, by layers that get thinner
	ThermalLoss           float64 `json:"thermal_loss_N"`            // dF_Vth, a loss only
	SofteningLoss         float64 `json:"softening_loss_N"`          // F_soft, by the fall of the moduli
	RelaxationLoss        float64 `json:"relaxation_loss_N"`         // F_rel, over time
	RequiredPreload       float64 `json:"required_preload_N"`        // F_Mreq
}

// Preload is the assembly preload. Lowest and Highest are what the setting that was
// checked gives at the ends of the ranges; Plan.CheckedAt says which it was.
type Preload struct {
	Limit         float64 `json:"limit_N"` // F_lim
	Lowest        float64 `json:"lowest_N"`
	Highest       float64 `json:"highest_N"`
	ScatterFactor float64 `json:"scatter_factor"` // Highest/Lowest
}

// Torque is the torque window and the setting inside it. Target is 0 when the joint
// is infeasible, for whatever reason: a setting of such a joint is never given. For
// torque and angle it is the torque to expect at the end.
type Torque struct {
	WindowLow  float64 `json:"window_low_Nm"`
	Target     float64 `json:"target_Nm"`
	WindowHigh float64 `json:"window_high_Nm"`
}

// Angle is the angle turned from snug. For torque control Low and High are what a
// monitor should expect; for torque and angle FromSnug is the setting, and Low and
// High are what to accept. All are 0 when the joint is infeasible, but for the snug
// torque from which the window of torque and angle counts.
type Angle struct {
	SnugTorque float64 `json:"snug_torque_Nm"`
	FromSnug   float64 `json:"from_snug_deg"`
	Low        float64 `json:"low_deg"`
	High       float64 `json:"high_deg"`
}

// ResidualClamp is the clamp force left in service.
type ResidualClamp struct {
	Lowest  float64 `json:"lowest_N"`
	Highest float64 `json:"highest_N"`
}

// Check is one service check. Value must not exceed Limit, unless AtLeast:
// then it must reach it. Utilisation above 1 fails either way.
type Check struct {
	Name        string  `json:"name"`
	Value       float64 `json:"value"`
	Limit       float64 `json:"limit"`
	Unit        string  `json:"unit"`
	Utilisation float64 `json:"utilisation"`
	OK          bool    `json:"ok"`
	Source      string  `json:"source"`
	AtLeast     bool    `json:"-"`
	Rule        string  `json:"-"` // which line of templates/checks.csv restates the check
	Index       int     `json:"-"` // number of the bearing face, from 1; 0: not repeated
}

// Line is one line of the calculation. Symbol is unique in a plan and is
// spelled so that a spreadsheet can use it as a cell name (d_2, delta_P_3).
type Line struct {
	Symbol  string  `json:"symbol"`
	Meaning string  `json:"meaning"`
	Value   float64 `json:"value"`
	Unit    string  `json:"unit"`
	Source  string  `json:"source"`

	Input bool   `json:"-"` // stated or looked up, not computed
	Rule  string `json:"-"` // which formula of templates/calculation.csv restates the line; empty for an input
	Index int    `json:"-"` // place in a repeated line (layer, shank piece), from 1; 0: not repeated
}

// Heading is what the record of a whole register is headed with.
type Heading struct{ Assembly, Revision, PreparedBy string }

// Headings returns the assemblies, revisions and authors of joints, each once, in order.
func Headings(joints []Joint) Heading {
	var assemblies, revisions, authors []string
	for _, j := range joints {
		assemblies = appendNew(assemblies, j.Assembly)
		revisions = appendNew(revisions, j.Revision)
		authors = appendNew(authors, j.PreparedBy)
	}
	return Heading{strings.Join(assemblies, "; "), strings.Join(revisions, "; "), strings.Join(authors, "; ")}
}

func appendNew(list []string, s string) []string {
	if slices.Contains(list, s) {
		return list
	}
	return append(list, s)
}
