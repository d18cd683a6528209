//go:build !js

package main

import (
	"fmt"
	"math"
	"testing"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/chromedp"

	"levelspan/game/app"
	"levelspan/game/scene"
	"levelspan/game/scene/raster"
	"levelspan/game/ui"
)

// relayouts is what a window goes through in an afternoon, each from the one before.
var relayouts = []struct {
	name          string
	width, height int
	scale         float64
}{
	{"as opened", 1280, 800, 1},
	{"turned", 800, 1280, 1},
	{"a third of the screen", 390, 1280, 1},
	{"a small window", 320, 480, 1},
	{"whole again", 1280, 800, 1},
	{"moved to a screen of twice the ratio", 1280, 800, 2},
	{"page zoom 150 %", 853, 533, 1.5},
	{"page zoom 110 %, of an odd width", 1163, 727, 1.1},
	{"page zoom 67 %", 1911, 1194, 0.67},
	{"back", 1280, 800, 1},
}

// queries makes up for the browser's emulation, which changes the ratio without telling the page's media queries, as
// no screen does.
const queries = `(() => {
	const match = matchMedia.bind(window), all = [];
	window.matchMedia = q => { const list = match(q); all.push({list, was: list.matches}); return list; };
	globalThis.asked = () => { for (const q of [...all]) if (q.list.matches !== q.was) { q.was = q.list.matches; q.list.dispatchEvent(new MediaQueryListEvent('change', {media: q.list.media, matches: q.was})); } };
})()`

// TestRelayout changes the window's size and the screen's ratio under the program, on either surface. Each time the
// canvas has the pixels of the screen, the picture is that of the scene laid out anew, every control's element lies over
// what is drawn, a handle follows the pointer, and what was selected and changed is kept.
func TestRelayout(t *testing.T) {
	for _, surface := range []string{"software", "webgl"} {
		t.Run(surface, func(t *testing.T) {
			b := newTab(t, relayouts[0].width, relayouts[0].height, relayouts[0].scale, true)
			b.before(queries)
			b.open(singleFile(t) + "?surface=" + surface)
			eval[bool](b, "globalThis.sameDocument = true")
			b.activate("limit/best_glide")
			x, y := b.control("handle/mass").middle()
			b.dragMouse(x, y, x-100, y, 5)
			for i, c := range relayouts {
				mass := b.handle("mass")
				b.do(chromedp.EmulateViewport(int64(c.width), int64(c.height), chromedp.EmulateScale(c.scale)))
				b.until(fmt.Sprintf("innerWidth === %d && innerHeight === %d", c.width, c.height))
				eval[bool](b, "asked(), true")
				b.laidOut(c.width, c.height)
				if got := b.handle("mass"); got != mass {
					t.Errorf("%s: the weight is %g, was %g", c.name, got, mass)
				}
				if got := b.attribute("#levelspan-limits tr[aria-current=true]", "data-key"); got != "best_glide" {
					t.Errorf("%s: %q is selected", c.name, got)
				}
				b.sharp(c.name)
				b.pictured(c.name, b.overlaid(c.name, float64(c.width), float64(c.height)))
				b.follows(c.name, float64(i%2*2-1))
				if want := surface; i >= 5 { // the drawing library reads the ratio once
					want = "software"
					if got := b.attribute("html", "data-surface"); got != want {
						t.Errorf("%s: the surface is %q, want %q", c.name, got, want)
					}
				} else if got := b.attribute("html", "data-surface"); got != want {
					t.Errorf("%s: the surface is %q, want %q", c.name, got, want)
				}
			}
			if !eval[bool](b, "globalThis.sameDocument === true && document.getElementById('levelspan-stop').hidden") {
				t.Error("the page was loaded anew, or has stopped")
			}
			b.agree("all of that")
		})
	}
}

// laidOut waits until the program has heard of the window's size and ratio.
func (b *tab) laidOut(width, height int) {
	b.t.Helper()
	b.until(fmt.Sprintf(`(() => { const r = document.querySelector('[data-control="tab/chart"]').parentNode.parentNode.getBoundingClientRect(), m = document.querySelector('[data-control=menu]').getBoundingClientRect(); return r.width === %d && m.right <= %d && m.right > %d - 80 &&
		Math.abs(document.querySelector('body>canvas').width - innerWidth * devicePixelRatio) < 1.01; })()`, width, width, width))
	b.settle()
}

