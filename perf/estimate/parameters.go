package estimate

import (
	"math"

	"levelspan/perf"
)

// ParameterKind is what an unknown is.
type ParameterKind uint8

// The unknowns, in the order in which they are listed. PowerScale multiplies the engine's rated power (with it the full-throttle power and the
// torque); a tabulated propeller has no number of its own and is left to it.
const (
	ParasiteDrag ParameterKind = iota
	OswaldEfficiency
	MaximumLift // one a configuration
	PowerScale
	PropellerEfficiency
	BladeEfficiency
	PolarSlope
	PolarIntercept
	PowerCoefficientStatic
	PowerCoefficientSlope
	PropellerDragArea // m^2, one a propeller state that some glide has
	PositionOffset    // m/s
	PositionSlope
	parameterKinds
)

// kindTexts are the contract's name and the words for a person.
var kindTexts = [parameterKinds]struct{ name, words string }{
	{"cd0", "parasite drag"},
	{"oswald_e", "induced drag (Oswald efficiency)"},
	{"cl_max", "greatest lift"},
	{"power_scale", "full-throttle power"},
	{"efficiency", "propeller efficiency"},
	{"blade_efficiency", "blade efficiency"},
	{"polar_slope", "the propeller's thrust per torque"},
	{"polar_intercept", "the propeller's V^2 loss"},
	{"power_coefficient_static", "the propeller's static power coefficient"},
	{"power_coefficient_slope", "the fall of its power coefficient with speed"},
	{"propeller_drag_area_m2", "drag of the propeller"},
	{"position_offset_mps", "position error, constant part"},
	{"position_slope", "position error, part that grows with speed"},
}

// Parameter is one unknown with what was believed and what is known now.
type Parameter struct {
	Kind     ParameterKind
	Index    int    // configuration of MaximumLift, PropellerState of PropellerDragArea; else 0
	Name     string // as in the contract
	Words    string // for a person
	Prior    float64
	PriorSD  float64
	Estimate float64
	SD       float64
}

// unknown is a parameter as the fit sees it: x is the value, or the logarithm of its magnitude, and x = center + spread u with u standard
// normal before flight.
type unknown struct {
	kind   ParameterKind
	index  int
	log    bool
	sign   float64
	center float64
	spread float64
	low    float64 // bounds of x
	high   float64
}

// value is the parameter at x.
func (k *unknown) value(x float64) float64 {
	if k.log {
		return k.sign * math.Exp(x)
	}
	return x
}

// sd is the standard deviation of the parameter where that of x is s.
func (k *unknown) sd(x, s float64) float64 {
	if k.log {
		return math.Exp(x) * math.Sqrt(math.Expm1(math.Min(s*s, 100)))
	}
	return s
}

// at is x for u, held to the bounds.
func (k *unknown) at(u float64) float64 { return min(max(k.center+k.spread*u, k.low), k.high) }

// dragAreaBelief is the relative standard deviation of a propeller's drag area before flight. The belief is normal, above 0: the area is so wide a guess
// that the logarithm, in which no residual is linear, would make the posterior skew.
const dragAreaBelief = 0.5

// The position error is CAS - IAS = table + offset + slope (IAS - V0), V0 twice the prior's stalling speed at maximum mass, in the first configuration
// and standard sea-level air; the slope is held beyond V0/4 and 4 V0. Before flight the offset has the believed spread, and the slope that
// which gives as much again at rest and at 2 V0.
const (
	lowestShare  = 0.25
	highestShare = 4
	offsetShare  = 0.12 // of V0: the bound of the offset
	slopeBound   = 0.12
)

// layout is what the unknowns of a case are, and the aeroplane that they are unknowns of.
type layout struct {
	prior     *perf.Aeroplane
	list      []unknown
	reference float64 // V0
}

