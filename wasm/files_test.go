//go:build !js

package main

import (
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/chromedp"
)

// drop drops a file on the page.
func (b *tab) drop(name, text string) {
	b.t.Helper()
	n, _ := json.Marshal(name)
	d, _ := json.Marshal(text)
	eval[bool](b, fmt.Sprintf(`(() => { const t = new DataTransfer(); t.items.add(new File([%s], %s, {type: 'application/json'}));
		document.body.dispatchEvent(new DragEvent('drop', {dataTransfer: t, bubbles: true, cancelable: true})); return true; })()`, d, n))
	b.settle()
}

// TestFiles opens a case file by dropping it, refuses a damaged one and one from a newer version without losing the
// case, and saves what levelspan reads back.
func TestFiles(t *testing.T) {
	b := newTab(t, 1280, 800, 1, false)
	b.open(singleFile(t))
	demo, err := os.ReadFile(filepath.Join("..", "assets", "case", "marram.json"))
	b.check(err)
	b.drop("lighter.json", strings.Replace(string(demo), `"mass_kg": 760`, `"mass_kg": 641`, 1))
	b.until("document.querySelector('[data-handle=mass]').getAttribute('aria-valuenow') === '641'")
	before := b.agree("opening a file")
	for name, text := range map[string]string{
		"damaged.json": string(demo[:len(demo)/2]),
		"newer.json":   strings.Replace(string(demo), `"version": 1`, `"version": 99`, 1),
		"heavy.json":   strings.Replace(string(demo), `"mass_kg": 760`, `"mass_kg": -5`, 1),
		"other.json":   "\x00\xff\x01",
	} {
		b.drop(name, text)
		b.until("document.querySelector('[inert]')") // a dialog says why
		b.do(chromedp.KeyEvent("\u001b"))
		b.settle()
		if after := b.agree("refusing " + name); after != before {
			t.Errorf("%s changed the case", name)
		}
	}

	// Saving: what is offered for download is the case.
	eval[bool](b, `(() => { const made = URL.createObjectURL; globalThis.saved = [];
		URL.createObjectURL = blob => { blob.text().then(text => saved.push(text)); return made.call(URL, blob); };
		HTMLAnchorElement.prototype.click = function () { globalThis.savedAs = this.download; }; return true; })()`)
	b.do(chromedp.KeyEvent("s", chromedp.KeyModifiers(chromedp.ModifierCtrl)))
	b.until("globalThis.saved.length === 1")
	saved := eval[string](b, "saved[0]")
	if opened := b.command("", "open", strings.TrimSpace(b.command(saved, "link", "-"))); opened != before {
		t.Errorf("saved\n%s\nshown\n%s", opened, before)
	}
	if name := eval[string](b, "savedAs"); !strings.HasSuffix(name, ".json") {
		t.Errorf("saved as %q", name)
	}
}

// TestOpenAsksForAFile goes through the picker that the Open key brings up.
func TestOpenAsksForAFile(t *testing.T) {
	b := newTab(t, 1280, 800, 1, false)
	b.open(singleFile(t))
	eval[bool](b, `(() => { HTMLInputElement.prototype.click = function () { globalThis.picker = this; }; return true; })()`)
	b.do(chromedp.KeyEvent("o", chromedp.KeyModifiers(chromedp.ModifierCtrl)))
	b.until("globalThis.picker")
	if kind := eval[string](b, "picker.type + ' ' + picker.accept"); !strings.HasPrefix(kind, "file ") || !strings.Contains(kind, ".json") {
		t.Errorf("the picker is %q", kind)
	}
	demo, err := os.ReadFile(filepath.Join("..", "assets", "case", "marram.json"))
	b.check(err)
	text, _ := json.Marshal(strings.Replace(string(demo), `"mass_kg": 760`, `"mass_kg": 702`, 1))
	eval[bool](b, fmt.Sprintf(`(() => { const t = new DataTransfer(); t.items.add(new File([%s], 'other.json')); picker.files = t.files;
		picker.onchange(); return true; })()`, text))
	b.until("document.querySelector('[data-handle=mass]').getAttribute('aria-valuenow') === '702'")
}

