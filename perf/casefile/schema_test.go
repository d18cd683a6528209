package casefile

import (
	"bytes"
	"encoding/json"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
)

// compiled is Schema as an independent validator reads it.
func compiled(t testing.TB) *jsonschema.Schema {
	t.Helper()
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(Schema()))
	if err != nil {
		t.Fatal(err)
	}
	c := jsonschema.NewCompiler()
	if err := c.AddResource("urn:levelspan:case:1", doc); err != nil {
		t.Fatal(err)
	}
	s, err := c.Compile("urn:levelspan:case:1")
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// refused is what the validator says of a file.
func refused(t testing.TB, s *jsonschema.Schema, file []byte) error {
	t.Helper()
	v, err := jsonschema.UnmarshalJSON(bytes.NewReader(file))
	if err != nil {
		t.Fatalf("%v: %.200s", err, file)
	}
	return s.Validate(v)
}

func TestSchemaTakesWhatParseTakes(t *testing.T) {
	s := compiled(t)
	for _, file := range [][]byte{sample().Marshal(), []byte(smallest), []byte(strings.Replace(smallest, `"version":1`, `"version":1.0,"mine":{"x":[null]}`, 1)),
		mutated(t, "aeroplane.fuel", "null"), mutated(t, "today.dew_point_c", "null"), mutated(t, "aeroplane.note", `""`), mutated(t, "runs", "[]"),
		mutated(t, "aeroplane.propeller.kind", `"table"`), mutated(t, "aeroplane.propeller.kind", `"constant-speed"`)} {
		if _, _, err := Parse(file); err != nil {
			t.Errorf("Parse: %v\n%s", err, file)
		}
		if err := refused(t, s, file); err != nil {
			t.Errorf("schema: %v\n%s", err, file)
		}
	}
}

func TestSchemaRefusesWhatParseRefuses(t *testing.T) {
	s := compiled(t)
	for _, x := range badFiles() {
		file := mutated(t, x[0], x[1])
		if _, _, err := Parse(file); err == nil {
			t.Errorf("Parse takes %s = %.40s", x[0], x[1])
		}
		if refused(t, s, file) == nil {
			t.Errorf("the schema takes %s = %.40s", x[0], x[1])
		}
	}
}

// Thousands of files with random values at random keys, good and bad: whatever Parse takes the schema takes, and what the
// schema refuses Parse refuses.
func TestSchemaAndParseOnRandomFiles(t *testing.T) {
	s := compiled(t)
	r := rand.New(rand.NewPCG(2, 1533))
	fields := Fields()
	taken := 0
	for range 3000 {
		f := fields[r.IntN(len(fields))]
		path := strings.ReplaceAll(strings.ReplaceAll(f.Path, "runs[].legs[]", "runs[4].legs[0]"), "[]", "[0]")
		var raw string
		switch f.Kind {
		case KindText:
			raw = []string{`"x"`, `""`, `"clean"`, `"\t"`, `"é\u2028"`, `null`}[r.IntN(6)]
		case KindChoice:
			choices := append([]string{""}, f.Choices...)
			raw = quote(choices[r.IntN(len(choices))])
		case KindNumbers:
			raw = []string{`[]`, `[0,0.5,1]`, `[0.1,0.2]`, `[1,2,3,4]`, `null`}[r.IntN(5)]
		default:
			span := f.Max - f.Min
			raw = formatNumber([]float64{f.Min, f.Max, f.Min + span*r.Float64(), f.Min - span*r.Float64(), f.Max + span*r.Float64(), math.Round(f.Max / 2)}[r.IntN(6)])
		}
		file := mutated(t, path, raw)
		_, _, err := Parse(file)
		bySchema := refused(t, s, file)
		if err == nil {
			taken++
			if bySchema != nil {
				t.Errorf("%s = %s: Parse takes it, the schema says %v", path, raw, bySchema)
			}
		}
	}
	if taken < 800 || taken > 2400 {
		t.Errorf("Parse took %d of 3000; the mix of good and bad has gone", taken)
	}
}

func TestSchemaDescribesEveryField(t *testing.T) {
	var doc any
	if err := json.Unmarshal(Schema(), &doc); err != nil {
		t.Fatal(err)
	}
	fields := 0
	var walk func(path string, v any)
	walk = func(path string, v any) {
		m, ok := v.(map[string]any)
		if !ok {
			return
		}
		if p, ok := m["properties"].(map[string]any); ok {
			for k, v := range p {
				walk(joinPath(path, k), v)
			}
			return
		}
		if items, ok := m["items"].(map[string]any); ok && items["properties"] != nil {
			walk(path+"[]", items)
			return
		}
		if path == "format" || path == "version" {
			return
		}
		fields++
		if f, ok := FieldOf(path); !ok || !strings.HasPrefix(m["description"].(string), f.Name) {
			t.Errorf("%s: described as %v", path, m["description"])
		}
	}
	walk("", doc)
	if fields != len(Fields()) {
		t.Errorf("%d fields in the schema, %d in the table", fields, len(Fields()))
	}
}
