package casefile

import (
	"bytes"
	"encoding/json"
	"errors"
	"math"
	"math/rand/v2"
	"reflect"
	"strconv"
	"strings"
	"testing"

	"levelspan/perf"
)

// randomCase is a sound case of any kinds, with every number anywhere in its range as far as the rest of the case lets it.
func randomCase(t testing.TB, r *rand.Rand) *Case {
	t.Helper()
	c := sample()
	set := func(path, text string) {
		if err := c.SetText(path, text); err != nil {
			t.Fatalf("%s = %s: %v", path, text, err)
		}
	}
	set("aeroplane.engine.kind", []string{Piston, Turboprop, Electric}[r.IntN(3)])
	set("aeroplane.propeller.kind", []string{ConstantEfficiency, ConstantSpeed, FixedPitch}[r.IntN(3)])
	set("aeroplane.name", "Nr. "+strconv.Itoa(r.IntN(1000))+` "é<&>`)
	for _, f := range Fields() {
		path := strings.ReplaceAll(strings.ReplaceAll(f.Path, "runs[].legs[]", "runs[4].legs[1]"), "[]", "["+strconv.Itoa(r.IntN(2))+"]")
		switch f.Kind {
		case KindNumber, KindMaybe:
			switch r.IntN(4) {
			case 0:
				_ = c.SetNumber(path, f.Min+(f.Max-f.Min)*r.Float64())
			case 1: // nearer to what an aeroplane has
				if x, set := c.Number(path); set {
					_ = c.SetNumber(path, x*(0.8+0.4*r.Float64()))
				}
			case 2:
				_ = c.ClearNumber(path)
			}
		case KindChoice:
			if r.IntN(3) == 0 && !strings.HasSuffix(path, "kind") {
				_ = c.SetText(path, f.Choices[r.IntN(len(f.Choices))])
			}
		}
	}
	c.Runs = c.Runs[:r.IntN(6)]
	if len(c.Runs) == 0 {
		c.Runs = nil
	}
	return c
}

// Any sound case comes back from its file and from its link as it was, the schema takes it, and the model solves it.
func TestRandomCasesComeBackAsTheyWere(t *testing.T) {
	r := rand.New(rand.NewPCG(1976, 2533))
	schema := compiled(t)
	var solver perf.Solver
	kinds := map[string]bool{}
	for i := range 400 {
		c := randomCase(t, r)
		if err := c.Validate(); err != nil {
			t.Fatalf("case %d: %v", i, err)
		}
		text := c.Marshal()
		d, warnings, err := Parse(text)
		if err != nil || len(warnings) > 0 || !reflect.DeepEqual(c, d) {
			t.Fatalf("case %d: %v %v\n%s", i, err, warnings, text)
		}
		if !bytes.Equal(d.Marshal(), text) || !json.Valid(text) {
			t.Errorf("case %d: not canonical", i)
		}
		if e, _, err := ParseFragment(c.Fragment()); err != nil || !reflect.DeepEqual(c, e) {
			t.Errorf("case %d: by its fragment: %v", i, err)
		}
		if err := refused(t, schema, text); err != nil {
			t.Errorf("case %d: the schema refuses it: %v", i, err)
		}
		a, k, err := c.Model()
		var answer perf.Answer
		if err == nil {
			err = solver.Solve(&a, &k, &answer)
		}
		if err != nil {
			t.Errorf("case %d: the model refuses it: %v", i, err)
		}
		kinds[c.Aeroplane.Engine.Kind+" "+c.Aeroplane.Propeller.Kind] = true
	}
	if len(kinds) != 9 {
		t.Errorf("only %d pairs of kinds came up", len(kinds))
	}
}

// The order of keys in a file, its spaces and the way its numbers are written make no difference.
func TestShuffledFilesReadAlike(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 9))
	var shuffle func(n *node)
	shuffle = func(n *node) {
		r.Shuffle(len(n.members), func(i, j int) { n.members[i], n.members[j] = n.members[j], n.members[i] })
		for i := range n.members {
			shuffle(&n.members[i].value)
		}
		for i := range n.items {
			shuffle(&n.items[i])
		}
		if n.kind == nodeNumber {
			x, _ := strconv.ParseFloat(n.text, 64)
			n.text = strconv.FormatFloat(x, 'E', -1, 64)
		}
	}
	for range 50 {
		c := randomCase(t, r)
		root, err := parseJSON(c.Marshal())
		if err != nil {
			t.Fatal(err)
		}
		shuffle(&root)
		text := bytes.ReplaceAll(appendCompact(nil, &root), []byte(`,"`), []byte(" ,\r\n\t \""))
		d, _, err := Parse(text)
		if err != nil || !bytes.Equal(c.Marshal(), d.Marshal()) {
			t.Fatalf("%v\n%s", err, text)
		}
	}
}

// Every file that is cut short anywhere is refused with a place, and says so.
func TestEveryCutFileIsRefused(t *testing.T) {
	text := bytes.TrimSpace(sample().Marshal())
	for n := range text {
		_, _, err := Parse(text[:n])
		var syntax *SyntaxError
		if !errors.As(err, &syntax) {
			t.Fatalf("cut to %d bytes: %v", n, err)
		}
	}
}

