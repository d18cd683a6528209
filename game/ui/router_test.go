package ui

import (
	"math"
	"testing"
	"time"

	"levelspan/game/scene"
)

const ms = time.Millisecond

func ctl(id string, role Role, x, y, w, h float64) Control {
	r := scene.Rect{X: x, Y: y, W: w, H: h}
	return Control{ID: id, Role: role, Label: id, Bounds: r, Hit: Grow(r, MinTarget, MinTarget)}
}

// board is a small screen: a scrolling list with a row and a slider in it, buttons, tabs, radios, two handles.
func board() []Control {
	list := ctl("list", RoleRegion, 0, 200, 300, 200)
	list.Drag, list.Scrolls = AxisY, true
	row := ctl("row/a", RoleRow, 0, 210, 300, 50)
	inner := ctl("handle/in", RoleSlider, 100, 300, 40, 40)
	inner.Drag, inner.Min, inner.Max, inner.Value = AxisX, 0, 1, 0.5
	mass := ctl("handle/mass", RoleSlider, 480, 80, 40, 40)
	mass.Drag, mass.Min, mass.Max, mass.Value, mass.Step, mass.Page = AxisX, 480, 850, 760, 1, 10
	alt := ctl("handle/alt", RoleSlider, 600, 200, 40, 40)
	alt.Drag, alt.Min, alt.Max, alt.Step, alt.Page = AxisY, -600, 6000, 30, 300
	tab1, tab2 := ctl("tab/chart", RoleTab, 0, 0, 100, 52), ctl("tab/aeroplane", RoleTab, 100, 0, 100, 52)
	tab1.Selected = true
	r1, r2, r3 := ctl("kind/IAS", RoleRadio, 200, 0, 60, 48), ctl("kind/CAS", RoleRadio, 260, 0, 60, 48), ctl("kind/TAS", RoleRadio, 320, 0, 60, 48)
	r2.Selected = true
	dead := ctl("dead", RoleButton, 400, 0, 60, 48)
	dead.Disabled = true
	name := ctl("field/name", RoleField, 400, 300, 100, 48)
	name.LiveText = true
	return []Control{tab1, tab2, r1, r2, r3, ctl("undo", RoleButton, 400, 100, 60, 60), dead, list, row, inner, mass, alt, name}
}

func down(p int, x, y float64, at time.Duration) Event {
	return Event{Kind: PointerDown, Pointer: p, Touch: true, X: x, Y: y, Time: at}
}
func move(p int, x, y float64, at time.Duration) Event {
	return Event{Kind: PointerMove, Pointer: p, Touch: true, X: x, Y: y, Time: at}
}
func up(p int, x, y float64, at time.Duration) Event {
	return Event{Kind: PointerUp, Pointer: p, Touch: true, X: x, Y: y, Time: at}
}
func key(k Key) Event { return Event{Kind: KeyDown, Key: k} }

var kindNames = [...]string{"tap", "double", "start", "move", "end", "cancel", "scroll", "press", "focus", "slide", "type"}

// brief is the actions as words, without those of focus unless asked for.
func brief(actions []Action, focus bool) string {
	s := ""
	for _, a := range actions {
		if a.Kind == Focus && !focus {
			continue
		}
		if s != "" {
			s += " "
		}
		s += kindNames[a.Kind] + ":" + a.ID
	}
	return s
}

