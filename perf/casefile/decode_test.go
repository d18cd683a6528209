package casefile

import (
	"bytes"
	"encoding/json"
	"errors"
	"reflect"
	"strings"
	"testing"
)

func TestRoundTripIsExact(t *testing.T) {
	c := sample()
	text := c.Marshal()
	if !json.Valid(text) {
		t.Fatalf("not JSON:\n%s", text)
	}
	d, warnings, err := Parse(text)
	if err != nil || len(warnings) > 0 {
		t.Fatalf("error %v, warnings %v\n%s", err, warnings, text)
	}
	if !reflect.DeepEqual(c, d) {
		t.Errorf("read back:\n%+v\nwant:\n%+v", d, c)
	}
	if again := d.Marshal(); !bytes.Equal(again, text) {
		t.Errorf("written again:\n%s\nwant:\n%s", again, text)
	}
	e := c.Clone()
	if !reflect.DeepEqual(c, e) {
		t.Error("a clone differs")
	}
}

// Every pointer and slice of a clone is its own.
func TestCloneSharesNothing(t *testing.T) {
	c := sample()
	var walk func(path string, a, b reflect.Value)
	walk = func(path string, a, b reflect.Value) {
		switch a.Kind() {
		case reflect.Pointer:
			if a.IsNil() {
				return
			}
			if a.Pointer() == b.Pointer() {
				t.Errorf("%s is shared", path)
			}
			walk(path, a.Elem(), b.Elem())
		case reflect.Slice:
			if a.Len() > 0 && a.Pointer() == b.Pointer() {
				t.Errorf("%s is shared", path)
			}
			for i := 0; i < a.Len(); i++ {
				walk(path+"[]", a.Index(i), b.Index(i))
			}
		case reflect.Struct:
			for i := 0; i < a.NumField(); i++ {
				walk(path+"."+a.Type().Field(i).Name, a.Field(i), b.Field(i))
			}
		}
	}
	walk("case", reflect.ValueOf(c), reflect.ValueOf(c.Clone()))
}

const smallest = `{"format":"levelspan-case","version":1,"aeroplane":{"name":"M","wing_area_m2":16.5,"wing_span_m":10.8,"empty_mass_kg":480,"maximum_mass_kg":800,
"polar":{"cd0":0.034,"oswald_e":0.75},"configurations":[{"name":"clean","cl_max":1.45}],"engine":{"kind":"piston","rated_power_w":74600},
"propeller":{"kind":"constant-efficiency","efficiency":0.8}}}`

func TestDefaults(t *testing.T) {
	c, warnings, err := Parse([]byte(smallest))
	if err != nil || len(warnings) > 0 {
		t.Fatal(err, warnings)
	}
	want := &Case{
		Aeroplane: Aeroplane{Name: "M", WingAreaM2: 16.5, WingSpanM: 10.8, EmptyMassKg: 480, MaximumMassKg: 800, Polar: Polar{CD0: 0.034, OswaldE: 0.75},
			Configurations: []Configuration{{Name: "clean", CLMax: 1.45}},
			Engine:         Engine{Kind: Piston, RatedPowerW: 74600, RatedRPM: 2750, PowerLaw: PressureAltitude, DropOffConstant: 0.12, LapseExponent: 0.7, SpecificConsumptionKgPerKWh: 0.3},
			Propeller:      Propeller{Kind: ConstantEfficiency, Efficiency: 0.8}},
		Today:       Today{MassKg: 800, OutsideAirTemperatureC: 15, Configuration: "clean", PowerFraction: 1, ReserveMin: 30, AirFrom: PressureAltitude},
		Beliefs:     Beliefs{CD0: 0.1, OswaldE: 0.08, CLMax: 0.08, Power: 0.05, Propeller: 0.05, PositionErrorMps: 1},
		Instruments: Instruments{IASMps: 0.5, RateMps: 0.15, Power: 0.03, RPM: 15, Mass: 0.01, TemperatureC: 1, AltitudeM: 10},
		Display:     Display{SpeedKind: "CAS", Speed: "kt", Altitude: "ft", Mass: "kg", Power: "kW", Fuel: "kg", Length: "m"},
	}
	if !reflect.DeepEqual(c, want) {
		t.Errorf("got:\n%+v\nwant:\n%+v", c, want)
	}
	for _, x := range []struct {
		today string
		oat   float64
		fuel  float64
	}{
		{`{"pressure_altitude_m": 2000}`, 2, 57.6},
		{`{"pressure_altitude_m": 15000}`, -56.5, 57.6},
		{`{"pressure_altitude_m": 2000, "outside_air_temperature_c": 20, "fuel_kg": 12}`, 20, 12},
	} {
		s := strings.Replace(smallest, `"efficiency":0.8}}`, `"efficiency":0.8},"fuel":{"usable_kg":57.6}},"today":`+x.today, 1)
		c, _, err := Parse([]byte(s))
		if err != nil || c.Today.OutsideAirTemperatureC != x.oat || c.Today.FuelKg != x.fuel {
			t.Errorf("%s: %v, %+v", x.today, err, c)
		}
	}
}

