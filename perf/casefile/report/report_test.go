package report

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"regexp"
	"sort"
	"strconv"
	"strings"
	"testing"

	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
)

// load reads a case of testdata/cases, or the demo.
func load(t testing.TB, name string) *casefile.Case {
	t.Helper()
	path := filepath.Join("..", "..", "..", "testdata", "cases", name+".json")
	if name == "marram" {
		path = filepath.Join("..", "..", "..", "assets", "case", "marram.json")
	}
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	c, warnings, err := casefile.Parse(data)
	if err != nil || len(warnings) > 0 {
		t.Fatal(err, warnings)
	}
	if string(c.Marshal()) != string(data) {
		t.Errorf("%s is not in canonical form", path)
	}
	return c
}

func solved(t testing.TB, c *casefile.Case) *Report {
	t.Helper()
	r, err := New(c)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

var cases = []string{"marram", "electric", "turboprop", "table", "no-level-flight"}

// keysOf are the names of an object's members.
func keysOf(v any) []string {
	var keys []string
	for k := range v.(map[string]any) {
		keys = append(keys, k)
	}
	sort.Strings(keys)
	return keys
}

// decoded is the JSON of a case.
func decoded(t *testing.T, r *Report) map[string]any {
	t.Helper()
	text := r.JSON()
	var v map[string]any
	if err := json.Unmarshal(text, &v); err != nil || text[len(text)-1] != '\n' {
		t.Fatalf("%v\n%s", err, text)
	}
	if strings.Contains(string(text), "null") {
		t.Errorf("null in\n%s", text)
	}
	return v
}

// The members that contract.md names, for the demo, where all of them apply.
func TestJSONHasTheContractsKeys(t *testing.T) {
	v := decoded(t, solved(t, load(t, "marram")))
	for where, want := range map[string][]string{
		"":           {"air", "allowances", "basis", "ceilings", "format", "level_flight", "level_flight_probability", "limits", "shortfall_w", "turn", "version", "warnings"},
		"air":        {"density_altitude_m", "density_kg_m3", "pressure_pa", "temperature_k"},
		"ceilings":   {"absolute", "service"},
		"turn":       {"bank_deg", "load_factor", "radius_m", "rate_deg_s", "tas_mps"},
		"allowances": {"level_flight_density_altitude_m", "level_flight_mass_kg"},
	} {
		part := any(v)
		if where != "" {
			part = v[where]
		}
		if got := keysOf(part); !reflect.DeepEqual(got, want) {
			t.Errorf("%q has %v, want %v", where, got, want)
		}
	}
	if got := keysOf(v["ceilings"].(map[string]any)["service"]); !reflect.DeepEqual(got, []string{"density_altitude_m", "interval_density_altitude_m", "interval_pressure_altitude_m", "pressure_altitude_m"}) {
		t.Errorf("service ceiling: %v", got)
	}
	extras := map[string][]string{"fastest_climb": {"rate_mps", "interval_rate_mps"}, "steepest_climb": {"gradient", "interval_gradient"},
		"best_glide": {"least_sink_tas_mps", "ratio", "sink_mps", "interval_ratio"}, "least_power": {"endurance_s", "power_required_w", "interval_endurance_s"},
		"best_range": {"distance_m", "fuel_kg_per_h", "interval_distance_m"}}
	setBy := map[string]string{"stall": "lift", "slowest_level": "lift", "manoeuvring": "placard", "fastest_level": "power", "never_exceed": "placard"}
	last := 0.0
	limits := v["limits"].([]any)
	for _, l := range limits {
		l := l.(map[string]any)
		key := l["key"].(string)
		want := append([]string{"cas_mps", "ias_mps", "key", "tas_mps"}, extras[key]...)
		if s, ok := setBy[key]; ok {
			want = append(want, "set_by")
			if l["set_by"] != s {
				t.Errorf("%s is set by %v, want %s", key, l["set_by"], s)
			}
		}
		if key != "manoeuvring" && key != "never_exceed" { // what a placard says is as sure as the placard
			want = append(want, "interval_cas_mps", "interval_ias_mps")
			i := l["interval_cas_mps"].([]any)
			if low, high := i[0].(float64), i[1].(float64); !(low < l["cas_mps"].(float64) && l["cas_mps"].(float64) < high) {
				t.Errorf("%s: %v is not inside %v", key, l["cas_mps"], i)
			}
		}
		sort.Strings(want)
		if got := keysOf(l); !reflect.DeepEqual(got, want) {
			t.Errorf("%s has %v, want %v", key, got, want)
		}
		if tas := l["tas_mps"].(float64); tas < last {
			t.Errorf("%s at %v stands after %v", key, tas, last)
		} else {
			last = tas
		}
	}
	if len(limits) != int(perf.KeyCount) {
		t.Errorf("%d limits, want all %d", len(limits), perf.KeyCount)
	}
	if v["format"] != "levelspan-limits" || v["version"] != 1.0 || v["level_flight"] != true || v["shortfall_w"] != 0.0 {
		t.Errorf("head: %v %v %v %v", v["format"], v["version"], v["level_flight"], v["shortfall_w"])
	}
}

// Every figure of the JSON is the model's own, to the last bit.
func TestJSONIsTheAnswer(t *testing.T) {
	for _, name := range cases {
		r := solved(t, load(t, name))
		v := decoded(t, r)
		seen := 0
		for _, l := range v["limits"].([]any) {
			l := l.(map[string]any)
			for k := perf.Key(0); k < perf.KeyCount; k++ {
				x := &r.Answer.Limits[k]
				if k.String() != l["key"] {
					continue
				}
				seen++
				if !x.Applies || l["tas_mps"] != float64(x.TAS) || l["cas_mps"] != float64(x.CAS) || l["ias_mps"] != float64(x.IAS) {
					t.Errorf("%s: %s is %v, want %+v", name, k, l, x)
				}
			}
		}
		for k := range r.Answer.Limits {
			if r.Answer.Limits[k].Applies {
				seen--
			}
		}
		if seen != 0 {
			t.Errorf("%s: limits were lost", name)
		}
		for _, x := range []struct {
			is   bool
			keys []string
		}{
			{r.Answer.Turn.Applies, []string{"turn"}}, {r.Answer.Service.Applies, []string{"ceilings", "service"}}, {r.Answer.Absolute.Applies, []string{"ceilings", "absolute"}},
			{r.Answer.Level.MassApplies, []string{"allowances", "level_flight_mass_kg"}}, {r.Condition.ClimbGradient > 0, []string{"allowances", "climb_gradient"}},
			{r.Answer.Outcome != perf.LevelFlight, []string{"reason"}}, {r.Answer.Outcome != perf.LevelFlight, []string{"shortfall_tas_mps"}},
		} {
			var at any = v
			ok := true
			for _, key := range x.keys {
				if at, ok = at.(map[string]any)[key]; !ok {
					break
				}
			}
			if ok != x.is {
				t.Errorf("%s: %v is there: %v, want %v", name, x.keys, ok, x.is)
			}
		}
	}
}

// The plain table of every case, whole; UPDATE_GOLDEN=1 writes it anew. A no-break space stands as an underscore.
func TestTextIsTheGolden(t *testing.T) {
	for _, name := range cases {
		got := strings.NewReplacer(figure.Group, "_").Replace(solved(t, load(t, name)).Text())
		path := filepath.Join("testdata", name+".txt")
		if os.Getenv("UPDATE_GOLDEN") != "" {
			if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
				t.Fatal(err)
			}
		}
		want, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		if !alike(got, string(want)) {
			t.Errorf("%s: got\n%s\nwant\n%s", name, got, want)
		}
	}
}

