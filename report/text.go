package report

import (
	"bufio"
	"fmt"
	"io"
	"iter"
	"strings"

	"clampback/planner"
	"clampback/planner/quantity"
)

// TextOptions says how plans are printed as text. The zero value prints the
// work-back without trace and colour.
type TextOptions struct {
	Trace  bool // every line of the calculation, with its source
	Colour bool // mark verdicts with terminal colours; the words stay the same
}

// WriteText prints each joint's work-back as a person reads it, as it comes. The
// error is the writer's or the first of the plans.
func WriteText(w io.Writer, plans iter.Seq2[planner.Plan, error], o TextOptions) error {
	t := &text{w: bufio.NewWriter(w), options: o}
	assembly, feasible, all := "", 0, 0
	for p, err := range plans {
		if err != nil {
			return err
		}
		all++
		if p.Feasible {
			feasible++
		}
		heading := p.Joint.Assembly + ", revision " + OrNotStated(p.Joint.Revision)
		if heading != assembly {
			t.printf("%s\n", heading)
			assembly = heading
		}
		t.joint(p)
	}
	t.summary(feasible, all)
	return t.w.Flush()
}

// text prints plans. A failed write is reported by the final Flush.
type text struct {
	w       *bufio.Writer
	options TextOptions
}

func (t *text) printf(format string, args ...any) { fmt.Fprintf(t.w, format, args...) }

func (t *text) joint(p planner.Plan) {
	t.printf("\n%s  %s\n", p.ID, p.Name)
	t.printf("  %s\n", Fasteners(p.Joint))
	t.verdict(p)
	t.governing(p)
	t.workBack(p)
	t.setting(p)
	t.checks(p)
	t.list("What binds", p.Binds)
	t.list("Assumptions", p.Assumptions)
	if t.options.Trace {
		t.trace(p)
	}
}

// Fasteners describes the bolts of a joint in one line.
func Fasteners(j planner.Joint) string {
	parts := []string{fmt.Sprintf("%d x %s", j.Count, Bolt(j))}
	if j.HeadWasher != nil {
		parts = append(parts, "washer "+j.HeadWasher.Standard+" under the head")
	}
	if j.NutWasher != nil {
		parts = append(parts, "washer "+j.NutWasher.Standard+" under the nut")
	}
	if j.HeadNut != nil {
		parts = append(parts, j.HeadNut.Kind+" nut "+j.HeadNut.Standard+" to turn")
	}
	if j.LockNut != nil {
		parts = append(parts, j.LockNut.Kind+" nut "+j.LockNut.Standard+" below")
	}
	if j.Nut != nil {
		parts = append(parts, j.Nut.Kind+" nut "+j.Nut.Standard)
	} else {
		parts = append(parts, "into tapped "+j.Tapped.Material.Name)
	}
	return strings.Join(parts, ", ")
}

// Bolt describes one bolt: thread, length, head, class.
func Bolt(j planner.Joint) string {
	b := j.Bolt
	head := b.Head.Kind
	if j.HeadNut == nil {
		head += " " + b.Head.Standard
	}
	text := fmt.Sprintf("%s x %s %s, class %s", b.Thread.Designation, quantity.Trim(b.Length), head, b.Class.Name)
	if waist := b.Waist(); waist > 0 {
		text += fmt.Sprintf(", reduced shank %g mm", waist)
	}
	return text
}

func (t *text) verdict(p planner.Plan) {
	if !p.Feasible {
		t.printf("  %s\n", t.mark("INFEASIBLE: no setting can be given", red))
		return
	}
	setting := fmt.Sprintf("FEASIBLE: tighten to %s N.m", quantity.Trim(p.Torque.Target))
	if p.Joint.Tightening.Method == planner.TorqueAndAngleMethod {
		setting = fmt.Sprintf("FEASIBLE: tighten to %s N.m, then turn %s deg further",
			quantity.Trim(p.Angle.SnugTorque), quantity.Trim(p.Angle.FromSnug))
	}
	t.printf("  %s\n", t.mark(setting, green))
}

// governing says which bolt and load case decide what, where the loads are those of
// the whole joint.
func (t *text) governing(p planner.Plan) {
	if len(p.Governing) == 0 {
		return
	}
	t.printf("\n  What governs\n")
	for _, g := range p.Governing {
		t.printf("    - %s: bolt %d in load case %s\n", g.For, g.Bolt, g.Case)
	}
}

func (t *text) workBack(p planner.Plan) {
	b := p.WorkBack
	t.printf("\n  Work-back                              kN\n")
	t.force("required residual clamp", quantity.RoundUp(b.RequiredResidualClamp, 10))
	t.force("+ load taken from the clamp", quantity.RoundUp(b.LoadRelief, 10))
	t.force("+ lost by embedding", quantity.RoundUp(b.EmbeddingLoss, 10))
	t.loss("+ lost by closing layers", b.ClosingLoss)
	t.force("+ lost by temperature", quantity.RoundUp(b.ThermalLoss, 10))
	t.loss("+ lost by softer moduli", b.SofteningLoss)
	t.loss("+ lost by relaxation", b.RelaxationLoss)
	t.force("= required assembly preload", quantity.RoundUp(b.RequiredPreload, 10))
	t.force("highest preload tolerated", quantity.RoundDown(p.Preload.Limit, 10))
}

