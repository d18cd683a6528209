package app

import (
	"strings"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf/casefile"
)

// form is one list of fields: its widget and what it shows.
type form struct {
	ui.Form
	rows     []formRow
	sections []ui.FormSection
}

// The two forms.
const (
	formAeroplane = iota
	formToday
)

// bothFormsWidth is the window width from which both forms stand side by side.
const bothFormsWidth = 1100

// buildForms collects the rows of both forms.
func (a *App) buildForms() {
	b := formBuilder{c: a.doc.current, units: a.units, fields: a.fields}
	forms := &a.view.forms
	b.rows = forms[formAeroplane].rows[:0]
	forms[formAeroplane].rows = b.aeroplaneRows()
	b.rows = forms[formToday].rows[:0]
	forms[formToday].rows = b.todayRows()
	for i := range forms {
		forms[i].sections = a.sectionsOf(forms[i].sections[:0], forms[i].rows)
	}
}

// sectionsOf turns rows into what the form widget draws.
func (a *App) sectionsOf(dst []ui.FormSection, rows []formRow) []ui.FormSection {
	for i := range rows {
		r := &rows[i]
		if r.kind == rowHeading || len(dst) == 0 {
			dst = append(dst, ui.FormSection{Title: r.label})
		}
		s := &dst[len(dst)-1]
		switch r.kind {
		case rowHeading:
		case rowButton:
			kind := ui.Framed
			icon := ui.IconPlus
			if strings.HasPrefix(r.path, "remove/") {
				kind, icon = ui.Quiet, ui.IconRemove
			}
			s.Row = append(s.Row, ui.Button{ID: r.path, Text: r.label, Icon: icon, Kind: kind})
		case rowFact:
			if s.Note == "" {
				s.Note = r.label + " " + r.value
			} else {
				s.Note += ", " + strings.ToLower(r.label[:1]) + r.label[1:] + " " + r.value
			}
		default:
			s.Fields = append(s.Fields, a.fieldOf(r))
		}
	}
	return dst
}

// fieldOf is one row as the form widget takes it.
func (a *App) fieldOf(r *formRow) ui.FormField {
	id := "field/" + r.path
	d := ui.FormField{ID: id, Label: r.label, Help: r.help, HelpOpen: a.view.helped == r.path}
	if a.view.refused == r.path {
		d.Error = a.view.refusal
	}
	switch r.kind {
	case rowText:
		d.Text, d.Value = true, r.value
		if a.view.text.ID == id {
			d.Edit = &a.view.text
		}
	case rowChoice:
		for _, c := range r.choices {
			d.Choices = append(d.Choices, ui.Choice{ID: id + "/" + c.value, Text: c.label, Label: r.label + ": " + c.label, Selected: c.value == r.selected})
		}
	default:
		d.Value, d.Unit, d.Range = r.value, r.unit, r.allowed
		d.Number, d.Min, d.Max = r.number, r.min, r.max
		d.Active = a.view.overlay == overlayKeypad && a.view.pad.ID == id
		if !r.set {
			d.Value, d.Note = "", r.otherwise
		}
	}
	return d
}

// rowAt is the row of a field, nil if no form has it.
func (a *App) rowAt(path string) *formRow {
	for i := range a.view.forms {
		rows := a.view.forms[i].rows
		for j := range rows {
			if rows[j].path == path && rows[j].kind != rowButton {
				return &rows[j]
			}
		}
	}
	return nil
}

// drawAeroplane draws the Aeroplane screen: both forms side by side, or one of them under a switch.
func (a *App) drawAeroplane(f *ui.Frame) {
	a.buildForms()
	t := f.Theme
	foot, body := ui.CutBottom(a.layout.body, panelFoot)
	f.Scene.FillRect(foot, 0, t.Bar)
	a.drawAdvisory(f, foot)
	forms := &a.view.forms
	if body.W >= bothFormsWidth {
		today, rest := ui.CutRight(body, clamp(0.3*body.W, 404, 600))
		forms[formAeroplane].Draw(f, rest, "form/aeroplane", "Aeroplane", forms[formAeroplane].sections)
		f.Scene.FillRect(scene.Rect{X: today.X, Y: today.Y, W: 1, H: today.H}, 0, t.Line)
		forms[formToday].Draw(f, ui.Trim(today, 0, 0, 0, 1), "form/today", "Today", forms[formToday].sections)
		return
	}
	head, body := ui.CutTop(body, 60)
	choices := []ui.Choice{{ID: "part/aeroplane", Text: "Aeroplane", Selected: !a.view.today}, {ID: "part/today", Text: "Today", Selected: a.view.today}}
	ui.Segments(f, ui.Centered(ui.Trim(head, 6, a.layout.margin, 6, a.layout.margin), 420, 48), choices)
	f.Scene.Line(body.X, body.Y-0.5, body.X+body.W, body.Y-0.5, 1, t.Line)
	if a.view.today {
		forms[formToday].Draw(f, body, "form/today", "Today", forms[formToday].sections)
	} else {
		forms[formAeroplane].Draw(f, body, "form/aeroplane", "Aeroplane", forms[formAeroplane].sections)
	}
}

// refuse shows beside a field why its entry was refused.
func (a *App) refuse(path, why string) {
	a.view.refused, a.view.refusal = path, why
	a.dirty = true
}

// tapForm carries out a tap on something of the forms.
func (a *App) tapForm(act *ui.Action, head, rest string) {
	a.view.refused, a.view.refusal = "", ""
	switch head {
	case "part":
		a.endText()
		a.view.today = rest == "today"
	case "help":
		path := strings.TrimPrefix(rest, "field/")
		if a.view.helped == path {
			path = ""
		}
		a.view.helped = path
	case "add", "remove":
		a.endText()
		what := ""
		err := a.doc.edit("", func(c *casefile.Case) (err error) {
			what, err = pressButton(c, head+"/"+rest)
			return err
		})
		if err != nil {
			a.notify(refusal(err, ""))
			return
		}
		a.doc.nameLast(what)
	case "field":
		path, value, isChoice := strings.Cut(rest, "/")
		row := a.rowAt(path)
		switch {
		case row == nil:
		case isChoice:
			a.endText()
			err := a.doc.edit(strings.ToLower(row.label), func(c *casefile.Case) error { return putChoice(c, a.fields, path, value) })
			if err != nil {
				a.refuse(path, refusal(err, path))
			}
		case row.kind == rowText:
			a.beginText(path, act)
		default:
			a.openPad(path, "field/"+path)
		}
	}
}