var number = regexp.MustCompile(`\d+(_\d{3})*(\.\d+)?`)

// alike compares two texts: numbers to one unit of their last digit, because fused multiplication rounds otherwise on
// some machines; all else exactly, with the spaces of alignment taken as one.
func alike(a, b string) bool {
	words := func(s string) string { return strings.Join(strings.Fields(number.ReplaceAllString(s, "#")), " ") }
	x, y := number.FindAllString(a, -1), number.FindAllString(b, -1)
	if words(a) != words(b) || len(x) != len(y) {
		return false
	}
	for i := range x {
		whole, fraction, _ := strings.Cut(strings.ReplaceAll(y[i], "_", ""), ".")
		p, _ := strconv.ParseFloat(strings.ReplaceAll(x[i], "_", ""), 64)
		q, _ := strconv.ParseFloat(whole+"."+fraction, 64)
		_, other, _ := strings.Cut(x[i], ".")
		if len(other) != len(fraction) || math.Abs(p-q) > 1.01*math.Pow(10, -float64(len(fraction))) {
			return false
		}
	}
	return true
}

func TestAlike(t *testing.T) {
	for _, x := range []struct {
		a, b string
		want bool
	}{{"a 1_000 ft", "a  1_001 ft", true}, {"a 1_000 ft", "a 1_002 ft", false}, {"1.50 g", "1.52 g", false}, {"1.50 g", "1.51 g", true}, {"1 kt", "1 kg", false}, {"1.5", "1", false}} {
		if got := alike(x.a, x.b); got != x.want {
			t.Errorf("%q and %q: %v", x.a, x.b, got)
		}
	}
}

