package estimate

import (
	"math"
	"testing"

	"levelspan/perf"
)

// today is the condition that the tests ask for.
func today() perf.Condition {
	air, err := perf.AirAt(1200, 301, 0)
	if err != nil {
		panic(err)
	}
	return perf.Condition{Mass: 760, Air: air, PowerFraction: 1, Fuel: 57.6, ClimbGradient: 0.03}
}

// fitted is the posterior of one campaign.
func fitted(t testing.TB, seed uint64, kind perf.PropellerKind, plans []plan) (Case, Posterior) {
	t.Helper()
	c, _ := campaign(seed, kind, plans)
	var e Estimator
	var p Posterior
	if err := e.Fit(&c, &p); err != nil {
		t.Fatal(err)
	}
	return c, p
}

// TestBandsAreQuantiles: the intervals are those of the solver's own answers, draw by draw, sorted plainly.
func TestBandsAreQuantiles(t *testing.T) {
	for _, k := range kinds {
		_, p := fitted(t, 3, k.kind, sparsePlan())
		var d Draws
		d.Set(&p, 128)
		var b Bands
		var got Intervals
		c := today()
		b.Ribbons([]perf.TAS{30, 45})
		if err := b.Solve(&d, &c, &got); err != nil {
			t.Fatal(err)
		}
		var speeds, rates, ias, service, required []float64
		var z perf.Solver
		var a perf.Answer
		level, at45 := 0, 0
		for i := range d.Len() {
			if err := z.Solve(d.Aeroplane(i), &c, &a); err != nil {
				t.Fatal(err)
			}
			required = append(required, z.PowerRequired(45))
			if a.Outcome == perf.LevelFlight {
				level++
				if a.Limits[perf.SlowestLevel].TAS <= 45 && 45 <= a.Limits[perf.FastestLevel].TAS {
					at45++
				}
			}
			if l := a.Limits[perf.FastestLevel]; l.Applies {
				speeds, ias = append(speeds, float64(l.TAS)), append(ias, float64(l.IAS))
			}
			if l := a.Limits[perf.FastestClimb]; l.Applies {
				rates = append(rates, l.Rate)
			}
			if a.Service.Applies {
				service = append(service, a.Service.PressureAltitude)
			}
		}
		ribbon, _ := b.Ribbon(1)
		for _, x := range []struct {
			name   string
			got    Interval
			values []float64
		}{{"fastest level", got.Limits[perf.FastestLevel].TAS, speeds}, {"its IAS", got.Limits[perf.FastestLevel].IAS, ias},
			{"rate of climb", got.Limits[perf.FastestClimb].Rate, rates}, {"service ceiling", got.Service.PressureAltitude, service},
			{"power required at 45 m/s", ribbon, required}} {
			if want := interval(x.values); x.got != want || !(x.got.Width() > 0) {
				t.Errorf("%s, %s: %+v, want %+v", k.name, x.name, x.got, want)
			}
		}
		if want := float64(level) / float64(d.Len()); got.LevelProbability != want {
			t.Errorf("%s: level flight in %g of the draws, want %g", k.name, got.LevelProbability, want)
		}
		if want := float64(at45) / float64(d.Len()); b.ProbabilityAt(45) != want {
			t.Errorf("%s: level flight at 45 m/s in %g of the draws, want %g", k.name, b.ProbabilityAt(45), want)
		}
		// In slices it is the same.
		if err := b.Start(&d, &c); err != nil {
			t.Fatal(err)
		}
		steps := 0
		for !b.Step(17) {
			steps++
		}
		var again Intervals
		if err := b.Intervals(&again); err != nil || again != got || steps < 7 {
			t.Errorf("%s: in %d slices it differs (%v)", k.name, steps, err)
		}
	}
}

