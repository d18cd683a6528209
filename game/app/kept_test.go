package app

import (
	"bytes"
	"errors"
	"strings"
	"testing"
	"time"

	"levelspan/assets/case"
	"levelspan/game/keep"
	"levelspan/game/ui"
)

// kept is what the storage holds under a name, "" nothing.
func (s *table) kept(name string) string {
	data, _, err := s.store().Load(name)
	if err != nil {
		return ""
	}
	return string(data)
}

func (s *table) names() string {
	list, err := s.store().List()
	if err != nil {
		return err.Error()
	}
	var names []string
	for _, e := range list {
		names = append(names, e.Name)
	}
	return strings.Join(names, ", ")
}

func TestEveryCommittedChangeIsKept(t *testing.T) {
	s := newTable()
	p := newWindow(t, 1280, 800, s)
	if s.names() != "" {
		t.Fatalf("untouched, the demo is kept: %s", s.names())
	}
	same := func(what string) {
		t.Helper()
		if got := s.kept("Marram"); got != p.file() {
			t.Fatalf("%s is not kept", what)
		}
	}
	p.dragBy(1, handleMass, -100, 0, 20, func() {})
	same("a drag")
	p.doubleTap(handleMass)
	p.typeIn("700")
	same("an exact weight")
	p.key(ui.KeyUndo)
	same("an undo")
	p.tap("speed-kind/TAS")
	same("the kind of airspeed")
	p.tap("tab/aeroplane")
	p.tap("field/aeroplane.name")
	p.event(ui.Event{Kind: ui.KeyDown, Rune: 'X'})
	same("a letter")
	p.press("field/aeroplane.engine.kind/electric")
	same("another engine")
	// A name of the aeroplane is not the name it is kept under.
	if s.names() != "Marram" {
		t.Errorf("kept: %s", s.names())
	}
	q := newWindow(t, 390, 844, s)
	if q.file() != p.file() {
		t.Error("another start shows another case")
	}
}

func TestADragIsSavedOnce(t *testing.T) {
	s := newTable()
	p := newWindow(t, 1280, 800, s)
	saves := func() int {
		_, stamp, err := s.store().Load("Marram")
		if err != nil {
			return 0
		}
		n := 0
		for _, r := range stamp {
			if r == '-' {
				break
			}
			n = 10*n + int(r-'0')
		}
		return n
	}
	x, y := middle(p.control(handleMass).Bounds)
	p.down(1, x, y)
	for i := range 30 {
		p.move(1, x-float64(10+5*i), y)
		if saves() != 0 {
			t.Fatal("a drag is saved before it ends")
		}
	}
	p.up(1, x-160, y)
	if saves() != 1 {
		t.Fatalf("a drag took %d saves", saves())
	}
	var events []ui.Event
	for i := range 5 { // five steps of the history in one Step
		events = append(events, ui.Event{Kind: ui.Activate, ID: []string{"speed-kind/IAS", "speed-kind/TAS"}[i%2], Time: p.in.Now})
	}
	in := p.in
	in.Events = events
	p.app.Step(in)
	if saves() != 2 {
		t.Errorf("a Step took %d saves", saves()-1)
	}
	for range 50 {
		p.step()
	}
	if saves() != 2 {
		t.Error("idling saves")
	}
}

func TestTheSessionComesBack(t *testing.T) {
	s := newTable()
	p := newWindow(t, 800, 1280, s)
	p.tap("limit/best_glide")
	p.tap("menu")
	p.tap("palette/night")
	p.key(ui.KeyEscape)
	p.tap("tab/aeroplane")
	p.tap("part/today")
	q := newWindow(t, 800, 1280, s)
	if q.app.Mirror().Screen != "aeroplane" || !q.app.view.today || !q.app.view.night || !q.row("best_glide").Selected {
		t.Errorf("screen %q, today %v, night %v, glide %v", q.app.Mirror().Screen, q.app.view.today, q.app.view.night, q.row("best_glide").Selected)
	}
	p.tap("tab/chart")
	p.tap("limit/best_glide")
	if q = newWindow(t, 800, 1280, s); q.app.Mirror().Screen != "chart" || q.row("best_glide").Selected {
		t.Error("the screen or the mark stays as it was before")
	}
	// The palette is the window's own until the person chooses one.
	r := newWindow(t, 800, 1280, newTable())
	r.in.PrefersDark = true
	if strings.Contains(r.app.sessionNow(), "day") {
		t.Error("a palette that nobody chose is remembered")
	}
	for _, junk := range []string{"", "limit/none chart chart", "\x00 night", strings.Repeat("x ", 1000)} {
		store := s.store()
		if err := store.SetSession(junk); err != nil {
			t.Fatal(err)
		}
		newWindow(t, 800, 1280, s)
	}
}