func TestGestures(t *testing.T) {
	cases := []struct {
		name   string
		events []Event
		want   string
	}{
		{"press and release between two frames is a tap", []Event{down(1, 430, 130, 0), up(1, 430, 130, 0)}, "tap:undo"},
		{"a wobble within the slop is a tap on a handle", []Event{down(1, 500, 100, 0), move(1, 505, 104, 0), up(1, 505, 104, 9*ms)}, "tap:handle/mass"},
		{"a gloved wobble within a button is a tap", []Event{down(1, 410, 110, 0), move(1, 450, 150, 0), up(1, 450, 150, 0)}, "tap:undo"},
		{"released outside is nothing", []Event{down(1, 430, 130, 0), up(1, 430, 300, 0)}, ""},
		{"out and in again is a tap", []Event{down(1, 430, 130, 0), move(1, 430, 300, 0), up(1, 430, 130, 0)}, "tap:undo"},
		{"disabled is nothing", []Event{down(1, 430, 20, 0), up(1, 430, 20, 0)}, ""},
		{"nothing there", []Event{down(1, 700, 20, 0), up(1, 700, 20, 0)}, ""},
		{"two soon after each other are a double tap", []Event{down(1, 500, 100, 0), up(1, 500, 100, 90*ms), down(2, 506, 100, 200*ms), up(2, 506, 100, 260*ms)},
			"tap:handle/mass tap:handle/mass double:handle/mass"},
		{"a third is not another", []Event{down(1, 430, 130, 0), up(1, 430, 130, 0), down(1, 430, 130, 50*ms), up(1, 430, 130, 50*ms), down(1, 430, 130, 90*ms), up(1, 430, 130, 90*ms)},
			"tap:undo tap:undo double:undo tap:undo"},
		{"too late for a double tap", []Event{down(1, 500, 100, 0), up(1, 500, 100, 0), down(1, 500, 100, 400*ms), up(1, 500, 100, 420*ms)},
			"tap:handle/mass tap:handle/mass"},
		{"a drag keeps its control outside the window", []Event{down(1, 500, 100, 0), move(1, 520, 100, 0), move(1, -900, 5000, 0), up(1, -900, 5000, 0)},
			"start:handle/mass move:handle/mass end:handle/mass"},
		{"across the only way it goes is neither drag nor tap", []Event{down(1, 500, 100, 0), move(1, 500, 160, 0), up(1, 500, 100, 0)}, ""},
		{"two fingers drag two handles", []Event{down(1, 500, 100, 0), down(2, 620, 220, 0), move(1, 520, 100, 0), move(2, 620, 190, 0), up(1, 520, 100, 0), up(2, 620, 190, 0)},
			"start:handle/mass start:handle/alt end:handle/mass end:handle/alt"},
		{"a second finger on the same handle means nothing", []Event{down(1, 500, 100, 0), down(2, 502, 102, 0), move(1, 520, 100, 0), move(2, 560, 102, 0), up(2, 560, 102, 0), up(1, 520, 100, 0)},
			"start:handle/mass end:handle/mass"},
		{"a cancelled drag says so", []Event{down(1, 500, 100, 0), move(1, 520, 100, 0), {Kind: PointerCancel, Pointer: 1}, move(1, 530, 100, 0), up(1, 530, 100, 0)},
			"start:handle/mass cancel:handle/mass"},
		{"Escape cancels a drag", []Event{down(1, 500, 100, 0), move(1, 520, 100, 0), key(KeyEscape), move(1, 530, 100, 0), up(1, 530, 100, 0), key(KeyEscape)},
			"start:handle/mass cancel:handle/mass press:handle/mass"},
		{"a release at no place cancels", []Event{down(1, 500, 100, 0), move(1, 520, 100, 0), up(1, math.NaN(), 100, 0)},
			"start:handle/mass cancel:handle/mass"},
		{"a cancelled press is nothing", []Event{down(1, 430, 130, 0), {Kind: PointerCancel, Pointer: 1}}, ""},
		{"a finger whose release was lost begins anew", []Event{down(1, 500, 100, 0), move(1, 530, 100, 0), down(1, 430, 130, 0), up(1, 430, 130, 0)},
			"start:handle/mass cancel:handle/mass tap:undo"},
		{"a list scrolls instead of tapping its row", []Event{down(1, 50, 230, 0), move(1, 50, 260, 5*ms), up(1, 50, 260, 400*ms)}, "scroll:list"},
		{"a row is tapped", []Event{down(1, 50, 230, 0), move(1, 52, 233, 5*ms), up(1, 52, 233, 40*ms)}, "tap:row/a"},
		{"across the list is nothing", []Event{down(1, 50, 230, 0), move(1, 90, 230, 5*ms), up(1, 90, 230, 40*ms)}, ""},
		{"a slider in a list drags its way", []Event{down(1, 120, 320, 0), move(1, 150, 322, 0), up(1, 150, 322, 400*ms)}, "start:handle/in end:handle/in"},
		{"a slider in a list scrolls the other way", []Event{down(1, 120, 320, 0), move(1, 121, 350, 0), up(1, 121, 350, 400*ms)}, "scroll:list"},
		{"the wheel scrolls the region under the pointer", []Event{{Kind: Wheel, X: 50, Y: 300, DY: 40}, {Kind: Wheel, X: 50, Y: 300, DY: 40}}, "scroll:list"},
		{"the wheel elsewhere does nothing", []Event{{Kind: Wheel, X: 500, Y: 100, DY: 40}}, ""},
	}
	for _, c := range cases {
		var r Router
		got := r.Route(nil, c.events, board(), time.Second)
		if brief(got, false) != c.want {
			t.Errorf("%s: %q, want %q", c.name, brief(got, false), c.want)
		}
		if r.Pressed() != "" {
			t.Errorf("%s: %q stays pressed", c.name, r.Pressed())
		}
		// The same events one frame each: the same meaning, moves apart.
		var one Router
		var each []Action
		for i := range c.events {
			each = one.Route(each, c.events[i:i+1], board(), c.events[i].Time)
		}
		if a, b := squeeze(got), squeeze(each); a != b {
			t.Errorf("%s: in one frame %q, in many %q", c.name, a, b)
		}
	}
}

