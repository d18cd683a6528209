package app

import (
	"math"
	"reflect"

	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/report"
	"levelspan/perf/estimate"
)

// curvePoints is how many points a drawn power curve has.
const curvePoints = 140

// solved is what the model says of the case on the screen, and the curves that are drawn of it.
type solved struct {
	solver    perf.Solver
	aero      perf.Aeroplane
	cond      perf.Condition
	answer    perf.Answer
	revision  uint64 // of the document that answer belongs to; 0: none yet
	estimated estimated
	count     int    // solves of today's condition since the start; a test reads it
	fault     string // why the last solve was refused, "" when it was not; answer is then the last good one

	curveRevision uint64
	curveKind     string
	curveRange    span
	speed         [curvePoints]float64 // in the chosen kind, m/s
	required      [curvePoints]float64 // W
	available     [curvePoints]float64 // W
}

// span is a closed range of one quantity.
type span struct{ lo, hi float64 }

func (s span) width() float64          { return s.hi - s.lo }
func (s span) clamp(x float64) float64 { return math.Min(math.Max(x, s.lo), s.hi) }

// refresh solves the document when it has changed since the last solve, once.
func (s *solved) refresh(d *document) {
	if s.revision == d.revision {
		return
	}
	s.revision = d.revision
	aero, cond, err := d.current.Model()
	if err != nil {
		s.fault = err.Error()
		return
	}
	if !s.estimated.refresh(d) {
		s.fault = "the estimate from the runs cannot be made: " + s.estimated.fault
		return
	}
	if s.estimated.holds {
		aero = s.estimated.aero
	}
	var answer perf.Answer
	s.count++
	if err := s.solver.Solve(&aero, &cond, &answer); err != nil {
		s.fault = err.Error()
		return
	}
	s.fault = ""
	s.aero, s.cond, s.answer = aero, cond, answer
	draws := estimate.DefaultDraws
	if d.current != d.committed {
		draws = dragDraws
	}
	s.estimated.span(&s.cond, draws)
}

// dragDraws is how many of the draws make the intervals under a moving finger, always the same first ones; all of them
// follow when it lifts.
const dragDraws = 64

// estimated is what the runs make of the aeroplane: fitted anew when anything but today's mass and air has changed, and the
// intervals of every figure of today.
type estimated struct {
	fitter    estimate.Estimator
	posterior estimate.Posterior
	draws     estimate.Draws
	bands     estimate.Bands
	intervals estimate.Intervals
	aero      perf.Aeroplane
	shape     uint64         // of the document that it belongs to; 0: none yet
	of        *casefile.Case // that it was fitted to; nil: none yet
	holds     bool           // the fit converged: aero and intervals count
	basis     string         // what the numbers come from, in a sentence
	fault     string
	fits      int // since the start; a test reads it
}

// refresh fits when the document's shape has changed, and with it what the estimate is made from; false: it cannot be made,
// and fault says why.
func (e *estimated) refresh(d *document) bool {
	if e.shape == d.shape {
		return e.fault == ""
	}
	e.shape = d.shape
	if e.of != nil && e.fault == "" && sameEstimate(e.of, d.current) {
		return true
	}
	e.of, e.holds, e.fault = d.committed, false, ""
	c, err := d.current.Estimate()
	e.fits++
	if err == nil {
		err = e.fitter.Fit(&c, &e.posterior)
	}
	if err != nil {
		e.fault = err.Error()
		return false
	}
	e.basis = report.Basis(&e.posterior)
	if e.posterior.Converged {
		e.posterior.Aeroplane(&e.aero)
		e.draws.Set(&e.posterior, estimate.DefaultDraws)
		e.holds = true
	}
	return true
}

// sameEstimate reports whether two cases give the same estimate for certain: all but the aeroplane's name and note, today and
// the display is equal. Committed cases share the runs that an edit leaves alone.
func sameEstimate(a, b *casefile.Case) bool {
	if len(a.Runs) != len(b.Runs) || len(a.Runs) > 0 && &a.Runs[0] != &b.Runs[0] || a.Beliefs != b.Beliefs || a.Instruments != b.Instruments {
		return false
	}
	x, y := a.Aeroplane, b.Aeroplane
	x.Name, x.Note, y.Name, y.Note = "", "", "", ""
	return reflect.DeepEqual(&x, &y)
}

// span solves so many of the draws for a condition.
func (e *estimated) span(c *perf.Condition, draws int) {
	if !e.holds {
		return
	}
	err := e.bands.Start(&e.draws, c)
	if err == nil {
		e.bands.Step(draws)
		err = e.bands.Intervals(&e.intervals)
	}
	if err != nil {
		e.intervals = estimate.Intervals{}
	}
}

