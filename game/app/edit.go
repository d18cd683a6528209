package app

import (
	"errors"
	"math"
	"slices"
	"strconv"
	"strings"

	"levelspan/perf"
	"levelspan/perf/casefile"
)

// putNumber sets a number of the case, in the file's unit. The numbers of the day's air pull the others with them: see air.go.
func putNumber(c *casefile.Case, path string, v float64) error {
	t := &c.Today
	switch path {
	case pathDensityAltitude:
		return setDensityAltitude(c, v)
	case pathTemperature:
		if t.AirFrom == airFromField {
			return setField(c, v)
		}
	case pathElevation, pathSetting:
		if t.AirFrom == airFromField {
			temperature := fieldTemperature(c)
			if err := c.SetNumber(path, v); err != nil {
				return err
			}
			return setField(c, temperature)
		}
	}
	return c.SetNumber(path, v)
}

// clearNumber empties a number that may be absent.
func clearNumber(c *casefile.Case, path string) error {
	if c.Today.AirFrom == airFromField && (path == pathElevation || path == pathSetting) {
		temperature := fieldTemperature(c)
		if err := c.ClearNumber(path); err != nil {
			return err
		}
		if path == pathElevation {
			return nil
		}
		return setField(c, temperature)
	}
	return c.ClearNumber(path)
}

// fieldTemperature is what the thermometer shows at the field today, °C.
func fieldTemperature(c *casefile.Case) float64 {
	air, err := airOf(c)
	if err != nil {
		return c.Today.OutsideAirTemperatureC
	}
	if at, ok := fieldAir(c, air); ok {
		return at.Temperature - perf.ZeroCelsius
	}
	return c.Today.OutsideAirTemperatureC
}

// putChoice sets one of a few, and what must come with it: a kind of engine or propeller that was never described starts
// with the field table's typical figures; those of the other kinds stay for the way back.
func putChoice(c *casefile.Case, fields fieldTable, path, value string) error {
	f := fields.of(path)
	if f == nil || f.Kind == casefile.KindChoice && !slices.Contains(f.Choices, value) {
		return errNothingThere
	}
	a := &c.Aeroplane
	switch path {
	case "today.air_from":
		c.Today.AirFrom = value
		return enterAirBy(c, value)
	case "aeroplane.engine.kind":
		a.Engine.Kind = value
		fillTypical(c, fields, "aeroplane.engine.", value)
		if value == casefile.Electric && a.Battery == nil {
			a.Battery = &casefile.Battery{UsableKWh: 40}
		}
		return nil
	case "aeroplane.propeller.kind":
		p := &a.Propeller
		p.Kind = value
		fillTypical(c, fields, "aeroplane.propeller.", value)
		if value == casefile.Table && len(p.AdvanceRatio) < 3 {
			p.AdvanceRatio = []float64{0.2, 0.5, 0.8, 1}
			p.ThrustCoefficient = []float64{0.09, 0.065, 0.025, -0.01}
			p.PowerCoefficient = []float64{0.045, 0.042, 0.028, 0.012}
		}
		return nil
	}
	return c.SetText(path, value)
}

// enterAirBy changes the way of entry; the air stays, except that a density altitude alone means a dry standard day.
func enterAirBy(c *casefile.Case, way string) error {
	air, err := airOf(c)
	if err != nil {
		return err
	}
	switch way {
	case airFromDensityAltitude:
		return setDensityAltitude(c, air.DensityAltitude)
	case airFromField:
		if c.Today.FieldElevationM == nil {
			elevation := math.Max(air.PressureAltitude, 0)
			c.Today.FieldElevationM = &elevation
		}
		if c.Today.AltimeterSettingHPa == nil {
			setting := standardSetting / perf.Hectopascal
			c.Today.AltimeterSettingHPa = &setting
		}
	}
	return nil
}

