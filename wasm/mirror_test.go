package main

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"levelspan/game/app"
	"levelspan/game/scene"
	"levelspan/game/ui"
)

// paper is a ground by day.
var paper = scene.Color{R: 252, G: 251, B: 247, A: 255}

func board() []ui.Control {
	return []ui.Control{
		{ID: "tab/chart", Role: ui.RoleTab, Label: "Chart", Selected: true, Bounds: scene.Rect{X: 1, Y: 2, W: 80, H: 48}},
		{ID: "tab/aeroplane", Role: ui.RoleTab, Label: "Aeroplane", Bounds: scene.Rect{X: 81, Y: 2, W: 80, H: 48}},
		{ID: "undo", Label: "Undo", Disabled: true},
		{ID: "speed-kind/IAS", Role: ui.RoleRadio, Label: "IAS"},
		{ID: "speed-kind/CAS", Role: ui.RoleRadio, Label: "CAS"},
		{ID: "handle/mass", Role: ui.RoleSlider, Label: "Weight", ValueText: "760 kg", Value: 760.1, Min: 480, Max: 820, Step: 1},
		{ID: "name", Role: ui.RoleField, LiveText: true, Label: "Name", ValueText: "Marram", Error: "too long"},
		{ID: "list", Role: ui.RoleRegion, Scrolls: true},
	}
}

// page applies patches as mirror.js does, as far as a test of the Go end needs it.
type fakePage struct {
	t        *testing.T
	elements map[string]map[string]string // id to attributes; "tag", "place" and "value" among them
	order    string
	rows     map[string][]string
	texts    map[string]string
}

func newFakePage(t *testing.T) *fakePage {
	return &fakePage{t: t, elements: map[string]map[string]string{}, rows: map[string][]string{}, texts: map[string]string{}}
}

func (p *fakePage) apply(patch string) (records int) {
	p.t.Helper()
	for _, record := range strings.Split(patch, "\x1e") {
		if record == "" {
			continue
		}
		records++
		f := strings.Split(record, "\x1f")
		if strings.Contains("axpv-", f[0]) && p.elements[f[1]] == nil {
			p.t.Fatalf("record %q for an element that is not there", record)
		}
		switch f[0] {
		case "+":
			if p.elements[f[1]] != nil {
				p.t.Fatalf("%q made twice", f[1])
			}
			p.elements[f[1]] = map[string]string{"tag": f[2]}
		case "-":
			delete(p.elements, f[1])
		case "a":
			p.elements[f[1]][f[2]] = f[3]
		case "x":
			delete(p.elements[f[1]], f[2])
		case "p":
			p.elements[f[1]]["place"] = strings.Join(f[2:], " ")
		case "v":
			p.elements[f[1]]["value"] = f[2]
		case "o":
			p.order = strings.Join(f[1:], "|")
		case "r":
			p.rows[f[1]] = f[2:]
		case "R":
			for key := range p.rows {
				if !strings.Contains("\x1f"+record+"\x1f", "\x1f"+key+"\x1f") {
					delete(p.rows, key)
				}
			}
		case "t", "l":
			p.texts[f[1]] = f[2]
		case "c":
			p.texts["palette"] = f[1] + " " + f[2]
		case "f", "F", "T":
		default:
			p.t.Fatalf("unknown record %q", record)
		}
	}
	return records
}

