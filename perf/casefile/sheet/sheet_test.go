package sheet

import (
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
)

func marram(t testing.TB) *casefile.Case {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "..", "..", "assets", "case", "marram.json"))
	if err != nil {
		t.Fatal(err)
	}
	c, _, err := casefile.Parse(text)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func near(a, b float64) bool { return math.Abs(a-b) <= 1e-9*(1+math.Abs(b)) }

// The figures of the first row are worked out by hand beside it.
func TestRead(t *testing.T) {
	table := "Kind,IAS [kt],Altitude (ft),OAT [°F],Weight [lb],Power [%],Rate [ft/min],Propeller,Config,GS 1 [km/h],Track 1,GS 2 [km/h],Track 2,GS 3 [km/h],Track 3\n" +
		"level,100,1000,59,2000,65,,,,,,,,,\n" +
		"\n" +
		"Glide,60,3000,41,1800,,-500,windmilling,landing,,,,,,\n" +
		"gps-legs,90,2000,50,1900,,,,,180,0,190,120,170,240\n"
	runs, err := Read([]byte(table), marram(t))
	if err != nil || len(runs) != 3 {
		t.Fatalf("%d runs, %v", len(runs), err)
	}
	r := runs[0]
	if r.Kind != "level" || !near(r.IASMps, 51.44444444444444) || !near(r.PressureAltitudeM, 304.8) || !near(r.OutsideAirTemperatureC, 15) ||
		!near(r.MassKg, 907.18474) || !near(*r.PowerFraction, 0.65) || r.RateMps != nil || r.Configuration != "clean" {
		t.Errorf("first run %+v", r)
	}
	if r := runs[1]; r.Kind != "glide" || !near(*r.RateMps, -2.54) || r.Propeller != "windmilling" || r.Configuration != "landing" || r.PowerFraction != nil {
		t.Errorf("second run %+v", r)
	}
	if r := runs[2]; len(r.Legs) != 3 || !near(r.Legs[1].GroundSpeedMps, 190/3.6) || r.Legs[2].TrackDeg != 240 {
		t.Errorf("third run %+v", r)
	}
}

func TestReadForms(t *testing.T) {
	const want = 42.5 * perf.Knot
	for name, table := range map[string]string{
		"semicolons, decimal commas":  "kind;IAS [kt];PA [m];OAT [°C];mass [kg];power\nlevel;42,5;900;12;745;0,65\n",
		"tabs":                        "kind\tIAS [kt]\tPA [m]\tOAT [°C]\tmass [kg]\tpower\nlevel\t42.5\t900\t12\t745\t0.65\n",
		"a mark, CRLF, quotes":        "\ufeff\"kind\",\"IAS [kt]\",\"PA [m]\",\"OAT [°C]\",\"mass [kg]\",\"power\"\r\n\"level\",\"42.5\",900,12,745,0.65\r\n",
		"another order, a true minus": "OAT [K],mass [kg],power,PA [m],IAS [kt],kind\n285.15,745,.65,\u221210,42.5,level",
	} {
		runs, err := Read([]byte(table), marram(t))
		if err != nil || len(runs) != 1 || !near(runs[0].IASMps, want) || !near(runs[0].OutsideAirTemperatureC, 12) {
			t.Errorf("%s: %+v, %v", name, runs, err)
		}
	}
}

// Each fault is said at its line and column, with what is allowed; nothing is taken.
func TestFaults(t *testing.T) {
	const header = "kind,IAS [kt],PA [ft],OAT [°C],mass [kg],power [%],rate [ft/min],config\n"
	for name, c := range map[string]struct{ table, want string }{
		"empty":               {"", "line 1: the table is empty"},
		"unit unknown":        {"kind,IAS [furlongs]\n", `line 1, column 2 (IAS): the unit "furlongs" is not known; allowed: kt, mph, km/h or m/s`},
		"unit missing":        {"kind,IAS\n", "line 1, column 2 (IAS): needs its unit in brackets"},
		"column unknown":      {"kind,colour\n", "line 1, column 2 (colour): no such column"},
		"column twice":        {"kind,IAS [kt],ias [mph]\n", "line 1, column 3 (ias): the same as column 2"},
		"no kind":             {"IAS [kt]\n50\n", "line 1: there is no column named kind"},
		"no number":           {header + "level,fast,3000,10,745,65,,\n", `line 2, column 2 (IAS): "fast" is no number`},
		"hexadecimal":         {header + "level,0x10,3000,10,745,65,,\n", `line 2, column 2 (IAS): "0x10" is no number`},
		"out of range":        {header + "level,50,3000,10,745,65,,\nlevel,-50,3000,10,745,65,,\n", "line 3, column 2 (IAS): -50 is refused"},
		"kind unknown":        {header + "zoom,50,3000,10,745,65,,\n", "line 2, column 1 (kind)"},
		"temperature missing": {header + "level,50,3000,,745,65,,\n", "line 2, column 4 (OAT): is missing"},
		"column missing":      {"kind,IAS [kt],OAT [°C],mass [kg],power [%]\nlevel,50,10,745,65\n", "line 2 (pressure altitude): is missing"},
		"rate missing":        {header + "climb,50,3000,10,745,100,,\n", "line 2, column 7 (rate)"},
		"configuration":       {header + "level,50,3000,10,745,65,,gear up\n", "line 2, column 8 (config)"},
		"too long":            {header + "level,50,3000,10,745,65,,clean,9\n", "line 2, column 9: the row has more fields"},
		"quote open":          {header + "\"level,50\n", "line 2"},
		"leg by halves":       {"kind,IAS [kt],PA [m],OAT [°C],mass [kg],GS 1 [kt],track 1,GS 2 [kt],track 2,GS 3 [kt],track 3\ngps-legs,50,900,10,745,50,0,50,,50,240\n", "line 2: leg 2 lacks"},
		"two legs":            {"kind,IAS [kt],PA [m],OAT [°C],mass [kg],GS 1 [kt],track 1,GS 2 [kt],track 2\ngps-legs,50,900,10,745,50,0,50,120\n", "line 2 (legs)"},
	} {
		runs, err := Read([]byte(c.table), marram(t))
		if err == nil || runs != nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %d runs, error %q, want %q", name, len(runs), err, c.want)
		}
	}
}

