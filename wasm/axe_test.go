//go:build !js

package main

import (
	"encoding/json"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
)

// axeVersion is the release of axe-core, the accessibility checker, that the page is held against.
const axeVersion = "4.14.1"

// axe is the checker's script. npm brings it into the user's cache; it is no part of the project.
func axe(t *testing.T) string {
	t.Helper()
	cache, err := os.UserCacheDir()
	if err != nil {
		cache = os.TempDir()
	}
	dir := filepath.Join(cache, "levelspan-test")
	script := filepath.Join(dir, "axe-"+axeVersion+".js")
	if text, err := os.ReadFile(script); err == nil {
		return string(text)
	}
	if err := os.MkdirAll(dir, 0o755); err != nil {
		t.Fatal(err)
	}
	into, err := os.MkdirTemp(dir, "npm")
	if err != nil {
		t.Fatal(err)
	}
	defer os.RemoveAll(into)
	if said, err := exec.Command("npm", "install", "--prefix", into, "--no-save", "--ignore-scripts", "--no-audit", "--no-fund", "axe-core@"+axeVersion).CombinedOutput(); err != nil {
		t.Logf("npm: %v\n%s", err, said)
		without(t, "axe-core")
	}
	text, err := os.ReadFile(filepath.Join(into, "node_modules", "axe-core", "axe.min.js"))
	if err != nil {
		t.Fatal(err)
	}
	if err := os.Rename(filepath.Join(into, "node_modules", "axe-core", "axe.min.js"), script); err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// screens are the states of the page that are looked at, as the controls to tap from the chart.
var screens = []struct {
	name string
	taps []string
}{
	{"chart", nil},
	{"limit", []string{"limit/fastest_climb"}},
	{"aeroplane", []string{"tab/aeroplane"}},
	{"help", []string{"tab/aeroplane", "help/field/aeroplane.wing_area_m2"}},
	{"keypad", []string{"tab/aeroplane", "field/aeroplane.wing_area_m2"}},
	{"refused", []string{"tab/aeroplane", "field/aeroplane.wing_area_m2", "key/0", "key/ok"}},
	{"menu", []string{"menu"}},
	{"about", []string{"menu", "about"}},
	{"share", []string{"share"}},
	{"code", []string{"share", "share/code"}},
	{"cases", []string{"menu", "cases"}},
	{"open", []string{"menu", "paste"}},
}

// TestAxe lets axe-core look at every screen, wide and narrow, by day and by night: nothing serious, nothing critical.
func TestAxe(t *testing.T) {
	script := axe(t)
	for _, size := range [][2]int{{1280, 800}, {390, 844}} {
		b := newTab(t, size[0], size[1], 1, false)
		for _, night := range []bool{false, true} {
			b.forget()
			b.open(singleFile(t) + "?surface=software")
			if night {
				b.press("menu")
				b.press("palette/night")
			}
			eval[bool](b, script+"; true")
			for _, s := range screens {
				for range 2 { // back to the chart, whatever is open
					b.do(chromedp.KeyEvent("\u001b"))
					b.settle()
				}
				b.press("tab/chart")
				for _, id := range s.taps {
					b.press(id)
				}
				found := eval[string](b, `axe.run(document, {resultTypes: ['violations']}).then(r => JSON.stringify(r.violations
					.filter(v => v.impact === 'serious' || v.impact === 'critical')
					.map(v => ({ID: v.id, Impact: v.impact, Help: v.help, Where: v.nodes.slice(0, 3).map(n => n.html.slice(0, 160)).join(' | ')}))))`, awaitPromise)
				var violations []struct{ ID, Impact, Help, Where string }
				b.check(json.Unmarshal([]byte(found), &violations))
				for _, v := range violations {
					t.Errorf("%s at %dx%d, night %v: %s (%s): %s: %s", s.name, size[0], size[1], night, v.ID, v.Impact, v.Help, v.Where)
				}
			}
		}
	}
}

// forget empties the page's stores, so that the next opening is a first one.
func (b *tab) forget() {
	b.t.Helper()
	if eval[bool](b, "location.protocol !== 'about:'") {
		eval[bool](b, "localStorage.clear(), sessionStorage.clear(), true")
	}
	b.do(chromedp.Navigate("about:blank"))
}

// press activates a control by its element, as a screen reader does.
func (b *tab) press(id string) {
	b.t.Helper()
	name, _ := json.Marshal(id)
	if !eval[bool](b, fmt.Sprintf("(e => { if (e) e.click(); return !!e; })(document.querySelector('[data-control=' + CSS.escape(%s) + ']'))", name)) {
		b.t.Fatalf("no element for control %s; there are %s", id,
			eval[string](b, "[...document.querySelectorAll('[data-control]')].map(e => e.dataset.control).join(' ')"))
	}
	b.settle()
}

// TestAnnouncements watches the regions that a screen reader reads out: silent during a drag, one text when it has been
// quiet for half a second, none when the text is the same.
func TestAnnouncements(t *testing.T) {
	b := newTab(t, 1280, 800, 1, false)
	b.open(singleFile(t) + "?surface=software")
	type said struct {
		At   float64
		Text string
	}
	heard := eval[string](b, `new Promise(done => {
		const heard = [], regions = [...document.querySelectorAll('[aria-live]:not([aria-live=off]),[role=status]')].filter(e => !e.closest('[hidden]'));
		for (const r of regions) new MutationObserver(() => heard.push({At: performance.now() - last, Text: r.textContent})).observe(r, {childList: true, characterData: true, subtree: true});
		const layer = document.getElementById('levelspan-layer'), box = document.querySelector('[data-handle=mass]').getBoundingClientRect();
		const x = box.x + box.width / 2, y = box.y + box.height / 2;
		const send = (kind, dx) => layer.dispatchEvent(new PointerEvent(kind, {bubbles: true, pointerId: 7, pointerType: 'touch', clientX: x + dx, clientY: y, button: 0, buttons: 1}));
		let last = performance.now(), i = 0;
		send('pointerdown', 0);
		const move = setInterval(() => {
			last = performance.now();
			send('pointermove', ++i < 60 ? 60 - 2 * i : 90); // into the weights above the maximum, and out of them
			if (i === 60) {
				clearInterval(move);
				send('pointerup', 90);
				setTimeout(() => done(JSON.stringify(heard)), 2500);
			}
		}, 30);
	})`, awaitPromise)
	var all []said
	b.check(json.Unmarshal([]byte(heard), &all))
	texts := map[string]int{}
	for _, s := range all {
		if s.Text == "" {
			continue
		}
		texts[s.Text]++
		if s.At < 490 {
			t.Errorf("%q is read out %.0f ms after the last move", s.Text, s.At)
		}
	}
	if len(texts) == 0 {
		t.Error("nothing is read out, though the weight is above the maximum now")
	}
	for text, n := range texts {
		if n > 1 {
			t.Errorf("%q is read out %d times", text, n)
		}
	}
	if !strings.Contains(heard, "maximum") {
		t.Errorf("the caution of the weight is not read out: %s", heard)
	}
}

// TestAnnouncementWaitsForTheHand changes a figure and then holds a finger still on a handle, which changes nothing that is
// drawn: what there is to say waits all the same.
func TestAnnouncementWaitsForTheHand(t *testing.T) {
	b := newTab(t, 1280, 800, 1, false)
	b.open(singleFile(t) + "?surface=software")
	after := eval[float64](b, `new Promise(done => {
		const region = document.getElementById('levelspan-warnings'), layer = document.getElementById('levelspan-layer');
		const box = document.querySelector('[data-handle=mass]').getBoundingClientRect(), x = box.x + box.width / 2, y = box.y + box.height / 2;
		const send = kind => layer.dispatchEvent(new PointerEvent(kind, {bubbles: true, pointerId: 7, pointerType: 'touch', clientX: x, clientY: y, button: 0, buttons: 1}));
		let last = 0, held = 0;
		const start = () => {
			new MutationObserver(() => done(performance.now() - last)).observe(region, {childList: true, characterData: true, subtree: true});
			levelspan.push(levelspan.VALUE, {id: 'handle/mass', value: 830}); // above the maximum: a caution
			send('pointerdown');
			const hold = setInterval(() => { last = performance.now(); send('pointermove'); if (++held === 15) { clearInterval(hold); send('pointerup'); } }, 100);
		};
		setTimeout(start, 1500); // what the page said at its start has been said
		setTimeout(() => done(-1), 9000);
	})`, awaitPromise)
	if after < 490 {
		t.Errorf("read out %.0f ms after the last touch; -1: never", after)
	}
}

// TestKeysOfTheBrowser leaves the browser's own keys to it, and lets Tab walk through the page and out of it.
func TestKeysOfTheBrowser(t *testing.T) {
	b := newTab(t, 1280, 800, 1, false)
	b.open(singleFile(t) + "?surface=software")
	taken := eval[[]string](b, `(() => { const taken = []; document.querySelector('[data-handle=mass]').focus();
		for (const [key, o] of [['Tab', {}], ['Tab', {shiftKey: true}], ['F5', {}], ['F11', {}], ['F12', {}], ['l', {ctrlKey: true}], ['r', {ctrlKey: true}],
			['t', {ctrlKey: true}], ['w', {ctrlKey: true}], ['+', {ctrlKey: true}], ['-', {ctrlKey: true}], ['0', {ctrlKey: true}], ['p', {ctrlKey: true}], ['f', {ctrlKey: true}],
			['ArrowLeft', {altKey: true}], ['d', {altKey: true}], ['r', {metaKey: true}]]) {
			const e = new KeyboardEvent('keydown', Object.assign({key, bubbles: true, cancelable: true}, o));
			document.activeElement.dispatchEvent(e);
			if (e.defaultPrevented) taken.push(key + JSON.stringify(o));
		}
		return taken; })()`)
	if len(taken) > 0 {
		t.Errorf("the page takes the browser's keys %v", taken)
	}
	b.do(chromedp.Navigate("about:blank"))
	b.open(singleFile(t) + "?surface=software")
	walk := map[string]bool{}
	left := false
	for range 120 {
		b.do(chromedp.KeyEvent("\t"))
		at := eval[string](b, "(e => e && e !== document.body ? e.dataset.control || e.id || e.tagName : '')(document.activeElement)")
		if at == "" && len(walk) > 0 {
			left = true
			break
		}
		walk[at] = true
	}
	if !left {
		t.Error("Tab does not leave the page")
	}
	for _, id := range []string{"handle/mass", "handle/density-altitude", "share", "menu", "limit/stall", "speed-kind/CAS"} {
		if !walk[id] {
			t.Errorf("Tab does not reach %s; it reaches %v", id, walk)
		}
	}
}
