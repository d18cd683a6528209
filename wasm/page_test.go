//go:build !js

package main

import (
	"encoding/json"
	"flag"
	"fmt"
	"image"
	"image/color"
	"math"
	"net/http"
	"net/http/httptest"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/cdproto/page"
	"github.com/chromedp/chromedp"

	"levelspan/game/app"
	"levelspan/game/scene/raster"
)

// noHost is a program's outside that does nothing.
type noHost struct{}

func (noHost) Copy(string, string)             {}
func (noHost) OpenFile()                       {}
func (noHost) SaveFile(string, string, []byte) {}
func (noHost) LinkBase() string                { return "" }
func (noHost) Version() string                 { return "test" }

// TestPictureIsTheScene compares what Chromium shows with the same scene drawn on the processor.
func TestPictureIsTheScene(t *testing.T) {
	for _, c := range []struct {
		width, height int
		scale         float64
	}{{1280, 800, 1}, {390, 844, 2}, {800, 1280, 1.5}} {
		b := newTab(t, c.width, c.height, c.scale, false)
		b.open(singleFile(t))
		got, _ := b.picture()
		a := app.New(noHost{}, nil)
		a.Step(app.Input{Width: float64(c.width), Height: float64(c.height), Scale: c.scale})
		want := raster.Render(a.Scene())
		if got.Bounds().Size() != want.Bounds().Size() {
			t.Errorf("%v: the page is %v, the scene %v", c, got.Bounds().Size(), want.Bounds().Size())
			continue
		}
		if mean, far := difference(got, want); mean > 0.6 || far > 0.002 {
			t.Errorf("%v: mean difference %.3f of 255, %.2f %% of the pixels far off", c, mean, 100*far)
		}
	}
}

// TestTurn turns the tablet: the drawing, the mirror and the touch all follow.
func TestTurn(t *testing.T) {
	b := newTab(t, 1280, 800, 1, true)
	b.open(singleFile(t))
	b.do(chromedp.EmulateViewport(800, 1280, chromedp.EmulateScale(1)))
	b.until("innerWidth === 800 && document.querySelector('[data-handle=mass]').getBoundingClientRect().right < 800")
	b.settle()
	a := app.New(noHost{}, nil)
	a.Step(app.Input{Width: 800, Height: 1280, Scale: 1})
	img, _ := b.picture()
	if mean, far := difference(img, raster.Render(a.Scene())); mean > 0.6 || far > 0.002 {
		t.Errorf("turned: mean difference %.3f of 255, %.2f %% of the pixels far off", mean, 100*far)
	}
	mass := b.handle("mass")
	x, y := b.control("handle/mass").middle()
	b.dragTouch(x, y, x-80, y, 6, input.DispatchTouchEventTypeTouchEnd)
	if b.handle("mass") >= mass {
		t.Error("turned: the handle does not follow the finger")
	}
}

// difference is the mean difference of two pictures and the share of pixels that differ by more than a quarter.
func difference(a, b image.Image) (mean, far float64) {
	size := a.Bounds().Size()
	sum, n := 0.0, 0
	for y := range size.Y {
		for x := range size.X {
			p := color.RGBAModel.Convert(a.At(x, y)).(color.RGBA)
			q := color.RGBAModel.Convert(b.At(x, y)).(color.RGBA)
			d := math.Max(math.Abs(float64(p.R)-float64(q.R)), math.Max(math.Abs(float64(p.G)-float64(q.G)), math.Abs(float64(p.B)-float64(q.B))))
			sum += d
			if d > 64 {
				n++
			}
		}
	}
	return sum / float64(size.X*size.Y), float64(n) / float64(size.X*size.Y)
}

