package casefile

import (
	"errors"
	"math"
	"strings"
	"testing"
)

// sample is a case with every part and every optional number set, by hand, so that a key that reading or writing forgets shows.
func sample() *Case {
	p := func(x float64) *float64 { return &x }
	return &Case{
		Aeroplane: Aeroplane{Name: "Marram", Note: "line one\nline two", WingAreaM2: 16.5, WingSpanM: 10.8, EmptyMassKg: 480, MaximumMassKg: 800,
			Polar:          Polar{CD0: 0.034, OswaldE: 0.75, CLMinDrag: 0.1},
			Configurations: []Configuration{{Name: "clean", CLMax: 1.45}, {Name: "landing", CLMax: 2, DeltaCD0: 0.035}},
			Engine: Engine{Kind: Piston, RatedPowerW: 74600, RatedRPM: 2750, MaximumRPM: p(2800), PowerLaw: DensityAltitude, FullThrottleAltitudeM: 1000,
				DropOffConstant: 0.13, LapseExponent: 0.72, ThermalPowerW: p(90000), SpecificConsumptionKgPerKWh: 0.31,
				ConsumptionTable: []ConsumptionPoint{{PowerFraction: 0.5, KgPerKWh: 0.33}, {PowerFraction: 1, KgPerKWh: 0.36}}},
			Propeller: Propeller{Kind: FixedPitch, Efficiency: 0.8, DiameterM: 1.75, BladeEfficiency: 0.87, PolarSlope: 1.75, PolarIntercept: -0.055,
				PowerCoefficientStatic: 0.045, PowerCoefficientSlope: -0.02,
				AdvanceRatio: []float64{0, 0.5, 1}, ThrustCoefficient: []float64{0.1, 0.07, 0}, PowerCoefficient: []float64{0.05, 0.045, 0.01}},
			Fuel: &Fuel{UsableKg: 57.6, DensityKgPerL: p(0.73)}, Battery: &Battery{UsableKWh: 40},
			Placards: Placards{p(64), p(70), p(55), p(48), p(40), ""},
			Calibration: []Calibration{{Configuration: "clean", Points: []CalibrationPoint{{IASMps: 25, CASMinusIASMps: 0.8}, {IASMps: 60, CASMinusIASMps: -0.4}}},
				{Configuration: "landing", Points: []CalibrationPoint{{IASMps: 20, CASMinusIASMps: 1.1}}}}},
		Today: Today{MassKg: 760, PressureAltitudeM: 1200, OutsideAirTemperatureC: 28, DewPointC: p(11), Configuration: "clean", BankDeg: 15, PowerFraction: 0.9,
			HeadwindMps: -3, FuelKg: 40, ChargeKWh: p(31), ReserveMin: 45, FieldElevationM: p(900), AltimeterSettingHPa: p(1009), ClimbGradient: p(0.03), AirFrom: FieldElevation},
		Beliefs:     Beliefs{0.1, 0.08, 0.07, 0.05, 0.06, 1.1, ""},
		Instruments: Instruments{0.5, 0.15, 0.03, 15, 0.01, 1, 10, ""},
		Runs: []Run{
			{Kind: LevelRun, Configuration: "clean", IASMps: 40, PressureAltitudeM: 900, OutsideAirTemperatureC: 12, MassKg: 745, PowerFraction: p(0.65), RPM: p(2400), RateMps: p(0)},
			{Kind: ClimbRun, Configuration: "clean", IASMps: 34, PressureAltitudeM: 1000, OutsideAirTemperatureC: 11, MassKg: 740, PowerFraction: p(1), RateMps: p(3.1), LeftOut: "rough air"},
			{Kind: GlideRun, Configuration: "landing", IASMps: 33, PressureAltitudeM: 1100, OutsideAirTemperatureC: 10, MassKg: 738, RateMps: p(-3.4), Propeller: Windmilling},
			{Kind: StallRun, Configuration: "landing", IASMps: 21, PressureAltitudeM: 1200, OutsideAirTemperatureC: 9, MassKg: 736},
			{Kind: GPSRun, Configuration: "clean", IASMps: 42, PressureAltitudeM: 900, OutsideAirTemperatureC: 12, MassKg: 735,
				Legs: []Leg{{GroundSpeedMps: 44, TrackDeg: 10}, {GroundSpeedMps: 39, TrackDeg: 130}, {GroundSpeedMps: 47, TrackDeg: 250}}},
		},
		Display: Display{SpeedKind: "IAS", Speed: "mph", Altitude: "m", Mass: "lb", Power: "hp", Fuel: "US gal", Length: "ft", Selected: "best_glide"},
	}
}

func TestSampleIsValid(t *testing.T) {
	if err := sample().Validate(); err != nil {
		t.Fatal(err)
	}
}

