package ui

import (
	"math"
	"math/rand/v2"
	"testing"
	"time"
)

// script makes events, and the screens that they meet, from bytes.
type script struct {
	data []byte
	now  time.Duration
}

func (s *script) next() byte {
	if len(s.data) == 0 {
		return 0
	}
	b := s.data[0]
	s.data = s.data[1:]
	return b
}

func (s *script) event() Event {
	s.now += time.Duration(s.next()) * ms
	ids := [...]string{"", "undo", "handle/mass", "handle/alt", "list", "row/a", "tab/chart", "kind/CAS", "field/name", "dead", "ok", "nothing"}
	odd := [...]float64{0, math.NaN(), math.Inf(1), math.Inf(-1), -1e300, 1e300, 1e9, -0.0}
	b := s.next()
	e := Event{Kind: EventKind(b % 10), Pointer: int(b>>4) % 4, Touch: b&8 != 0, Time: s.now,
		X: float64(s.next()) * 3, Y: float64(s.next()) * 2}
	more := s.next()
	e.DX, e.DY, e.Value = float64(more)-128, float64(more>>1)-64, float64(more)*8
	e.Key, e.Rune, e.Shift = Key(more%19), rune(more), more&1 == 1
	e.ID = ids[int(s.next())%len(ids)]
	if more > 240 {
		e.X, e.Value, e.DY = odd[more%8], odd[more%8], odd[more%8]
	}
	return e
}

// run feeds frames made from bytes to a router and checks what must always hold.
func run(t *testing.T, data []byte) {
	s := script{data: data}
	var r Router
	open := map[string]bool{}
	var seen []Control
	check := func(actions []Action, controls []Control) {
		for _, a := range actions {
			if !finite(a.X, a.Y, a.X0, a.Y0, a.DX, a.DY, a.Value) {
				t.Fatalf("not finite: %+v", a)
			}
			switch a.Kind {
			case DragStart:
				if open[a.ID] {
					t.Fatalf("%s dragged twice", a.ID)
				}
				open[a.ID] = true
			case DragMove:
				if !open[a.ID] {
					t.Fatalf("%s moved without a start", a.ID)
				}
			case DragEnd, DragCancel:
				if !open[a.ID] {
					t.Fatalf("%s ended without a start", a.ID)
				}
				delete(open, a.ID)
			case Tap, DoubleTap, Slide, Scroll, Type:
				if c := find(controls, a.ID); !usable(c, topLayer(controls)) {
					t.Fatalf("%s %s, which takes no input", kindNames[a.Kind], a.ID)
				}
			}
		}
	}
	for len(s.data) > 0 {
		shape := s.next()
		controls := board()
		if shape&1 != 0 {
			ok := ctl("ok", RoleButton, 410, 110, 60, 60)
			ok.Modal = 1 + int(shape>>1)%12
			controls = append(controls, ok)
		}
		if shape&32 != 0 {
			controls = controls[:int(shape)%len(controls)]
		}
		var events []Event
		for n := int(shape>>6) + 1; n > 0; n-- {
			events = append(events, s.event())
		}
		check(r.Route(nil, events, controls, s.now), controls)
		seen = controls
	}
	var ups []Event
	for p := 0; p < 4; p++ {
		ups = append(ups, Event{Kind: PointerUp, Pointer: p, Time: s.now})
	}
	check(r.Route(nil, ups, seen, s.now), seen)
	if id := r.Pressed(); id != "" {
		t.Fatalf("%s stays pressed", id)
	}
	if len(open) != 0 {
		t.Fatalf("drags never ended: %v", open)
	}
	for range 100 {
		s.now += 100 * ms
		r.Route(nil, nil, seen, s.now)
	}
	if r.Animating() {
		t.Fatal("coasts for ever")
	}
}

func FuzzRouter(f *testing.F) {
	f.Add([]byte{0, 1, 0, 166, 50, 0, 0, 0, 1, 1, 200, 50, 0, 0})
	f.Add([]byte{192, 5, 8, 166, 50, 0, 0, 9, 9, 200, 50, 3, 3, 9, 25, 200, 90, 0, 2, 33, 1, 1, 1, 1, 1, 1, 1})
	f.Add([]byte{1, 5, 8, 145, 65, 0, 0, 9, 10, 145, 65, 3, 3, 9, 24, 200, 250, 0, 2, 33, 241, 1, 255, 1, 255, 1, 1})
	f.Fuzz(func(t *testing.T, data []byte) {
		if len(data) < 4096 {
			run(t, data)
		}
	})
}

// The same on random lists of a fixed seed, so that every test run meets some thousand gestures.
func TestNoStuckState(t *testing.T) {
	rnd := rand.New(rand.NewPCG(7, 11))
	for range 2000 {
		data := make([]byte, 20+rnd.IntN(400))
		for i := range data {
			data[i] = byte(rnd.Uint32())
		}
		run(t, data)
	}
}

func FuzzKeypad(f *testing.F) {
	f.Add([]byte("760.5"), uint8(1), true)
	f.Add([]byte("-,,..00012345678901234567890"), uint8(9), true)
	f.Add([]byte("\x01\x02\x03--+−"), uint8(0), false)
	f.Fuzz(func(t *testing.T, data []byte, decimals uint8, signed bool) {
		var k Keypad
		k.Begin(KeypadConfig{Title: "x", Unit: "kg", Min: -5, Max: 900, Decimals: int(decimals), Signed: signed})
		taps := [...]string{"key/sign", "key/point", "key/backspace", "key/clear", "key/ok", "key/none", "key/entry", "key/", "key/x", "other"}
		for _, r := range string(data) {
			a := Action{Kind: Press, Rune: r}
			if int(r) < len(taps) {
				a = Action{Kind: Tap, ID: taps[r]}
			}
			result := k.Handle(a)
			v, ok := k.Value()
			if !finite(v) || ok && math.Signbit(v) && v == 0 {
				t.Fatalf("%q is %v", k.Entry(), v)
			}
			if result == KeypadDone && (!ok || v < -5 || v > 900) {
				t.Fatalf("%q accepted", k.Entry())
			}
			if !signed && v < 0 {
				t.Fatalf("%q is negative", k.Entry())
			}
			if n := len(k.Entry()); n > maxDigits+2 {
				t.Fatalf("%q is %d long", k.Entry(), n)
			}
			checkGrammar(t, k.Entry(), min(int(decimals), maxDigits-1))
		}
	})
}

// checkGrammar: an optional minus, digits without needless zeros, at most one point with at most so many digits after it.
func checkGrammar(t *testing.T, s string, decimals int) {
	t.Helper()
	if s != "" && s[0] == '-' {
		s = s[1:]
	}
	point, after := false, 0
	for i := range s {
		switch {
		case s[i] == '.' && !point && i > 0:
			point = true
		case s[i] >= '0' && s[i] <= '9':
			if point {
				after++
			}
		default:
			t.Fatalf("%q is no entry", s)
		}
	}
	if len(s) > 1 && s[0] == '0' && s[1] != '.' || after > decimals {
		t.Fatalf("%q with %d decimals", s, decimals)
	}
}

func FuzzWrap(f *testing.F) {
	f.Add("a few words\nand a line", 60.0)
	f.Add("\xff\xfe…é  ", 0.0)
	f.Fuzz(func(t *testing.T, text string, width float64) {
		if len(text) > 500 {
			return
		}
		checkWrap(t, text, width)
	})
}
