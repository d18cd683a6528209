package app

import (
	"errors"
	"strings"
	"time"

	"levelspan/game/keep"
	"levelspan/game/scene"
	"levelspan/game/ui"
)

// casesSheet is the state of the sheet that lists the kept cases.
type casesSheet struct {
	list     []keep.Entry
	problem  string // why the last thing was not done, "" it was
	more     string // the case whose buttons are shown, "" none
	renaming string // the case that gets another name, "" none
	refusal  string // why that name was refused
	reveal   string // the case that is to be scrolled into sight, "" none
}

const (
	entryName = "entry/name" // the text field of the Cases sheet

	casesWidth = 560.0
	caseRow    = 62.0
	caseButton = 56.0
)

// openCases shows the sheet.
func (a *App) openCases() {
	a.endText()
	a.view.overlay = overlayCases
	a.view.sheet = ui.Sheet{ID: "sheet", Title: "Cases"}
	a.view.cases = casesSheet{}
	a.refreshCases()
	a.dirty = true
}

// refreshCases reads the list anew while it is shown.
func (a *App) refreshCases() {
	if a.view.overlay == overlayCases {
		list, err := a.kept.store.List()
		a.view.cases.list = list
		if err != nil {
			a.view.cases.problem = "The kept cases cannot be listed: " + err.Error() + "."
		}
		a.dirty = true
	}
}

// tapCases carries out a tap on something of the sheet.
func (a *App) tapCases(act *ui.Action, head, rest string) {
	verb, escaped, _ := strings.Cut(rest, "/")
	name, _ := keep.Unescape(escaped)
	cs := &a.view.cases
	switch head + "/" + verb {
	case "cases/":
		a.closeOverlay()
		a.openCases()
	case "cases/new":
		a.closeOverlay()
		c := demo()
		name := a.freeName(c.Aeroplane.Name)
		a.show("new case", c, name)
		a.notify("New case: " + name)
	case "case/open":
		a.closeOverlay()
		a.openKept(name)
	case "case/more":
		a.endText()
		cs.renaming = ""
		if cs.more == name {
			name = ""
		}
		cs.more, cs.reveal = name, name
	case "case/copy":
		a.duplicateCase(name)
	case "case/rename":
		cs.renaming, cs.refusal, cs.reveal = name, "", name
		a.view.text = ui.TextEdit{ID: entryName, Max: keep.MaxName}
		a.view.text.Set(name)
		a.router.Focus = entryName
	case "case/cancel":
		a.endText()
		cs.renaming = ""
		a.router.Focus = "case/more/" + keep.Escape(cs.more)
	case "case/save":
		a.renameCase()
	case "case/delete":
		a.openDialog("Delete "+name+"?", true, "It can be brought back from the list of cases until the program ends.")
		a.view.dialog.Buttons = []ui.Button{{ID: "cases", Text: "Keep it", Kind: ui.Framed}, {ID: "case/gone/" + escaped, Text: "Delete", Kind: ui.Danger}}
	case "case/gone":
		a.deleteCase(name)
	case "removed/back":
		a.bringBack(name)
	}
	a.dirty = true
}

// openKept shows a kept case.
func (a *App) openKept(name string) {
	if name == a.doc.kept || name == "" {
		return
	}
	c, err := a.load(name)
	if err != nil {
		a.openDialog(name+" cannot be opened", true, capital(err.Error())+".", "Nothing has changed: "+a.doc.current.Aeroplane.Name+" is still here.")
		return
	}
	a.show("opening of "+name, c, name)
	a.notify("Opened " + name)
}

// duplicateCase keeps a copy under a name of its own; the case on the screen stays.
func (a *App) duplicateCase(name string) {
	data, _, err := a.kept.store.Load(name)
	to := ""
	if err == nil {
		to = a.freeName(name)
		var stamp string
		if stamp, err = a.kept.store.Save(to, data, ""); err == nil {
			a.kept.versions[to] = version{stamp, data}
		}
	}
	a.sayOf("Kept a copy as "+to, err)
	a.view.cases.more = ""
	a.refreshCases()
}

// renameCase keeps a case under the name that was entered, and lets the old name go.
func (a *App) renameCase() {
	cs := &a.view.cases
	from, to := cs.renaming, strings.TrimSpace(a.view.text.Text)
	a.dirty = true
	if from == "" {
		return
	}
	if err := keep.CheckName(to); err != nil {
		cs.refusal = capital(err.Error()) + "."
		return
	}
	if from != to {
		store := a.kept.store
		data, stamp, err := store.Load(from)
		var newStamp string
		if err == nil {
			newStamp, err = store.Save(to, data, "")
		}
		if errors.Is(err, keep.ErrChanged) {
			cs.refusal = "There is a case of that name."
			return
		}
		if err == nil {
			if v, ok := a.kept.versions[from]; ok && v.stamp != stamp { // another window's version went with the name
				a.kept.check = true
				newStamp = v.stamp
			}
			a.kept.versions[to] = version{newStamp, data}
			delete(a.kept.versions, from)
			a.doc.rename(from, to)
			err = store.Delete(from, stamp)
		}
		a.sayOf("Renamed to "+to, err)
	}
	a.endText()
	cs.renaming, cs.more = "", ""
	a.refreshCases()
}

