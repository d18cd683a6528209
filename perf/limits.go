package perf

// Key names one limit. The order is that of the table in DEVELOPERS.md, not of the speeds.
type Key uint8

// The limits.
const (
	Stall Key = iota
	SlowestLevel
	LeastPower
	SteepestClimb
	FastestClimb
	BestGlide
	BestRange
	Carson
	Manoeuvring
	FastestLevel
	NeverExceed
	KeyCount
)

// SetBy is what sets a limit.
type SetBy uint8

// What can set a limit. SetByOptimum: nothing but the aeroplane's own curves.
const (
	SetByOptimum SetBy = iota
	SetByLift
	SetByPower
	SetByRPM
	SetByPlacard
)

// Outcome says whether level flight is possible, and if not, why.
type Outcome uint8

// The outcomes.
const (
	LevelFlight    Outcome = iota // level flight is possible
	TooLittlePower                // at every speed at or above the stall the power available is less than the power required
	PlacardTooSlow                // the never-exceed speed is below the slowest speed of level flight
	RPMTooHigh                    // there is power enough, but at every speed level flight takes more than the maximum rpm
	outcomeCount
)

// Limit is one speed and what belongs to it. Fields that its Key does not use are 0.
type Limit struct {
	Applies bool // false: this aeroplane or condition has no such limit; nothing else counts then
	SetBy   SetBy
	TAS     TAS
	CAS     CAS
	IAS     IAS

	Rate          float64 // FastestClimb: rate of climb, m/s; SteepestClimb: the rate at that speed
	Gradient      float64 // SteepestClimb: (T-D)/W; FastestClimb: the gradient at that speed
	Ratio         float64 // BestGlide: W/D
	Sink          float64 // BestGlide: D V/W, m/s
	LeastSinkTAS  TAS     // BestGlide: speed of least sink, power off
	PowerRequired float64 // LeastPower, BestRange, Carson, FastestLevel: D V, W
	ShaftPower    float64 // LeastPower, BestRange, Carson, FastestLevel: shaft power that level flight takes there, W
	Endurance     float64 // LeastPower: s, on all of the fuel or charge, at constant mass, no reserve; 0 where none is given or the speed cannot be held
	Distance      float64 // BestRange: m over the ground, likewise
	FuelFlow      float64 // LeastPower, BestRange, Carson: kg/s (electric: W drawn)
}

// Ceiling is a height where the greatest rate of climb falls to Rate.
type Ceiling struct {
	Applies          bool    // false: no such height inside the atmosphere's domain
	Rate             float64 // m/s: 0.508 (service) or 0 (absolute)
	PressureAltitude float64 // m, the day's deviation from the standard temperature held
	DensityAltitude  float64 // m
	TAS              TAS     // speed of the greatest rate of climb there
}

// Turn is the tightest turn that power and lift can sustain in level flight.
type Turn struct {
	Applies    bool
	SetBy      SetBy
	LoadFactor float64
	Bank       float64 // rad
	Radius     float64 // m
	Rate       float64 // rad/s
	TAS        TAS
}

// Allowance is an inverse answer: how much is still possible.
type Allowance struct {
	MassApplies      bool
	Mass             float64 // kg, the greatest at today's air
	AltitudeApplies  bool
	PressureAltitude float64 // m, the greatest at today's mass, deviation held
	DensityAltitude  float64 // m, the same height as a density altitude
}

// Caution is one thing that the person must be told with the figures.
type Caution uint8

// The cautions; each has a code and a text in the table of caution.go.
const (
	CautionNoLevelFlight Caution = iota
	CautionNearCeiling
	CautionTurnNearStall
	CautionAboveMaximumMass
	CautionBelowEmptyMass
	CautionPlacardTAS
	CautionMach
	CautionPropellerOutsideSpan
	CautionOverspeed
	CautionSpeedAboveFlapPlacard
	CautionConsumptionUnusual
	CautionNotModelled
	CautionAdvisory
	CautionClimbAboveNeverExceed
	cautionCount
)

// Answer is everything the model says of one aeroplane in one condition.
type Answer struct {
	Outcome      Outcome
	Shortfall    float64 // W of thrust power missing at the speed where least is missing; 0 with level flight and for PlacardTooSlow
	ShortfallTAS TAS     // that speed
	Limits       [KeyCount]Limit
	Service      Ceiling
	Absolute     Ceiling
	Turn         Turn
	Level        Allowance // level flight
	Climb        Allowance // Condition.ClimbGradient; zero where none is asked for
	Cautions     [cautionCount]bool
}