// squeeze is brief with runs of equal actions as one.
func squeeze(actions []Action) string {
	var out []Action
	for _, a := range actions {
		if n := len(out); n > 0 && out[n-1].Kind == a.Kind && out[n-1].ID == a.ID && (a.Kind == DragMove || a.Kind == Scroll) {
			continue
		}
		out = append(out, a)
	}
	return brief(out, false)
}

// A drag begins where the slop ends: the first X - X0 is what lies beyond it, and what follows adds up.
func TestDragDoesNotJump(t *testing.T) {
	var r Router
	got := r.Route(nil, []Event{down(1, 500, 100, 0), move(1, 509, 100, 0), move(1, 512, 100, 0), move(1, 540, 101, 0)}, board(), 0)
	var start, last Action
	sum := 0.0
	for _, a := range got {
		switch a.Kind {
		case DragStart:
			start = a
		case DragMove:
			last = a
			sum += a.DX
		}
	}
	if start.X-start.X0 != 1 || last.X-last.X0 != 32 || sum != 31 || last.X0 != 508 {
		t.Errorf("start %+v, last %+v, sum of DX %v", start, last, sum)
	}
	if r.Pressed() != "handle/mass" || !r.Dragging("handle/mass") {
		t.Errorf("pressed %q", r.Pressed())
	}
}

func TestVanishedControlCancels(t *testing.T) {
	var r Router
	r.Route(nil, []Event{down(1, 500, 100, 0), move(1, 530, 100, 0)}, board(), 0)
	var without []Control
	for _, c := range board() {
		if c.ID != "handle/mass" {
			without = append(without, c)
		}
	}
	got := r.Route(nil, nil, without, 0)
	if brief(got, false) != "cancel:handle/mass" || r.Pressed() != "" {
		t.Fatalf("%q, pressed %q", brief(got, false), r.Pressed())
	}
	if got = r.Route(nil, []Event{move(1, 600, 100, 0), up(1, 600, 100, 0)}, board(), 0); len(got) != 0 {
		t.Errorf("a spent pointer acts: %q", brief(got, true))
	}
}

func TestModalLayer(t *testing.T) {
	var r Router
	r.Route(nil, []Event{{Kind: FocusOn, ID: "handle/alt"}, down(7, 500, 100, 0), move(7, 530, 100, 0)}, board(), 0)
	ok := ctl("ok", RoleButton, 410, 110, 60, 60)
	ok.Modal = 1
	over := append(board(), ok)
	got := r.Route(nil, nil, over, 0)
	if brief(got, false) != "cancel:handle/mass" {
		t.Errorf("a covered drag: %q", brief(got, false))
	}
	if r.Focus != "ok" {
		t.Errorf("focus %q, want it in the layer", r.Focus)
	}
	got = r.Route(nil, []Event{down(1, 430, 130, 0), up(1, 430, 130, 0), down(1, 50, 230, time.Second), up(1, 50, 230, time.Second),
		{Kind: Activate, ID: "undo"}, {Kind: SetValue, ID: "handle/mass", Value: 500}, {Kind: Wheel, X: 50, Y: 300, DY: 9}}, over, time.Second)
	if brief(got, true) != "tap:ok" {
		t.Errorf("under a layer: %q", brief(got, true))
	}
	// The second half of a double tap does not fall through to what the layer covered.
	got = r.Route(nil, []Event{down(1, 430, 130, 100*ms), up(1, 430, 130, 120*ms)}, board(), time.Second)
	if brief(got, false) != "" {
		t.Errorf("fell through: %q", brief(got, false))
	}
	// Nor does a third tap after the double tap that opened a layer.
	var again Router
	twice := []Event{down(1, 500, 100, 0), up(1, 500, 100, 0), down(1, 500, 100, 90*ms), up(1, 500, 100, 99*ms)}
	if got := brief(again.Route(nil, twice, board(), 0), false); got != "tap:handle/mass tap:handle/mass double:handle/mass" {
		t.Errorf("%q", got)
	}
	seven := ctl("key/7", RoleButton, 470, 70, 60, 60)
	seven.Modal = 1
	third := []Event{down(1, 500, 100, 180*ms), up(1, 500, 100, 190*ms)}
	if got := brief(again.Route(nil, third, append(board(), seven), 0), false); got != "" {
		t.Errorf("a third tap fell on the layer: %q", got)
	}
	third[0].Time, third[1].Time = 700*ms, 710*ms
	if got := brief(again.Route(nil, third, append(board(), seven), 0), false); got != "tap:key/7" {
		t.Errorf("a later tap on the layer: %q", got)
	}
	if r.Focus == "ok" {
		t.Error("the focus stayed in a layer that closed")
	}
}