// deleteCase deletes a kept case; where it is the one on the screen, the last changed of the others is shown, or the demo.
func (a *App) deleteCase(name string) {
	a.closeOverlay()
	data, stamp, err := a.kept.store.Load(name)
	if err == nil {
		err = a.kept.store.Delete(name, stamp)
	}
	if err == nil {
		a.kept.removed = append(a.kept.removed, removedCase{name, data})
		delete(a.kept.versions, name)
		if name == a.doc.kept {
			a.showAnother()
		}
	}
	a.openCases()
	a.sayOf("Deleted "+name, err)
}

// showAnother shows the last changed of the kept cases that can be read, or the demo as it comes.
func (a *App) showAnother() {
	list, _ := a.kept.store.List()
	for _, e := range list {
		if c, err := a.load(e.Name); err == nil {
			a.show("deletion", c, e.Name)
			return
		}
	}
	a.show("deletion", demo(), "")
	a.kept.seen, a.kept.seenName = a.doc.committed, "" // not kept until it is changed
}

// bringBack keeps a deleted case again.
func (a *App) bringBack(name string) {
	k := &a.kept
	for i, r := range k.removed {
		if r.name != name {
			continue
		}
		to := name
		stamp, err := k.store.Save(to, r.data, "")
		if errors.Is(err, keep.ErrChanged) { // the name is taken again
			to = a.freeName(name)
			stamp, err = k.store.Save(to, r.data, "")
		}
		if err == nil {
			k.versions[to] = version{stamp, r.data}
			k.removed = append(k.removed[:i:i], k.removed[i+1:]...)
		}
		a.sayOf(to+" is back", err)
		a.refreshCases()
		return
	}
}

// sayOf says that something was done with a kept case, or why not.
func (a *App) sayOf(done string, err error) {
	if a.view.cases.problem = ""; err != nil {
		a.view.cases.problem = "That was not done: " + err.Error() + "."
		return
	}
	a.notify(done)
}

// rowHeight is what a row of the list takes with what is open under it.
func (a *App) caseHeight(name string) float64 {
	h := caseRow
	switch cs := &a.view.cases; {
	case name == "":
	case cs.renaming == name:
		h += 2 * caseButton
		if cs.refusal != "" {
			h += 24
		}
	case cs.more == name:
		h += caseButton
	}
	return h
}

// drawCases draws the sheet.
func (a *App) drawCases(f *ui.Frame) {
	cs := &a.view.cases
	w := ui.SheetWidth(a.layout.safe, casesWidth)
	warning := a.troubleText()
	if warning == "" {
		warning = cs.problem
	}
	content := caseButton + 8
	if warning != "" {
		content += f.ParagraphHeight(scene.Body, w, warning) + 8
	}
	if a.doc.kept == "" {
		content += caseRow
	}
	lo, hi := 0.0, 0.0
	for _, e := range cs.list {
		if e.Name == cs.reveal {
			lo, hi = content, content+a.caseHeight(e.Name)
		}
		content += a.caseHeight(e.Name)
	}
	content += caseRow * float64(len(a.kept.removed))
	if hi > 0 {
		a.view.sheet.Show(a.layout.safe, content, lo, hi)
		cs.reveal = ""
	}
	a.view.sheet.Draw(f, a.layout.window, a.layout.safe, casesWidth, content, func(r scene.Rect) {
		var row scene.Rect
		if warning != "" {
			h := f.ParagraphHeight(scene.Body, w, warning) + 8
			row, r = ui.CutTop(r, h)
			f.Paragraph(scene.Body, row, warning, f.Theme.Caution)
		}
		row, r = ui.CutTop(r, caseButton+8)
		ui.Button{ID: "cases/new", Text: "New from the demonstration", Icon: ui.IconPlus, Kind: ui.Framed}.Draw(f, ui.Trim(row, 0, 0, 16, 0))
		if a.doc.kept == "" {
			row, r = ui.CutTop(r, caseRow)
			a.drawCaseRow(f, row, "", a.doc.current.Aeroplane.Name, "the demonstration; kept once it is changed")
		}
		for _, e := range cs.list {
			row, r = ui.CutTop(r, a.caseHeight(e.Name))
			a.drawCase(f, row, e)
		}
		for _, d := range a.kept.removed {
			row, r = ui.CutTop(r, caseRow)
			a.drawRemoved(f, row, d.name)
		}
	})
}

