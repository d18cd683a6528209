package main

import (
	"bytes"
	"encoding/json"
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"

	democase "levelspan/assets/case"
	"levelspan/perf/casefile"
)

// run is one run of the command.
func run(stdin string, args ...string) (code int, out, problems string) {
	var o, e bytes.Buffer
	code = doMain(args, strings.NewReader(stdin), &o, &e)
	return code, o.String(), e.String()
}

// file writes a case file and returns its path.
func file(t *testing.T, text string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "case.json")
	if err := os.WriteFile(path, []byte(text), 0o600); err != nil {
		t.Fatal(err)
	}
	return path
}

var demo = string(democase.JSON())

func tooHeavy(t *testing.T) string {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "..", "testdata", "cases", "no-level-flight.json"))
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

func TestLimits(t *testing.T) {
	path := file(t, demo)
	code, text, problems := run("", "limits", path)
	if code != 0 || problems != "" || !strings.HasPrefix(text, "Marram (two-seat survey, big tyres)\n") || !strings.Contains(text, "Advisory only") {
		t.Fatalf("code %d, errors %q, out\n%s", code, problems, text)
	}
	_, object, _ := run("", "limits", path, "--json")
	var v map[string]any
	if err := json.Unmarshal([]byte(object), &v); err != nil || v["format"] != "levelspan-limits" {
		t.Errorf("%v\n%s", err, object)
	}
	for _, args := range [][]string{{"limits", "--json", path}, {"limits", "--json", "--", path}, {"limits", "-json", path}, {"limits", "--json", "-"}} {
		stdin := ""
		if args[len(args)-1] == "-" {
			stdin = demo
		}
		if code, again, problems := run(stdin, args...); code != 0 || again != object || problems != "" {
			t.Errorf("%v: code %d, errors %q, another answer", args, code, problems)
		}
	}
}

func TestGradient(t *testing.T) {
	for _, args := range [][]string{{"limits", "-", "--gradient", "0.04"}, {"limits", "--gradient=0.04", "-"}} {
		if code, text, problems := run(demo, args...); code != 0 || !strings.Contains(strings.ReplaceAll(text, "\u00a0", " "), "Climb of 243 ft/nm up to") {
			t.Errorf("%v: code %d, errors %q, out\n%s", args, code, problems, text)
		}
	}
	if code, text, _ := run(demo, "limits", "-"); code != 0 || strings.Contains(text, "Climb of") {
		t.Errorf("code %d; a gradient that nobody asked for in\n%s", code, text)
	}
	for _, g := range []string{"2", "-1", "x", "", "NaN"} {
		if code, out, problems := run(demo, "limits", "-", "--gradient", g); code != 2 || out != "" || problems == "" {
			t.Errorf("gradient %q: code %d, out %q, errors %q", g, code, out, problems)
		}
	}
}

func TestNoLevelFlightIsOne(t *testing.T) {
	code, text, problems := run(tooHeavy(t), "limits", "-")
	if code != 1 || problems != "" || !strings.Contains(text, "No level flight") || !strings.Contains(text, "It would be possible below") {
		t.Errorf("code %d, errors %q, out\n%s", code, problems, text)
	}
	code, object, _ := run(tooHeavy(t), "limits", "-", "--json")
	if code != 1 || !strings.Contains(object, `"level_flight": false`) || !strings.Contains(object, `"level_flight_mass_kg"`) {
		t.Errorf("code %d, out\n%s", code, object)
	}
}

func TestLinkAndOpen(t *testing.T) {
	code, link, problems := run(demo, "link", "-")
	if code != 0 || problems != "" || strings.Count(link, "\n") != 1 || len(link) > 2500 {
		t.Fatalf("code %d, errors %q, link %q", code, problems, link)
	}
	link = strings.TrimSpace(link)
	for _, form := range []string{link, "#case=" + link, "file:///a/levelspan.html#case=" + link} {
		if code, text, problems := run("", "open", form); code != 0 || text != demo || problems != "" {
			t.Errorf("open %.30s: code %d, errors %q", form, code, problems)
		}
	}
	if code, text, _ := run(link+"\n", "open", "-"); code != 0 || text != demo {
		t.Errorf("open -: code %d", code)
	}
	if code, out, problems := run("", "open", link[:len(link)-9]); code != 2 || out != "" || !strings.Contains(problems, "cut short") || strings.Count(problems, "\n") != 1 {
		t.Errorf("cut: code %d, out %q, errors %q", code, out, problems)
	}
}

func TestSchemaVersionAndHelp(t *testing.T) {
	if code, text, _ := run("", "schema"); code != 0 || text != string(casefile.Schema()) {
		t.Errorf("schema: code %d", code)
	}
	if code, text, _ := run("", "version"); code != 0 || !strings.HasPrefix(text, "levelspan ") || strings.Count(text, "\n") != 1 {
		t.Errorf("version: code %d, %q", code, text)
	}
	if code, text, problems := run("", "--help"); code != 0 || text != usage || problems != "" {
		t.Errorf("help: code %d, %q, %q", code, text, problems)
	}
	for _, later := range []string{"advise", "trip", "card"} {
		if strings.Contains(usage, "levelspan "+later) {
			t.Errorf("the usage promises %s", later)
		}
	}
}