func TestTextIsAligned(t *testing.T) {
	for _, line := range strings.Split(solved(t, load(t, "marram")).Text(), "\n") {
		if strings.TrimRight(line, " ") != line {
			t.Errorf("%q ends in spaces", line)
		}
		if len([]rune(line)) > 130 {
			t.Errorf("%q is too long for a note", line)
		}
	}
	got := table([][]string{{"a", "", "é"}, {"bbb", "", "22"}, {"", "", "333"}}, []bool{false, false, true})
	if want := "a      é\nbbb   22\n     333\n"; got != want {
		t.Errorf("got\n%q\nwant\n%q", got, want)
	}
}

func TestSymbolOfTheStall(t *testing.T) {
	c := load(t, "marram")
	for configuration, want := range map[string]string{"clean": "VS1", "take-off": "VS1", "landing": "VS0"} {
		c.Today.Configuration = configuration
		r := solved(t, c)
		if got := r.Symbol(perf.Stall); got != want {
			t.Errorf("%s: %s, want %s", configuration, got, want)
		}
		if got := r.Name(perf.Stall); got != "Stall, "+configuration {
			t.Errorf("name %q", got)
		}
	}
	c.Today.Configuration = "landing"
	c.Aeroplane.Configurations = c.Aeroplane.Configurations[2:]
	c.Aeroplane.Calibration, c.Runs = c.Aeroplane.Calibration[1:], nil
	if r := solved(t, c); r.Symbol(perf.Stall) != "VS1" || r.Symbol(perf.FastestLevel) != "VH" {
		t.Error("one configuration alone is VS1")
	}
}

func TestStallAtBankIsTheModels(t *testing.T) {
	c := load(t, "marram")
	level := solved(t, c)
	got, ok := level.StallAtBank(45 * perf.Degree)
	c.Today.BankDeg = 45
	want := solved(t, c).Answer.Limits[perf.Stall]
	if !ok || math.Abs(float64(got.TAS/want.TAS-1)) > 1e-12 || math.Abs(float64(got.CAS/want.CAS-1)) > 1e-12 || math.Abs(float64(got.IAS/want.IAS-1)) > 1e-12 {
		t.Errorf("got %+v, want %+v", got, want)
	}
	if _, ok := solved(t, c).StallAtBank(45 * perf.Degree); ok {
		t.Error("no steeper than today's bank")
	}
}

func TestShortfallSaysWhatWouldHelp(t *testing.T) {
	r := solved(t, load(t, "no-level-flight"))
	lines := strings.Join(r.Shortfall(), "\n")
	for _, part := range []string{"No level flight", "kt CAS", "kW of thrust power", "kg in this air", "density altitude at this mass"} {
		if !strings.Contains(lines, part) {
			t.Errorf("%q is missing in\n%s", part, lines)
		}
	}
	// And it is true: just below the mass given level flight is possible, just above it is not.
	for _, x := range []struct {
		factor float64
		level  bool
	}{{0.999, true}, {1.001, false}} {
		c := load(t, "no-level-flight")
		c.Today.MassKg = r.Answer.Level.Mass * x.factor
		if got := solved(t, c).LevelFlight(); got != x.level {
			t.Errorf("at %v of the mass given level flight is %v", x.factor, got)
		}
	}
	if solved(t, load(t, "marram")).Shortfall() != nil {
		t.Error("a shortfall with level flight")
	}
}

func TestNewRefusesTheUnphysical(t *testing.T) {
	c := load(t, "marram")
	c.Aeroplane.WingAreaM2 = -1
	if r, err := New(c); err == nil || r != nil {
		t.Errorf("got %v, %v", r, err)
	}
}

func BenchmarkReport(b *testing.B) {
	c := load(b, "marram")
	for b.Loop() {
		r, err := New(c)
		if err != nil || len(r.JSON()) == 0 {
			b.Fatal(err)
		}
	}
}
