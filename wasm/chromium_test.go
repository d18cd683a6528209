//go:build !js

package main

import (
	"bytes"
	"context"
	"encoding/json"
	"fmt"
	"image"
	_ "image/png"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/cdproto/page"
	"github.com/chromedp/chromedp"
)

// required reports whether the absence of a browser or a display is a failure: make test sets it, so that nothing is
// left out there without a word.
func required() bool { return os.Getenv("LEVELSPAN_OUTSIDE") == "required" }

// without skips, or fails where what is missing is required.
func without(t *testing.T, what string) {
	t.Helper()
	if required() {
		t.Fatalf("%s is not here, and LEVELSPAN_OUTSIDE=required", what)
	}
	t.Skipf("%s is not here (make test installs it)", what)
}

// built is what the browser tests look at, made once a run: the page, and the command to compare it with.
var built struct {
	once    sync.Once
	dir     string
	command string
	err     error
}

func TestMain(m *testing.M) {
	code := m.Run()
	if browser.stop != nil {
		browser.stop()
	}
	if built.dir != "" {
		os.RemoveAll(built.dir)
	}
	os.Exit(code)
}

// buildAll makes dist/ and the command in a directory of their own.
func buildAll(t *testing.T) string {
	t.Helper()
	built.once.Do(func() {
		if built.dir, built.err = os.MkdirTemp("", "levelspan-browser"); built.err != nil {
			return
		}
		built.command = filepath.Join(built.dir, "levelspan")
		for _, args := range [][]string{
			{"build", "-o", built.command, "levelspan/cmd/levelspan"},
			{"run", "levelspan/cmd/pagebuild", "-out", filepath.Join(built.dir, "dist"), "-version", "test", "-brotli=false"},
		} {
			if said, err := exec.Command("go", args...).CombinedOutput(); err != nil {
				built.err = fmt.Errorf("go %s: %w\n%s", strings.Join(args, " "), err, said)
				return
			}
		}
	})
	if built.err != nil {
		t.Fatal(built.err)
	}
	return built.dir
}

// singleFile is the address of the page in one file.
func singleFile(t *testing.T) string {
	return "file://" + filepath.ToSlash(filepath.Join(buildAll(t), "dist", "levelspan.html"))
}

// browser is the one Chromium of the run. Its WebGL is SwiftShader: these tests mean the webgl surface.
var browser struct {
	once    sync.Once
	ctx     context.Context
	stop    func()
	profile string // its directory, which names it among the processes
	err     error
}

func chromium() string {
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome"} {
		if path, err := exec.LookPath(name); err == nil {
			return path
		}
	}
	return ""
}

// tab is one page in the browser.
type tab struct {
	t        *testing.T
	ctx      context.Context
	mu       sync.Mutex
	requests []string // addresses that the page asked for
	said     []string // errors on its console
}

// newTab opens an empty tab of a size, device pixels a logical pixel, with touch or without.
func newTab(t *testing.T, width, height int, scale float64, touch bool) *tab {
	t.Helper()
	path := chromium()
	if path == "" {
		without(t, "Chromium")
	}
	browser.once.Do(func() {
		profile, err := os.MkdirTemp("", "levelspan-profile")
		if err != nil {
			browser.err = err
			return
		}
		browser.profile = profile
		ctx, stop, err := startBrowser(path, profile)
		browser.ctx, browser.err = ctx, err
		browser.stop = func() { stop(); os.RemoveAll(profile) }
	})
	if browser.err != nil {
		t.Fatal(browser.err)
	}
	return tabOf(t, browser.ctx, width, height, scale, touch, chromedp.WithNewBrowserContext())
}

// startBrowser starts a Chromium with a profile directory.
func startBrowser(path, profile string, more ...chromedp.ExecAllocatorOption) (context.Context, func(), error) {
	options := append(chromedp.DefaultExecAllocatorOptions[:],
		chromedp.ExecPath(path), chromedp.NoSandbox, chromedp.UserDataDir(profile),
		chromedp.Flag("headless", "new"), chromedp.Flag("enable-unsafe-swiftshader", true),
		chromedp.Flag("disable-component-update", true), chromedp.Flag("disable-background-networking", true))
	options = append(options, more...)
	allocator, stopAllocator := chromedp.NewExecAllocator(context.Background(), options...)
	ctx, stop := chromedp.NewContext(allocator)
	return ctx, func() { stop(); stopAllocator() }, chromedp.Do(ctx)
}

