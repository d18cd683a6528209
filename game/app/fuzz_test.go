package app

import (
	"math"
	"testing"
	"time"

	"levelspan/game/ui"
	"levelspan/perf"
)

// session feeds a program the frames that bytes spell, and checks after each that it is sound.
type session struct {
	t    *testing.T
	app  *App
	in   Input
	data []byte
}

func (s *session) byte() int {
	if len(s.data) == 0 {
		return 0
	}
	b := s.data[0]
	s.data = s.data[1:]
	return int(b)
}

// place is somewhere in the window, or a little outside; mostly on a control.
func (s *session) place() (x, y float64) {
	controls := s.app.Controls()
	if n := s.byte(); n < 230 && len(controls) > 0 {
		c := controls[n%len(controls)]
		return c.Hit.X + c.Hit.W/2, c.Hit.Y + c.Hit.H/2
	}
	return (float64(s.byte())/240 - 0.03) * s.in.Width, (float64(s.byte())/240 - 0.03) * s.in.Height
}

func (s *session) id() string {
	controls := s.app.Controls()
	if len(controls) == 0 {
		return ""
	}
	return controls[s.byte()%len(controls)].ID
}

var fuzzTexts = []string{"", "clean", "Ærø 12", "<b>&amp;</b>", "\x00\n\t", "a very long name that does not fit anywhere at all, whatever the window", "\xff\xfe"}

func (s *session) event() ui.Event {
	e := ui.Event{Kind: ui.EventKind(s.byte() % int(ui.SetText+1)), Pointer: s.byte() % 3, Touch: true, Time: s.in.Now}
	switch e.Kind {
	case ui.PointerDown, ui.PointerMove, ui.PointerUp:
		e.X, e.Y = s.place()
	case ui.Wheel:
		e.X, e.Y = s.place()
		e.DY = float64(s.byte()-128) * 4
	case ui.KeyDown:
		e.Key = ui.Key(s.byte() % int(ui.KeySave+1))
		if e.Key == ui.KeyNone {
			e.Rune = rune(s.byte())
		}
		e.Shift = s.byte()%2 == 1
	case ui.SetValue:
		e.ID = s.id()
		e.Value = []float64{-1e300, -5000, 0, 480, 700, 3000, 1e9, math.NaN(), math.Inf(1)}[s.byte()%9]
	case ui.SetText:
		e.ID = s.id()
		e.Text = fuzzTexts[s.byte()%len(fuzzTexts)]
	default:
		e.ID = s.id()
	}
	return e
}

func (s *session) sound() {
	s.t.Helper()
	if err := s.app.Case().Validate(); err != nil {
		s.t.Fatalf("the case is unsound: %v", err)
	}
	for _, r := range s.app.Mirror().Rows {
		for _, v := range [...]float64{r.TASMps, r.CASMps, r.IASMps} {
			if !(v > 0 && v < 2000) {
				s.t.Fatalf("%s: %g m/s", r.Key, v)
			}
		}
	}
	for _, f := range s.app.Mirror().Facts {
		if math.IsNaN(f.Value) || math.IsInf(f.Value, 0) {
			s.t.Fatalf("%s: %g", f.Key, f.Value)
		}
	}
	for _, p := range s.app.Scene().Points {
		if math.IsNaN(p.X+p.Y) || math.IsInf(p.X+p.Y, 0) {
			s.t.Fatalf("a point of the picture is %v", p)
		}
	}
}

func (s *session) run() {
	sizes := windows
	s.in = sizes[s.byte()%len(sizes)]
	s.in.Scale = 1
	s.app.Step(s.in)
	good := append([]byte(nil), s.app.Case().Marshal()...)
	for n := 0; len(s.data) > 0 && n < 400; n++ {
		s.in.Now += time.Duration(s.byte()) * 4 * time.Millisecond
		in := s.in
		switch what := s.byte(); {
		case what < 4:
			w := sizes[s.byte()%len(sizes)]
			s.in.Width, s.in.Height = w.Width, w.Height
			in = s.in
		case what < 6:
			in.Opened = []Opened{{Data: good}, {Data: good[:s.byte()]}, {Link: "#case=AAAA"}, {Err: "no"}}[s.byte()%4:][:1]
		case what == 6:
			in.Notices = []string{"copied"}
		case what == 7:
			in.Failures = []string{"disk full"}
		default:
			for k := what % 4; k >= 0; k-- {
				in.Events = append(in.Events, s.event())
			}
		}
		s.app.Step(in)
		s.sound()
	}
	// With every finger up nothing is stuck: no drag is open, and what is shown is committed.
	s.in.Now += time.Second
	in := s.in
	for finger := 0; finger < 3; finger++ {
		in.Events = append(in.Events, ui.Event{Kind: ui.PointerCancel, Pointer: finger, Touch: true, Time: s.in.Now})
	}
	s.app.Step(in)
	s.sound()
	if s.app.drags[0].active || s.app.drags[1].active || s.app.doc.current != s.app.doc.committed {
		s.t.Fatal("a drag is stuck")
	}
	_, _, want := solvedApart(s.t, s.app.Case())
	if got := s.app.solved.answer.Limits[perf.Stall].TAS; math.Abs(float64(got-want.Limits[perf.Stall].TAS)) > 1e-9 {
		s.t.Fatalf("the stall shown is %g, the case's is %g", got, want.Limits[perf.Stall].TAS)
	}
}

func FuzzSession(f *testing.F) {
	f.Add([]byte{0, 4, 9, 0, 1, 3, 4, 10, 1, 1, 200, 4, 10, 1, 1, 250, 30, 40, 4, 10, 2, 1, 250, 30, 40})
	f.Add([]byte{2, 4, 9, 7, 0, 3, 4, 9, 7, 0, 9, 4, 9, 7, 0, 40, 4, 5, 1, 1})
	f.Add([]byte{4, 1, 8, 9, 0, 5, 3, 2, 8, 9, 0, 5, 200, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 14, 15, 16, 17, 18, 19, 20})
	f.Fuzz(func(t *testing.T, data []byte) {
		s := session{t: t, app: New(&testHost{}, nil), data: data}
		s.run()
	})
}
