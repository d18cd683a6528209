//go:build !js

package main

import (
	"fmt"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/chromedp"
)

func finger(id, x, y float64) *input.TouchPoint { return &input.TouchPoint{ID: &id, X: x, Y: y} }

// TestTouches feeds the browser what fingers do on a tablet. Whatever it is, the next touch finds handles that follow
// and taps that count.
func TestTouches(t *testing.T) {
	for _, surface := range []string{"software", "webgl"} {
		b := newTab(t, 1000, 700, 1, true)
		b.open(singleFile(t) + "?surface=" + surface)
		const start, move, end, cancel = input.DispatchTouchEventTypeTouchStart, input.DispatchTouchEventTypeTouchMove, input.DispatchTouchEventTypeTouchEnd, input.DispatchTouchEventTypeTouchCancel
		well := func(after string) {
			t.Helper()
			if n := eval[int](b, "document.querySelectorAll('.held').length"); n != 0 {
				t.Errorf("%s, %s: a handle is still held", surface, after)
			}
			before := b.handle("mass")
			x, y := b.control("handle/mass").middle()
			b.dragTouch(x, y, x-30, y, 4, end)
			if got := b.handle("mass"); got >= before {
				t.Errorf("%s, %s: the handle does not follow: %g, then %g", surface, after, before, got)
			}
			b.settle()
			moved := b.handle("mass")
			b.touch(start, finger(0, 200, 20)) // on the name, which does nothing
			b.touch(end)
			b.settle()
			if b.handle("mass") != moved {
				t.Errorf("%s, %s: the handle is stuck to a finger that is elsewhere", surface, after)
			}
			kind := "IAS"
			if b.attribute(`[data-control="speed-kind/IAS"]`, "aria-checked") == "true" {
				kind = "CAS"
			}
			x, y = b.control("speed-kind/" + kind).middle()
			b.touch(start, finger(0, x, y))
			b.touch(end)
			b.settle()
			if b.attribute(`[data-control="speed-kind/`+kind+`"]`, "aria-checked") != "true" {
				t.Errorf("%s, %s: a tap is lost", surface, after)
			}
			x, y = b.control("handle/mass").middle()
			b.dragTouch(x, y, x+30, y, 4, end)
		}
		mass := func() (x, y float64) { return b.control("handle/mass").middle() }
		altitude := func() (x, y float64) { return b.control("handle/density-altitude").middle() }
		well("nothing")

		x, y := mass()
		was := b.handle("mass")
		b.touch(start, finger(0, x, y))
		b.touch(move, finger(0, x-50, y))
		b.touch(cancel)
		b.settle()
		if got := b.handle("mass"); got != was {
			t.Errorf("%s: a cancelled drag left %g, not %g", surface, got, was)
		}
		well("a cancelled drag")

		x, y = mass()
		u, v := altitude()
		height := b.handle("density-altitude")
		was = b.handle("mass")
		b.touch(start, finger(0, x, y))
		b.touch(start, finger(0, x, y), finger(1, u, v))
		for i := 1.0; i <= 5; i++ {
			b.touch(move, finger(0, x-10*i, y), finger(1, u, v-8*i))
		}
		b.touch(end, finger(1, u, v-40))
		b.touch(end)
		b.settle()
		if b.handle("mass") >= was || b.handle("density-altitude") <= height {
			t.Errorf("%s: two fingers on two handles: %g to %g kg, %g to %g m", surface, was, b.handle("mass"), height, b.handle("density-altitude"))
		}
		well("two fingers")

		x, y = mass()
		palm := func(dx float64) (points []*input.TouchPoint) {
			wide, high := 40.0, 30.0
			for i := 0.0; i < 5; i++ {
				points = append(points, finger(i, x-80+40*i+dx, y+3*i))
				points[len(points)-1].RadiusX, points[len(points)-1].RadiusY = &wide, &high
			}
			return points
		}
		b.touch(start, palm(0)...)
		b.touch(move, palm(12)...)
		b.touch(cancel)
		well("a palm")

		x, y = mass() // out of the window and lifted there
		b.touch(start, finger(0, x, y))
		for i := 1.0; i <= 6; i++ {
			b.touch(move, finger(0, x-40*i, y+60*i))
		}
		b.touch(end)
		well("a drag out of the window")

		x, y = mass() // the same with the mouse
		b.mouse(input.DispatchMouseEventTypeMousePressed, x, y, 1)
		b.mouse(input.DispatchMouseEventTypeMouseMoved, x+20, y+500, 0)
		b.mouse(input.DispatchMouseEventTypeMouseReleased, x+20, y+500, 1)
		well("a mouse released outside")

		// Pressed and released between two frames: no frame runs in between.
		name := `document.querySelector('[data-control="limit/fastest_climb"]')`
		eval[bool](b, fmt.Sprintf(`(() => { const e = %s, r = e.getBoundingClientRect(), o = {bubbles: true, pointerId: 3, pointerType: 'touch', isPrimary: true, clientX: r.x + 40, clientY: r.y + 12, button: 0};
			e.dispatchEvent(new PointerEvent('pointerdown', Object.assign({buttons: 1}, o))); e.dispatchEvent(new PointerEvent('pointerup', o)); return true; })()`, name))
		b.settle()
		if eval[string](b, name+".getAttribute('aria-pressed') || "+name+".getAttribute('aria-selected') || "+name+".getAttribute('aria-current') || ''") != "true" {
			t.Errorf("%s: a tap between two frames is lost: %s", surface, eval[string](b, name+".outerHTML"))
		}
		well("a tap between two frames")

		eval[bool](b, "dispatchEvent(new Event('blur')), true") // a call comes in
		well("the window's loss of the focus")
	}
}

