package app

import (
	"strings"

	"levelspan/game/ui"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
)

// pad is the keypad and what it asks for.
type pad struct {
	ui.Keypad
	target string // path of the field, or ID of the handle
}

// openHandlePad asks for an exact value of a handle.
func (a *App) openHandlePad(id string) {
	a.cancelDrags()
	if id == handleMass {
		a.openPad(pathMass, id)
		a.view.pad.Title = "Weight"
		return
	}
	a.openPad(pathDensityAltitude, id)
}

// openPad asks for the number at a path in the person's unit; target is the control it belongs to.
func (a *App) openPad(path, target string) {
	f := a.fields.of(path)
	if f == nil {
		return
	}
	a.endText()
	m := measureOf(f, a.units)
	title := capital(f.Name)
	if row := a.rowAt(path); row != nil {
		title = row.label
	}
	now := ""
	if v, set := a.numberNow(path); set {
		now = m.withUnit(v)
	}
	c := ui.KeypadConfig{ID: target, Title: title, Unit: m.unit, Now: now, Range: m.allowed(), Min: m.Min * m.k, Max: m.Max * m.k,
		Decimals: 6, Signed: m.Min < 0}
	if path == pathMass {
		a := &a.doc.current.Aeroplane
		c.Range += "; empty " + m.text(a.EmptyMassKg) + ", maximum " + m.text(a.MaximumMassKg)
	}
	if path == pathSetting {
		c.Range += "; below 35 counts as inHg"
	}
	if f.Kind == casefile.KindMaybe && target != handleAltitude {
		c.None = "No value"
		if f.Otherwise != "" {
			c.None = capital(f.Otherwise)
		}
	}
	c.Check = func(v float64) string { return a.checkNumber(path, target, v) }
	a.view.pad.Begin(c)
	a.view.pad.target = path
	a.view.overlay = overlayKeypad
	a.dirty = true
}

// numberNow is the number at a path in the file's unit, as the screen says it.
func (a *App) numberNow(path string) (float64, bool) {
	c := a.doc.current
	switch path {
	case pathDensityAltitude:
		air, err := airOf(c)
		return air.DensityAltitude, err == nil
	case pathTemperature:
		if c.Today.AirFrom == airFromField {
			return fieldTemperature(c), true
		}
	}
	return c.Number(path)
}

// fileNumber is what was typed, in the file's unit.
func (a *App) fileNumber(path string, typed float64) float64 {
	f := a.fields.of(path)
	if path == pathSetting && typed > 20 && typed < 35 {
		const hectopascalsPerInch = 33.86389 // conventional inch of mercury at 0 °C (NIST SP 811)
		return typed * hectopascalsPerInch
	}
	return measureOf(f, a.units).file(typed)
}

// checkNumber is why a typed number is refused, "" if it is allowed. Nothing changes.
func (a *App) checkNumber(path, target string, typed float64) string {
	f := a.fields.of(path)
	m := measureOf(f, a.units)
	v := a.fileNumber(path, typed)
	if v < f.Min || v > f.Max {
		if typed < m.Min*m.k {
			return "At least " + figure.Figure{Number: plain(m.Min*m.k, m.decimals), Unit: m.unit}.String()
		}
		return "At most " + figure.Figure{Number: plain(m.Max*m.k, m.decimals), Unit: m.unit}.String()
	}
	next := a.doc.committed.Clone()
	if err := a.put(next, path, target, v); err != nil {
		return refusal(err, path)
	}
	return refusal(next.Validate(), path)
}

// put sets a number as its control means it: the handle moves within the day, the field says what the day is.
func (a *App) put(c *casefile.Case, path, target string, v float64) error {
	if target == handleAltitude {
		air, err := airOf(c)
		if err != nil {
			return err
		}
		return moveToDensityAltitude(c, air, v)
	}
	return putNumber(c, path, v)
}

// actKeypad gives an action to the keypad and takes its result.
func (a *App) actKeypad(act *ui.Action) {
	p := &a.view.pad
	if act.Kind == ui.Tap && act.ID == "key/outside" {
		a.closeOverlay()
		return
	}
	result := p.Handle(*act)
	if result == ui.KeypadSame {
		return
	}
	a.dirty = true
	path, target := p.target, p.ID
	switch result {
	case ui.KeypadDone:
		typed, _ := p.Value()
		v := a.fileNumber(path, typed)
		err := a.doc.edit(strings.ToLower(p.Title), func(c *casefile.Case) error { return a.put(c, path, target, v) })
		if err != nil {
			return // Check has said why
		}
		a.closeOverlay()
	case ui.KeypadNone:
		err := a.doc.edit(strings.ToLower(p.Title), func(c *casefile.Case) error { return clearNumber(c, path) })
		a.closeOverlay()
		if err != nil {
			a.refuse(path, refusal(err, path))
		}
	case ui.KeypadCancelled:
		a.closeOverlay()
	}
}
