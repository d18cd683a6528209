package app

import (
	"levelspan/perf"
	"levelspan/perf/casefile"
)

// The ways in which a person enters the air of the day (casefile.Today.AirFrom).
const (
	airFromPressureAltitude = "pressure-altitude"
	airFromField            = "field"
	airFromDensityAltitude  = "density-altitude"
)

// standardSetting is the altimeter setting of the standard atmosphere, Pa (ISO 2533:1975).
const standardSetting = 101325.0

// airOf is the air that the case describes at today's pressure altitude.
func airOf(c *casefile.Case) (perf.Air, error) {
	t := &c.Today
	dew := 0.0
	if t.DewPointC != nil {
		dew = *t.DewPointC + perf.ZeroCelsius
	}
	return perf.AirAt(t.PressureAltitudeM, t.OutsideAirTemperatureC+perf.ZeroCelsius, dew)
}

// putAir makes air today's air. A dew point is kept only where the case already has one.
func putAir(c *casefile.Case, air perf.Air) {
	t := &c.Today
	t.PressureAltitudeM = air.PressureAltitude
	t.OutsideAirTemperatureC = air.Temperature - perf.ZeroCelsius
	if t.DewPointC != nil && air.DewPoint > 0 {
		dew := air.DewPoint - perf.ZeroCelsius
		if dew > t.OutsideAirTemperatureC { // by rounding
			dew = t.OutsideAirTemperatureC
		}
		t.DewPointC = &dew
	}
}

// fieldPressureAltitude is the pressure altitude of the field under today's altimeter setting; ok is false where the case
// names no field.
func fieldPressureAltitude(c *casefile.Case) (pa float64, ok bool) {
	t := &c.Today
	if t.FieldElevationM == nil {
		return 0, false
	}
	air, err := perf.AirAtField(*t.FieldElevationM, altimeterSetting(c), 288.15, 0)
	if err != nil {
		return 0, false
	}
	return air.PressureAltitude, true
}

func altimeterSetting(c *casefile.Case) float64 {
	if c.Today.AltimeterSettingHPa == nil {
		return standardSetting
	}
	return *c.Today.AltimeterSettingHPa * perf.Hectopascal
}

// fieldAir is the day's air at the field: today's deviation from the standard temperature held.
func fieldAir(c *casefile.Case, today perf.Air) (perf.Air, bool) {
	pa, ok := fieldPressureAltitude(c)
	if !ok {
		return perf.Air{}, false
	}
	air, err := today.MovedToPressureAltitude(pa)
	return air, err == nil
}

// setField puts today's air at the field with the temperature given there (°C); it is what an edit of the elevation, the
// altimeter setting or the field's temperature does.
func setField(c *casefile.Case, temperatureC float64) error {
	t := &c.Today
	elevation := 0.0
	if t.FieldElevationM != nil {
		elevation = *t.FieldElevationM
	} else {
		t.FieldElevationM = &elevation
	}
	dew := 0.0
	if t.DewPointC != nil {
		dew = *t.DewPointC + perf.ZeroCelsius
	}
	air, err := perf.AirAtField(elevation, altimeterSetting(c), temperatureC+perf.ZeroCelsius, dew)
	if err != nil {
		return err
	}
	putAir(c, air)
	return nil
}

// setDensityAltitude makes today a standard, dry day at a density altitude (m): the way of entry for a person who knows
// nothing else.
func setDensityAltitude(c *casefile.Case, densityAltitude float64) error {
	air, err := perf.AirAtDensityAltitude(densityAltitude)
	if err != nil {
		return err
	}
	c.Today.DewPointC = nil
	putAir(c, air)
	return nil
}

// moveToDensityAltitude is what the handle does: the same day, from start, where the density altitude is the one given.
func moveToDensityAltitude(c *casefile.Case, start perf.Air, densityAltitude float64) error {
	air, err := start.MovedToDensityAltitude(densityAltitude)
	if err != nil {
		return err
	}
	putAir(c, air)
	return nil
}
