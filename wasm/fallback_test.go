//go:build !js

package main

import (
	"fmt"
	"testing"
	"time"

	"github.com/chromedp/cdproto/input"

	"levelspan/game/app"
	"levelspan/game/scene/raster"
)

// spoiled is how WebGL2 fails after the probe has found it.
var spoiled = []struct{ name, script string }{
	{"no context", `const get = HTMLCanvasElement.prototype.getContext;
		HTMLCanvasElement.prototype.getContext = function (kind, ...o) { return kind === 'webgl2' && this.isConnected ? null : get.call(this, kind, ...o); };`},
	{"asking for a context throws", `const get = HTMLCanvasElement.prototype.getContext;
		HTMLCanvasElement.prototype.getContext = function (kind, ...o) { if (kind === 'webgl2' && this.isConnected) throw new Error('made up'); return get.call(this, kind, ...o); };`},
	{"no shader compiles", `const source = WebGL2RenderingContext.prototype.shaderSource;
		WebGL2RenderingContext.prototype.shaderSource = function (s) { source.call(this, s, 'made up'); };`},
	{"no program links", `const get = WebGL2RenderingContext.prototype.getProgramParameter;
		WebGL2RenderingContext.prototype.getProgramParameter = function (p, what) { return what === this.LINK_STATUS && this.canvas.isConnected ? false : get.call(this, p, what); };`},
	{"lost as soon as it is made", `const get = HTMLCanvasElement.prototype.getContext;
		HTMLCanvasElement.prototype.getContext = function (kind, ...o) { const g = get.call(this, kind, ...o); if (g && kind === 'webgl2' && this.isConnected) g.getExtension('WEBGL_lose_context').loseContext(); return g; };`},
	{"lost with the first shader", `const make = WebGL2RenderingContext.prototype.createShader;
		WebGL2RenderingContext.prototype.createShader = function (kind) { const x = this.getExtension('WEBGL_lose_context'); if (x) x.loseContext(); return make.call(this, kind); };`},
	{"lost with the first picture", `const draw = WebGL2RenderingContext.prototype.drawElements;
		WebGL2RenderingContext.prototype.drawElements = function (...a) { const x = this.getExtension('WEBGL_lose_context'); if (x) x.loseContext(); return draw.apply(this, a); };`},
}

// TestSpoiledWebGL has WebGL2 found and then fail, in every way that starting can fail: the page draws in software, in the
// same document, and works.
func TestSpoiledWebGL(t *testing.T) {
	a := app.New(noHost{}, nil)
	a.Step(app.Input{Width: 900, Height: 700, Scale: 1})
	want := raster.Render(a.Scene())
	for _, s := range spoiled {
		t.Run(s.name, func(t *testing.T) {
			b := newTab(t, 900, 700, 1, false)
			b.before("sessionStorage.setItem('loads', 1 + +(sessionStorage.getItem('loads') || 0)); (() => { " + s.script + " })()")
			b.open(singleFile(t) + "?surface=webgl")
			b.until("document.documentElement.dataset.surface === 'software'")
			b.settle()
			if n := eval[string](b, "sessionStorage.getItem('loads') + ' ' + document.querySelectorAll('body>canvas').length"); n != "1 1" {
				t.Errorf("loads and canvases: %s, want 1 of each", n)
			}
			got, _ := b.picture()
			if mean, far := difference(got, want); mean > 0.6 || far > 0.002 {
				t.Errorf("mean difference %.3f of 255, %.2f %% of the pixels far off", mean, 100*far)
			}
			mass := b.handle("mass")
			x, y := b.control("handle/mass").middle()
			b.dragMouse(x, y, x-60, y, 5)
			if b.handle("mass") >= mass {
				t.Error("the handle does not follow")
			}
			b.agree("all that")
		})
	}
}

