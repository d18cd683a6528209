package main

import (
	"encoding/binary"
	"math"
	"testing"
	"time"

	"levelspan/game/app"
	"levelspan/game/ui"
)

// put writes one event as bridge.js does.
func (w *wire) put(index int, numbers ...float64) {
	at := wireHead + index*wireWidth
	for i := range wireWidth {
		v := 0.0
		if i < len(numbers) {
			v = numbers[i]
		} else if i >= 12 {
			v = -1
		}
		binary.LittleEndian.PutUint64(w.buf[8*(at+i):], math.Float64bits(v))
	}
}

func (w *wire) head(numbers ...float64) {
	for i, v := range numbers {
		binary.LittleEndian.PutUint64(w.buf[8*i:], math.Float64bits(v))
	}
}

func TestWire(t *testing.T) {
	texts := []string{"handle/mass", "case.json", "#case=x", "copied", "no room"}
	text := func(i int) string {
		if i < 0 || i >= len(texts) {
			return ""
		}
		return texts[i]
	}
	file := func(i int) []byte {
		if i != 3 {
			return nil
		}
		return []byte("{}")
	}
	var w wire
	w.head(20, 1, 34, 2, 1, 1500)
	w.put(0, float64(ui.PointerMove), 7, 1, 10.25, 20.5, 0, 0, 0, 0, 0, 0, 1234.5)
	w.put(1, float64(ui.KeyDown), 0, 0, 0, 0, 0, 0, float64(ui.KeyUndo), 0, 1, 0, 1235, 0)
	w.put(2, float64(ui.KeyDown), 0, 0, 0, 0, 0, 0, 0, '7')
	w.put(3, wireFile, 0, 0, 0, 0, 0, 0, 0, 0, 0, 3, 0, 1, -1)
	w.put(4, wireFile, 0, 0, 0, 0, 0, 0, 0, 0, 0, -1, 0, 1, 4)
	w.put(5, wireLink, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, -1, 2)
	w.put(6, wireNotice, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, -1, 3)
	w.put(7, wireFailure, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, -1, 4)
	w.put(8, 55)
	w.put(9, float64(ui.Wheel), 0, 0, 5, 6, 1, -2, math.NaN(), math.Inf(1), 0, 0, math.NaN())

	in := app.Input{Notices: []string{"old"}, Events: []ui.Event{{}}}
	w.decode(&in, 10, text, file)
	if in.Top != 20 || in.Right != 1 || in.Bottom != 34 || in.Left != 2 || !in.PrefersDark || in.Now != 1500*time.Millisecond {
		t.Errorf("head: %+v", in)
	}
	want := []ui.Event{
		{Kind: ui.PointerMove, Pointer: 7, Touch: true, X: 10.25, Y: 20.5, Time: 1234500 * time.Microsecond},
		{Kind: ui.KeyDown, Key: ui.KeyUndo, Shift: true, Time: 1235 * time.Millisecond, ID: "handle/mass"},
		{Kind: ui.KeyDown, Rune: '7'},
		{Kind: ui.Wheel, X: 5, Y: 6, DX: 1, DY: -2},
	}
	if len(in.Events) != len(want) {
		t.Fatalf("%d events: %+v", len(in.Events), in.Events)
	}
	for i := range want {
		if in.Events[i] != want[i] {
			t.Errorf("event %d is %+v, not %+v", i, in.Events[i], want[i])
		}
	}
	if len(in.Opened) != 3 || string(in.Opened[0].Data) != "{}" || in.Opened[0].Name != "case.json" ||
		in.Opened[1].Err != "no room" || in.Opened[1].Data != nil || in.Opened[2].Link != "#case=x" {
		t.Errorf("opened %+v", in.Opened)
	}
	if len(in.Notices) != 1 || in.Notices[0] != "copied" || len(in.Failures) != 1 || in.Failures[0] != "no room" {
		t.Errorf("notices %q, failures %q", in.Notices, in.Failures)
	}
}

// Once warm, a frame without texts allocates nothing.
func TestWireAllocations(t *testing.T) {
	var w wire
	for i := range 20 {
		w.put(i, float64(ui.PointerMove), 1, 0, float64(i), 5)
	}
	var in app.Input
	none := func(int) string { return "" }
	noFile := func(int) []byte { return nil }
	w.decode(&in, 20, none, noFile)
	if n := testing.AllocsPerRun(100, func() { w.decode(&in, 20, none, noFile) }); n != 0 {
		t.Errorf("%v allocations a frame", n)
	}
}

// Whatever the queue holds, what comes out is finite and within the kinds that there are.
func FuzzWire(f *testing.F) {
	f.Add([]byte{0, 0, 0, 0, 0, 0, 240, 127}, 3)
	f.Add([]byte{255, 255, 255, 255, 255, 255, 255, 255, 0, 0, 0, 0, 0, 0, 89, 64}, 600)
	f.Fuzz(func(t *testing.T, data []byte, count int) {
		var w wire
		for i := range w.buf {
			if len(data) > 0 {
				w.buf[i] = data[i%len(data)]
			}
		}
		var in app.Input
		w.decode(&in, count, func(int) string { return "x" }, func(int) []byte { return nil })
		for _, e := range in.Events {
			if e.Kind > ui.SetText || e.Key > ui.KeySave || e.Time < 0 {
				t.Fatalf("event %+v", e)
			}
			for _, v := range []float64{e.X, e.Y, e.DX, e.DY, e.Value} {
				if math.IsNaN(v) || math.IsInf(v, 0) {
					t.Fatalf("event %+v", e)
				}
			}
		}
	})
}
