package app

import (
	"strconv"
	"strings"

	"levelspan/game/scene"
	"levelspan/game/ui"
)

// link is the address that opens this case, or its fragment alone where the program has no address; "" where the case is
// too large for any link.
func (a *App) link() string {
	text := a.presentCase().Fragment()
	if base := a.host.LinkBase(); base != "" && text != "" {
		text = base + "#case=" + text
	}
	return text
}

// shareGroups are the ways out of the program.
func (a *App) shareGroups() []ui.MenuGroup {
	items := []ui.Button{{ID: "share/link", Text: "Copy the link", Icon: ui.IconCopy}, {ID: "share/code", Text: "Show as QR code", Icon: ui.IconCode},
		{ID: "share/text", Text: "Copy the case as text", Icon: ui.IconText}, {ID: "save", Text: "Save the case file", Icon: ui.IconSave}}
	if s, ok := a.host.(Sharer); ok && s.CanShare() {
		items = append(items, ui.Button{ID: "share/system", Text: "Send by another program…", Icon: ui.IconSend})
	}
	note := "Each holds the whole of this case. Nothing is sent to any server."
	if strings.HasPrefix(a.host.LinkBase(), "file:") {
		note += " The link of a page opened from this machine's disk works on this machine only; another machine takes it under Paste in its own copy of levelspan."
	}
	return []ui.MenuGroup{{Title: "Share " + a.doc.current.Aeroplane.Name, Items: items, Text: note}}
}

// tapShare carries out a tap on the share button or a way out.
func (a *App) tapShare(way string) {
	a.cancelDrags()
	a.endText()
	a.closeOverlay()
	a.dirty = true
	switch way {
	case "":
		a.view.overlay = overlayShare
		a.view.shareMenu.Scroll = ui.Scroller{}
	case "link":
		if text := a.link(); text != "" {
			a.host.Copy("link", text)
		} else {
			a.openDialog("This case is too large for a link", true, "Save the case file, or copy the case as text.")
		}
	case "text":
		a.host.Copy("case", string(a.presentCase().Marshal()))
	case "code":
		a.openCode()
	case "system":
		if s, ok := a.host.(Sharer); ok {
			name := a.doc.current.Aeroplane.Name
			s.Share(Shared{Title: name, Text: "levelspan case: " + name, Link: a.link(), FileName: fileName(name), MIME: caseMIME, File: string(a.presentCase().Marshal())})
		}
	}
}

const entryPaste = "entry/paste" // the text field to paste in

// tapPaste asks the outside for the clipboard's text, or offers a field to paste in.
func (a *App) tapPaste(what string) {
	switch what {
	case "open":
		a.pasteOpen()
		return
	case "":
		a.closeOverlay()
		if p, ok := a.host.(Paster); ok {
			p.Paste()
			return
		}
		a.openPaste("")
	}
}

// openPaste offers the field to paste in, and says why the clipboard could not be read.
func (a *App) openPaste(why string) {
	a.cancelDrags()
	a.closeOverlay()
	a.view.overlay = overlayPaste
	a.view.sheet = ui.Sheet{ID: "sheet", Title: "Paste a link or case text"}
	a.view.pasteWhy = why
	a.view.text = ui.TextEdit{ID: entryPaste, Max: mostPasted}
	a.dirty = true
}

// mostPasted bounds a pasted text, characters; a case of a few thousand runs is shorter.
const mostPasted = 1 << 20

// pasteChanged opens the text as soon as it is a whole case or link: pasting is enough.
func (a *App) pasteChanged() {
	o := Opened{Text: a.view.text.Text}
	if len(o.Text) < 100 { // nothing whole is so short
		return
	}
	if _, _, err := read(o); err == nil {
		a.open(o)
	}
}

// pasteOpen opens what was entered, or says why not.
func (a *App) pasteOpen() {
	if text := strings.TrimSpace(a.view.text.Text); text != "" {
		a.open(Opened{Text: text})
	}
}

// drawPaste draws the field to paste in.
func (a *App) drawPaste(f *ui.Frame) {
	const width = 560.0
	w := ui.SheetWidth(a.layout.safe, width)
	text := "Paste here the link of a case, the text of a scanned QR code, or a case copied as text."
	if a.view.pasteWhy != "" {
		text = "The clipboard could not be read: " + a.view.pasteWhy + ". " + text
	}
	high := f.ParagraphHeight(scene.Body, w, text)
	a.view.sheet.Draw(f, a.layout.window, a.layout.safe, width, high+12+2*caseButton, func(r scene.Rect) {
		words, r := ui.CutTop(r, high+12)
		f.Paragraph(scene.Body, words, text, f.Theme.Ink)
		box, r := ui.CutTop(r, caseButton)
		e, shown := &a.view.text, a.view.text
		if len(shown.Text) > 400 { // the end is enough to be seen
			shown.Text = shown.Text[:160] + "…"
			shown.Caret = len(shown.Text)
			e = &shown
		}
		ui.TextBox(f, ui.Trim(box, 0, 0, 8, 0), entryPaste, "Link or text of a case", e.Text, "Link or text", e, "")
		row, _ := ui.CutTop(r, caseButton)
		ui.Button{ID: "paste/open", Text: "Open it", Kind: ui.Primary, Disabled: strings.TrimSpace(a.view.text.Text) == ""}.Draw(f, ui.Trim(row, 0, 0, 8, 0))
	})
}

// count writes a number of characters.
func count(n int) string { return strconv.Itoa(n) + " characters" }
