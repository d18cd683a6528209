//go:build !js

package main

import (
	"strings"
	"testing"

	"github.com/chromedp/chromedp"

	"levelspan/game/app"
	"levelspan/game/scene/raster"
)

// TestSurfaces opens the page on either surface by its address, and without one where WebGL2 is software or missing.
// The picture is the scene's each time.
func TestSurfaces(t *testing.T) {
	for query, surface := range map[string]string{"": "software", "?surface=software": "software", "?surface=webgl": "webgl"} {
		b := newTab(t, 900, 700, 1.25, false)
		b.open(singleFile(t) + query)
		if got := b.attribute("html", "data-surface"); got != surface {
			t.Errorf("%q: the surface is %q, want %q", query, got, surface)
		}
		if n := eval[int](b, "document.querySelectorAll('body>canvas').length"); n != 1 {
			t.Errorf("%q: %d canvases", query, n)
		}
		got, _ := b.picture()
		a := app.New(noHost{}, nil)
		a.Step(app.Input{Width: 900, Height: 700, Scale: 1.25})
		want := raster.Render(a.Scene())
		if got.Bounds().Size() != want.Bounds().Size() {
			t.Errorf("%q: the page is %v, the scene %v", query, got.Bounds().Size(), want.Bounds().Size())
		} else if mean, far := difference(got, want); mean > 0.6 || far > 0.002 {
			t.Errorf("%q: mean difference %.3f of 255, %.2f %% of the pixels far off", query, mean, 100*far)
		}
	}
}

// TestLostContext takes the graphics context away: the page goes on in software, in the same document, with what was
// changed before, and a key struck at that moment counts.
func TestLostContext(t *testing.T) {
	b := newTab(t, 1000, 700, 1, false)
	b.open(singleFile(t) + "?surface=webgl")
	const up = "dispatchEvent(new KeyboardEvent('keydown', {key: 'ArrowRight', bubbles: true}))"
	eval[bool](b, "globalThis.sameDocument = true; document.querySelector('[data-handle=mass]').focus(); true")
	before := b.handle("mass")
	eval[bool](b, "document.activeElement."+up+", true")
	b.settle()
	one := b.handle("mass") - before
	if one == 0 {
		t.Fatal("the key did not move the handle")
	}
	eval[bool](b, "document.querySelector('body>canvas').getContext('webgl2').getExtension('WEBGL_lose_context').loseContext(), document.activeElement."+up+", true")
	b.until("document.documentElement.dataset.surface === 'software'")
	eval[bool](b, "document.activeElement."+up+", true")
	b.settle()
	if got := b.handle("mass") - before; got < 2.99*one || got > 3.01*one {
		t.Errorf("three keys moved the handle by %g, one by %g", got, one)
	}
	if !eval[bool](b, "globalThis.sameDocument === true && document.getElementById('levelspan-stop').hidden") {
		t.Error("the page was loaded anew, or has stopped")
	}
	b.agree("the lost context")
}

// TestReloadKeepsTheCase changes a figure and loads the page again.
func TestReloadKeepsTheCase(t *testing.T) {
	b := newTab(t, 1000, 700, 1, false)
	b.open(singleFile(t) + "?surface=software")
	x, y := b.control("handle/mass").middle()
	b.dragMouse(x, y, x-60, y, 5)
	b.settle()
	changed, text := b.handle("mass"), ""
	b.open(singleFile(t) + "?surface=software")
	if got := b.handle("mass"); got != changed {
		t.Errorf("after loading again the mass is %g, was %g", got, changed)
	}
	b.agree("loading again")
	x, y = b.control("handle/mass").middle()
	b.dragMouse(x, y, x+20, y, 5)
	b.settle()
	eval[bool](b, "levelspan.fail('made up'), true")
	text = eval[string](b, "document.querySelector('#levelspan-stop textarea').value")
	if !strings.Contains(text, "wing_area") && !strings.Contains(text, "aeroplane") || !strings.HasPrefix(text, "{") {
		t.Errorf("the case to copy is %q", text)
	}
	if n := eval[int](b, "document.querySelectorAll('#levelspan-limits tbody tr, #levelspan-facts dd').length"); n != 0 {
		t.Errorf("%d figures are still in the mirror", n)
	}
	eval[bool](b, "localStorage.clear(), true")
}

