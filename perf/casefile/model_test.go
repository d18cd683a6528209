package casefile

import (
	"math"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"levelspan/perf"
)

func near(a, b float64) bool { return math.Abs(a-b) <= 1e-12*math.Max(math.Abs(a), math.Abs(b)) }

func TestModelIsInSI(t *testing.T) {
	c := sample()
	a, k, err := c.Model()
	if err != nil {
		t.Fatal(err)
	}
	for _, x := range []struct {
		name      string
		got, want float64
	}{
		{"area", a.WingArea, 16.5}, {"span", a.WingSpan, 10.8}, {"empty", a.EmptyMass, 480}, {"maximum", a.MaximumMass, 800}, {"cd0", a.Polar.ParasiteDrag, 0.034},
		{"e", a.Polar.OswaldEfficiency, 0.75}, {"clmd", a.Polar.LiftOfLeastDrag, 0.1}, {"rated", a.Engine.RatedPower, 74600}, {"rated speed", a.Engine.RatedSpeed, 2750.0 / 60},
		{"maximum speed", a.Engine.MaximumSpeed, 2800.0 / 60}, {"full throttle", a.Engine.FullThrottleAltitude, 1000}, {"drop-off", a.Engine.DropOffConstant, 0.13},
		{"consumption", a.Engine.SpecificConsumption, 0.31 / 3.6e6}, {"table", a.Engine.ConsumptionTable[1].SpecificConsumption, 0.36 / 3.6e6}, {"fraction", a.Engine.ConsumptionTable[0].PowerFraction, 0.5},
		{"diameter", a.Propeller.Diameter, 1.75}, {"m", a.Propeller.PolarSlope, 1.75}, {"b", a.Propeller.PolarIntercept, -0.055}, {"cp0", a.Propeller.PowerCoefficientStatic, 0.045},
		{"cp1", a.Propeller.PowerCoefficientSlope, -0.02}, {"fuel", a.UsableFuel, 57.6}, {"energy", a.UsableEnergy, 0}, {"vne", float64(a.Placards.NeverExceedCAS), 64},
		{"vne tas", float64(a.Placards.NeverExceedTAS), 70}, {"vno", float64(a.Placards.NormalOperatingCAS), 55}, {"va", float64(a.Placards.ManoeuvringCAS), 48}, {"vfe", float64(a.Placards.FlapsExtendedCAS), 40},
		{"cl_max", a.Configurations[1].MaximumLift, 2}, {"rise", a.Configurations[1].ParasiteDragRise, 0.035}, {"calibration", a.Configurations[0].PositionError[1].Correction, -0.4},
		{"calibration", float64(a.Configurations[1].PositionError[0].IAS), 20},
		{"mass", k.Mass, 760}, {"height", k.Air.PressureAltitude, 1200}, {"temperature", k.Air.Temperature, 301.15}, {"dew point", k.Air.DewPoint, 284.15}, {"bank", k.Bank, math.Pi / 12},
		{"power", k.PowerFraction, 0.9}, {"wind", k.Headwind, -3}, {"on board", k.Fuel, 40}, {"gradient", k.ClimbGradient, 0.03}, {"configuration", float64(k.Configuration), 0},
	} {
		if !near(x.got, x.want) {
			t.Errorf("%s is %v, want %v", x.name, x.got, x.want)
		}
	}
	if a.Engine.Law != perf.DensityAltitudeLaw || a.Engine.Kind != perf.Piston || a.Propeller.Kind != perf.FixedPitch || len(a.Propeller.Table) != 0 {
		t.Errorf("kinds: %+v %+v", a.Engine, a.Propeller)
	}
}

