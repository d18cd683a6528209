package perf

import (
	"math"
	"strings"
	"testing"
)

func TestNamesAreWhole(t *testing.T) {
	seen := map[string]bool{}
	once := func(s string) {
		t.Helper()
		if s == "" || seen[s] || strings.ToLower(s) != s || strings.ContainsAny(s, " \t") {
			t.Errorf("%q is empty, taken or no code", s)
		}
		seen[s] = true
	}
	for k := range KeyCount {
		once(k.String())
	}
	for c := range Caution(CautionCount) {
		once(c.Code())
		if !strings.HasSuffix(c.Text(), ".") {
			t.Errorf("caution %q says %q", c.Code(), c.Text())
		}
	}
	for o := range outcomeCount {
		once(o.String())
		if !strings.HasSuffix(o.Text(), ".") {
			t.Errorf("outcome %q says %q", o.String(), o.Text())
		}
	}
	for b := SetByLift; b <= SetByPlacard; b++ {
		once(b.String())
	}
	if SetByOptimum.String() != "" || Key(200).String() != "" || Key(200).Symbol() != "" || SetBy(200).String() != "" || Outcome(200).String() != "" ||
		Outcome(200).Text() != "" || Caution(200).Code() != "" || Caution(200).Text() != "" {
		t.Error("what is no name has one")
	}
	for k, want := range map[Key]string{SteepestClimb: "VX", FastestClimb: "VY", FastestLevel: "VH", Manoeuvring: "VA", NeverExceed: "VNE", Carson: ""} {
		if k.Symbol() != want {
			t.Errorf("%s has the symbol %q", k, k.Symbol())
		}
	}
	if FastestClimb.String() != "fastest_climb" || SlowestLevel.String() != "slowest_level" {
		t.Error("the keys are not those of the contract")
	}
}

// TestCautionsComeAndGo: each caution with a change that brings it, on an aeroplane that has none but the two that always stand.
func TestCautionsComeAndGo(t *testing.T) {
	quiet := func() (Aeroplane, Condition) {
		a, c := benchCase(ConstantEfficiency)
		a.Placards = Placards{}
		c.ClimbGradient = 0
		c.Headwind = 0
		return a, c
	}
	fixed := func() (Aeroplane, Condition) {
		a, c := benchCase(FixedPitch)
		a.Placards = Placards{}
		return a, c
	}
	for _, w := range []struct {
		caution Caution
		base    func() (Aeroplane, Condition)
		change  func(a *Aeroplane, c *Condition)
	}{
		{CautionNoLevelFlight, quiet, func(_ *Aeroplane, c *Condition) { c.PowerFraction = 0.1 }},
		{CautionNearCeiling, quiet, func(a *Aeroplane, c *Condition) {
			h := mustSolve(t, a, c).Absolute.PressureAltitude
			c.Air, _ = c.Air.MovedToPressureAltitude(h - 200)
		}},
		{CautionAboveMaximumMass, quiet, func(_ *Aeroplane, c *Condition) { c.Mass = 801 }},
		{CautionBelowEmptyMass, quiet, func(_ *Aeroplane, c *Condition) { c.Mass = 470 }},
		{CautionPlacardTAS, quiet, func(a *Aeroplane, _ *Condition) { a.Placards.NeverExceedCAS, a.Placards.NeverExceedTAS = 100, 90 }},
		{CautionMach, quiet, func(a *Aeroplane, _ *Condition) { a.Placards.NeverExceedCAS = 200 }},
		{CautionPropellerOutsideSpan, quiet, func(a *Aeroplane, _ *Condition) {
			b, _ := benchCase(Tabulated)
			a.Propeller = b.Propeller
			a.Propeller.Table = append([]PropellerRow(nil), a.Propeller.Table[:6]...)
		}},
		{CautionOverspeed, fixed, func(a *Aeroplane, _ *Condition) { a.Engine.MaximumSpeed = 40 }},
		{CautionSpeedAboveFlapPlacard, quiet, func(a *Aeroplane, c *Condition) {
			a.Configurations = append(a.Configurations, Configuration{Name: "down", MaximumLift: 2})
			a.Placards.FlapsExtendedCAS = 40
			c.Configuration = 1
		}},
		{CautionConsumptionUnusual, quiet, func(a *Aeroplane, _ *Condition) { a.Engine.SpecificConsumption = 0.45 / KilowattHour }},
		{CautionClimbAboveNeverExceed, quiet, func(a *Aeroplane, _ *Condition) { a.Placards.NeverExceedCAS = 23 }},
		{CautionTurnNearStall, quiet, func(a *Aeroplane, _ *Condition) { a.Engine.RatedPower *= 3 }},
	} {
		a, c := w.base()
		got := mustSolve(t, &a, &c)
		had := got.Cautions[w.caution]
		w.change(&a, &c)
		got = mustSolve(t, &a, &c)
		if had && w.caution != CautionTurnNearStall || !got.Cautions[w.caution] {
			t.Errorf("%s: before %v, after %v (%s)", w.caution.Code(), had, got.Cautions[w.caution], got.Outcome)
		}
		if !got.Cautions[CautionAdvisory] || !got.Cautions[CautionNotModelled] {
			t.Error("the standing cautions are missing")
		}
	}
}

