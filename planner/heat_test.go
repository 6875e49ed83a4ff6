package planner_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/quantity"
)

// VDI 2230-1:2015 R4 by hand (formula from memory): with moduli that fall,
// F_V,T = F_V (delta_S + delta_P)/(delta_S E_SRT/E_ST + delta_P E_PRT/E_PT)
// - l_K (alpha_S dT_S - alpha_P dT_P)/(the same denominator). NASA TM-106943 eq. 10
// is the same with moduli that do not fall.
func TestStatesOfHeatByHand(t *testing.T) {
	j := flange(t)
	j.Parts[0].Material = material(t, "S355")
	j.Bolt.HotModulus, j.Parts[0].HotModulus, j.Parts[1].HotModulus = 180e3, 170e3, 170e3
	for _, part := range j.Parts {
		require.Equal(t, 205e3, part.Material.Modulus)
	}
	j.Temperature = &planner.Temperature{Assembly: quantity.Single(20), States: []planner.ThermalState{
		{Name: "start-up", Bolt: 20, Parts: 160}, {Name: "running", Bolt: 180, Parts: 160},
	}}
	p := work(t, j)
	dS := p.Stiffness.BoltCompliance
	washers := line(t, p, "delta_P_1") + line(t, p, "delta_P_4")
	parts := line(t, p, "delta_P_2") + line(t, p, "delta_P_3")
	// Washers at 160 degC: EN 10269 between 204/211 and 196/211 GPa.
	washerShare := 0.9668 + 0.6*(0.9289-0.9668)
	grip := j.Grip()

	start := dS + parts*205/170 + washers/washerShare
	gain := -(0 - grip*11.5e-6*140) / start
	assert.InEpsilon(t, gain, line(t, p, "dF_gain"), 1e-9)

	running := dS*205/180 + parts*205/170 + washers/washerShare
	loss := grip * 11.5e-6 * (160 - 140) / running
	assert.InEpsilon(t, loss, p.WorkBack.ThermalLoss, 1e-9)
	rest := (dS + p.Stiffness.ClampedCompliance) / running
	need := (12000 + p.WorkBack.LoadRelief + loss) / rest
	assert.InEpsilon(t, need+p.WorkBack.EmbeddingLoss, p.WorkBack.RequiredPreload, 1e-9)
	left := (p.Preload.Lowest-p.WorkBack.EmbeddingLoss)*rest - loss - p.WorkBack.LoadRelief
	assert.InEpsilon(t, left, p.ResidualClamp.Lowest, 1e-9)
}

// Yield strength in the heat as ISO 898-1:1999 annex A prints it (from memory): the
// working stress is judged against it, and against its safety factor.
func TestYieldInTheHeat(t *testing.T) {
	for service, yield := range map[float64]float64{20: 940, 100: 875, 200: 790, 250: 745, 300: 705} {
		j := flange(t)
		j.Parts[0].Material = material(t, "S355")
		j.Temperature = &planner.Temperature{Assembly: quantity.Single(20), Service: quantity.Single(service)}
		j.Safety.Yield = 1.25
		for _, c := range work(t, j).Checks {
			if c.Name == "working stress" {
				assert.InDelta(t, yield/1.25, c.Limit, 0.1, "%g degC", service)
			}
		}
	}
}

// A temperature beyond the data of bolt or part is refused with what to state.
func TestBeyondTheDataOfHeat(t *testing.T) {
	refused := func(change func(*planner.Joint), messages ...string) {
		t.Helper()
		j := flange(t)
		change(&j)
		var got []string
		for _, f := range j.Faults() {
			got = append(got, f.Message)
		}
		assert.Equal(t, messages, got)
	}
	at := func(c float64) *planner.Temperature {
		return &planner.Temperature{Assembly: quantity.Single(20), Service: quantity.Range{Low: 20, High: c}}
	}
	refused(func(j *planner.Joint) { j.Temperature = at(310) },
		"310 degC lies beyond the data for the yield strength of class 10.9")
	refused(func(j *planner.Joint) { j.Temperature = at(310); j.Bolt.HotYield = 600 })
	refused(func(j *planner.Joint) {
		j.Temperature = at(120)
		j.Parts[0].Material = material(t, "TiAl6V4")
	}, "120 degC lies beyond the data for the modulus of flange")
	refused(func(j *planner.Joint) {
		j.Temperature = at(120)
		j.Parts[0].Material, j.Parts[0].HotModulus = material(t, "TiAl6V4"), 105e3
	})
}

// Measured settlement takes the place of the guide values; layers and relaxation are
// lines of their own, and the way back to the preload is the inverse of the losses.
func TestLossesByHand(t *testing.T) {
	j := flange(t)
	j.Losses = planner.Losses{
		Settlement: 0.008, SettlementSource: "test report 7",
		Layers:     []planner.Closing{{Name: "paint", Amount: 0.010, Source: "paint data"}, {Name: "gasket", Amount: 0.004, Source: "gasket test"}},
		Relaxation: 0.05, RelaxationSource: "hot test, 1000 h",
	}
	p := work(t, j)
	compliance := p.Stiffness.BoltCompliance + p.Stiffness.ClampedCompliance
	b := p.WorkBack
	assert.InEpsilon(t, 0.008/compliance, b.EmbeddingLoss, 1e-12)
	assert.InEpsilon(t, 0.014/compliance, b.ClosingLoss, 1e-12)
	assert.InEpsilon(t, 0.05*b.RequiredPreload, b.RelaxationLoss, 1e-12)
	assert.InEpsilon(t, 0.95*p.Preload.Lowest-b.EmbeddingLoss-b.ClosingLoss-b.LoadRelief, p.ResidualClamp.Lowest, 1e-12)
}

// Safety factors by hand: each divides what it is stated for.
func TestSafetyFactors(t *testing.T) {
	j := tapped(t)
	j.Clamp = planner.Clamp{Transverse: 1000, InterfaceFriction: 0.2, Interfaces: 1}
	j.Loads.Cycles = 2e6
	plain := work(t, j)
	j.Safety = planner.Safety{Slip: 1.2, Yield: 1.1, Fatigue: 1.3, Pressure: 1.4, Stripping: 1.5}
	p := work(t, j)
	assert.InEpsilon(t, 1.2*1000/0.2, p.WorkBack.RequiredResidualClamp, 1e-12)
	limit := func(p planner.Plan, name string) float64 {
		for _, c := range p.Checks {
			if c.Name == name {
				return c.Limit
			}
		}
		t.Fatalf("no check %s", name)
		return 0
	}
	for name, factor := range map[string]float64{
		"working stress": 1.1, "fatigue": 1.3, "bearing pressure under the head, service": 1.4, "thread stripping": 1.5,
	} {
		assert.InEpsilon(t, limit(plain, name)/factor, limit(p, name), 1e-12, name)
	}
}
