package app

import (
	"strings"
	"testing"
	"time"

	"levelspan/game/scene"
	"levelspan/game/ui"
)

// testHost is the outside of a test: it remembers what was asked of it.
type testHost struct {
	copied  []string
	saved   map[string][]byte
	opening int
}

func (h *testHost) Copy(what, text string) { h.copied = append(h.copied, text) }
func (h *testHost) OpenFile()              { h.opening++ }
func (h *testHost) SaveFile(name, mime string, data []byte) {
	if h.saved == nil {
		h.saved = map[string][]byte{}
	}
	h.saved[name] = data
}
func (h *testHost) LinkBase() string { return "https://example.org/levelspan.html" }
func (h *testHost) Version() string  { return "test" }

// pilot is a person at the program: it feeds frames of input, one event a frame, at 60 frames a second.
type pilot struct {
	t    *testing.T
	app  *App
	host *testHost
	in   Input
}

const frame = 16 * time.Millisecond

func newPilot(t *testing.T, w, h float64) *pilot {
	t.Helper()
	return newPilotIn(t, Input{Width: w, Height: h})
}

func newPilotIn(t *testing.T, in Input) *pilot {
	t.Helper()
	in.Scale = 1
	host := &testHost{}
	p := &pilot{t: t, host: host, app: New(host, nil), in: in}
	if !p.step() {
		t.Fatal("the first Step drew nothing")
	}
	return p
}

// step feeds a frame without events and reports what Step did.
func (p *pilot) step(opened ...Opened) bool {
	p.in.Now += frame
	in := p.in
	in.Opened = opened
	return p.app.Step(in)
}

// event feeds frames of one event each.
func (p *pilot) event(events ...ui.Event) {
	for _, e := range events {
		p.in.Now += frame
		e.Time = p.in.Now
		in := p.in
		in.Events = []ui.Event{e}
		p.app.Step(in)
	}
}

func (p *pilot) find(id string) *ui.Control {
	for i := range p.app.Controls() {
		if c := &p.app.Controls()[i]; c.ID == id {
			return c
		}
	}
	return nil
}

// control is the control of that ID; the test ends where there is none.
func (p *pilot) control(id string) ui.Control {
	p.t.Helper()
	c := p.find(id)
	if c == nil {
		p.t.Fatalf("no control %q", id)
	}
	return *c
}

func middle(r scene.Rect) (x, y float64) { return r.X + r.W/2, r.Y + r.H/2 }

// tapAt presses and releases a finger.
func (p *pilot) tapAt(x, y float64) {
	p.event(ui.Event{Kind: ui.PointerDown, Pointer: 1, Touch: true, X: x, Y: y}, ui.Event{Kind: ui.PointerUp, Pointer: 1, Touch: true, X: x, Y: y})
}

// tap taps the middle of what can be touched of a control, long after any other tap.
func (p *pilot) tap(id string) {
	p.t.Helper()
	c := p.control(id)
	if c.Hit.H <= 1 || c.Hit.W <= 1 { // scrolled out of sight
		p.event(ui.Event{Kind: ui.Activate, ID: id})
		return
	}
	p.in.Now += time.Second
	x, y := middle(c.Hit)
	p.tapAt(x, y)
}

func (p *pilot) tapIf(id string) {
	if p.find(id) != nil {
		p.tap(id)
	}
}

func (p *pilot) setSlider(id string, v float64) {
	p.event(ui.Event{Kind: ui.SetValue, ID: id, Value: v})
}

func (p *pilot) key(k ui.Key) { p.event(ui.Event{Kind: ui.KeyDown, Key: k}) }

// doubleTap taps a control twice at once.
func (p *pilot) doubleTap(id string) {
	p.t.Helper()
	p.in.Now += time.Second
	x, y := middle(p.control(id).Hit)
	p.tapAt(x, y)
	p.tapAt(x, y)
}

// typeIn types a number on the drawn keypad and presses OK.
func (p *pilot) typeIn(number string) {
	p.t.Helper()
	for _, r := range number {
		switch r {
		case '.':
			p.tap("key/point")
		case '-':
			p.tap("key/sign")
		default:
			p.tap("key/" + string(r))
		}
	}
	p.tap("key/ok")
}

// down, move and up are one finger's frames.
func (p *pilot) down(finger int, x, y float64) {
	p.event(ui.Event{Kind: ui.PointerDown, Pointer: finger, Touch: true, X: x, Y: y})
}

func (p *pilot) move(finger int, x, y float64) {
	p.event(ui.Event{Kind: ui.PointerMove, Pointer: finger, Touch: true, X: x, Y: y})
}

func (p *pilot) up(finger int, x, y float64) {
	p.event(ui.Event{Kind: ui.PointerUp, Pointer: finger, Touch: true, X: x, Y: y})
}

// file is the case on the screen as it would be saved.
func (p *pilot) file() string { return string(p.app.Case().Marshal()) }

// row is a row of the mirror; the test ends where there is none.
func (p *pilot) row(key string) MirrorRow {
	p.t.Helper()
	for _, r := range p.app.Mirror().Rows {
		if r.Key == key {
			return r
		}
	}
	p.t.Fatalf("no row %q", key)
	return MirrorRow{}
}

// says reports whether the picture contains words, wherever its lines break.
func (p *pilot) says(words string) bool {
	close := strings.NewReplacer(" ", "", "\u00a0", "")
	return strings.Contains(close.Replace(string(p.app.Scene().Text)), close.Replace(words))
}