// TestFixedPitchSpan: the advance ratio of best efficiency is where J CT/CP is greatest.
func TestFixedPitchSpan(t *testing.T) {
	for seed := uint64(0); seed < 300; seed++ {
		a, _ := randomCase(seed)
		p := &a.Propeller
		eta := func(j float64) float64 {
			cp := p.PowerCoefficientStatic + p.PowerCoefficientSlope*j*j
			return j * (p.PolarSlope*cp + p.PolarIntercept*j*j) / cp
		}
		j := p.efficientAdvance()
		if !(j > 0) || eta(j) < eta(j*1.001) || eta(j) < eta(j*0.999) {
			t.Errorf("seed %d: %g is not the best: %g, %g, %g", seed, j, eta(j*0.999), eta(j), eta(j*1.001))
		}
	}
}

// TestPlacards: the lower of the two never-exceed speeds, the manoeuvring speed with the root of the mass.
func TestPlacards(t *testing.T) {
	a, c := benchCase(ConstantSpeed)
	c.Air, _ = AirAtDensityAltitude(0)
	got := mustSolve(t, &a, &c)
	if l := got.Limits[NeverExceed]; relative(float64(l.CAS), 70) > 1e-12 || l.SetBy != SetByPlacard || got.Cautions[CautionPlacardTAS] {
		t.Errorf("at sea level never exceed is %g CAS", float64(l.CAS))
	}
	c.Air, _ = AirAtDensityAltitude(4000)
	got = mustSolve(t, &a, &c)
	if l := got.Limits[NeverExceed]; l.TAS != 80 || !got.Cautions[CautionPlacardTAS] {
		t.Errorf("at 4000 m never exceed is %g TAS", float64(l.TAS))
	}
	if l := got.Limits[Manoeuvring]; relative(float64(l.CAS), 48*math.Sqrt(760.0/800)) > 1e-12 {
		t.Errorf("manoeuvring speed %g", float64(l.CAS))
	}
	c.Mass = 900
	if l := mustSolve(t, &a, &c).Limits[Manoeuvring]; relative(float64(l.CAS), 48) > 1e-12 {
		t.Errorf("above the maximum mass the manoeuvring speed is %g", float64(l.CAS))
	}
	a.Placards = Placards{}
	got = mustSolve(t, &a, &c)
	if got.Limits[NeverExceed].Applies || got.Limits[Manoeuvring].Applies {
		t.Error("limits without placards")
	}
}

// TestEngineLaws: full power at the rows that anyone can check with a pocket calculator.
func TestEngineLaws(t *testing.T) {
	sea := StandardAir()
	e := Engine{Kind: Piston, RatedPower: 1000, DropOffConstant: 0.12}
	near := func(what string, got, want float64) {
		t.Helper()
		if math.Abs(got-want) > 1e-9*1000 {
			t.Errorf("%s: %.12g, want %.12g", what, got, want)
		}
	}
	near("sea level", e.FullPower(&sea), 1000)
	hot, _ := AirAt(0, 288.15*1.1, 0)
	near("hot, pressure altitude", e.FullPower(&hot), 1000/math.Sqrt(1.1))
	e.Law = DensityAltitudeLaw
	near("hot, density altitude", e.FullPower(&hot), 1000*(1/1.1-0.12)/0.88)
	high, _ := AirAtDensityAltitude(5000)
	sigma := high.Density / SeaLevelDensity
	near("5000 m", e.FullPower(&high), 1000*(sigma-0.12)/0.88)
	e.FullThrottleAltitude = 5000
	near("at the full-throttle altitude", e.FullPower(&high), 1000)
	near("below it", e.FullPower(&sea), 1000)
	e = Engine{Kind: Turboprop, RatedPower: 1000, ThermalPower: 1500, LapseExponent: 0.7}
	near("flat rated", e.FullPower(&sea), 1000)
	top, _ := AirAtDensityAltitude(8000)
	near("thermal", e.FullPower(&top), 1500*math.Pow(top.Density/SeaLevelDensity, 0.7))
	e = Engine{Kind: Electric, RatedPower: 1000}
	near("electric", e.FullPower(&top), 1000)
	thin, _ := AirAtDensityAltitude(19000)
	e = Engine{Kind: Piston, RatedPower: 1000, DropOffConstant: 0.2}
	near("nothing left", e.FullPower(&thin), 0)

	e = Engine{Kind: Piston, RatedPower: 1000, ConsumptionTable: []ConsumptionPoint{{0.4, 2e-7}, {0.8, 1e-7}}}
	for _, r := range [][2]float64{{200, 200 * 2e-7}, {400, 400 * 2e-7}, {600, 600 * 1.5e-7}, {800, 800 * 1e-7}, {900, 900 * 1e-7}} {
		near("flow", e.Flow(r[0])*1e9, r[1]*1e9)
	}
}

// TestUnknownConsumption: the best speed stands, the distance does not.
func TestUnknownConsumption(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		known := mustSolve(t, &a, &c)
		a.Engine.SpecificConsumption = 0
		got := mustSolve(t, &a, &c)
		if l := got.Limits[BestRange]; !l.Applies || relative(float64(l.TAS), float64(known.Limits[BestRange].TAS)) > 1e-9 || l.Distance != 0 || l.FuelFlow != 0 {
			t.Errorf("%s: %+v", k.name, l)
		}
		if got.Limits[LeastPower].Endurance != 0 || got.Cautions[CautionConsumptionUnusual] {
			t.Errorf("%s: endurance %g", k.name, got.Limits[LeastPower].Endurance)
		}
	}
}
