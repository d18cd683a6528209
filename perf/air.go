package perf

import "math"

// Constants of the standard atmosphere, ISO 2533:1975. Heights are geopotential.
const (
	SeaLevelPressure    = 101325.0 // Pa
	SeaLevelTemperature = 288.15   // K
	SeaLevelDensity     = SeaLevelPressure / (gasConstant * SeaLevelTemperature)

	gasConstant      = 287.05287 // R of dry air, J/(kg K)
	vapourConstant   = 461.495   // R of water vapour, J/(kg K)
	heatRatio        = 1.4       // gamma
	lapseRate        = 0.0065    // K/m below the tropopause
	tropopause       = 11000.0   // m
	stratosphereTemp = SeaLevelTemperature - lapseRate*tropopause
	pressureExponent = StandardGravity / (gasConstant * lapseRate) // p ~ T^5.2559 below the tropopause
	// scaleHeight is R T/g of the isothermal layer, m.
	scaleHeight = gasConstant * stratosphereTemp / StandardGravity

	lowestHeight  = -2000.0
	highestHeight = 20000.0
)

// logTropopause is ln(T/T0) at the tropopause.
var logTropopause = math.Log(stratosphereTemp / SeaLevelTemperature)

// standard is the standard temperature (K) and pressure (Pa) at geopotential height h (m). Below -2 km and above 20 km
// the layer next to it is continued; it is finite for every finite h up to 40 km.
func standard(h float64) (temperature, pressure float64) {
	if h <= tropopause {
		temperature = SeaLevelTemperature - lapseRate*h
		return temperature, SeaLevelPressure * math.Exp(pressureExponent*math.Log(temperature/SeaLevelTemperature))
	}
	return stratosphereTemp, SeaLevelPressure * math.Exp(pressureExponent*logTropopause-(h-tropopause)/scaleHeight)
}

// heightOfPressure is the inverse of standard in pressure, m.
func heightOfPressure(p float64) float64 {
	l := math.Log(p / SeaLevelPressure)
	if l >= pressureExponent*logTropopause {
		return -math.Expm1(l/pressureExponent) * (SeaLevelTemperature / lapseRate)
	}
	return tropopause + scaleHeight*(pressureExponent*logTropopause-l)
}

// heightOfDensity is the standard height of a density, m.
func heightOfDensity(rho float64) float64 {
	l := math.Log(rho / SeaLevelDensity)
	if l >= (pressureExponent-1)*logTropopause {
		return -math.Expm1(l/(pressureExponent-1)) * (SeaLevelTemperature / lapseRate)
	}
	return tropopause + scaleHeight*((pressureExponent-1)*logTropopause-l)
}

// StandardTemperature is the standard temperature at a pressure altitude (m), K.
func StandardTemperature(pressureAltitude float64) float64 {
	return SeaLevelTemperature - lapseRate*min(pressureAltitude, tropopause)
}

// SaturationVapourPressure is that of water vapour over water at a temperature (K), Pa: the formula of WMO-No. 8
// (CIMO guide), annex 4.B, 6.112 hPa exp(17.62 t/(243.12 + t)). Within 0.3 % of the reference equations from 0 to 50 °C. Below
// 40 K, where it says nothing, it is 0.
func SaturationVapourPressure(temperature float64) float64 {
	t := temperature - ZeroCelsius
	if !(temperature > 40) {
		return 0
	}
	return 611.2 * math.Exp(17.62*t/(243.12+t))
}

// day is what stays the same when one climbs: the deviation from the standard temperature and the depression of
// the dew point.
type day struct {
	deviation  float64 // K
	depression float64 // K; counts only where humid
	humid      bool
}

// sky is the part of Air that an evaluation needs, at one height.
type sky struct {
	height      float64 // pressure altitude, m
	temperature float64 // K
	density     float64 // kg/m^3
	stdTemp     float64 // K
	stdSigma    float64 // standard density at that pressure altitude, of SeaLevelDensity
	pressure    float64 // Pa
	vapour      float64 // Pa
}

func (a *Air) day() day {
	d := day{deviation: a.Temperature - StandardTemperature(a.PressureAltitude)}
	if a.DewPoint > 0 && a.VapourPressure > 0 {
		d.humid, d.depression = true, a.Temperature-a.DewPoint
	}
	return d
}

// at is the day's air at pressure altitude h. Vapour is held below half of the pressure, and the temperature above 50 K, so that
// an unearthly day carried through 22 km stays air.
func (d day) at(h float64) sky {
	ts, p := standard(h)
	t := max(ts+d.deviation, 50)
	s := sky{height: h, temperature: t, stdTemp: ts, pressure: p}
	s.stdSigma = p / SeaLevelPressure * SeaLevelTemperature / ts
	if d.humid {
		s.vapour = min(SaturationVapourPressure(t-d.depression), 0.5*p)
	}
	s.density = density(p, t, s.vapour)
	return s
}

// density is that of dry air and vapour as two ideal gases, kg/m^3.
func density(p, t, vapour float64) float64 {
	return (p-vapour)/(gasConstant*t) + vapour/(vapourConstant*t)
}

func (s *sky) air(d day) Air {
	a := Air{
		PressureAltitude: s.height, Temperature: s.temperature, VapourPressure: s.vapour,
		Pressure: s.pressure, Density: s.density,
		DensityAltitude: heightOfDensity(s.density),
		SpeedOfSound:    math.Sqrt(heatRatio * s.pressure / s.density),
	}
	if d.humid {
		a.DewPoint = s.temperature - d.depression
	}
	return a
}