// drawCase draws one kept case and what is open under it.
func (a *App) drawCase(f *ui.Frame, r scene.Rect, e keep.Entry) {
	cs, id := &a.view.cases, keep.Escape(e.Name)
	row, under := ui.CutTop(r, caseRow)
	more, words := ui.CutRight(row, ui.MinTarget)
	when := "changed " + whenText(e.Changed, a.kept.clock())
	if e.Changed == 0 {
		when = "kept"
	}
	if e.Name == a.doc.kept {
		when = "on the screen · " + when
	}
	a.drawCaseRow(f, words, id, e.Name, when)
	ui.Button{ID: "case/more/" + id, Icon: ui.IconMore, Label: "More about " + e.Name, Selected: cs.more == e.Name}.Draw(f, ui.Centered(more, ui.MinTarget, ui.MinTarget))
	switch {
	case cs.renaming == e.Name:
		a.drawRename(f, under, id, e.Name)
	case cs.more == e.Name:
		buttons := [...]ui.Button{{ID: "case/rename/" + id, Text: "Rename", Label: "Rename " + e.Name}, {ID: "case/copy/" + id, Text: "Duplicate", Label: "Duplicate " + e.Name},
			{ID: "case/delete/" + id, Text: "Delete…", Label: "Delete " + e.Name}}
		for i, b := range buttons {
			b.Kind = ui.Framed
			b.Draw(f, ui.Cell(ui.Trim(under, 0, 0, 8, 0), len(buttons), 1, i, 0, 8))
		}
	}
}

// drawCaseRow draws name and time of a case; a tap opens it.
func (a *App) drawCaseRow(f *ui.Frame, r scene.Rect, id, name, aside string) {
	t := f.Theme
	here := id == keep.Escape(a.doc.kept)
	touch := ui.Trim(r, 1, 4, 1, -8)
	control := "case/open/" + id
	switch {
	case here:
		f.Scene.FillRect(touch, 8, t.Chosen)
	case f.Pressed(control):
		f.Scene.FillRect(touch, 8, t.KeyDown)
	}
	f.Scene.Line(r.X, r.Y, r.X+r.W, r.Y, 1, t.Line)
	in := ui.Trim(r, 0, 12, 0, 0)
	if here {
		tick, rest := ui.CutRight(in, 28)
		f.Icon(ui.IconCheck, tick, 22, t.Accent)
		in = rest
	}
	f.Label(scene.BodyBold, scene.Rect{X: in.X, Y: in.Y + 9, W: in.W, H: 22}, scene.Left, name, t.Ink)
	f.Label(scene.Small, scene.Rect{X: in.X, Y: in.Y + 33, W: in.W, H: 18}, scene.Left, aside, t.Muted)
	f.Add(ui.Control{ID: control, Role: ui.RoleRow, Label: name, ValueText: aside, Bounds: touch, Selected: here})
}

// drawRename draws the field for another name.
func (a *App) drawRename(f *ui.Frame, r scene.Rect, id, name string) {
	box, r := ui.CutTop(r, caseButton)
	ui.TextBox(f, ui.Trim(box, 0, 0, 8, 0), entryName, "New name of "+name, a.view.text.Text, "", &a.view.text, a.view.cases.refusal)
	if why := a.view.cases.refusal; why != "" {
		var line scene.Rect
		line, r = ui.CutTop(r, 24)
		f.Label(scene.Small, ui.Trim(line, 0, 0, 6, 0), scene.Left, why, f.Theme.Bad)
	}
	row, _ := ui.CutTop(r, caseButton)
	ui.Button{ID: "case/save/" + id, Text: "Rename", Kind: ui.Primary}.Draw(f, ui.Cell(ui.Trim(row, 0, 0, 8, 0), 2, 1, 0, 0, 8))
	ui.Button{ID: "case/cancel/" + id, Text: "Cancel", Label: "Cancel the renaming", Kind: ui.Framed}.Draw(f, ui.Cell(ui.Trim(row, 0, 0, 8, 0), 2, 1, 1, 0, 8))
}

// drawRemoved draws a case that can be brought back.
func (a *App) drawRemoved(f *ui.Frame, r scene.Rect, name string) {
	t := f.Theme
	b := ui.Button{ID: "removed/back/" + keep.Escape(name), Text: "Bring back", Label: "Bring back " + name, Icon: ui.IconUndo, Kind: ui.Framed}
	right, words := ui.CutRight(r, b.Width())
	f.Scene.Line(r.X, r.Y, r.X+r.W, r.Y, 1, t.Line)
	f.Label(scene.Body, ui.Trim(words, 9, 8, 31, 0), scene.Left, name, t.Muted)
	f.Label(scene.Small, ui.Trim(words, 33, 8, 11, 0), scene.Left, "deleted", t.Muted)
	b.Draw(f, ui.Trim(right, 7, 0, 7, 0))
}

// whenText is a time as one speaks of it: "today 14:05", "yesterday 9:30", "12 Mar", "12 Mar 2025".
func whenText(seconds int64, now time.Time) string {
	at := time.Unix(seconds, 0).In(now.Location())
	day := func(t time.Time) int { return t.YearDay() + 1000*t.Year() }
	switch {
	case day(at) == day(now):
		return "today " + at.Format("15:04")
	case day(at) == day(now.AddDate(0, 0, -1)):
		return "yesterday " + at.Format("15:04")
	case at.Year() == now.Year():
		return at.Format("2 Jan 15:04")
	}
	return at.Format("2 Jan 2006")
}
