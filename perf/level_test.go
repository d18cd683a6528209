package perf

import (
	"math"
	"testing"
)

// TestConstantEfficiencyByHand: an aeroplane whose quartic has round roots: D V = eta P at V1 and V2,
// 20 and 90 m/s, where a (V2^3 - V1^3) = c (1/V1 - 1/V2).
func TestConstantEfficiencyByHand(t *testing.T) {
	const slow, fast, a = 20.0, 90.0, 0.35
	c := a * (fast*fast*fast - slow*slow*slow) / (1/slow - 1/fast)
	power := a*slow*slow*slow + c/slow
	const area, aspect = 60.0, 8.0
	cd0 := 2 * a / (SeaLevelDensity * area)
	const e = 0.8
	k := 1 / (math.Pi * aspect * e)
	weight := math.Sqrt(c * SeaLevelDensity * area / (2 * k))
	p := Aeroplane{
		WingArea: area, WingSpan: math.Sqrt(area * aspect), EmptyMass: 100, MaximumMass: 5000,
		Polar:          Polar{ParasiteDrag: cd0, OswaldEfficiency: e},
		Configurations: []Configuration{{MaximumLift: 6}},
		Engine:         Engine{Kind: Electric, RatedPower: power / 0.8},
		Propeller:      Propeller{Kind: ConstantEfficiency, Efficiency: 0.8},
	}
	q := Condition{Mass: weight / StandardGravity, Air: StandardAir(), PowerFraction: 1, Fuel: 3.6e7}
	got := mustSolve(t, &p, &q)
	for key, want := range map[Key]float64{
		SlowestLevel: slow, FastestLevel: fast, LeastPower: math.Pow(c/(3*a), 0.25), BestGlide: math.Pow(c/a, 0.25),
		FastestClimb: math.Pow(c/(3*a), 0.25), BestRange: math.Pow(c/a, 0.25), Carson: math.Pow(3*c/a, 0.25),
	} {
		if l := got.Limits[key]; relative(float64(l.TAS), want) > 1e-9 {
			t.Errorf("%s is %.12g, want %.12g", key, float64(l.TAS), want)
		}
	}
	least := math.Pow(c/(3*a), 0.25)
	need := a*least*least*least + c/least
	if l := got.Limits[LeastPower]; relative(l.Endurance, 3.6e7*0.8/need) > 1e-12 || relative(l.PowerRequired, need) > 1e-12 {
		t.Errorf("endurance %g, power %g", l.Endurance, l.PowerRequired)
	}
	glide := math.Pow(c/a, 0.25)
	if l := got.Limits[BestRange]; relative(l.Distance, 3.6e7*0.8/(2*math.Sqrt(a*c))) > 1e-12 {
		t.Errorf("distance %g", l.Distance)
	}
	if l := got.Limits[BestGlide]; relative(l.Ratio, weight/(2*math.Sqrt(a*c))) > 1e-12 || relative(l.Sink, glide/l.Ratio) > 1e-12 {
		t.Errorf("glide %g, sink %g", l.Ratio, l.Sink)
	}
	if m := q.Mass * math.Pow(power/need, 2.0/3); relative(got.Level.Mass, m) > 1e-12 {
		t.Errorf("greatest mass %g, want %g", got.Level.Mass, m)
	}
}

// TestStallSetsTheSlowEnd when power is plenty, and power when it is short.
func TestStallSetsTheSlowEnd(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		a.Engine.MaximumSpeed = 0
		got := mustSolve(t, &a, &c)
		if l := got.Limits[SlowestLevel]; l.SetBy != SetByLift || l.TAS != got.Limits[Stall].TAS {
			t.Errorf("%s: slow end by %q", k.name, l.SetBy)
		}
		a.Configurations[0].MaximumLift = 4
		air, _ := c.Air.MovedToPressureAltitude(got.Absolute.PressureAltitude - 700)
		c.Air = air
		got = mustSolve(t, &a, &c)
		if l := got.Limits[SlowestLevel]; got.Outcome != LevelFlight || l.SetBy != SetByPower || l.TAS <= got.Limits[Stall].TAS {
			t.Errorf("%s: high up: %s, slow end by %q", k.name, got.Outcome, l.SetBy)
		}
	}
}

