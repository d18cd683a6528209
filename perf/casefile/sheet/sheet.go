// Package sheet reads and writes test runs as a table of comma-separated values (RFC 4180), the form in which a knee pad
// is typed into a spreadsheet. The first row names the columns, each with its unit in brackets; the columns may stand in
// any order. A table is taken whole or not at all.
package sheet

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
)

// Fault is one thing wrong with a table. Line and Column count from 1; Column counts fields, 0 where a whole line is meant.
type Fault struct {
	Line, Column int
	Name         string // the column's name as the table has it
	Reason       string // what is wrong, and what is allowed
}

// Error is the fault in one line.
func (f Fault) Error() string {
	at := "line " + strconv.Itoa(f.Line)
	if f.Column > 0 {
		at += ", column " + strconv.Itoa(f.Column)
	}
	if f.Name != "" {
		at += " (" + f.Name + ")"
	}
	return at + ": " + f.Reason
}

// Faults are all that was found, in the order of the table.
type Faults []Fault

// Error is one line a fault.
func (f Faults) Error() string {
	lines := make([]string, len(f))
	for i := range f {
		lines[i] = f[i].Error()
	}
	return strings.Join(lines, "\n")
}

// The bounds of a table.
const (
	largest    = 8 << 20 // bytes
	mostRuns   = 20000
	mostLegs   = 100
	mostFaults = 100
)

// scale turns what is typed into the file's unit: file = typed * size + zero.
type scale struct{ size, zero float64 }

// units are those that a column of a dimension may be in, by their names in lower case.
var units = map[casefile.Dimension]map[string]scale{
	casefile.Speed: {"kt": {perf.Knot, 0}, "kts": {perf.Knot, 0}, "knots": {perf.Knot, 0}, "mph": {perf.MilePerHour, 0},
		"km/h": {perf.KmPerHour, 0}, "kmh": {perf.KmPerHour, 0}, "m/s": {1, 0}},
	casefile.Rate:     {"ft/min": {perf.FootPerMin, 0}, "fpm": {perf.FootPerMin, 0}, "m/s": {1, 0}, "kt": {perf.Knot, 0}},
	casefile.Altitude: {"ft": {perf.Foot, 0}, "m": {1, 0}},
	casefile.Temperature: {"°c": {1, 0}, "c": {1, 0}, "degc": {1, 0}, "°f": {5.0 / 9, -160.0 / 9}, "f": {5.0 / 9, -160.0 / 9},
		"degf": {5.0 / 9, -160.0 / 9}, "k": {1, -perf.ZeroCelsius}},
	casefile.Mass:        {"kg": {1, 0}, "lb": {perf.Pound, 0}, "lbs": {perf.Pound, 0}},
	casefile.Ratio:       {"%": {0.01, 0}, "percent": {0.01, 0}, "": {1, 0}, "fraction": {1, 0}},
	casefile.Revolutions: {"rpm": {1, 0}, "1/min": {1, 0}, "": {1, 0}},
	casefile.Angle:       {"°": {1, 0}, "deg": {1, 0}, "degrees": {1, 0}, "": {1, 0}},
}

// unitNames lists them for a message, in a fixed order.
var unitNames = map[casefile.Dimension]string{
	casefile.Speed: "kt, mph, km/h or m/s", casefile.Rate: "ft/min, m/s or kt", casefile.Altitude: "ft or m",
	casefile.Temperature: "°C, °F or K", casefile.Mass: "kg or lb", casefile.Ratio: "% or fraction", casefile.Revolutions: "rpm", casefile.Angle: "°",
}

// names are the columns' keys by what a table may call them, in lower case.
var names = map[string]string{
	"kind": "kind", "run": "kind", "kind of run": "kind",
	"configuration": "configuration", "config": "configuration", "flaps": "configuration",
	"ias": "ias_mps", "indicated airspeed": "ias_mps", "airspeed": "ias_mps",
	"pressure altitude": "pressure_altitude_m", "pa": "pressure_altitude_m", "altitude": "pressure_altitude_m", "height": "pressure_altitude_m",
	"oat": "outside_air_temperature_c", "temperature": "outside_air_temperature_c", "outside air temperature": "outside_air_temperature_c",
	"mass": "mass_kg", "weight": "mass_kg",
	"power": "power_fraction", "power fraction": "power_fraction", "setting": "power_fraction",
	"rpm": "rpm", "revolutions": "rpm",
	"rate": "rate_mps", "rate of climb": "rate_mps", "roc": "rate_mps",
	"propeller": "propeller", "left out": "left_out", "reason": "left_out",
}

