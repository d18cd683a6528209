//go:build !js

package main

import (
	"strings"
	"testing"

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

// paints drags a handle by a move a frame for two seconds and gives how often a second its value in the mirror changed,
// which stands for the pictures: one is made for each.
func (b *tab) paints() float64 {
	return eval[float64](b, `new Promise(done => {
		const box = document.querySelector('[data-handle=mass]').getBoundingClientRect(), layer = document.getElementById('levelspan-layer');
		const x = box.x + box.width / 2, y = box.y + box.height / 2;
		const send = (kind, dx) => layer.dispatchEvent(new PointerEvent(kind, {bubbles: true, pointerId: 7, pointerType: 'touch', clientX: x + dx, clientY: y, button: 0, buttons: 1}));
		let n = 0, seen = document.querySelector('[data-handle=mass]').getAttribute('aria-valuenow');
		send('pointerdown', 0);
		const from = performance.now();
		const step = () => {
			const now = performance.now() - from, is = document.querySelector('[data-handle=mass]').getAttribute('aria-valuenow');
			if (is !== seen) { seen = is; n++; }
			if (now > 2000) { send('pointerup', 0); done(1000 * n / now); return; }
			send('pointermove', -60 + 50 * Math.sin(now / 200));
			requestAnimationFrame(step);
		};
		requestAnimationFrame(step);
	})`, awaitPromise)
}

// TestSoftwareIsFast drags on both surfaces in turn, without a graphics processor. Only their order is held: the rates
// are the machine's, and stand in the log (on two quiet cores 52 pictures a second to 30).
func TestSoftwareIsFast(t *testing.T) {
	rate := map[string]float64{}
	for range 2 {
		for _, surface := range []string{"webgl", "software"} {
			b := newTab(t, 1280, 800, 1, false)
			b.open(singleFile(t) + "?surface=" + surface)
			b.paints() // the browser compiles the program better while it runs
			rate[surface] = max(rate[surface], b.paints())
		}
	}
	t.Logf("pictures a second at 1280x800: software %.1f, WebGL by the processor %.1f", rate["software"], rate["webgl"])
	if rate["software"] <= rate["webgl"] {
		t.Errorf("software %.1f pictures a second, WebGL %.1f", rate["software"], rate["webgl"])
	}
}