// loss prints a loss that only some joints have.
func (t *text) loss(name string, newton float64) {
	if newton > 0 {
		t.force(name, quantity.RoundUp(newton, 10))
	}
}

func (t *text) force(name string, newton float64) {
	t.printf("    %-30s %9.2f\n", name, newton/1000)
}

func (t *text) setting(p planner.Plan) {
	q := p.Torque
	at := map[planner.Setting]string{
		planner.AtTarget: "at the setting", planner.AtUpperEnd: "at the upper end", planner.AtLowerEnd: "at the lower end",
	}[p.CheckedAt]
	t.printf("\n  Setting\n")
	if p.Joint.Tightening.Method == planner.TorqueAndAngleMethod {
		t.angleSetting(p)
	} else {
		low, high := tenth(quantity.RoundUp(q.WindowLow, 0.1)), tenth(quantity.RoundDown(q.WindowHigh, 0.1))
		if step := p.Joint.Tightening.Step / 1000; step < 0.1 { // a fine setting lies inside what is printed
			low, high = quantity.Trim(quantity.RoundUp(q.WindowLow, step)), quantity.Trim(quantity.RoundDown(q.WindowHigh, step))
		}
		t.printf("    torque window                  %s to %s N.m\n", low, high)
		if q.Target > 0 {
			t.printf("    target torque                  %s N.m\n", quantity.Trim(q.Target))
			t.printf("    angle from snug %s N.m        %.0f deg, %.0f to %.0f deg to expect\n",
				quantity.Trim(p.Angle.SnugTorque), p.Angle.FromSnug, p.Angle.Low, p.Angle.High)
		}
	}
	t.printf("    preload %-22s %.2f to %.2f kN (scatter factor %.2f)\n", at,
		quantity.RoundDown(p.Preload.Lowest, 10)/1000, quantity.RoundUp(p.Preload.Highest, 10)/1000, p.Preload.ScatterFactor)
	t.printf("    residual clamp in service      %.2f to %.2f kN\n",
		quantity.RoundDown(p.ResidualClamp.Lowest, 10)/1000, quantity.RoundUp(p.ResidualClamp.Highest, 10)/1000)
	s := p.Stiffness
	t.printf("    load factor %.4f, compliance of bolt %.4g um/kN, of parts %.4g um/kN\n",
		s.LoadFactor, s.BoltCompliance*1e6, s.ClampedCompliance*1e6)
}

func (t *text) angleSetting(p planner.Plan) {
	w := p.AngleWindow
	t.printf("    snug torque                    %s N.m\n", quantity.Trim(p.Angle.SnugTorque))
	t.printf("    angle window                   %s to %s deg\n",
		tenth(quantity.RoundUp(w.Low, 0.1)), tenth(quantity.RoundDown(w.High, 0.1)))
	if !p.Feasible {
		return
	}
	t.printf("    target angle                   %s deg\n", quantity.Trim(p.Angle.FromSnug))
	t.printf("    torque to expect at the end    %s to %s N.m\n",
		tenth(quantity.RoundDown(p.Torque.WindowLow, 0.1)), tenth(quantity.RoundUp(p.Torque.WindowHigh, 0.1)))
}

func (t *text) checks(p planner.Plan) {
	t.printf("\n  Checks                                                value       limit         used\n")
	for _, c := range p.Checks {
		verdict := "ok"
		if !c.OK {
			verdict = t.mark("FAILS", red)
		}
		relation := "<="
		if c.AtLeast {
			relation = ">="
		}
		t.printf("    %-50s %8s %s %8s %-4s %5.0f %%  %s\n", c.Name, quantity.Plain(c.Value), relation, quantity.Plain(c.Limit), c.Unit,
			100*c.Utilisation, verdict)
	}
}

func (t *text) list(heading string, lines []string) {
	t.printf("\n  %s\n", heading)
	for _, line := range lines {
		t.printf("    - %s\n", line)
	}
}

func (t *text) trace(p planner.Plan) {
	t.printf("\n  Calculation\n")
	for _, l := range p.Trace {
		t.printf("    %-12s %14.7g %-6s %s  [%s]\n", l.Symbol, l.Value, l.Unit, l.Meaning, l.Source)
	}
}

func (t *text) summary(feasible, all int) {
	t.printf("\n%d joints: %d feasible, %d infeasible. Calculated, not tested on these joints.\n", all, feasible,
		all-feasible)
	t.printf("Local codes and the judgement of a licensed engineer come first.\n")
}

// The terminal colours of verdicts.
const (
	green = "\x1b[32m"
	red   = "\x1b[1;31m"
	plain = "\x1b[0m"
)

func (t *text) mark(s, colour string) string {
	if !t.options.Colour {
		return s
	}
	return colour + s + plain
}

// OrNotStated returns a text, or says that there is none.
func OrNotStated(s string) string {
	if s == "" {
		return "not stated"
	}
	return s
}

// tenth prints a number with one decimal.
func tenth(v float64) string { return fmt.Sprintf("%.1f", v) }
