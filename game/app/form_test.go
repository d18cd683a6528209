package app

import (
	"math"
	"strings"
	"testing"

	"levelspan/game/ui"
	"levelspan/perf/casefile"
)

// aeroplaneScreen is a pilot at the form where the field lies.
func aeroplaneScreen(t *testing.T) *pilot {
	t.Helper()
	p := newPilot(t, 1280, 800)
	p.tap("tab/aeroplane")
	return p
}

// opensKeypad activates a field, wherever it is scrolled to.
func (p *pilot) open(path string) {
	p.t.Helper()
	p.control("field/" + path)
	p.event(ui.Event{Kind: ui.Activate, ID: "field/" + path})
}

func (p *pilot) press(id string) {
	p.t.Helper()
	p.control(id)
	p.event(ui.Event{Kind: ui.Activate, ID: id})
}

func TestEditWingAreaAndUndo(t *testing.T) {
	p := aeroplaneScreen(t)
	c := p.app.Case().Clone()
	c.Runs = nil // or the stalls that were flown would speak too
	p.step(Opened{Data: c.Marshal()})
	file, stall := p.file(), p.row("stall").CASMps
	p.open("aeroplane.wing_area_m2")
	p.typeIn("18")
	if got := p.app.Case().Aeroplane.WingAreaM2; got != 18 {
		t.Fatalf("wing area %g", got)
	}
	p.sameAsSolve()
	// CL = n W/(q S): the stalling speed goes with 1/sqrt(S); the pressures are near enough incompressible for 1e-4.
	if want := stall * math.Sqrt(16.5/18); math.Abs(p.row("stall").CASMps/want-1) > 1e-4 {
		t.Errorf("stall %g m/s, want %g", p.row("stall").CASMps, want)
	}
	p.key(ui.KeyUndo)
	if p.file() != file || p.row("stall").CASMps != stall {
		t.Error("undo does not give the wing back")
	}
}

func TestRefusedNumberChangesNothing(t *testing.T) {
	p := aeroplaneScreen(t)
	file := p.file()
	p.open("aeroplane.wing_area_m2")
	p.typeIn("0.1")
	if p.find("key/ok") == nil || !p.says("At least 0.5 m²") {
		t.Error("a wing of 0.1 m² is not refused with the reason")
	}
	if c := p.control("key/entry"); c.Error == "" {
		t.Error("the refusal is not beside the field")
	}
	p.tap("key/cancel")
	// A maximum below the empty mass is inside its own range and still not physical.
	p.open("aeroplane.maximum_mass_kg")
	p.typeIn("300")
	if p.control("key/entry").Error == "" {
		t.Error("a maximum mass below the empty mass is taken")
	}
	p.tap("key/cancel")
	if p.file() != file || p.app.doc.nextUndo() != "" {
		t.Error("refused numbers changed the case")
	}
}

func TestNumbersAreTypedInThePersonsUnits(t *testing.T) {
	p := newPilot(t, 1280, 800)
	p.tap("menu")
	for _, id := range []string{"unit/mass/lb", "unit/length/ft", "unit/speed/mph", "unit/power/hp"} {
		p.tap(id)
	}
	p.key(ui.KeyEscape)
	p.tap("tab/aeroplane")
	for _, f := range []struct {
		path, typed string
		want        float64
	}{
		// Exact by definition: 1 lb = 0.45359237 kg, 1 ft = 0.3048 m, 1 mph = 0.44704 m/s, 1 hp = 550 ft lbf/s.
		{"aeroplane.empty_mass_kg", "1000", 453.59237},
		{"aeroplane.wing_span_m", "35", 35 * 0.3048},
		{"aeroplane.wing_area_m2", "180", 180 * 0.3048 * 0.3048},
		{"aeroplane.propeller.diameter_m", "70", 70 * 0.0254},
		{"aeroplane.placards.vne_cas_mps", "140", 140 * 0.44704},
		{"aeroplane.engine.rated_power_w", "100", 100 * 745.69987158227022},
		{"today.power_fraction", "75", 0.75},
		{"today.climb_gradient", "3.5", 0.035},
		{"today.altimeter_setting_hpa", "29.92", 29.92 * 33.86389},
		{"today.altimeter_setting_hpa", "1008", 1008},
	} {
		p.open(f.path)
		p.typeIn(f.typed)
		got, set := p.app.Case().Number(f.path)
		if !set || math.Abs(got-f.want) > 1e-9*math.Abs(f.want) {
			t.Errorf("%s: typed %s, got %.12g, want %.12g", f.path, f.typed, got, f.want)
		}
	}
	p.sameAsSolve()
}

