package perf

import (
	"math"
	"testing"

	"levelspan/perf/num"
)

// TestClosedFormsAgreeWithTheGeneralPath holds the closed forms and one-sided Newtons of constant efficiency, constant speed and fixed
// pitch to the general path that tabulated propellers take, to 1e-9.
func TestClosedFormsAgreeWithTheGeneralPath(t *testing.T) {
	var z Solver
	counts := map[PropellerKind]int{}
	check := func(seed uint64, what string, got, want, tol float64) {
		t.Helper()
		if relative(got, want) > tol {
			t.Errorf("seed %d: %s %.15g, the general path says %.15g", seed, what, got, want)
		}
	}
	for seed := uint64(0); seed < 3000 && !t.Failed(); seed++ {
		a, c := randomCase(seed)
		if a.Propeller.Kind == Tabulated {
			continue
		}
		if err := z.Prepare(&a, &c); err != nil {
			t.Fatal(err)
		}
		f := &z.now
		vx, x := z.greatestGradient(f)
		vy, p := z.greatestRate(f)
		z.scan(f)
		qx, gx := f.scanMaximum(z.nodes, ofThrust)
		qy, gp := f.scanMaximum(z.nodes, ofPower)
		check(seed, "speed of the greatest gradient", vx, qx.v, 1e-9)
		check(seed, "speed of the greatest rate", vy, qy.v, 1e-9)
		check(seed, "greatest excess thrust", x+f.drag.at(vx), gx+f.drag.at(qx.v), 1e-9)
		check(seed, "greatest excess power", p+vy*f.drag.at(vy), gp+qy.v*f.drag.at(qy.v), 1e-9)
		if x < 1e-6*f.drag.at(vx) {
			continue
		}
		counts[a.Propeller.Kind]++
		s := z.levelSpan(f, vx)
		slow, fast, stalled := f.scanBand(z.nodes, qx)
		check(seed, "slow end", s.slow, slow, 1e-9)
		check(seed, "fast end", s.fast, fast, 1e-9)
		if stalled != (s.bySlow == SetByLift) {
			t.Errorf("seed %d: slow end set by %q, stalled %v", seed, s.bySlow, stalled)
		}
	}
	for k := range Tabulated {
		if counts[k] < 200 {
			t.Errorf("propeller kind %d was seen only %d times", k, counts[k])
		}
	}
}

// TestMassScalingAgreesWithBisection holds the greatest mass, which comes from scaling, to bisection on the mass itself.
func TestMassScalingAgreesWithBisection(t *testing.T) {
	var z Solver
	for seed := uint64(0); seed < 600; seed++ {
		a, c := randomCase(seed)
		if err := z.Prepare(&a, &c); err != nil {
			continue
		}
		for _, gradient := range []float64{0, 0.05} {
			got, ok := z.greatestMass(gradient)
			if !ok {
				continue
			}
			s := z.day.at(c.Air.PressureAltitude)
			s.temperature, s.density = c.Air.Temperature, c.Air.Density
			left := func(m float64) float64 {
				z.fly(&z.other, &s, m)
				_, x := z.greatestGradient(&z.other)
				return x - gradient*z.other.weight
			}
			var r num.Root
			r.Start(got*0.9, left(got*0.9), got*1.1, left(got*1.1), 0)
			for r.Next() {
				r.Put(left(r.X))
			}
			if relative(r.X, got) > 1e-9 {
				t.Errorf("seed %d, gradient %g: %.12g kg, bisection says %.12g", seed, gradient, got, r.X)
			}
		}
	}
}

// TestLevelShaftPowerSlope holds the analytic slope of the shaft power to a difference, and the shaft power of full thrust to what is delivered.
func TestLevelShaftPowerSlope(t *testing.T) {
	var z Solver
	for seed := uint64(0); seed < 800; seed++ {
		a, c := randomCase(seed)
		if err := z.Prepare(&a, &c); err != nil {
			continue
		}
		f := &z.now
		for _, k := range []float64{1.05, 1.4, 2.1} {
			v := k * f.stall
			p, slope, _ := f.levelAt(v)
			const h = 1e-5
			up, _, _ := f.levelAt(v * (1 + h))
			down, _, _ := f.levelAt(v * (1 - h))
			if d := (up - down) / (2 * h * v); math.Abs(d-slope) > 1e-4*(math.Abs(slope)+p/v) {
				t.Errorf("seed %d at %g m/s: slope %.9g, by difference %.9g", seed, v, slope, d)
			}
			if th := f.thrust(v); th > 0 && f.useful >= 0 && f.kind != FixedPitch {
				q, _, n := f.level(v, th, 0)
				if f.kind == Tabulated {
					full := f.torque0 * 2 * math.Pi * n
					if relative(q, min(full, f.shaft)) > 1e-9 {
						t.Errorf("seed %d at %g m/s: full thrust takes %.12g W of %.12g", seed, v, q, min(full, f.shaft))
					}
				} else if f.shaft > 0 && relative(q, f.shaft) > 1e-9 {
					t.Errorf("seed %d at %g m/s: full thrust takes %.12g W of %.12g", seed, v, q, f.shaft)
				}
			}
		}
	}
}

// TestCurvesMeetAtTheEnds: at the ends that power sets, power required is power available, and nothing exceeds the maxima.
func TestCurvesMeetAtTheEnds(t *testing.T) {
	var z Solver
	var got Answer
	for seed := uint64(0); seed < 1500; seed++ {
		a, c := randomCase(seed)
		if z.Solve(&a, &c, &got) != nil || got.Outcome != LevelFlight {
			continue
		}
		for _, k := range []Key{SlowestLevel, FastestLevel} {
			l := &got.Limits[k]
			req, av := z.PowerRequired(l.TAS), z.PowerAvailable(l.TAS)
			switch l.SetBy {
			case SetByPower:
				if relative(req, av) > 1e-9 {
					t.Errorf("seed %d: %s: %g W required, %g W available", seed, k, req, av)
				}
			case SetByRPM:
				if n := z.LevelSpeed(l.TAS); relative(n, a.Engine.MaximumSpeed) > 1e-9 {
					t.Errorf("seed %d: %s: %g rev/s, maximum %g", seed, k, n, a.Engine.MaximumSpeed)
				}
			default:
				if av < req*(1-1e-9) {
					t.Errorf("seed %d: %s set by %q, but power is missing", seed, k, l.SetBy)
				}
			}
		}
		for v := z.StallSpeed(); v < 120; v *= 1.07 {
			if r := z.ClimbRate(v); r > got.Limits[FastestClimb].Rate*(1+1e-9) {
				t.Errorf("seed %d: %g m/s at %g, more than VY's %g", seed, r, v, got.Limits[FastestClimb].Rate)
			}
			if g := z.Gradient(v); g > got.Limits[SteepestClimb].Gradient*(1+1e-9) {
				t.Errorf("seed %d: gradient %g at %g, more than VX's", seed, g, v)
			}
		}
	}
}