// What is written is read back the same, in every set of units.
func TestRoundTrip(t *testing.T) {
	c := marram(t)
	r := rand.New(rand.NewPCG(1, 2))
	for range 40 {
		d := casefile.Display{Speed: []string{"kt", "mph", "km/h"}[r.IntN(3)], Altitude: []string{"ft", "m"}[r.IntN(2)], Mass: []string{"kg", "lb"}[r.IntN(2)]}
		var runs []casefile.Run
		for range 1 + r.IntN(20) {
			runs = append(runs, randomRun(r))
		}
		c.Runs = runs
		if err := c.Validate(); err != nil {
			t.Fatal(err)
		}
		table := Write(runs, figure.FromDisplay(d, 720))
		back, err := Read(table, marram(t))
		if err != nil || len(back) != len(runs) {
			t.Fatalf("%v\n%s", err, table)
		}
		for i := range runs {
			a, b := runs[i], back[i]
			same := a.Kind == b.Kind && a.Configuration == b.Configuration && a.Propeller == b.Propeller && a.LeftOut == b.LeftOut &&
				near(a.IASMps, b.IASMps) && near(a.PressureAltitudeM, b.PressureAltitudeM) && near(a.OutsideAirTemperatureC, b.OutsideAirTemperatureC) && near(a.MassKg, b.MassKg) &&
				maybeNear(a.PowerFraction, b.PowerFraction) && maybeNear(a.RPM, b.RPM) && maybeNear(a.RateMps, b.RateMps) && len(a.Legs) == len(b.Legs)
			for k := range a.Legs {
				same = same && near(a.Legs[k].GroundSpeedMps, b.Legs[k].GroundSpeedMps) && near(a.Legs[k].TrackDeg, b.Legs[k].TrackDeg)
			}
			if !same {
				t.Fatalf("run %d went in as\n%+v\nand came out as\n%+v\n%s", i, a, b, table)
			}
		}
	}
}

func maybeNear(a, b *float64) bool {
	if a == nil || b == nil {
		return a == b
	}
	return near(*a, *b)
}

func randomRun(r *rand.Rand) casefile.Run {
	some := func(x float64) *float64 { return &x }
	run := casefile.Run{Configuration: []string{"clean", "landing"}[r.IntN(2)], IASMps: 20 + 40*r.Float64(), PressureAltitudeM: 3000 * r.Float64(),
		OutsideAirTemperatureC: 40*r.Float64() - 10, MassKg: 500 + 300*r.Float64()}
	switch r.IntN(5) {
	case 0:
		run.Kind, run.PowerFraction = "level", some(0.3+0.7*r.Float64())
	case 1:
		run.Kind, run.RPM, run.RateMps = "climb", some(2000+700*r.Float64()), some(4*r.Float64())
	case 2:
		run.Kind, run.RateMps, run.Propeller = "glide", some(-1-4*r.Float64()), []string{"stopped", "windmilling", "feathered"}[r.IntN(3)]
	case 3:
		run.Kind, run.LeftOut = "stall", "rough air, \"too gusty\"; said so"
	case 4:
		run.Kind = "gps-legs"
		for range 3 + r.IntN(3) {
			run.Legs = append(run.Legs, casefile.Leg{GroundSpeedMps: 30 + 20*r.Float64(), TrackDeg: 360 * r.Float64()})
		}
	}
	return run
}

func FuzzRead(f *testing.F) {
	c := marram(f)
	f.Add([]byte("kind,IAS [kt],PA [ft],OAT [°C],mass [kg],power [%]\nlevel,50,3000,10,745,65\n"))
	f.Add([]byte("kind;IAS [kt];GS 1 [kt];track 1\n\"a\nb\";1,5;;\n"))
	f.Add([]byte("\ufeffkind\tleft out\nstall\t=1+1\n"))
	f.Fuzz(func(t *testing.T, data []byte) {
		runs, err := Read(data, c)
		if err != nil {
			if runs != nil {
				t.Fatal("runs beside an error")
			}
			return
		}
		d := c.Clone()
		d.Runs = runs
		if err := d.Validate(); err != nil {
			t.Fatalf("what was read is no sound case: %v", err)
		}
		if again, err := Read(Write(runs, figure.Of(c)), c); err != nil || len(again) != len(runs) {
			t.Fatalf("what was read is not read again: %v", err)
		}
	})
}
