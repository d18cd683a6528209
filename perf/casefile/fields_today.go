package casefile

import "levelspan/perf"

// The largest number of runs in a file.
const maxRuns = 20000

func firstConfiguration(c *Case) string {
	if len(c.Aeroplane.Configurations) == 0 {
		return ""
	}
	return c.Aeroplane.Configurations[0].Name
}

// by makes the default one that depends on the rest of the case.
func (f Field) by(text string, dynamic func(*Case) float64) Field {
	f.Otherwise, f.dynamic = text, dynamic
	return f
}

// byFirst makes the first configuration's name the default.
func (f Field) byFirst() Field {
	f.Otherwise, f.dynamicText, f.Required = "the first configuration", firstConfiguration, false
	return f
}

// The standard temperature (ISO 2533) at a pressure altitude, °C; the case file's default where none is written.
func standardTemperatureC(pressureAltitudeM float64) float64 {
	if pressureAltitudeM > 11000 {
		return -56.5
	}
	return tidy(15 - 0.0065*pressureAltitudeM)
}

var todayObject = newObject(func(p *Today) *string { return &p.extra },
	leaf("mass_kg", func(p *Today) *float64 { return &p.MassKg }, of(perf.QuantityMass, Mass, "kg", 1, 0).
		by("the maximum mass", func(c *Case) float64 { return c.Aeroplane.MaximumMassKg }).
		where("Empty mass, people, baggage and fuel, as it flies now.")),
	leaf("pressure_altitude_m", func(p *Today) *float64 { return &p.PressureAltitudeM }, of(perf.QuantityPressureAltitude, Altitude, "m", 1, 0).
		where("What the altimeter shows with 1013.25 hPa set.")),
	leaf("outside_air_temperature_c", func(p *Today) *float64 { return &p.OutsideAirTemperatureC }, of(perf.QuantityTemperature, Temperature, "°C", 1, perf.ZeroCelsius).
		by("the standard temperature of the pressure altitude", func(c *Case) float64 { return standardTemperatureC(c.Today.PressureAltitudeM) }).
		where("Thermometer in the shade, or the aerodrome's report.")),
	leaf("dew_point_c", func(p *Today) **float64 { return &p.DewPointC }, of(perf.QuantityDewPoint, Temperature, "°C", 1, perf.ZeroCelsius).
		otherwise("dry air").
		where("Second temperature of the aerodrome's report; at most the air temperature. Left out, the air is dry.")),
	leaf("configuration", func(p *Today) *string { return &p.Configuration }, words("configuration", 1, 40).byFirst().
		where("One of the aeroplane's configurations.")),
	leaf("bank_deg", func(p *Today) *float64 { return &p.BankDeg }, of(perf.QuantityBank, Angle, "°", perf.Degree, 0).
		where("Bank held in level flight; 0 is straight flight.")),
	leaf("power_fraction", func(p *Today) *float64 { return &p.PowerFraction }, of(perf.QuantityPowerFraction, Ratio, "", 1, 0).or(1).
		where("Fraction of rated power asked for; 1 is full throttle. With a fixed-pitch propeller it scales full-throttle torque.")),
	leaf("headwind_mps", func(p *Today) *float64 { return &p.HeadwindMps }, of(perf.QuantityHeadwind, Speed, "m/s", 1, 0).
		where("Wind against the track; a tail wind is negative.")),
	leaf("fuel_kg", func(p *Today) *float64 { return &p.FuelKg }, of(perf.QuantityFuel, FuelMass, "kg", 1, 0).
		by("the usable fuel", func(c *Case) float64 {
			if c.Aeroplane.Fuel == nil {
				return 0
			}
			return c.Aeroplane.Fuel.UsableKg
		}).
		where("Usable fuel on board now, part of the mass.")),
	leaf("charge_kwh", func(p *Today) **float64 { return &p.ChargeKWh }, of(perf.QuantityUsableEnergy, Energy, "kWh", perf.KilowattHour, 0).named("charge left").
		otherwise("all of the usable charge").omitted().
		where("Usable charge left in the battery now, for an electric aeroplane.")),
	leaf("reserve_min", func(p *Today) *float64 { return &p.ReserveMin }, of(perf.QuantityReserve, Time, "min", perf.Minute, 0).or(30).
		where("Time to be left in the tanks at the end of a trip.")),
	leaf("field_elevation_m", func(p *Today) **float64 { return &p.FieldElevationM }, own("field elevation", Altitude, "m", -500, 9000).otherwise("not known").omitted().
		where("Aerodrome chart: height of the field above mean sea level.")),
	leaf("altimeter_setting_hpa", func(p *Today) **float64 { return &p.AltimeterSettingHPa }, of(perf.QuantityAltimeterSetting, Pressure, "hPa", perf.Hectopascal, 0).otherwise("not known").omitted().
		where("QNH: what the altimeter's window shows when it reads the field elevation on the ground.")),
	leaf("climb_gradient", func(p *Today) **float64 { return &p.ClimbGradient }, of(perf.QuantityClimbGradient, Ratio, "", 1, 0).otherwise("none asked for").omitted().
		where("Climb gradient that must be possible, height over distance through the air: 0.033 is 200 ft per nautical mile.")),
	leaf("air_from", func(p *Today) *string { return &p.AirFrom }, choice("way of entering the air", PressureAltitude, PressureAltitude, FieldElevation, DensityAltitude).
		where("How the screen asks for the air; pressure_altitude_m and outside_air_temperature_c are always what counts.")),
)