// mutated is the sample's file with one value changed: the value at path (through lists by index) becomes raw JSON; with
// raw "" the key goes.
func mutated(t testing.TB, path, raw string) []byte {
	t.Helper()
	root, err := parseJSON(sample().Marshal())
	if err != nil {
		t.Fatal(err)
	}
	n := &root
	for {
		s, rest, ok := next(path)
		if !ok {
			t.Fatalf("no such path: %s", path)
		}
		i := 0
		for i < len(n.members) && n.members[i].key != s.key {
			i++
		}
		if i == len(n.members) {
			n.members = append(n.members, pair{key: s.key})
		}
		last := rest == ""
		v := &n.members[i].value
		if last && s.index < 0 && raw == "" {
			n.members = append(n.members[:i:i], n.members[i+1:]...)
			break
		}
		if s.index >= 0 {
			v = &v.items[s.index]
		}
		if last {
			*v, err = parseJSON([]byte(raw))
			if err != nil {
				t.Fatal(err)
			}
			break
		}
		n, path = v, rest
	}
	return appendCompact(nil, &root)
}

// faultsOf are the paths of the faults of an error.
func faultsOf(err error) []string {
	var faults Faults
	if !errors.As(err, &faults) {
		return nil
	}
	var paths []string
	for _, f := range faults {
		paths = append(paths, f.Path)
	}
	return paths
}

// badFiles are changes that make the sample unphysical by rules that the schema knows too.
func badFiles() [][2]string {
	bad := [][2]string{
		{"version", `0`}, {"version", `1.5`}, {"version", `"1"`}, {"version", ``}, {"format", `"other"`}, {"format", ``}, {"format", `3`},
		{"aeroplane", ``}, {"aeroplane", `null`}, {"aeroplane", `[]`}, {"aeroplane.polar", ``}, {"aeroplane.polar", `3`}, {"aeroplane.configurations", `[]`}, {"aeroplane.configurations", ``},
		{"aeroplane.configurations", `{}`}, {"aeroplane.configurations[0]", `"clean"`}, {"aeroplane.fuel", `3`}, {"aeroplane.fuel", `{}`}, {"today", `null`}, {"today", `3`}, {"runs", `{}`}, {"runs", `null`},
		{"aeroplane.name", `""`}, {"aeroplane.name", `"  "`}, {"aeroplane.name", `"a\nb"`}, {"aeroplane.name", `7`}, {"aeroplane.note", `"a\u0000b"`},
		{"aeroplane.propeller.diameter_m", ``}, {"aeroplane.propeller.kind", `"table "`}, {"aeroplane.engine.rated_rpm", ``}, {"aeroplane.propeller.advance_ratio", `[0, 1]`},
		{"aeroplane.propeller.advance_ratio[1]", `"x"`}, {"aeroplane.propeller.advance_ratio", `7`}, {"aeroplane.calibration[0].points", `[]`}, {"aeroplane.calibration[0].points", ``},
		{"runs[0].kind", `"flat"`}, {"runs[1].rate_mps", ``}, {"runs[1].rate_mps", `null`}, {"runs[2].propeller", ``}, {"runs[2].propeller", `""`}, {"runs[2].propeller", `"turning"`}, {"runs[4].legs", ``},
		{"runs[4].legs", `[{"ground_speed_mps": 40, "track_deg": 10}]`}, {"runs[1].power_fraction", ``}, {"runs[1].power_fraction", `null`},
	}
	for _, f := range Fields() {
		path := strings.ReplaceAll(strings.ReplaceAll(f.Path, "runs[].legs[]", "runs[4].legs[0]"), "[]", "[0]")
		switch f.Kind {
		case KindNumber, KindMaybe, KindNumbers:
			if f.Kind == KindNumbers {
				path += "[1]"
			}
			bad = append(bad, [2]string{path, "1e999"}, [2]string{path, "-1e999"}, [2]string{path, `"1"`}, [2]string{path, `true`}, [2]string{path, `{}`},
				[2]string{path, formatNumber(f.Max + 0.001*(f.Max-f.Min))}, [2]string{path, formatNumber(f.Min - 0.001*(f.Max-f.Min))})
			if f.Kind != KindMaybe {
				bad = append(bad, [2]string{path, `null`})
			}
			if f.Required && f.Kind == KindNumber && f.Kinds == nil {
				bad = append(bad, [2]string{path, ``})
			}
		case KindChoice:
			bad = append(bad, [2]string{path, `"x"`}, [2]string{path, `null`})
		case KindText:
			bad = append(bad, [2]string{path, `"` + strings.Repeat("x", int(f.Max)+1) + `"`}, [2]string{path, `null`})
		}
	}
	return bad
}

