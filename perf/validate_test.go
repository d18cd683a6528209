package perf

import (
	"errors"
	"math"
	"strings"
	"testing"
)

// fault is a change that must be refused, and the key that the refusal must name.
var wrongAeroplanes = []struct {
	key    string
	change func(a *Aeroplane)
}{
	{"WingArea", func(a *Aeroplane) { a.WingArea = math.NaN() }},
	{"WingArea", func(a *Aeroplane) { a.WingArea = 0 }},
	{"WingSpan", func(a *Aeroplane) { a.WingSpan = math.Inf(1) }},
	{"EmptyMass", func(a *Aeroplane) { a.EmptyMass = -1 }},
	{"MaximumMass", func(a *Aeroplane) { a.MaximumMass = a.EmptyMass - 1 }},
	{"Polar.ParasiteDrag", func(a *Aeroplane) { a.Polar.ParasiteDrag = 0.6 }},
	{"Polar.OswaldEfficiency", func(a *Aeroplane) { a.Polar.OswaldEfficiency = 0 }},
	{"Polar.LiftOfLeastDrag", func(a *Aeroplane) { a.Polar.LiftOfLeastDrag = 2 }},
	{"Configurations", func(a *Aeroplane) { a.Configurations = nil }},
	{"Configurations[0].MaximumLift", func(a *Aeroplane) { a.Configurations[0].MaximumLift = 0.1 }},
	{"Configurations[0].MaximumLift", func(a *Aeroplane) { a.Polar.LiftOfLeastDrag = 1.46 }},
	{"Configurations[0].ParasiteDragRise", func(a *Aeroplane) { a.Configurations[0].ParasiteDragRise = -0.032 }},
	{"Configurations[0].PositionError[1].IAS", func(a *Aeroplane) { a.Configurations[0].PositionError[1].IAS = 25 }},
	{"Configurations[0].PositionError[1].Correction", func(a *Aeroplane) { a.Configurations[0].PositionError[1].Correction = -20 }},
	{"Configurations[0].PositionError[0].Correction", func(a *Aeroplane) { a.Configurations[0].PositionError[0].Correction = -26 }},
	{"Configurations[0].PositionError[2].IAS", func(a *Aeroplane) { a.Configurations[0].PositionError[2].IAS = IAS(math.NaN()) }},
	{"Engine.Kind", func(a *Aeroplane) { a.Engine.Kind = 9 }},
	{"Engine.Law", func(a *Aeroplane) { a.Engine.Law = 2 }},
	{"Engine.RatedPower", func(a *Aeroplane) { a.Engine.RatedPower = 99 }},
	{"Engine.RatedSpeed", func(a *Aeroplane) { a.Engine.RatedSpeed = 0 }},
	{"Engine.MaximumSpeed", func(a *Aeroplane) { a.Engine.MaximumSpeed = -3 }},
	{"Engine.DropOffConstant", func(a *Aeroplane) { a.Engine.DropOffConstant = 0.7 }},
	{"Engine.FullThrottleAltitude", func(a *Aeroplane) { a.Engine.FullThrottleAltitude = 16000 }},
	{"Engine.SpecificConsumption", func(a *Aeroplane) { a.Engine.SpecificConsumption = 1 }},
	{"Engine.ConsumptionTable[1].PowerFraction", func(a *Aeroplane) {
		a.Engine.ConsumptionTable = []ConsumptionPoint{{0.5, 0.3 / KilowattHour}, {0.5, 0.3 / KilowattHour}}
	}},
	{"Engine.ConsumptionTable[0].SpecificConsumption", func(a *Aeroplane) { a.Engine.ConsumptionTable = []ConsumptionPoint{{0.5, 3}} }},
	{"Engine.LapseExponent", func(a *Aeroplane) { a.Engine.Kind, a.Engine.LapseExponent = Turboprop, 3 }},
	{"Engine.ThermalPower", func(a *Aeroplane) { a.Engine.Kind, a.Engine.ThermalPower = Turboprop, 1 }},
	{"Propeller.Kind", func(a *Aeroplane) { a.Propeller.Kind = 4 }},
	{"Propeller.Diameter", func(a *Aeroplane) { a.Propeller.Diameter = 0 }},
	{"Propeller.Efficiency", func(a *Aeroplane) { a.Propeller.Kind, a.Propeller.Efficiency = ConstantEfficiency, 1.2 }},
	{"Propeller.BladeEfficiency", func(a *Aeroplane) { a.Propeller.Kind, a.Propeller.BladeEfficiency = ConstantSpeed, 0 }},
	{"Propeller.PolarSlope", func(a *Aeroplane) { a.Propeller.Kind = FixedPitch }},
	{"Propeller.Table", func(a *Aeroplane) { a.Propeller.Table = a.Propeller.Table[:2] }},
	{"Propeller.Table", func(a *Aeroplane) { a.Propeller.Table = make([]PropellerRow, 300) }},
	{"Propeller.Table[0].ThrustCoefficient", func(a *Aeroplane) { a.Propeller.Table[0].ThrustCoefficient = -0.01 }},
	{"Propeller.Table[3].AdvanceRatio", func(a *Aeroplane) { a.Propeller.Table[3].AdvanceRatio = a.Propeller.Table[2].AdvanceRatio }},
	{"Propeller.Table[3].PowerCoefficient", func(a *Aeroplane) { a.Propeller.Table[3].PowerCoefficient = 0.3 }},
	{"Propeller.Table[3].PowerCoefficient", func(a *Aeroplane) { a.Propeller.Table[3].PowerCoefficient = math.NaN() }},
	{"Propeller.Table[3].ThrustCoefficient", func(a *Aeroplane) { a.Propeller.Table[3].ThrustCoefficient = 0.9 }},
	{"Propeller.Table[14].ThrustCoefficient", func(a *Aeroplane) {
		a.Propeller.Table[13].ThrustCoefficient = -0.01
		a.Propeller.Table[14].ThrustCoefficient = 0.01
	}},
	{"UsableFuel", func(a *Aeroplane) { a.UsableFuel = -1 }},
	{"UsableEnergy", func(a *Aeroplane) { a.UsableEnergy = math.NaN() }},
	{"Placards.NeverExceedCAS", func(a *Aeroplane) { a.Placards.NeverExceedCAS = 1 }},
	{"Placards.NeverExceedTAS", func(a *Aeroplane) { a.Placards.NeverExceedTAS = TAS(math.NaN()) }},
	{"Placards.ManoeuvringCAS", func(a *Aeroplane) { a.Placards.ManoeuvringCAS = 300 }},
	{"Placards.NormalOperatingCAS", func(a *Aeroplane) { a.Placards.NormalOperatingCAS = -2 }},
	{"Placards.FlapsExtendedCAS", func(a *Aeroplane) { a.Placards.FlapsExtendedCAS = -2 }},
}

