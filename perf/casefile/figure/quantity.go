package figure

import (
	"levelspan/perf"
)

// in writes an SI figure in a unit.
func (u Unit) in(x float64, decimals int) Figure { return Figure{Number(x/u.SI, decimals), u.Name} }

// SpeedWhole is a speed (m/s) to the whole unit, for the panel.
func (u Units) SpeedWhole(v float64) Figure { return u.Speed.in(v, 0) }

// SpeedFine is a speed (m/s) to a tenth of the unit, for the command's table.
func (u Units) SpeedFine(v float64) Figure { return u.Speed.in(v, 1) }

// AltitudeCoarse is a height (m) to the nearest 100 ft or 50 m: ceilings on the panel, density altitude on the rail.
func (u Units) AltitudeCoarse(h float64) Figure {
	step := 100.0
	if u.Altitude.Name == "m" {
		step = 50
	}
	return Figure{Number(round(h/u.Altitude.SI, step), 0), u.Altitude.Name}
}

// AltitudeWhole is a height (m) to the nearest 10 ft or 5 m: pressure altitude beside the handle.
func (u Units) AltitudeWhole(h float64) Figure {
	step := 10.0
	if u.Altitude.Name == "m" {
		step = 5
	}
	return Figure{Number(round(h/u.Altitude.SI, step), 0), u.Altitude.Name}
}

// AltitudeFine is a height (m) to the whole foot or metre.
func (u Units) AltitudeFine(h float64) Figure { return u.Altitude.in(h, 0) }

// MassWhole is a mass (kg) to the whole unit.
func (u Units) MassWhole(m float64) Figure { return u.Mass.in(m, 0) }

// MassFine is a mass (kg) to a tenth of the unit.
func (u Units) MassFine(m float64) Figure { return u.Mass.in(m, 1) }

// Rate is a rate of climb (m/s): whole ft/min, or m/s to a hundredth.
func (u Units) Rate(w float64) Figure {
	if u.RateUnit.Name == "m/s" {
		return u.RateUnit.in(w, 2)
	}
	return u.RateUnit.in(w, 0)
}

// Gradient is a climb gradient (a ratio): whole ft/nm where the units are knots and feet, else per cent to a tenth.
func (u Units) Gradient(g float64) Figure {
	if u.Speed.Name == "kt" && u.Altitude.Name == "ft" {
		return Figure{Number(g*perf.NauticalMile/perf.Foot, 0), "ft/nm"}
	}
	return Figure{Number(100*g, 1), "%"}
}

// GlideRatio is a ratio as "11.1 : 1".
func GlideRatio(r float64) string { return Number(r, 1) + Group + ":" + Group + "1" }

// PowerFine is a power (W) to a tenth of the unit.
func (u Units) PowerFine(p float64) Figure { return u.Power.in(p, 1) }

// PowerWhole is a power (W) to the whole unit.
func (u Units) PowerWhole(p float64) Figure { return u.Power.in(p, 0) }

// FuelWhole is fuel on board: kg to the whole unit; for an electric aeroplane charge, J to a tenth of a kWh.
func (u Units) FuelWhole(x float64) Figure {
	if u.Electric {
		return Figure{Number(x/perf.KilowattHour, 1), "kWh"}
	}
	return u.Fuel.in(x, 0)
}

// FuelFlow is a flow of fuel (kg/s) in units an hour, to a tenth; for an electric aeroplane the power drawn (W).
func (u Units) FuelFlow(x float64) Figure {
	if u.Electric {
		return u.PowerFine(x)
	}
	return Figure{Number(x*perf.Hour/u.Fuel.SI, 1), u.Fuel.Name + "/h"}
}

// DistanceWhole is a distance over the ground (m) to the whole unit.
func (u Units) DistanceWhole(d float64) Figure { return u.Distance.in(d, 0) }

// Hours is a time (s) in hours to a tenth.
func Hours(t float64) Figure { return Figure{Number(t/perf.Hour, 1), "h"} }

// Celsius is a temperature (K) in whole degrees Celsius, always with its sign.
func Celsius(t float64) Figure {
	s := Number(t-perf.ZeroCelsius, 0)
	if t-perf.ZeroCelsius > 0 && hasDigit(s) {
		s = "+" + s
	}
	return Figure{s, "°C"}
}

// Degrees is an angle (rad) in whole degrees.
func Degrees(a float64) Figure { return Figure{Number(a/perf.Degree, 0), "°"} }

// DegreesFine is an angle (rad) in degrees to a tenth.
func DegreesFine(a float64) Figure { return Figure{Number(a/perf.Degree, 1), "°"} }

// Hectopascals is a pressure (Pa) in hPa to a tenth.
func Hectopascals(p float64) Figure { return Figure{Number(p/perf.Hectopascal, 1), "hPa"} }

// Density is an air density (kg/m^3) to four decimals.
func Density(rho float64) Figure { return Figure{Number(rho, 4), "kg/m³"} }

// Revolutions is a speed of rotation (rev/s) in whole rpm.
func Revolutions(n float64) Figure { return Figure{Number(n/perf.RevPerMin, 0), "rpm"} }

// Percent is a ratio in whole per cent.
func Percent(x float64) Figure { return Figure{Number(100*x, 0), "%"} }

// Metres is a length (m) in whole units of height: the radius of a turn.
func (u Units) Metres(d float64) Figure { return u.Altitude.in(d, 0) }
