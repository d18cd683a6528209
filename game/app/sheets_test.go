package app

import (
	"strings"
	"testing"
	"time"

	"levelspan/game/keep"
	"levelspan/game/ui"
)

// sheetHost is a testHost that can do all that an outside may be able to do.
type sheetHost struct {
	testHost
	base    string
	canSend bool
	pasting int
	shared  []Shared
}

func (h *sheetHost) LinkBase() string { return h.base }
func (h *sheetHost) CanShare() bool   { return h.canSend }
func (h *sheetHost) Share(s Shared)   { h.shared = append(h.shared, s) }
func (h *sheetHost) Paste()           { h.pasting++ }

// noon is a day that does not end.
func noon() time.Time { return time.Date(2025, 5, 17, 12, 0, 0, 0, time.UTC) }

// table is a storage shared by windows, with a clock that the test sets.
type table struct {
	keep.Table
	now int64
	err error // of every Set
}

func (s *table) Set(key, value string) error {
	if s.err != nil {
		return s.err
	}
	return s.Table.Set(key, value)
}

func newTable() *table { return &table{Table: keep.Table{}, now: noon().Unix() - 3600} }

func (s *table) store() *keep.Map { return keep.NewKV(s, nil, func() int64 { return s.now }) }

// newWindow is a pilot at a program that keeps cases in a storage.
func newWindow(t *testing.T, w, h float64, s *table) *pilot {
	t.Helper()
	p := &pilot{t: t, host: &testHost{}, in: Input{Width: w, Height: h, Scale: 1}}
	p.app = NewWith(Options{Host: p.host, Store: s.store(), Clock: noon})
	p.step()
	return p
}

// filled keeps a few cases, from the program's own sheets, and lets the pilot go on with that storage.
func (p *pilot) filled() *table {
	s := newTable()
	p.app = NewWith(Options{Host: p.host, Store: s.store(), Clock: noon})
	p.app.view.night = p.in.PrefersDark
	p.step()
	p.setSlider(handleMass, 700)
	for i, days := range []int64{300, 40, 1, 0} {
		s.now = noon().Unix() - 86400*days - 600
		c := otherCase(p.t)
		c.Aeroplane.Name = [...]string{"Marram", "Dunlin", "Dunlin with floats and a very long name of its own", "Marram"}[i]
		c.Today.MassKg += float64(i)
		p.step(Opened{Data: c.Marshal()})
	}
	p.in.Now += noticeTime
	p.step()
	return s
}

// overlaid is the number of the operation from which on the picture shows the topmost layer, 0 without one.
func (p *pilot) overlaid() int {
	s, t := p.app.Scene(), p.app.frame.Theme
	if p.app.view.overlay == overlayNone {
		return 0
	}
	for i := len(s.Ops) - 1; i >= 0; i-- {
		op := &s.Ops[i]
		if op.Rect.W == s.Width && op.Rect.H == s.Height && (op.Color == t.Shade || op.Color == t.Background) {
			return i
		}
	}
	return 0
}

// sheetViews are the sheets and dialogs about cases, looked at in every window.
var sheetViews = map[string]func(p *pilot){
	"share": func(p *pilot) { p.tapShareButton() },
	"code":  func(p *pilot) { p.tapShareButton(); p.press("share/code") },
	"cases": func(p *pilot) { p.filled(); p.press("menu"); p.press("cases") },
	"cases-more": func(p *pilot) {
		p.filled()
		p.press("menu")
		p.press("cases")
		p.press("case/more/" + keep.Escape("Dunlin"))
	},
	"rename": func(p *pilot) {
		p.filled()
		p.press("menu")
		p.press("cases")
		p.press("case/more/" + keep.Escape("Dunlin"))
		p.press("case/rename/" + keep.Escape("Dunlin"))
		p.event(ui.Event{Kind: ui.SetText, ID: entryName, Text: "Marram"})
		p.press("case/save/" + keep.Escape("Dunlin"))
	},
	"delete": func(p *pilot) {
		p.filled()
		p.press("menu")
		p.press("cases")
		p.press("case/more/" + keep.Escape("Dunlin"))
		p.press("case/delete/" + keep.Escape("Dunlin"))
	},
	"deleted": func(p *pilot) {
		p.filled()
		p.press("menu")
		p.press("cases")
		p.press("case/more/" + keep.Escape("Dunlin"))
		p.press("case/delete/" + keep.Escape("Dunlin"))
		p.press("case/gone/" + keep.Escape("Dunlin"))
	},
	"paste": func(p *pilot) {
		in := p.in
		in.Opened = []Opened{{Pasted: true, Err: "the browser does not let a page read it"}}
		p.app.Step(in)
	},
	"conflict": func(p *pilot) {
		s := p.filled()
		other := NewWith(Options{Host: p.host, Store: s.store(), Clock: noon})
		in := p.in
		other.Step(in)
		in.Events = []ui.Event{{Kind: ui.SetValue, ID: handleMass, Value: 610}}
		other.Step(in)
		p.setSlider(handleMass, 720)
	},
	"not-kept": func(p *pilot) {
		s := p.filled()
		s.err = keep.ErrFull
		p.setSlider(handleMass, 640)
		p.press("failure/dismiss") // it lies over figures
	},
}