func TestModelOfEachKind(t *testing.T) {
	c := sample()
	c.Aeroplane.Engine.Kind = Electric
	c.Aeroplane.Propeller.Kind = Table
	c.Aeroplane.Propeller.PowerCoefficient = []float64{0.05, 0.045, 0.02}
	c.Today.Configuration = "landing"
	a, k, err := c.Model()
	if err != nil {
		t.Fatal(err)
	}
	if a.Engine.Kind != perf.Electric || !near(a.UsableEnergy, 40*3.6e6) || !near(k.Fuel, 31*3.6e6) || a.UsableFuel != 0 || a.Engine.SpecificConsumption != 0 || k.Configuration != 1 {
		t.Errorf("electric: %+v, %+v", a, k)
	}
	if a.Propeller.Kind != perf.Tabulated || !reflect.DeepEqual(a.Propeller.Table[1], perf.PropellerRow{AdvanceRatio: 0.5, ThrustCoefficient: 0.07, PowerCoefficient: 0.045}) {
		t.Errorf("table: %+v", a.Propeller)
	}
	c.Today.ChargeKWh = nil
	if _, k, err := c.Model(); err != nil || !near(k.Fuel, 40*3.6e6) {
		t.Errorf("all of the charge: %v, %v", k.Fuel, err)
	}
	c.Aeroplane.Battery = nil
	if a, k, err := c.Model(); err != nil || k.Fuel != 0 || a.UsableEnergy != 0 {
		t.Errorf("no battery known: %v, %v", k.Fuel, err)
	}
	c.Aeroplane.Engine.Kind, c.Aeroplane.Propeller.Kind = Turboprop, ConstantSpeed
	if a, _, err := c.Model(); err != nil || a.Engine.Kind != perf.Turboprop || a.Engine.ThermalPower != 90000 || a.Engine.LapseExponent != 0.72 || a.Propeller.Kind != perf.ConstantSpeed || a.Propeller.BladeEfficiency != 0.87 {
		t.Errorf("turboprop: %+v %v", a, err)
	}
}

// Whatever the file takes the model takes: each number of the sample at either end of its range, where the rest of the
// case allows it, solves.
func TestTheModelTakesTheEndsOfEveryRange(t *testing.T) {
	var s perf.Solver
	solved := 0
	for _, f := range Fields() {
		if _, fills := f.Quantity(); !fills || f.Kind == KindNumbers {
			continue
		}
		path := strings.ReplaceAll(f.Path, "[]", "[0]")
		for _, end := range []float64{f.Min, f.Max} {
			c := sample()
			if c.SetNumber(path, end) != nil {
				continue
			}
			a, k, err := c.Model()
			var answer perf.Answer
			if err == nil {
				err = s.Solve(&a, &k, &answer)
			}
			if err != nil {
				t.Errorf("%s = %v: %v", path, end, err)
			}
			solved++
		}
	}
	if solved < 70 {
		t.Errorf("only %d ends were tried", solved)
	}
}

// Rules that only the model knows come back with the file's paths and units.
func TestModelFaultsAreTranslated(t *testing.T) {
	for _, x := range [][3]string{
		{"aeroplane.polar.cl_min_drag", "1.45", "aeroplane.configurations[0].cl_max"},
		{"aeroplane.configurations[1].delta_cd0", "-0.05", "aeroplane.configurations[1].delta_cd0"},
	} {
		_, _, err := Parse(mutated(t, x[0], x[1]))
		got := faultsOf(err)
		if len(got) == 0 || got[0] != x[2] {
			t.Errorf("%s = %s: got %v, want a fault of %s", x[0], x[1], err, x[2])
		}
	}
	c := sample()
	c.Aeroplane.Propeller.Kind = Table
	c.Aeroplane.Propeller.ThrustCoefficient = []float64{0.05, 0.02, 0.2}
	c.Aeroplane.Propeller.AdvanceRatio = []float64{0.5, 0.6, 0.7}
	c.Aeroplane.Propeller.PowerCoefficient = []float64{0.05, 0.045, 0.04}
	if got := faultsOf(c.Validate()); len(got) == 0 || !strings.HasPrefix(got[0], "aeroplane.propeller.thrust_coefficient[2]") {
		t.Errorf("a table that bends back: %v", c.Validate())
	}
	c = sample()
	hot := 69.0
	c.Today.OutsideAirTemperatureC, c.Today.DewPointC, c.Today.PressureAltitudeM = 70, &hot, 15000
	if got := faultsOf(c.Validate()); len(got) != 1 || got[0] != "today.dew_point_c" || !strings.Contains(c.Validate().Error(), "°C") {
		t.Errorf("more vapour than air: %v", c.Validate())
	}
	for key, path := range modelPaths {
		if _, ok := FieldOf(strings.ReplaceAll(path, "[]", "[0]")); !ok {
			t.Errorf("%s leads to %s, which is no key", key, path)
		}
	}
}

