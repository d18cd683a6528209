package estimate

import "levelspan/perf"

// Kind is what was flown.
type Kind uint8

// The kinds of run.
const (
	Level   Kind = iota // height held
	Climb               // constant IAS, power on
	Glide               // constant IAS, power off
	Stall               // the slowest IAS at which the wing carried the weight
	GPSLegs             // constant IAS on three or more tracks
	kindCount
)

var kindNames = [kindCount]string{"level", "climb", "glide", "stall", "gps-legs"}

// String is the case file's word for the kind.
func (k Kind) String() string {
	if k < kindCount {
		return kindNames[k]
	}
	return "unknown"
}

// PropellerState is what the propeller did in a glide.
type PropellerState uint8

// The states. NoPropeller in a glide counts as no drag of the propeller at all.
const (
	NoPropeller PropellerState = iota
	Stopped
	Windmilling
	Feathered
	stateCount
)

var stateNames = [stateCount]string{"", "stopped", "windmilling", "feathered"}

// String is the case file's word for the state, "" for NoPropeller.
func (s PropellerState) String() string {
	if s < stateCount {
		return stateNames[s]
	}
	return ""
}

// Leg is one leg of a GPS run.
type Leg struct {
	GroundSpeed float64 // m/s
	Track       float64 // rad, clockwise from north
}

// Run is one steady test run as read. All figures SI; domains are those of perf/domain.go.
type Run struct {
	Kind           Kind
	Configuration  int // index into the prior's configurations
	IAS            perf.IAS
	Air            perf.Air
	Mass           float64 // kg
	HasSetting     bool
	Setting        float64 // fraction of rated power (fixed pitch: of full-throttle torque); 1 is full throttle and has no reading error. Level, Climb
	RevolutionRate float64 // rev/s of a fixed-pitch or tabulated propeller; 0: not read. Level, Climb
	Rate           float64 // of change of pressure altitude, m/s; Level, Climb, Glide
	Propeller      PropellerState
	Legs           []Leg
	LeftOut        string // the reason why it is left out; "": it counts
}

// Beliefs are the standard deviations of the aeroplane's numbers before flight, relative except the last.
type Beliefs struct {
	ParasiteDrag     float64
	OswaldEfficiency float64
	MaximumLift      float64
	Power            float64
	Propeller        float64
	PositionError    float64 // m/s
}

// DefaultBeliefs are those of a case that states none.
func DefaultBeliefs() Beliefs {
	return Beliefs{ParasiteDrag: 0.10, OswaldEfficiency: 0.08, MaximumLift: 0.08, Power: 0.05, Propeller: 0.05, PositionError: 1.0}
}

// Instruments are the standard deviations of one reading; Power and Mass relative.
type Instruments struct {
	IAS            float64 // m/s
	Rate           float64 // m/s
	Power          float64
	RevolutionRate float64 // rev/s
	Mass           float64
	Temperature    float64 // K
	Altitude       float64 // m
}

// DefaultInstruments are those of a case that states none.
func DefaultInstruments() Instruments {
	return Instruments{IAS: 0.5, Rate: 0.15, Power: 0.03, RevolutionRate: 15 * perf.RevPerMin, Mass: 0.01, Temperature: 1, Altitude: 10}
}

// Case is all that an estimate is made from. The prior is not changed.
type Case struct {
	Prior       *perf.Aeroplane
	Beliefs     Beliefs
	Instruments Instruments
	Runs        []Run
}
