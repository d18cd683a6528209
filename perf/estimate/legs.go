package estimate

import (
	"math"

	"levelspan/perf"
	"levelspan/perf/num"
)

// Airspeed is what the legs of a GPS run say, or why they say nothing.
type Airspeed struct {
	Outcome   Outcome // Fitted, TooFewLegs, TracksTooNear, LegsDisagree or OutOfDomain
	TAS       perf.TAS
	TASSD     float64 // m/s
	Wind      float64 // m/s
	WindFrom  float64 // rad, 0 to 2 pi, clockwise from north
	WindSD    float64 // m/s, along the wind
	RSS       float64 // sum of the squares of what is left of each leg's airspeed, m^2/s^2
	Freedom   int     // legs beyond the three that the unknowns take
	Amplified float64 // standard deviation of the airspeed over that of one leg
}

// What a GPS run may be: at most maximumLegs; refused where the airspeed is less certain than amplifiedBound times one leg's, as with tracks within
// about 70 degrees of one another.
const (
	maximumLegs    = 1000
	amplifiedBound = 3
)

// Legs finds true airspeed and wind from the ground speeds and tracks of legs flown at one airspeed in one wind: the circle through the heads
// of the ground velocities, of which the wind is the centre and the airspeed the radius, by least squares of the distances from it. spread is the
// standard deviation of one leg's airspeed, m/s.
//
// It wants three legs whose tracks differ; a fourth gives a check. A start comes from the algebraic fit of I. Kasa, IEEE Trans. Instrum. Meas. 25
// (1976) 8 (from memory).
func Legs(legs []Leg, spread float64) Airspeed {
	if len(legs) < 3 {
		return Airspeed{Outcome: TooFewLegs}
	}
	if len(legs) > maximumLegs || !(spread >= 0 && spread < 1e3) {
		return Airspeed{Outcome: OutOfDomain}
	}
	for i := range legs {
		if !(legs[i].GroundSpeed >= 0 && legs[i].GroundSpeed <= 400) || !(math.Abs(legs[i].Track) <= 100) {
			return Airspeed{Outcome: OutOfDomain}
		}
	}
	var ls num.LeastSquares
	var x [3]float64
	ls.Reset(3)
	for i := range legs {
		n, e := legs[i].velocity()
		ls.Add([]float64{2 * n, 2 * e, 1}, n*n+e*e)
	}
	if !ls.Solve(x[:]) {
		return Airspeed{Outcome: TracksTooNear}
	}
	north, east := x[0], x[1]
	v := math.Sqrt(x[2] + north*north + east*east)
	if math.IsNaN(v) {
		return Airspeed{Outcome: TracksTooNear}
	}
	var cov [9]float64
	var rss float64
	for range 50 {
		ls.Reset(3)
		rss = 0
		for i := range legs {
			n, e := legs[i].velocity()
			n, e = n-north, e-east
			r := math.Hypot(n, e)
			if r == 0 {
				continue
			}
			d := r - v
			rss += d * d
			ls.Add([]float64{n / r, e / r, 1}, d)
		}
		if !ls.Solve(x[:]) || !ls.Covariance(cov[:]) {
			return Airspeed{Outcome: TracksTooNear}
		}
		north, east, v = north+x[0], east+x[1], v+x[2]
		if math.Abs(x[0])+math.Abs(x[1])+math.Abs(x[2]) < 1e-11*(1+v) {
			break
		}
	}
	a := Airspeed{TAS: perf.TAS(v), Wind: math.Hypot(north, east), RSS: rss, Freedom: len(legs) - 3, Amplified: math.Sqrt(cov[8])}
	if !(a.Amplified <= amplifiedBound) || !(v > 0 && v < 400) {
		return Airspeed{Outcome: TracksTooNear}
	}
	a.TASSD = spread * a.Amplified
	a.WindFrom = math.Mod(math.Atan2(-east, -north)+2*math.Pi, 2*math.Pi)
	if a.Wind > 0 {
		cn, ce := north/a.Wind, east/a.Wind
		a.WindSD = spread * math.Sqrt(max(cn*cn*cov[0]+2*cn*ce*cov[1]+ce*ce*cov[4], 0))
	} else {
		a.WindSD = spread * math.Sqrt(cov[0])
	}
	if rss > spread*spread*(float64(a.Freedom)+24) && a.Freedom > 0 {
		a.Outcome = LegsDisagree
	}
	return a
}

// velocity is the ground velocity to the north and east.
func (l *Leg) velocity() (north, east float64) {
	return l.GroundSpeed * math.Cos(l.Track), l.GroundSpeed * math.Sin(l.Track)
}
