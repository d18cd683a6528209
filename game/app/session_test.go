package app

import (
	"math"
	"testing"

	"levelspan/game/ui"
	"levelspan/perf"
)

// sameAsSolve compares the mirror with a solve of the same case made directly.
func (p *pilot) sameAsSolve() {
	p.t.Helper()
	aero, cond, err := p.app.Case().Model()
	if err != nil {
		p.t.Fatal(err)
	}
	var solver perf.Solver
	var want perf.Answer
	if err := solver.Solve(&aero, &cond, &want); err != nil {
		p.t.Fatal(err)
	}
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
