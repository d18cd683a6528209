package report

import (
	"encoding/json"

	"levelspan/perf"
	"levelspan/perf/estimate"
)

// The format and version of JSON, from contract.md.
const (
	formatName    = "levelspan-limits"
	formatVersion = 1
)

// The members in the order of contract.md. A nil pointer is absent.
type (
	document struct {
		Format      string     `json:"format"`
		Version     int        `json:"version"`
		Air         air        `json:"air"`
		LevelFlight bool       `json:"level_flight"`
		Shortfall   float64    `json:"shortfall_w"`
		ShortAt     *float64   `json:"shortfall_tas_mps,omitempty"`
		Reason      string     `json:"reason,omitempty"`
		Probability *float64   `json:"level_flight_probability,omitempty"`
		Basis       string     `json:"basis"`
		Limits      []limit    `json:"limits"`
		Ceilings    ceilings   `json:"ceilings"`
		Turn        *turn      `json:"turn,omitempty"`
		Allowances  allowances `json:"allowances"`
		Warnings    []warning  `json:"warnings"`
	}
	air struct {
		Pressure        float64 `json:"pressure_pa"`
		Temperature     float64 `json:"temperature_k"`
		Density         float64 `json:"density_kg_m3"`
		DensityAltitude float64 `json:"density_altitude_m"`
	}
	limit struct {
		Key           string   `json:"key"`
		TAS           float64  `json:"tas_mps"`
		CAS           float64  `json:"cas_mps"`
		IAS           float64  `json:"ias_mps"`
		SetBy         string   `json:"set_by,omitempty"`
		Rate          *float64 `json:"rate_mps,omitempty"`
		Gradient      *float64 `json:"gradient,omitempty"`
		Ratio         *float64 `json:"ratio,omitempty"`
		Sink          *float64 `json:"sink_mps,omitempty"`
		LeastSinkTAS  *float64 `json:"least_sink_tas_mps,omitempty"`
		PowerRequired *float64 `json:"power_required_w,omitempty"`
		Endurance     *float64 `json:"endurance_s,omitempty"`
		Distance      *float64 `json:"distance_m,omitempty"`
		FuelFlow      *float64 `json:"fuel_kg_per_h,omitempty"`
		PowerDrawn    *float64 `json:"power_drawn_w,omitempty"`

		CASInterval       *bounds  `json:"interval_cas_mps,omitempty"`
		IASInterval       *bounds  `json:"interval_ias_mps,omitempty"`
		RateInterval      *bounds  `json:"interval_rate_mps,omitempty"`
		GradientInterval  *bounds  `json:"interval_gradient,omitempty"`
		RatioInterval     *bounds  `json:"interval_ratio,omitempty"`
		EnduranceInterval *bounds  `json:"interval_endurance_s,omitempty"`
		DistanceInterval  *bounds  `json:"interval_distance_m,omitempty"`
		Share             *float64 `json:"probability,omitempty"` // that the limit applies at all, where that is not sure
	}
	bounds   [2]float64
	ceilings struct {
		Service  *ceiling `json:"service,omitempty"`
		Absolute *ceiling `json:"absolute,omitempty"`
	}
	ceiling struct {
		PressureAltitude float64 `json:"pressure_altitude_m"`
		DensityAltitude  float64 `json:"density_altitude_m"`
		PressureInterval *bounds `json:"interval_pressure_altitude_m,omitempty"`
		DensityInterval  *bounds `json:"interval_density_altitude_m,omitempty"`
	}
	turn struct {
		LoadFactor float64 `json:"load_factor"`
		Bank       float64 `json:"bank_deg"`
		Radius     float64 `json:"radius_m"`
		Rate       float64 `json:"rate_deg_s"`
		TAS        float64 `json:"tas_mps"`
	}
	allowances struct {
		Mass                 *float64 `json:"level_flight_mass_kg,omitempty"`
		DensityAltitude      *float64 `json:"level_flight_density_altitude_m,omitempty"`
		Gradient             *float64 `json:"climb_gradient,omitempty"`
		ClimbMass            *float64 `json:"climb_mass_kg,omitempty"`
		ClimbDensityAltitude *float64 `json:"climb_density_altitude_m,omitempty"`
	}
	warning struct {
		Code string `json:"code"`
		Text string `json:"text"`
	}
)

