package perf

import "math"

// The four airspeeds, m/s. They are defined types because they share a dimension and are easily confused.
type (
	IAS float64 // indicated: what the instrument shows
	CAS float64 // calibrated: IAS freed of the position error
	EAS float64 // equivalent: TAS sqrt(rho/rho0)
	TAS float64 // true: relative to the air
)

// highestSpeed bounds what the conversions take, m/s. Far beyond any propeller; it keeps the powers finite.
const highestSpeed = 1e5

// seaLevelSound is the speed of sound of the standard sea level, m/s.
var seaLevelSound = math.Sqrt(heatRatio * SeaLevelPressure / SeaLevelDensity)

// impact is the ratio of impact pressure to static pressure at a Mach number: (1 + 0.2 M^2)^3.5 - 1.
func impact(mach float64) float64 { return math.Expm1(3.5 * math.Log1p(0.2*mach*mach)) }

// machOf is the inverse of impact.
func machOf(ratio float64) float64 { return math.Sqrt(5 * math.Expm1(math.Log1p(ratio)/3.5)) }

// speed holds v to 0..highestSpeed; what is not a number becomes 0.
func speed(v float64) float64 {
	if !(v > 0) {
		return 0
	}
	return min(v, highestSpeed)
}

// TASFromCAS converts with the full compressible (subsonic) relations: the impact pressure that the instrument felt, in
// this air. A negative speed counts as 0.
func (a Air) TASFromCAS(v CAS) TAS {
	qc := SeaLevelPressure * impact(speed(float64(v))/seaLevelSound)
	if !(a.Pressure > 0 && a.SpeedOfSound > 0) {
		return 0
	}
	return TAS(a.SpeedOfSound * machOf(qc/a.Pressure))
}

// CASFromTAS is the inverse of TASFromCAS.
func (a Air) CASFromTAS(v TAS) CAS {
	if !(a.Pressure > 0 && a.SpeedOfSound > 0) {
		return 0
	}
	qc := a.Pressure * impact(speed(float64(v))/a.SpeedOfSound)
	return CAS(seaLevelSound * machOf(qc/SeaLevelPressure))
}

// EASFromTAS is TAS sqrt(rho/rho0).
func (a Air) EASFromTAS(v TAS) EAS {
	if !(a.Density > 0) {
		return 0
	}
	return EAS(speed(float64(v)) * math.Sqrt(a.Density/SeaLevelDensity))
}

// TASFromEAS is the inverse of EASFromTAS.
func (a Air) TASFromEAS(v EAS) TAS {
	if !(a.Density > 0) {
		return 0
	}
	return TAS(speed(float64(v)) / math.Sqrt(a.Density/SeaLevelDensity))
}

// ImpactPressure is the pressure that an airspeed indicator feels at a calibrated airspeed, Pa:
// p0 ((1 + 0.2 (V/a0)^2)^3.5 - 1).
func ImpactPressure(v CAS) float64 {
	return SeaLevelPressure * impact(speed(float64(v))/seaLevelSound)
}

// CASFromIAS adds the configuration's position error: linear in IAS between the points, the end's correction beyond. No
// points: CAS = IAS.
func (c *Configuration) CASFromIAS(v IAS) CAS {
	if math.IsNaN(float64(v)) {
		v = 0
	}
	p := c.PositionError
	n := len(p)
	switch {
	case n == 0:
		return CAS(v)
	case v <= p[0].IAS:
		return CAS(float64(v) + p[0].Correction)
	case v >= p[n-1].IAS:
		return CAS(float64(v) + p[n-1].Correction)
	}
	i := 1
	for i < n-1 && v > p[i].IAS {
		i++
	}
	x0, x1 := float64(p[i-1].IAS), float64(p[i].IAS)
	t := (float64(v) - x0) / (x1 - x0)
	return CAS(float64(v) + p[i-1].Correction + t*(p[i].Correction-p[i-1].Correction))
}

// IASFromCAS is the inverse of CASFromIAS; it is one because Validate lets CAS only rise with IAS.
func (c *Configuration) IASFromCAS(v CAS) IAS {
	if math.IsNaN(float64(v)) {
		v = 0
	}
	p := c.PositionError
	n := len(p)
	if n == 0 {
		return IAS(v)
	}
	y := float64(v)
	switch {
	case y <= p[0].cas():
		return IAS(y - p[0].Correction)
	case y >= p[n-1].cas():
		return IAS(y - p[n-1].Correction)
	}
	i := 1
	for i < n-1 && y > p[i].cas() {
		i++
	}
	y0, y1 := p[i-1].cas(), p[i].cas()
	if !(y1 > y0) {
		return p[i].IAS
	}
	t := (y - y0) / (y1 - y0)
	return IAS(y - (p[i-1].Correction + t*(p[i].Correction-p[i-1].Correction)))
}

// cas is the calibrated airspeed of a point.
func (p *PositionErrorPoint) cas() float64 { return float64(p.IAS) + p.Correction }

// readings fills the CAS and IAS of a limit from its TAS.
func (s *Solver) readings(l *Limit) {
	l.CAS = s.c.Air.CASFromTAS(l.TAS)
	l.IAS = s.a.Configurations[s.c.Configuration].IASFromCAS(l.CAS)
}
