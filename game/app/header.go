package app

import (
	"math"

	"levelspan/game/scene"
	"levelspan/game/ui"
)

// drawHeader draws the aeroplane's name and note, the tabs, undo, redo, share and the menu.
func (a *App) drawHeader(f *ui.Frame) {
	t, l := f.Theme, &a.layout
	back := scene.Rect{X: l.window.X, Y: l.window.Y, W: l.window.W, H: l.header.Y + l.header.H}
	f.Scene.FillRect(back, 0, t.Bar)
	if l.tabs.Y != l.header.Y {
		f.Scene.FillRect(scene.Rect{X: l.window.X, Y: l.tabs.Y, W: l.window.W, H: l.tabs.H}, 0, t.Bar)
	}
	bar := ui.Trim(l.header, 0, l.margin-12, 0, l.margin)
	tools, cells, bar := a.tools(bar)
	defer func() { // after the tabs: the focus goes from left to right
		for i := range tools {
			tools[i].Draw(f, cells[i])
		}
	}()
	tabs := []ui.Choice{{ID: "tab/chart", Text: "Chart", Selected: a.view.screen == screenChart},
		{ID: "tab/aeroplane", Text: "Aeroplane", Selected: a.view.screen == screenAeroplane}}
	switch {
	case l.tabs.Y != l.header.Y:
		ui.TabBar(f, l.tabs, tabs, true)
	case l.format == phone:
		ui.TabBar(f, ui.Trim(bar, 0, -8, 0, -l.margin), tabs, true) // the name has no room
		return
	default:
		room := 0.0
		for _, c := range tabs {
			room += math.Max(ui.MinTarget, math.Ceil(scene.Measure(scene.BodyBold, c.Text)+42))
		}
		// beside the middle of the window where the name leaves room
		x := clamp(0.37*l.safe.W+l.safe.X, bar.X+60, bar.X+bar.W-room)
		ui.TabBar(f, scene.Rect{X: x, Y: bar.Y, W: math.Min(room, bar.X+bar.W-x), H: bar.H}, tabs, false)
		bar.W = x - bar.X - 12
	}
	c := a.doc.current
	name := ui.Ellipsis(scene.Title, c.Aeroplane.Name, bar.W)
	w := scene.Measure(scene.Title, name)
	f.Label(scene.Title, bar, scene.Left, name, t.Ink)
	aside := c.Aeroplane.Note
	if a.doc.kept != "" && a.doc.kept != c.Aeroplane.Name {
		aside = "kept as " + a.doc.kept
		if c.Aeroplane.Note != "" {
			aside += " · " + c.Aeroplane.Note
		}
	}
	if room := bar.W - w - 14; room > 60 && aside != "" {
		note := scene.Rect{X: bar.X + w + 14, Y: bar.Y + 1, W: room, H: bar.H}
		f.Label(scene.Small, note, scene.Left, aside, t.Muted)
	}
}

// tools are the buttons at the right end of the header, from left to right, their places and what is left of it.
func (a *App) tools(r scene.Rect) (tools []ui.Button, cells []scene.Rect, rest scene.Rect) {
	undo, redo := a.doc.nextUndo(), a.doc.nextRedo()
	tools = []ui.Button{
		{ID: "undo", Icon: ui.IconUndo, Label: named("Undo", undo), Disabled: undo == ""},
		{ID: "redo", Icon: ui.IconRedo, Label: named("Redo", redo), Disabled: redo == ""},
		{ID: "share", Text: "Share", Icon: ui.IconShare, Label: "Share", Bold: true},
		{ID: "menu", Icon: ui.IconMenu, Label: "Menu"},
	}
	if a.layout.format == phone && a.layout.low { // the menu has it too
		tools = append(tools[:2], tools[3:]...)
	}
	cells = make([]scene.Rect, len(tools))
	for i := len(tools) - 1; i >= 0; i-- {
		if a.layout.compact || a.layout.safe.W < 900 {
			tools[i].Text, tools[i].Bold = "", false
		}
		cells[i], r = ui.CutRight(r, tools[i].Width())
		cells[i] = ui.Trim(cells[i], 2, 0, 2, 0)
	}
	r.W = math.Max(0, r.W-8)
	return tools, cells, r
}

func named(verb, what string) string {
	if what == "" {
		return verb
	}
	return verb + " " + what
}
