//go:build !js

package main

import (
	"fmt"
	"image/color"
	"strings"
	"testing"
	"time"

	"levelspan/game/ui"
)

// injection is a way in which the program can die. Arm runs before any script of the page, strike when it works.
type injection struct{ name, arm, strike, says string }

// trapping lets a test make the program trap at its next look at the clock: nothing in the page can.
const trapping = `(() => { const made = WebAssembly.instantiate;
	WebAssembly.instantiate = async (bytes, imports) => {
		if (imports && imports.gojs) {
			const trap = new WebAssembly.Instance(new WebAssembly.Module(new Uint8Array([0, 97, 115, 109, 1, 0, 0, 0, 1, 4, 1, 96, 0, 0, 3, 2, 1, 0,
				7, 5, 1, 1, 116, 0, 0, 10, 5, 1, 3, 0, 0, 11]))).exports.t; // a function that is "unreachable"
			const now = imports.gojs['runtime.nanotime1'];
			imports.gojs['runtime.nanotime1'] = sp => { if (globalThis.strike) trap(); return now(sp); };
		}
		return made(bytes, imports);
	}; })();`

// narrow gives the program's memory an end, 64 MB above its beginning, as a small tablet would.
const narrow = `(() => { const made = WebAssembly.instantiate;
	WebAssembly.instantiate = (bytes, imports) => {
		if (!imports || !imports.gojs) return made(bytes, imports);
		const number = at => { let v = 0, s = 0, b; do { b = bytes[at++]; v += (b & 127) * 2 ** s; s += 7; } while (b & 128); return [v, at]; };
		const leb = v => { const out = []; do { out.push(v & 127 | (v > 127 ? 128 : 0)); v = Math.floor(v / 128); } while (v); return out; };
		for (let at = 8; at < bytes.length;) {
			const id = bytes[at], [size, body] = number(at + 1);
			if (id === 5) {
				const least = number(body + 2)[0], section = [1, 1, ...leb(least), ...leb(least + 1024)];
				const head = bytes.subarray(0, at), tail = bytes.subarray(body + size), all = new Uint8Array(head.length + 2 + section.length + tail.length);
				all.set(head); all.set([5, section.length, ...section], head.length); all.set(tail, head.length + 2 + section.length);
				return made(all, imports);
			}
			at = body + size;
		}
		throw new Error('no memory section');
	}; })();`

const push = "setTimeout(() => levelspan.push(levelspan.KEY, {key: 3, id: 'handle/mass'}))"

var injections = []injection{
	{"panic", "", "levelspan.drain = () => 'no number'; " + push, "panic"},
	{"trap", trapping, "globalThis.strike = true; " + push, "unreachable"},
	{"memory", narrow, "levelspan.file = () => ({length: 1 << 28}); setTimeout(() => levelspan.push(levelspan.FILE, {id: 'large.json', value: 0}))", "out of memory"},
	{"heartbeat", "", "levelspan.onpaint = () => {}; levelspan.onwake = () => {}; " + push, "not answered for 3 seconds"},
	{"script", "", "setTimeout(() => { throw new Error('a broken script'); })", "a broken script"},
	{"promise", "", "Promise.reject(new Error('a broken promise'))", "a broken promise"},
}

// TestFailLoudly kills the program in each way on each surface, after a change: the canvas is covered and no figure is
// left to read, the case offered for copying is the one last seen, and after loading again it is there.
func TestFailLoudly(t *testing.T) {
	for _, surface := range []string{"software", "webgl"} {
		for n, i := range injections {
			if surface == "webgl" && n > 3 {
				continue // the scripts of the page are the same on either surface
			}
			t.Run(surface+"/"+i.name, func(t *testing.T) {
				b := newTab(t, 1000, 700, 1, false)
				if i.arm != "" {
					b.before(i.arm)
				}
				address := singleFile(t) + "?surface=" + surface
				b.open(address)
				x, y := b.control("handle/mass").middle()
				b.dragMouse(x, y, x-60, y, 4)
				mass := b.handle("mass")
				want := b.caseFile()
				eval[bool](b, "(() => { "+i.strike+"; })(), true")
				b.until("!document.getElementById('levelspan-stop').hidden")
				b.covered(i.says)
				text := eval[string](b, "document.querySelector('#levelspan-stop textarea').value")
				if got := b.command("", "open", strings.TrimSpace(b.command(text, "link", "-"))); got != want {
					t.Errorf("the case to copy is\n%s\nshown was\n%s", got, want)
				}
				b.open(address)
				if got := b.handle("mass"); got != mass {
					t.Errorf("after loading again the weight is %g, was %g", got, mass)
				}
				b.agree("loading again")
				eval[bool](b, "localStorage.clear(), true")
			})
		}
	}
}

