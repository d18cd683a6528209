package app

import (
	"math"
	"strings"
	"testing"

	"levelspan/game/ui"
	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/report"
)

// solvedApart is a case's estimated aeroplane, its day and their answer, made apart from the program and without intervals.
func solvedApart(t testing.TB, c *casefile.Case) (aero perf.Aeroplane, cond perf.Condition, answer perf.Answer) {
	t.Helper()
	_, cond, err := c.Model()
	if err != nil {
		t.Fatal(err)
	}
	f, err := report.NewFit(c)
	if err != nil {
		t.Fatal(err)
	}
	f.Posterior.Aeroplane(&aero)
	var solver perf.Solver
	if err := solver.Solve(&aero, &cond, &answer); err != nil {
		t.Fatal(err)
	}
	return aero, cond, answer
}

// sameAsSolve compares the mirror with a solve of the same case made directly.
func (p *pilot) sameAsSolve() {
	p.t.Helper()
	_, _, want := solvedApart(p.t, p.app.Case())
	got := map[string]MirrorRow{}
	for _, r := range p.app.Mirror().Rows {
		got[r.Key] = r
	}
	for k := perf.Key(0); k < perf.KeyCount; k++ {
		l := &want.Limits[k]
		r, shown := got[k.String()]
		if shown != l.Applies {
			p.t.Fatalf("%v: shown %v, applies %v", k, shown, l.Applies)
		}
		if !shown {
			continue
		}
		for _, d := range [...]float64{r.TASMps - float64(l.TAS), r.CASMps - float64(l.CAS), r.IASMps - float64(l.IAS)} {
			if !(math.Abs(d) <= 1e-9*float64(l.TAS)) {
				p.t.Fatalf("%v: the mirror is %g m/s away from the solve", k, d)
			}
		}
	}
}

// dragBy presses a handle, moves the finger in steps and lets go; each is told of every frame.
func (p *pilot) dragBy(finger int, id string, dx, dy float64, steps int, each func()) {
	p.t.Helper()
	x, y := middle(p.control(id).Bounds)
	p.event(ui.Event{Kind: ui.PointerDown, Pointer: finger, Touch: true, X: x, Y: y})
	for i := 1; i <= steps; i++ {
		k := float64(i) / float64(steps)
		p.event(ui.Event{Kind: ui.PointerMove, Pointer: finger, Touch: true, X: x + k*dx, Y: y + k*dy})
		each()
	}
	p.event(ui.Event{Kind: ui.PointerUp, Pointer: finger, Touch: true, X: x + dx, Y: y + dy})
	each()
}

func TestDragMassFollowsTheFinger(t *testing.T) {
	p := newPilot(t, 1280, 800)
	before := p.app.Case().Today.MassKg
	masses := map[float64]bool{}
	p.dragBy(1, handleMass, -160, 5, 40, func() {
		p.sameAsSolve()
		masses[p.app.Case().Today.MassKg] = true
	})
	after := p.app.Case().Today.MassKg
	if !(after < before-60) {
		t.Errorf("mass went from %g to %g", before, after)
	}
	if len(masses) < 30 {
		t.Errorf("only %d different masses in 40 moves", len(masses))
	}
	if after != math.Round(after) {
		t.Errorf("a dragged mass of %g is not the figure shown", after)
	}
	if got := len(p.app.doc.past); got != 1 {
		t.Errorf("a drag made %d steps of the history", got)
	}
	p.key(ui.KeyUndo)
	if got := p.app.Case().Today.MassKg; got != before {
		t.Errorf("undo gives %g, want %g", got, before)
	}
	p.key(ui.KeyRedo)
	if got := p.app.Case().Today.MassKg; got != after {
		t.Errorf("redo gives %g, want %g", got, after)
	}
	p.sameAsSolve()
}

