package app

import (
	"math"
	"strings"

	"levelspan/game/ui"
	"levelspan/perf"
	"levelspan/perf/casefile"
)

// act carries out one action.
func (a *App) act(act *ui.Action) {
	if act.Kind == ui.Press && a.shortcut(act) {
		return
	}
	if a.view.overlay == overlayKeypad {
		a.actKeypad(act)
		return
	}
	switch act.Kind {
	case ui.Tap:
		a.tap(act)
	case ui.DoubleTap:
		if act.ID == handleAltitude || act.ID == handleMass {
			a.openHandlePad(act.ID)
		}
	case ui.DragStart, ui.DragMove, ui.DragEnd, ui.DragCancel:
		if act.ID == handleAltitude || act.ID == handleMass {
			a.dragHandle(act)
		}
	case ui.Slide:
		if act.ID == handleAltitude || act.ID == handleMass {
			a.slideHandle(act)
		}
	case ui.Scroll:
		a.scroll(act)
	case ui.Press:
		a.press(act)
	case ui.Type:
		a.typed(act)
	case ui.Focus:
		a.focused(act)
	}
}

// shortcut carries out the keys that work everywhere.
func (a *App) shortcut(act *ui.Action) bool {
	if a.view.overlay != overlayNone {
		return false
	}
	switch act.Key {
	case ui.KeyUndo:
		a.undo()
	case ui.KeyRedo:
		a.redo()
	case ui.KeyOpen:
		a.host.OpenFile()
	case ui.KeySave:
		a.save()
	default:
		return false
	}
	return true
}

// tap carries out a tap on a control of the screen, the menu or a dialog.
func (a *App) tap(act *ui.Action) {
	id := act.ID
	head, rest, _ := strings.Cut(id, "/")
	a.dirty = true
	switch head {
	case "tab":
		a.endText()
		a.view.screen = screenChart
		if rest == "aeroplane" {
			a.view.screen = screenAeroplane
		}
	case "speed-kind":
		a.editDisplay("kind of airspeed", func(d *casefile.Display) { d.SpeedKind = rest })
	case "unit":
		quantity, unit, _ := strings.Cut(rest, "/")
		a.setUnit(quantity, unit)
	case "limit":
		if k, ok := keyNamed(rest); ok {
			a.mark(k)
		}
	case "chart":
		a.tapChart(act)
	case "undo":
		a.undo()
	case "redo":
		a.redo()
	case "share":
		a.tapShare(rest)
	case "cases", "case", "removed":
		a.tapCases(act, head, rest)
	case "paste":
		a.tapPaste(rest)
	case "conflict":
		a.closeOverlay()
		if rest == "other" {
			a.takeOther()
		}
	case "open":
		a.closeOverlay()
		a.host.OpenFile()
	case "save":
		a.closeOverlay()
		a.save()
	case "menu":
		a.view.overlay = overlayMenu
		a.view.menu.Scroll = ui.Scroller{}
	case "cautions":
		a.openDialog("Cautions", true, append(append([]string(nil), a.mirror.Warnings...), a.standingCautions()...)...)
		if a.kept.trouble != nil {
			a.view.dialog.Buttons = append(a.view.dialog.Buttons, ui.Button{ID: "save", Text: "Save a file", Kind: ui.Framed}, ui.Button{ID: "share/text", Text: "Copy as text", Kind: ui.Framed})
		}
	case "about":
		a.openAbout()
	case "palette":
		a.view.night, a.view.palette = rest == "night", true
	case "dialog", "menu-list", "share-list", "sheet", "code":
		if rest != "" && rest != "text" { // not the text or list itself
			a.closeOverlay()
		}
	case "failure":
		if n := len(a.view.failures); n > 0 {
			a.view.failures = a.view.failures[:n-1]
		}
	default:
		a.tapForm(act, head, rest)
	}
}

// mark marks a limit on the chart and in the panel, or unmarks the one that is.
func (a *App) mark(k perf.Key) {
	if a.view.marked && a.view.selected == k {
		a.view.marked = false
	} else {
		a.view.marked, a.view.selected = true, k
	}
	a.dirty = true
}