// TestName edits the aeroplane's name in the native field that lies over the drawn one; what it says is never markup.
func TestName(t *testing.T) {
	b := newTab(t, 1280, 800, 1, true)
	b.open(singleFile(t))
	b.clickOn("tab/aeroplane")
	x, y := b.control("field/aeroplane.name").middle()
	b.touch(input.DispatchTouchEventTypeTouchStart, &input.TouchPoint{X: x, Y: y})
	b.touch(input.DispatchTouchEventTypeTouchEnd)
	b.settle()
	if eval[string](b, "document.activeElement.tagName") != "INPUT" {
		t.Fatal("a tap does not put the focus into the field, so a tablet shows no keyboard")
	}
	const hostile = `<img src=x onerror=alert(1)>"'&amp;`
	eval[bool](b, "document.activeElement.select(), true")
	b.do(chromedp.KeyEvent(hostile))
	b.settle()
	b.do(chromedp.KeyEvent("\r"))
	b.settle()
	if eval[int](b, "document.querySelectorAll('#levelspan-page img').length") != 0 {
		t.Error("the name became markup")
	}
	file := b.agree("naming the aeroplane")
	var c struct{ Aeroplane struct{ Name string } }
	if err := json.Unmarshal([]byte(file), &c); err != nil || c.Aeroplane.Name != hostile {
		t.Errorf("the name is %q", c.Aeroplane.Name)
	}
	if title := eval[string](b, "document.getElementById('levelspan-title').textContent"); !strings.Contains(title, hostile) {
		t.Errorf("the title is %q", title)
	}
	b.clickOn("undo")
	if file := b.agree("undoing the name"); !strings.Contains(file, `"Marram"`) {
		t.Error("undo does not give the name back")
	}
}

// TestScreenReader activates elements without a pointer, and is shown the link where the clipboard is refused.
func TestScreenReader(t *testing.T) {
	b := newTab(t, 1280, 800, 1, false)
	b.open(singleFile(t))
	b.activate("tab/aeroplane")
	if got := b.attribute("[data-control='tab/aeroplane']", "aria-selected"); got != "true" {
		t.Errorf("the tab activated is selected: %q", got)
	}
	b.activate("tab/chart")
	b.activate("speed-kind/TAS")
	if got := b.attribute("[data-control='speed-kind/TAS']", "aria-checked"); got != "true" {
		t.Errorf("the radio activated is checked: %q", got)
	}
	eval[bool](b, "navigator.clipboard.writeText = () => Promise.reject(new Error('refused')), document.execCommand = () => false, true")
	b.activate("share")
	b.activate("share/link")
	b.until("!document.getElementById('levelspan-copy').hidden")
	if text := eval[string](b, "document.querySelector('#levelspan-copy textarea').value"); !strings.Contains(text, "#case=") {
		t.Errorf("shown to be copied: %q", text)
	}
	b.do(chromedp.KeyEvent("\u001b"))
	if !eval[bool](b, "document.getElementById('levelspan-copy').hidden") {
		t.Error("Escape does not close the text")
	}
	// Live regions are there before anything is said in them.
	if n := eval[int](b, "document.querySelectorAll('#levelspan-status[role=status], #levelspan-warnings[aria-live]').length"); n != 2 {
		t.Errorf("%d live regions", n)
	}
}

// TestPhone drags two handles at once with two fingers, and one finger off the edge of the window.
func TestPhone(t *testing.T) {
	b := newTab(t, 390, 844, 2, true)
	b.open(singleFile(t))
	mass, altitude := b.handle("mass"), b.handle("density-altitude")
	mx, my := b.control("handle/mass").middle()
	ax, ay := b.control("handle/density-altitude").middle()
	one, two := 1.0, 2.0
	points := func(f float64) []*input.TouchPoint {
		return []*input.TouchPoint{{X: mx - 60*f, Y: my, ID: &one}, {X: ax, Y: ay - 40*f, ID: &two}}
	}
	b.touch(input.DispatchTouchEventTypeTouchStart, points(0)[:1]...)
	b.touch(input.DispatchTouchEventTypeTouchStart, points(0)...)
	for i := 1; i <= 6; i++ {
		b.touch(input.DispatchTouchEventTypeTouchMove, points(float64(i)/6)...)
	}
	b.touch(input.DispatchTouchEventTypeTouchEnd)
	b.settle()
	if b.handle("mass") >= mass || b.handle("density-altitude") <= altitude {
		t.Errorf("two fingers: weight %v to %v, altitude %v to %v", mass, b.handle("mass"), altitude, b.handle("density-altitude"))
	}
	b.agree("two fingers")
	mx, my = b.control("handle/mass").middle()
	b.dragTouch(mx, my, 1, my+40, 6, input.DispatchTouchEventTypeTouchEnd)
	least := b.handle("mass")
	b.dragTouch(200, 300, 220, 320, 3, input.DispatchTouchEventTypeTouchEnd) // somewhere else: nothing sticks
	if b.handle("mass") != least {
		t.Error("the handle stuck to a finger that was lifted")
	}
	b.agree("a drag to the edge")
}
