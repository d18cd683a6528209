//go:build !js

package main

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

// TestSession is an afternoon with the page in one file, opened from disk: both handles by mouse and by touch, an
// exact weight typed, the wing area changed and changed back. After each step the page says what the command says.
func TestSession(t *testing.T) {
	b := newTab(t, 1280, 800, 1, true)
	address := singleFile(t) + "?surface=webgl"
	b.open(address)
	if got := b.attribute("html", "data-surface"); got != "webgl" {
		t.Fatalf("surface %q", got)
	}
	if n := eval[int](b, "performance.getEntriesByName('levelspan-first-chart').length"); n != 1 {
		t.Errorf("%d marks of the first chart", n)
	}
	first := b.agree("opening")
	b.seen("opening")

	mass, altitude := b.handle("mass"), b.handle("density-altitude")
	x, y := b.control("handle/mass").middle()
	b.dragMouse(x, y, x-120, y-300, 12) // the pointer may leave the rail
	if got := b.handle("mass"); got >= mass-10 {
		t.Errorf("the weight was dragged from %v to %v", mass, got)
	}
	b.agree("dragging the weight by mouse")
	b.seen("dragging the weight by mouse")

	x, y = b.control("handle/density-altitude").middle()
	b.dragMouse(x, y, x, y-90, 9)
	if got := b.handle("density-altitude"); got <= altitude+100 {
		t.Errorf("the altitude was dragged from %v to %v", altitude, got)
	}
	b.agree("dragging the altitude by mouse")

	mass, altitude = b.handle("mass"), b.handle("density-altitude")
	x, y = b.control("handle/mass").middle()
	b.dragTouch(x, y, x+60, y, 8, input.DispatchTouchEventTypeTouchEnd)
	if got := b.handle("mass"); got <= mass+5 {
		t.Errorf("the weight was dragged by touch from %v to %v", mass, got)
	}
	b.agree("dragging the weight by touch")
	x, y = b.control("handle/density-altitude").middle()
	b.dragTouch(x, y, x, y+120, 8, input.DispatchTouchEventTypeTouchEnd)
	if got := b.handle("density-altitude"); got >= altitude-100 {
		t.Errorf("the altitude was dragged by touch from %v to %v", altitude, got)
	}
	b.agree("dragging the altitude by touch")
	b.seen("dragging the altitude by touch")

	// A touch that the system takes away gives the value back.
	mass = b.handle("mass")
	x, y = b.control("handle/mass").middle()
	b.dragTouch(x, y, x-100, y, 6, input.DispatchTouchEventTypeTouchCancel)
	if got := b.handle("mass"); got != mass {
		t.Errorf("a cancelled touch left the weight at %v, not %v", got, mass)
	}

	// An exact weight: double tap, the drawn keys.
	x, y = b.control("handle/mass").middle()
	b.doubleClick(x, y)
	b.enter("731.5")
	if got := b.handle("mass"); got != 731.5 {
		t.Errorf("731.5 typed, and the weight is %v", got)
	}
	file := b.agree("typing the weight")
	if !strings.Contains(file, `"mass_kg": 731.5`) {
		t.Errorf("the case does not have the weight typed:\n%s", file)
	}
	b.seen("typing the weight")

	// The wing area, and back.
	b.clickOn("tab/aeroplane")
	before := b.rows()
	b.clickOn("field/aeroplane.wing_area_m2")
	b.enter("14.2")
	if file := b.agree("changing the wing area"); !strings.Contains(file, `"wing_area_m2": 14.2`) {
		t.Errorf("the case does not have the wing area typed:\n%s", file)
	}
	if rows := b.rows(); rows[0].CAS == before[0].CAS {
		t.Error("the wing area changed and the stalling speed did not")
	}
	b.clickOn("undo")
	b.agree("undoing it")
	if rows := b.rows(); fmt.Sprint(rows) != fmt.Sprint(before) {
		t.Errorf("after undoing: %v, before: %v", rows, before)
	}
	b.clickOn("tab/chart")

	// Undone to the beginning, it is the case that was opened.
	for range 20 {
		if b.attribute("[data-control=undo]", "aria-disabled") == "true" {
			break
		}
		b.clickOn("undo")
	}
	if last := b.agree("undoing everything"); last != first {
		t.Errorf("everything undone:\n%s\nat first:\n%s", last, first)
	}

	// All that was ever asked for is the file itself.
	b.mu.Lock()
	defer b.mu.Unlock()
	for _, r := range b.requests {
		if r != address && !strings.HasPrefix(r, "data:") {
			t.Errorf("the page asked for %s", r)
		}
	}
}

// enter taps the drawn keys for a number and then OK.
func (b *tab) enter(number string) {
	b.t.Helper()
	for _, c := range number {
		key := "key/" + string(c)
		if c == '.' {
			key = "key/point"
		}
		b.clickOn(key)
	}
	b.clickOn("key/ok")
}