// fillTypical gives the numbers that a kind needs and that are not physical a class average to begin with.
func fillTypical(c *casefile.Case, fields fieldTable, prefix, kind string) {
	e, p := &c.Aeroplane.Engine, &c.Aeroplane.Propeller
	for path, at := range map[string]*float64{
		"aeroplane.engine.rated_power_w": &e.RatedPowerW, "aeroplane.engine.rated_rpm": &e.RatedRPM,
		"aeroplane.engine.lapse_exponent": &e.LapseExponent, "aeroplane.engine.specific_consumption_kg_per_kwh": &e.SpecificConsumptionKgPerKWh,
		"aeroplane.propeller.efficiency": &p.Efficiency, "aeroplane.propeller.diameter_m": &p.DiameterM,
		"aeroplane.propeller.blade_efficiency": &p.BladeEfficiency, "aeroplane.propeller.polar_slope": &p.PolarSlope,
		"aeroplane.propeller.polar_intercept":          &p.PolarIntercept,
		"aeroplane.propeller.power_coefficient_static": &p.PowerCoefficientStatic,
		"aeroplane.propeller.power_coefficient_slope":  &p.PowerCoefficientSlope,
	} {
		f := fields.of(path)
		if f == nil || !strings.HasPrefix(path, prefix) || !f.Applies(kind) {
			continue
		}
		typical := f.Typical
		if typical == 0 {
			typical = f.Default
		}
		if *at < f.Min || *at > f.Max {
			*at = typical
		}
	}
}

var errNothingThere = errors.New("nothing there to change")

// press does what a button of the form says, and names the step.
func pressButton(c *casefile.Case, action string) (what string, err error) {
	a := &c.Aeroplane
	at, at2 := indexesOf(action)
	switch genericPath(action) {
	case "add/configuration":
		last := a.Configurations[len(a.Configurations)-1]
		last.Name = freeName(c, "configuration ")
		a.Configurations = append(a.Configurations, last)
		return "new configuration", nil
	case "remove/configuration[]":
		if at < 0 || at >= len(a.Configurations) || len(a.Configurations) < 2 {
			return "", errNothingThere
		}
		name := a.Configurations[at].Name
		a.Configurations = append(a.Configurations[:at:at], a.Configurations[at+1:]...)
		for i := len(a.Calibration) - 1; i >= 0; i-- {
			if a.Calibration[i].Configuration == name {
				a.Calibration = append(a.Calibration[:i:i], a.Calibration[i+1:]...)
			}
		}
		if c.Today.Configuration == name {
			c.Today.Configuration = a.Configurations[0].Name
		}
		for i := range c.Runs {
			if c.Runs[i].Configuration == name {
				return "", errors.New(capital(name) + " has runs flown in it and cannot be removed")
			}
		}
		return "removal of " + name, nil
	case "add/fuel":
		usable := c.Today.FuelKg
		if usable <= 0 {
			usable = 50
		}
		a.Fuel = &casefile.Fuel{UsableKg: usable}
		return "fuel", nil
	case "remove/fuel":
		a.Fuel = nil
		c.Today.FuelKg = 0
		return "removal of the fuel", nil
	case "add/battery":
		a.Battery = &casefile.Battery{UsableKWh: 40}
		return "battery", nil
	case "remove/battery":
		a.Battery, c.Today.ChargeKWh = nil, nil
		return "removal of the battery", nil
	case "add/consumption":
		e := &a.Engine
		p := casefile.ConsumptionPoint{PowerFraction: 0.5, KgPerKWh: e.SpecificConsumptionKgPerKWh}
		if n := len(e.ConsumptionTable); n > 0 {
			last := e.ConsumptionTable[n-1]
			p = last
			p.PowerFraction = (last.PowerFraction + 1) / 2
			if p.PowerFraction >= 0.999 {
				return "", errors.New("the last row is already at full power")
			}
		}
		e.ConsumptionTable = append(e.ConsumptionTable, p)
		return "row of consumption", nil
	case "remove/consumption[]":
		t := a.Engine.ConsumptionTable
		if at < 0 || at >= len(t) {
			return "", errNothingThere
		}
		a.Engine.ConsumptionTable = append(t[:at:at], t[at+1:]...)
		return "removal of a row", nil
	case "add/propeller-row":
		p := &a.Propeller
		n := len(p.AdvanceRatio)
		if n == 0 || len(p.ThrustCoefficient) != n || len(p.PowerCoefficient) != n {
			return "", errNothingThere
		}
		p.AdvanceRatio = append(p.AdvanceRatio, p.AdvanceRatio[n-1]+0.1)
		p.ThrustCoefficient = append(p.ThrustCoefficient, p.ThrustCoefficient[n-1])
		p.PowerCoefficient = append(p.PowerCoefficient, p.PowerCoefficient[n-1])
		return "row of the propeller", nil
	case "remove/propeller-row[]":
		p := &a.Propeller
		if at < 0 || at >= len(p.AdvanceRatio) || at >= len(p.ThrustCoefficient) || at >= len(p.PowerCoefficient) {
			return "", errNothingThere
		}
		p.AdvanceRatio = without(p.AdvanceRatio, at)
		p.ThrustCoefficient = without(p.ThrustCoefficient, at)
		p.PowerCoefficient = without(p.PowerCoefficient, at)
		return "removal of a row", nil
	case "add/calibration[]":
		if at < 0 || at >= len(a.Configurations) {
			return "", errNothingThere
		}
		addCalibration(c, a.Configurations[at].Name)
		return "calibration point", nil
	case "remove/calibration[][]":
		if at < 0 || at >= len(a.Calibration) || at2 < 0 || at2 >= len(a.Calibration[at].Points) {
			return "", errNothingThere
		}
		points := a.Calibration[at].Points
		if len(points) == 1 {
			a.Calibration = append(a.Calibration[:at:at], a.Calibration[at+1:]...)
		} else {
			a.Calibration[at].Points = append(points[:at2:at2], points[at2+1:]...)
		}
		return "removal of a calibration point", nil
	}
	return "", errNothingThere
}

