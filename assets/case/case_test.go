package democase

import (
	"bytes"
	"testing"

	"levelspan/perf/casefile"
)

func TestDemoIsCanonicalAndSound(t *testing.T) {
	c, warnings, err := casefile.Parse(JSON())
	if err != nil || len(warnings) > 0 {
		t.Fatalf("error %v, warnings %v", err, warnings)
	}
	if got := c.Marshal(); !bytes.Equal(got, JSON()) {
		t.Errorf("marram.json is not in canonical form; it should be:\n%s", got)
	}
}

func TestJSONIsTheCallers(t *testing.T) {
	b := JSON()
	b[0] = 'x'
	if JSON()[0] != '{' {
		t.Error("a caller can change the demo")
	}
}
