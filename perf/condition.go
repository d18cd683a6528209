package perf

// Condition is the moment the question is asked for. All figures SI. Domains: domain.go.
type Condition struct {
	Mass          float64 // kg
	Air           Air
	Configuration int     // index into Aeroplane.Configurations
	Bank          float64 // rad; load factor n = 1/cos(Bank)
	PowerFraction float64 // fraction of rated power asked for; 1 is full throttle
	Headwind      float64 // m/s along the track, tail wind negative
	Fuel          float64 // kg on board (electric: J of charge left)
	ClimbGradient float64 // asked for in Answer.Climb; 0: none
}

// Air is the state of the air at one height. Make it with the functions of air.go; the zero value is no air.
type Air struct {
	PressureAltitude float64 // m
	Temperature      float64 // K
	VapourPressure   float64 // Pa, 0: dry
	DewPoint         float64 // K, 0: dry
	Pressure         float64 // Pa
	Density          float64 // kg/m^3
	DensityAltitude  float64 // m
	SpeedOfSound     float64 // m/s
}

// StandardGravity is the g that turns mass into weight, m/s^2 (ISO 80000-3; CGPM 1901).
const StandardGravity = 9.80665