func TestDragAltitudeHoldsTheDay(t *testing.T) {
	p := newPilot(t, 800, 1280)
	deviation := func() float64 {
		air, err := airOf(p.app.Case())
		if err != nil {
			t.Fatal(err)
		}
		standard, err := perf.AirAtDensityAltitude(air.PressureAltitude)
		if err != nil {
			t.Fatal(err)
		}
		return air.Temperature - standard.Temperature
	}
	before, file := deviation(), p.file()
	highest := 0.0
	p.dragBy(3, handleAltitude, -7, -120, 25, func() {
		p.sameAsSolve()
		if d := deviation() - before; math.Abs(d) > 1e-9 {
			t.Fatalf("the deviation from the standard temperature moved by %g K", d)
		}
		air, _ := airOf(p.app.Case())
		highest = math.Max(highest, air.DensityAltitude)
	})
	air, _ := airOf(p.app.Case())
	if feet := air.DensityAltitude / perf.Foot; highest < 8000*perf.Foot || math.Abs(feet-100*math.Round(feet/100)) > 1e-6 {
		t.Errorf("dragged to a density altitude of %g ft", feet)
	}
	if got := p.control(handleAltitude).Value; math.Abs(got-air.DensityAltitude) > 1e-6 {
		t.Errorf("the slider says %g m, the air is at %g m", got, air.DensityAltitude)
	}
	p.tap("undo")
	if p.file() != file {
		t.Error("undo does not give the day back")
	}
}

func TestScalesStayUnderTheFinger(t *testing.T) {
	p := newPilot(t, 1280, 800)
	x, y, ranges := p.app.chart.x, p.app.chart.y, p.app.ranges
	still := func() {
		if p.app.chart.x != x || p.app.chart.y != y || p.app.ranges.altitude != ranges.altitude || p.app.ranges.mass != ranges.mass {
			t.Fatal("a scale moved during a drag")
		}
	}
	p.dragBy(1, handleAltitude, 0, -250, 30, still)
	p.dragBy(1, handleMass, -400, 0, 30, still)
	p.dragBy(1, handleMass, 900, 0, 30, still)
}

func TestHandleStaysUnderTheFinger(t *testing.T) {
	p := newPilot(t, 1280, 800)
	x, y := middle(p.control(handleMass).Bounds)
	p.down(1, x+6, y)
	p.move(1, x-60, y)
	start, _ := middle(p.control(handleMass).Bounds)
	p.move(1, x-160, y)
	end, _ := middle(p.control(handleMass).Bounds)
	if d := (start - end) - 100; math.Abs(d) > 2.5 { // a whole kilogram is about two pixels
		t.Errorf("the finger moved 100 px, the handle %g", start-end)
	}
	p.up(1, x-160, y)
}

func TestManyMovesSolveOnce(t *testing.T) {
	p := newPilot(t, 1280, 800)
	x, y := middle(p.control(handleMass).Bounds)
	p.down(1, x, y)
	before := p.app.Solves()
	var events []ui.Event
	for i := 0; i < 20; i++ {
		events = append(events, ui.Event{Kind: ui.PointerMove, Pointer: 1, Touch: true, X: x - 20 - float64(i), Y: y, Time: p.in.Now})
	}
	in := p.in
	in.Events = events
	if !p.app.Step(in) {
		t.Fatal("Step did nothing")
	}
	if got := p.app.Solves() - before; got != 1 {
		t.Errorf("20 moves in one Step took %d solves", got)
	}
	p.up(1, x-40, y)
}

func TestIdleStepDoesNothing(t *testing.T) {
	p := newPilot(t, 1280, 800)
	solves := p.app.Solves()
	for i := 0; i < 100; i++ {
		if p.step() {
			t.Fatal("a Step without events changed something")
		}
	}
	if p.app.Wake() >= 0 {
		t.Errorf("Wake is %v with nothing to do", p.app.Wake())
	}
	p.event(ui.Event{Kind: ui.PointerMove, Pointer: 1, X: 300, Y: 300}) // a mouse passes over
	if p.step() || p.app.Solves() != solves {
		t.Error("a passing mouse made work")
	}
	if n := testing.AllocsPerRun(100, func() { p.app.Step(p.in) }); n != 0 {
		t.Errorf("an idle Step allocates %v times", n)
	}
	p.tap("speed-kind/TAS")
	if p.app.Solves() > solves+1 {
		t.Errorf("a change of view took %d solves", p.app.Solves()-solves)
	}
}

