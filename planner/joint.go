package planner

import (
	"clampback/planner/fastener"
	"clampback/planner/group"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
)

// Joint is one bolted joint as a joint engineer states it: everything looked
// up, all numbers in N, mm, MPa, N.mm, degC. A field that the register may
// leave out has a zero value that means "not stated"; Work then takes the
// usual value and says so in the plan's assumptions.
type Joint struct {
	Assembly   string // the machine or plant the joint belongs to
	Revision   string // of the register
	PreparedBy string

	ID    string // letters, digits, . _ -; names the output files
	Name  string
	Count int // number of bolts

	Pattern pattern.Pattern // where the bolts sit; zero: not stated
	Bolt    Bolt
	HeadNut *fastener.Nut // of a stud: the nut that is turned, in place of a head; nil: a headed bolt
	Nut     *fastener.Nut // nil when the bolt goes into a tapped part
	LockNut *fastener.Nut // thin nut between the part and Nut, which is then turned; nil: none
	Tapped  *Tapped       // nil when there is a nut

	NutClass string  // property class of Nut; empty: not stated
	NutShear float64 // shear strength of Nut, MPa; 0: not stated, stripping is then not computed

	HeadWasher *fastener.Washer // nil: none
	NutWasher  *fastener.Washer // nil: none

	Parts     []Part  // clamped parts from the head down, without washers
	Roughness float64 // Rz of the surfaces, mm; 0: not stated

	Clamp       Clamp
	Safety      Safety
	Loads       Loads
	Losses      Losses
	Temperature *Temperature // nil: service at assembly temperature
	Friction    Friction
	Tightening  Tightening

	// Group is what each bolt gets in each load case on the whole joint, by case and
	// bolt; it stands in place of Loads.Axial. Nil: not stated.
	Group []group.Share
	// GroupLoads are the load cases that Group was shared out from. Nil: Group came from
	// a finite-element run.
	GroupLoads []group.Load

	Eccentric *Eccentric // nil: clamped and loaded concentrically
}

// Bolt is the bolt of a joint.
type Bolt struct {
	Thread   fastener.Thread
	Head     fastener.Head
	Class    fastener.PropertyClass
	Length   float64   // l, mm, from under the head to the end
	Shank    *float64  // full-diameter length inside the grip, mm; nil: not stated
	Segments []Segment // pieces of shank inside the grip, from the head down; instead of Shank

	RolledAfter bool // thread rolled after heat treatment; false: before, or not known

	HotModulus float64 // E_S at its highest temperature in service, MPa; 0: from the tables
	HotYield   float64 // R_p0.2 at its highest temperature in service, MPa; 0: from the tables
}

// Segment is one cylindrical piece of a bolt's shank.
type Segment struct {
	Length   float64 // mm
	Diameter float64 // mm
}

// Part is one clamped part.
type Part struct {
	Name          string
	Material      fastener.Material
	Thickness     float64 // mm
	Hole          float64 // d_h, mm
	HotModulus    float64 // E at its highest temperature in service, MPa; 0: from the tables
	OuterDiameter float64 // D_A, mm: what the part offers around the bolt axis
}

// Tapped is the part that the bolt is screwed into.
type Tapped struct {
	Material fastener.Material
	Depth    float64 // usable thread depth, mm

	OuterDiameter float64 // of a boss around the thread, mm; 0: not stated, wide enough not to dilate
	Insert        *Insert // nil: the thread is cut in the part itself
}

// Insert is a threaded insert with its own strength.
type Insert struct {
	Length  float64 // mm
	PullOut float64 // force that pulls it out of the part, N
	Source  string
}

// Clamp is what the joint must still hold in service, per bolt.
type Clamp struct {
	Residual float64 // stated residual clamp force, N; 0: not stated

	Transverse        float64 // F_Q, N, carried by friction; 0: none
	Torque            float64 // M_Y about the bolt axis, N.mm, carried by friction; 0: none
	TorqueRadius      float64 // r_a, mm: friction radius for Torque
	InterfaceFriction float64 // mu_T: least friction of the interface; needed with Transverse or Torque
	Interfaces        int     // q_F: slip faces that carry the load; 0: not stated

	SealArea     float64 // A_D per bolt, mm2; 0: no seal
	SealPressure float64 // p, MPa
}

