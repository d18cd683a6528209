package app

import (
	"strconv"
	"strings"

	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
)

// rowKind is what a row of a form is.
type rowKind uint8

const (
	rowHeading rowKind = iota
	rowNumber          // opens the keypad
	rowMaybe           // likewise, and can be emptied
	rowText            // free text
	rowChoice          // one of a few
	rowButton          // does something at once
	rowFact            // only tells
)

// formRow is one row of the Aeroplane screen, before it is drawn.
type formRow struct {
	kind      rowKind
	path      string // of the field; of a button what it does, "add/configuration"
	label     string
	value     string // as shown, with the unit
	unit      string
	allowed   string // the range in the unit shown
	otherwise string // what holds where nothing is set
	help      string
	set       bool // rowMaybe: has a value
	selected  string
	choices   []choice
	min, max  float64 // file unit
	number    float64 // file unit
}

type choice struct{ value, label string }

// fieldTable finds a field's entry by a path with or without indexes.
type fieldTable map[string]*casefile.Field

func newFieldTable() fieldTable {
	fields := casefile.Fields()
	t := make(fieldTable, len(fields)+1)
	for i := range fields {
		t[fields[i].Path] = &fields[i]
	}
	// The way of entry by density altitude alone has no key of its own in the file.
	t[pathDensityAltitude] = &casefile.Field{Path: pathDensityAltitude, Dimension: casefile.Altitude, Name: "density altitude", Unit: "m",
		Min: perf.QuantityPressureAltitude.Domain().Min, Max: highestAltitude,
		Help: "Where only the density altitude is known, as from a board beside the runway. The day is taken as a dry standard one."}
	return t
}

const (
	pathDensityAltitude  = "today.density_altitude_m"
	pathPressureAltitude = "today.pressure_altitude_m"
	pathTemperature      = "today.outside_air_temperature_c"
	pathElevation        = "today.field_elevation_m"
	pathSetting          = "today.altimeter_setting_hpa"
	pathMass             = "today.mass_kg"
)

// of is the entry for a path; indexes count as "[]", or as nothing where a list of plain numbers is meant.
func (t fieldTable) of(path string) *casefile.Field {
	if f := t[path]; f != nil {
		return f
	}
	generic := genericPath(path)
	if f := t[generic]; f != nil {
		return f
	}
	return t[strings.TrimSuffix(generic, "[]")]
}

func genericPath(path string) string {
	var b strings.Builder
	inside := false
	for _, r := range path {
		switch {
		case r == '[':
			inside = true
			b.WriteString("[]")
		case r == ']':
			inside = false
		case !inside:
			b.WriteRune(r)
		}
	}
	return b.String()
}

// formBuilder collects rows for one case.
type formBuilder struct {
	c      *casefile.Case
	units  figure.Units
	fields fieldTable
	rows   []formRow
}

func (b *formBuilder) heading(text string) {
	b.rows = append(b.rows, formRow{kind: rowHeading, label: text})
}

func (b *formBuilder) button(action, label string) {
	b.rows = append(b.rows, formRow{kind: rowButton, path: action, label: label})
}

func (b *formBuilder) fact(label, value string) {
	b.rows = append(b.rows, formRow{kind: rowFact, label: label, value: value})
}

// number appends the field at path with its value, or nothing where the table has no such field.
func (b *formBuilder) number(path, label string) {
	v, set := b.c.Number(path)
	b.numberAs(path, label, v, set)
}

func (b *formBuilder) numberAs(path, label string, v float64, set bool) {
	f := b.fields.of(path)
	if f == nil {
		return
	}
	m := measureOf(f, b.units)
	row := formRow{kind: rowNumber, path: path, label: label, unit: m.unit, help: f.Help, set: set, min: f.Min, max: f.Max, number: v}
	if label == "" {
		row.label = capital(f.Name)
	}
	if f.Kind == casefile.KindMaybe {
		row.kind = rowMaybe
	}
	row.allowed, row.otherwise = m.allowed(), f.Otherwise
	if set {
		row.value = m.text(v)
	}
	b.rows = append(b.rows, row)
}

func (b *formBuilder) text(path, label string) {
	f := b.fields.of(path)
	if f == nil {
		return
	}
	v, _ := b.c.Text(path)
	b.rows = append(b.rows, formRow{kind: rowText, path: path, label: label, value: v, help: f.Help, max: f.Max})
}

func (b *formBuilder) choice(path, label string) {
	f := b.fields.of(path)
	if f == nil {
		return
	}
	v, _ := b.c.Text(path)
	row := formRow{kind: rowChoice, path: path, label: label, help: f.Help, selected: v}
	for _, c := range f.Choices {
		row.choices = append(row.choices, choice{c, choiceLabel(c)})
	}
	b.rows = append(b.rows, row)
}

