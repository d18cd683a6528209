// Package casefile reads and writes the case: JSON file, share fragment and JSON Schema. It is the only package
// of the computation whose names carry units.
package casefile

import (
	"errors"

	"levelspan/perf"
)

var errNotYet = errors.New("casefile: not written yet")

// Case is one aeroplane, its conditions today, what is believed of it and its runs, as the file holds them.
type Case struct {
	Aeroplane   Aeroplane
	Today       Today
	Beliefs     Beliefs
	Instruments Instruments
	Runs        []Run
	Display     Display
	// unexported: unknown keys, kept for Marshal
}

// The parts of a case. A nil *float64 is a JSON null or an absent optional key.
type (
	Aeroplane struct {
		Name, Note                 string
		WingAreaM2, WingSpanM      float64
		EmptyMassKg, MaximumMassKg float64
		Polar                      Polar
		Configurations             []Configuration
		Engine                     Engine
		Propeller                  Propeller
		Fuel                       *Fuel
		Battery                    *Battery
		Placards                   Placards
		Calibration                []Calibration
	}
	Polar         struct{ CD0, OswaldE, CLMinDrag float64 }
	Configuration struct {
		Name            string
		CLMax, DeltaCD0 float64
	}
	Engine struct {
		Kind                        string // piston | turboprop | electric
		RatedPowerW                 float64
		RatedRPM                    float64
		MaximumRPM                  *float64
		PowerLaw                    string // pressure-altitude | density-altitude
		FullThrottleAltitudeM       float64
		DropOffConstant             float64
		LapseExponent               float64
		ThermalPowerW               *float64
		SpecificConsumptionKgPerKWh float64
		ConsumptionTable            []ConsumptionPoint // optional addition to the contract
	}
	ConsumptionPoint struct{ PowerFraction, KgPerKWh float64 }
	Propeller        struct {
		Kind                   string // constant-efficiency | constant-speed | fixed-pitch | table
		Efficiency             float64
		DiameterM              float64
		BladeEfficiency        float64
		PolarSlope             float64
		PolarIntercept         float64
		PowerCoefficientStatic float64
		PowerCoefficientSlope  float64
		AdvanceRatio           []float64
		ThrustCoefficient      []float64
		PowerCoefficient       []float64
	}
	Fuel        struct{ UsableKg float64 }
	Battery     struct{ UsableKWh float64 }
	Placards    struct{ VNECASMps, VNETASMps, VNOCASMps, VACASMps, VFECASMps *float64 }
	Calibration struct {
		Configuration string
		Points        []CalibrationPoint
	}
	CalibrationPoint struct{ IASMps, CASMinusIASMps float64 }

	Today struct {
		MassKg                 float64
		PressureAltitudeM      float64
		OutsideAirTemperatureC float64
		DewPointC              *float64
		Configuration          string
		BankDeg                float64
		PowerFraction          float64
		HeadwindMps            float64
		FuelKg                 float64
		ReserveMin             float64
		FieldElevationM        *float64 // optional addition: for the mark on the rail and the QNH way of entry
		AltimeterSettingHPa    *float64 // optional addition
		ClimbGradient          *float64 // optional addition: asked for in the allowances
		AirFrom                string   // optional addition: "pressure-altitude" (default) | "field" | "density-altitude": how the person enters the air
	}
	Beliefs     struct{ CD0, OswaldE, CLMax, Power, Propeller, PositionErrorMps float64 }
	Instruments struct{ IASMps, RateMps, Power, RPM, Mass, TemperatureC, AltitudeM float64 }
	Leg         struct{ GroundSpeedMps, TrackDeg float64 }
	Run         struct {
		Kind                   string // level | climb | glide | stall | gps-legs
		Configuration          string
		IASMps                 float64
		PressureAltitudeM      float64
		OutsideAirTemperatureC float64
		MassKg                 float64
		PowerFraction          *float64
		RPM                    *float64
		RateMps                *float64
		Propeller              string // glide: stopped | windmilling | feathered
		Legs                   []Leg
		LeftOut                string
	}
	// Display is how the person wants figures shown; an optional addition to the contract.
	Display struct {
		SpeedKind string // CAS | IAS | TAS
		Speed     string // kt | mph | km/h
		Altitude  string // ft | m
		Mass      string // kg | lb
		Power     string // kW | hp
		Fuel      string // kg | L | US gal
	}
)

// Fault is one thing wrong with a file: the key's path ("aeroplane.wing_area_m2", "runs[3].ias_mps"), the value as written, what is allowed.
type Fault struct{ Path, Value, Allowed string }

// Faults is a list of them, as an error; Error prints one line a fault.
type Faults []Fault

func (f Faults) Error() string { return "" }

// Warning is something kept but not understood (an unknown key).
type Warning struct{ Path, Text string }

// Parse reads a case file. The error is Faults, a *VersionError, or a *SyntaxError (with line and column).
func Parse(data []byte) (*Case, []Warning, error) { return nil, nil, errNotYet }

// Marshal writes the canonical form: keys in the contract's order, unknown ones kept after them, two-space indent, one final newline.
func (c *Case) Marshal() []byte { return nil }

// Clone is a deep copy.
func (c *Case) Clone() *Case { return nil }

// Validate reports every fault of c as Faults, or nil.
func (c *Case) Validate() error { return errNotYet }

// Model gives what perf computes with. It fails only where Validate would.
func (c *Case) Model() (perf.Aeroplane, perf.Condition, error) {
	return perf.Aeroplane{}, perf.Condition{}, errNotYet
}

// Fragment is the share link's fragment: a version letter and deflate + base64url of the canonical form.
func (c *Case) Fragment() string { return "" }

// ParseFragment reads a fragment in bounded memory. A "#", "#case=" or whole address before it is allowed.
func ParseFragment(s string) (*Case, []Warning, error) { return nil, nil, errNotYet }

// Schema is the JSON Schema (draft 2020-12) of the case file.
func Schema() []byte { return nil }