// TestFlattenKeepsItsOrder: expand gives every figure back in the field that flatten took it from.
func TestFlattenKeepsItsOrder(t *testing.T) {
	var a perf.Answer
	n := 0.0
	next := func() float64 { n++; return n }
	for k := range a.Limits {
		a.Limits[k] = perf.Limit{Applies: true, TAS: perf.TAS(next()), CAS: perf.CAS(next()), IAS: perf.IAS(next()), Rate: next(), Gradient: next(), Ratio: next(),
			Sink: next(), LeastSinkTAS: perf.TAS(next()), PowerRequired: next(), ShaftPower: next(), Endurance: next(), Distance: next(), FuelFlow: next()}
	}
	a.Shortfall = next()
	a.Service = perf.Ceiling{Applies: true, PressureAltitude: next(), DensityAltitude: next(), TAS: perf.TAS(next())}
	a.Absolute = perf.Ceiling{Applies: true, PressureAltitude: next(), DensityAltitude: next(), TAS: perf.TAS(next())}
	a.Turn = perf.Turn{Applies: true, LoadFactor: next(), Bank: next(), Radius: next(), Rate: next(), TAS: perf.TAS(next())}
	a.Level = perf.Allowance{MassApplies: true, AltitudeApplies: true, Mass: next(), PressureAltitude: next(), DensityAltitude: next()}
	a.Climb = perf.Allowance{MassApplies: true, AltitudeApplies: true, Mass: next(), PressureAltitude: next(), DensityAltitude: next()}
	var b Bands
	flatten(&a, &b.row)
	if int(n) != figures {
		t.Fatalf("%g figures, %d columns", n, figures)
	}
	b.columns, b.length, b.done = make([]float64, figures), 1, 1
	for i, f := range b.row {
		b.columns[i] = f.x
		if f.ok {
			b.count[i] = 1
		}
	}
	var got Intervals
	b.expand(&got)
	check := func(name string, i Interval, want float64) {
		if i.Applies && i.Low != want {
			t.Errorf("%s: %g, want %g", name, i.Low, want)
		}
	}
	applied := 0
	for k := range a.Limits {
		l, i := &a.Limits[k], &got.Limits[k]
		for _, x := range []struct {
			i    Interval
			want float64
		}{{i.TAS, float64(l.TAS)}, {i.CAS, float64(l.CAS)}, {i.IAS, float64(l.IAS)}, {i.Rate, l.Rate}, {i.Gradient, l.Gradient}, {i.Ratio, l.Ratio}, {i.Sink, l.Sink},
			{i.LeastSinkTAS, float64(l.LeastSinkTAS)}, {i.PowerRequired, l.PowerRequired}, {i.ShaftPower, l.ShaftPower}, {i.Endurance, l.Endurance},
			{i.Distance, l.Distance}, {i.FuelFlow, l.FuelFlow}} {
			check("limit", x.i, x.want)
			if x.i.Applies {
				applied++
			}
		}
	}
	if applied < 11*int(perf.KeyCount) {
		t.Errorf("only %d figures of the limits came back", applied)
	}
	check("shortfall", got.Shortfall, a.Shortfall)
	check("service", got.Service.TAS, float64(a.Service.TAS))
	check("absolute", got.Absolute.PressureAltitude, a.Absolute.PressureAltitude)
	check("absolute", got.Absolute.TAS, float64(a.Absolute.TAS))
	check("turn", got.Turn.LoadFactor, a.Turn.LoadFactor)
	check("turn", got.Turn.TAS, float64(a.Turn.TAS))
	check("level", got.Level.DensityAltitude, a.Level.DensityAltitude)
	check("climb", got.Climb.Mass, a.Climb.Mass)
	check("climb", got.Climb.DensityAltitude, a.Climb.DensityAltitude)
	if !got.Climb.DensityAltitude.Applies || !got.Turn.TAS.Applies || !got.Shortfall.Applies {
		t.Error("the last figures did not come back")
	}
}