// beside opens another tab that shares this one's storage.
func (b *tab) beside(width, height int) *tab {
	return tabOf(b.t, b.ctx, width, height, 1, false)
}

// tabOf opens an empty tab in a browser, or beside another tab.
func tabOf(t *testing.T, parent context.Context, width, height int, scale float64, touch bool, options ...chromedp.ContextOption) *tab {
	t.Helper()
	ctx, stop := chromedp.NewContext(parent, options...)
	ctx, stopTime := context.WithTimeout(ctx, 4*time.Minute)
	t.Cleanup(func() { stopTime(); stop() })
	b := &tab{t: t, ctx: ctx}
	b.do(chromedp.EmulateViewport(int64(width), int64(height), chromedp.EmulateScale(scale)))
	b.check(chromedp.Listen(ctx, func(ev any) {
		if e, ok := ev.(*network.EventRequestWillBeSent); ok {
			b.mu.Lock()
			b.requests = append(b.requests, e.Request.URL)
			b.mu.Unlock()
		}
	}))
	_, err := chromedp.Call(ctx, network.Enable, network.EnableParams{})
	b.check(err)
	if touch {
		_, err = chromedp.Call(ctx, emulation.SetTouchEmulationEnabled, emulation.SetTouchEmulationEnabledParams{Enabled: true, MaxTouchPoints: 5})
		b.check(err)
	}
	return b
}

func (b *tab) check(err error) {
	b.t.Helper()
	if err != nil {
		b.t.Fatal(err)
	}
}

func (b *tab) do(steps ...chromedp.Action[chromedp.Void]) {
	b.t.Helper()
	b.check(chromedp.Do(b.ctx, steps...))
}

// eval evaluates an expression in the page.
func eval[T any](b *tab, expression string, options ...chromedp.EvaluateOption) T {
	b.t.Helper()
	v, err := chromedp.Run(b.ctx, chromedp.Evaluate[T](expression, options...))
	if err != nil {
		b.t.Fatalf("%s: %v", expression, err)
	}
	return v
}

// until waits until an expression is true.
func (b *tab) until(expression string) {
	b.t.Helper()
	for end := time.Now().Add(60 * time.Second); ; {
		if eval[bool](b, "!!("+expression+")") {
			return
		}
		if time.Now().After(end) {
			b.t.Fatalf("never came true: %s\nproblem %q\nstopped %q", expression,
				eval[string](b, "document.getElementById('levelspan-problem').textContent"),
				eval[string](b, "document.querySelector('#levelspan-stop pre').textContent"))
		}
		time.Sleep(20 * time.Millisecond)
	}
}

// before runs a script before those of every page to come.
func (b *tab) before(script string) {
	b.t.Helper()
	_, err := chromedp.Call(b.ctx, page.AddScriptToEvaluateOnNewDocument, page.AddScriptToEvaluateOnNewDocumentParams{Source: script})
	b.check(err)
}

// open goes to an address and waits for the first chart.
func (b *tab) open(address string) {
	b.t.Helper()
	b.do(chromedp.Navigate(address))
	b.until("document.documentElement.dataset.ready === 'true'")
	b.settle()
}

// settle waits until the browser has shown two more frames: what was asked for has been drawn.
func (b *tab) settle() {
	b.t.Helper()
	_, err := chromedp.Run(b.ctx, chromedp.Evaluate[bool](
		"new Promise(done => requestAnimationFrame(() => requestAnimationFrame(() => setTimeout(() => done(true), 0))))", chromedp.EvalAwaitPromise))
	b.check(err)
}

// place is where an element lies, logical pixels.
type place struct{ X, Y, W, H float64 }

func (p place) middle() (float64, float64) { return p.X + p.W/2, p.Y + p.H/2 }

// control is the place of a drawn control, by the ID of its element.
func (b *tab) control(id string) place {
	b.t.Helper()
	name, _ := json.Marshal(id)
	text := eval[string](b, fmt.Sprintf(`(() => { const e = document.querySelector('[data-control=' + CSS.escape(%s) + ']');
		if (!e) return ''; const r = e.getBoundingClientRect(); return JSON.stringify({X: r.x, Y: r.y, W: r.width, H: r.height}); })()`, name))
	var p place
	if text == "" || json.Unmarshal([]byte(text), &p) != nil {
		b.t.Fatalf("no element for control %s; there are %s", id,
			eval[string](b, "[...document.querySelectorAll('[data-control]')].map(e => e.dataset.control).join(' ')"))
	}
	return p
}

