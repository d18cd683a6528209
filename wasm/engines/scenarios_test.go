package engines

import (
	"encoding/json"
	"fmt"
	"maps"
	"net/http"
	"net/http/httptest"
	"net/url"
	"path/filepath"
	"slices"
	"strings"
)

// scenarios are done in turn in one browser, which keeps what the one before has left; each would do alone.
var scenarios = []struct {
	name string
	do   func(u user, e engine, file string)
}{
	{"open", opening},
	{"drag", dragging},
	{"finger", finger},
	{"keys", keys},
	{"keypad", keypad},
	{"links", links},
	{"reload", reloading},
	{"server", server},
}

// surfaces are those that an engine can be asked for.
func (e engine) surfaces() []string {
	if e.webgl2 {
		return []string{"webgl", "software"}
	}
	return []string{"software"}
}

// opening opens the page from the disk, on the surface that it chooses and on the other asked for, and looks at it in
// the window of a tablet and in that of a telephone.
func opening(u user, e engine, file string) {
	var figures map[string]float64
	for i, s := range append([]string{e.choice}, slices.DeleteFunc(e.surfaces(), func(s string) bool { return s == e.choice })...) {
		if i == 0 {
			u.open(file)
			figures = u.figures()
		} else {
			u.open(file + "?surface=" + s)
		}
		u.surface(s)
		if now := u.figures(); !maps.Equal(figures, now) {
			u.t.Errorf("%s: the figures are %v, were %v", s, now, figures)
		}
		name := e.name + "-" + s
		img := u.picture(name)
		u.seen(name, img)
		u.same("wide", name, img, 3)
		if s == "webgl" {
			continue
		}
		u.same("wide software", name, img, 0)
		u.check(u.b.size(390, 844))
		u.settle()
		img = u.picture(name + "-narrow")
		u.seen(name+"-narrow", img)
		u.same("narrow software", name+"-narrow", img, 0)
		u.check(u.b.size(1280, 800))
		u.settle()
	}
	u.agree("opening")
}

// dragging drags a handle on each surface, and on the last the other one too: the figures follow, and the handle is let go.
func dragging(u user, e engine, file string) {
	for _, s := range e.surfaces() {
		u.open(file + "?surface=" + s)
		mass, figures := u.handle("mass"), u.figures()
		u.drag("mouse", "handle/mass", -40, 0)
		dragged := u.handle("mass")
		if dragged >= mass {
			u.t.Errorf("%s: the handle does not follow: %g, then %g", s, mass, dragged)
		}
		if now := u.figures(); now["stall"] >= figures["stall"] {
			u.t.Errorf("%s: the stall does not follow the weight: %g m/s, then %g", s, figures["stall"], now["stall"])
		}
		u.move(200, 20)
		u.move(640, 300)
		if got := u.handle("mass"); got != dragged {
			u.t.Errorf("%s: the handle sticks to the mouse: %g", s, got)
		}
	}
	height := u.handle("density-altitude")
	if u.drag("mouse", "handle/density-altitude", 0, -40); u.handle("density-altitude") <= height {
		u.t.Error("the other handle does not follow")
	}
	u.agree("dragging")
}

// finger drags with a finger.
func finger(u user, e engine, file string) {
	u.open(file + "?surface=software")
	u.eval("(addEventListener('pointerdown', e => { globalThis.kind2 = e.pointerType; }, true), '')")
	before := u.handle("mass")
	u.drag("touch", "handle/mass", -30, 0)
	dragged := u.handle("mass")
	if dragged >= before {
		u.t.Errorf("the handle does not follow a finger: %g, then %g", before, dragged)
	}
	if got := u.eval("globalThis.kind2"); got != e.finger {
		u.t.Errorf("the finger came as %s, not %s", got, e.finger)
	}
	u.move(640, 300)
	if got := u.handle("mass"); got != dragged {
		u.t.Errorf("the handle sticks: %g", got)
	}
	u.tapBy("touch", "tab/aeroplane")
	if !u.has("field/aeroplane.wing_area_m2") {
		u.t.Error("a finger's tap does not open the other screen")
	}
	u.tapBy("touch", "tab/chart") // the page comes back to the screen that it was left on
	if !u.has("handle/mass") {
		u.t.Error("a finger's tap does not lead back")
	}
}