// interval is that of a limit's speed in the chosen kind, m/s; false where it has none.
func (e *estimated) interval(k perf.Key, kind string) (span, bool) {
	if !e.holds || report.Placarded(k) {
		return span{}, false
	}
	l := &e.intervals.Limits[k]
	i := l.CAS
	switch kind {
	case "TAS":
		i = l.TAS
	case "IAS":
		i = l.IAS
	}
	return span{i.Low, i.High}, i.Applies
}

// config is the configuration that today is flown in.
func (s *solved) config() *perf.Configuration { return &s.aero.Configurations[s.cond.Configuration] }

// inKind gives a limit's speed in the chosen kind, m/s.
func inKind(l *perf.Limit, kind string) float64 {
	switch kind {
	case "TAS":
		return float64(l.TAS)
	case "IAS":
		return float64(l.IAS)
	}
	return float64(l.CAS)
}

// kindFromTAS turns a true airspeed into the chosen kind under the solved condition.
func (s *solved) kindFromTAS(v perf.TAS, kind string) float64 {
	return speedFromTAS(s.cond.Air, s.config(), v, kind)
}

// tasFromKind is the inverse of kindFromTAS.
func (s *solved) tasFromKind(v float64, kind string) perf.TAS {
	switch kind {
	case "TAS":
		return perf.TAS(v)
	case "IAS":
		return s.cond.Air.TASFromCAS(s.config().CASFromIAS(perf.IAS(v)))
	}
	return s.cond.Air.TASFromCAS(perf.CAS(v))
}

func speedFromTAS(air perf.Air, config *perf.Configuration, v perf.TAS, kind string) float64 {
	switch kind {
	case "TAS":
		return float64(v)
	case "IAS":
		return float64(config.IASFromCAS(air.CASFromTAS(v)))
	}
	return float64(air.CASFromTAS(v))
}

// sampleCurves fills the curves over a range of speeds in the chosen kind. Nothing is done when they are up to date.
func (s *solved) sampleCurves(kind string, over span) {
	if s.curveRevision == s.revision && s.curveKind == kind && s.curveRange == over {
		return
	}
	s.curveRevision, s.curveKind, s.curveRange = s.revision, kind, over
	if err := s.solver.Prepare(&s.aero, &s.cond); err != nil {
		for i := range s.speed {
			s.speed[i], s.required[i], s.available[i] = math.NaN(), math.NaN(), math.NaN()
		}
		return
	}
	for i := range s.speed {
		v := over.lo + over.width()*float64(i)/(curvePoints-1)
		tas := s.tasFromKind(v, kind)
		s.speed[i] = v
		s.required[i] = s.solver.PowerRequired(tas)
		s.available[i] = s.solver.PowerAvailable(tas)
	}
}

// ranges are what the axes and rails span. They depend on the aeroplane, on the chosen kind of speed, and on values of today
// that lie outside, never on a drag inside them: so no scale moves under a finger.
type ranges struct {
	shape    uint64
	kind     string
	config   string
	speed    span // m/s in the chosen kind
	power    span // W
	altitude span // density altitude, m
	mass     span // kg
}

// lowestAltitude and leastTopAltitude bound the density-altitude rail, m.
const (
	lowestAltitude   = -2000 * perf.Foot
	leastTopAltitude = 16000 * perf.Foot
	highestAltitude  = 19000.0
)

// refresh recomputes the ranges when the aeroplane, the configuration or the kind of speed has changed.
func (r *ranges) refresh(d *document, kind string, scratch *perf.Solver) {
	c := d.current
	if r.shape == d.shape && r.kind == kind && r.config == c.Today.Configuration {
		return
	}
	aero, cond, err := c.Model()
	if err != nil {
		return
	}
	r.shape, r.kind, r.config = d.shape, kind, c.Today.Configuration
	r.mass = massRange(c)
	cond.Bank, cond.PowerFraction, cond.Headwind, cond.ClimbGradient = 0, 1, 0, 0
	r.altitude = altitudeRange(&aero, cond, scratch, c)
	r.speed, r.power = curveRanges(&aero, cond, scratch, kind, r.altitude)
	r.power.hi = math.Max(r.power.hi, 1.6*mostRequired(&aero, cond, scratch, r.mass, r.altitude))
}