func TestEveryBadValueIsNamed(t *testing.T) {
	for _, x := range badFiles() {
		_, _, err := Parse(mutated(t, x[0], x[1]))
		found := false
		for _, p := range faultsOf(err) {
			found = found || strings.HasPrefix(p, x[0])
		}
		if !found {
			t.Errorf("%s = %.40s: got %v, want a fault of that path", x[0], x[1], err)
		}
		for _, line := range strings.Split(err.Error(), "\n") {
			if len(line) > 400 || !strings.Contains(line, ": ") {
				t.Errorf("%s = %.40s: the fault's line is %q", x[0], x[1], line)
			}
		}
	}
}

// Rules between two keys, which the schema does not know.
func TestCrossRules(t *testing.T) {
	for _, x := range [][3]string{
		{"aeroplane.maximum_mass_kg", "479", "aeroplane.maximum_mass_kg"},
		{"aeroplane.configurations[1].name", `"clean"`, "aeroplane.configurations[1].name"},
		{"aeroplane.propeller.thrust_coefficient", "[0.1, 0.05, 0.02, 0]", "aeroplane.propeller.thrust_coefficient"},
		{"aeroplane.propeller.power_coefficient", "[0.1, 0.05, 0.02, 0.01]", "aeroplane.propeller.power_coefficient"},
		{"aeroplane.propeller.advance_ratio", "[0.5, 0.5, 1]", "aeroplane.propeller.advance_ratio[1]"},
		{"aeroplane.engine.consumption_table[1].power_fraction", "0.4", "aeroplane.engine.consumption_table[1].power_fraction"},
		{"aeroplane.calibration[1].configuration", `"clean"`, "aeroplane.calibration[1].configuration"},
		{"aeroplane.calibration[1].configuration", `"up"`, "aeroplane.calibration[1].configuration"},
		{"aeroplane.calibration[0].points[1].ias_mps", "25", "aeroplane.calibration[0].points[1].ias_mps"},
		{"aeroplane.calibration[0].points[0].cas_minus_ias_mps", "-25", "aeroplane.calibration[0].points[0].cas_minus_ias_mps"},
		{"aeroplane.calibration[0].points[1]", `{"ias_mps": 26, "cas_minus_ias_mps": -0.2}`, "aeroplane.calibration[0].points[1].cas_minus_ias_mps"},
		{"today.configuration", `"up"`, "today.configuration"},
		{"today.dew_point_c", "28.5", "today.dew_point_c"},
		{"today.fuel_kg", "57.7", "today.fuel_kg"},
		{"today.charge_kwh", "40.1", "today.charge_kwh"},
		{"runs[3].configuration", `"up"`, "runs[3].configuration"},
	} {
		_, _, err := Parse(mutated(t, x[0], x[1]))
		if got := faultsOf(err); len(got) == 0 || got[0] != x[2] {
			t.Errorf("%s = %s: got %v, want a fault of %s first", x[0], x[1], err, x[2])
		}
	}
}

