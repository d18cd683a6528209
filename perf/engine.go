package perf

import "math"

// fullPower is the fraction of rated power that the air allows at full throttle, at least 0. For a piston engine without
// a turbocharger it exceeds 1 in air denser than the standard sea level's.
//
// Source: R. F. Gagg and E. V. Farrar, Altitude performance of aircraft engines equipped with gear-driven
// superchargers, SAE Transactions 29 (1934) 217 (citation from memory): phi = (sigma - c)/(1 - c). The square root of the temperature ratio
// is common practice of engine charts.
func (e *Engine) fullPower(s *sky) float64 {
	switch e.Kind {
	case Electric:
		return 1
	case Turboprop:
		thermal := e.ThermalPower
		if thermal == 0 {
			thermal = e.RatedPower
		}
		sigma := s.density / SeaLevelDensity
		return min(1, thermal/e.RatedPower*math.Exp(e.LapseExponent*math.Log(sigma)))
	}
	c := e.DropOffConstant
	sigma := s.stdSigma
	scale := 1.0
	if e.Law == DensityAltitudeLaw {
		sigma = s.density / SeaLevelDensity
	} else {
		scale = math.Sqrt(s.stdTemp / s.temperature)
	}
	if e.FullThrottleAltitude > 0 {
		t, p := standard(e.FullThrottleAltitude)
		sigma /= p / SeaLevelPressure * SeaLevelTemperature / t
		return min(1, max(0, (sigma-c)/(1-c)*scale))
	}
	return max(0, (sigma-c)/(1-c)*scale)
}

// FullPower is the shaft power at full throttle in an air, W: rated power times what the air allows, at least 0. A piston engine
// without a turbocharger gives more than rated power in air denser than the standard sea level's.
func (e *Engine) FullPower(a *Air) float64 {
	ts, p := standard(a.PressureAltitude)
	s := sky{height: a.PressureAltitude, temperature: a.Temperature, density: a.Density, pressure: p,
		stdTemp: ts, stdSigma: p / SeaLevelPressure * SeaLevelTemperature / ts}
	return finite(e.RatedPower * e.fullPower(&s))
}

// Flow is what a shaft power (W) draws: kg/s of fuel, or W for an electric engine; a consumption table is linear in the fraction of
// rated power, held beyond its ends.
func (e *Engine) Flow(shaftPower float64) float64 {
	flow, _, _ := e.flow(shaftPower)
	return flow
}

// flow is Flow with its slope against shaft power, and the interval of the table.
func (e *Engine) flow(p float64) (flow, slope float64, piece int) {
	if e.Kind == Electric {
		return p, 1, 0
	}
	t := e.ConsumptionTable
	n := len(t)
	if n == 0 {
		return e.SpecificConsumption * p, e.SpecificConsumption, 0
	}
	x := p / e.RatedPower
	for piece < n && x >= t[piece].PowerFraction {
		piece++
	}
	switch piece {
	case 0:
		return t[0].SpecificConsumption * p, t[0].SpecificConsumption, 0
	case n:
		return t[n-1].SpecificConsumption * p, t[n-1].SpecificConsumption, n
	}
	a, b := t[piece-1], t[piece]
	s1 := (b.SpecificConsumption - a.SpecificConsumption) / (b.PowerFraction - a.PowerFraction)
	s := a.SpecificConsumption + s1*(x-a.PowerFraction)
	return s * p, s + s1*x, piece
}