// column is what one column of a table holds.
type column struct {
	name  string // as the table has it
	key   string
	leg   int // of a leg, from 0; -1 none
	field *casefile.Field
	scale scale
}

// text reports whether the column holds words.
func (c *column) text() bool {
	return c.field.Kind == casefile.KindText || c.field.Kind == casefile.KindChoice
}

// fieldOf finds a key's entry in the table of fields.
func fieldOf(fields []casefile.Field, path string) *casefile.Field {
	for i := range fields {
		if fields[i].Path == path {
			return &fields[i]
		}
	}
	return nil
}

// head reads a column's heading.
func head(fields []casefile.Field, heading string) (column, string) {
	name, unit := strings.TrimSpace(heading), ""
	if i := strings.LastIndexAny(name, "[("); i >= 0 && strings.HasSuffix(name, map[byte]string{'[': "]", '(': ")"}[name[i]]) {
		name, unit = strings.TrimSpace(name[:i]), strings.ToLower(strings.TrimSpace(name[i+1:len(name)-1]))
	}
	c := column{name: name, leg: -1}
	words := strings.ToLower(name)
	path := ""
	if key, known := names[words]; known {
		c.key, path = key, "runs[]."+key
	} else if i := strings.LastIndexByte(words, ' '); i > 0 {
		n, err := strconv.Atoi(words[i+1:])
		switch stem := words[:i]; {
		case err != nil || n < 1 || n > mostLegs:
		case stem == "ground speed" || stem == "gs":
			c.key, c.leg, path = "ground_speed_mps", n-1, "runs[].legs[].ground_speed_mps"
		case stem == "track" || stem == "trk":
			c.key, c.leg, path = "track_deg", n-1, "runs[].legs[].track_deg"
		}
	}
	if c.field = fieldOf(fields, path); c.field == nil {
		return c, "no such column; known are kind, configuration, IAS, pressure altitude, OAT, mass, power, rpm, rate, propeller, left out, ground speed 1, track 1, ground speed 2 ..."
	}
	if c.text() {
		if unit != "" {
			return c, "has no unit"
		}
		return c, ""
	}
	s, known := units[c.field.Dimension][unit]
	if !known {
		if unit == "" {
			return c, "needs its unit in brackets: " + unitNames[c.field.Dimension]
		}
		return c, "the unit " + strconv.Quote(unit) + " is not known; allowed: " + unitNames[c.field.Dimension]
	}
	c.scale = s
	return c, ""
}

// delimiter finds what parts the fields of the first line: a tab, a semicolon or a comma.
func delimiter(data []byte) rune {
	line, _, _ := bytes.Cut(data, []byte("\n"))
	best, most := ',', 0
	for _, d := range []rune{'\t', ';', ','} {
		if n := bytes.Count(line, []byte(string(d))); n > most {
			best, most = d, n
		}
	}
	return best
}

// number reads a typed number. With another delimiter than the comma, a comma is the decimal point.
func number(typed string, delimiter rune) (float64, bool) {
	s := strings.NewReplacer("\u2212", "-", "\u00a0", "", " ", "").Replace(typed)
	if delimiter != ',' {
		s = strings.Replace(s, ",", ".", 1)
	}
	v, err := strconv.ParseFloat(s, 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) || strings.ContainsAny(s, "xXpP_iInN") {
		return 0, false
	}
	return v, true
}