func TestAllFaultsAtOnce(t *testing.T) {
	s := strings.NewReplacer(`"wing_area_m2":16.5`, `"wing_area_m2":-1`, `"cd0":0.034`, `"cd0":NaN`, `"name":"clean"`, `"name":""`, `"kind":"piston",`, `"kind":"piston","maximum_rpm":1e999,`,
		`"efficiency":0.8`, `"diameter_m":0`).Replace(smallest)
	_, _, err := Parse([]byte(s))
	want := []string{"aeroplane.wing_area_m2", "aeroplane.polar.cd0", "aeroplane.configurations[0].name", "aeroplane.engine.maximum_rpm", "aeroplane.propeller.efficiency", "aeroplane.propeller.diameter_m"}
	if got := faultsOf(err); !reflect.DeepEqual(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
	if text := err.Error(); strings.Count(text, "\n") != len(want)-1 || !strings.Contains(text, "aeroplane.wing_area_m2: -1 is refused; allowed: 0.5 to 1000 m²") ||
		!strings.Contains(text, "aeroplane.propeller.efficiency: missing; allowed: 0.05 to 1") {
		t.Errorf("the lines are\n%s", text)
	}
}

func TestDuplicateKeysAreFaults(t *testing.T) {
	for _, x := range [][3]string{
		{`"wing_span_m":10.8`, `"wing_span_m":10.8,"wing_span_m":11`, "aeroplane.wing_span_m"},
		{`"version":1`, `"version":1,"extra":{"a":[{"b":1,"b":2}]}`, "extra.a[0].b"},
		{`"version":1`, `"version":1,"mine":1,"mine":1,"mine":1`, "mine"},
	} {
		_, _, err := Parse([]byte(strings.Replace(smallest, x[0], x[1], 1)))
		if got := faultsOf(err); len(got) != 1 || got[0] != x[2] {
			t.Errorf("%s: got %v, want a fault of %s", x[1], err, x[2])
		}
	}
}

func TestVersions(t *testing.T) {
	_, _, err := Parse([]byte(strings.Replace(smallest, `"version":1`, `"version":2`, 1)))
	var newer *VersionError
	if !errors.As(err, &newer) || newer.Version != "2" || !strings.Contains(err.Error(), "newer") {
		t.Errorf("version 2: %v", err)
	}
	for _, other := range []string{`[]`, `"x"`, `3`, `{"format":"levelspan-limits","version":1}`, `{"version":1}`} {
		if _, _, err := Parse([]byte(other)); len(faultsOf(err)) != 1 {
			t.Errorf("%s: %v", other, err)
		}
	}
}

func TestUnknownKeysAreKeptWhereTheyWere(t *testing.T) {
	root := `"colour":"red","wing":{"twist":[1.50,2e3,{"a":null}],"b":true}`
	s := strings.NewReplacer(`"version":1`, `"version":1,`+root, `"cl_max":1.45}`, `"cl_max":1.45,"slat <a>":"\u00e9\u0001"}`, `"efficiency":0.8}`, `"efficiency":0.8,"blades":2}`).Replace(smallest)
	s = strings.TrimSuffix(s, "}") + `,"runs":[{"kind":"stall","ias_mps":22,"pressure_altitude_m":900,"outside_air_temperature_c":10,"mass_kg":700,"pilot":"A"},
	{"kind":"stall","ias_mps":23,"pressure_altitude_m":900,"outside_air_temperature_c":10,"mass_kg":710,"pilot":"B"}]}`
	c, warnings, err := Parse([]byte(s))
	if err != nil {
		t.Fatal(err)
	}
	var paths []string
	for _, w := range warnings {
		paths = append(paths, w.Path)
	}
	want := []string{"aeroplane.configurations[0].slat <a>", "aeroplane.propeller.blades", "runs[0].pilot", "runs[1].pilot", "colour", "wing"}
	if !reflect.DeepEqual(paths, want) {
		t.Errorf("warnings %q, want %q", paths, want)
	}
	text := c.Marshal()
	for _, kept := range []string{`"colour": "red"`, `1.50`, `2e3`, `{"name": "clean", "cl_max": 1.45, "delta_cd0": 0, "slat <a>": "é\u0001"}`, `"blades": 2`} {
		if !bytes.Contains(text, []byte(kept)) {
			t.Errorf("%s is lost:\n%s", kept, text)
		}
	}
	d, _, err := Parse(text)
	if err != nil || !reflect.DeepEqual(c, d) || !bytes.Equal(d.Marshal(), text) {
		t.Errorf("not the same when read back: %v", err)
	}
	// They move with the part that holds them.
	c.Runs = c.Runs[1:]
	if text := c.Marshal(); bytes.Contains(text, []byte(`"pilot": "A"`)) || !bytes.Contains(text, []byte(`"pilot": "B"`)) {
		t.Errorf("the unknown key of a removed run:\n%s", text)
	}
}

func TestUnknownNonNumbersAreFaults(t *testing.T) {
	_, _, err := Parse([]byte(strings.Replace(smallest, `"version":1`, `"version":1,"mine":[1,{"x":-Infinity}]`, 1)))
	if got := faultsOf(err); len(got) != 1 || got[0] != "mine[1].x" {
		t.Errorf("got %v", err)
	}
}

func TestMarshalOfGarbageIsJSON(t *testing.T) {
	c := sample()
	nan := 0.0
	nan /= nan
	c.Aeroplane.WingAreaM2, c.Aeroplane.Name, c.Aeroplane.Propeller.AdvanceRatio[1] = nan, "a\xffb", nan
	*c.Today.DewPointC = nan
	if text := c.Marshal(); !json.Valid(text) {
		t.Errorf("not JSON:\n%s", text)
	}
	if err := c.Validate(); len(faultsOf(err)) < 4 {
		t.Errorf("faults: %v", err)
	}
	if text := (&Case{}).Marshal(); !json.Valid(text) {
		t.Errorf("not JSON:\n%s", text)
	}
}

func FuzzParse(f *testing.F) {
	f.Add([]byte(smallest))
	f.Add(sample().Marshal())
	f.Add([]byte(`{"format":"levelspan-case","version":2}`))
	f.Add([]byte(`{"format":"levelspan-case","version":1,"aeroplane":{"name":NaN,"name":[{}]}}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		c, _, err := Parse(data)
		if err != nil {
			if c != nil || err.Error() == "" {
				t.Errorf("case %v with error %q", c, err)
			}
			return
		}
		if err := c.Validate(); err != nil {
			t.Errorf("read, and yet not valid: %v", err)
		}
		text := c.Marshal()
		d, _, err := Parse(text)
		if err != nil {
			t.Fatalf("its own form is refused: %v\n%s", err, text)
		}
		if !reflect.DeepEqual(c, d) {
			t.Errorf("read back differently:\n%+v\n%+v", c, d)
		}
		if !bytes.Equal(d.Marshal(), text) {
			t.Error("not canonical")
		}
	})
}

func BenchmarkParse(b *testing.B) {
	text := sample().Marshal()
	b.SetBytes(int64(len(text)))
	b.ReportAllocs()
	for b.Loop() {
		if _, _, err := Parse(text); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkMarshal(b *testing.B) {
	c := sample()
	b.ReportAllocs()
	for b.Loop() {
		if len(c.Marshal()) == 0 {
			b.Fatal("nothing")
		}
	}
}

func BenchmarkStandardUnmarshal(b *testing.B) { // the baseline: encoding/json reading the same bytes into any
	text := sample().Marshal()
	b.SetBytes(int64(len(text)))
	for b.Loop() {
		var v any
		if err := json.Unmarshal(text, &v); err != nil {
			b.Fatal(err)
		}
	}
}

// A file of as many faulty runs as may be there costs no more than reading it: the list of faults is bounded.
func TestManyFaultsAreBounded(t *testing.T) {
	run := `{"kind":"level","ias_mps":-1,"mass_kg":"x","rate_mps":99},`
	s := strings.TrimSuffix(smallest, "}") + `,"runs":[` + strings.TrimSuffix(strings.Repeat(run, maxRuns), ",") + `]}`
	_, _, err := Parse([]byte(s))
	if n := len(faultsOf(err)); n != maxFaults || !strings.HasSuffix(err.Error(), "further faults are not listed") {
		t.Errorf("%d faults", n)
	}
	s = strings.Replace(s, strings.Repeat(run, 3), strings.Repeat(run, 4), 1)
	_, _, err = Parse([]byte(s))
	if got := faultsOf(err); len(got) != 1 || got[0] != "runs" {
		t.Errorf("one run too many: %q", got)
	}
}