func spread(name string, d Dimension, unit string, min, max, byDefault float64, help string) Field {
	return own(name, d, unit, min, max).or(byDefault).where(help)
}

var beliefsObject = newObject(func(p *Beliefs) *string { return &p.extra },
	leaf("cd0", func(p *Beliefs) *float64 { return &p.CD0 }, spread("spread of cd0", Ratio, "", 0.0001, 2, 0.10, "Standard deviation of cd0 before flight, relative.")),
	leaf("oswald_e", func(p *Beliefs) *float64 { return &p.OswaldE }, spread("spread of the Oswald efficiency", Ratio, "", 0.0001, 2, 0.08, "Standard deviation before flight, relative.")),
	leaf("cl_max", func(p *Beliefs) *float64 { return &p.CLMax }, spread("spread of the maximum lift coefficients", Ratio, "", 0.0001, 2, 0.08, "Standard deviation before flight, relative.")),
	leaf("power", func(p *Beliefs) *float64 { return &p.Power }, spread("spread of full-throttle power", Ratio, "", 0.0001, 2, 0.05, "Standard deviation before flight, relative.")),
	leaf("propeller", func(p *Beliefs) *float64 { return &p.Propeller }, spread("spread of the propeller's numbers", Ratio, "", 0.0001, 2, 0.05, "Standard deviation before flight, relative.")),
	leaf("position_error_mps", func(p *Beliefs) *float64 { return &p.PositionErrorMps }, spread("spread of the position error", Correction, "m/s", 0.001, 20, 1.0, "Standard deviation before flight.")),
)

var instrumentsObject = newObject(func(p *Instruments) *string { return &p.extra },
	leaf("ias_mps", func(p *Instruments) *float64 { return &p.IASMps }, spread("spread of an airspeed reading", Correction, "m/s", 0.001, 20, 0.5, "Standard deviation of one steady reading.")),
	leaf("rate_mps", func(p *Instruments) *float64 { return &p.RateMps }, spread("spread of a rate of climb", Rate, "m/s", 0.001, 5, 0.15, "Standard deviation of one rate, timed between two heights.")),
	leaf("power", func(p *Instruments) *float64 { return &p.Power }, spread("spread of a power setting", Ratio, "", 0.0001, 1, 0.03, "Standard deviation, relative; a setting of 1 is full throttle and has none.")),
	leaf("rpm", func(p *Instruments) *float64 { return &p.RPM }, spread("spread of a tachometer reading", Revolutions, "rpm", 0.1, 500, 15, "Standard deviation of one reading.")),
	leaf("mass", func(p *Instruments) *float64 { return &p.Mass }, spread("spread of the mass", Ratio, "", 0.00001, 0.5, 0.01, "Standard deviation, relative.")),
	leaf("temperature_c", func(p *Instruments) *float64 { return &p.TemperatureC }, spread("spread of a temperature reading", TemperatureSpread, "°C", 0.01, 20, 1.0, "Standard deviation of one reading.")),
	leaf("altitude_m", func(p *Instruments) *float64 { return &p.AltitudeM }, spread("spread of an altimeter reading", Altitude, "m", 0.1, 500, 10, "Standard deviation of one reading.")),
)

// The kinds of run, and the states of the propeller in a glide.
const (
	LevelRun    = "level"
	ClimbRun    = "climb"
	GlideRun    = "glide"
	StallRun    = "stall"
	GPSRun      = "gps-legs"
	Stopped     = "stopped"
	Windmilling = "windmilling"
	Feathered   = "feathered"
)

var legObject = newObject(func(p *Leg) *string { return &p.extra },
	leaf("ground_speed_mps", func(p *Leg) *float64 { return &p.GroundSpeedMps }, own("ground speed", Speed, "m/s", 0, 400).need().where("GPS receiver, steady over the leg.")),
	leaf("track_deg", func(p *Leg) *float64 { return &p.TrackDeg }, own("track", Angle, "°", -360, 360).need().where("GPS receiver: track over the ground.")),
)

