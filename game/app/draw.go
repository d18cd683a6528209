package app

import (
	"levelspan/game/ui"
	"levelspan/perf/casefile/figure"
)

var (
	dayTheme   = ui.Day()
	nightTheme = ui.Night()
)

func (a *App) unitsNow() figure.Units { return figure.Of(a.doc.current) }

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
	a.limitRows()
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
