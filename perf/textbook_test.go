package perf

import (
	"math"
	"testing"
)

// lowry is the fixed-pitch example of J. T. Lowry, JAAER 6(1) 1995 art. 7 and J. Aircraft 33 (1996); plate and results from memory.
func lowry() (Aeroplane, Condition) {
	const torque = 311.2 * Foot * PoundForce
	const rated = 2700 * RevPerMin
	area := 174 * Foot * Foot
	a := Aeroplane{
		WingArea: area, WingSpan: math.Sqrt(7.38 * area), EmptyMass: 1400 * Pound, MaximumMass: 2400 * Pound,
		Polar:          Polar{ParasiteDrag: 0.037, OswaldEfficiency: 0.72},
		Configurations: []Configuration{{Name: "clean", MaximumLift: 6}},
		Engine: Engine{Kind: Piston, Law: DensityAltitudeLaw, RatedPower: 2 * math.Pi * rated * torque, RatedSpeed: rated,
			DropOffConstant: 0.12, SpecificConsumption: 0.3 / KilowattHour},
		Propeller: Propeller{Kind: FixedPitch, Diameter: 6.25 * Foot, PolarSlope: 1.70, PolarIntercept: -0.0564,
			PowerCoefficientStatic: 0.0511, PowerCoefficientSlope: -0.012},
	}
	return a, Condition{Mass: 2400 * Pound, PowerFraction: 1}
}

func TestLowryFixedPitch(t *testing.T) {
	rows := []struct {
		weight, height, vx, vy, fast, slow, glide, least, rate float64
	}{
		{2400, 0, 63.20, 75.85, 115.26, 34.65, 72.00, 54.71, 700.3},
		{2400, 4000, 67.06, 76.75, 112.41, 40.01, 76.40, 58.05, 518.7},
		{2400, 12000, 75.91, 79.34, 102.12, 56.43, 86.48, 65.71, 174.0},
		{2000, 0, 57.69, 74.16, 116.95, 28.46, 65.73, 49.94, 961.2},
	}
	var z Solver
	for _, r := range rows {
		a, c := lowry()
		c.Mass = r.weight * Pound
		c.Air, _ = AirAtDensityAltitude(r.height * Foot)
		var got Answer
		if err := z.Solve(&a, &c, &got); err != nil {
			t.Fatal(err)
		}
		check := func(name string, got, want, tol float64) {
			t.Helper()
			if !(math.Abs(got-want) <= tol) {
				t.Errorf("%g lb, %g ft: %s is %.3f, printed %.3f", r.weight, r.height, name, got, want)
			}
		}
		kt := func(k Key) float64 { return float64(got.Limits[k].TAS) / Knot }
		check("VX", kt(SteepestClimb), r.vx, 0.011)
		check("VY", kt(FastestClimb), r.vy, 0.011)
		check("VM", kt(FastestLevel), r.fast, 0.011)
		check("slow end", kt(SlowestLevel), max(r.slow, kt(Stall)), 0.011)
		check("best glide", kt(BestGlide), r.glide, 0.011)
		check("least power", kt(LeastPower), r.least, 0.011)
		check("rate", got.Limits[FastestClimb].Rate/FootPerMin, r.rate, 0.15)
		if r.weight == 2400 {
			check("absolute ceiling", got.Absolute.DensityAltitude/Foot, 16184, 2)
			check("service ceiling", got.Service.DensityAltitude/Foot, 13771, 2)
		}
	}
}

// TestAndersonCP1: J. D. Anderson, Introduction to Flight, examples 6.1 to 6.12, in SI; the figures are those that the printed data give exactly
// (the printed maximum speed, 81 m/s, is read off a graph).
func TestAndersonCP1(t *testing.T) {
	const weight = 13127.5
	a := Aeroplane{
		WingArea: 16.165, WingSpan: 10.912, EmptyMass: 800, MaximumMass: 1400,
		Polar:          Polar{ParasiteDrag: 0.025, OswaldEfficiency: 0.8},
		Configurations: []Configuration{{MaximumLift: 6}},
		Engine: Engine{Kind: Piston, RatedPower: 230 * 746, DropOffConstant: 0.12,
			SpecificConsumption: 2.0025 / StandardGravity / (746 * Hour)},
		Propeller: Propeller{Kind: ConstantEfficiency, Efficiency: 0.8},
	}
	c := Condition{Mass: weight / StandardGravity, PowerFraction: 1, Air: StandardAir()}
	var z Solver
	var got Answer
	if err := z.Solve(&a, &c, &got); err != nil {
		t.Fatal(err)
	}
	for _, r := range []struct {
		name      string
		got, want float64
		tol       float64
	}{
		{"fastest", float64(got.Limits[FastestLevel].TAS), 79.734, 0.002},
		{"glide ratio", got.Limits[BestGlide].Ratio, 13.6062, 2e-4},
		{"rate", got.Limits[FastestClimb].Rate, 7.6095, 5e-4},
		{"VY", float64(got.Limits[FastestClimb].TAS), 33.544, 1e-3},
	} {
		if math.Abs(r.got-r.want) > r.tol {
			t.Errorf("%s is %.5g, want %.5g", r.name, r.got, r.want)
		}
	}
}
