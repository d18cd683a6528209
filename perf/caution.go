package perf

import "math"

// CautionCount is how many cautions there are.
const CautionCount = int(cautionCount)

var cautionNames = [cautionCount]struct{ code, text string }{
	CautionNoLevelFlight:         {"no-level-flight", "No level flight is possible in these conditions."},
	CautionNearCeiling:           {"near-absolute-ceiling", "Near the absolute ceiling: the slow and the fast end of level flight are close together."},
	CautionTurnNearStall:         {"turn-near-stall", "The tightest turn is flown below 1.2 times the stalling speed of that turn."},
	CautionAboveMaximumMass:      {"above-maximum-mass", "The mass is above the maximum mass."},
	CautionBelowEmptyMass:        {"below-empty-mass", "The mass is below the empty mass."},
	CautionPlacardTAS:            {"tas-placard", "At this height the never-exceed speed is that of the true-airspeed placard."},
	CautionMach:                  {"mach", "A speed is above Mach 0.5: the rise of drag there is not modelled."},
	CautionPropellerOutsideSpan:  {"propeller-outside-span", "A figure needs the propeller outside the span in which its model is good."},
	CautionOverspeed:             {"overspeed", "Full throttle at the climb speeds turns the propeller above the maximum rpm."},
	CautionSpeedAboveFlapPlacard: {"above-flap-placard", "A speed is above the flaps-extended speed of this configuration."},
	CautionConsumptionUnusual:    {"consumption-unusual", "The specific consumption is unusual: outside 0.35 to 0.65 lb per horsepower and hour."},
	CautionNotModelled:           {"not-modelled", "Carburettor, mixture and engine limits are not modelled."},
	CautionAdvisory:              {"advisory", "Advisory only: the approved flight manual, placards, licensed practice and local rules govern."},
	CautionClimbAboveNeverExceed: {"climb-above-never-exceed", "A climb speed is above the never-exceed speed: do not fly it."},
}

// Code is the caution as other programs see it, "near-absolute-ceiling"; "" for no Caution.
func (c Caution) Code() string {
	if c >= cautionCount {
		return ""
	}
	return cautionNames[c].code
}

// Text is one sentence for a person.
func (c Caution) Text() string {
	if c >= cautionCount {
		return ""
	}
	return cautionNames[c].text
}

// Bounds of the cautions.
const (
	ceilingMargin          = 300.0                         // m, about 1000 ft below the absolute ceiling
	bandRatio              = 1.2                           // fast end over slow end below which they are close
	turnMargin             = 1.2                           // times the stall of the turn
	machBound              = 0.5                           // of the speed of sound
	lowConsumption         = 0.35 * poundPerHorsepowerHour // kg/J
	highConsumption        = 0.65 * poundPerHorsepowerHour
	lowAdvance             = 0.6 // of the advance ratio of best efficiency: where the linear propeller polar is good
	highAdvance            = 1.1
	rounding               = 1e-9
	poundPerHorsepowerHour = Pound / (Horsepower * Hour)
)

func (z *Solver) cautions(a *Answer, s span, turnStall float64) {
	c := &a.Cautions
	level := a.Outcome == LevelFlight
	c[CautionNoLevelFlight] = !level
	c[CautionNotModelled], c[CautionAdvisory] = true, true
	c[CautionAboveMaximumMass] = z.c.Mass > z.a.MaximumMass
	c[CautionBelowEmptyMass] = z.c.Mass < z.a.EmptyMass
	if level {
		h := z.c.Air.PressureAltitude
		near := a.Absolute.Applies && h > a.Absolute.PressureAltitude-ceilingMargin
		c[CautionNearCeiling] = near || s.fast < bandRatio*s.slow
	}
	if a.Turn.Applies {
		c[CautionTurnNearStall] = float64(a.Turn.TAS) < turnMargin*turnStall*math.Sqrt(a.Turn.LoadFactor)
	}
	z.speedCautions(a)
	z.propellerCautions(a, s)
	c[CautionConsumptionUnusual] = z.unusualConsumption()
}

func (z *Solver) speedCautions(a *Answer) {
	c := &a.Cautions
	p := &z.a.Placards
	flaps := z.c.Configuration > 0 && p.FlapsExtendedCAS > 0 &&
		z.a.Configurations[z.c.Configuration].MaximumLift > z.a.Configurations[0].MaximumLift
	for k := range a.Limits {
		l := &a.Limits[k]
		if !l.Applies {
			continue
		}
		if float64(l.TAS) > machBound*z.c.Air.SpeedOfSound {
			c[CautionMach] = true
		}
		if flaps && Key(k) != NeverExceed && Key(k) != Manoeuvring && l.CAS > p.FlapsExtendedCAS {
			c[CautionSpeedAboveFlapPlacard] = true
		}
	}
	if n := &a.Limits[NeverExceed]; n.Applies && a.Outcome == LevelFlight {
		c[CautionClimbAboveNeverExceed] = max(z.vx, z.vy) > z.neverExceed
		c[CautionPlacardTAS] = z.tasBinds
	} else if n.Applies {
		c[CautionPlacardTAS] = z.tasBinds
	}
}

func (z *Solver) propellerCautions(a *Answer, s span) {
	f := &z.now
	if a.Outcome != LevelFlight || f.kind != FixedPitch && f.kind != Tabulated {
		return
	}
	c := &a.Cautions
	limit := z.a.Engine.MaximumSpeed
	nx, ny := f.revs(z.vx), f.revs(z.vy)
	if limit > 0 && max(nx, ny) > limit*(1+rounding) {
		c[CautionOverspeed] = true
	}
	z.advance(c, z.vx, nx)
	z.advance(c, z.vy, ny)
	if s.bySlow != SetByLift {
		_, _, n := f.levelAt(s.slow)
		z.advance(c, s.slow, n)
	}
	for _, k := range [...]Key{LeastPower, BestRange, Carson, FastestLevel} {
		if a.Limits[k].Applies {
			z.advance(c, float64(a.Limits[k].TAS), z.levelRevs[k])
		}
	}
}

// advance sets the caution where speed v at n rev/s is outside the propeller's span.
func (z *Solver) advance(c *[cautionCount]bool, v, n float64) {
	if !(n > 0) {
		return
	}
	j := v / (n * z.k.diameter)
	if j < z.lowJ*(1-rounding) || j > z.highJ*(1+rounding) {
		c[CautionPropellerOutsideSpan] = true
	}
}

func (z *Solver) unusualConsumption() bool {
	e := &z.a.Engine
	if e.Kind == Electric {
		return false
	}
	if len(e.ConsumptionTable) == 0 {
		return unusual(e.SpecificConsumption)
	}
	for i := range e.ConsumptionTable {
		if unusual(e.ConsumptionTable[i].SpecificConsumption) {
			return true
		}
	}
	return false
}

func unusual(c float64) bool { return c != 0 && (c < lowConsumption || c > highConsumption) }