// One changed byte anywhere gives an error or a sound case, never a panic or an unsound one.
func TestEveryChangedByteIsSafe(t *testing.T) {
	text := sample().Marshal()
	r := rand.New(rand.NewPCG(5, 5))
	taken := 0
	for i := range text {
		damaged := bytes.Clone(text)
		damaged[i] = byte(r.IntN(256))
		c, _, err := Parse(damaged)
		if err != nil {
			continue
		}
		taken++
		if err := c.Validate(); err != nil {
			t.Errorf("byte %d became %q: taken, and yet %v", i, damaged[i], err)
		}
	}
	if taken == 0 || taken == len(text) {
		t.Errorf("%d of %d were taken", taken, len(text))
	}
}

func TestFieldOf(t *testing.T) {
	for path, want := range map[string]string{"aeroplane.configurations[1].cl_max": "maximum lift coefficient", "aeroplane.configurations[].cl_max": "maximum lift coefficient",
		"aeroplane.propeller.advance_ratio[2]": "advance ratio", "runs[99].ias_mps": "indicated airspeed"} {
		f, ok := FieldOf(path)
		if !ok || f.Name != want || f.Path != path {
			t.Errorf("%s: %+v", path, f)
		}
	}
	for _, path := range []string{"", "format", "aeroplane.polar", "aeroplane.configurations[x].cl_max"} {
		if _, ok := FieldOf(path); ok {
			t.Errorf("%q is a field", path)
		}
	}
}

// Each field says what a person needs: a name, a range that holds the default and the class average, and where to find it.
func TestFieldsAreWhole(t *testing.T) {
	seen := map[string]bool{}
	for _, f := range Fields() {
		if f.Name == "" || seen[f.Path] {
			t.Errorf("%s: name %q, or twice", f.Path, f.Name)
		}
		seen[f.Path] = true
		number := f.Kind == KindNumber || f.Kind == KindMaybe || f.Kind == KindNumbers
		if number && !(f.Min < f.Max) {
			t.Errorf("%s: %v to %v", f.Path, f.Min, f.Max)
		}
		if f.Kind == KindNumber && !f.Required && f.Otherwise == "" && !f.holds(f.Default) {
			t.Errorf("%s: its default %v is out of its range", f.Path, f.Default)
		}
		if f.Typical != 0 && !f.holds(f.Typical) {
			t.Errorf("%s: its class average %v is out of its range", f.Path, f.Typical)
		}
		if strings.HasPrefix(f.Path, "aeroplane.") && f.Help == "" {
			t.Errorf("%s: no help", f.Path)
		}
		if f.Kind == KindMaybe && f.Otherwise == "" {
			t.Errorf("%s: nothing says what its absence means", f.Path)
		}
		if f.Allowed() == "" {
			t.Errorf("%s: nothing says what is allowed", f.Path)
		}
		q, fills := f.Quantity()
		if !fills {
			continue
		}
		if d := q.Domain(); math.Abs(f.ToSI(f.Min)-d.Min) > 1e-9*math.Max(1, math.Abs(d.Min)) || math.Abs(f.ToSI(f.Max)-d.Max) > 1e-9*math.Abs(d.Max) ||
			math.Abs(f.FromSI(f.ToSI(f.Max))-f.Max) > 1e-9*math.Abs(f.Max) {
			t.Errorf("%s: %v to %v %s is not the model's %v to %v %s", f.Path, f.Min, f.Max, f.Unit, d.Min, d.Max, d.Unit)
		}
	}
}

func TestTextOfUnknownPaths(t *testing.T) {
	c := sample()
	for _, path := range []string{"", "aeroplane.wing_area_m2", "aeroplane.polar", "runs[9].kind", "format"} {
		if s, ok := c.Text(path); ok || s != "" {
			t.Errorf("Text(%q) = %q", path, s)
		}
	}
}

func TestMessages(t *testing.T) {
	if got := (Warning{"a.b", "kept"}).String(); got != "a.b: kept" {
		t.Errorf("warning %q", got)
	}
	if got := (Fault{"a.b", "", "1 to 2"}).Error(); got != "a.b: missing; allowed: 1 to 2" {
		t.Errorf("fault %q", got)
	}
	if got := (&FragmentError{"it is empty"}).Error(); got != "share link: it is empty" {
		t.Errorf("fragment error %q", got)
	}
	if got := oneOf([]string{"a", "b", "c"}); got != `"a", "b" or "c"` {
		t.Errorf("one of %s", got)
	}
}

func FuzzSetText(f *testing.F) {
	f.Add("aeroplane.name", "Marram")
	f.Add("aeroplane.propeller.kind", Table)
	f.Add("aeroplane.configurations[1].name", "clean")
	f.Add("runs[2].propeller", "")
	f.Add("aeroplane.note", "a\u2028b")
	f.Fuzz(func(t *testing.T, path, text string) {
		c := sample()
		before := c.Marshal()
		err := c.SetText(path, text)
		var fault *Fault
		switch got, _ := c.Text(path); {
		case err != nil && (!errors.As(err, &fault) || !bytes.Equal(before, c.Marshal())):
			t.Errorf("%q = %q: %v is no fault, or it changed the case", path, text, err)
		case err == nil && got != text:
			t.Errorf("%q = %q: now %q", path, text, got)
		}
		if err := c.Validate(); err != nil {
			t.Errorf("%q = %q left the case unphysical: %v", path, text, err)
		}
	})
}