func TestDoubleTapTypesAnExactWeight(t *testing.T) {
	for _, open := range []struct {
		name string
		do   func(p *pilot)
	}{
		{"double tap", func(p *pilot) { p.doubleTap(handleMass) }},
		{"enter", func(p *pilot) {
			p.event(ui.Event{Kind: ui.FocusOn, ID: handleMass})
			p.event(ui.Event{Kind: ui.KeyDown, ID: handleMass, Key: ui.KeyEnter})
		}},
	} {
		p := newPilot(t, 390, 844)
		open.do(p)
		if p.find("key/ok") == nil {
			t.Fatalf("%s: no keypad", open.name)
		}
		p.typeIn("723.4")
		if got := p.app.Case().Today.MassKg; got != 723.4 {
			t.Errorf("%s: mass is %g", open.name, got)
		}
		if p.find("key/ok") != nil {
			t.Errorf("%s: the keypad stays open", open.name)
		}
		p.sameAsSolve()
		if p.app.doc.nextUndo() != "weight" {
			t.Errorf("%s: the step is called %q", open.name, p.app.doc.nextUndo())
		}
	}
}

func TestKeypadOfTheAltitudeHandleHoldsTheDay(t *testing.T) {
	p := newPilot(t, 1280, 800)
	old := p.app.Case().Today
	p.doubleTap(handleAltitude)
	p.typeIn("8125")
	air, err := airOf(p.app.Case())
	if err != nil {
		t.Fatal(err)
	}
	if got := air.DensityAltitude / perf.Foot; math.Abs(got-8125) > 1e-6 {
		t.Errorf("density altitude is %g ft", got)
	}
	if now := p.app.Case().Today; !(now.OutsideAirTemperatureC < old.OutsideAirTemperatureC && now.OutsideAirTemperatureC > old.OutsideAirTemperatureC-8) {
		t.Errorf("temperature went from %g to %g °C", old.OutsideAirTemperatureC, now.OutsideAirTemperatureC)
	}
	if p.app.Case().Today.AirFrom != old.AirFrom {
		t.Error("the way of entry changed")
	}
}

func TestKeypadCancelAndKeyboard(t *testing.T) {
	p := newPilot(t, 1280, 800)
	file := p.file()
	p.doubleTap(handleMass)
	p.tap("key/7")
	p.tap("key/cancel")
	if p.file() != file || p.find("key/ok") != nil {
		t.Error("cancel changes something")
	}
	p.doubleTap(handleMass)
	for _, r := range "650" {
		p.event(ui.Event{Kind: ui.KeyDown, Rune: r})
	}
	p.key(ui.KeyEnter)
	if got := p.app.Case().Today.MassKg; got != 650 {
		t.Errorf("typed 650, got %g", got)
	}
	p.doubleTap(handleMass)
	p.key(ui.KeyEscape)
	if p.find("key/ok") != nil {
		t.Error("escape leaves the keypad open")
	}
}

func TestTwoFingersOnTwoHandles(t *testing.T) {
	p := newPilot(t, 1280, 800)
	old := p.app.Case().Today
	mx, my := middle(p.control(handleMass).Bounds)
	ax, ay := middle(p.control(handleAltitude).Bounds)
	p.down(1, mx, my)
	p.down(2, ax, ay)
	for i := 1; i <= 10; i++ {
		p.move(1, mx-float64(8*i), my)
		p.sameAsSolve()
		p.move(2, ax, ay-float64(6*i))
		p.sameAsSolve()
	}
	both := p.app.Case().Today
	if !(both.MassKg < old.MassKg-20 && both.PressureAltitudeM > old.PressureAltitudeM+300) {
		t.Fatalf("two fingers moved mass to %g kg, height to %g m", both.MassKg, both.PressureAltitudeM)
	}
	p.up(1, mx-80, my)
	p.event(ui.Event{Kind: ui.PointerCancel, Pointer: 2, Touch: true})
	end := p.app.Case().Today
	if end.MassKg != both.MassKg || end.PressureAltitudeM != old.PressureAltitudeM || end.OutsideAirTemperatureC != old.OutsideAirTemperatureC {
		t.Errorf("after lifting one and cancelling the other: %+v", end)
	}
	if n := len(p.app.doc.past); n != 1 {
		t.Errorf("the gesture made %d steps", n)
	}
	p.sameAsSolve()
}

