package app

import (
	"strings"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf"
	"levelspan/perf/casefile/figure"
)

// overlay is what lies over a screen and takes its input.
type overlay uint8

const (
	overlayNone overlay = iota
	overlayKeypad
	overlayMenu
	overlayDialog
	overlayShare
	overlayCode // the QR code
	overlayCases
	overlayPaste
)

// dialogOf is a message that waits to be read.
func (a *App) openDialog(title string, grave bool, lines ...string) {
	d := ui.Dialog{ID: "dialog", Title: title, Text: strings.Join(lines, "\n\n"),
		Buttons: []ui.Button{{ID: "dialog/ok", Text: "OK", Kind: ui.Primary}}}
	if grave {
		d.Icon = ui.IconWarning
	}
	a.view.dialog = d
	a.view.overlay = overlayDialog
	a.dirty = true
}

// openAbout says what the program is and is not.
func (a *App) openAbout() {
	a.openDialog("About and cautions", false, append([]string{"levelspan " + a.host.Version()}, a.standingCautions()...)...)
}

// standingCautions hold always.
func (a *App) standingCautions() []string {
	return []string{perf.CautionAdvisory.Text(), perf.CautionNotModelled.Text()}
}

// menuGroups are the entries of the menu: files, units, palette, about.
func (a *App) menuGroups() []ui.MenuGroup {
	u := &a.units
	group := func(name, key, now string, units ...string) ui.MenuGroup {
		g := ui.MenuGroup{Title: name}
		for _, n := range units {
			g.Choices = append(g.Choices, ui.Choice{ID: "unit/" + key + "/" + strings.ReplaceAll(n, "/", ""), Text: n, Label: name + " in " + n, Selected: n == now})
		}
		return g
	}
	return []ui.MenuGroup{
		{Items: []ui.Button{{ID: "cases", Text: "Cases…", Icon: ui.IconCases}, {ID: "open", Text: "Open a case file…", Icon: ui.IconOpen},
			{ID: "paste", Text: "Paste a link or case text…", Icon: ui.IconPaste}, {ID: "save", Text: "Save the case file", Icon: ui.IconSave},
			{ID: "share", Text: "Share…", Icon: ui.IconShare}}},
		{Title: "Palette", Choices: []ui.Choice{{ID: "palette/day", Text: "Day", Selected: !a.view.night}, {ID: "palette/night", Text: "Night", Selected: a.view.night}}},
		group("Speed", "speed", u.Speed.Name, "kt", "mph", "km/h"),
		group("Height", "altitude", u.Altitude.Name, "ft", "m"),
		group("Weight", "mass", u.Mass.Name, "kg", "lb"),
		group("Power", "power", u.Power.Name, "kW", "hp"),
		group("Fuel", "fuel", strings.ReplaceAll(u.Fuel.Name, figure.Group, " "), "kg", "L", "US gal"),
		group("Wing and propeller", "length", u.Length.Name, "m", "ft"),
		{Items: []ui.Button{{ID: "about", Text: "About and cautions", Icon: ui.IconWarning}}, Text: "levelspan " + a.host.Version()},
	}
}

// drawOverlay draws what lies over the screen.
func (a *App) drawOverlay(f *ui.Frame) {
	w, s := a.layout.window, a.layout.safe
	switch a.view.overlay {
	case overlayKeypad:
		a.view.pad.Draw(f, w, s, a.boundsOf(a.view.pad.ID))
	case overlayMenu:
		a.view.menu.Draw(f, w, s, a.boundsOf("menu"), a.menuGroups())
	case overlayDialog:
		a.view.dialog.Draw(f, w, s)
	case overlayShare:
		at := a.boundsOf("share")
		if at.W == 0 {
			at = a.boundsOf("menu")
		}
		a.view.shareMenu.Draw(f, w, s, at, a.shareGroups())
	case overlayCode:
		a.drawCode(f)
	case overlayCases:
		a.drawCases(f)
	case overlayPaste:
		a.drawPaste(f)
	}
}

// boundsOf is where a control of this frame is drawn.
func (a *App) boundsOf(id string) scene.Rect {
	for i := range a.frame.Controls {
		if a.frame.Controls[i].ID == id {
			return a.frame.Controls[i].Bounds
		}
	}
	return scene.Rect{}
}

// drawNotice shows the notice of the moment, or the last failure until it is dismissed.
func (a *App) drawNotice(f *ui.Frame) {
	s := a.layout.safe
	if n := len(a.view.failures); n > 0 {
		b := ui.Banner{ID: "failure/dismiss", Kind: ui.BannerBad, Texts: a.view.failures[n-1:]}
		w := min(s.W-24, 560)
		h := b.Height(f, w)
		b.Draw(f, scene.Rect{X: s.X + (s.W-w)/2, Y: s.Y + s.H - h - 40, W: w, H: h})
		return
	}
	under, _ := ui.CutTop(s, a.layout.header.H+84) // under the header: cautions and figures stay in sight
	ui.Toast(f, under, a.view.notice)
}