// TestLink opens a share link from disk, follows another while open, and refuses one cut short without losing the case.
func TestLink(t *testing.T) {
	address := singleFile(t)
	b := newTab(t, 1280, 800, 1, false)
	demo, err := os.ReadFile(filepath.Join("..", "assets", "case", "marram.json"))
	b.check(err)
	lighter := strings.Replace(string(demo), `"mass_kg": 760`, `"mass_kg": 655`, 1)
	if lighter == string(demo) {
		t.Fatal("the demo case has no weight of 760 kg to change")
	}
	b.open(address + "#case=" + strings.TrimSpace(b.command(lighter, "link", "-")))
	if got := b.handle("mass"); got != 655 {
		t.Errorf("the link's weight is 655, the page's %v", got)
	}
	b.agree("opening a link")

	heavier := strings.TrimSpace(b.command(strings.Replace(string(demo), `"mass_kg": 760`, `"mass_kg": 790`, 1), "link", "-"))
	eval[bool](b, fmt.Sprintf("location.hash = '#case=%s', true", heavier))
	b.until("document.querySelector('[data-handle=mass]').getAttribute('aria-valuenow') === '790'")
	b.settle()
	b.agree("following a link")

	eval[bool](b, fmt.Sprintf("location.hash = '#case=%s', true", heavier[:len(heavier)/2]))
	b.until("document.querySelector('[inert]')") // a dialog says so
	if got := b.handle("mass"); got != 790 {
		t.Errorf("a link cut short changed the weight to %v", got)
	}
	b.do(chromedp.KeyEvent("\u001b"))
	b.settle()
	b.agree("refusing a link cut short")
}

// TestNothingGetsOut tries what a script in the page could try: the policy stops it.
func TestNothingGetsOut(t *testing.T) {
	b := newTab(t, 800, 600, 1, false)
	asked := make(chan string, 8)
	server := httptest.NewServer(http.HandlerFunc(func(_ http.ResponseWriter, r *http.Request) { asked <- r.URL.Path }))
	defer server.Close()
	b.open(singleFile(t))
	tried := eval[string](b, fmt.Sprintf(`(async () => {
		const said = [], to = %q;
		addEventListener('securitypolicyviolation', e => said.push(e.effectiveDirective));
		try { await fetch(to + '/fetch'); said.push('fetched'); } catch (e) { }
		try { new WebSocket(to.replace('http', 'ws') + '/socket'); } catch (e) { }
		const img = new Image(); img.src = to + '/image'; document.body.append(img);
		const s = document.createElement('script'); s.src = to + '/script'; document.body.append(s);
		const i = document.createElement('script'); i.textContent = 'globalThis.ran = 1'; document.body.append(i);
		setTimeout(() => { try { (0, eval)('globalThis.ran = 2'); } catch (e) { } }); // a debugger's own call may use eval
		await new Promise(done => setTimeout(done, 300));
		return JSON.stringify({said: [...new Set(said)].sort(), ran: globalThis.ran || 0});
	})()`, server.URL), awaitPromise)
	var result struct {
		Said []string
		Ran  int
	}
	if err := json.Unmarshal([]byte(tried), &result); err != nil {
		t.Fatal(err)
	}
	if result.Ran != 0 {
		t.Error("a script that is not the page's own ran")
	}
	for _, want := range []string{"connect-src", "img-src", "script-src-elem"} {
		if !strings.Contains(strings.Join(result.Said, " "), want) {
			t.Errorf("the policy did not stop %s; it stopped %v", want, result.Said)
		}
	}
	select {
	case path := <-asked:
		t.Errorf("%s got out", path)
	default:
	}
}

// awaitPromise lets eval wait for a promise.
var awaitPromise = chromedp.EvalAwaitPromise

// TestProblems takes away what the page needs and expects to be told which it was.
func TestProblems(t *testing.T) {
	for _, c := range []struct{ name, before, query, want string }{
		{"WebAssembly", "delete globalThis.WebAssembly", "", "This browser runs no WebAssembly"},
		{"DecompressionStream", "delete globalThis.DecompressionStream", "", "The program did not load"},
	} {
		b := newTab(t, 800, 600, 1, false)
		if c.before != "" {
			_, err := chromedp.Call(b.ctx, page.AddScriptToEvaluateOnNewDocument, page.AddScriptToEvaluateOnNewDocumentParams{Source: c.before})
			b.check(err)
		}
		b.do(chromedp.Navigate(singleFile(t) + c.query))
		b.until("document.documentElement.dataset.problem")
		if got := b.attribute("html", "data-problem"); got != c.want {
			t.Errorf("without %s: %q", c.name, got)
		}
		if text := eval[string](b, "document.body.innerText"); !strings.Contains(text, "levelspan limits CASE.json") || !strings.Contains(text, "Advisory only") {
			t.Errorf("without %s the page says\n%s", c.name, text)
		}
		if b.attribute("html", "data-ready") != "" {
			t.Errorf("without %s the page says that it is ready", c.name)
		}
	}
}