// Loads is the operating force of one bolt.
type Loads struct {
	Axial              quantity.Range // F_A, N; negative is compression
	IntroductionFactor *float64       // n; nil: not stated
	Introduction       *Introduction  // where the load enters, in place of n; nil: not stated
	Spectrum           []Block        // in place of Cycles; Axial then spans its blocks
	Cycles             float64        // load cycles between the ends of Axial; 0: static
}

// Safety is the least safety factors that are demanded beyond the method's own
// margins; 0: not stated.
type Safety struct {
	Slip      float64 // S_G, on the load that friction carries
	Yield     float64 // S_F, on the yield strength in service
	Fatigue   float64 // S_D, on the stress amplitude
	Pressure  float64 // S_P, on the limiting bearing pressure
	Stripping float64 // S_M, on the force that strips a thread
	Shear     float64 // S_A, on shear of the bolt and pressure of the hole after slip
}

// Losses is what the clamp loses in service besides the temperature, where the
// guide values of embedding do not say it all.
type Losses struct {
	Settlement       float64   // measured closing of all faces together, mm, in place of the guide values; 0: not stated
	SettlementSource string    // where it was measured
	Layers           []Closing // what closes on top: gasket, paint, coating
	Relaxation       float64   // share of the preload lost over time; 0: not stated
	RelaxationSource string
}

// Closing is a layer that gets thinner in service.
type Closing struct {
	Name   string
	Amount float64 // mm
	Source string
}

// Temperature is the temperature of the joint: one Service range that bolt and
// parts share, or States in which they differ.
type Temperature struct {
	Assembly quantity.Range // degC, of bolt and parts while they are tightened
	Service  quantity.Range // degC; without States
	States   []ThermalState
}

// ThermalState is one state of service: the bolt at one temperature, the parts at
// another.
type ThermalState struct {
	Name  string
	Bolt  float64 // degC
	Parts float64 // degC
}

// Friction is the range of the coefficients of friction.
type Friction struct {
	Thread quantity.Range // mu_G
	Head   quantity.Range // mu_K, of the face that turns
	State  string         // surfaces and lubricant in words, as the technician must have them; empty: not stated
	Source string         // what the range rests on, for the assumptions; "stated in the register" when only numbers are given
}

// Method names a way of tightening.
type Method string

// The methods this package plans.
const (
	TorqueMethod         Method = "torque"
	TorqueAndAngleMethod Method = "torque and angle"
)

// Scatter names how the spread of the preload is found.
type Scatter string

// The ways to find the spread.
const (
	RangeScatter Scatter = "range" // from friction and tool ranges; the zero value means this too
	GuideScatter Scatter = "guide" // from the guideline's tightening factor alpha_A
)

// Aim names where in the window the target lies.
type Aim string

// The aims; the zero value means AimHigh and is printed as an assumption.
const (
	AimHigh   Aim = "high"
	AimMiddle Aim = "middle"
)

// Tool is the tightening tool.
type Tool struct {
	Name      string  // as the plant calls it; may be empty
	Tolerance float64 // t, relative: 0.04 for 4 %
}

// Tightening is how the joint is tightened.
type Tightening struct {
	Method        Method
	Scatter       Scatter
	ScatterFactor float64 // alpha_A stated for GuideScatter; 0: the guide's upper value
	Tool          *Tool   // nil: not stated; needed for RangeScatter
	Utilisation   float64 // nu, of R_p0.2; 0: not stated
	Aim           Aim
	Step          float64 // resolution of the setting, N.mm; 0: not stated
	Snug          float64 // snug torque as a share of the target torque; 0: not stated
	SnugTorque    float64 // snug torque of TorqueAndAngleMethod, N.mm; 0: not stated
	AngleStep     float64 // resolution of the angle setting, deg; 0: not stated
	AngleTol      float64 // tolerance of the angle, deg; 0: not stated
	ElasticSpread float64 // relative uncertainty of the compliances; 0: not stated
}