// Read reads a table of runs for a case, whose configurations it may name. The error is Faults, and then there are no
// runs. An empty configuration is the case's first; empty fields are readings not taken.
func Read(data []byte, c *casefile.Case) ([]casefile.Run, error) {
	if len(data) > largest {
		return nil, Faults{{Line: 1, Reason: "the table is larger than 8 MB"}}
	}
	data = bytes.TrimPrefix(data, []byte("\ufeff"))
	data = bytes.ReplaceAll(bytes.ReplaceAll(data, []byte("\r\n"), []byte("\n")), []byte("\r"), []byte("\n"))
	d := delimiter(data)
	r := csv.NewReader(bytes.NewReader(data))
	r.Comma, r.FieldsPerRecord, r.TrimLeadingSpace = d, -1, d != '\t'
	var faults Faults
	add := func(f Fault) {
		if len(faults) < mostFaults {
			faults = append(faults, f)
		}
	}
	headings, err := r.Read()
	if err != nil {
		if err == io.EOF {
			return nil, Faults{{Line: 1, Reason: "the table is empty: the first row names the columns"}}
		}
		return nil, Faults{syntax(err)}
	}
	fields := casefile.Fields()
	columns := make([]column, len(headings))
	kinds := map[string]int{}
	for i, h := range headings {
		if len(columns) > 40+2*mostLegs {
			return nil, Faults{{Line: 1, Reason: "too many columns"}}
		}
		c, why := head(fields, h)
		id := c.key + strconv.Itoa(c.leg)
		if first, twice := kinds[id]; why == "" && twice {
			why = "the same as column " + strconv.Itoa(first)
		}
		if why != "" {
			add(Fault{1, i + 1, c.name, why})
			continue
		}
		kinds[id] = i + 1
		columns[i] = c
	}
	if kinds["kind-1"] == 0 {
		add(Fault{Line: 1, Reason: "there is no column named kind"})
	}
	if len(faults) > 0 {
		return nil, faults
	}
	var runs []casefile.Run
	var lines []int
	for {
		row, err := r.Read()
		if err == io.EOF {
			break
		}
		if err != nil {
			add(syntax(err))
			break
		}
		line, _ := r.FieldPos(0)
		if blank(row) {
			continue
		}
		if len(runs) == mostRuns {
			add(Fault{Line: line, Reason: "more than " + strconv.Itoa(mostRuns) + " runs"})
			break
		}
		if len(row) > len(columns) && !blank(row[len(columns):]) {
			add(Fault{line, len(columns) + 1, "", "the row has more fields than the first row names"})
			continue
		}
		run := casefile.Run{}
		if len(c.Aeroplane.Configurations) > 0 {
			run.Configuration = c.Aeroplane.Configurations[0].Name
		}
		given := map[string]bool{}
		for i := range min(len(row), len(columns)) {
			typed := strings.TrimSpace(row[i])
			if why := columns[i].put(&run, typed, d); why != "" {
				add(Fault{line, i + 1, columns[i].name, why})
			}
			given[columns[i].key] = given[columns[i].key] || typed != ""
		}
		for i := range fields { // an empty field is no reading of 0
			key, of := strings.CutPrefix(fields[i].Path, "runs[].")
			if of && fields[i].Required && fields[i].Applies(run.Kind) && !strings.Contains(key, "[") && !given[key] {
				at := Fault{Line: line, Name: fields[i].Name, Reason: "is missing"}
				for k := range columns {
					if columns[k].key == key {
						at.Column, at.Name = k+1, columns[k].name
					}
				}
				add(at)
			}
		}
		for i := range run.Legs {
			l := &run.Legs[i]
			if math.IsNaN(l.GroundSpeedMps) || math.IsNaN(l.TrackDeg) {
				add(Fault{Line: line, Reason: fmt.Sprintf("leg %d lacks its ground speed or its track", i+1)})
				l.GroundSpeedMps, l.TrackDeg = 0, 0
			}
		}
		runs, lines = append(runs, run), append(lines, line)
	}
	if len(faults) == 0 {
		faults = validate(runs, lines, columns, c)
	}
	if len(faults) > 0 {
		return nil, faults
	}
	return runs, nil
}

// blank reports whether a row has nothing in it.
func blank(row []string) bool {
	for _, f := range row {
		if strings.TrimSpace(f) != "" {
			return false
		}
	}
	return true
}

// syntax is where a text stops being a table.
func syntax(err error) Fault {
	var p *csv.ParseError
	if errors.As(err, &p) {
		return Fault{Line: p.Line, Reason: p.Err.Error()}
	}
	return Fault{Line: 1, Reason: err.Error()}
}

// put writes one field into a run; it gives the reason where it may not stand there.
func (c *column) put(run *casefile.Run, typed string, d rune) (why string) {
	if typed == "" {
		return ""
	}
	if c.text() {
		switch c.key {
		case "kind":
			run.Kind = strings.ToLower(typed)
		case "configuration":
			run.Configuration = typed
		case "propeller":
			run.Propeller = strings.ToLower(typed)
		case "left_out":
			run.LeftOut = typed
		}
		return ""
	}
	v, ok := number(typed, d)
	if !ok {
		return strconv.Quote(typed) + " is no number"
	}
	v = v*c.scale.size + c.scale.zero
	if v < c.field.Min && c.field.Min-v <= 1e-9*math.Abs(c.field.Min) { // the last digit of a change of unit
		v = c.field.Min
	} else if v > c.field.Max && v-c.field.Max <= 1e-9*math.Abs(c.field.Max) {
		v = c.field.Max
	}
	if c.leg >= 0 {
		for len(run.Legs) <= c.leg {
			run.Legs = append(run.Legs, casefile.Leg{GroundSpeedMps: math.NaN(), TrackDeg: math.NaN()})
		}
		if c.key == "track_deg" {
			run.Legs[c.leg].TrackDeg = v
		} else {
			run.Legs[c.leg].GroundSpeedMps = v
		}
		return ""
	}
	switch c.key {
	case "ias_mps":
		run.IASMps = v
	case "pressure_altitude_m":
		run.PressureAltitudeM = v
	case "outside_air_temperature_c":
		run.OutsideAirTemperatureC = v
	case "mass_kg":
		run.MassKg = v
	case "power_fraction":
		run.PowerFraction = &v
	case "rpm":
		run.RPM = &v
	case "rate_mps":
		run.RateMps = &v
	}
	return ""
}