// choiceLabel is a choice of the file in words.
func choiceLabel(c string) string {
	switch c {
	case airFromField:
		return "Field and QNH"
	case casefile.Table:
		return "Table"
	}
	return capital(strings.ReplaceAll(c, "-", " "))
}

func capital(s string) string {
	if s == "" {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}

// aeroplaneRows is the form of the aeroplane's numbers.
func (b *formBuilder) aeroplaneRows() []formRow {
	a := &b.c.Aeroplane
	b.heading("Aeroplane")
	b.text("aeroplane.name", "Name")
	b.text("aeroplane.note", "Note")
	b.number("aeroplane.empty_mass_kg", "Empty mass")
	b.number("aeroplane.maximum_mass_kg", "Maximum mass")
	b.heading("Wing and drag")
	b.number("aeroplane.wing_area_m2", "Wing area")
	b.number("aeroplane.wing_span_m", "Wing span")
	if a.WingAreaM2 > 0 {
		b.fact("Aspect ratio", figure.Number(a.WingSpanM*a.WingSpanM/a.WingAreaM2, 2))
	}
	b.number("aeroplane.polar.cd0", "Parasite drag, CD0")
	b.number("aeroplane.polar.oswald_e", "Oswald efficiency, e")
	b.number("aeroplane.polar.cl_min_drag", "CL of least drag")
	for i := range a.Configurations {
		p := indexed("aeroplane.configurations", i)
		b.heading("Configuration: " + a.Configurations[i].Name)
		b.text(p+".name", "Name")
		b.number(p+".cl_max", "Maximum lift, CL max")
		b.number(p+".delta_cd0", "Rise of CD0")
		if len(a.Configurations) > 1 {
			b.button(indexed("remove/configuration", i), "Remove "+a.Configurations[i].Name)
		}
	}
	b.button("add/configuration", "Add a configuration")
	b.engineRows()
	b.propellerRows()
	b.heading("Placards, calibrated airspeed")
	b.number("aeroplane.placards.vne_cas_mps", "Never exceed, VNE")
	b.number("aeroplane.placards.vne_tas_mps", "Never exceed, true airspeed")
	b.number("aeroplane.placards.vno_cas_mps", "Normal operating, VNO")
	b.number("aeroplane.placards.va_cas_mps", "Manoeuvring at maximum mass, VA")
	b.number("aeroplane.placards.vfe_cas_mps", "Flaps extended, VFE")
	b.calibrationRows()
	return b.rows
}

// engineLabels are shorter or plainer than the field's name.
var engineLabels = map[string]string{"rated_rpm": "Propeller speed at rated power", "maximum_rpm": "Red line", "drop_off_constant": "Drop-off constant, c",
	"lapse_exponent": "Lapse exponent, x", "thermal_power_w": "Thermal power at sea level"}

func (b *formBuilder) engineRows() {
	e := &b.c.Aeroplane.Engine
	b.heading("Engine")
	b.choice("aeroplane.engine.kind", "Kind")
	for _, key := range [...]string{"rated_power_w", "rated_rpm", "maximum_rpm", "power_law", "full_throttle_altitude_m", "drop_off_constant",
		"lapse_exponent", "thermal_power_w", "specific_consumption_kg_per_kwh"} {
		path := "aeroplane.engine." + key
		f := b.fields.of(path)
		if f == nil || !f.Applies(e.Kind) {
			continue
		}
		if f.Kind == casefile.KindChoice {
			b.choice(path, "Full-throttle power falls with")
		} else {
			b.number(path, engineLabels[key])
		}
	}
	if e.Kind != casefile.Electric {
		b.heading("Consumption against power")
		for i := range e.ConsumptionTable {
			p := indexed("aeroplane.engine.consumption_table", i)
			b.number(p+".power_fraction", "Row "+strconv.Itoa(i+1)+", power setting")
			b.number(p+".kg_per_kwh", "Row "+strconv.Itoa(i+1)+", consumption")
			b.button(indexed("remove/consumption", i), "Row "+strconv.Itoa(i+1))
		}
		b.button("add/consumption", "Add a row")
		b.heading("Fuel")
		if b.c.Aeroplane.Fuel != nil {
			b.number("aeroplane.fuel.usable_kg", "Usable fuel")
			b.number("aeroplane.fuel.density_kg_per_l", "Fuel density")
			b.button("remove/fuel", "Forget the fuel")
		} else {
			b.button("add/fuel", "Give the usable fuel")
		}
		return
	}
	b.heading("Battery")
	if b.c.Aeroplane.Battery != nil {
		b.number("aeroplane.battery.usable_kwh", "Usable charge")
		b.button("remove/battery", "Forget the battery")
	} else {
		b.button("add/battery", "Give the usable charge")
	}
}

func (b *formBuilder) propellerRows() {
	p := &b.c.Aeroplane.Propeller
	b.heading("Propeller")
	b.choice("aeroplane.propeller.kind", "Kind")
	for _, key := range [...]string{"efficiency", "diameter_m", "blade_efficiency", "polar_slope", "polar_intercept", "power_coefficient_static", "power_coefficient_slope"} {
		path := "aeroplane.propeller." + key
		if f := b.fields.of(path); f != nil && f.Applies(p.Kind) {
			b.number(path, "")
		}
	}
	if p.Kind != casefile.Table {
		return
	}
	b.heading("Propeller table")
	for i := range p.AdvanceRatio {
		row := "Row " + strconv.Itoa(i+1)
		b.number(indexed("aeroplane.propeller.advance_ratio", i), row+", J")
		b.number(indexed("aeroplane.propeller.thrust_coefficient", i), row+", CT")
		b.number(indexed("aeroplane.propeller.power_coefficient", i), row+", CP")
		if len(p.AdvanceRatio) > 3 {
			b.button(indexed("remove/propeller-row", i), "Row "+strconv.Itoa(i+1))
		}
	}
	b.button("add/propeller-row", "Add a row")
}

func (b *formBuilder) calibrationRows() {
	a := &b.c.Aeroplane
	for i := range a.Configurations {
		name := a.Configurations[i].Name
		b.heading("Airspeed calibration, " + name)
		at := -1
		for k := range a.Calibration {
			if a.Calibration[k].Configuration == name {
				at = k
			}
		}
		if at < 0 {
			b.fact("None known:", "calibrated airspeed is taken as indicated")
		} else {
			for j := range a.Calibration[at].Points {
				p := indexed(indexed("aeroplane.calibration", at)+".points", j)
				n := strconv.Itoa(j + 1)
				b.number(p+".ias_mps", "Point "+n+", IAS")
				b.number(p+".cas_minus_ias_mps", "Point "+n+", CAS less IAS")
			}
		}
		b.button(indexed("add/calibration", i), "Add a point")
		if at >= 0 {
			for j := range a.Calibration[at].Points {
				b.button(indexed(indexed("remove/calibration", at), j), "Point "+strconv.Itoa(j+1))
			}
		}
	}
}

// todayRows is the form of the day: air, loading and how it is flown.
func (b *formBuilder) todayRows() []formRow {
	t := &b.c.Today
	b.heading("Air")
	b.choice("today.air_from", "Given by")
	air, err := airOf(b.c)
	if t.AirFrom == airFromField {
		b.number(pathElevation, "Field elevation")
		b.number(pathSetting, "Altimeter setting, QNH")
	}
	switch {
	case t.AirFrom == airFromDensityAltitude:
		b.numberAs(pathDensityAltitude, "Density altitude", air.DensityAltitude, err == nil)
	case t.AirFrom == airFromField:
		if at, ok := fieldAir(b.c, air); ok {
			b.numberAs(pathTemperature, "Temperature at the field", at.Temperature-perf.ZeroCelsius, true)
		} else {
			b.number(pathTemperature, "Temperature at the field")
		}
	default:
		b.number(pathPressureAltitude, "Pressure altitude")
		b.number(pathTemperature, "Outside air temperature")
		b.number(pathElevation, "Field elevation")
		b.number(pathSetting, "Altimeter setting, QNH")
	}
	b.number("today.dew_point_c", "Dew point")
	if err == nil {
		b.fact("Density altitude", b.units.AltitudeFine(air.DensityAltitude).String())
		b.fact("Pressure altitude", b.units.AltitudeFine(air.PressureAltitude).String())
		b.fact("Temperature there", figure.Celsius(air.Temperature).String())
	}
	b.heading("Loading")
	b.number(pathMass, "Mass today")
	if b.c.Aeroplane.Engine.Kind == casefile.Electric {
		if b.c.Aeroplane.Battery != nil {
			b.number("today.charge_kwh", "Charge left")
		}
	} else {
		b.number("today.fuel_kg", "Fuel on board")
	}
	b.number("today.reserve_min", "Reserve")
	b.heading("How it is flown")
	row := formRow{kind: rowChoice, path: "today.configuration", label: "Configuration", selected: t.Configuration,
		help: "Flaps and gear, as listed with the aeroplane."}
	for i := range b.c.Aeroplane.Configurations {
		n := b.c.Aeroplane.Configurations[i].Name
		row.choices = append(row.choices, choice{n, capital(n)})
	}
	b.rows = append(b.rows, row)
	b.number("today.bank_deg", "Bank")
	b.number("today.power_fraction", "Power setting")
	b.number("today.headwind_mps", "Head wind")
	b.number("today.climb_gradient", "Climb gradient asked for")
	return b.rows
}

func indexed(path string, i int) string { return path + "[" + strconv.Itoa(i) + "]" }
