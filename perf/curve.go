package perf

// The curves of the prepared condition, for drawing and for other packages. Each takes any true airspeed: below slowestDrawn it counts as
// that, above highestSpeed as that. Before Prepare has succeeded they give 0.

// slowestDrawn keeps the curves finite at rest, m/s.
const slowestDrawn = 0.1

func drawn(v TAS) float64 { return max(speed(float64(v)), slowestDrawn) }

// Drag is the drag of level flight at v (lift = n W), N.
func (z *Solver) Drag(v TAS) float64 {
	if !z.ready {
		return 0
	}
	return finite(z.now.drag.at(drawn(v)))
}

// Thrust is the thrust at the condition's power fraction at v, N.
func (z *Solver) Thrust(v TAS) float64 {
	if !z.ready {
		return 0
	}
	return finite(z.now.thrust(drawn(v)))
}

// PowerRequired is the thrust power D V of level flight at v, W.
func (z *Solver) PowerRequired(v TAS) float64 { return z.Drag(v) * drawn(v) }

// PowerAvailable is the thrust power T V at the condition's power fraction at v, W.
func (z *Solver) PowerAvailable(v TAS) float64 { return z.Thrust(v) * drawn(v) }

// Gradient is (T - D)/W at v.
func (z *Solver) Gradient(v TAS) float64 {
	if !z.ready {
		return 0
	}
	return (z.Thrust(v) - z.Drag(v)) / z.now.weight
}

// ClimbRate is (T - D) V/W at v, m/s.
func (z *Solver) ClimbRate(v TAS) float64 { return z.Gradient(v) * drawn(v) }

// ShaftPowerRequired is the shaft power of level flight at v, throttle set for T = D, W.
func (z *Solver) ShaftPowerRequired(v TAS) float64 {
	if !z.ready {
		return 0
	}
	p, _, _ := z.now.levelAt(drawn(v))
	return finite(p)
}

// FuelFlow is what level flight at v draws, kg/s; electric: W.
func (z *Solver) FuelFlow(v TAS) float64 {
	if !z.ready {
		return 0
	}
	return z.a.Engine.Flow(z.ShaftPowerRequired(v))
}

// LevelSpeed is the rpm of level flight at v, throttle set for T = D, rev/s; 0 for propellers whose rpm is held by a governor.
func (z *Solver) LevelSpeed(v TAS) float64 {
	if !z.ready {
		return 0
	}
	_, _, n := z.now.levelAt(drawn(v))
	return finite(n)
}

// FullSpeed is the rpm at the condition's power fraction at v, rev/s; 0 for propellers whose rpm is held by a governor.
func (z *Solver) FullSpeed(v TAS) float64 {
	if !z.ready {
		return 0
	}
	return finite(z.now.revs(drawn(v)))
}

// StallSpeed is the stalling speed of the prepared condition.
func (z *Solver) StallSpeed() TAS {
	if !z.ready {
		return 0
	}
	return TAS(z.now.stall)
}
