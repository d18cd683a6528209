package casefile

import (
	"levelspan/perf"
	"levelspan/perf/estimate"
)

// Estimate gives what the estimate is made from: the aeroplane as the prior, what is believed of it, the instruments and the
// runs, all SI. It fails only where Validate would.
func (c *Case) Estimate() (estimate.Case, error) {
	prior, _, err := c.Model()
	if err != nil {
		return estimate.Case{}, err
	}
	b, n := &c.Beliefs, &c.Instruments
	e := estimate.Case{
		Prior: &prior,
		Beliefs: estimate.Beliefs{ParasiteDrag: b.CD0, OswaldEfficiency: b.OswaldE, MaximumLift: b.CLMax, Power: b.Power,
			Propeller: b.Propeller, PositionError: b.PositionErrorMps},
		Instruments: estimate.Instruments{IAS: n.IASMps, Rate: n.RateMps, Power: n.Power, RevolutionRate: n.RPM * perf.RevPerMin,
			Mass: n.Mass, Temperature: n.TemperatureC, Altitude: n.AltitudeM},
		Runs: make([]estimate.Run, len(c.Runs)),
	}
	for i := range c.Runs {
		e.Runs[i] = c.Runs[i].model(c)
	}
	return e, nil
}

// runKinds and propellerStates are the file's words for the estimate's.
var (
	runKinds = map[string]estimate.Kind{LevelRun: estimate.Level, ClimbRun: estimate.Climb, GlideRun: estimate.Glide,
		StallRun: estimate.Stall, GPSRun: estimate.GPSLegs}
	propellerStates = map[string]estimate.PropellerState{Stopped: estimate.Stopped, Windmilling: estimate.Windmilling, Feathered: estimate.Feathered}
)

// model is one run of a sound case. Air that the model does not know leaves the run without air: the estimate says so.
func (r *Run) model(c *Case) estimate.Run {
	m := estimate.Run{Kind: runKinds[r.Kind], Configuration: max(0, c.configuration(r.Configuration)), IAS: perf.IAS(r.IASMps), Mass: r.MassKg,
		Rate: orZero(r.RateMps), Propeller: propellerStates[r.Propeller], LeftOut: r.LeftOut}
	if air, err := perf.AirAt(r.PressureAltitudeM, within(perf.QuantityTemperature, r.OutsideAirTemperatureC+perf.ZeroCelsius), 0); err == nil {
		m.Air = air
	}
	if r.PowerFraction != nil {
		m.HasSetting, m.Setting = true, *r.PowerFraction
	}
	if r.RPM != nil {
		m.RevolutionRate = *r.RPM * perf.RevPerMin
	}
	for _, l := range r.Legs {
		m.Legs = append(m.Legs, estimate.Leg{GroundSpeed: l.GroundSpeedMps, Track: l.TrackDeg * perf.Degree})
	}
	return m
}