// validate holds the runs against the case, and says each fault at the table's own place.
func validate(runs []casefile.Run, lines []int, columns []column, c *casefile.Case) (faults Faults) {
	trial := c.Clone()
	if err := trial.Validate(); err != nil {
		return Faults{{Line: 1, Reason: "the case itself is not sound: " + err.Error()}}
	}
	trial.Runs = runs
	err := trial.Validate()
	var found casefile.Faults
	if err == nil || !errors.As(err, &found) {
		return nil
	}
	for _, f := range found {
		var i, leg int
		key := f.Path
		if n, _ := fmt.Sscanf(f.Path, "runs[%d].legs[%d].", &i, &leg); n == 2 {
			key = f.Path[strings.LastIndexByte(f.Path, '.')+1:]
		} else if n, _ := fmt.Sscanf(f.Path, "runs[%d].", &i); n == 1 {
			leg = -1
			key = f.Path[strings.LastIndexByte(f.Path, '.')+1:]
		}
		if i < 0 || i >= len(lines) {
			continue
		}
		fault := Fault{Line: lines[i], Reason: f.Text()}
		for k := range columns {
			if columns[k].key == key && columns[k].leg == leg {
				fault.Column, fault.Name = k+1, columns[k].name
				fault.Reason = columns[k].reason(f)
			}
		}
		if fault.Column == 0 {
			fault.Name = strings.ReplaceAll(key, "_", " ")
		}
		if len(faults) == mostFaults {
			break
		}
		faults = append(faults, fault)
	}
	return faults
}

// reason is a fault of the case in the column's own unit.
func (c *column) reason(f casefile.Fault) string {
	v, err := strconv.ParseFloat(f.Value, 64)
	if c.text() || err != nil || c.scale.size == 0 {
		return f.Text()
	}
	typed := func(x float64) string { return strconv.FormatFloat((x-c.scale.zero)/c.scale.size, 'g', 6, 64) }
	return typed(v) + " is refused; allowed: " + typed(c.field.Min) + " to " + typed(c.field.Max)
}

// Write writes runs as a table in the person's units that Read reads back. Numbers have up to 12 significant digits.
func Write(runs []casefile.Run, u figure.Units) []byte {
	legs := 0
	for i := range runs {
		legs = max(legs, len(runs[i].Legs))
	}
	rate := u.RateUnit
	power := figure.Unit{Name: "%", SI: 0.01}
	row := []string{"kind", "configuration", "IAS [" + u.Speed.Name + "]", "pressure altitude [" + u.Altitude.Name + "]", "OAT [°C]",
		"mass [" + u.Mass.Name + "]", "power [" + power.Name + "]", "rpm", "rate [" + rate.Name + "]", "propeller", "left out"}
	for i := range legs {
		n := strconv.Itoa(i + 1)
		row = append(row, "ground speed "+n+" ["+u.Speed.Name+"]", "track "+n+" [°]")
	}
	var out bytes.Buffer
	w := csv.NewWriter(&out)
	w.Write(row) // a buffer takes everything
	number := func(x float64, unit figure.Unit) string {
		return strconv.FormatFloat(x/unit.SI, 'g', 12, 64)
	}
	maybe := func(x *float64, unit figure.Unit) string {
		if x == nil {
			return ""
		}
		return number(*x, unit)
	}
	one := figure.Unit{SI: 1}
	for i := range runs {
		r := &runs[i]
		row = append(row[:0], r.Kind, r.Configuration, number(r.IASMps, u.Speed), number(r.PressureAltitudeM, u.Altitude),
			number(r.OutsideAirTemperatureC, one), number(r.MassKg, u.Mass), maybe(r.PowerFraction, power), maybe(r.RPM, one),
			maybe(r.RateMps, rate), r.Propeller, r.LeftOut)
		for k := range legs {
			if k < len(r.Legs) {
				row = append(row, number(r.Legs[k].GroundSpeedMps, u.Speed), number(r.Legs[k].TrackDeg, one))
			} else {
				row = append(row, "", "")
			}
		}
		w.Write(row)
	}
	w.Flush()
	return out.Bytes()
}