// TestDrawsAreAeroplanes: every draw is one that perf takes, however wide the beliefs, and their mean and spread are the posterior's.
func TestDrawsAreAeroplanes(t *testing.T) {
	for _, k := range kinds {
		for _, wide := range []float64{1, 15} {
			c, _ := campaign(5, k.kind, sparsePlan())
			b := &c.Beliefs
			b.ParasiteDrag, b.OswaldEfficiency, b.MaximumLift = b.ParasiteDrag*wide, b.OswaldEfficiency*wide, b.MaximumLift*wide
			b.Power, b.Propeller, b.PositionError = b.Power*wide, b.Propeller*wide, b.PositionError*wide
			if wide > 1 {
				c.Runs = nil
			}
			var e Estimator
			var p Posterior
			if err := e.Fit(&c, &p); err != nil {
				t.Fatal(err)
			}
			var d Draws
			d.Set(&p, DefaultDraws)
			mean, square := 0.0, 0.0
			for i := range d.Len() {
				if err := d.Aeroplane(i).Validate(); err != nil {
					t.Fatalf("%s, beliefs times %g, draw %d: %v", k.name, wide, i, err)
				}
				x := math.Log(d.Aeroplane(i).Polar.ParasiteDrag)
				mean += x / float64(d.Len())
				square += x * x / float64(d.Len())
			}
			if wide == 1 {
				q := p.Parameters[0]
				if math.Abs(mean-math.Log(q.Estimate)) > 0.03*q.SD/q.Estimate || math.Abs(math.Sqrt(square-mean*mean)/(q.SD/q.Estimate)-1) > 0.05 {
					t.Errorf("%s: cd0 is drawn about %.5f with a spread of %.2f of it, the posterior has %.5f and %.2f", k.name,
						math.Exp(mean), math.Sqrt(square-mean*mean), q.Estimate, q.SD/q.Estimate)
				}
			}
			var a perf.Aeroplane
			p.Aeroplane(&a)
			if err := a.Validate(); err != nil {
				t.Errorf("%s: the estimated aeroplane: %v", k.name, err)
			}
		}
	}
}

func TestBandsAllocateNothing(t *testing.T) {
	for _, k := range kinds {
		_, p := fitted(t, 4, k.kind, sparsePlan())
		var d Draws
		d.Set(&p, 64)
		var b Bands
		var got Intervals
		c := today()
		b.Ribbons([]perf.TAS{30, 40, 50})
		sum := 0.0
		if n := testing.AllocsPerRun(5, func() {
			c.Mass++
			if err := b.Solve(&d, &c, &got); err != nil {
				t.Fatal(err)
			}
			r, _ := b.Ribbon(1)
			sum += b.ProbabilityAt(40) + r.High
			d.Set(&p, 64)
		}); n != 0 || !(sum > 0) {
			t.Errorf("%s: %g allocations", k.name, n)
		}
	}
}

// TestWithoutRunsThePriorStands: the posterior is the prior, the estimated aeroplane the prior's, and the intervals those of the beliefs.
func TestWithoutRunsThePriorStands(t *testing.T) {
	for _, k := range kinds {
		c := priorCase(k.kind)
		var e Estimator
		var p Posterior
		if err := e.Fit(&c, &p); err != nil {
			t.Fatal(err)
		}
		if !p.Converged || p.Stop != NothingToFit || p.DegreesOfFreedom != 0 || p.ChiSquare != 0 || len(p.Indistinct) != 0 {
			t.Errorf("%s: %+v", k.name, p)
		}
		for _, q := range p.Parameters {
			if math.Abs(q.Estimate-q.Prior) > 1e-14*math.Abs(q.Prior) || math.Abs(q.SD-q.PriorSD) > 1e-12*q.PriorSD {
				t.Errorf("%s: %+v", k.name, q)
			}
		}
		if q := p.Parameters[p.Index("cd0")]; math.Abs(q.PriorSD-0.0034) > 1e-12 {
			t.Errorf("the believed spread of cd0 is %g", q.PriorSD)
		}
		var a perf.Aeroplane
		p.Aeroplane(&a)
		var z perf.Solver
		var got, want perf.Answer
		condition := today()
		if err := z.Solve(&a, &condition, &got); err != nil {
			t.Fatal(err)
		}
		if err := z.Solve(c.Prior, &condition, &want); err != nil {
			t.Fatal(err)
		}
		for i := range got.Limits {
			g, w := &got.Limits[i], &want.Limits[i]
			if math.Abs(float64(g.TAS-w.TAS)) > 1e-9 || math.Abs(float64(g.IAS-w.IAS)) > 1e-9 {
				t.Errorf("%s, limit %d: %+v, want %+v", k.name, i, g, w)
			}
		}
	}
}