func TestEveryFieldIsOnTheForm(t *testing.T) {
	fields := newFieldTable()
	seen := map[string]bool{}
	c := otherCase(t)
	collect := func() {
		b := formBuilder{c: c, fields: fields}
		b.aeroplaneRows()
		b.todayRows()
		for _, r := range b.rows {
			if r.kind == rowButton || r.kind == rowHeading || r.kind == rowFact {
				continue
			}
			path := genericPath(r.path)
			seen[path], seen[strings.TrimSuffix(path, "[]")] = true, true
			if r.help == "" {
				t.Errorf("%s has no help", r.path)
			}
			if r.label == "" {
				t.Errorf("%s has no label", r.path)
			}
		}
	}
	for _, engine := range []string{casefile.Piston, casefile.Turboprop, casefile.Electric} {
		for _, propeller := range []string{casefile.ConstantEfficiency, casefile.ConstantSpeed, casefile.FixedPitch, casefile.Table} {
			for _, way := range []string{airFromPressureAltitude, airFromField, airFromDensityAltitude} {
				for path, value := range map[string]string{"aeroplane.engine.kind": engine, "aeroplane.propeller.kind": propeller, "today.air_from": way} {
					if err := putChoice(c, fields, path, value); err != nil {
						t.Fatal(err)
					}
				}
				if engine == casefile.Piston && len(c.Aeroplane.Engine.ConsumptionTable) == 0 {
					if _, err := pressButton(c, "add/consumption"); err != nil {
						t.Fatal(err)
					}
				}
				collect()
			}
		}
	}
	for path, f := range fields {
		if !strings.HasPrefix(path, "aeroplane.") && !strings.HasPrefix(path, "today.") || f.Kind == casefile.KindNumbers && seen[path] {
			continue
		}
		if path == "aeroplane.calibration[].configuration" { // the section says it
			continue
		}
		if !seen[path] {
			t.Errorf("no form shows %s", path)
		}
	}
}

func TestKindSwitchesKeepTheOthersNumbers(t *testing.T) {
	p := aeroplaneScreen(t)
	file := p.file()
	for _, engine := range []string{casefile.Turboprop, casefile.Electric, casefile.Piston} {
		p.press("field/aeroplane.engine.kind/" + engine)
		if got := p.app.Case().Aeroplane.Engine.Kind; got != engine {
			t.Fatalf("engine %q, want %q", got, engine)
		}
		for _, propeller := range []string{casefile.ConstantEfficiency, casefile.ConstantSpeed, casefile.Table, casefile.FixedPitch} {
			p.press("field/aeroplane.propeller.kind/" + propeller)
			if got := p.app.Case().Aeroplane.Propeller.Kind; got != propeller {
				t.Fatalf("propeller %q, want %q", got, propeller)
			}
			if err := p.app.Case().Validate(); err != nil {
				t.Fatal(err)
			}
			p.sameAsSolve()
		}
	}
	c := p.app.Case()
	old, _, err := casefile.Parse([]byte(file))
	if err != nil {
		t.Fatal(err)
	}
	if c.Aeroplane.Engine.RatedPowerW != old.Aeroplane.Engine.RatedPowerW || c.Aeroplane.Propeller.PolarSlope != old.Aeroplane.Propeller.PolarSlope ||
		c.Aeroplane.Propeller.DiameterM != old.Aeroplane.Propeller.DiameterM || c.Aeroplane.Fuel == nil {
		t.Error("numbers were lost on the way")
	}
	for p.app.doc.nextUndo() != "" {
		p.key(ui.KeyUndo)
	}
	if p.file() != file {
		t.Error("undoing everything does not give the file back")
	}
}

func TestAirWaysOfEntry(t *testing.T) {
	p := aeroplaneScreen(t)
	p.press("field/today.air_from/field")
	p.open("today.field_elevation_m")
	p.typeIn("2950")
	p.open("today.altimeter_setting_hpa")
	p.typeIn("1013.25")
	p.open("today.outside_air_temperature_c")
	p.typeIn("31")
	today := p.app.Case().Today
	// With the standard setting the pressure altitude of the field is its elevation.
	if got := today.PressureAltitudeM / 0.3048; math.Abs(got-2950) > 0.01 {
		t.Errorf("pressure altitude %g ft", got)
	}
	if math.Abs(today.OutsideAirTemperatureC-31) > 1e-9 {
		t.Errorf("temperature %g °C", today.OutsideAirTemperatureC)
	}
	p.sameAsSolve()
	// Flying higher moves the air, not the field.
	p.tap("tab/chart")
	p.setSlider(handleAltitude, 3000)
	p.tap("tab/aeroplane")
	if got := p.control("field/today.outside_air_temperature_c"); math.Abs(got.Value-31) > 1e-6 {
		t.Errorf("the field's temperature became %g °C", got.Value)
	}
	p.press("field/today.air_from/density-altitude")
	p.open(pathDensityAltitude)
	p.typeIn("5000")
	air, err := airOf(p.app.Case())
	if err != nil || math.Abs(air.DensityAltitude/0.3048-5000) > 1e-6 || math.Abs(air.PressureAltitude-air.DensityAltitude) > 1e-6 {
		t.Errorf("density altitude %g m, pressure altitude %g m, %v", air.DensityAltitude, air.PressureAltitude, err)
	}
	p.press("field/today.air_from/pressure-altitude")
	p.open("today.pressure_altitude_m")
	p.typeIn("4000")
	p.open("today.dew_point_c")
	p.typeIn("-")
	if p.app.Case().Today.DewPointC != nil {
		t.Error("a lone sign became a dew point")
	}
	p.tap("key/cancel")
	p.open("today.dew_point_c")
	p.typeIn("3")
	if dew := p.app.Case().Today.DewPointC; dew == nil || *dew != 3 {
		t.Fatal("no dew point")
	}
	p.sameAsSolve()
	p.open("today.dew_point_c")
	p.tap("key/none")
	if p.app.Case().Today.DewPointC != nil {
		t.Error("the dew point cannot be taken away")
	}
}

