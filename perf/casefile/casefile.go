// Package casefile reads and writes the case: JSON file, share fragment and JSON Schema. It is the only package
// of the computation whose names carry units.
package casefile

// Case is one aeroplane, its conditions today, what is believed of it and its runs, as the file holds them.
type Case struct {
	Aeroplane   Aeroplane
	Today       Today
	Beliefs     Beliefs
	Instruments Instruments
	Runs        []Run
	Display     Display
	extra       string // keys that this program does not know, as compact JSON members; likewise in the parts
}

// The parts of a case. A nil *float64 is a JSON null or an absent optional key. The figures are in the unit that the
// field's name ends with; the table in fields_*.go gives each one's meaning, range and default.
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
		extra                      string
	}
	Polar struct {
		CD0, OswaldE, CLMinDrag float64
		extra                   string
	}
	Configuration struct {
		Name            string
		CLMax, DeltaCD0 float64
		extra           string
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
		extra                       string
	}
	ConsumptionPoint struct {
		PowerFraction, KgPerKWh float64
		extra                   string
	}
	// Propeller keeps the numbers of every kind; only those of Kind count. A number of another kind that is 0 is absent.
	Propeller struct {
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
		extra                  string
	}
	Fuel struct {
		UsableKg      float64
		DensityKgPerL *float64 // optional addition: for showing fuel by volume
		extra         string
	}
	Battery struct {
		UsableKWh float64
		extra     string
	}
	Placards struct {
		VNECASMps, VNETASMps, VNOCASMps, VACASMps, VFECASMps *float64
		extra                                                string
	}
	Calibration struct {
		Configuration string
		Points        []CalibrationPoint
		extra         string
	}
	CalibrationPoint struct {
		IASMps, CASMinusIASMps float64
		extra                  string
	}

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
		ChargeKWh              *float64 // optional addition: charge left in the battery; nil: all that is usable
		ReserveMin             float64
		FieldElevationM        *float64 // optional addition: for the mark on the rail and the QNH way of entry
		AltimeterSettingHPa    *float64 // optional addition
		ClimbGradient          *float64 // optional addition: asked for in the allowances
		AirFrom                string   // optional addition: "pressure-altitude" (default) | "field" | "density-altitude": how the person enters the air
		extra                  string
	}
	Beliefs struct {
		CD0, OswaldE, CLMax, Power, Propeller, PositionErrorMps float64
		extra                                                   string
	}
	Instruments struct {
		IASMps, RateMps, Power, RPM, Mass, TemperatureC, AltitudeM float64
		extra                                                      string
	}
	Leg struct {
		GroundSpeedMps, TrackDeg float64
		extra                    string
	}
	Run struct {
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
		extra                  string
	}
	// Display is how the person wants figures shown; an optional addition to the contract.
	Display struct {
		SpeedKind string // CAS | IAS | TAS
		Speed     string // kt | mph | km/h
		Altitude  string // ft | m
		Mass      string // kg | lb
		Power     string // kW | hp
		Fuel      string // kg | L | US gal
		Length    string // m | ft: wing and propeller
		Selected  string // key of the limit marked on the chart, "" none
		extra     string
	}
)
