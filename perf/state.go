package perf

// State is one moment of steady flight at load factor 1, for comparing the model with what was flown. All figures SI.
type State struct {
	TAS           TAS
	Air           Air
	Mass          float64 // kg
	Configuration int
	PowerOff      bool    // no thrust; PowerFraction and Revolutions do not count then
	PowerFraction float64 // as in Condition; counts where Revolutions is 0
	Revolutions   float64 // rev/s as read, of a FixedPitch or Tabulated propeller; 0: none
	DragArea      float64 // m^2, added to S CD: a propeller that is stopped, windmilling or feathered
}

// Evaluator evaluates single states of flight, without limits or searches. It allocates nothing once it has seen a propeller table of that
// length, and is not safe for concurrent use. The zero value is ready.
//
// It checks nothing: aeroplane and state are to be those that Validate and AirAt have passed, or close to them. Whatever it is given, it
// answers with a finite number.
type Evaluator struct {
	z Solver
}

// use makes e ready for a state of a.
func (e *Evaluator) use(a *Aeroplane, s *State) bool {
	if s.Configuration < 0 || s.Configuration >= len(a.Configurations) || !(s.Air.Density > 0) || !(s.Mass > 0) {
		return false
	}
	z := &e.z
	p := &a.Propeller
	if p.Kind == Tabulated {
		if len(p.Table) < 3 {
			return false
		}
		z.table.set(p.Table)
	}
	z.a.WingArea, z.a.Engine, z.a.Propeller = a.WingArea, a.Engine, a.Propeller
	c := Condition{Configuration: s.Configuration, PowerFraction: s.PowerFraction}
	z.k.set(a, &c)
	ts, pressure := standard(s.Air.PressureAltitude)
	w := sky{height: s.Air.PressureAltitude, temperature: s.Air.Temperature, density: s.Air.Density, pressure: pressure, stdTemp: ts,
		stdSigma: pressure / SeaLevelPressure * SeaLevelTemperature / ts}
	z.fly(&z.now, &w, s.Mass)
	return true
}

// SpecificExcessPower is (T - D) V/W of the state, m/s: what the aeroplane gains in height, or in speed times V/g. Where Revolutions is given the
// thrust is that of the propeller at that rpm; elsewhere that of PowerFraction.
func (e *Evaluator) SpecificExcessPower(a *Aeroplane, s *State) float64 {
	if !e.use(a, s) {
		return 0
	}
	f := &e.z.now
	v := drawn(s.TAS)
	d := f.drag.at(v) + 0.5*f.rho*v*v*s.DragArea
	t := 0.0
	if !s.PowerOff {
		if s.Revolutions > 0 && (a.Propeller.Kind == FixedPitch || a.Propeller.Kind == Tabulated) {
			t = e.thrustAt(a, v, s.Revolutions)
		} else {
			t = f.thrust(v)
		}
	}
	return finite((t - d) * v / f.weight)
}

// thrustAt is the thrust at v and n rev/s. The linear propeller polar CT/J^2 = m CP/J^2 + b is CT = m CP + b J^2.
func (e *Evaluator) thrustAt(a *Aeroplane, v, n float64) float64 {
	f := &e.z.now
	p := &a.Propeller
	j := v / (n * p.Diameter)
	ct := 0.0
	if p.Kind == FixedPitch {
		j2 := j * j
		ct = p.PolarSlope*(p.PowerCoefficientStatic+p.PowerCoefficientSlope*j2) + p.PolarIntercept*j2
	} else {
		ct, _, _, _ = f.table.at(j)
	}
	d := p.Diameter
	return f.rho * n * n * d * d * d * d * ct
}

// RevolutionRate is the rpm, rev/s, that a FixedPitch or Tabulated propeller turns at the state's PowerFraction; 0 for the others.
func (e *Evaluator) RevolutionRate(a *Aeroplane, s *State) float64 {
	if a.Propeller.Kind != FixedPitch && a.Propeller.Kind != Tabulated || !e.use(a, s) || e.z.now.kind == ConstantEfficiency {
		return 0
	}
	return finite(e.z.now.revs(drawn(s.TAS)))
}

// StallSpeed is the speed at which the state's configuration carries the weight with its greatest lift coefficient.
func (e *Evaluator) StallSpeed(a *Aeroplane, s *State) TAS {
	if !e.use(a, s) {
		return 0
	}
	return TAS(finite(e.z.now.stall))
}

// LiftCoefficient is W/(q S) of a state, m/s and kg; 0 where there is no dynamic pressure.
func (a *Aeroplane) LiftCoefficient(s *State) float64 {
	v := float64(s.TAS)
	return finite(2 * s.Mass * StandardGravity / (s.Air.Density * v * v * a.WingArea))
}

// ClimbFactor is what turns a rate of change of pressure altitude at constant calibrated airspeed, m/s, into the specific excess power that it
// takes: T/Tstd for the true (tapeline) rate, and (V/g) dV/dh for the true airspeed that grows with height. The day's deviation from the
// standard temperature is held. dV/dh is taken at constant equivalent airspeed: for light aeroplanes the difference is below a
// thousandth of the rate.
func (a Air) ClimbFactor(v TAS) float64 {
	h := a.PressureAltitude
	ts := StandardTemperature(h)
	if !(a.Temperature > 0) {
		return 1
	}
	lapse := lapseRate
	if h > tropopause {
		lapse = 0
	}
	// ln rho = ln p - ln T; dp/dh_p = -g p/(R Tstd).
	fall := StandardGravity/(gasConstant*ts) - lapse/a.Temperature
	x := speed(float64(v))
	return finite(a.Temperature/ts + x*x/(2*StandardGravity)*fall)
}

// Drag area of a propeller that does not drive. Class averages for a start, of the square of the diameter: blades of a light aeroplane's fixed-pitch
// propeller have about 4 % of its square as area and stand across the stream when stopped; windmilling takes more, feathered next to nothing. They
// are rough, which is why the estimate believes them only to within a half (common practice; no single source).
const (
	stoppedDragArea     = 0.035
	windmillingDragArea = 0.05
	featheredDragArea   = 0.004
)

// PropellerDragArea is the class average of the drag area, m^2, of the aeroplane's propeller stopped, windmilling and feathered. A propeller without
// a diameter counts as one whose square is 0.18 of the wing area.
func (a *Aeroplane) PropellerDragArea() (stopped, windmilling, feathered float64) {
	d2 := a.Propeller.Diameter * a.Propeller.Diameter
	if a.Propeller.Kind == ConstantEfficiency || !(d2 > 0) {
		d2 = 0.18 * a.WingArea
	}
	return stoppedDragArea * d2, windmillingDragArea * d2, featheredDragArea * d2
}
