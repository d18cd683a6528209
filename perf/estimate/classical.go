package estimate

import (
	"math"

	"levelspan/perf"
	"levelspan/perf/num"
)

// The classical check of level runs: with power and speed reduced to one weight and sea-level density,
//
//	V_iw = V sqrt(sigma) sqrt(Ws/W)        P_iw = P sqrt(sigma) (Ws/W)^(3/2)
//
// the polar CD = cd0 + k CL^2 makes P_iw V_iw = A V_iw^4 + B with A = rho0 S cd0/2 and B = 2 k Ws^2/(rho0 S), a straight line whatever weight and height
// were (power and speed independent of weight; a standard form, from memory). P is the thrust power here, T V, so that a propeller whose efficiency changes with speed
// keeps the line straight.

// ClassicalPoint is one level run reduced.
type ClassicalPoint struct {
	Run     int     // index into Case.Runs
	Speed   float64 // V_iw, m/s
	Power   float64 // P_iw, W
	LeftOut bool    // drawn, but not in the line
}

// Abscissa is V_iw^4.
func (p *ClassicalPoint) Abscissa() float64 { return p.Speed * p.Speed * p.Speed * p.Speed }

// Ordinate is P_iw V_iw.
func (p *ClassicalPoint) Ordinate() float64 { return p.Power * p.Speed }

// Classical is the reduction of the level runs of one configuration, with the line through them.
type Classical struct {
	Points            []ClassicalPoint
	Mass              float64 // that of Ws, kg
	Fitted            bool    // there are three points at least and they determine a line
	Slope, SlopeSD    float64 // A, W s^3/m^3
	Constant          float64 // B, W m/s
	ConstantSD        float64
	Correlation       float64 // of A and B
	Scatter           float64 // standard deviation of P_iw V_iw about the line, W m/s
	Physical          bool    // A and B are positive; the figures below count then
	ParasiteDrag      float64 // cd0 with the configuration's rise
	ParasiteDragSD    float64
	OswaldEfficiency  float64
	OswaldSD          float64
	LeastDragSpeed    float64 // V_iw of least drag, (B/A)^(1/4), m/s
	LeastPowerSpeed   float64 // V_iw of least power required, (B/3A)^(1/4), m/s
	LiftOfLeastDragIs float64 // CLmd of the aeroplane: where it is not 0 the line is bent and the figures are rough

	ev perf.Evaluator
	ls num.LeastSquares
}

// Reduce fills c with the level runs of c's configuration g, reduced with the engine, propeller and calibration of a: the prior or the estimated
// aeroplane. The mass is a's maximum. A run that cannot be used is not among the points. It keeps the memory of an earlier Reduce.
func (c *Classical) Reduce(k *Case, a *perf.Aeroplane, g int) {
	*c = Classical{Points: c.Points[:0], Mass: a.MaximumMass, LiftOfLeastDragIs: a.Polar.LiftOfLeastDrag, ev: c.ev, ls: c.ls}
	if g < 0 || g >= len(a.Configurations) || a.Validate() != nil {
		return
	}
	var f flown
	var plane craft
	l := layout{prior: a}
	plane.start(&l)
	for i := range k.Runs {
		r := &k.Runs[i]
		if r.Kind != Level || r.Configuration != g {
			continue
		}
		f.prepare(r, a, &k.Instruments)
		if f.outcome != Fitted {
			continue
		}
		v := r.Air.TASFromCAS(a.Configurations[g].CASFromIAS(r.IAS))
		s := perf.State{TAS: v, Air: r.Air, Mass: r.Mass, Configuration: g, PowerFraction: r.Setting}
		if !r.HasSetting {
			s.Revolutions = r.RevolutionRate
		}
		with := c.ev.SpecificExcessPower(a, &s)
		s.PowerOff = true
		weight := r.Mass * perf.StandardGravity
		power := weight * (with - c.ev.SpecificExcessPower(a, &s) - r.Rate*r.Air.ClimbFactor(v))
		sigma := r.Air.Density / perf.SeaLevelDensity
		ratio := c.Mass / r.Mass
		p := ClassicalPoint{Run: i, Speed: float64(v) * math.Sqrt(sigma*ratio), Power: power * math.Sqrt(sigma) * ratio * math.Sqrt(ratio), LeftOut: r.LeftOut != ""}
		if !(p.Speed > 0) || math.IsInf(p.Ordinate(), 0) || math.IsNaN(p.Ordinate()) {
			continue
		}
		c.Points = append(c.Points, p)
	}
	c.line(a)
}

// line fits the line by ordinary least squares.
func (c *Classical) line(a *perf.Aeroplane) {
	n := 0
	c.ls.Reset(2)
	for i := range c.Points {
		p := &c.Points[i]
		if p.LeftOut {
			continue
		}
		n++
		c.ls.Add([]float64{p.Abscissa(), 1}, p.Ordinate())
	}
	var x [2]float64
	var v [4]float64
	if n < 3 || !c.ls.Solve(x[:]) || !c.ls.Covariance(v[:]) {
		return
	}
	c.Fitted = true
	c.Slope, c.Constant = x[0], x[1]
	s2 := c.ls.RSS() / float64(n-2)
	c.Scatter = math.Sqrt(s2)
	c.SlopeSD, c.ConstantSD = math.Sqrt(s2*v[0]), math.Sqrt(s2*v[3])
	c.Correlation = v[1] / math.Sqrt(v[0]*v[3])
	if !(c.Slope > 0 && c.Constant > 0) {
		return
	}
	c.Physical = true
	ws := c.Mass * perf.StandardGravity
	area := perf.SeaLevelDensity * a.WingArea
	c.ParasiteDrag = 2 * c.Slope / area
	c.ParasiteDragSD = c.ParasiteDrag * c.SlopeSD / c.Slope
	k := c.Constant * area / (2 * ws * ws)
	c.OswaldEfficiency = a.WingArea / (math.Pi * a.WingSpan * a.WingSpan * k)
	c.OswaldSD = c.OswaldEfficiency * c.ConstantSD / c.Constant
	c.LeastDragSpeed = math.Sqrt(math.Sqrt(c.Constant / c.Slope))
	c.LeastPowerSpeed = c.LeastDragSpeed / math.Sqrt(math.Sqrt(3))
}