// TestStops breaks the program in three ways. Each time the figures must be covered, and say so.
func TestStops(t *testing.T) {
	for name, breakIt := range map[string]string{
		"an uncaught error":    "setTimeout(() => { throw new Error('made up') })",
		"a panic":              "levelspan.texts = () => null, dispatchEvent(new KeyboardEvent('keydown', {key: 'ArrowUp', bubbles: true}))",
		"an unhandled promise": "Promise.reject(new Error('made up'))",
	} {
		b := newTab(t, 800, 600, 1, false)
		b.open(singleFile(t))
		eval[bool](b, "globalThis.sameDocument = true")
		eval[bool](b, breakIt+", true")
		b.until("!document.getElementById('levelspan-stop').hidden")
		if b.attribute("html", "data-ready") != "" || !eval[bool](b, "globalThis.sameDocument === true") {
			t.Errorf("after %s the page is still ready, or was loaded anew", name)
		}
		if text := eval[string](b, "document.body.innerText"); !strings.Contains(text, "No figure that was on this screen may be used") || strings.Contains(text, "Stall") {
			t.Errorf("after %s the page says\n%s", name, text)
		}
	}
}

// TestSite serves the split page and asks only its own server for only what is there.
func TestSite(t *testing.T) {
	dir := filepath.Join(buildAll(t), "dist", "site")
	missing := make(chan string, 8)
	files := http.FileServer(http.Dir(dir))
	server := httptest.NewServer(http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		if _, err := os.Stat(filepath.Join(dir, filepath.FromSlash(r.URL.Path))); err != nil {
			missing <- r.URL.Path
		}
		files.ServeHTTP(w, r)
	}))
	defer server.Close()
	b := newTab(t, 1280, 800, 1, false)
	b.open(server.URL + "/")
	b.agree("opening the hosted page")
	select {
	case path := <-missing:
		t.Errorf("the page asked for %s", path)
	default:
	}
	b.mu.Lock()
	defer b.mu.Unlock()
	for _, r := range b.requests {
		if !strings.HasPrefix(r, server.URL+"/") && !strings.HasPrefix(r, "data:") {
			t.Errorf("the page asked for %s", r)
		}
	}
}

var shotsDir = flag.String("shots", "", "directory for TestShots to write pictures into")

// TestShots photographs the page at each size, day and night.
func TestShots(t *testing.T) {
	if *shotsDir == "" {
		t.Skip("no -shots directory")
	}
	for _, size := range [][2]int{{1280, 800}, {800, 1280}, {390, 844}} {
		for _, scale := range []float64{1, 2} {
			for _, palette := range []string{"light", "dark"} {
				b := newTab(t, size[0], size[1], scale, true)
				_, err := chromedp.Call(b.ctx, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{
					Features: []*emulation.MediaFeature{{Name: "prefers-color-scheme", Value: palette}}})
				b.check(err)
				b.open(singleFile(t))
				save := func(what string) {
					_, data := b.picture()
					name := fmt.Sprintf("page-%s-%dx%d@%g-%s.png", what, size[0], size[1], scale, map[string]string{"light": "day", "dark": "night"}[palette])
					b.check(os.WriteFile(filepath.Join(*shotsDir, name), data, 0o644))
				}
				save("chart")
				x, y := b.control("handle/mass").middle()
				b.dragTouch(x, y, x-40, y, 5, input.DispatchTouchEventTypeTouchEnd)
				x, y = b.control("handle/mass").middle()
				b.doubleClick(x, y)
				save("keypad")
				b.clickOn("key/cancel")
				b.clickOn("tab/aeroplane")
				save("aeroplane")
			}
		}
	}
}