func TestAeroplaneRefuses(t *testing.T) {
	for _, w := range wrongAeroplanes {
		a, c := benchCase(Tabulated)
		if err := a.Validate(); err != nil {
			t.Fatal(err)
		}
		w.change(&a)
		refused(t, w.key, a.Validate())
		var z Solver
		got := Answer{Shortfall: 1}
		refused(t, w.key, z.Solve(&a, &c, &got))
		if got != (Answer{}) {
			t.Errorf("%s: an answer came with the refusal", w.key)
		}
		if z.PowerAvailable(40) != 0 || z.PowerRequired(40) != 0 || z.FullSpeed(40) != 0 {
			t.Errorf("%s: curves came with the refusal", w.key)
		}
	}
}

func refused(t *testing.T, key string, err error) {
	t.Helper()
	list := Faults(err)
	for _, f := range list {
		if f.Key == key {
			if !strings.HasPrefix(f.Error(), key+": ") || strings.Contains(f.Error(), "%!") {
				t.Errorf("%s: reads %q", key, f.Error())
			}
			return
		}
	}
	t.Errorf("%s was not named: %v", key, err)
}

func TestConditionRefuses(t *testing.T) {
	for _, w := range []struct {
		key    string
		change func(c *Condition)
	}{
		{"Mass", func(c *Condition) { c.Mass = 0 }},
		{"Air.PressureAltitude", func(c *Condition) { c.Air.PressureAltitude = math.NaN() }},
		{"Air.Temperature", func(c *Condition) { c.Air = Air{} }},
		{"Air", func(c *Condition) { c.Air.Density = 0 }},
		{"Air", func(c *Condition) { c.Air.SpeedOfSound = math.NaN() }},
		{"Air.VapourPressure", func(c *Condition) { c.Air.VapourPressure = -1 }},
		{"Air.DewPoint", func(c *Condition) { c.Air.DewPoint = 330 }},
		{"Configuration", func(c *Condition) { c.Configuration = 1 }},
		{"Configuration", func(c *Condition) { c.Configuration = -1 }},
		{"Bank", func(c *Condition) { c.Bank = 1.4 }},
		{"PowerFraction", func(c *Condition) { c.PowerFraction = 1.1 }},
		{"Headwind", func(c *Condition) { c.Headwind = math.Inf(-1) }},
		{"Fuel", func(c *Condition) { c.Fuel = -1 }},
		{"ClimbGradient", func(c *Condition) { c.ClimbGradient = 2 }},
	} {
		a, c := benchCase(FixedPitch)
		if err := c.Validate(&a); err != nil {
			t.Fatal(err)
		}
		w.change(&c)
		refused(t, w.key, c.Validate(&a))
	}
}

func TestEveryFaultIsTold(t *testing.T) {
	a, c := benchCase(ConstantSpeed)
	a.WingArea, a.WingSpan, a.Polar.ParasiteDrag = 0, 0, 0
	c.Mass, c.Bank = 0, -1
	var z Solver
	var got Answer
	err := z.Solve(&a, &c, &got)
	list := Faults(err)
	if len(list) != 5+1 { // the parasite drag is also too small with the configuration's rise
		t.Errorf("%d faults: %v", len(list), err)
	}
	if list[0].Value != 0 || list[0].Min != 0.5 || list[0].Max != 1000 || list[0].Quantity != QuantityWingArea {
		t.Errorf("%+v", *list[0])
	}
	if Faults(nil) != nil || Faults(errors.New("other")) != nil {
		t.Error("faults out of nothing")
	}
}

func TestOnlyTheFieldsOfItsKindCount(t *testing.T) {
	a, c := benchCase(ConstantEfficiency)
	a.Propeller.Diameter, a.Propeller.BladeEfficiency, a.Propeller.PolarSlope = math.NaN(), -1, math.Inf(1)
	a.Engine.RatedSpeed, a.Engine.LapseExponent, a.Engine.ThermalPower = 0, -5, 1
	var z Solver
	var got Answer
	if err := z.Solve(&a, &c, &got); err != nil || got.Outcome != LevelFlight {
		t.Error(err, got.Outcome)
	}
	allFinite(t, &got)
}

func TestEveryQuantityHasADomain(t *testing.T) {
	for q := range quantityCount {
		d := q.Domain()
		if d.Name == "" || !(d.Min < d.Max) || !d.Holds(d.Min) || !d.Holds(d.Max) || d.Holds(math.NaN()) || d.Holds(math.Nextafter(d.Max, math.Inf(1))) {
			t.Errorf("quantity %d: %+v", q, d)
		}
	}
}