// has reports whether a control is there.
func (b *tab) has(id string) bool {
	b.t.Helper()
	name, _ := json.Marshal(id)
	return eval[bool](b, fmt.Sprintf("!!document.querySelector('[data-control=' + CSS.escape(%s) + ']')", name))
}

// attribute is one of an element's attributes, "" if it has none of that name.
func (b *tab) attribute(selector, name string) string {
	b.t.Helper()
	s, _ := json.Marshal(selector)
	return eval[string](b, fmt.Sprintf("(document.querySelector(%s)||{getAttribute(){}}).getAttribute('%s')||''", s, name))
}

func (b *tab) mouse(kind input.DispatchMouseEventType, x, y float64, clicks int) {
	b.t.Helper()
	b.do(chromedp.MouseEvent(kind, x, y, chromedp.ButtonLeft, chromedp.ClickCount(clicks)))
}

// click presses and releases the mouse at a place.
func (b *tab) click(x, y float64) {
	b.t.Helper()
	b.mouse(input.DispatchMouseEventTypeMousePressed, x, y, 1)
	b.mouse(input.DispatchMouseEventTypeMouseReleased, x, y, 1)
	b.settle()
}

// doubleClick clicks twice at a place, 150 ms apart by the events' own clock, however long the machine takes.
func (b *tab) doubleClick(x, y float64) {
	b.t.Helper()
	start := float64(time.Now().UnixMicro()) / 1e6
	for i, kind := range []input.DispatchMouseEventType{input.DispatchMouseEventTypeMousePressed, input.DispatchMouseEventTypeMouseReleased,
		input.DispatchMouseEventTypeMousePressed, input.DispatchMouseEventTypeMouseReleased} {
		at := input.TimeSinceEpoch(start + 0.05*float64(i))
		b.do(chromedp.MouseEvent(kind, x, y, chromedp.ButtonLeft, chromedp.ClickCount(1+i/2), func(p *input.DispatchMouseEventParams) { p.Timestamp = at }))
	}
	b.settle()
}

// clickOn clicks where a control is drawn.
func (b *tab) clickOn(id string) {
	b.t.Helper()
	b.click(b.control(id).middle())
}

// dragMouse drags from one place to another in steps.
func (b *tab) dragMouse(x0, y0, x1, y1 float64, steps int) {
	b.t.Helper()
	b.mouse(input.DispatchMouseEventTypeMousePressed, x0, y0, 1)
	for i := 1; i <= steps; i++ {
		f := float64(i) / float64(steps)
		b.mouse(input.DispatchMouseEventTypeMouseMoved, x0+f*(x1-x0), y0+f*(y1-y0), 0)
	}
	b.mouse(input.DispatchMouseEventTypeMouseReleased, x1, y1, 1)
	b.settle()
}

func (b *tab) touch(kind input.DispatchTouchEventType, points ...*input.TouchPoint) {
	b.t.Helper()
	if points == nil {
		points = []*input.TouchPoint{}
	}
	_, err := chromedp.Call(b.ctx, input.DispatchTouchEvent, input.DispatchTouchEventParams{Type: kind, TouchPoints: points})
	b.check(err)
}

// dragTouch drags a finger from one place to another in steps, and lifts it or has it taken away.
func (b *tab) dragTouch(x0, y0, x1, y1 float64, steps int, end input.DispatchTouchEventType) {
	b.t.Helper()
	b.touch(input.DispatchTouchEventTypeTouchStart, &input.TouchPoint{X: x0, Y: y0})
	for i := 1; i <= steps; i++ {
		f := float64(i) / float64(steps)
		b.touch(input.DispatchTouchEventTypeTouchMove, &input.TouchPoint{X: x0 + f*(x1-x0), Y: y0 + f*(y1-y0)})
	}
	b.touch(end)
	b.settle()
}

// picture is what the tab shows.
func (b *tab) picture() (image.Image, []byte) {
	b.t.Helper()
	data, err := chromedp.Run(b.ctx, chromedp.CaptureScreenshot())
	b.check(err)
	img, _, err := image.Decode(bytes.NewReader(data))
	b.check(err)
	return img, data
}
