package app

import (
	"strconv"
	"strings"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf/casefile"
)

// beginText starts editing the free text of a field; a tap puts the caret where it fell.
func (a *App) beginText(path string, act *ui.Action) {
	id := "field/" + path
	if a.view.text.ID != id {
		a.endText()
		row := a.rowAt(path)
		if row == nil || row.kind != rowText {
			return
		}
		a.view.text = ui.TextEdit{ID: id, Max: int(row.max)}
		a.view.text.Set(row.value)
		a.view.textRun++
		a.view.textBefore = row.value
	}
	if act != nil && act.Kind == ui.Tap && act.Key == ui.KeyNone {
		for i := range a.frame.Controls {
			if c := &a.frame.Controls[i]; c.ID == id {
				a.view.text.CaretAt(scene.Body, ui.TextStart(c.Bounds), act.X)
			}
		}
	}
	a.dirty = true
}

// endText leaves the text that is being edited. What was typed is committed already.
func (a *App) endText() {
	if a.view.text.ID != "" {
		a.view.text = ui.TextEdit{}
		a.dirty = true
	}
}

// putText commits the text as far as it is typed; one editing is one step of the history, however many keys it takes.
func (a *App) putText() {
	e := &a.view.text
	path := strings.TrimPrefix(e.ID, "field/")
	text := strings.TrimSpace(e.Text)
	what := "text"
	if row := a.rowAt(path); row != nil {
		what = strings.ToLower(row.label)
	}
	err := a.doc.editRun(what, "text/"+strconv.Itoa(a.view.textRun), func(c *casefile.Case) error { return putText(c, path, text) })
	a.view.refused, a.view.refusal = "", ""
	if err != nil {
		a.refuse(path, refusal(err, path))
	}
	a.dirty = true
}

// putText sets a free text; a configuration's name is changed wherever it is spoken of.
func putText(c *casefile.Case, path, text string) error {
	if strings.HasPrefix(path, "aeroplane.configurations[") && strings.HasSuffix(path, "].name") {
		i, _ := indexesOf(path)
		return rename(c, i, text)
	}
	return c.SetText(path, text)
}

// pressText gives a key to the text that is being edited and reports whether it was meant for it.
func (a *App) pressText(act *ui.Action) bool {
	if path, isField := strings.CutPrefix(act.ID, "field/"); isField && act.ID != a.view.text.ID && act.Rune != 0 {
		a.beginText(path, nil)
	}
	if act.ID == "" || act.ID != a.view.text.ID {
		return false
	}
	switch a.view.text.Handle(*act) {
	case ui.TextChanged:
		a.textChanged()
	case ui.TextMoved:
		a.dirty = true
	case ui.TextDone:
		if a.entered() {
			return true
		}
		a.endText()
	case ui.TextCancelled:
		if a.view.overlay != overlayNone { // of a sheet: Escape closes it
			return false
		}
		a.view.text.Set(a.view.textBefore)
		a.putText()
		a.endText()
	default:
		return false
	}
	return true
}

// typed takes a text that the outside changed.
func (a *App) typed(act *ui.Action) {
	if a.view.text.ID != act.ID && a.view.overlay == overlayNone {
		a.beginText(strings.TrimPrefix(act.ID, "field/"), nil)
	}
	if a.view.text.ID == act.ID && a.view.text.Handle(*act) == ui.TextChanged {
		a.textChanged()
	}
}

// textChanged takes in a changed text: of a field into the case, of a sheet as what has been entered so far.
func (a *App) textChanged() {
	a.dirty = true
	switch a.view.text.ID {
	case entryName:
		a.view.cases.refusal = ""
	case entryPaste:
		a.pasteChanged()
	default:
		a.putText()
	}
}

// entered takes Enter in a text of a sheet and reports whether it was in one.
func (a *App) entered() bool {
	switch a.view.text.ID {
	case entryName:
		a.renameCase()
	case entryPaste:
		a.pasteOpen()
	default:
		return false
	}
	return true
}

// focused begins or ends the editing of a text as the focus comes and goes.
func (a *App) focused(act *ui.Action) {
	if a.router.FocusVisible {
		a.revealFocus(act.ID)
	}
	if a.view.overlay == overlayCases || a.view.overlay == overlayPaste { // the text of a sheet stays as long as the sheet
		return
	}
	if a.view.text.ID != "" && act.ID != a.view.text.ID {
		a.endText()
	}
	path, isField := strings.CutPrefix(act.ID, "field/")
	if !isField {
		return
	}
	if row := a.rowAt(path); row != nil && row.kind == rowText {
		a.beginText(path, nil)
	}
	a.dirty = true
}

// revealFocus scrolls the list that a control lies in so that all of it is seen.
func (a *App) revealFocus(id string) {
	const margin = 8
	var list *ui.Control
	for i := range a.frame.Controls {
		c := &a.frame.Controls[i]
		if c.Scrolls {
			list = c
		}
		if c.ID != id {
			continue
		}
		if list == nil || c.Modal != list.Modal || c.Hit.H >= c.Bounds.H-1 {
			return // in sight
		}
		if s := a.view.scroller(list.ID); s != nil {
			y := c.Bounds.Y - list.Bounds.Y + s.Y
			s.Reveal(y-margin, y+c.Bounds.H+margin)
			a.dirty = true
		}
		return
	}
}