// TestLongListByTouch throws a long list with a finger, lets it run, stops it with a tap that does nothing else, and
// taps: that counts.
func TestLongListByTouch(t *testing.T) {
	b := newTab(t, 390, 844, 1, true)
	b.open(singleFile(t) + "?surface=software")
	b.press("tab/aeroplane")
	at := func() float64 { return b.control("field/aeroplane.wing_span_m").Y }
	before := at()
	began := float64(time.Now().UnixMicro()) / 1e6 // by the events' own clock, however long the machine takes
	send := func(ms float64, kind input.DispatchTouchEventType, points ...*input.TouchPoint) {
		when := input.TimeSinceEpoch(began + ms/1000)
		_, err := chromedp.Call(b.ctx, input.DispatchTouchEvent, input.DispatchTouchEventParams{Type: kind, TouchPoints: append([]*input.TouchPoint{}, points...), Timestamp: when})
		b.check(err)
	}
	send(0, input.DispatchTouchEventTypeTouchStart, finger(0, 190, 700))
	for i := 1.0; i <= 8; i++ {
		send(12*i, input.DispatchTouchEventTypeTouchMove, finger(0, 190, 700-30*i))
	}
	send(100, input.DispatchTouchEventTypeTouchEnd)
	b.settle()
	lifted := at()
	if lifted >= before-150 {
		t.Fatalf("the list does not follow the finger: %g, then %g", before, lifted)
	}
	time.Sleep(2500 * time.Millisecond)
	b.settle()
	rest := at()
	if rest >= lifted {
		t.Errorf("the list does not run on: %g when the finger left, %g at rest", lifted, rest)
	}
	ids := strings.Fields(eval[string](b, `[...document.querySelectorAll('button[data-control^="field/"]')].filter(e => { const r = e.getBoundingClientRect(); return r.y > 200 && r.y + r.height < 700; }).map(e => e.dataset.control).join(' ')`))
	if len(ids) == 0 {
		t.Fatal("nothing to tap")
	}
	x, y := b.control(ids[0]).middle()
	b.touch(input.DispatchTouchEventTypeTouchStart, finger(0, x, y))
	b.touch(input.DispatchTouchEventTypeTouchEnd)
	b.settle()
	if !b.has("key/ok") {
		t.Errorf("the tap on %s after the throw is lost", ids[0])
	}
}

