package perf

import "errors"

var errNotYet = errors.New("perf: solver not written yet")

// Solver answers questions about one aeroplane in one condition. It owns all working store, so that a solve
// allocates nothing; it is not safe for concurrent use. The zero value is ready.
type Solver struct{}

// Solve fills dst with every limit, ceiling, turn and inverse answer. The error is that of Validate (joined
// faults); having no level flight is an Outcome, not an error.
func (s *Solver) Solve(a *Aeroplane, c *Condition, dst *Answer) error { return errNotYet }

// Prepare readies the solver for the curve functions below, without solving the limits.
func (s *Solver) Prepare(a *Aeroplane, c *Condition) error { return errNotYet }

// PowerRequired is the thrust power D V of level flight at v, W.
func (s *Solver) PowerRequired(v TAS) float64 { return 0 }

// PowerAvailable is the thrust power T V at the condition's power fraction at v, W.
func (s *Solver) PowerAvailable(v TAS) float64 { return 0 }

// AirAt is the air at a pressure altitude (m) and temperature (K); dewPoint (K) 0 means dry.
func AirAt(pressureAltitude, temperature, dewPoint float64) (Air, error) { return Air{}, errNotYet }

// AirAtDensityAltitude is the standard day's air at a density altitude, m.
func AirAtDensityAltitude(densityAltitude float64) (Air, error) { return Air{}, errNotYet }

// AirAtField is the air at a field elevation (m), with altimeter setting (QNH, Pa), temperature and dew point (K).
func AirAtField(elevation, altimeterSetting, temperature, dewPoint float64) (Air, error) {
	return Air{}, errNotYet
}

// MovedToPressureAltitude is the air of the same day at another pressure altitude: the deviation from the
// standard temperature and the dew-point depression are held.
func (a Air) MovedToPressureAltitude(pressureAltitude float64) (Air, error) { return Air{}, errNotYet }

// MovedToDensityAltitude is the air of the same day where the density altitude is the one given.
func (a Air) MovedToDensityAltitude(densityAltitude float64) (Air, error) { return Air{}, errNotYet }

// CASFromIAS and IASFromCAS apply the configuration's position error; exact inverses of each other.
func (c *Configuration) CASFromIAS(v IAS) CAS { return CAS(v) }

// IASFromCAS is the inverse of CASFromIAS.
func (c *Configuration) IASFromCAS(v CAS) IAS { return IAS(v) }

// TASFromCAS converts with the full compressible relations.
func (a Air) TASFromCAS(v CAS) TAS { return TAS(v) }

// CASFromTAS is the inverse of TASFromCAS.
func (a Air) CASFromTAS(v TAS) CAS { return CAS(v) }

// EASFromTAS is TAS sqrt(rho/rho0).
func (a Air) EASFromTAS(v TAS) EAS { return EAS(v) }

// TASFromEAS is the inverse of EASFromTAS.
func (a Air) TASFromEAS(v EAS) TAS { return TAS(v) }