// tapChart marks the limit nearest to where the plot was tapped, within a finger's width; a tap on the one that is marked goes
// on to the next nearest there, and after the last, or where nothing is near, nothing is marked.
func (a *App) tapChart(act *ui.Action) {
	const reach = 32.0
	var near [perf.KeyCount]perf.Key
	var far [perf.KeyCount]float64
	n := 0
	for k := perf.Key(0); k < perf.KeyCount; k++ {
		l := &a.solved.answer.Limits[k]
		if !l.Applies {
			continue
		}
		v := inKind(l, a.speedKind())
		d := math.Abs(a.chart.x.Pos(v) - act.X)
		if !(d < reach) {
			continue
		}
		i := n
		for ; i > 0 && far[i-1] > d; i-- {
			near[i], far[i] = near[i-1], far[i-1]
		}
		near[i], far[i] = k, d
		n++
	}
	next := 0
	for i := 0; i < n; i++ {
		if a.view.marked && near[i] == a.view.selected {
			next = i + 1
		}
	}
	if next == n {
		a.view.marked = false
		return
	}
	a.view.marked, a.view.selected = true, near[next]
	a.reveal(near[next])
}

// reveal scrolls the panel so that a limit's row is seen.
func (a *App) reveal(k perf.Key) {
	per := (len(a.rows) + a.layout.columns - 1) / max(1, a.layout.columns)
	for i := range a.rows {
		if a.rows[i].key == k && per > 0 {
			y := float64(i%per) * a.layout.row
			a.view.panel.Reveal(y, y+a.layout.row)
		}
	}
}

// takeSelection marks the limit that the case names.
func (a *App) takeSelection() {
	k, ok := keyNamed(a.doc.current.Display.Selected)
	a.view.marked, a.view.selected = ok, k
}

func (a *App) undo() {
	a.cancelDrags()
	a.endText()
	if what := a.doc.undo(); what != "" {
		a.notify("Undone: " + what)
	}
	a.units = a.unitsNow()
	a.dirty = true
}

func (a *App) redo() {
	a.cancelDrags()
	a.endText()
	if what := a.doc.redo(); what != "" {
		a.notify("Redone: " + what)
	}
	a.units = a.unitsNow()
	a.dirty = true
}

// editDisplay changes how figures are shown, as a step like any other.
func (a *App) editDisplay(what string, change func(d *casefile.Display)) {
	a.cancelDrags()
	if err := a.doc.edit(what, func(c *casefile.Case) error { change(&c.Display); return nil }); err != nil {
		a.notify(refusal(err, ""))
	}
	a.units = a.unitsNow()
	a.dirty = true
}

// setUnit chooses a unit from the menu.
func (a *App) setUnit(quantity, unit string) {
	a.editDisplay("unit of "+quantity, func(d *casefile.Display) {
		switch quantity {
		case "speed":
			if d.Speed = unit; unit == "kmh" { // the last stroke of an ID ends the name of its group
				d.Speed = "km/h"
			}
		case "altitude":
			d.Altitude = unit
		case "mass":
			d.Mass = unit
		case "power":
			d.Power = unit
		case "fuel":
			d.Fuel = unit
		case "length":
			d.Length = unit
		}
	})
}

// scroll moves a scrolled region.
func (a *App) scroll(act *ui.Action) {
	s := a.view.scroller(act.ID)
	if s == nil {
		return
	}
	if s.By(act.DY) {
		a.dirty = true
	} else {
		a.router.StopScroll()
	}
}

// scroller is the state of the scrolled region of that name, nil if there is none.
func (v *view) scroller(id string) *ui.Scroller {
	switch id {
	case "panel":
		return &v.panel
	case "form/aeroplane":
		return &v.forms[formAeroplane].Scroll
	case "form/today":
		return &v.forms[formToday].Scroll
	case "menu-list":
		return &v.menu.Scroll
	case "share-list":
		return &v.shareMenu.Scroll
	case "sheet":
		return &v.sheet.Scroll
	case "dialog/text":
		return &v.dialog.Scroll
	}
	return nil
}

// press takes the keys that no control took.
func (a *App) press(act *ui.Action) {
	if a.pressText(act) {
		return
	}
	if act.Key == ui.KeyEscape {
		switch {
		case a.view.overlay != overlayNone:
			a.closeOverlay()
		case a.drags[0].active || a.drags[1].active:
			a.cancelDrags()
		case a.view.marked:
			a.view.marked = false
		}
		a.dirty = true
	}
}

func (a *App) closeOverlay() {
	if a.view.overlay == overlayCases || a.view.overlay == overlayPaste {
		a.endText()
		a.view.cases.renaming = ""
	}
	a.view.overlay = overlayNone
	a.view.pad.Close()
	a.dirty = true
}