// TestHostileNames brings in names that mean something to a browser, by link, file, paste and store. They are text: no
// element is made of them, no script runs, the policy has nothing to stop.
func TestHostileNames(t *testing.T) {
	names := []string{
		`<img src=x onerror="globalThis.owned=1">`, `</script><script>globalThis.owned=1</script>`, `"><svg onload=globalThis.owned=1>`,
		`' onmouseover='globalThis.owned=1`, `javascript:globalThis.owned=1`, `__proto__`, `constructor`, "\u202eevil\u2066", "a\u0000b\u0001\u001e\u001f\u007f",
		strings.Repeat("W", 400), `{{POLICY}}`, `${globalThis.owned=1}`, "]]>--><!--",
	}
	b := newTab(t, 1000, 700, 1, false)
	b.before("globalThis.stopped = []; addEventListener('securitypolicyviolation', e => stopped.push(e.effectiveDirective + ' ' + e.blockedURI));")
	plain := b.command(marram(t), "open", strings.TrimSpace(b.command(marram(t), "link", "-")))
	check := func(how, name string) {
		t.Helper()
		b.settle()
		if eval[bool](b, "'owned' in globalThis || 'owned' in Object.prototype") {
			t.Fatalf("%s: %q ran", how, name)
		}
		if n := eval[int](b, "document.querySelectorAll('#levelspan-page :is(img,svg,script,iframe,object,a,style), #levelspan-page [onerror], #levelspan-page [onload], #levelspan-page [onmouseover]').length"); n != 0 {
			t.Errorf("%s: %q made %d elements", how, name, n)
		}
		if s := eval[[]string](b, "stopped"); len(s) != 0 {
			t.Errorf("%s: %q: the policy stopped %v", how, name, s)
		}
		if !eval[bool](b, "document.getElementById('levelspan-stop').hidden") {
			t.Fatalf("%s: %q stopped the page", how, name)
		}
	}
	opened := 0
	for i, name := range names {
		text := strings.Replace(plain, `"name": "Marram"`, `"name": `+quoted(name), 1)
		text = strings.Replace(text, `"name": "landing"`, `"name": `+quoted(name), 1)
		if text == plain {
			t.Fatal("the demonstration has no name to change")
		}
		b.forget()
		switch i % 3 {
		case 0:
			link, err := b.tryCommand(text, "link", "-")
			if err != nil {
				b.open(singleFile(t)) // the name itself is refused: then by file, which must refuse it too
				b.drop("x.json", text)
				break
			}
			b.open(singleFile(t) + "#case=" + strings.TrimSpace(link))
		case 1:
			b.open(singleFile(t))
			b.drop(name+".json", text)
		case 2:
			b.open(singleFile(t))
			eval[bool](b, "levelspan.push(levelspan.PASTE, {text: "+quoted(text)+"}), true")
		}
		check("arriving", name)
		b.do(chromedp.KeyEvent("\u001b"))
		if strings.Contains(eval[string](b, "document.title + document.getElementById('levelspan-layer').textContent"), name) || b.attribute("html", "data-ready") == "true" {
			opened++
		}
		if b.has("tab/aeroplane") {
			b.press("tab/aeroplane")
			check("in the form", name)
		}
		b.press("menu")
		if b.has("cases") {
			b.press("cases")
			check("in the list of cases", name)
		}
		b.do(chromedp.Navigate("about:blank"))
		b.open(singleFile(t)) // from the store
		check("from the store", name)
	}
	if opened < len(names) {
		t.Errorf("%d of %d names were looked at", opened, len(names))
	}
}