func TestCancelledDragLeavesNoStep(t *testing.T) {
	p := newPilot(t, 1280, 800)
	file := p.file()
	x, y := middle(p.control(handleMass).Bounds)
	p.down(1, x, y)
	p.move(1, x-100, y)
	if p.file() == file {
		t.Fatal("the drag moved nothing")
	}
	p.event(ui.Event{Kind: ui.PointerCancel, Pointer: 1, Touch: true})
	if p.file() != file || p.app.doc.nextUndo() != "" {
		t.Error("a cancelled drag left something behind")
	}
}

func TestArrowKeysMakeOneStep(t *testing.T) {
	p := newPilot(t, 1280, 800)
	before := p.app.Case().Today.MassKg
	p.event(ui.Event{Kind: ui.FocusOn, ID: handleMass})
	for i := 0; i < 5; i++ {
		p.event(ui.Event{Kind: ui.KeyDown, ID: handleMass, Key: ui.KeyLeft})
		p.sameAsSolve()
	}
	p.event(ui.Event{Kind: ui.KeyDown, ID: handleMass, Key: ui.KeyPageDown})
	if got := p.app.Case().Today.MassKg; got != before-15 {
		t.Errorf("five arrows and a page give %g, want %g", got, before-15)
	}
	if n := len(p.app.doc.past); n != 1 {
		t.Errorf("%d steps", n)
	}
	p.key(ui.KeyUndo)
	if got := p.app.Case().Today.MassKg; got != before {
		t.Errorf("undo gives %g, want %g", got, before)
	}
}

func TestSpeedKindSwitchesAxisAndPanel(t *testing.T) {
	p := newPilot(t, 1280, 800)
	for _, kind := range []string{"IAS", "TAS", "CAS"} {
		p.tap("speed-kind/" + kind)
		if !p.says("kt " + kind) {
			t.Errorf("%s: the axis does not say so", kind)
		}
		r := p.row("fastest_level")
		want := map[string]float64{"IAS": r.IASMps, "CAS": r.CASMps, "TAS": r.TASMps}[kind]
		c := p.control("limit/fastest_level")
		if c.Value != want {
			t.Errorf("%s: the panel has %g, want %g", kind, c.Value, want)
		}
		if got := p.app.units.SpeedWhole(want).Number; r.ValueText != got {
			t.Errorf("%s: shown %q, want %q", kind, r.ValueText, got)
		}
		p.sameAsSolve()
	}
}

func TestMarkingWorksBothWays(t *testing.T) {
	p := newPilot(t, 1280, 800)
	p.tap("limit/best_glide")
	if !p.row("best_glide").Selected || !p.control("limit/best_glide").Selected {
		t.Fatal("a tapped row is not marked")
	}
	p.tap("limit/best_glide")
	// A tap beside the slowest mark selects it; further taps there go on to what else is near, and come to an end.
	x, y := p.app.chart.x.Pos(p.row("stall").CASMps)-20, p.app.layout.plot.Y+60
	seen := map[string]bool{}
	for range 12 {
		p.in.Now += 1e9
		p.tapAt(x, y)
		marked := ""
		for _, r := range p.app.Mirror().Rows {
			if r.Selected {
				marked = r.Key
				if at := p.app.chart.x.Pos(r.CASMps); math.Abs(at-x) > 32 {
					t.Errorf("a tap at %g px marked %s at %g px", x, r.Key, at)
				}
			}
		}
		if marked == "" {
			break
		}
		if seen[marked] {
			t.Fatalf("%s was marked twice", marked)
		}
		seen[marked] = true
	}
	if !seen["stall"] || !seen["slowest_level"] {
		t.Errorf("taps beside the stall marked only %v", seen)
	}
	p.tap("limit/never_exceed")
	if !p.row("never_exceed").Selected || p.row("best_glide").Selected {
		t.Error("another row does not take over")
	}
	p.in.Now += 1e9
	r := p.app.layout.plot
	p.tapAt(r.X+4, r.Y+r.H-6)
	if p.row("never_exceed").Selected {
		t.Error("a tap on nothing leaves the mark")
	}
}

