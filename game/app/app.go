package app

import (
	"math"
	"time"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
	"levelspan/perf/casefile/report"
)

// App is the program. Make it with New.
type App struct {
	host       Host
	hostedBase string
	fields     fieldTable

	doc     document
	kept    kept
	solved  solved
	ranges  ranges
	scratch perf.Solver

	view   view
	window window
	units  figure.Units
	layout layout
	drags  [2]railDrag // by handle
	slide  slideRun

	router   ui.Router
	actions  []ui.Action
	frame    ui.Frame
	scene    scene.Scene
	mirror   Mirror
	rows     []limitRow
	facted   []factLine
	stripped []string      // the warnings of the strip
	report   report.Report // the answer on the screen, in the words that the command uses too
	chart    chart
	dirty    bool
	now      time.Duration
}

// window is the size of the picture and its insets.
type window struct {
	width, height, scale     float64
	top, right, bottom, left float64
}

// screen is one of the tabs.
type screen uint8

const (
	screenChart screen = iota
	screenAeroplane
)

// view is the state of the screen that is not part of the case.
type view struct {
	screen   screen
	today    bool // the Today part of the Aeroplane screen, where only one part is shown
	night    bool
	themed   bool // the palette has been decided
	palette  bool // the person decided it
	selected perf.Key
	marked   bool // selected holds

	overlay overlay
	pad     pad
	dialog  ui.Dialog

	menu      ui.Menu
	shareMenu ui.Menu
	sheet     ui.Sheet // of cases, or to paste in
	cases     casesSheet
	pasteWhy  string // why the clipboard was not read, "" it was not tried
	code      shareCode
	panel     ui.Scroller
	forms     [2]form // the aeroplane's, today's
	helped    string  // path of the field whose help is open
	refused   string  // path of the field whose entry was refused, and why
	refusal   string

	text       ui.TextEdit // the free text that is being edited, ID "" none
	textBefore string
	textRun    int // counts the editings

	notice      string
	noticeUntil time.Duration
	status      string
	failures    []string
}

// noticeTime is how long a notice stays.
const noticeTime = 4 * time.Second

// New starts the program with a case file's bytes (the embedded demo's, if nil), and keeps nothing. A file that cannot be
// read leaves the demo in place and says why.
func New(host Host, caseFile []byte) *App {
	o := Options{Host: host}
	if caseFile != nil {
		o.Open = &Opened{Data: caseFile}
	}
	return NewWith(o)
}

// NewWith starts the program as the options say.
func NewWith(o Options) *App {
	a := &App{host: o.Host, fields: newFieldTable()}
	a.doc = newDocument(demo())
	a.startKept(&o)
	a.hostedBase = o.HostedBase
	if o.Open != nil {
		a.open(*o.Open)
		a.doc.past = nil
		a.view.notice, a.view.status = "", ""
	}
	a.units = a.unitsNow()
	a.view.menu = ui.Menu{ID: "menu-list", Label: "Menu"}
	a.view.shareMenu = ui.Menu{ID: "share-list", Label: "Share"}
	a.dirty = true
	return a
}

// Step takes in the input and reports whether Scene, Controls or Mirror changed. Nothing in: nothing done.
func (a *App) Step(in Input) bool {
	a.now = in.Now
	a.takeWindow(&in)
	for _, o := range in.Opened {
		a.open(o)
		a.dirty = true
	}
	for _, n := range in.Notices {
		a.notify(n)
	}
	for _, f := range in.Failures {
		if a.view.failures = append(a.view.failures, f); len(a.view.failures) > 20 {
			a.view.failures = a.view.failures[1:]
		}
		a.dirty = true
	}
	a.takeEvents(in.Events)
	if in.StoreChanged {
		a.kept.check = true
		a.refreshCases()
	}
	if a.dirty || a.kept.check {
		a.keepChanges()
	}
	if a.view.notice != "" && a.now >= a.view.noticeUntil {
		a.view.notice = ""
		a.dirty = true
	}
	if !a.dirty || a.window.width < 1 || a.window.height < 1 {
		return false
	}
	a.dirty = false
	a.units = figure.Of(a.doc.current)
	a.solved.refresh(&a.doc)
	a.ranges.refresh(&a.doc, a.speedKind(), &a.scratch)
	a.draw()
	if a.router.Settle(a.frame.Controls) {
		a.draw()
	}
	a.describe()
	return true
}

// takeWindow adopts a changed size.
func (a *App) takeWindow(in *Input) {
	w := window{in.Width, in.Height, in.Scale, in.Top, in.Right, in.Bottom, in.Left}
	for _, p := range [...]*float64{&w.width, &w.height, &w.scale, &w.top, &w.right, &w.bottom, &w.left} {
		if math.IsNaN(*p) || *p < 0 {
			*p = 0
		}
		*p = math.Min(*p, 16384)
	}
	if w.scale == 0 {
		w.scale = 1
	}
	if w != a.window {
		a.window = w
		a.dirty = true
	}
	if !a.view.themed && w.width > 0 {
		a.view.themed, a.view.night = true, in.PrefersDark
		a.dirty = true
	}
}

// takeEvents routes the events and carries out what they mean.
func (a *App) takeEvents(events []ui.Event) {
	if len(events) == 0 && !a.router.Animating() {
		return
	}
	focus, visible, pressed := a.router.Focus, a.router.FocusVisible, a.router.Pressed()
	a.actions = a.router.Route(a.actions[:0], events, a.frame.Controls, a.now)
	for i := range a.actions {
		a.act(&a.actions[i])
	}
	for i := range events {
		switch events[i].Kind {
		case ui.PointerDown, ui.PointerUp, ui.PointerCancel:
			a.dirty = true
		}
	}
	if focus != a.router.Focus || visible != a.router.FocusVisible || pressed != a.router.Pressed() {
		a.dirty = true
	}
}

// Wake is how long the outside may sleep without an event before the next Step; 0: at the next frame; negative: for ever.
func (a *App) Wake() time.Duration {
	if a.router.Animating() || a.dirty {
		return 0
	}
	if a.view.notice != "" {
		return max(a.view.noticeUntil-a.now, 0)
	}
	return -1
}

// Scene is the picture of the present state.
func (a *App) Scene() *scene.Scene { return &a.scene }

// Controls are the touchable things of that picture.
func (a *App) Controls() []ui.Control { return a.frame.Controls }

// Mirror is the same in words.
func (a *App) Mirror() *Mirror { return &a.mirror }

// FocusID is the control that has the focus, "" none.
func (a *App) FocusID() string { return a.router.Focus }

// Solves is how often today's condition was solved since the start: once a Step at most, and only when it changed.
func (a *App) Solves() int { return a.solved.count }

// Case is the case on the screen, with what a drag that is under way has made of it. It must not be changed.
func (a *App) Case() *casefile.Case { return a.doc.current }

// Committed is the case after the last finished change. It is never changed: another change is another case.
func (a *App) Committed() *casefile.Case { return a.doc.committed }

func (a *App) speedKind() string {
	switch k := a.doc.current.Display.SpeedKind; k {
	case "IAS", "TAS":
		return k
	}
	return "CAS"
}

// notify shows a notice for a moment.
func (a *App) notify(text string) {
	a.view.notice, a.view.noticeUntil, a.view.status = text, a.now+noticeTime, text
	a.dirty = true
}