// seen demands that the chart is on the screen: a curve, a handle, a figure.
func (b *tab) seen(after string) {
	b.t.Helper()
	img, _ := b.picture()
	parts := map[string]place{"the curves": b.control("chart"), "the weight handle": b.control("handle/mass"),
		"the altitude handle": b.control("handle/density-altitude"), "the stalling speed": b.control("limit/stall")}
	for name, p := range parts {
		if n := ink(img, p, 1); float64(n) < 0.004*p.W*p.H || n < 60 {
			b.t.Errorf("after %s: %s: %d pixels drawn in %.0f x %.0f", after, name, n, p.W, p.H)
		}
	}
}

// TestKeyboard goes without a pointer: Tab, arrows, Enter, typed digits, Escape, undo, and the browser keeps its keys.
func TestKeyboard(t *testing.T) {
	b := newTab(t, 1280, 800, 1, false)
	b.open(singleFile(t))
	focus := func() string {
		return eval[string](b, "(document.activeElement && document.activeElement.dataset.control) || ''")
	}
	key := func(keys string, options ...chromedp.KeyOption) {
		t.Helper()
		b.do(chromedp.KeyEvent(keys, options...))
		b.settle()
	}
	seen := map[string]bool{}
	for range 60 {
		key(kb.Tab)
		if at := focus(); at == "handle/mass" {
			break
		} else if at != "" {
			seen[at] = true
		}
	}
	if focus() != "handle/mass" || len(seen) < 4 {
		t.Fatalf("Tab came to %q by way of %v", focus(), seen)
	}
	mass := b.handle("mass")
	key(kb.ArrowRight)
	step := b.handle("mass") - mass
	if step <= 0 || step > 5 {
		t.Errorf("an arrow moved the weight by %v", step)
	}
	key(kb.PageDown)
	if page := mass + step - b.handle("mass"); page < 2*step {
		t.Errorf("Page Down moved the weight by %v, an arrow by %v", page, step)
	}
	if focus() != "handle/mass" {
		t.Errorf("the focus wandered to %q", focus())
	}
	b.agree("keys on the weight")

	key(kb.Enter)
	b.until("document.querySelector('[data-control=\"key/ok\"]')")
	b.until("document.activeElement.dataset.control && !document.activeElement.closest('[inert]')")
	for _, c := range "699" {
		key(string(c))
	}
	key(kb.Enter)
	if got := b.handle("mass"); got != 699 {
		t.Errorf("699 typed, and the weight is %v", got)
	}
	key(kb.Enter)
	key(kb.Escape)
	if b.has("key/ok") {
		t.Error("Escape does not close the keypad")
	}
	key("z", chromedp.KeyModifiers(chromedp.ModifierCtrl))
	if got := b.handle("mass"); got == 699 {
		t.Error("Ctrl+Z does not undo")
	}
	// What the page has no use for is the browser's: the event goes on with its default.
	eval[bool](b, "globalThis.kept = [], addEventListener('keydown', e => { if (e.defaultPrevented) kept.push(e.key) }), true")
	key(kb.F6)
	key("l", chromedp.KeyModifiers(chromedp.ModifierCtrl))
	key("1", chromedp.KeyModifiers(chromedp.ModifierAlt))
	if kept := eval[string](b, "kept.join(' ')"); kept != "" {
		t.Errorf("the page keeps %s from the browser", kept)
	}
	b.agree("the keyboard session")
}

// TestSlidersSpeak demands of both handles what a screen reader needs.
func TestSlidersSpeak(t *testing.T) {
	b := newTab(t, 800, 1280, 1, false)
	b.open(singleFile(t))
	for _, name := range []string{"mass", "density-altitude"} {
		s := "[role=slider][data-handle=" + name + "]"
		var low, now, high float64
		if _, err := fmt.Sscan(b.attribute(s, "aria-valuemin")+" "+b.attribute(s, "aria-valuenow")+" "+b.attribute(s, "aria-valuemax"), &low, &now, &high); err != nil || !(low < now && now < high) {
			t.Errorf("%s: %v < %v < %v (%v)", name, low, now, high, err)
		}
		if b.attribute(s, "aria-label") == "" || b.attribute(s, "aria-valuetext") == "" || b.attribute(s, "tabindex") != "0" {
			t.Errorf("%s has no name, text or place in the order of Tab", name)
		}
		if p := b.control("handle/" + name); math.Min(p.W, p.H) < 24 {
			t.Errorf("%s lies over %v x %v", name, p.W, p.H)
		}
	}
	if bad := eval[string](b, `[...document.querySelectorAll('#levelspan-layer [data-control]:not([data-region])')].filter(e => !e.getAttribute('aria-label')).map(e => e.dataset.control).join(' ')`); bad != "" {
		t.Errorf("without a name: %s", bad)
	}
}
