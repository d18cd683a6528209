package casefile

import (
	"strconv"
	"strings"

	"levelspan/perf"
)

// checkModel asks perf whether it takes the case: the last gate, for rules that only the model knows. Its faults are
// given in the file's terms.
func (c *Case) checkModel(faults *Faults) {
	a, condition, err := c.model()
	if err != nil {
		c.translate(err, "today.", faults)
		return
	}
	if err := a.Validate(); err != nil {
		c.translate(err, "", faults)
	}
	if err := condition.Validate(&a); err != nil {
		c.translate(err, "today.", faults)
	}
}

// modelPaths gives the path in the file of a key of perf; [] stands for the first index.
var modelPaths = map[string]string{
	"WingArea":                            "aeroplane.wing_area_m2",
	"WingSpan":                            "aeroplane.wing_span_m",
	"EmptyMass":                           "aeroplane.empty_mass_kg",
	"MaximumMass":                         "aeroplane.maximum_mass_kg",
	"Polar.ParasiteDrag":                  "aeroplane.polar.cd0",
	"Polar.OswaldEfficiency":              "aeroplane.polar.oswald_e",
	"Polar.LiftOfLeastDrag":               "aeroplane.polar.cl_min_drag",
	"Configurations[].MaximumLift":        "aeroplane.configurations[].cl_max",
	"Configurations[].ParasiteDragRise":   "aeroplane.configurations[].delta_cd0",
	"Engine.RatedPower":                   "aeroplane.engine.rated_power_w",
	"Engine.RatedSpeed":                   "aeroplane.engine.rated_rpm",
	"Engine.MaximumSpeed":                 "aeroplane.engine.maximum_rpm",
	"Engine.ThermalPower":                 "aeroplane.engine.thermal_power_w",
	"Propeller.Table[].AdvanceRatio":      "aeroplane.propeller.advance_ratio[]",
	"Propeller.Table[].ThrustCoefficient": "aeroplane.propeller.thrust_coefficient[]",
	"Propeller.Table[].PowerCoefficient":  "aeroplane.propeller.power_coefficient[]",
	"Propeller.Table":                     "aeroplane.propeller.advance_ratio",
	"today.Mass":                          "today.mass_kg",
	"today.PressureAltitude":              "today.pressure_altitude_m",
	"today.Air.PressureAltitude":          "today.pressure_altitude_m",
	"today.Temperature":                   "today.outside_air_temperature_c",
	"today.Air.Temperature":               "today.outside_air_temperature_c",
	"today.DewPoint":                      "today.dew_point_c",
	"today.Air.DewPoint":                  "today.dew_point_c",
	"today.Bank":                          "today.bank_deg",
	"today.PowerFraction":                 "today.power_fraction",
	"today.Headwind":                      "today.headwind_mps",
	"today.Fuel":                          "today.fuel_kg",
	"today.ClimbGradient":                 "today.climb_gradient",
}

func (c *Case) translate(err error, prefix string, faults *Faults) {
	all := perf.Faults(err)
	if len(all) == 0 {
		faults.add("aeroplane", "the case", "what the model takes: "+err.Error())
	}
	for _, e := range all {
		index := ""
		pattern := prefix + e.Key
		if i := strings.IndexByte(pattern, '['); i >= 0 {
			if j := strings.IndexByte(pattern[i:], ']'); j > 0 {
				index = pattern[i : i+j+1]
				pattern = pattern[:i] + "[]" + pattern[i+j+1:]
			}
		}
		path, known := modelPaths[pattern]
		if !known {
			path = "aeroplane"
			if prefix != "" {
				path = "today"
			}
			faults.add(path, e.Key, e.Error())
			continue
		}
		path = strings.Replace(path, "[]", index, 1)
		f, _ := FieldOf(path)
		value, set := c.Number(path)
		if !set {
			value = f.FromSI(e.Value)
		}
		allowed := e.Reason
		if e.Min != 0 || e.Max != 0 {
			allowed = strconv.FormatFloat(f.FromSI(e.Min), 'g', 6, 64) + " to " + strconv.FormatFloat(f.FromSI(e.Max), 'g', 6, 64)
			if f.Unit != "" {
				allowed += " " + f.Unit
			}
			if e.Reason != "" {
				allowed += ": " + e.Reason
			}
		}
		faults.add(path, plainNumber(value), allowed)
	}
}