// TestLostLater takes away the context of a canvas that has been left: the page is not loaded anew for that.
func TestLostLater(t *testing.T) {
	b := newTab(t, 900, 700, 1, false)
	b.open(singleFile(t) + "?surface=webgl")
	eval[bool](b, "globalThis.sameDocument = true; globalThis.old = document.querySelector('body>canvas').getContext('webgl2'); levelspan.resized(), true")
	b.until("document.documentElement.dataset.surface === 'software'")
	eval[bool](b, "old.getExtension('WEBGL_lose_context').loseContext(), true")
	b.until("old.isContextLost()")
	time.Sleep(500 * time.Millisecond)
	b.until("document.documentElement && document.documentElement.dataset.surface === 'software'")
	b.still("the loss of a canvas that is gone")
}

const loseContext = "document.querySelector('body>canvas').getContext('webgl2').getExtension('WEBGL_lose_context').loseContext()"

// TestLostInMidGesture takes the graphics context away under a finger that drags, and between two keys that are typed on
// the drawn keypad: nothing is lost, and the page is not loaded anew.
func TestLostInMidGesture(t *testing.T) {
	ends := map[string]float64{}
	for _, surface := range []string{"software", "webgl"} { // what should come of it, and what does
		b := newTab(t, 1000, 700, 1, true)
		b.open(singleFile(t) + "?surface=" + surface)
		eval[bool](b, "globalThis.sameDocument = true")
		x, y := b.control("handle/mass").middle()
		b.touch(input.DispatchTouchEventTypeTouchStart, fingerAt(x, y))
		for i := 1.0; i <= 8; i++ {
			b.touch(input.DispatchTouchEventTypeTouchMove, fingerAt(x-9*i, y))
			if i == 4 && surface == "webgl" {
				eval[bool](b, loseContext+", true")
			}
		}
		b.touch(input.DispatchTouchEventTypeTouchEnd)
		b.until("document.documentElement.dataset.surface === 'software'")
		b.settle()
		ends[surface] = b.handle("mass")
		b.still("the drag")
	}
	if ends["webgl"] != ends["software"] {
		t.Errorf("the weight dragged is %g where the context was lost, %g where not", ends["webgl"], ends["software"])
	}

	for _, at := range []int{0, 2, 4} { // before the first key, in the middle, and before OK
		b := newTab(t, 1000, 700, 1, false)
		b.open(singleFile(t) + "?surface=webgl")
		eval[bool](b, "globalThis.sameDocument = true")
		x, y := b.control("handle/mass").middle()
		b.doubleClick(x, y)
		b.until("document.querySelector('[data-control=\"key/ok\"]')")
		// In one turn of the browser: the loss is told of after the keys are struck.
		keys := ""
		for i, key := range []string{"7", "3", "2", ".", "Enter"} {
			if i == at {
				keys += loseContext + ";"
			}
			keys += fmt.Sprintf("dispatchEvent(new KeyboardEvent('keydown', {key: '%s', bubbles: true}));", key)
		}
		eval[bool](b, keys+"true")
		b.until("document.documentElement.dataset.surface === 'software' && !document.querySelector('[data-control=\"key/ok\"]')")
		b.settle()
		if got := b.handle("mass"); got != 732 {
			t.Errorf("the context lost before key %d: 732 typed, and the weight is %g", at+1, got)
		}
		b.still("the keypad")
	}

	// The keypad tapped, with time between: two keys on one surface, two on the other.
	b := newTab(t, 1000, 700, 1, false)
	b.open(singleFile(t) + "?surface=webgl")
	eval[bool](b, "globalThis.sameDocument = true")
	x, y := b.control("handle/mass").middle()
	b.doubleClick(x, y)
	b.clickOn("key/7")
	b.clickOn("key/0")
	eval[bool](b, loseContext+", true")
	b.until("document.documentElement.dataset.surface === 'software'")
	b.clickOn("key/5")
	b.clickOn("key/ok")
	if got := b.handle("mass"); got != 705 {
		t.Errorf("705 tapped, and the weight is %g", got)
	}
	b.still("the keys tapped")
	b.agree("all of it")
}

func fingerAt(x, y float64) *input.TouchPoint { return &input.TouchPoint{X: x, Y: y} }

// still demands that this is the document that was opened, and that it has not stopped.
func (b *tab) still(after string) {
	b.t.Helper()
	if !eval[bool](b, "globalThis.sameDocument === true && document.getElementById('levelspan-stop').hidden") {
		b.t.Errorf("after %s: the page was loaded anew, or has stopped", after)
	}
}