func massRange(c *casefile.Case) span {
	empty, most := c.Aeroplane.EmptyMassKg, c.Aeroplane.MaximumMassKg
	room := math.Max(most-empty, 0.05*most)
	s := span{math.Max(empty-0.04*room, 5), most + 0.12*room}
	s.lo = math.Min(s.lo, c.Today.MassKg)
	s.hi = math.Max(s.hi, c.Today.MassKg)
	return s
}

func altitudeRange(aero *perf.Aeroplane, cond perf.Condition, scratch *perf.Solver, c *casefile.Case) span {
	s := span{lowestAltitude, leastTopAltitude}
	cond.Mass = (aero.EmptyMass + 2*aero.MaximumMass) / 3
	if air, err := perf.AirAtDensityAltitude(0); err == nil {
		cond.Air = air
		var answer perf.Answer
		if scratch.Solve(aero, &cond, &answer) == nil && answer.Absolute.Applies {
			s.hi = math.Max(s.hi, answer.Absolute.DensityAltitude*1.06)
		}
	}
	if air, err := airOf(c); err == nil {
		s.lo = math.Min(s.lo, air.DensityAltitude)
		s.hi = math.Max(s.hi, air.DensityAltitude)
	}
	s.hi = math.Min(math.Ceil(s.hi/(1000*perf.Foot)-1e-6)*1000*perf.Foot, highestAltitude)
	s.lo = math.Floor(s.lo/(1000*perf.Foot)+1e-6) * 1000 * perf.Foot
	return s
}

// curveRanges looks at the aeroplane light and heavy, low and high, and spans what is worth seeing of it.
func curveRanges(aero *perf.Aeroplane, cond perf.Condition, scratch *perf.Solver, kind string, altitude span) (speed, power span) {
	slow, fast, most := math.Inf(1), 0.0, 0.0
	config := &aero.Configurations[cond.Configuration]
	var answer perf.Answer
	for _, height := range [...]float64{0, 0.6 * altitude.hi} {
		air, err := perf.AirAtDensityAltitude(height)
		if err != nil {
			continue
		}
		cond.Air = air
		for _, mass := range [...]float64{aero.EmptyMass, aero.MaximumMass} {
			cond.Mass = mass
			if scratch.Solve(aero, &cond, &answer) != nil {
				continue
			}
			stall := &answer.Limits[perf.Stall]
			if !stall.Applies {
				continue
			}
			slow = math.Min(slow, inKind(stall, kind))
			top := speedFromTAS(air, config, 2.6*stall.TAS, kind)
			if l := &answer.Limits[perf.FastestLevel]; l.Applies {
				top = inKind(l, kind) * 1.12
				most = math.Max(most, scratchPower(scratch, aero, &cond, l.TAS))
			}
			if l := &answer.Limits[perf.NeverExceed]; l.Applies {
				top = math.Max(top, math.Min(inKind(l, kind)*1.03, top*1.25))
			}
			fast = math.Max(fast, top)
			if scratch.Prepare(aero, &cond) == nil {
				for i := 0; i < 12; i++ {
					v := perf.TAS(float64(stall.TAS) * (1 + 0.15*float64(i)))
					if p := scratch.PowerAvailable(v); p > most && !math.IsInf(p, 0) {
						most = p
					}
				}
				if p := scratch.PowerRequired(1.15 * stall.TAS); 1.2*p > most && !math.IsInf(p, 0) {
					most = 1.2 * p
				}
			}
		}
	}
	if math.IsInf(slow, 1) || fast <= slow {
		slow, fast = 20, 70
	}
	if most <= 0 {
		most = 1.1 * aero.Engine.RatedPower
	}
	return span{0.72 * slow, fast}, span{0, most * 1.08}
}

// mostRequired is what slow level flight takes at the far end of both rails: where none is possible, the curve of power
// required is still to be seen.
func mostRequired(aero *perf.Aeroplane, cond perf.Condition, scratch *perf.Solver, mass, altitude span) float64 {
	air, err := perf.AirAtDensityAltitude(0.9 * altitude.hi)
	if err != nil {
		return 0
	}
	cond.Air, cond.Mass = air, mass.hi
	var answer perf.Answer
	if scratch.Solve(aero, &cond, &answer) != nil || !answer.Limits[perf.Stall].Applies || scratch.Prepare(aero, &cond) != nil {
		return 0
	}
	p := scratch.PowerRequired(1.15 * answer.Limits[perf.Stall].TAS)
	if math.IsNaN(p) || math.IsInf(p, 0) {
		return 0
	}
	return p
}

func scratchPower(s *perf.Solver, aero *perf.Aeroplane, cond *perf.Condition, v perf.TAS) float64 {
	if s.Prepare(aero, cond) != nil {
		return 0
	}
	return s.PowerAvailable(v)
}