func TestInertia(t *testing.T) {
	var r Router
	got := r.Route(nil, []Event{down(1, 50, 380, 0), move(1, 50, 360, 20*ms), move(1, 50, 330, 40*ms), move(1, 50, 300, 60*ms), up(1, 50, 300, 60*ms)}, board(), 60*ms)
	if brief(got, false) != "scroll:list" || got[len(got)-1].DY != 72 {
		t.Fatalf("%q %v", brief(got, false), got)
	}
	if !r.Animating() {
		t.Fatal("does not coast")
	}
	// The way coasted depends on the time alone, not on the frames.
	far := func(r Router, step, until time.Duration) (sum float64) {
		for now := 60*ms + step; now <= 60*ms+until; now += step {
			for _, a := range r.Route(nil, nil, board(), now) {
				sum += a.DY
			}
		}
		return sum
	}
	a, b := far(r, 8*ms, 264*ms), far(r, 33*ms, 264*ms)
	if a < 100 || a-b > 1e-6 || b-a > 1e-6 {
		t.Errorf("coasted %v and %v", a, b)
	}
	on := r
	if end := far(on, 8*ms, 5*time.Second); end < a+50 || end > 2000 {
		t.Errorf("coasted to %v", end)
	}
	// A touch stops it and is no tap.
	got = r.Route(nil, []Event{down(2, 50, 230, 100*ms), up(2, 50, 230, 120*ms)}, board(), 120*ms)
	if r.Animating() || brief(got, false) != "" {
		t.Errorf("touch on a coasting list: %q, still %v", brief(got, false), r.Animating())
	}
	var still Router
	still.NoInertia = true
	still.Route(nil, []Event{down(1, 50, 380, 0), move(1, 50, 340, 20*ms), up(1, 50, 300, 40*ms)}, board(), 40*ms)
	if still.Animating() {
		t.Error("coasts although reduced motion is wanted")
	}
}

func TestRouteAllocatesNothing(t *testing.T) {
	var r Router
	controls := board()
	events := []Event{down(1, 500, 100, 0), move(1, 520, 100, ms), move(1, 560, 100, 2*ms), up(1, 560, 100, 3*ms),
		down(1, 50, 380, 0), move(1, 50, 340, 20*ms), up(1, 50, 300, 40*ms), key(KeyTab), key(KeyRight), key(KeyEnter),
		{Kind: Wheel, X: 50, Y: 300, DY: 4}, {Kind: SetValue, ID: "handle/mass", Value: 600}}
	dst := make([]Action, 0, 64)
	if n := testing.AllocsPerRun(100, func() { dst = r.Route(dst[:0], events, controls, 50*ms) }); n != 0 {
		t.Errorf("%v allocations", n)
	}
}

func BenchmarkRouteDrag(b *testing.B) {
	var r Router
	controls := board()
	events := []Event{down(1, 500, 100, 0), move(1, 520, 100, ms), move(1, 560, 100, 2*ms), up(1, 560, 100, 3*ms)}
	dst := make([]Action, 0, 64)
	b.ReportAllocs()
	for b.Loop() {
		dst = r.Route(dst[:0], events, controls, 0)
	}
}