func TestWhatArrivesNeverOverwrites(t *testing.T) {
	s := newTable()
	p := newWindow(t, 1280, 800, s)
	p.setSlider(handleMass, 700)
	mine := s.kept("Marram")
	p.step(Opened{Name: "marram.json", Data: democase.JSON()})
	if s.names() != "Marram, Marram 2" || s.kept("Marram") != mine || s.kept("Marram 2") != p.file() {
		t.Fatalf("kept: %s", s.names())
	}
	if got := p.app.Mirror().Status; got != "Opened Marram, kept as Marram 2" {
		t.Errorf("status %q", got)
	}
	// The same again is the case that is there.
	p.step(Opened{Text: mine})
	if s.names() != "Marram, Marram 2" || p.app.doc.kept != "Marram" {
		t.Errorf("kept: %s, on the screen %s", s.names(), p.app.doc.kept)
	}
	p.setSlider(handleMass, 640)
	p.tap("undo") // the weight
	p.tap("undo") // the second opening
	if p.app.doc.kept != "Marram 2" || s.kept("Marram") != mine {
		t.Error("undoing the opening changes what is kept")
	}
	p.setSlider(handleMass, 655)
	if p.app.doc.kept != "Marram 2" || s.kept("Marram") != mine || s.kept("Marram 2") != p.file() {
		t.Error("a change after undoing the opening goes to the wrong case")
	}
}

func TestCasesSheet(t *testing.T) {
	s := newTable()
	p := newWindow(t, 390, 844, s)
	open := func() { p.press("menu"); p.press("cases") }
	open()
	if !p.says("the demonstration") {
		t.Error("the demo is not in the list")
	}
	p.press("cases/new")
	p.setSlider(handleMass, 700)
	s.now += 60
	open()
	p.press("cases/new")
	if s.names() != "Marram 2, Marram" && s.names() != "Marram, Marram 2" {
		t.Fatalf("kept: %s", s.names())
	}
	first := "Marram"
	if p.app.doc.kept != "Marram 2" {
		t.Fatalf("on the screen: %s", p.app.doc.kept)
	}
	open()
	if c := p.control("case/open/" + keep.Escape("Marram 2")); !c.Selected {
		t.Error("the case on the screen is not marked")
	}
	p.press("case/more/" + keep.Escape(first))
	p.press("case/copy/" + keep.Escape(first))
	if s.kept("Marram 3") != s.kept(first) || s.kept("Marram 3") == "" {
		t.Fatalf("no copy: %s", s.names())
	}
	// A name that is taken, and one that is none, are refused; a good one is taken.
	p.press("case/more/" + keep.Escape("Marram 2"))
	p.press("case/rename/" + keep.Escape("Marram 2"))
	for _, bad := range []string{"Marram", "", "   "} {
		p.event(ui.Event{Kind: ui.SetText, ID: entryName, Text: bad})
		p.press("case/save/" + keep.Escape("Marram 2"))
		if c := p.control(entryName); c.Error == "" {
			t.Errorf("the name %q is taken", bad)
		}
	}
	p.event(ui.Event{Kind: ui.SetText, ID: entryName, Text: " Tow <b>plane</b> "})
	p.event(ui.Event{Kind: ui.KeyDown, ID: entryName, Key: ui.KeyEnter})
	if p.app.doc.kept != "Tow <b>plane</b>" || s.kept("Marram 2") != "" || s.kept(p.app.doc.kept) != p.file() {
		t.Fatalf("renamed: %q, kept: %s", p.app.doc.kept, s.names())
	}
	p.key(ui.KeyEscape)
	p.setSlider(handleMass, 650)
	if s.kept("Tow <b>plane</b>") != p.file() || s.kept("Marram 2") != "" {
		t.Error("a change goes to the old name")
	}
	// Opening another and deleting what is on the screen.
	open()
	p.press("case/open/" + keep.Escape(first))
	if p.app.doc.kept != first || p.file() != s.kept(first) {
		t.Fatalf("on the screen: %s", p.app.doc.kept)
	}
	gone := p.file()
	open()
	p.press("case/more/" + keep.Escape(first))
	p.press("case/delete/" + keep.Escape(first))
	if s.kept(first) == "" {
		t.Fatal("deleted without asking")
	}
	p.press("cases") // keep it
	if s.kept(first) == "" || p.find("case/open/"+keep.Escape(first)) == nil {
		t.Fatal("not kept")
	}
	p.press("case/more/" + keep.Escape(first))
	p.press("case/delete/" + keep.Escape(first))
	p.press("case/gone/" + keep.Escape(first))
	if s.kept(first) != "" || p.app.doc.kept == first {
		t.Fatalf("kept: %s, on the screen: %s", s.names(), p.app.doc.kept)
	}
	p.press("removed/back/" + keep.Escape(first))
	if s.kept(first) != gone {
		t.Error("a deleted case does not come back")
	}
}