var runObject = newObject(func(p *Run) *string { return &p.extra },
	leaf("kind", func(p *Run) *string { return &p.Kind }, choice("kind of run", "", LevelRun, ClimbRun, GlideRun, StallRun, GPSRun)),
	leaf("configuration", func(p *Run) *string { return &p.Configuration }, words("configuration", 1, 40).byFirst()),
	leaf("ias_mps", func(p *Run) *float64 { return &p.IASMps }, of(perf.QuantityPositionErrorIAS, Speed, "m/s", 1, 0).need().where("Airspeed indicator, steady.")),
	leaf("pressure_altitude_m", func(p *Run) *float64 { return &p.PressureAltitudeM }, of(perf.QuantityPressureAltitude, Altitude, "m", 1, 0).need().where("Altimeter set to 1013.25 hPa; the middle of a climb or glide.")),
	leaf("outside_air_temperature_c", func(p *Run) *float64 { return &p.OutsideAirTemperatureC }, of(perf.QuantityTemperature, Temperature, "°C", 1, perf.ZeroCelsius).need().where("Thermometer at that height.")),
	leaf("mass_kg", func(p *Run) *float64 { return &p.MassKg }, of(perf.QuantityMass, Mass, "kg", 1, 0).need().where("At take-off, less the fuel burned since.")),
	leaf("power_fraction", func(p *Run) **float64 { return &p.PowerFraction }, of(perf.QuantityPowerFraction, Ratio, "", 1, 0).omitted().otherwise("not read; a level or climb run needs it or rpm").where("Fraction of rated power; 1 is full throttle.")),
	leaf("rpm", func(p *Run) **float64 { return &p.RPM }, of(perf.QuantityRatedSpeed, Revolutions, "rpm", perf.RevPerMin, 0).named("revolutions").omitted().otherwise("not read").where("Tachometer, for a fixed-pitch propeller.")),
	leaf("rate_mps", func(p *Run) **float64 { return &p.RateMps }, own("rate of climb", Rate, "m/s", -30, 30).omitted().otherwise("0 in a level run; a climb or glide needs it").where("Change of pressure altitude over time; down is negative.")),
	leaf("propeller", func(p *Run) *string { return &p.Propeller }, choice("propeller in the glide", "", Stopped, Windmilling, Feathered).forKinds(GlideRun)),
	list("legs", func(p *Run) *[]Leg { return &p.Legs }, 0, 100, "Three or more steady legs of a gps-legs run.", legObject).neededBy(3, GPSRun).omitted(),
	leaf("left_out", func(p *Run) *string { return &p.LeftOut }, words("reason for leaving the run out", 0, 500).omitted().where("Empty: the run counts.")),
)

// neededBy makes a list one that some kinds need, with at least min elements.
func (m member) neededBy(min int, kinds ...string) member {
	m.min, m.kinds = min, kinds
	return m
}

var displayObject = newObject(func(p *Display) *string { return &p.extra },
	leaf("speed_kind", func(p *Display) *string { return &p.SpeedKind }, choice("kind of airspeed", "CAS", "IAS", "CAS", "TAS")),
	leaf("speed", func(p *Display) *string { return &p.Speed }, choice("unit of speed", "kt", "kt", "mph", "km/h")),
	leaf("altitude", func(p *Display) *string { return &p.Altitude }, choice("unit of altitude", "ft", "ft", "m")),
	leaf("mass", func(p *Display) *string { return &p.Mass }, choice("unit of mass", "kg", "kg", "lb")),
	leaf("power", func(p *Display) *string { return &p.Power }, choice("unit of power", "kW", "kW", "hp")),
	leaf("fuel", func(p *Display) *string { return &p.Fuel }, choice("unit of fuel", "kg", "kg", "L", "US gal")),
	leaf("length", func(p *Display) *string { return &p.Length }, choice("unit of length", "m", "m", "ft")),
	leaf("selected", func(p *Display) *string { return &p.Selected }, words("limit marked on the chart", 0, 40).omitted()),
)

var caseObject = newObject(func(c *Case) *string { return &c.extra },
	member{key: "format", shape: shapeConstant},
	member{key: "version", shape: shapeConstant},
	part("aeroplane", func(c *Case) *Aeroplane { return &c.Aeroplane }, true, "The aeroplane.", aeroplaneObject),
	part("today", func(c *Case) *Today { return &c.Today }, false, "The moment that the figures are for.", todayObject),
	part("beliefs", func(c *Case) *Beliefs { return &c.Beliefs }, false, "Standard deviations of the aeroplane's numbers before flight, relative unless the key has a unit.", beliefsObject),
	part("instruments", func(c *Case) *Instruments { return &c.Instruments }, false, "Standard deviations of one reading, relative unless the key has a unit.", instrumentsObject),
	list("runs", func(c *Case) *[]Run { return &c.Runs }, 0, maxRuns, "Test runs.", runObject),
	part("display", func(c *Case) *Display { return &c.Display }, false, "How the person wants figures shown.", displayObject),
)
