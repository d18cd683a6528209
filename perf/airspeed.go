package perf

// The four airspeeds, m/s. They are defined types because they share a dimension and are easily confused.
type (
	IAS float64 // indicated: what the instrument shows
	CAS float64 // calibrated: IAS freed of the position error
	EAS float64 // equivalent: TAS sqrt(rho/rho0)
	TAS float64 // true: relative to the air
)
