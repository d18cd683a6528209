package estimate

import (
	"errors"
	"math"
	"strconv"

	"levelspan/perf"
)

// RangeError is one input of the estimate that it cannot take.
type RangeError struct {
	Key      string // "Beliefs.Power", "Prior"
	Value    float64
	Min, Max float64 // allowed
}

// Error names the input, the value and what is allowed.
func (e *RangeError) Error() string {
	f := func(x float64) string { return strconv.FormatFloat(x, 'g', 6, 64) }
	return e.Key + ": " + f(e.Value) + " is outside " + f(e.Min) + " to " + f(e.Max)
}

// ErrNoPrior is the error of a case without an aeroplane.
var ErrNoPrior = errors.New("estimate: the case has no aeroplane to start from")

// Validate reports every fault of prior, beliefs and instruments, joined. The runs are not looked at here: a run that cannot be used is
// an Outcome in the posterior, beside the others.
func (c *Case) Validate() error {
	if c.Prior == nil {
		return ErrNoPrior
	}
	if err := c.Prior.Validate(); err != nil {
		return err
	}
	var all []error
	check := func(key string, x, low, high float64) {
		if math.IsNaN(x) || x < low || x > high {
			all = append(all, &RangeError{key, x, low, high})
		}
	}
	b, i := &c.Beliefs, &c.Instruments
	check("Beliefs.ParasiteDrag", b.ParasiteDrag, 0, 2)
	check("Beliefs.OswaldEfficiency", b.OswaldEfficiency, 0, 2)
	check("Beliefs.MaximumLift", b.MaximumLift, 0, 2)
	check("Beliefs.Power", b.Power, 0, 2)
	check("Beliefs.Propeller", b.Propeller, 0, 2)
	check("Beliefs.PositionError", b.PositionError, 0, 20)
	check("Instruments.IAS", i.IAS, 1e-6, 20)
	check("Instruments.Rate", i.Rate, 1e-6, 10)
	check("Instruments.Power", i.Power, 0, 1)
	check("Instruments.RevolutionRate", i.RevolutionRate, 1e-6, 20)
	check("Instruments.Mass", i.Mass, 0, 0.5)
	check("Instruments.Temperature", i.Temperature, 0, 20)
	check("Instruments.Altitude", i.Altitude, 0, 1000)
	return errors.Join(all...)
}

// Outcome is what became of a run.
type Outcome uint8

// The outcomes.
const (
	Fitted        Outcome = iota // counted with the others
	WasLeftOut                   // left out by the person, with the reason in the run; its residual is given all the same
	NoSetting                    // a level run or a climb needs its power setting or, with a fixed-pitch or tabulated propeller, its rpm
	OutOfDomain                  // a reading that is missing or outside what the model takes
	NoThrust                     // the setting gives no thrust in that air
	TooFewLegs                   // a GPS run needs three legs
	TracksTooNear                // its tracks do not tell true airspeed from wind
	LegsDisagree                 // no one airspeed and wind gives its ground speeds
	outcomeCount
)

var outcomeTexts = [outcomeCount]struct{ name, text string }{
	{"fitted", ""},
	{"left-out", "left out"},
	{"no-setting", "not used: needs its power setting or, with a propeller of fixed pitch, its rpm"},
	{"out-of-domain", "not used: a reading is missing or outside what the model takes"},
	{"no-thrust", "not used: the setting gives no power in that air"},
	{"too-few-legs", "not used: needs three legs on different tracks"},
	{"tracks-too-near", "not used: the tracks are too much alike to tell airspeed from wind"},
	{"legs-disagree", "not used: no one airspeed and wind gives these ground speeds"},
}

// String is a short name.
func (o Outcome) String() string {
	if o < outcomeCount {
		return outcomeTexts[o].name
	}
	return "unknown"
}

// Text says it to a person; "" for a run that was fitted.
func (o Outcome) Text() string {
	if o < outcomeCount {
		return outcomeTexts[o].text
	}
	return ""
}

// Counts reports whether a residual of the run is given.
func (o Outcome) Counts() bool { return o == Fitted || o == WasLeftOut }

// usable says whether the readings that a run needs are there and in their domain; it does not look at LeftOut.
func (r *Run) usable(a *perf.Aeroplane) Outcome {
	holds := func(q perf.Quantity, x float64) bool { return q.Domain().Holds(x) }
	if r.Kind >= kindCount || r.Propeller >= stateCount || r.Configuration < 0 || r.Configuration >= len(a.Configurations) ||
		!holds(perf.QuantityPositionErrorIAS, float64(r.IAS)) || !holds(perf.QuantityMass, r.Mass) {
		return OutOfDomain
	}
	again, err := perf.AirAt(r.Air.PressureAltitude, r.Air.Temperature, r.Air.DewPoint)
	if err != nil || !(math.Abs(again.Density-r.Air.Density) <= 1e-6*again.Density && math.Abs(again.Pressure-r.Air.Pressure) <= 1e-6*again.Pressure &&
		math.Abs(again.SpeedOfSound-r.Air.SpeedOfSound) <= 1e-6*again.SpeedOfSound) {
		return OutOfDomain
	}
	switch r.Kind {
	case Level, Climb, Glide:
		if !(math.Abs(r.Rate) <= 100) {
			return OutOfDomain
		}
	}
	if r.Kind == Level || r.Kind == Climb {
		read := r.readsRevolutions(a)
		if !r.HasSetting && !read {
			return NoSetting
		}
		if r.HasSetting && !holds(perf.QuantityPowerFraction, r.Setting) || read && !holds(perf.QuantityRatedSpeed, r.RevolutionRate) {
			return OutOfDomain
		}
	}
	return Fitted
}

// readsRevolutions reports whether the run has an rpm that says something of this aeroplane's propeller.
func (r *Run) readsRevolutions(a *perf.Aeroplane) bool {
	return r.RevolutionRate != 0 && (a.Propeller.Kind == perf.FixedPitch || a.Propeller.Kind == perf.Tabulated)
}