func TestDeletingTheLastCase(t *testing.T) {
	s := newTable()
	p := newWindow(t, 1280, 800, s)
	p.setSlider(handleMass, 700)
	file := p.file()
	p.tap("menu")
	p.tap("cases")
	p.tap("case/more/" + keep.Escape("Marram"))
	p.tap("case/delete/" + keep.Escape("Marram"))
	p.tap("case/gone/" + keep.Escape("Marram"))
	if s.names() != "" || p.app.Case().Today.MassKg == 700 {
		t.Fatalf("kept: %q, %g kg on the screen", s.names(), p.app.Case().Today.MassKg)
	}
	p.tap("sheet/close")
	p.key(ui.KeyUndo)
	if p.file() != file || s.kept("Marram") != file {
		t.Error("undo does not bring it back")
	}
	q := newWindow(t, 1280, 800, s)
	if q.file() != file {
		t.Error("it is not there at the next start")
	}
}

func TestTwoWindowsOnOneCase(t *testing.T) {
	for _, take := range []bool{false, true} {
		for _, told := range []bool{false, true} {
			s := newTable()
			a := newWindow(t, 1280, 800, s)
			a.setSlider(handleMass, 700)
			b := newWindow(t, 1280, 800, s)
			b.setSlider(handleMass, 620)
			theirs, mine := b.file(), a.file()
			if told { // the storage event comes
				in := a.in
				in.StoreChanged = true
				a.app.Step(in)
			} else {
				a.setSlider(handleMass, 705)
				mine = a.file()
			}
			if a.find("conflict/both") == nil || !a.says("changed in another window") {
				t.Fatalf("told %v: nothing is said", told)
			}
			// Whatever happens now, both are there.
			if s.kept("Marram") != theirs || s.kept("Marram 2") != mine {
				t.Fatalf("told %v: lost one: %s", told, s.names())
			}
			if take {
				a.tap("conflict/other")
				if a.file() != theirs || s.kept("Marram") != theirs || s.names() != "Marram" {
					t.Errorf("told %v: taking the other gives %g kg; kept: %s", told, a.app.Case().Today.MassKg, s.names())
				}
				a.tap("undo")
				if a.file() != mine || s.kept("Marram") != theirs || s.kept(a.app.doc.kept) != mine {
					t.Errorf("told %v: undo does not bring mine back beside theirs; kept: %s", told, s.names())
				}
			} else {
				a.key(ui.KeyEscape)
				if a.file() != mine || a.app.doc.kept != "Marram 2" {
					t.Errorf("told %v: keeping both shows %s", told, a.app.doc.kept)
				}
				a.setSlider(handleMass, 690)
				a.tap("undo")
				a.tap("undo")
			}
			if b.setSlider(handleMass, 615); b.find("conflict/both") != nil && !take {
				t.Error("the other window is asked about it too")
			}
			if s.kept("Marram") == mine {
				t.Error("the other window's version was overwritten")
			}
		}
	}
}

func TestTheSameChangeIsNoConflict(t *testing.T) {
	s := newTable()
	a := newWindow(t, 1280, 800, s)
	a.setSlider(handleMass, 700)
	b := newWindow(t, 1280, 800, s)
	b.setSlider(handleMass, 620)
	a.setSlider(handleMass, 620)
	if a.find("conflict/both") != nil || s.names() != "Marram" {
		t.Errorf("asked about nothing; kept: %s", s.names())
	}
	// Deleted there, changed here: the change is kept, and said.
	if err := s.store().Delete("Marram", ""); err != nil {
		t.Fatal(err)
	}
	a.setSlider(handleMass, 610)
	if s.kept("Marram") != a.file() || !strings.Contains(a.app.Mirror().Status, "deleted in another window") {
		t.Errorf("kept: %s, status %q", s.names(), a.app.Mirror().Status)
	}
}