// JSON is the answer as contract.md writes it ("levelspan-limits", version 1), with one final newline. Additions to the
// contract: "basis", "level_flight_probability", intervals beyond the contract's, "reason" and "shortfall_tas_mps" where there is no level flight, "power_drawn_w" in place of "fuel_kg_per_h" for
// an electric aeroplane, and the allowances for a climb gradient asked for.
func (r *Report) JSON() []byte {
	a, w := &r.Answer, &r.Condition.Air
	d := document{
		Format: formatName, Version: formatVersion,
		Air:         air{w.Pressure, w.Temperature, w.Density, w.DensityAltitude},
		LevelFlight: r.LevelFlight(), Shortfall: a.Shortfall, Basis: r.Basis,
		Ceilings: ceilings{ceilingOf(&a.Service), ceilingOf(&a.Absolute)},
		Limits:   []limit{}, Warnings: []warning{},
	}
	if r.Intervals != nil {
		d.Probability = &r.Intervals.LevelProbability
		d.Ceilings.Service.add(&r.Intervals.Service)
		d.Ceilings.Absolute.add(&r.Intervals.Absolute)
	}
	if !r.LevelFlight() {
		d.Reason = a.Outcome.String()
		d.ShortAt = positive(float64(a.ShortfallTAS))
	}
	for _, k := range Order(a) {
		d.Limits = append(d.Limits, r.limit(k))
	}
	if t := &a.Turn; t.Applies {
		d.Turn = &turn{t.LoadFactor, t.Bank / perf.Degree, t.Radius, t.Rate / perf.Degree, float64(t.TAS)}
	}
	d.Allowances.Mass, d.Allowances.DensityAltitude = allowanceOf(&a.Level)
	if g := r.Condition.ClimbGradient; g > 0 {
		d.Allowances.Gradient = &g
		d.Allowances.ClimbMass, d.Allowances.ClimbDensityAltitude = allowanceOf(&a.Climb)
	}
	for _, c := range r.Cautions() {
		d.Warnings = append(d.Warnings, warning{c.Code(), c.Text()})
	}
	text, err := json.MarshalIndent(&d, "", "  ")
	if err != nil {
		panic(err) // perf lets no figure out that is not finite
	}
	return append(text, '\n')
}

func (r *Report) limit(k perf.Key) limit {
	x := &r.Answer.Limits[k]
	l := limit{Key: k.String(), TAS: float64(x.TAS), CAS: float64(x.CAS), IAS: float64(x.IAS), SetBy: x.SetBy.String()}
	switch k {
	case perf.FastestClimb:
		l.Rate = &x.Rate
	case perf.SteepestClimb:
		l.Gradient = &x.Gradient
	case perf.BestGlide:
		least := float64(x.LeastSinkTAS)
		l.Ratio, l.Sink, l.LeastSinkTAS = &x.Ratio, &x.Sink, &least
	case perf.LeastPower:
		l.PowerRequired, l.Endurance = &x.PowerRequired, positive(x.Endurance)
	case perf.BestRange:
		l.Distance = positive(x.Distance)
		if r.Units.Electric {
			l.PowerDrawn = positive(x.FuelFlow)
		} else {
			l.FuelFlow = positive(x.FuelFlow * perf.Hour)
		}
	}
	if r.Intervals == nil || Placarded(k) {
		return l
	}
	i := &r.Intervals.Limits[k]
	l.CASInterval, l.IASInterval = boundsOf(i.CAS), boundsOf(i.IAS)
	if i.Share < 1 {
		l.Share = &i.Share
	}
	switch k {
	case perf.FastestClimb:
		l.RateInterval = boundsOf(i.Rate)
	case perf.SteepestClimb:
		l.GradientInterval = boundsOf(i.Gradient)
	case perf.BestGlide:
		l.RatioInterval = boundsOf(i.Ratio)
	case perf.LeastPower:
		l.EnduranceInterval = boundsOf(i.Endurance)
	case perf.BestRange:
		l.DistanceInterval = boundsOf(i.Distance)
	}
	return l
}

// Placarded reports whether a limit is what the papers say, which no run makes surer: it has no interval.
func Placarded(k perf.Key) bool { return k == perf.NeverExceed || k == perf.Manoeuvring }

func boundsOf(i estimate.Interval) *bounds {
	if !i.Applies {
		return nil
	}
	return &bounds{i.Low, i.High}
}

func (c *ceiling) add(i *estimate.CeilingIntervals) {
	if c != nil {
		c.PressureInterval, c.DensityInterval = boundsOf(i.PressureAltitude), boundsOf(i.DensityAltitude)
	}
}

// positive is x, or nil where 0 stands for there being none.
func positive(x float64) *float64 {
	if !(x > 0) {
		return nil
	}
	return &x
}

func ceilingOf(c *perf.Ceiling) *ceiling {
	if !c.Applies {
		return nil
	}
	return &ceiling{PressureAltitude: c.PressureAltitude, DensityAltitude: c.DensityAltitude}
}

func allowanceOf(a *perf.Allowance) (mass, densityAltitude *float64) {
	if a.MassApplies {
		mass = &a.Mass
	}
	if a.AltitudeApplies {
		densityAltitude = &a.DensityAltitude
	}
	return mass, densityAltitude
}

// Cautions are those that hold, in perf's order.
func (r *Report) Cautions() []perf.Caution {
	var all []perf.Caution
	for i, on := range r.Answer.Cautions {
		if on {
			all = append(all, perf.Caution(i))
		}
	}
	return all
}