func TestMirrorControls(t *testing.T) {
	m, p := newMirror(), newFakePage(t)
	controls := board()
	p.apply(m.update(controls, nil, paper))
	for _, c := range []struct{ id, attribute, want string }{
		{"tab/chart", "role", "tab"}, {"tab/chart", "aria-selected", "true"}, {"tab/chart", "tabindex", "0"},
		{"tab/chart", "place", "1 2 80 48"},
		{"tab/aeroplane", "aria-selected", "false"}, {"tab/aeroplane", "tabindex", "-1"},
		{"undo", "aria-disabled", "true"}, {"undo", "aria-selected", ""}, {"undo", "role", ""},
		{"speed-kind/IAS", "tabindex", "0"}, {"speed-kind/CAS", "tabindex", "-1"}, {"speed-kind/CAS", "aria-checked", "false"},
		{"handle/mass", "tag", "slider"}, {"handle/mass", "role", "slider"}, {"handle/mass", "aria-valuenow", "760.1"},
		{"handle/mass", "aria-valuemin", "480"}, {"handle/mass", "aria-valuetext", "760 kg"}, {"handle/mass", "aria-label", "Weight"},
		{"name", "tag", "input"}, {"name", "value", "Marram"}, {"name", "aria-invalid", "true"}, {"name", "aria-label", "Name. too long"},
		{"list", "tag", "region"}, {"list", "tabindex", ""}, {"list", "aria-label", ""},
	} {
		if got := p.elements[c.id][c.attribute]; got != c.want {
			t.Errorf("%s %s is %q, not %q", c.id, c.attribute, got, c.want)
		}
	}
	if want := "<tablist screens|tab/chart|tab/aeroplane|>|undo|<radiogroup speed kind|speed-kind/IAS|speed-kind/CAS|>|handle/mass|name|list"; p.order != want {
		t.Errorf("order %s", p.order)
	}
	if patch := m.update(controls, nil, paper); patch != "" {
		t.Errorf("nothing changed, but the patch is %q", patch)
	}

	if got := p.texts["palette"]; got != "day #fcfbf7" {
		t.Errorf("palette %s", got)
	}

	// A handle that moves changes its place and value, and nothing else.
	moved := board()
	moved[5].Value, moved[5].ValueText, moved[5].Bounds.X = 700, "700 kg", 33.126
	if n := p.apply(m.update(moved, nil, paper)); n != 3 {
		t.Errorf("%d records for one handle that moved", n)
	}
	if e := p.elements["handle/mass"]; e["aria-valuenow"] != "700" || e["aria-valuetext"] != "700 kg" || e["place"] != "33.13 0 0 0" {
		t.Errorf("the handle is %v", e)
	}

	// A dialog covers what lies below, and what is gone goes.
	over := append(board()[:6], ui.Control{ID: "key/ok", Label: "OK", Modal: 1})
	p.apply(m.update(over, nil, paper))
	if p.elements["undo"]["inert"] != "true" || p.elements["key/ok"]["inert"] != "" {
		t.Error("the dialog does not cover the rest")
	}
	if p.elements["name"] != nil || p.elements["list"] != nil {
		t.Error("what is gone is still there")
	}
	p.apply(m.update(board(), nil, paper))
	if p.elements["undo"]["inert"] != "" || p.elements["key/ok"] != nil || p.elements["name"] == nil {
		t.Error("the dialog is not gone")
	}
	changed := board()
	changed[6].LiveText = false
	p.apply(m.update(changed, nil, paper))
	if p.elements["name"]["tag"] != "button" || p.elements["name"]["aria-label"] != "Name, Marram. too long" || !strings.HasSuffix(p.order, "|name|list") {
		t.Errorf("a field that became a button: %v, order %s", p.elements["name"], p.order)
	}
}