// addCalibration puts a new point above the last one of a configuration, with the same correction.
func addCalibration(c *casefile.Case, configuration string) {
	a := &c.Aeroplane
	for i := range a.Calibration {
		if t := &a.Calibration[i]; t.Configuration == configuration {
			p := casefile.CalibrationPoint{IASMps: 25}
			if n := len(t.Points); n > 0 {
				p = casefile.CalibrationPoint{IASMps: t.Points[n-1].IASMps + 10*perf.Knot, CASMinusIASMps: t.Points[n-1].CASMinusIASMps}
			}
			t.Points = append(t.Points, p)
			return
		}
	}
	a.Calibration = append(a.Calibration, casefile.Calibration{Configuration: configuration,
		Points: []casefile.CalibrationPoint{{IASMps: 50 * perf.Knot}}})
}

// rename gives a configuration another name everywhere it is spoken of.
func rename(c *casefile.Case, index int, name string) error {
	configs := c.Aeroplane.Configurations
	if index < 0 || index >= len(configs) {
		return errNothingThere
	}
	old := configs[index].Name
	for i := range configs {
		if i != index && configs[i].Name == name {
			return errors.New("another configuration has this name")
		}
	}
	configs[index].Name = name // whether it is a name at all is for Validate to say
	if c.Today.Configuration == old {
		c.Today.Configuration = name
	}
	for i := range c.Aeroplane.Calibration {
		if c.Aeroplane.Calibration[i].Configuration == old {
			c.Aeroplane.Calibration[i].Configuration = name
		}
	}
	for i := range c.Runs {
		if c.Runs[i].Configuration == old {
			c.Runs[i].Configuration = name
		}
	}
	return nil
}

func freeName(c *casefile.Case, stem string) string {
	for n := len(c.Aeroplane.Configurations) + 1; ; n++ {
		name, taken := stem+strconv.Itoa(n), false
		for i := range c.Aeroplane.Configurations {
			taken = taken || c.Aeroplane.Configurations[i].Name == name
		}
		if !taken {
			return name
		}
	}
}

func without(s []float64, i int) []float64 {
	return append(append([]float64(nil), s[:i]...), s[i+1:]...)
}

// indexesOf reads the first two indexes of a path, -1 where there is none.
func indexesOf(path string) (first, second int) {
	found := [2]int{-1, -1}
	for k := range found {
		i := strings.IndexByte(path, '[')
		if i < 0 {
			break
		}
		j := strings.IndexByte(path[i:], ']')
		if j < 0 {
			break
		}
		if n, err := strconv.Atoi(path[i+1 : i+j]); err == nil {
			found[k] = n
		}
		path = path[i+j+1:]
	}
	return found[0], found[1]
}

// refusal is an error in words for the place beside a field: the faults of a case without the field's own path.
func refusal(err error, path string) string {
	var one *casefile.Fault
	var many casefile.Faults
	switch {
	case err == nil:
		return ""
	case errors.As(err, &one):
		return capital(one.Text())
	case errors.As(err, &many) && len(many) > 0:
		for i := range many {
			if many[i].Path == path {
				return capital(many[i].Text())
			}
		}
		return many[0].Error()
	}
	return capital(err.Error())
}
