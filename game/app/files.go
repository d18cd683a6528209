package app

import (
	"bytes"
	"errors"
	"strings"
	"unicode"

	"levelspan/game/ui"
	"levelspan/perf/casefile"
)

// caseMIME is the media type under which a case file is saved.
const caseMIME = "application/json"

// open takes in a file or link that arrived. What cannot be read changes nothing and is said in a dialog; what can is one
// step that undo takes back.
func (a *App) open(o Opened) {
	a.cancelDrags()
	a.endText()
	if o.Pasted && (o.Err != "" || strings.TrimSpace(o.Text) == "") {
		a.openPaste(o.Err)
		return
	}
	a.closeOverlay()
	if o.Err != "" {
		a.refuseCase(o, errors.New(o.Err))
		return
	}
	c, warnings, err := read(o)
	if err != nil {
		a.refuseCase(o, err)
		return
	}
	name := a.nameFor(c)
	a.show("opening of "+c.Aeroplane.Name, c, name)
	if name == c.Aeroplane.Name {
		a.notify("Opened " + name)
	} else {
		a.notify("Opened " + c.Aeroplane.Name + ", kept as " + name)
	}
	if len(warnings) > 0 {
		lines := []string{"These entries are kept and saved again, but not used:"}
		for i := range warnings {
			lines = append(lines, warnings[i].String())
		}
		a.openDialog("Opened, with something not understood", true, lines...)
	}
	a.dirty = true
}

// resetScrolls puts every list at its beginning.
func (a *App) resetScrolls() {
	a.view.panel.Y = 0
	for i := range a.view.forms {
		a.view.forms[i].Scroll = ui.Scroller{}
	}
}

// read reads what arrived. A text, and a file that holds one, is a case file or a link, whichever it looks like.
func read(o Opened) (*casefile.Case, []casefile.Warning, error) {
	text := o.Text
	switch {
	case o.Link != "":
		return casefile.ParseFragment(o.Link)
	case text == "" && bytes.Contains(o.Data, []byte("#case=")) && !bytes.HasPrefix(bytes.TrimSpace(o.Data), []byte("{")):
		text = string(o.Data)
	case text == "":
		return casefile.Parse(o.Data)
	}
	if text = strings.TrimSpace(text); strings.HasPrefix(text, "{") {
		return casefile.Parse([]byte(text))
	}
	return casefile.ParseFragment(text)
}

// refuseCase says why a file or link was not opened.
func (a *App) refuseCase(o Opened, err error) {
	title, lines := "This case cannot be opened", []string(nil)
	what := "The file"
	switch {
	case o.Link != "":
		what = "The link"
	case o.Text != "":
		what = "The text"
	case o.Name != "":
		what = o.Name
	}
	var newer *casefile.VersionError
	var syntax *casefile.SyntaxError
	var faults casefile.Faults
	switch {
	case errors.As(err, &newer):
		title = "This case is from a newer version"
		lines = append(lines, capital(err.Error())+".")
	case errors.As(err, &syntax):
		lines = append(lines, what+" is damaged: "+err.Error()+".")
	case errors.As(err, &faults):
		lines = append(lines, what+" holds something that is not physical:")
		const most = 12
		for i := range faults {
			if i == most {
				lines = append(lines, "… and more.")
				break
			}
			lines = append(lines, faults[i].Error())
		}
	default:
		lines = append(lines, what+": "+err.Error()+".")
	}
	lines = append(lines, "Nothing has changed: "+a.doc.current.Aeroplane.Name+" is still here.")
	a.openDialog(title, true, lines...)
}

// presentCase is the case as it is saved and shared: with the limit that is marked.
func (a *App) presentCase() *casefile.Case {
	c := a.doc.current.Clone()
	c.Display.Selected = ""
	if a.view.marked {
		c.Display.Selected = a.view.selected.String()
	}
	return c
}

// save offers the case file.
func (a *App) save() {
	a.cancelDrags()
	a.host.SaveFile(fileName(a.doc.current.Aeroplane.Name), caseMIME, a.presentCase().Marshal())
}

// fileName makes a file name of an aeroplane's name: letters, digits and hyphens.
func fileName(name string) string {
	var b strings.Builder
	for _, r := range strings.ToLower(name) {
		switch {
		case r < unicode.MaxASCII && (unicode.IsLetter(r) || unicode.IsDigit(r)):
			b.WriteRune(r)
		case b.Len() > 0 && !strings.HasSuffix(b.String(), "-"):
			b.WriteByte('-')
		}
		if b.Len() >= 40 {
			break
		}
	}
	s := strings.Trim(b.String(), "-")
	if s == "" {
		s = "aeroplane"
	}
	return s + ".levelspan.json"
}