// sharp demands that the canvas has a pixel for each of the screen's and covers the window with them.
func (b *tab) sharp(after string) {
	b.t.Helper()
	c := eval[map[string]float64](b, `(() => { const c = document.querySelectorAll('body>canvas'), r = c[0].getBoundingClientRect();
		return {n: c.length, w: c[0].width, h: c[0].height, x: r.x, y: r.y, cssW: r.width, cssH: r.height, ratio: devicePixelRatio, innerWidth, innerHeight}; })()`)
	if c["n"] != 1 || c["x"] != 0 || c["y"] != 0 {
		b.t.Errorf("%s: %v canvases, the first at %v, %v", after, c["n"], c["x"], c["y"])
	}
	for _, side := range [][3]string{{"w", "cssW", "innerWidth"}, {"h", "cssH", "innerHeight"}} {
		pixels, css, inner := c[side[0]], c[side[1]], c[side[2]]
		if math.Abs(pixels-inner*c["ratio"]) >= 1.01 {
			b.t.Errorf("%s: the canvas has %v pixels for %v at a ratio of %v", after, pixels, inner, c["ratio"])
		}
		if math.Abs(pixels-css*c["ratio"]) > 0.02*c["ratio"] { // Chromium lays out in 64ths
			b.t.Errorf("%s: %v pixels are shown as %v at a ratio of %v: not one for one", after, pixels, css, c["ratio"])
		}
	}
}

// overlaid demands that the elements lie where the controls of a second program with the same weight, size and
// selection are drawn, and gives that one's scene.
func (b *tab) overlaid(after string, width, height float64) *scene.Scene {
	b.t.Helper()
	twin := app.New(noHost{}, nil)
	in := app.Input{Width: width, Height: height, Scale: eval[float64](b, "devicePixelRatio")}
	twin.Step(in)
	in.Events = []ui.Event{{Kind: ui.SetValue, ID: "handle/mass", Value: b.handle("mass")}, {Kind: ui.Activate, ID: "limit/best_glide"}}
	twin.Step(in)
	in.Events = nil
	twin.Step(in)
	have := eval[map[string]place](b, `Object.fromEntries([...document.querySelectorAll('[data-control]')].map(e => { const r = e.getBoundingClientRect(); return [e.dataset.control, {X: r.x, Y: r.y, W: r.width, H: r.height}]; }))`)
	n := 0
	for _, c := range twin.Controls() {
		p, ok := have[c.ID]
		if !ok {
			b.t.Errorf("%s: %s has no element", after, c.ID)
			continue
		}
		n++
		if (scene.Rect{X: p.X, Y: p.Y, W: p.W, H: p.H}) != c.Bounds && !near(p, c.Bounds) {
			b.t.Errorf("%s: %s lies at %v, drawn at %v", after, c.ID, p, c.Bounds)
		}
	}
	if n < 8 {
		b.t.Errorf("%s: only %d controls", after, n)
	}
	return twin.Scene()
}

// pictured demands that what the tab shows is a scene.
func (b *tab) pictured(after string, s *scene.Scene) {
	b.t.Helper()
	got, _ := b.picture()
	want := raster.Render(s)
	g, w := got.Bounds().Size(), want.Bounds().Size()
	if math.Abs(float64(g.X-w.X)) > 1 || math.Abs(float64(g.Y-w.Y)) > 1 {
		b.t.Errorf("%s: the page is %v, the scene %v", after, g, w)
		return
	}
	if mean, far := difference(got, want.SubImage(got.Bounds())); mean > 1 || far > 0.004 {
		b.t.Errorf("%s: mean difference %.3f of 255, %.2f %% of the pixels far off", after, mean, 100*far)
	}
}

func near(p place, r scene.Rect) bool {
	const most = 0.51
	return math.Abs(p.X-r.X) < most && math.Abs(p.Y-r.Y) < most && math.Abs(p.W-r.W) < most && math.Abs(p.H-r.H) < most
}

// follows drags the weight: the stalling speed goes with it.
func (b *tab) follows(after string, way float64) {
	b.t.Helper()
	stall := func() (v float64) {
		fmt.Sscan(b.attribute("#levelspan-limits tr[data-key=stall] [data-cas-mps]", "data-cas-mps"), &v)
		return v
	}
	mass, speed := b.handle("mass"), stall()
	x, y := b.control("handle/mass").middle()
	b.dragMouse(x, y, x+12*way, y, 3)
	if got := b.handle("mass"); (got-mass)*way <= 0 || (stall()-speed)*way <= 0 {
		b.t.Errorf("%s: dragged by %g pixels, the weight goes from %g to %g, the stalling speed from %g to %g", after, 12*way, mass, got, speed, stall())
	}
}

// TestPinch magnifies the page as two fingers on a track pad do: places still agree.
func TestPinch(t *testing.T) {
	for _, surface := range []string{"software", "webgl"} {
		b := newTab(t, 1000, 700, 1, true)
		b.open(singleFile(t) + "?surface=" + surface)
		_, err := chromedp.Call(b.ctx, emulation.SetPageScaleFactor, emulation.SetPageScaleFactorParams{PageScaleFactor: 1.6})
		b.check(err)
		b.settle()
		if z := eval[float64](b, "visualViewport.scale"); math.Abs(z-1.6) > 0.01 {
			t.Fatalf("%s: the page is magnified by %g", surface, z)
		}
		b.overlaid(surface+", magnified", 1000, 700)
		b.follows(surface+", magnified", -1)
	}
}