// Every number of the table can be read, set to the ends of its range or refused beyond them, and put back.
func TestNumberByPath(t *testing.T) {
	indexed := func(path string) string {
		return strings.ReplaceAll(strings.ReplaceAll(path, "runs[].legs[]", "runs[4].legs[0]"), "[]", "[0]")
	}
	numbers := 0
	for _, f := range Fields() {
		path := indexed(f.Path)
		if f.Kind == KindNumbers {
			path += "[1]"
		}
		if f.Kind == KindText || f.Kind == KindChoice {
			continue
		}
		numbers++
		c := sample()
		before, set := c.Number(path)
		if !set && f.Kind != KindMaybe {
			t.Errorf("%s: not set in the sample", path)
		}
		for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1), math.Nextafter(f.Min, math.Inf(-1)), math.Nextafter(f.Max, math.Inf(1))} {
			err := c.SetNumber(path, bad)
			var fault *Fault
			if !errors.As(err, &fault) || fault.Path != path {
				t.Errorf("%s = %v: got %v, want a fault of that path", path, bad, err)
			}
			if now, _ := c.Number(path); now != before {
				t.Errorf("%s: a refused %v changed it to %v", path, bad, now)
			}
		}
		middle := before
		if err := c.SetNumber(path, middle); err != nil && set {
			t.Errorf("%s: its own value %v is refused: %v", path, middle, err)
		}
		for _, end := range []float64{f.Min, f.Max} {
			c := sample()
			err := c.SetNumber(path, end)
			now, _ := c.Number(path)
			if err == nil && now != end || err != nil && now != before {
				t.Errorf("%s = %v: error %v, now %v", path, end, err, now)
			}
			if e := c.Validate(); e != nil {
				t.Errorf("%s = %v left the case unphysical: %v", path, end, e)
			}
		}
	}
	if numbers < 70 {
		t.Errorf("%d numbers in the table; some part of it is missing", numbers)
	}
}

func TestSetNumberKeepsTheFieldsTogether(t *testing.T) {
	for _, x := range []struct {
		path  string
		value float64
		fault string
	}{
		{"aeroplane.empty_mass_kg", 801, "aeroplane.maximum_mass_kg"},
		{"aeroplane.maximum_mass_kg", 479, "aeroplane.maximum_mass_kg"},
		{"today.outside_air_temperature_c", 10.9, "today.dew_point_c"},
		{"today.dew_point_c", 28.1, "today.dew_point_c"},
		{"today.fuel_kg", 58, "today.fuel_kg"},
		{"aeroplane.fuel.usable_kg", 39, "today.fuel_kg"},
		{"today.charge_kwh", 41, "today.charge_kwh"},
		{"aeroplane.calibration[0].points[1].ias_mps", 25, "aeroplane.calibration[0].points[1].ias_mps"},
		{"aeroplane.calibration[0].points[0].cas_minus_ias_mps", -26, "aeroplane.calibration[0].points[0].cas_minus_ias_mps"},
		{"aeroplane.propeller.advance_ratio[1]", 1.1, "aeroplane.propeller.advance_ratio[2]"},
		{"aeroplane.engine.consumption_table[1].power_fraction", 0.5, "aeroplane.engine.consumption_table[1].power_fraction"},
	} {
		c := sample()
		err := c.SetNumber(x.path, x.value)
		var fault *Fault
		if !errors.As(err, &fault) || fault.Path != x.fault || fault.Text() == "" {
			t.Errorf("%s = %v: got %v, want a fault of %s", x.path, x.value, err, x.fault)
		}
		if string(c.Marshal()) != string(sample().Marshal()) {
			t.Errorf("%s = %v was refused and changed the case", x.path, x.value)
		}
	}
}

func TestUnknownPaths(t *testing.T) {
	for _, path := range []string{"", ".", "x", "aeroplane", "aeroplane.", "aeroplane.polar", "aeroplane.polar.cd0.x", "aeroplane.polar[0].cd0", "aeroplane.configurations.cl_max",
		"aeroplane.configurations[2].cl_max", "aeroplane.configurations[-1].cl_max", "aeroplane.configurations[00].cl_max", "aeroplane.configurations[9999999999999999999].cl_max",
		"aeroplane.configurations[0.cl_max", "aeroplane.propeller.advance_ratio[3]", "aeroplane.propeller.advance_ratio", "aeroplane.name", "format", "version", "runs[5].ias_mps", "runs[0]"} {
		c := sample()
		if v, set := c.Number(path); set || v != 0 {
			t.Errorf("Number(%q) = %v, %v", path, v, set)
		}
		var fault *Fault
		if err := c.SetNumber(path, 1); !errors.As(err, &fault) {
			t.Errorf("SetNumber(%q): %v", path, err)
		}
	}
}

