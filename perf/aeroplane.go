package perf

// Aeroplane is everything the model knows of one aeroplane. All figures SI. Domains: domain.go.
type Aeroplane struct {
	WingArea       float64 // S, m^2
	WingSpan       float64 // b, m
	EmptyMass      float64 // kg
	MaximumMass    float64 // kg; at least EmptyMass
	Polar          Polar
	Configurations []Configuration // at least one
	Engine         Engine
	Propeller      Propeller
	UsableFuel     float64 // kg; 0 for an electric aeroplane or where it is not known
	UsableEnergy   float64 // J; electric only
	Placards       Placards
}

// Polar is the drag polar CD = cd0 + k (CL - CLmd)^2 with k = 1/(pi A e).
type Polar struct {
	ParasiteDrag     float64 // cd0, of the aeroplane with a rise of 0
	OswaldEfficiency float64 // e
	LiftOfLeastDrag  float64 // CLmd
}

// Configuration is one setting of flaps and gear.
type Configuration struct {
	Name             string
	MaximumLift      float64              // cl_max
	ParasiteDragRise float64              // added to cd0
	PositionError    []PositionErrorPoint // rising IAS; empty: CAS = IAS. Linear in between, the end's correction beyond.
}

// PositionErrorPoint is one row of the airspeed calibration of a configuration.
type PositionErrorPoint struct {
	IAS        IAS
	Correction float64 // CAS - IAS, m/s
}

// EngineKind is what turns fuel or charge into shaft power.
type EngineKind uint8

// The engine kinds. A piston engine with a full-throttle altitude above 0 is turbocharged.
const (
	Piston EngineKind = iota
	Turboprop
	Electric
)

// PowerLaw is how a piston engine's full-throttle power falls with the air.
type PowerLaw uint8

// The power laws.
const (
	PressureAltitudeLaw PowerLaw = iota // Gagg & Ferrar at the standard density of the pressure altitude, times sqrt(Tstd/T)
	DensityAltitudeLaw                  // Gagg & Ferrar at the actual density
)

// Engine is the source of shaft power.
type Engine struct {
	Kind                 EngineKind
	Law                  PowerLaw           // piston
	RatedPower           float64            // W
	RatedSpeed           float64            // rev/s of the propeller shaft at RatedPower
	MaximumSpeed         float64            // rev/s; 0: no limit known
	FullThrottleAltitude float64            // m, standard pressure altitude up to which a turbocharged engine holds rated power; 0: naturally aspirated
	DropOffConstant      float64            // c of Gagg & Ferrar, piston
	LapseExponent        float64            // x of sigma^x, turboprop
	ThermalPower         float64            // W at sea level, turboprop; 0: the same as RatedPower
	SpecificConsumption  float64            // kg/J of shaft work; 0 for electric, or where it is not known (no endurance or distance then)
	ConsumptionTable     []ConsumptionPoint // rising power fraction; if not empty it replaces SpecificConsumption
}

// ConsumptionPoint is one row of specific consumption against the fraction of rated power; linear in between, held beyond.
type ConsumptionPoint struct {
	PowerFraction       float64
	SpecificConsumption float64 // kg/J
}

// PropellerKind is the model of the propeller.
type PropellerKind uint8

// The propeller kinds.
const (
	ConstantEfficiency PropellerKind = iota
	ConstantSpeed
	FixedPitch
	Tabulated
)

// Propeller turns shaft power into thrust. Only the fields of its kind count.
type Propeller struct {
	Kind                   PropellerKind
	Efficiency             float64        // eta, ConstantEfficiency
	Diameter               float64        // D, m, all the others
	BladeEfficiency        float64        // kappa, ConstantSpeed
	PolarSlope             float64        // m, FixedPitch
	PolarIntercept         float64        // b, FixedPitch, negative
	PowerCoefficientStatic float64        // cp0, FixedPitch
	PowerCoefficientSlope  float64        // cp1, FixedPitch, not positive
	Table                  []PropellerRow // Tabulated: at least 3 rows of rising advance ratio
}

// PropellerRow is one row of a propeller's measured coefficients.
type PropellerRow struct {
	AdvanceRatio      float64 // J = V/(n D)
	ThrustCoefficient float64 // CT = T/(rho n^2 D^4)
	PowerCoefficient  float64 // CP = P/(rho n^3 D^5)
}

// Placards are the speeds that the aeroplane's papers forbid to exceed; 0: none.
type Placards struct {
	NeverExceedCAS     CAS
	NeverExceedTAS     TAS
	NormalOperatingCAS CAS
	ManoeuvringCAS     CAS // at MaximumMass
	FlapsExtendedCAS   CAS
}