// tapShareButton opens the Share sheet, through the menu where the header has no room for its button.
func (p *pilot) tapShareButton() {
	if p.find("share") == nil {
		p.press("menu")
	}
	p.press("share")
}

func TestShareSheet(t *testing.T) {
	p := newPilot(t, 1280, 800)
	host := &sheetHost{base: "https://example.org/x.html", canSend: true}
	p.app = NewWith(Options{Host: host})
	p.step()
	p.setSlider(handleMass, 711)
	for _, id := range []string{"share/link", "share/text", "share/system"} {
		p.tap("share")
		p.tap(id)
		if p.find(id) != nil {
			t.Errorf("%s leaves the sheet open", id)
		}
	}
	if len(host.copied) != 2 || len(host.shared) != 1 {
		t.Fatalf("%d texts copied, %d shared", len(host.copied), len(host.shared))
	}
	shared := host.shared[0]
	if shared.Link != host.copied[0] || shared.File != host.copied[1] || shared.FileName != "marram.levelspan.json" {
		t.Errorf("shared %q, copied %q", shared, host.copied)
	}
	for _, text := range host.copied {
		q := newPilot(t, 1280, 800)
		q.step(Opened{Text: "  " + text + "\n"})
		if q.file() != p.file() {
			t.Errorf("pasted, %.40q is another case", text)
		}
	}
	host.canSend = false
	p.tap("share")
	if p.find("share/system") != nil {
		t.Error("a share sheet is offered where there is none")
	}
	if p.says("this machine only") {
		t.Error("a hosted link is called useless elsewhere")
	}
	p.key(ui.KeyEscape)
	host.base = "file:///home/anna/levelspan.html"
	p.tap("share")
	if !p.says("this machine only") {
		t.Error("a link to this machine's disk is not said to be one")
	}
}

func TestPaste(t *testing.T) {
	p := newPilot(t, 390, 844)
	host := &sheetHost{}
	p.app = NewWith(Options{Host: host})
	p.step()
	p.tap("menu")
	p.tap("paste")
	if host.pasting != 1 || p.find(entryPaste) != nil {
		t.Fatalf("the clipboard was asked %d times", host.pasting)
	}
	p.step(Opened{Pasted: true, Err: "forbidden"})
	if p.find(entryPaste) == nil || !p.says("forbidden") {
		t.Fatal("no field where the clipboard cannot be read")
	}
	if p.app.FocusID() != entryPaste {
		t.Errorf("the focus is on %q", p.app.FocusID())
	}
	other := otherCase(t)
	link := "https://example.org/x.html#case=" + other.Fragment()
	p.event(ui.Event{Kind: ui.SetText, ID: entryPaste, Text: link[:len(link)-30]})
	if p.find(entryPaste) == nil {
		t.Fatal("half a link closes the sheet")
	}
	p.tap("paste/open")
	if !strings.Contains(p.app.view.dialog.Text, "cut short") || p.app.Mirror().Title != "Marram" {
		t.Error("half a link is opened, or not refused with the reason")
	}
	p.tap("dialog/ok")
	for name, text := range map[string]string{"link": link, "fragment": other.Fragment(), "hash": "#case=" + other.Fragment(), "case": string(other.Marshal())} {
		p.app = NewWith(Options{Host: &testHost{}}) // cannot paste: the field comes at once
		p.step()
		p.tap("menu")
		p.tap("paste")
		p.event(ui.Event{Kind: ui.SetText, ID: entryPaste, Text: text})
		if got := p.app.Mirror().Title; got != "Dunlin" || p.find(entryPaste) != nil {
			t.Errorf("%s: pasting leaves %q on the screen", name, got)
		}
	}
	p.step(Opened{Name: "link.txt", Data: []byte(strings.Replace(link, "Dunlin", "", 1) + "\r\n")})
	if !strings.HasPrefix(p.app.Mirror().Status, "Opened Dunlin") {
		t.Errorf("a file that holds a link: %q", p.app.Mirror().Status)
	}
}