// TestMaximumRPMSetsTheFastEnd of the propellers that have an rpm, and of no other.
func TestMaximumRPMSetsTheFastEnd(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		a.Placards = Placards{}
		a.Engine.MaximumSpeed = 0
		free := mustSolve(t, &a, &c)
		var z Solver
		if err := z.Prepare(&a, &c); err != nil {
			t.Fatal(err)
		}
		n := z.LevelSpeed(free.Limits[FastestLevel].TAS)
		if has := k.kind == FixedPitch || k.kind == Tabulated; (n > 0) != has {
			t.Errorf("%s: %g rev/s", k.name, n)
			continue
		} else if !has {
			a.Engine.MaximumSpeed = 1
			if got := mustSolve(t, &a, &c); got.Limits[FastestLevel] != free.Limits[FastestLevel] {
				t.Errorf("%s: a maximum rpm changes the fast end", k.name)
			}
			continue
		}
		a.Engine.MaximumSpeed = n * 0.95
		got := mustSolve(t, &a, &c)
		l := got.Limits[FastestLevel]
		if l.SetBy != SetByRPM || l.TAS >= free.Limits[FastestLevel].TAS {
			t.Errorf("%s: fast end %g by %q, free %g", k.name, float64(l.TAS), l.SetBy, float64(free.Limits[FastestLevel].TAS))
		}
		if r := z.LevelSpeed(l.TAS); relative(r, n*0.95) > 1e-9 {
			t.Errorf("%s: at the fast end %g rev/s, maximum %g", k.name, r, n*0.95)
		}
		a.Engine.MaximumSpeed = n * 0.3
		got = mustSolve(t, &a, &c)
		if got.Outcome != RPMTooHigh || !(got.Shortfall > 0) || !(got.ShortfallTAS >= got.Limits[Stall].TAS) || !got.Cautions[CautionNoLevelFlight] {
			t.Errorf("%s: at 0.3 of the rpm: %s, %g W at %g", k.name, got.Outcome, got.Shortfall, float64(got.ShortfallTAS))
		}
		if got.Limits[FastestLevel].Applies || !got.Limits[BestGlide].Applies || !got.Absolute.Applies || !got.Level.MassApplies {
			t.Errorf("%s: without level flight the wrong things are told", k.name)
		}
	}
}

// TestShortfallIsWhatIsMissing: with that much more thrust power at that speed level flight just holds.
func TestShortfallIsWhatIsMissing(t *testing.T) {
	a, c := benchCase(ConstantEfficiency)
	c.PowerFraction = 0.25
	got := mustSolve(t, &a, &c)
	if got.Outcome != TooLittlePower || got.Turn.Applies {
		t.Fatal(got.Outcome)
	}
	c.PowerFraction += got.Shortfall / (0.8 * a.Engine.RatedPower) * (1 + 1e-9)
	again := mustSolve(t, &a, &c)
	if again.Outcome != LevelFlight || relative(float64(again.Limits[FastestLevel].TAS), float64(got.ShortfallTAS)) > 1e-3 {
		t.Errorf("%s at %g, the shortfall was told at %g", again.Outcome, float64(again.Limits[FastestLevel].TAS), float64(got.ShortfallTAS))
	}
}

// TestPlacardSetsTheFastEnd, and below the slow end leaves no level flight.
func TestPlacardSetsTheFastEnd(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		a.Placards = Placards{NeverExceedCAS: 35}
		got := mustSolve(t, &a, &c)
		if l := got.Limits[FastestLevel]; l.SetBy != SetByPlacard || relative(float64(l.CAS), 35) > 1e-12 {
			t.Errorf("%s: fast end %g CAS by %q", k.name, float64(l.CAS), l.SetBy)
		}
		if l := got.Limits[Carson]; l.TAS > got.Limits[FastestLevel].TAS {
			t.Errorf("%s: Carson's speed is beyond the placard", k.name)
		}
		a.Placards.NeverExceedCAS = 15
		got = mustSolve(t, &a, &c)
		if got.Outcome != PlacardTooSlow || got.Shortfall != 0 || got.Limits[FastestClimb].Applies || !got.Limits[NeverExceed].Applies {
			t.Errorf("%s: %s", k.name, got.Outcome)
		}
	}
}

// TestEnduranceOnlyWhereItCanBeFlown: a fixed-pitch aeroplane near its ceiling cannot hold the speed of least power.
func TestEnduranceOnlyWhereItCanBeFlown(t *testing.T) {
	a, c := benchCase(FixedPitch)
	a.Configurations[0].MaximumLift = 3
	h := mustSolve(t, &a, &c).Absolute.PressureAltitude
	low := mustSolve(t, &a, &c)
	c.Air, _ = c.Air.MovedToPressureAltitude(h - 60)
	high := mustSolve(t, &a, &c)
	if low.Limits[LeastPower].Endurance <= 0 {
		t.Error("no endurance low down")
	}
	if l := high.Limits[LeastPower]; high.Outcome != LevelFlight || l.TAS >= high.Limits[SlowestLevel].TAS || l.Endurance != 0 {
		t.Errorf("high up: %s, least power at %g, slow end %g, endurance %g", high.Outcome, float64(l.TAS), float64(high.Limits[SlowestLevel].TAS), l.Endurance)
	}
}

// TestElectricFixedPitchHasNoCeiling: its torque does not fall, and at one equivalent airspeed neither do thrust and drag.
func TestElectricFixedPitchHasNoCeiling(t *testing.T) {
	a, c := benchCase(FixedPitch)
	a.Engine.Kind = Electric
	got := mustSolve(t, &a, &c)
	if got.Absolute.Applies || got.Service.Applies || got.Level.AltitudeApplies || got.Climb.AltitudeApplies || got.Absolute.PressureAltitude != 0 {
		t.Errorf("%+v %+v", got.Absolute, got.Climb)
	}
	if !got.Level.MassApplies || !got.Climb.MassApplies || got.Climb.Mass >= got.Level.Mass {
		t.Errorf("masses %g, %g", got.Level.Mass, got.Climb.Mass)
	}
}