func TestConfigurationsAndCalibration(t *testing.T) {
	p := aeroplaneScreen(t)
	n := len(p.app.Case().Aeroplane.Configurations)
	p.press("add/configuration")
	a := &p.app.Case().Aeroplane
	if len(a.Configurations) != n+1 {
		t.Fatalf("%d configurations", len(a.Configurations))
	}
	path := indexed("aeroplane.configurations", n)
	p.event(ui.Event{Kind: ui.SetText, ID: "field/" + path + ".name", Text: "glider tow"})
	if got := p.app.Case().Aeroplane.Configurations[n].Name; got != "glider tow" {
		t.Fatalf("renamed to %q", got)
	}
	p.open(path + ".delta_cd0")
	p.typeIn("0.02")
	p.press("field/today.configuration/glider tow")
	if got := p.app.Case().Today.Configuration; got != "glider tow" {
		t.Fatalf("flown in %q", got)
	}
	p.sameAsSolve()
	p.press(indexed("add/calibration", n))
	p.press(indexed("add/calibration", n))
	p.sameAsSolve()
	tables := len(p.app.Case().Aeroplane.Calibration)
	p.press(indexed(indexed("remove/calibration", tables-1), 0))
	p.press(indexed(indexed("remove/calibration", tables-1), 0))
	if len(p.app.Case().Aeroplane.Calibration) != tables-1 {
		t.Error("the last point does not take the table away")
	}
	// A name that is taken is refused beside the field, and the good name stays.
	p.event(ui.Event{Kind: ui.SetText, ID: "field/" + path + ".name", Text: "clean"})
	if got := p.app.Case().Aeroplane.Configurations[n].Name; got != "glider tow" {
		t.Errorf("a taken name was taken: %q", got)
	}
	if p.control("field/"+path+".name").Error == "" {
		t.Error("the refusal is not beside the field")
	}
	p.press(indexed("remove/configuration", n))
	if got := p.app.Case().Today.Configuration; got != p.app.Case().Aeroplane.Configurations[0].Name {
		t.Errorf("today's configuration is %q after its removal", got)
	}
	p.sameAsSolve()
}

func TestTextIsOneStepHoweverManyKeys(t *testing.T) {
	p := aeroplaneScreen(t)
	p.tap("field/aeroplane.name")
	p.key(ui.KeyEnd)
	for _, r := range " Øy" {
		p.event(ui.Event{Kind: ui.KeyDown, Rune: r})
	}
	if got := p.app.Mirror().Title; got != "Marram Øy" {
		t.Fatalf("title %q", got)
	}
	if n := len(p.app.doc.past); n != 1 {
		t.Errorf("%d steps", n)
	}
	for i := 0; i < 12; i++ {
		p.key(ui.KeyBackspace)
	}
	if c := p.control("field/aeroplane.name"); c.Error == "" || p.app.Case().Aeroplane.Name == "" {
		t.Error("an empty name is taken or not refused beside the field")
	}
	p.key(ui.KeyEscape)
	if got := p.app.Case().Aeroplane.Name; got != "Marram" {
		t.Errorf("escape leaves %q", got)
	}
}

func TestPlacardsAndFuelCanBeTakenAway(t *testing.T) {
	p := aeroplaneScreen(t)
	p.open("aeroplane.placards.vne_cas_mps")
	p.tap("key/none")
	if p.app.Case().Aeroplane.Placards.VNECASMps != nil {
		t.Fatal("VNE stays")
	}
	for _, r := range p.app.Mirror().Rows {
		if r.Key == "never_exceed" {
			t.Error("a never-exceed speed without a placard")
		}
	}
	p.press("remove/fuel")
	if p.app.Case().Aeroplane.Fuel != nil {
		t.Error("the fuel stays")
	}
	p.sameAsSolve()
	p.press("add/fuel")
	if p.app.Case().Aeroplane.Fuel == nil {
		t.Error("no fuel again")
	}
}

func TestHelpOpensAndCloses(t *testing.T) {
	p := aeroplaneScreen(t)
	p.press("help/field/aeroplane.wing_area_m2")
	if !p.says("plan area") {
		t.Error("no help")
	}
	p.press("help/field/aeroplane.wing_area_m2")
	if p.says("plan area") {
		t.Error("help stays")
	}
}
