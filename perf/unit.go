package perf

// Units of the trade as exact multiples of the SI unit: write 120*perf.Knot on the way in and
// v/perf.Knot on the way out. Inside this package every figure is in SI.
const (
	Knot         = 1852.0 / 3600.0          // m/s; international nautical mile per hour (BIPM SI Brochure, 8th ed., table 8)
	MilePerHour  = 1609.344 / 3600.0        // m/s; international mile per hour (NIST SP 811, appendix B.8)
	KmPerHour    = 1.0 / 3.6                // m/s
	Foot         = 0.3048                   // m; international foot (NIST SP 811)
	NauticalMile = 1852.0                   // m
	StatuteMile  = 1609.344                 // m
	Kilometre    = 1000.0                   // m
	Inch         = 0.0254                   // m
	Pound        = 0.45359237               // kg; avoirdupois pound (NIST SP 811)
	PoundForce   = Pound * StandardGravity  // N
	Horsepower   = 550 * Foot * PoundForce  // W; 550 ft lbf/s
	Kilowatt     = 1000.0                   // W
	FootPerMin   = Foot / 60                // m/s
	Hectopascal  = 100.0                    // Pa
	InchMercury  = 3386.389                 // Pa; conventional inch of mercury at 0 °C (NIST SP 811)
	USGallon     = 231 * Inch * Inch * Inch // m^3 (NIST SP 811)
	Litre        = 1e-3                     // m^3
	Minute       = 60.0                     // s
	Hour         = 3600.0                   // s
	KilowattHour = 3.6e6                    // J
	RevPerMin    = 1.0 / 60                 // rev/s
	Degree       = 3.14159265358979323846264338327950288 / 180
	ZeroCelsius  = 273.15 // K at 0 °C
)