func TestMirrorRows(t *testing.T) {
	m, p := newMirror(), newFakePage(t)
	cas := 22.633333333333333
	said := app.Mirror{Title: "Marram", Summary: "Level flight from 44 to 89 kt", Status: "copied", Warnings: []string{"a", "b"},
		Rows: []app.MirrorRow{
			{Key: "stall", Name: "Stall", Symbol: "VS1", ValueText: "44", CASMps: cas, TASMps: 25, IASMps: math.Inf(1)},
			{Key: "best_glide", Name: "Best glide", CASMps: 31, HasInterval: true, LowCASMps: 30.5, HighCASMps: 31.5, Selected: true},
		}, Facts: []app.Fact{{Key: "service", Name: "Service ceiling", ValueText: "14 600 ft", Value: 4450}}}
	p.apply(m.update(nil, &said, paper))
	if got, err := strconv.ParseFloat(p.rows["stall"][5], 64); err != nil || got != cas {
		t.Errorf("the speed reads back as %v", got)
	}
	if r := p.rows["stall"]; r[6] != "25" || r[7] != "" || r[8] != "" || r[9] != "" || r[10] != "0" {
		t.Errorf("stall %q", r)
	}
	if r := p.rows["best_glide"]; r[8] != "30.5" || r[9] != "31.5" || r[10] != "1" {
		t.Errorf("best glide %q", r)
	}
	if p.texts["warnings"] != "a \nb" || p.texts["summary"] != said.Summary || p.texts["status"] != "copied" {
		t.Errorf("texts %q", p.texts)
	}
	if patch := m.update(nil, &said, paper); patch != "" {
		t.Errorf("nothing changed, but the patch is %q", patch)
	}
	said.Rows = said.Rows[1:]
	p.apply(m.update(nil, &said, paper))
	if len(p.rows) != 1 {
		t.Errorf("rows %v", p.rows)
	}
	said.Rows = append(said.Rows, app.MirrorRow{Key: "stall", Name: "Stall", CASMps: cas})
	p.apply(m.update(nil, &said, paper))
	if len(p.rows) != 2 || p.rows["stall"][0] != "Stall" {
		t.Errorf("a row that came back: %v", p.rows)
	}
}

// A name may hold anything; it cannot end its field or its record.
func TestMirrorKeepsTextInItsField(t *testing.T) {
	m, p := newMirror(), newFakePage(t)
	hostile := "x\x1e+\x1fevil\x1fbutton\x1e<img src=x onerror=alert(1)>\x00"
	p.apply(m.update([]ui.Control{{ID: "field/" + hostile, Label: hostile}}, &app.Mirror{Title: hostile, Rows: []app.MirrorRow{{Key: hostile, Name: hostile}}}, paper))
	if len(p.elements) != 1 || p.elements["evil"] != nil || len(p.rows) != 1 {
		t.Errorf("elements %v, rows %v", p.elements, p.rows)
	}
}

func FuzzMirror(f *testing.F) {
	f.Add("a/b", "label", 1.0, uint8(0), false)
	f.Add("a\x1eb", "\x1f", math.Inf(1), uint8(3), true)
	f.Fuzz(func(t *testing.T, id, label string, v float64, role uint8, live bool) {
		m, p := newMirror(), newFakePage(t)
		one := ui.Control{ID: id, Label: label, ValueText: label, Value: v, Role: ui.Role(role % 9), LiveText: live, Bounds: scene.Rect{X: v, W: v}}
		two := one
		two.ID, two.Modal = id+"2", 1
		p.apply(m.update([]ui.Control{one, two, one}, &app.Mirror{Title: label, Rows: []app.MirrorRow{{Key: id, CASMps: v}}}, paper))
		p.apply(m.update([]ui.Control{two}, &app.Mirror{}, paper))
		p.apply(m.update([]ui.Control{one}, &app.Mirror{}, paper))
		if len(p.elements) > 1 {
			t.Fatalf("%d elements", len(p.elements))
		}
	})
}

// Dragging must not wait for the mirror: one handle and a dozen rows a frame.
func BenchmarkMirror(b *testing.B) {
	m := newMirror()
	controls := board()
	said := app.Mirror{Rows: make([]app.MirrorRow, 12)}
	for i := range said.Rows {
		said.Rows[i] = app.MirrorRow{Key: "row" + strconv.Itoa(i), Name: "Name", ValueText: "44"}
	}
	b.ReportAllocs()
	for i := range b.N {
		controls[5].Value = float64(i % 300)
		for j := range said.Rows {
			said.Rows[j].CASMps = float64(i%300) + float64(j)
		}
		m.update(controls, &said, paper)
	}
}