// set lists the unknowns of a case.
func (l *layout) set(c *Case) {
	a := c.Prior
	l.prior = a
	l.list = l.list[:0]
	b := &c.Beliefs
	rise := 0.0
	for i := range a.Configurations {
		rise = min(rise, a.Configurations[i].ParasiteDragRise)
	}
	q := perf.QuantityParasiteDrag.Domain()
	l.positive(ParasiteDrag, 0, a.Polar.ParasiteDrag, b.ParasiteDrag, q.Min-rise, q.Max)
	l.domain(OswaldEfficiency, a.Polar.OswaldEfficiency, b.OswaldEfficiency, perf.QuantityOswaldEfficiency)
	q = perf.QuantityMaximumLift.Domain()
	for i := range a.Configurations {
		l.positive(MaximumLift, i, a.Configurations[i].MaximumLift, b.MaximumLift, max(q.Min, a.Polar.LiftOfLeastDrag+1e-3), q.Max)
	}
	q = perf.QuantityRatedPower.Domain()
	low, high := q.Min/a.Engine.RatedPower, q.Max/a.Engine.RatedPower
	if t := a.Engine.ThermalPower; t > 0 {
		q = perf.QuantityThermalPower.Domain()
		low, high = max(low, q.Min/t), min(high, q.Max/t)
	}
	l.positive(PowerScale, 0, 1, b.Power, low, high)
	p := &a.Propeller
	switch p.Kind {
	case perf.ConstantEfficiency:
		l.domain(PropellerEfficiency, p.Efficiency, b.Propeller, perf.QuantityPropellerEfficiency)
	case perf.ConstantSpeed:
		l.domain(BladeEfficiency, p.BladeEfficiency, b.Propeller, perf.QuantityBladeEfficiency)
	case perf.FixedPitch:
		l.domain(PolarSlope, p.PolarSlope, b.Propeller, perf.QuantityPolarSlope)
		l.domain(PolarIntercept, p.PolarIntercept, b.Propeller, perf.QuantityPolarIntercept)
		l.domain(PowerCoefficientStatic, p.PowerCoefficientStatic, b.Propeller, perf.QuantityPowerCoefficientStatic)
		if p.PowerCoefficientSlope < 0 {
			l.positive(PowerCoefficientSlope, 0, p.PowerCoefficientSlope, b.Propeller, 1e-12, -perf.QuantityPowerCoefficientSlope.Domain().Min)
		}
	}
	stopped, windmilling, feathered := a.PropellerDragArea()
	area := [stateCount]float64{Stopped: stopped, Windmilling: windmilling, Feathered: feathered}
	var seen [stateCount]bool
	for i := range c.Runs {
		if r := &c.Runs[i]; r.Kind == Glide && r.Propeller < stateCount {
			seen[r.Propeller] = true
		}
	}
	for s := Stopped; s < stateCount; s++ {
		if seen[s] {
			l.add(unknown{kind: PropellerDragArea, index: int(s), center: area[s], spread: dragAreaBelief * area[s], low: area[s] / 100, high: area[s] * 100})
		}
	}
	l.reference = referenceSpeed(a)
	l.add(unknown{kind: PositionOffset, spread: b.PositionError, low: -offsetShare * l.reference, high: offsetShare * l.reference})
	l.add(unknown{kind: PositionSlope, spread: b.PositionError / l.reference, low: -slopeBound, high: slopeBound})
}

// referenceSpeed is V0.
func referenceSpeed(a *perf.Aeroplane) float64 {
	k := &a.Configurations[0]
	v := 2 * math.Sqrt(2*a.MaximumMass*perf.StandardGravity/(perf.SeaLevelDensity*a.WingArea*k.MaximumLift))
	return min(max(v, 8), 140)
}

func (l *layout) domain(kind ParameterKind, prior, relative float64, q perf.Quantity) {
	d := q.Domain()
	low, high := d.Min, d.Max
	if prior < 0 {
		low, high = -d.Max, -d.Min
	}
	l.positive(kind, 0, prior, relative, low, high)
}

