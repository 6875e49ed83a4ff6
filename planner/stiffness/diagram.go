package stiffness

import (
	"math"

	"clampback/planner/quantity"
)

// Diagram is what the joint diagram is drawn from: forces in N, lengths in mm.
// The bolt line rises from the origin at 1/BoltCompliance, the clamped parts'
// line falls from the preload point at 1/ClampedCompliance.
type Diagram struct {
	BoltCompliance    float64        // delta_S, mm/N
	ClampedCompliance float64        // delta_P, mm/N; of parts clamped off their axis delta_P*
	Eccentric         bool           // clamped or loaded off the axis of the parts
	Preload           quantity.Range // assembly preload that the setting gives
	Embedding         float64        // F_Z, N
	Closing           float64        // F_L, N: by layers that get thinner
	Loss              float64        // all that the lowest preload loses in service, N: embedding, closing, temperature, time
	Gain              float64        // what temperature adds to the highest preload, N
	Axial             quantity.Range // operating force
	ClampAxial        float64        // operating force of the bolt whose clamp is needed most, N; in a group not always the highest
	Swinging          quantity.Range // ends of the largest swing of a cyclic force, N; no width: static
	LoadFactor        float64        // Phi
	Moment            quantity.Range // what a working moment adds to the bolt at the ends of the load, N
	BoltShare         float64        // Phi F_Amax and what the moment adds, N: added to the bolt
	ClampShare        float64        // (1 - Phi) F_A of that bolt, N: taken from the clamp
	ResidualClamp     quantity.Range // left in service
	RequiredResidual  float64        // F_Kerf
	Limit             float64        // F_lim
}

// State is bolt and clamped parts under an operating force: the bolt's point and
// the parts' point of the joint diagram, one above the other.
type State struct {
	Length float64 // change of length, mm
	Bolt   float64 // force in the bolt, N
	Clamp  float64 // force in the interface, N
	Open   bool    // the interface gapes: the bolt carries the whole load
	Slack  bool    // the bolt is loose: the parts carry the whole load
}

// Least is the lowest preload after losses, F_V, N; not above 0 when they take it all.
func (d Diagram) Least() float64 { return d.Preload.Low - d.Loss }

// Most is the highest preload with what temperature adds, N.
func (d Diagram) Most() float64 { return d.Preload.High + d.Gain }

// LaterLoss is the loss besides embedding and closing layers, N: by temperature and
// over time.
func (d Diagram) LaterLoss() float64 { return math.Max(0, d.Loss-d.Embedding-d.Closing) }

// total is the compliance of bolt and parts together, mm/N.
func (d Diagram) total() float64 { return d.BoltCompliance + d.ClampedCompliance }

// Unloaded returns the ends of the triangle of a preload (N): the bolt's elongation,
// which is where its point lies, and where the parts' line meets zero force, mm.
func (d Diagram) Unloaded(preload float64) (bolt, end float64) {
	return preload * d.BoltCompliance, preload * d.total()
}

// Under returns the joint at a preload (N) under an operating force (N, negative is
// compression). A force that enters between head and interface stretches a part of
// the parts with the bolt and relieves the rest, so that the points lie on lines
// through the preload point at 1/((1 - Phi)(delta_S + delta_P)) for the bolt and
// 1/(Phi (delta_S + delta_P)) for the parts; at n = 1 these are the bolt's and the
// parts' own. Behind the opening of the interface only the bolt's line goes on,
// behind the slackening of the bolt only the parts'. VDI 2230-1:2015, 5.3.
func (d Diagram) Under(preload, load float64) State {
	preload = math.Max(0, preload)
	length := preload * d.BoltCompliance
	switch {
	case load > 0 && (1-d.LoadFactor)*load > preload:
		return State{Length: length + (load-preload)*(1-d.LoadFactor)*d.total(), Bolt: load, Open: true}
	case load < 0 && preload+d.LoadFactor*load < 0, load < 0 && preload == 0:
		return State{Length: length - (-load-preload)*d.LoadFactor*d.total(), Clamp: -load, Slack: true}
	}
	share := d.LoadFactor * load
	return State{Length: length + share*(1-d.LoadFactor)*d.total(), Bolt: preload + share, Clamp: preload + share - load}
}

// With adds what a working moment gives the bolt (N), above its point. An open or slack
// joint is left as it is.
func (d Diagram) With(s State, moment float64) State {
	if s.Open || s.Slack {
		return s
	}
	s.Bolt += moment
	return s
}

// Swing returns the states between which a cyclic force moves the joint at its lowest
// preload after losses; false where the force does not swing.
func (d Diagram) Swing() (low, high State, ok bool) {
	if d.Swinging.Width() <= 0 {
		return State{}, State{}, false
	}
	least := d.Least()
	return d.With(d.Under(least, d.Swinging.Low), d.Moment.Low), d.With(d.Under(least, d.Swinging.High), d.Moment.High), true
}

// Largest returns the state at the highest preload with what temperature adds, under
// the highest operating force: where the bolt force is largest.
func (d Diagram) Largest() State {
	return d.With(d.Under(d.Most(), math.Max(0, d.Axial.High)), math.Max(0, d.Moment.High))
}