func TestNoLevelFlightSaysWhatIsMissing(t *testing.T) {
	p := newPilot(t, 1280, 800)
	p.setSlider(handleMass, 830)
	p.setSlider(handleAltitude, 6200)
	ans := &p.app.solved.answer
	if ans.Outcome == perf.LevelFlight {
		t.Skip("the demo still flies here")
	}
	for _, want := range []string{"No level flight", p.app.units.PowerFine(ans.Shortfall).Number, p.app.units.MassWhole(ans.Level.Mass).Number, "required", "available"} {
		if !p.says(want) {
			t.Errorf("the chart does not say %q", want)
		}
	}
	if m := p.app.Mirror(); len(m.Warnings) == 0 || m.Summary == "" {
		t.Error("the mirror does not warn")
	}
	p.sameAsSolve()
}

func TestUnitsChangeWhatIsShownOnly(t *testing.T) {
	p := newPilot(t, 1280, 800)
	before := p.row("fastest_level")
	p.tap("menu")
	for _, id := range []string{"unit/speed/mph", "unit/altitude/m", "unit/mass/lb", "unit/power/hp", "unit/fuel/US gal", "unit/length/ft"} {
		p.tap(id)
	}
	p.key(ui.KeyEscape)
	after := p.row("fastest_level")
	if after.CASMps != before.CASMps {
		t.Error("a unit changes a speed")
	}
	for _, want := range []string{"mph CAS", "Power, hp", "Density altitude, m", "lb"} {
		if !p.says(want) {
			t.Errorf("nothing says %q", want)
		}
	}
	for i := 0; i < 6; i++ {
		p.key(ui.KeyUndo)
	}
	if p.row("fastest_level").ValueText != before.ValueText || p.app.doc.nextUndo() != "" {
		t.Error("six undos do not take six units back")
	}
}

func TestBothEndsOfTheBandAreNamed(t *testing.T) {
	for _, w := range windows {
		p := newPilotIn(t, w)
		for _, at := range [][2]float64{{480, 0}, {760, 1200}, {800, 3500}, {800, 4900}, {800, 5200}} {
			p.setSlider(handleMass, at[0])
			p.setSlider(handleAltitude, at[1])
			p.in.Now += noticeTime
			p.step()
			if p.app.solved.answer.Outcome != perf.LevelFlight {
				continue
			}
			said := map[string]bool{}
			for _, x := range texts(p.app.Scene(), 0) {
				if b := p.app.layout.band; x.box.Y > b.Y-4 && x.box.Y < b.Y+b.H && x.box.X > b.X-60 && x.box.X < b.X+b.W {
					said[x.text] = true
				}
			}
			for _, k := range []perf.Key{perf.SlowestLevel, perf.FastestLevel} {
				if name := p.app.report.SetBy(k); !said[name] {
					t.Errorf("%gx%g at %g kg, %g m: the band does not say %q: %v", w.Width, w.Height, at[0], at[1], name, said)
				}
			}
		}
	}
}

func TestRowsAreInOrderOfSpeed(t *testing.T) {
	p := newPilot(t, 1280, 800)
	for _, mass := range []float64{500, 650, 800} {
		p.setSlider(handleMass, mass)
		last := 0.0
		for _, r := range p.app.Mirror().Rows {
			if r.CASMps < last {
				t.Errorf("at %g kg %s stands above a slower one", mass, r.Key)
			}
			last = r.CASMps
		}
	}
}

func TestStallInBankIsTheStallOfThatBank(t *testing.T) {
	p := newPilot(t, 1280, 800)
	for _, bank := range []float64{0, 20, 50} {
		c := p.app.Case().Clone()
		c.Today.BankDeg = bank
		p.step(Opened{Data: c.Marshal()})
		at := 45.0
		if bank > 44 {
			at = 60
		}
		aero, cond, _ := solvedApart(t, c)
		cond.Bank = at * perf.Degree
		var solver perf.Solver
		var want perf.Answer
		if err := solver.Solve(&aero, &cond, &want); err != nil {
			t.Fatal(err)
		}
		got := float64(want.Limits[perf.Stall].CAS)
		if text := p.app.units.SpeedWhole(got).Number; !strings.HasSuffix(p.row("stall").SecondText, "bank "+text) {
			t.Errorf("flown at %g°: the row says %q, not %s", bank, p.row("stall").SecondText, text)
		}
	}
}
