package main

import (
	"encoding/binary"
	"math"
	"time"

	"levelspan/game/app"
	"levelspan/game/ui"
)

// The event queue as bridge.js writes it: a head of numbers, then a number of events, each a fixed number of numbers.
// All are float64, little endian. A string is the index of one of the texts handed over beside the queue, or -1.
const (
	wireHead   = 8   // top, right, bottom, left inset; 1 for dark; the clock in ms; 1 for a store that changed; one unused
	wireWidth  = 14  // numbers an event
	wireEvents = 512 // most events at once
	wireBytes  = 8 * (wireHead + wireWidth*wireEvents)
)

// Kinds of event beyond those of ui, which keep their numbers.
const (
	wireFile    = 100 // text id: name; value: index of the file's bytes, or -1 and the text why not
	wireLink    = 101 // text: the fragment
	wireNotice  = 102 // text
	wireFailure = 103 // text
	wirePaste   = 104 // text, from the clipboard; value: -1 and the text why not
)

// wire decodes the queue; its buffer is reused.
type wire struct {
	buf [wireBytes]byte
}

func (w *wire) number(i int) float64 {
	v := math.Float64frombits(binary.LittleEndian.Uint64(w.buf[8*i:]))
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return 0
	}
	return v
}

// whole is a number as an int; what does not fit is 0.
func whole(v float64) int {
	if math.Abs(v) > 1<<31 {
		return 0
	}
	return int(v)
}

func moment(ms float64) time.Duration {
	return time.Duration(math.Max(0, math.Min(ms, 1e12)) * float64(time.Millisecond))
}

// decode fills in with the head and count events. Texts and files are looked up by the functions, which give "" and
// nil for what does not exist. Events of a kind that nobody knows are dropped.
func (w *wire) decode(in *app.Input, count int, text func(int) string, file func(int) []byte) {
	in.Top, in.Right, in.Bottom, in.Left = w.number(0), w.number(1), w.number(2), w.number(3)
	in.PrefersDark = w.number(4) == 1
	in.Now = moment(w.number(5))
	in.StoreChanged = w.number(6) == 1
	in.Events, in.Opened, in.Notices, in.Failures = in.Events[:0], in.Opened[:0], in.Notices[:0], in.Failures[:0]
	count = max(0, min(count, wireEvents))
	for i := range count {
		at := wireHead + i*wireWidth
		id, said := whole(w.number(at+12)), whole(w.number(at+13))
		kind := whole(w.number(at))
		switch kind {
		case wireFile:
			opened := app.Opened{Name: text(id)}
			if index := whole(w.number(at + 10)); index >= 0 {
				opened.Data = file(index)
			} else {
				opened.Err = text(said)
			}
			in.Opened = append(in.Opened, opened)
		case wirePaste:
			opened := app.Opened{Pasted: true}
			if w.number(at+10) < 0 {
				opened.Err = text(said)
			} else {
				opened.Text = text(said)
			}
			in.Opened = append(in.Opened, opened)
		case wireLink:
			in.Opened = append(in.Opened, app.Opened{Link: text(said)})
		case wireNotice:
			in.Notices = append(in.Notices, text(said))
		case wireFailure:
			in.Failures = append(in.Failures, text(said))
		default:
			if kind < int(ui.PointerDown) || kind > int(ui.SetText) {
				continue
			}
			e := ui.Event{
				Kind:    ui.EventKind(kind),
				Pointer: whole(w.number(at + 1)),
				Touch:   w.number(at+2) == 1,
				X:       w.number(at + 3), Y: w.number(at + 4),
				DX: w.number(at + 5), DY: w.number(at + 6),
				Shift: w.number(at+9) == 1,
				Value: w.number(at + 10),
				Time:  moment(w.number(at + 11)),
				ID:    text(id),
				Text:  text(said),
			}
			if key := whole(w.number(at + 7)); key >= 0 && key <= int(ui.KeySave) {
				e.Key = ui.Key(key)
			}
			if r := whole(w.number(at + 8)); r > 0 && r <= 0x10FFFF {
				e.Rune = rune(r)
			}
			in.Events = append(in.Events, e)
		}
	}
}
