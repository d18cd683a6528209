package app

import (
	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf/casefile/figure"
	"levelspan/perf/casefile/report"
)

var (
	dayTheme   = ui.Day()
	nightTheme = ui.Night()
)

func (a *App) unitsNow() figure.Units { return figure.Of(a.doc.current) }

// toEdges is a ground stretched over the insets that it touches, to the edges of the window.
func (a *App) toEdges(r scene.Rect) scene.Rect {
	s, w := a.layout.safe, a.layout.window
	if r.X <= s.X {
		r.W, r.X = r.W+r.X, 0
	}
	if r.X+r.W >= s.X+s.W-0.5 {
		r.W = w.W - r.X
	}
	if r.Y+r.H >= s.Y+s.H-0.5 {
		r.H = w.H - r.Y
	}
	return r
}

// draw draws the whole picture anew.
func (a *App) draw() {
	w := &a.window
	a.layout = layoutFor(w.width, w.height, w.top, w.right, w.bottom, w.left)
	theme := dayTheme
	if a.view.night {
		theme = nightTheme
	}
	a.scene.Reset(w.width, w.height, w.scale, theme.Background)
	f := &a.frame
	f.Begin(&a.scene, theme, &a.router)
	s := &a.solved
	a.report = report.Report{Case: a.doc.current, Aeroplane: s.aero, Condition: s.cond, Answer: s.answer, Units: a.units}
	a.limitRows()
	a.factLines()
	a.mirror.Summary = a.summary()
	a.mirror.Warnings = a.cautions()
	a.drawHeader(f)
	switch a.view.screen {
	case screenAeroplane:
		a.drawAeroplane(f)
	default:
		a.drawChart(f)
	}
	a.drawNotice(f)
	a.drawOverlay(f)
}