// covered demands that nothing but the message that all has stopped can be seen, read out or reached.
func (b *tab) covered(says string) {
	b.t.Helper()
	time.Sleep(100 * time.Millisecond)
	if n := eval[int](b, `(() => { let n = 0; for (let x = 5; x < innerWidth; x += 45) for (let y = 5; y < innerHeight; y += 45)
		if (!document.elementFromPoint(x, y).closest('#levelspan-stop')) n++; return n; })()`); n != 0 {
		b.t.Errorf("%d places of the window are not covered", n)
	}
	img, _ := b.picture()
	for _, theme := range []*ui.Theme{ui.Day(), ui.Night()} {
		for _, c := range []struct{ R, G, B uint8 }{{theme.Available.R, theme.Available.G, theme.Available.B}, {theme.Good.R, theme.Good.G, theme.Good.B}} {
			n := 0
			for y := range img.Bounds().Dy() {
				for x := range img.Bounds().Dx() {
					if p := color.RGBAModel.Convert(img.At(x, y)).(color.RGBA); p.R == c.R && p.G == c.G && p.B == c.B {
						n++
					}
				}
			}
			if n > 0 {
				b.t.Errorf("%d pixels of the chart's colour %v are seen", n, c)
			}
		}
	}
	if n := eval[int](b, "document.querySelectorAll('#levelspan-limits tbody tr, #levelspan-facts *, #levelspan-warnings *').length"); n != 0 {
		b.t.Errorf("%d figures are in the mirror", n)
	}
	if !eval[bool](b, "document.getElementById('levelspan-page').hidden && document.getElementById('levelspan-stop').contains(document.activeElement)") {
		b.t.Error("the page is still there beside the message, or the focus is not in it")
	}
	if text := eval[string](b, "document.getElementById('levelspan-stop').innerText"); !strings.Contains(text, says) || !strings.Contains(text, "stale") {
		b.t.Errorf("the message is %q, without %q", text, says)
	}
	if b.attribute("html", "data-ready") != "" {
		b.t.Error("the page still says that it is ready")
	}
}

// TestFailWithTheDemo stops the page before anything was changed or kept: the demonstration's case is offered.
func TestFailWithTheDemo(t *testing.T) {
	b := newTab(t, 800, 600, 1, false)
	b.open(singleFile(t))
	eval[bool](b, "levelspan.fail('made up'), true")
	if text := eval[string](b, "document.querySelector('#levelspan-stop textarea').value"); !strings.Contains(text, `"Marram"`) {
		t.Errorf("the case to copy is %q", text)
	}
	eval[bool](b, "document.querySelectorAll('#levelspan-stop button')[1].click(), true")
	b.until("/copied|select/i.test(document.querySelectorAll('#levelspan-stop button')[1].textContent)")
}

// TestLongDrag drags for longer than the heartbeat waits, without a pause: the program answers all the time.
func TestLongDrag(t *testing.T) {
	for _, surface := range []string{"software", "webgl"} {
		b := newTab(t, 1000, 700, 1, false)
		b.open(singleFile(t) + "?surface=" + surface)
		for range 2 {
			b.paints() // two seconds; says if the page has stopped
		}
		b.agree("a long drag")
	}
}

// TestNoFalseAlarm lets what is no fault look like one: a hidden page, turns that come late, a long pause with the work
// done after it. The page goes on.
func TestNoFalseAlarm(t *testing.T) {
	b := newTab(t, 800, 600, 1, false)
	b.before(`globalThis.hiding = false; Object.defineProperty(document, 'hidden', {get: () => hiding});`)
	b.open(singleFile(t) + "?surface=software")
	eval[bool](b, fmt.Sprintf("(() => { const paint = levelspan.onpaint; globalThis.answer = () => { levelspan.onpaint = paint; }; levelspan.onpaint = () => {}; hiding = true; %s; })(), true", push))
	time.Sleep(4 * time.Second)
	eval[bool](b, "answer(), hiding = false, levelspan.onpaint(innerWidth, innerHeight, 1), true")
	time.Sleep(time.Second)
	eval[bool](b, fmt.Sprintf("(() => { %s; const end = performance.now() + 4000; while (performance.now() < end); })(), true", push)) // the machine is busy with something else
	time.Sleep(time.Second)
	if !eval[bool](b, "document.getElementById('levelspan-stop').hidden && document.documentElement.dataset.ready === 'true'") {
		t.Errorf("a false alarm: %s", eval[string](b, "document.querySelector('#levelspan-stop pre').textContent"))
	}
	b.agree("what was no fault")
}