func TestClearNumber(t *testing.T) {
	c := sample()
	for _, path := range []string{"today.dew_point_c", "aeroplane.placards.vne_cas_mps", "aeroplane.engine.maximum_rpm", "today.climb_gradient"} {
		if err := c.ClearNumber(path); err != nil {
			t.Errorf("%s: %v", path, err)
		}
		if _, set := c.Number(path); set {
			t.Errorf("%s is still set", path)
		}
	}
	for path, want := range map[string]float64{"today.mass_kg": 800, "today.fuel_kg": 57.6, "today.power_fraction": 1, "aeroplane.engine.drop_off_constant": 0.12} {
		if err := c.ClearNumber(path); err != nil {
			t.Errorf("%s: %v", path, err)
		}
		if v, _ := c.Number(path); v != want {
			t.Errorf("%s is %v, want its default %v", path, v, want)
		}
	}
	if err := c.ClearNumber("aeroplane.fuel.usable_kg"); err != nil || c.Aeroplane.Fuel != nil {
		t.Errorf("fuel: %v, %v", err, c.Aeroplane.Fuel)
	}
	if err := c.SetNumber("aeroplane.fuel.density_kg_per_l", 0.72); err == nil || c.Aeroplane.Fuel != nil {
		t.Errorf("a density without fuel: %v, %v", err, c.Aeroplane.Fuel)
	}
	if err := c.SetNumber("aeroplane.fuel.usable_kg", 60); err != nil || c.Aeroplane.Fuel == nil || c.Aeroplane.Fuel.UsableKg != 60 {
		t.Errorf("fuel again: %v", err)
	}
	for _, path := range []string{"aeroplane.wing_area_m2", "aeroplane.polar.cd0", "runs[0].ias_mps", "runs[1].rate_mps", "nothing"} {
		if err := c.ClearNumber(path); err == nil {
			t.Errorf("%s can be cleared", path)
		}
	}
	if err := c.ClearNumber("runs[0].power_fraction"); err != nil {
		t.Errorf("with rpm there, power_fraction can go: %v", err)
	}
	if err := c.ClearNumber("runs[0].rpm"); err == nil {
		t.Error("a level run lost both settings")
	}
}

func TestSetText(t *testing.T) {
	c := sample()
	for path, text := range map[string]string{"aeroplane.name": "Marram II", "aeroplane.note": "", "today.configuration": "landing", "aeroplane.engine.power_law": PressureAltitude,
		"display.speed": "km/h", "today.air_from": DensityAltitude} {
		if err := c.SetText(path, text); err != nil {
			t.Errorf("%s: %v", path, err)
		}
		if got, _ := c.Text(path); got != text {
			t.Errorf("%s is %q", path, got)
		}
	}
	for path, text := range map[string]string{"aeroplane.name": "", "aeroplane.note": "a\x00b", "today.configuration": "up", "aeroplane.engine.kind": "steam", "display.speed": "",
		"aeroplane.polar.cd0": "x", "aeroplane.configurations[0].name": "landing", "aeroplane.configurations[1].name": " \t", "runs[0].propeller": "spinning", "runs[2].propeller": "", "no": "x"} {
		before := string(c.Marshal())
		var fault *Fault
		if err := c.SetText(path, text); !errors.As(err, &fault) {
			t.Errorf("%s = %q: %v", path, text, err)
		}
		if string(c.Marshal()) != before {
			t.Errorf("%s = %q was refused and changed the case", path, text)
		}
	}
}

func TestRenamingFollows(t *testing.T) {
	c := sample()
	if err := c.SetText("aeroplane.configurations[0].name", "up"); err != nil {
		t.Fatal(err)
	}
	if c.Today.Configuration != "up" || c.Aeroplane.Calibration[0].Configuration != "up" || c.Runs[0].Configuration != "up" || c.Runs[2].Configuration != "landing" {
		t.Errorf("a reference was left behind: %+v", c)
	}
	i := c.AddConfiguration()
	if i != 2 || c.Validate() != nil || c.Aeroplane.Configurations[2].CLMax != 2 {
		t.Errorf("added %d: %v", i, c.Validate())
	}
	c.Today.Configuration = c.Aeroplane.Configurations[2].Name
	if err := c.RemoveConfiguration(2); err != nil || c.Validate() != nil || c.Today.Configuration != "up" {
		t.Errorf("removed: %v %v", err, c.Validate())
	}
	if err := c.RemoveConfiguration(0); err == nil {
		t.Error("a configuration that runs refer to was removed")
	}
	c.Runs = nil
	if err := c.RemoveConfiguration(0); err != nil || len(c.Aeroplane.Calibration) != 1 || c.Validate() != nil {
		t.Errorf("%v, %v, %v", err, c.Aeroplane.Calibration, c.Validate())
	}
	if err := c.RemoveConfiguration(0); err == nil {
		t.Error("the last configuration was removed")
	}
}

func TestPropellerKindsKeepTheirNumbers(t *testing.T) {
	c := sample()
	c.Aeroplane.Propeller = Propeller{Kind: ConstantEfficiency, Efficiency: 0.77}
	for _, kind := range []string{ConstantSpeed, FixedPitch, Table, ConstantEfficiency} {
		if err := c.SetText("aeroplane.propeller.kind", kind); err != nil {
			t.Errorf("%s: %v", kind, err)
		}
		if err := c.Validate(); err != nil {
			t.Errorf("%s: %v", kind, err)
		}
	}
	if c.Aeroplane.Propeller.Efficiency != 0.77 {
		t.Error("the efficiency was lost on the way round")
	}
}

func BenchmarkSetNumber(b *testing.B) {
	c := sample()
	masses := []float64{700, 710, 720, 730}
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		if err := c.SetNumber("today.mass_kg", masses[i%len(masses)]); err != nil {
			b.Fatal(err)
		}
	}
}