// AirAt is the air at a pressure altitude (m, -2 to 20 km) and temperature (K); dewPoint (K) 0 means dry. Density is that of dry
// air plus vapour. A *DomainError names what is out of range; the dew point must not lie above the temperature, nor its
// vapour pressure above half the pressure.
//
// Source: ISO 2533:1975; speed of sound from gamma p/rho.
func AirAt(pressureAltitude, temperature, dewPoint float64) (Air, error) {
	var f faults
	f.check("PressureAltitude", QuantityPressureAltitude, pressureAltitude)
	f.check("Temperature", QuantityTemperature, temperature)
	if dewPoint != 0 {
		f.check("DewPoint", QuantityDewPoint, dewPoint)
	}
	if len(f) > 0 {
		return Air{}, f.err()
	}
	d := day{deviation: temperature - StandardTemperature(pressureAltitude)}
	if dewPoint != 0 {
		if dewPoint > temperature {
			f.add("DewPoint", QuantityDewPoint, dewPoint, QuantityDewPoint.Domain().Min, temperature, "the dew point is above the temperature")
			return Air{}, f.err()
		}
		d.humid, d.depression = true, temperature-dewPoint
	}
	s := d.at(pressureAltitude)
	if s.vapour >= 0.5*s.pressure {
		f.add("DewPoint", QuantityDewPoint, dewPoint, QuantityDewPoint.Domain().Min, temperature, "more vapour than the air can hold at that height")
		return Air{}, f.err()
	}
	s.temperature = temperature // not through the deviation and back
	a := s.air(d)
	a.DewPoint = dewPoint
	return a, nil
}

// AirAtDensityAltitude is the standard day's air at a density altitude, m (-2 to 20 km).
func AirAtDensityAltitude(densityAltitude float64) (Air, error) {
	if !QuantityPressureAltitude.Domain().Holds(densityAltitude) {
		return Air{}, densityAltitudeFault(densityAltitude)
	}
	return AirAt(densityAltitude, StandardTemperature(densityAltitude), 0)
}

// AirAtField is the air at a field elevation (m), with altimeter setting (QNH, Pa), temperature and dew point (K). The
// altimeter is the standard one: its scale is moved by the standard height of the setting.
func AirAtField(elevation, altimeterSetting, temperature, dewPoint float64) (Air, error) {
	var f faults
	f.check("Elevation", QuantityPressureAltitude, elevation)
	f.check("AltimeterSetting", QuantityAltimeterSetting, altimeterSetting)
	if len(f) > 0 {
		return Air{}, f.err()
	}
	return AirAt(elevation+heightOfPressure(altimeterSetting), temperature, dewPoint)
}

// MovedToPressureAltitude is the air of the same day at another pressure altitude: the deviation from the
// standard temperature and the dew-point depression are held.
func (a Air) MovedToPressureAltitude(pressureAltitude float64) (Air, error) {
	var f faults
	f.check("PressureAltitude", QuantityPressureAltitude, pressureAltitude)
	a.check(&f)
	if len(f) > 0 {
		return Air{}, f.err()
	}
	d := a.day()
	s := d.at(pressureAltitude)
	f.check("Temperature", QuantityTemperature, s.temperature)
	if len(f) > 0 {
		return Air{}, f.err()
	}
	return s.air(d), nil
}

// MovedToDensityAltitude is the air of the same day where the density altitude is the one given.
func (a Air) MovedToDensityAltitude(densityAltitude float64) (Air, error) {
	var f faults
	a.check(&f)
	if len(f) > 0 {
		return Air{}, f.err()
	}
	if math.IsNaN(densityAltitude) {
		return Air{}, densityAltitudeFault(densityAltitude)
	}
	d := a.day()
	h, ok := d.heightOfDensityAltitude(densityAltitude)
	if !ok {
		return Air{}, densityAltitudeFault(densityAltitude)
	}
	return a.MovedToPressureAltitude(h)
}

func densityAltitudeFault(h float64) error {
	var f faults
	f.add("DensityAltitude", QuantityPressureAltitude, h, lowestHeight, highestHeight,
		"the density altitude is outside the atmosphere that the model knows")
	return f.err()
}

// StandardAir is the standard day's sea-level air.
func StandardAir() Air {
	d := day{}
	s := d.at(0)
	return s.air(d)
}

// check reports what is wrong with an air that was not made by the functions above.
func (a *Air) check(f *faults) {
	f.check("Air.PressureAltitude", QuantityPressureAltitude, a.PressureAltitude)
	f.check("Air.Temperature", QuantityTemperature, a.Temperature)
	if !(a.VapourPressure >= 0 && a.VapourPressure <= 0.5*a.Pressure) {
		f.add("Air.VapourPressure", QuantityDewPoint, a.VapourPressure, 0, 0, "the vapour pressure does not belong to the pressure")
		return
	}
	if a.DewPoint != 0 && !(a.DewPoint > 0 && a.DewPoint <= a.Temperature) {
		f.add("Air.DewPoint", QuantityDewPoint, a.DewPoint, QuantityDewPoint.Domain().Min, a.Temperature, "the dew point is above the temperature")
		return
	}
	rho := density(a.Pressure, a.Temperature, a.VapourPressure)
	sound := math.Sqrt(heatRatio * a.Pressure / a.Density)
	if !(a.Pressure > 0 && math.Abs(a.Density-rho) <= 1e-6*rho && math.Abs(a.SpeedOfSound-sound) <= 1e-6*sound) {
		f.add("Air", QuantityPressureAltitude, a.Density, 0, 0, "pressure, temperature and density do not belong together")
	}
}