func TestBadUsageIsTwo(t *testing.T) {
	for _, args := range [][]string{nil, {"limit"}, {"limits"}, {"limits", "a", "b"}, {"limits", "--xml", "a"}, {"limits", "a", "--gradient"}, {"link"}, {"link", "--json", "a"}, {"open"},
		{"schema", "x"}, {"version", "x"}, {""}, {"-"}} {
		if code, out, problems := run("", args...); code != 2 || out != "" || !strings.Contains(problems, "usage:") {
			t.Errorf("%q: code %d, out %q, errors %q", args, code, out, problems)
		}
	}
}

func TestBadInputIsTwoWithOneLineAFault(t *testing.T) {
	two := strings.NewReplacer(`"wing_area_m2": 16.5`, `"wing_area_m2": 0`, `"cd0": 0.034`, `"cd0": "x"`).Replace(demo)
	for _, x := range []struct {
		text  string
		lines int
		part  string
	}{
		{two, 2, "aeroplane.wing_area_m2: 0 is refused; allowed: 0.5 to 1000 m²"},
		{demo[:200], 1, "line 9, column"},
		{"", 1, "empty"},
		{strings.Replace(demo, `"version": 1`, `"version": 7`, 1), 1, "newer"},
		{"\xff\xfe{", 1, "line 1"},
	} {
		for _, command := range []string{"limits", "link"} {
			path := file(t, x.text)
			code, out, problems := run("", command, path)
			if code != 2 || out != "" || strings.Count(problems, "\n") != x.lines || !strings.Contains(problems, x.part) {
				t.Errorf("%s of %.30q: code %d, out %q, errors\n%s", command, x.text, code, out, problems)
			}
			for _, line := range strings.Split(strings.TrimSpace(problems), "\n") {
				if !strings.HasPrefix(line, path+": ") {
					t.Errorf("%q does not name the file", line)
				}
			}
		}
	}
	if code, out, problems := run("", "limits", filepath.Join(t.TempDir(), "none.json")); code != 2 || out != "" || strings.Count(problems, "\n") != 1 {
		t.Errorf("no such file: code %d, out %q, errors %q", code, out, problems)
	}
	if code, _, problems := run("", "limits", t.TempDir()); code != 2 || problems == "" {
		t.Errorf("a folder: code %d, errors %q", code, problems)
	}
}

func TestUnknownKeysAreWarnedOfOnStandardError(t *testing.T) {
	text := strings.Replace(demo, `"version": 1,`, `"version": 1, "colour": "red",`, 1)
	code, out, problems := run(text, "limits", "-")
	_, plain, _ := run(demo, "limits", "-")
	if code != 0 || out != plain || !strings.Contains(problems, "warning: colour:") || strings.Count(problems, "\n") != 1 {
		t.Errorf("code %d, errors %q, out\n%s", code, problems, out)
	}
	_, link, _ := run(text, "link", "-")
	if _, back, _ := run("", "open", strings.TrimSpace(link)); !strings.Contains(back, `"colour": "red"`) {
		t.Error("the unknown key is lost on the way through a link")
	}
}

type closed struct{}

func (closed) Write([]byte) (int, error) { return 0, errors.New("closed") }
func (closed) Read([]byte) (int, error)  { return 0, errors.New("gone") }

func TestStreamsThatFail(t *testing.T) {
	var problems bytes.Buffer
	if code := doMain([]string{"schema"}, strings.NewReader(""), closed{}, &problems); code != 2 || problems.Len() == 0 {
		t.Errorf("output that fails: code %d, %q", code, problems.String())
	}
	problems.Reset()
	if code := doMain([]string{"limits", "-"}, closed{}, closed{}, &problems); code != 2 || !strings.Contains(problems.String(), "gone") {
		t.Errorf("input that fails: code %d, %q", code, problems.String())
	}
}

// An endless input is given up at the bound.
func TestEndlessInput(t *testing.T) {
	var o, e bytes.Buffer
	if code := doMain([]string{"limits", "-"}, endless{}, &o, &e); code != 2 || !strings.Contains(e.String(), "larger than 16 MiB") {
		t.Errorf("code %d, %q", code, e.String())
	}
}

type endless struct{}

func (endless) Read(b []byte) (int, error) {
	for i := range b {
		b[i] = ' '
	}
	return len(b), nil
}

// fit prints the estimate, as a table and for programs; bad usage and bad input are 2.
func TestFit(t *testing.T) {
	path := file(t, demo)
	code, text, problems := run("", "fit", path)
	if code != 0 || problems != "" || !strings.Contains(text, "95 % interval") || !strings.Contains(text, "cd0") {
		t.Fatalf("code %d, errors %q, out\n%s", code, problems, text)
	}
	code, object, problems := run(demo, "fit", "-", "--json")
	var v map[string]any
	if err := json.Unmarshal([]byte(object), &v); err != nil || code != 0 || problems != "" || v["format"] != "levelspan-fit" || v["version"] != 1.0 || v["converged"] != true {
		t.Errorf("code %d, %v\n%s", code, err, object)
	}
	for _, args := range [][]string{{"fit"}, {"fit", path, path}, {"fit", "--gradient", "0.1", path}, {"fit", "--loud", path}, {"fit", filepath.Join(t.TempDir(), "none.json")}} {
		if code, out, problems := run("", args...); code != 2 || out != "" || problems == "" {
			t.Errorf("%v: code %d, out %q, errors %q", args, code, out, problems)
		}
	}
}