func TestModelRefusesWhatValidateRefuses(t *testing.T) {
	c := sample()
	c.Aeroplane.Configurations = nil
	if _, _, err := c.Model(); err == nil {
		t.Error("no configuration, and a model")
	}
	if _, _, err := (&Case{}).Model(); len(faultsOf(err)) < 10 {
		t.Errorf("an empty case: %v", err)
	}
}

// The cases that the other tests share are taken by Parse and by the schema, and their fragments give them back.
func TestSharedCases(t *testing.T) {
	paths, err := filepath.Glob(filepath.Join("..", "..", "testdata", "cases", "*.json"))
	if err != nil || len(paths) < 4 {
		t.Fatal(paths, err)
	}
	paths = append(paths, filepath.Join("..", "..", "assets", "case", "marram.json"))
	s := compiled(t)
	for _, path := range paths {
		data, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		c, warnings, err := Parse(data)
		if err != nil || len(warnings) > 0 {
			t.Errorf("%s: %v %v", path, err, warnings)
			continue
		}
		if err := refused(t, s, data); err != nil {
			t.Errorf("%s: %v", path, err)
		}
		if d, _, err := ParseFragment(c.Fragment()); err != nil || string(d.Marshal()) != string(data) {
			t.Errorf("%s: its fragment: %v", path, err)
		}
	}
}

// The demo's runs cover the five kinds, and agree with its numbers as well as the instruments read.
func TestDemoRunsAgreeWithTheModel(t *testing.T) {
	data, err := os.ReadFile(filepath.Join("..", "..", "assets", "case", "marram.json"))
	if err != nil {
		t.Fatal(err)
	}
	c, _, err := Parse(data)
	if err != nil {
		t.Fatal(err)
	}
	var s perf.Solver
	kinds := map[string]int{}
	for i, r := range c.Runs {
		kinds[r.Kind]++
		d := c.Clone()
		d.Today.MassKg, d.Today.PressureAltitudeM, d.Today.OutsideAirTemperatureC, d.Today.Configuration = r.MassKg, r.PressureAltitudeM, r.OutsideAirTemperatureC, r.Configuration
		a, k, err := d.Model()
		if err != nil {
			t.Fatal(err)
		}
		if err := s.Prepare(&a, &k); err != nil {
			t.Fatal(err)
		}
		v := k.Air.TASFromCAS(a.Configurations[k.Configuration].CASFromIAS(perf.IAS(r.IASMps)))
		switch {
		case r.Kind == StallRun:
			if e := float64(v/s.StallSpeed()) - 1; math.Abs(e) > 0.06 {
				t.Errorf("run %d: the stall is off by %.3f", i, e)
			}
		case r.RPM != nil:
			if e := s.LevelSpeed(v)*60 - *r.RPM; math.Abs(e) > 60 {
				t.Errorf("run %d: the rpm is off by %.0f", i, e)
			}
		case r.Kind == LevelRun || r.Kind == ClimbRun:
			if e := s.ClimbRate(v) - *r.RateMps; math.Abs(e) > 0.4 {
				t.Errorf("run %d: the rate is off by %.2f", i, e)
			}
		case r.Kind == GlideRun:
			if sink := s.PowerRequired(v) / (r.MassKg * perf.StandardGravity); -*r.RateMps < sink-0.3 || -*r.RateMps > sink+1.5 {
				t.Errorf("run %d: it sinks at %.2f, the model without a propeller at %.2f", i, -*r.RateMps, sink)
			}
		}
	}
	for _, kind := range []string{LevelRun, ClimbRun, GlideRun, StallRun, GPSRun} {
		if kinds[kind] == 0 {
			t.Errorf("no %s run", kind)
		}
	}
}

func BenchmarkModel(b *testing.B) {
	c := sample()
	b.ReportAllocs()
	for b.Loop() {
		if _, _, err := c.Model(); err != nil {
			b.Fatal(err)
		}
	}
}