// positive adds an unknown of one sign; low and high bound its magnitude.
func (l *layout) positive(kind ParameterKind, index int, prior, relative, low, high float64) {
	k := unknown{kind: kind, index: index, log: true, sign: 1}
	if prior < 0 {
		k.sign = -1
	}
	k.center = math.Log(math.Abs(prior))
	k.spread = math.Sqrt(math.Log1p(relative * relative)) // the log-normal of that relative standard deviation
	const inside = 1e-12                                  // so that the exponential's rounding does not leave the domain
	k.low, k.high = math.Log(max(low, 1e-300))+inside, math.Log(high)-inside
	l.list = append(l.list, k)
}

func (l *layout) add(k unknown) { l.list = append(l.list, k) }

// name is the contract's name of unknown i.
func (l *layout) name(i int) (name, words string) {
	k := &l.list[i]
	name, words = kindTexts[k.kind].name, kindTexts[k.kind].words
	switch k.kind {
	case MaximumLift:
		c := l.prior.Configurations[k.index].Name
		return name + "." + c, words + ", " + c
	case PropellerDragArea:
		s := PropellerState(k.index).String()
		return name + "." + s, words + ", " + s
	}
	return name, words
}

// craft is an aeroplane with one set of values of the unknowns, for the residuals. Its configurations keep the prior's calibration; the
// rest of the position error stands beside it.
type craft struct {
	a         perf.Aeroplane
	area      [stateCount]float64
	offset    float64
	slope     float64
	reference float64
}

// start readies c for apply.
func (c *craft) start(l *layout) {
	own := c.a.Configurations
	c.a = *l.prior
	c.a.Configurations = append(own[:0], l.prior.Configurations...)
	c.area = [stateCount]float64{}
	c.offset, c.slope, c.reference = 0, 0, l.reference
}

// apply sets the unknowns to x.
func (c *craft) apply(l *layout, x []float64) {
	for i := range l.list {
		k := &l.list[i]
		c.put(l, k, k.value(x[i]))
	}
}

func (c *craft) put(l *layout, k *unknown, v float64) {
	a := &c.a
	switch k.kind {
	case ParasiteDrag:
		a.Polar.ParasiteDrag = v
	case OswaldEfficiency:
		a.Polar.OswaldEfficiency = v
	case MaximumLift:
		a.Configurations[k.index].MaximumLift = v
	case PowerScale:
		a.Engine.RatedPower = v * l.prior.Engine.RatedPower
		a.Engine.ThermalPower = v * l.prior.Engine.ThermalPower
	case PropellerEfficiency:
		a.Propeller.Efficiency = v
	case BladeEfficiency:
		a.Propeller.BladeEfficiency = v
	case PolarSlope:
		a.Propeller.PolarSlope = v
	case PolarIntercept:
		a.Propeller.PolarIntercept = v
	case PowerCoefficientStatic:
		a.Propeller.PowerCoefficientStatic = v
	case PowerCoefficientSlope:
		a.Propeller.PowerCoefficientSlope = v
	case PropellerDragArea:
		c.area[k.index] = v
	case PositionOffset:
		c.offset = v
	case PositionSlope:
		c.slope = v
	}
}

// held is an indicated airspeed inside the stretch over which the slope counts.
func held(v, reference float64) float64 {
	return min(max(v, lowestShare*reference), highestHeld(reference))
}

// highestHeld is the end of that stretch: no more than an airspeed indicator shows.
func highestHeld(reference float64) float64 {
	return min(highestShare*reference, perf.QuantityPositionErrorIAS.Domain().Max)
}

// cas is the calibrated airspeed of a reading.
func (c *craft) cas(configuration int, v float64) float64 {
	table := float64(c.a.Configurations[configuration].CASFromIAS(perf.IAS(v)))
	return max(table+c.offset+c.slope*(held(v, c.reference)-c.reference), 0)
}
