package app

import (
	"bytes"
	"strings"
	"testing"

	"levelspan/assets/case"
	"levelspan/perf/casefile"
)

// otherCase is the demo under another name and lighter.
func otherCase(t *testing.T) *casefile.Case {
	t.Helper()
	c, _, err := casefile.Parse(democase.JSON())
	if err != nil {
		t.Fatal(err)
	}
	c.Aeroplane.Name, c.Today.MassKg = "Dunlin", 655
	return c
}

func TestBadCasesLeaveTheOldOne(t *testing.T) {
	other := otherCase(t)
	good, fragment := string(other.Marshal()), other.Fragment()
	for _, bad := range []struct {
		name   string
		opened Opened
		says   string
	}{
		{"cut short", Opened{Name: "marram.json", Data: []byte(good[:len(good)/2])}, "damaged"},
		{"empty", Opened{Name: "empty.json", Data: []byte{}}, "damaged"},
		{"no JSON", Opened{Name: "photo.jpg", Data: []byte("\xff\xd8\xff\xe0 picture")}, "photo.jpg"},
		{"newer", Opened{Name: "x.json", Data: []byte(strings.Replace(good, `"version": 1`, `"version": 99`, 1))}, "newer version"},
		{"unphysical", Opened{Name: "x.json", Data: []byte(strings.Replace(good, `"wing_area_m2": 16.5`, `"wing_area_m2": -3`, 1))}, "wing_area_m2"},
		{"link cut short", Opened{Link: "#case=" + fragment[:len(fragment)-20]}, "The link"},
		{"no link", Opened{Link: "#case=%%%"}, "The link"},
		{"unreadable", Opened{Name: "x.json", Err: "permission denied"}, "permission denied"},
	} {
		p := newPilot(t, 1280, 800)
		p.setSlider(handleMass, 700)
		file := p.file()
		p.step(bad.opened)
		if p.file() != file || p.app.Mirror().Title != "Marram" {
			t.Errorf("%s: the old case is gone", bad.name)
		}
		if !p.says(bad.says) || !p.says("Nothing has changed") {
			t.Errorf("%s: the dialog does not say %q", bad.name, bad.says)
		}
		p.tap("dialog/ok")
		if p.find("dialog/ok") != nil || p.says("Nothing has changed") {
			t.Errorf("%s: the dialog stays", bad.name)
		}
		p.tap("undo")
		if p.app.Case().Today.MassKg == 700 {
			t.Errorf("%s: the history is lost", bad.name)
		}
	}
}

func TestOpeningCanBeUndone(t *testing.T) {
	p := newPilot(t, 800, 1280)
	file := p.file()
	other := otherCase(t)
	p.step(Opened{Name: "dunlin.json", Data: other.Marshal()})
	if p.app.Mirror().Title != "Dunlin" || p.app.Mirror().Status != "Opened Dunlin" {
		t.Fatalf("title %q, status %q", p.app.Mirror().Title, p.app.Mirror().Status)
	}
	p.sameAsSolve()
	p.tap("undo")
	if p.file() != file {
		t.Error("undo does not bring the old case back")
	}
	p.tap("redo")
	if p.app.Mirror().Title != "Dunlin" {
		t.Error("redo does not open it again")
	}
}

func TestOpeningDuringADrag(t *testing.T) {
	p := newPilot(t, 1280, 800)
	x, y := middle(p.control(handleMass).Bounds)
	p.down(1, x, y)
	p.move(1, x-50, y)
	p.step(Opened{Data: otherCase(t).Marshal()})
	p.move(1, x-90, y)
	p.up(1, x-90, y)
	if got := p.app.Mirror().Title; got != "Dunlin" {
		t.Errorf("title %q", got)
	}
	p.sameAsSolve()
}

func TestUnknownKeysAreSaidAndKept(t *testing.T) {
	p := newPilot(t, 1280, 800)
	data := bytes.Replace(otherCase(t).Marshal(), []byte(`"wing_area_m2"`), []byte(`"paint": "grey", "wing_area_m2"`), 1)
	p.step(Opened{Data: data})
	if !p.says("paint") {
		t.Error("an unknown key is not named")
	}
	p.tap("dialog/ok")
	p.setSlider(handleMass, 640)
	p.tap("menu")
	p.tap("save")
	saved := p.host.saved["dunlin.levelspan.json"]
	if !bytes.Contains(saved, []byte(`"paint"`)) || !bytes.Contains(saved, []byte(`"mass_kg": 640`)) {
		t.Errorf("saved %d bytes without the key or the mass", len(saved))
	}
}

func TestShareLinkRoundTrip(t *testing.T) {
	p := newPilot(t, 1280, 800)
	p.setSlider(handleMass, 688)
	p.tap("limit/best_glide")
	p.tap("share")
	p.tap("share/link")
	if len(p.host.copied) != 1 {
		t.Fatalf("%d texts were copied", len(p.host.copied))
	}
	link := p.host.copied[0]
	if !strings.HasPrefix(link, "https://example.org/levelspan.html#case=") {
		t.Fatalf("link %.60q", link)
	}
	q := newPilot(t, 390, 844)
	q.step(Opened{Link: link})
	if got := q.app.Case().Today.MassKg; got != 688 {
		t.Errorf("mass %g", got)
	}
	if !q.row("best_glide").Selected {
		t.Error("the marked limit is not in the link")
	}
	if got, want := q.app.presentCase().Marshal(), p.app.presentCase().Marshal(); !bytes.Equal(got, want) {
		t.Error("the case is another after the link")
	}
	q.sameAsSolve()
}

func TestNewWithABadFile(t *testing.T) {
	app := New(&testHost{}, []byte("{"))
	app.Step(Input{Width: 800, Height: 600, Scale: 1})
	if app.Mirror().Title != "Marram" || !strings.Contains(string(app.Scene().Text), "damaged") {
		t.Error("a bad file at the start is not said, or there is no aeroplane")
	}
	if app.doc.nextUndo() != "" {
		t.Error("there is something to undo at the start")
	}
}

func TestFileName(t *testing.T) {
	for name, want := range map[string]string{
		"Marram": "marram", "  Long Name / 2 ": "long-name-2", "../../x": "x", "Ærø": "r", "øøø": "aeroplane", "": "aeroplane",
	} {
		if got := fileName(name); got != want+".levelspan.json" {
			t.Errorf("fileName(%q) = %q", name, got)
		}
	}
}

func TestNoticesFade(t *testing.T) {
	p := newPilot(t, 1280, 800)
	in := p.in
	in.Notices = []string{"copied"}
	p.app.Step(in)
	if !p.says("copied") || p.app.Mirror().Status != "copied" {
		t.Fatal("a notice is not shown")
	}
	if w := p.app.Wake(); w <= 0 || w > noticeTime {
		t.Errorf("Wake is %v", w)
	}
	p.in.Now += noticeTime
	if !p.step() || p.says("copied") {
		t.Error("a notice stays")
	}
	in = p.in
	in.Failures = []string{"the file could not be written"}
	p.app.Step(in)
	p.in.Now += 10 * noticeTime
	p.step()
	if !p.says("could not be written") {
		t.Error("a failure fades")
	}
	p.tap("failure/dismiss")
	if p.says("could not be written") {
		t.Error("a dismissed failure stays")
	}
}