// TestStorageRefused takes the browser's storage away: the page works.
func TestStorageRefused(t *testing.T) {
	b := newTab(t, 800, 600, 1, false)
	b.before("for (const k of ['localStorage', 'sessionStorage']) Object.defineProperty(window, k, {get() { throw new Error('refused'); }})")
	b.open(singleFile(t))
	before := b.handle("mass")
	x, y := b.control("handle/mass").middle()
	b.dragMouse(x, y, x-60, y, 5)
	b.settle()
	if b.handle("mass") == before || b.attribute("html", "data-ready") != "true" {
		t.Error("without storage the page does not follow the handle")
	}
	b.agree("a drag without storage")
}

// drag is what a drag of two seconds came to: pictures a second, and the script's time for each, ms.
type drag struct{ Rate, Cost float64 }

// paints drags a handle by a move a frame, each far enough to change the figures, and counts the pictures: the program
// hands over a patch for the mirror with each scene that it shows, and the next frame is asked for when the browser has
// taken the last.
func (b *tab) paints() drag {
	b.t.Helper()
	d := eval[drag](b, `new Promise(done => {
		const box = document.querySelector('[data-handle=mass]').getBoundingClientRect(), layer = document.getElementById('levelspan-layer');
		const x = box.x + box.width / 2, y = box.y + box.height / 2;
		const send = (kind, dx) => layer.dispatchEvent(new PointerEvent(kind, {bubbles: true, pointerId: 7, pointerType: 'touch', clientX: x + dx, clientY: y, button: 0, buttons: 1}));
		const patch = levelspan.patch, paint = levelspan.onpaint;
		let n = 0, i = 0, spent = 0;
		levelspan.patch = (...a) => { n++; return patch(...a); };
		if (paint) levelspan.onpaint = (...a) => { const t = performance.now(); paint(...a); spent += performance.now() - t; };
		send('pointerdown', 0);
		send('pointermove', -10);
		const from = performance.now();
		n = 0;
		const step = () => {
			const now = performance.now() - from;
			if (now > 2000) {
				send('pointermove', 0);                    // back, so that the next drag has as far to go
				send('pointerup', 0);
				levelspan.patch = patch;
				levelspan.onpaint = paint;
				done({Rate: 1000 * n / now, Cost: spent / n});
				return;
			}
			i++;
			send('pointermove', -110 + Math.abs(3 * i % 200 - 100));
			requestAnimationFrame(step);
		};
		requestAnimationFrame(step);
	})`, awaitPromise)
	if d.Rate == 0 || !eval[bool](b, "document.getElementById('levelspan-stop').hidden") {
		b.t.Fatalf("dragging has stopped the page: %s", eval[string](b, "document.querySelector('#levelspan-stop pre').textContent"))
	}
	return d
}

// TestSoftwareIsFast drags on both surfaces in turn at 1280x800, without a graphics processor. The software surface shows
// at least 50 pictures a second in a browser as it is, which shows no more than 60. In one that shows as many as it can,
// both surfaces alike, it shows at least three times as many as WebGL drawn by the processor.
func TestSoftwareIsFast(t *testing.T) {
	if chromium() == "" {
		without(t, "Chromium")
	}
	profile := t.TempDir()
	free, stop, err := startBrowser(chromium(), profile, chromedp.Flag("disable-frame-rate-limit", true), chromedp.Flag("disable-gpu-vsync", true))
	t.Cleanup(stop)
	if err != nil {
		t.Fatal(err)
	}
	best := map[string]drag{}
	measure := func(name, surface string, b *tab) {
		b.open(singleFile(t) + "?surface=" + surface)
		b.paints() // the browser compiles the program better while it runs
		for range 2 {
			if d := b.paints(); d.Rate > best[name].Rate {
				best[name] = d
			}
		}
		b.do(chromedp.Navigate("about:blank"))
	}
	enough := func() bool {
		return best["software"].Rate >= 50 && best["software, free"].Rate >= 3*best["webgl, free"].Rate
	}
	for range 3 { // another program may have had the processor
		measure("software", "software", newTab(t, 1280, 800, 1, false))
		for _, surface := range []string{"webgl", "software"} {
			measure(surface+", free", surface, tabOf(t, free, 1280, 800, 1, false, chromedp.WithNewBrowserContext()))
		}
		if enough() {
			break
		}
	}
	t.Logf("pictures a second: software %.1f (%.1f ms of script each); without the limit of 60, software %.1f, WebGL by the processor %.1f",
		best["software"].Rate, best["software"].Cost, best["software, free"].Rate, best["webgl, free"].Rate)
	if !enough() {
		t.Error("the software surface is not fast enough")
	}
}