// keys moves a handle by its keys, and walks by Tab through everything that can be reached, and on.
func keys(u user, _ engine, file string) {
	u.open(file + "?surface=software")
	u.eval("(document.querySelector('[data-handle=mass]').focus(), '')")
	was := u.handle("mass")
	u.keys("\ue012") // left
	less := u.handle("mass")
	if less >= was {
		u.t.Errorf("a key does not move the handle: %g", less)
	}
	if u.keys("\ue014"); u.handle("mass") <= less { // right
		u.t.Errorf("a key does not move the handle back: %g", u.handle("mass"))
	}
	stops := strings.Fields(u.eval("[...document.querySelectorAll('#levelspan-layer [data-control][tabindex=\"0\"]:not([inert])')].map(e => e.dataset.control).join(' ')"))
	if len(stops) < 8 {
		u.t.Fatalf("Tab could only stop at %v", stops)
	}
	u.eval(`(globalThis.walk2 = [], addEventListener('focusin', e => walk2.push(e.target.dataset.control || e.target.id || e.target.tagName)),
		addEventListener('blur', e => { if (e.target === globalThis) walk2.push('(left)'); }),
		addEventListener('keydown', e => setTimeout(() => { if (e.defaultPrevented) walk2.push('(taken)'); })), '')`)
	u.eval("(document.querySelector('[data-control=\"" + stops[0] + "\"]').focus(), '')")
	u.keys(slices.Repeat([]string{"\ue004"}, len(stops)+4)...)
	var walk []string
	u.check(json.Unmarshal([]byte(u.eval("JSON.stringify(walk2)")), &walk))
	for _, s := range stops {
		if !slices.Contains(walk, s) {
			u.t.Errorf("Tab does not reach %s: %v", s, walk)
		}
	}
	if slices.Contains(walk, "(taken)") {
		u.t.Error("the page takes Tab for itself")
	}
	if !slices.Contains(walk, "(left)") && !slices.Contains(walk[1:], stops[0]) {
		u.t.Errorf("Tab neither leaves the page nor comes round: %v", walk)
	}
}

// keypad types a figure that holds and one that is refused.
func keypad(u user, _ engine, file string) {
	const field = "field/aeroplane.wing_area_m2"
	says := func(id string) string {
		return u.eval(fmt.Sprintf("(e => e ? e.getAttribute('aria-label') : '')(document.querySelector('[data-control=\"%s\"]'))", id))
	}
	u.open(file + "?surface=software")
	before := u.figures()
	u.tap("tab/aeroplane")
	u.tap(field)
	for _, k := range []string{"1", "4"} {
		u.tap("key/" + k)
	}
	u.tap("key/ok")
	if got := says(field); !strings.Contains(got, "14 m²") {
		u.t.Errorf("the field shows %q", got)
	}
	u.tap("tab/chart")
	if now := u.figures(); maps.Equal(before, now) || now["stall"] <= before["stall"] {
		u.t.Errorf("the stall does not follow the wing area: %g m/s, then %g", before["stall"], now["stall"])
	}
	if text := u.agree("typing"); !strings.Contains(text, `"wing_area_m2": 14`) {
		u.t.Errorf("the wing area typed is not in the case: %s", text)
	}
	held := u.figures()
	u.tap("tab/aeroplane")
	u.tap(field)
	u.tap("key/0")
	u.tap("key/ok")
	if got := says("key/entry"); !strings.Contains(got, "At least 0.5\u00a0m²") {
		u.t.Errorf("a wing of no area is not refused beside the figure typed: %q", got)
	}
	u.keys("\ue00c") // escape
	if got := says(field); u.has("key/ok") || !strings.Contains(got, "14 m²") {
		u.t.Errorf("after escape the field shows %q", got)
	}
	u.tap("tab/chart")
	if now := u.figures(); !maps.Equal(held, now) {
		u.t.Errorf("the wing of no area has changed the figures: %v, then %v", held, now)
	}
}

// links follows the command's link, and the page's own.
func links(u user, _ engine, file string) {
	at := file + "?surface=software"
	text := demo(u.t, "655")
	u.open(at + "#case=" + strings.TrimSpace(command(u.t, text, "link", "-")))
	if got := u.handle("mass"); got != 655 {
		u.t.Errorf("the link's weight is 655, the page's %g", got)
	}
	u.drag("mouse", "handle/mass", 40, 0)
	own, mass := u.link(), u.handle("mass")
	if base, err := url.Parse(own); err != nil || base.Scheme != "file" {
		u.t.Errorf("the page's own link is %.80q", own)
	}
	u.drag("mouse", "handle/mass", -20, 0) // so that what is kept is not what the link says
	u.open(own)
	if got := u.handle("mass"); got != mass {
		u.t.Errorf("the page's own link gives %g, not %g", got, mass)
	}
	u.agree("the page's own link")
}

// reloading finds what was changed after loading the page again from the disk, and in a new document.
func reloading(u user, _ engine, file string) {
	u.open(file + "?surface=software")
	u.drag("mouse", "handle/mass", -24, 0)
	mass := u.handle("mass")
	u.reload()
	if got := u.handle("mass"); got != mass {
		u.t.Errorf("after loading again the weight is %g, was %g; kept: %s", got, mass, u.eval("(() => { try { return Object.keys(localStorage).join(' '); } catch (e) { return e; } })()"))
	}
	u.open(file + "?surface=software")
	if got := u.handle("mass"); got != mass {
		u.t.Errorf("in a new document the weight is %g, was %g", got, mass)
	}
}

// server does the same with the page from a server, which is an origin of its own.
func server(u user, _ engine, _ string) {
	s := httptest.NewServer(http.FileServer(http.Dir(filepath.Dir(page(u.t)))))
	defer s.Close()
	at := s.URL + "/levelspan.html?surface=software"
	u.open(at)
	if got := u.handle("mass"); got != 760 {
		u.t.Errorf("another origin begins with %g kg", got)
	}
	u.drag("mouse", "handle/mass", -30, 0)
	mass := u.handle("mass")
	u.reload()
	if got := u.handle("mass"); got != mass {
		u.t.Errorf("after loading again the weight is %g, was %g", got, mass)
	}
	u.away()
}