func TestAStoreEventInADragWaits(t *testing.T) {
	s := newTable()
	a := newWindow(t, 1280, 800, s)
	a.setSlider(handleMass, 700)
	b := newWindow(t, 1280, 800, s)
	x, y := middle(a.control(handleMass).Bounds)
	a.down(1, x, y)
	a.move(1, x-60, y)
	b.setSlider(handleMass, 620)
	in := a.in
	in.StoreChanged = true
	a.app.Step(in)
	if a.find("conflict/both") != nil {
		t.Fatal("a dialog comes under the finger")
	}
	a.move(1, x-90, y)
	a.up(1, x-90, y)
	if a.find("conflict/both") == nil {
		t.Fatal("nothing is said after the drag")
	}
	if s.kept("Marram") != b.file() || s.kept("Marram 2") != a.file() {
		t.Error("a version is lost")
	}
}

func TestFullOrDeniedStorageIsSaidOnce(t *testing.T) {
	for _, c := range []struct {
		err  error
		says string
	}{{keep.ErrFull, "the storage is full"}, {keep.ErrDenied, "the storage cannot be used"}, {errors.New("odd"), "the storage cannot be used"}} {
		s := newTable()
		p := newWindow(t, 1280, 800, s)
		s.err = c.err
		p.setSlider(handleMass, 700)
		if !p.says(c.says) || !p.says("as a file or as text") {
			t.Fatalf("%v is not said", c.err)
		}
		p.tap("failure/dismiss")
		p.setSlider(handleMass, 710)
		p.sameAsSolve()
		if p.find("failure/dismiss") != nil {
			t.Error("said twice")
		}
		warned := strings.Join(p.app.Mirror().Warnings, " ")
		if !strings.Contains(warned, c.says) || !p.says(c.says) {
			t.Errorf("the strip does not say it any more: %q", warned)
		}
		p.tap("cautions")
		p.tap("share/text")
		p.tap("cautions")
		p.tap("save")
		if len(p.host.copied) != 1 || len(p.host.saved) != 1 {
			t.Error("no way out of the dialog")
		}
		s.err = nil
		p.setSlider(handleMass, 720)
		if s.kept("Marram") != p.file() || p.app.Mirror().Status != "Changes are kept again" || len(p.app.Mirror().Warnings) > 0 && strings.Contains(p.app.Mirror().Warnings[0], c.says) {
			t.Errorf("not kept again: %q", p.app.Mirror().Status)
		}
	}
}

func TestStartWithWhatIsDamagedOrNewer(t *testing.T) {
	newer := bytes.Replace(democase.JSON(), []byte(`"version": 1`), []byte(`"version": 99`), 1)
	for name, data := range map[string][]byte{"newer": newer, "junk": []byte("{"), "empty": {}} {
		s := newTable()
		store := s.store()
		if _, err := store.Save("Old", data, ""); err != nil {
			t.Fatal(err)
		}
		if err := store.SetCurrent("Old"); err != nil {
			t.Fatal(err)
		}
		p := newWindow(t, 1280, 800, s)
		if !p.says("cannot be read") || p.app.Mirror().Title != "Marram" {
			t.Errorf("%s: nothing is said", name)
		}
		p.tap("dialog/ok")
		p.setSlider(handleMass, 700)
		if s.kept("Old") != string(data) || s.kept("Marram") != p.file() {
			t.Errorf("%s: what cannot be read is lost: %s", name, s.names())
		}
	}
}

func TestStartWithALinkKeepsTheOthers(t *testing.T) {
	s := newTable()
	p := newWindow(t, 1280, 800, s)
	p.setSlider(handleMass, 700)
	mine := p.file()
	demo := democase.JSON()
	q := &pilot{t: t, host: &testHost{}, in: Input{Width: 800, Height: 1280, Scale: 1}}
	q.app = NewWith(Options{Host: q.host, Store: s.store(), Open: &Opened{Data: demo}})
	q.step()
	if s.kept("Marram") != mine || s.kept("Marram 2") != q.file() {
		t.Errorf("kept: %s", s.names())
	}
}

func TestWhenText(t *testing.T) {
	now := time.Date(2025, 3, 1, 0, 30, 0, 0, time.FixedZone("x", 3600))
	for _, c := range []struct {
		at   time.Time
		want string
	}{
		{now.Add(-20 * time.Minute), "today 00:10"}, {now.Add(-time.Hour), "yesterday 23:30"}, {now.AddDate(0, 0, -2), "27 Feb 00:30"},
		{now.AddDate(-1, 0, 0), "1 Mar 2024"}, {now.Add(48 * time.Hour), "3 Mar 00:30"},
	} {
		if got := whenText(c.at.Unix(), now); got != c.want {
			t.Errorf("%v is %q, want %q", c.at, got, c.want)
		}
	}
}
