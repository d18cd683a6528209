//go:build !js

package main

import (
	"fmt"
	"net"
	"net/http"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/cdproto/cdp"
	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/page"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

// hosting serves sites on an address that stays the same: it can stop, and serve another version.
type hosting struct {
	t       *testing.T
	tool    string // pagebuild
	dist    string // of the version under test
	address string
	stop    func()
}

func newHosting(t *testing.T) *hosting {
	t.Helper()
	dir := buildAll(t)
	h := &hosting{t: t, tool: filepath.Join(dir, "pagebuild"), dist: filepath.Join(dir, "dist"), stop: func() {}}
	if _, err := os.Stat(h.tool); err != nil {
		if said, err := exec.Command("go", "build", "-o", h.tool, "levelspan/cmd/pagebuild").CombinedOutput(); err != nil {
			t.Fatalf("building pagebuild: %v\n%s", err, said)
		}
	}
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	h.address = l.Addr().String()
	l.Close()
	t.Cleanup(func() { h.stop() })
	return h
}

func (h *hosting) home() string { return "http://" + h.address + "/" }

// serve serves the site of a dist directory as pagebuild does, instead of what was served before.
func (h *hosting) serve(dist string) {
	h.t.Helper()
	h.stop()
	process := exec.Command(h.tool, "-out", dist, "-serve", h.address, "-seconds", "300")
	if err := process.Start(); err != nil {
		h.t.Fatal(err)
	}
	h.stop = func() { process.Process.Kill(); process.Wait(); h.gone() }
	for end := time.Now().Add(20 * time.Second); ; time.Sleep(20 * time.Millisecond) {
		if answer, err := http.Get(h.home() + "sw.js"); err == nil {
			answer.Body.Close()
			return
		} else if time.Now().After(end) {
			h.t.Fatal("the site is not served: ", err)
		}
	}
}

// answer serves by a handler, instead of what was served before.
func (h *hosting) answer(handler http.HandlerFunc) {
	h.t.Helper()
	h.stop()
	l, err := net.Listen("tcp", h.address)
	if err != nil {
		h.t.Fatal(err)
	}
	server := &http.Server{Handler: handler}
	go server.Serve(l)
	h.stop = func() { server.Close(); h.gone() }
}

// gone demands that nothing answers any more.
func (h *hosting) gone() {
	h.stop = func() {}
	if answer, err := http.Get(h.home()); err == nil {
		answer.Body.Close()
		h.t.Error("the server still answers after its end")
	}
}

// newer builds the same program as another version and gives its dist.
func (h *hosting) newer(version string) string {
	h.t.Helper()
	program, _ := filepath.Glob(filepath.Join(h.dist, "site", "levelspan-*.wasm"))
	if len(program) != 1 {
		h.t.Fatalf("programs %v", program)
	}
	dist := filepath.Join(h.t.TempDir(), version)
	if said, err := exec.Command(h.tool, "-out", dist, "-wasm", program[0], "-version", version, "-brotli=false").CombinedOutput(); err != nil {
		h.t.Fatalf("pagebuild: %v\n%s", err, said)
	}
	return dist
}

// kept waits until the page is held for use without its server.
func (b *tab) kept() {
	b.t.Helper()
	b.until("document.documentElement.dataset.offline === 'true' && navigator.serviceWorker.controller")
}

// update has the browser look for another version and waits until that has come in, or has failed to.
func (b *tab) update() {
	b.t.Helper()
	eval[bool](b, `navigator.serviceWorker.getRegistration().then(r => r.update().catch(() => {}).then(async () => {
		while (r.installing) await new Promise(done => setTimeout(done, 50));
		return true;
	}))`, awaitPromise)
}

const offered = "document.documentElement.hasAttribute('data-offer')"

// TestOffline loads the hosted page once and stops its server: the page comes back, works, and keeps what was changed. A
// newer version is then served: it is offered, does not take over by itself, and comes when asked for.
func TestOffline(t *testing.T) {
	h := newHosting(t)
	h.serve(h.dist)
	b := newTab(t, 1280, 800, 1, false)
	b.open(h.home())
	b.kept()
	why, err := chromedp.Call(b.ctx, page.GetInstallabilityErrors, cdp.Empty{})
	b.check(err)
	for _, e := range why.InstallabilityErrors {
		if e.ErrorID != "in-incognito" { // as the windows of these tests are
			t.Errorf("the browser would not install the page: %s %v", e.ErrorID, e.ErrorArguments)
		}
	}
	manifest, err := chromedp.Call(b.ctx, page.GetAppManifest, page.GetAppManifestParams{})
	b.check(err)
	if len(manifest.Errors) > 0 || !strings.HasSuffix(manifest.URL, ".webmanifest") {
		t.Errorf("the manifest %s: %v", manifest.URL, manifest.Errors)
	}
	old := b.attribute("html", "data-version")

	h.stop()
	b.open(h.home())
	x, y := b.control("handle/mass").middle()
	b.dragMouse(x, y, x-60, y, 5)
	mass := b.handle("mass")
	b.agree("a drag without the server")
	demo, err := os.ReadFile(filepath.Join("..", "assets", "case", "marram.json"))
	b.check(err)
	link := "#case=" + strings.TrimSpace(b.command(string(demo), "link", "-"))
	for _, tail := range []string{"?surface=software", "?surface=webgl", "index.html", "?surface=software" + link} {
		b.do(chromedp.Navigate("about:blank"))
		b.open(h.home() + tail)
		want := mass
		if strings.HasSuffix(tail, link) {
			want = 760
		}
		if got := b.handle("mass"); got != want {
			t.Errorf("without the server, %.30s: the weight is %g, want %g", tail, got, want)
		}
		if _, surface, forced := strings.Cut(strings.TrimSuffix(tail, link), "="); forced && b.attribute("html", "data-surface") != surface {
			t.Errorf("without the server, %.30s: the surface is %s", tail, b.attribute("html", "data-surface"))
		}
	}

	// Another version on the server: offered, and the page goes on as it was.
	h.serve(h.newer("newer"))
	b.open(h.home())
	b.until(offered)
	b.settle()
	if got := b.attribute("html", "data-version"); got != old {
		t.Errorf("the newer version came by itself: %q", got)
	}
	x, y = b.control("handle/mass").middle()
	b.dragMouse(x, y, x-30, y, 5)
	b.agree("a drag beside the offer")
	offer := eval[place](b, box("#levelspan-offer"))
	for _, id := range []string{"handle/mass", "handle/density-altitude", "chart"} {
		if c := b.control(id); c.Y+c.H > offer.Y {
			t.Errorf("the offer lies over %s", id)
		}
	}
	// Nor does it come when all windows have been closed.
	b.do(chromedp.Navigate("about:blank"))
	b.open(h.home() + "?surface=software")
	if got := b.attribute("html", "data-version"); got != old {
		t.Errorf("the newer version came with a new window: %q", got)
	}
	b.until(offered)

	// By keyboard, without a keystroke for the chart.
	x, y = b.control("handle/mass").middle()
	b.dragMouse(x, y, x+20, y, 5)
	mass = b.handle("mass")
	const focused = "document.activeElement === document.querySelector('#levelspan-offer button')"
	for range 80 {
		if b.do(chromedp.KeyEvent(kb.Tab)); eval[bool](b, focused) {
			break
		}
	}
	if !eval[bool](b, focused) {
		t.Error("Tab does not come to the offer")
	}
	eval[bool](b, "globalThis.before = true")
	b.do(chromedp.KeyEvent("\r"))
	b.until("!globalThis.before && document.documentElement.dataset.ready === 'true'")
	b.settle()
	if got := b.attribute("html", "data-version"); !strings.HasPrefix(got, "newer ") {
		t.Errorf("after the offer was taken the version is %q", got)
	}
	if got := b.handle("mass"); got != mass {
		t.Errorf("after the offer was taken the weight is %g, was %g", got, mass)
	}
	b.agree("taking the newer version")
	b.kept()
	if n := eval[int](b, "caches.keys().then(all => all.filter(n => !n.endsWith(' choice')).length)", awaitPromise); n != 1 {
		t.Errorf("%d bundles are kept", n)
	}
	h.stop()
	b.open(h.home())
	if got := b.attribute("html", "data-version"); !strings.HasPrefix(got, "newer ") {
		t.Errorf("without the server the version is %q", got)
	}
	if eval[bool](b, offered) {
		t.Error("what is there is offered")
	}
	for _, place := range []string{"#levelspan-version", "#levelspan-shell .levelspan-version"} { // beside the chart, and while it loads
		if text := eval[string](b, fmt.Sprintf("document.querySelector(%q).textContent", place)); !strings.HasPrefix(text, "Version newer (") {
			t.Errorf("%s says %q", place, text)
		}
	}
}

// TestBadNetwork puts the page behind a network that answers everything with a page of its own, and before a server on
// which a version is only half there: neither harms what is kept, and neither is offered.
func TestBadNetwork(t *testing.T) {
	h := newHosting(t)
	h.serve(h.dist)
	b := newTab(t, 1000, 700, 1, false)
	b.open(h.home())
	b.kept()
	old := b.attribute("html", "data-version")
	still := func(when string) {
		t.Helper()
		b.update()
		b.open(h.home())
		b.kept()
		x, y := b.control("handle/mass").middle()
		b.dragMouse(x, y, x-10, y, 5)
		b.agree(when)
		if got := b.attribute("html", "data-version"); got != old || eval[bool](b, offered) {
			t.Errorf("%s: version %q, offered %v", when, got, eval[bool](b, offered))
		}
	}
	h.answer(func(w http.ResponseWriter, _ *http.Request) { fmt.Fprint(w, "<p>Accept our terms") })
	still("behind a network that wants to be asked")

	next := filepath.Join(h.newer("newer"), "site")
	asked := make(chan bool, 1)
	files := http.FileServer(http.Dir(next))
	h.answer(func(w http.ResponseWriter, r *http.Request) {
		if r.URL.Path == "/" { // still, or again, that of another version
			select {
			case asked <- true:
			default:
			}
			http.ServeFile(w, r, filepath.Join(h.dist, "site", "index.html.gz"))
			return
		}
		files.ServeHTTP(w, r)
	})
	still("before a version that is half there")
	select {
	case <-asked:
	default:
		t.Error("the half version was not looked at")
	}

	h.serve(filepath.Dir(next))
	b.update()
	b.until(offered)
}

// mockWorker stands for a worker with a newer version ready.
const mockWorker = `globalThis.posted = [];
	Object.defineProperty(navigator, 'serviceWorker', {value: {addEventListener() {}, register: async () => ({update: async () => {}}),
		controller: {postMessage(what, [line]) { posted.push(what); line.postMessage({version: 'v9.12-34-g0123456 (01234567)', taken: false}); }}}});`

// box is an expression for the place of the first element that a selector finds.
func box(selector string) string {
	return fmt.Sprintf("(r => ({X: r.x, Y: r.y, W: r.width, H: r.height}))(document.querySelector(%q).getBoundingClientRect())", selector)
}

// TestOffer looks at the offer at each size by day and by night, and puts it off: the present version stays, and the
// window's foot is free again.
func TestOffer(t *testing.T) {
	h := newHosting(t)
	h.serve(h.dist)
	for i, size := range [][2]int{{390, 844}, {1280, 800}, {800, 1280}} {
		for _, palette := range []string{"light", "dark"} {
			b := newTab(t, size[0], size[1], 1, true)
			_, err := chromedp.Call(b.ctx, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{
				Features: []*emulation.MediaFeature{{Name: "prefers-color-scheme", Value: palette}}})
			b.check(err)
			b.before(mockWorker)
			b.open(h.home() + []string{"", "?surface=webgl"}[i%2])
			b.until(offered)
			foot := fmt.Sprintf("document.body.clientHeight === %d && document.querySelector('body>canvas').getBoundingClientRect().height === %[1]d", size[1]-64)
			b.until(foot)
			b.settle()
			img, data := b.picture()
			if *shotsDir != "" {
				b.check(os.WriteFile(filepath.Join(*shotsDir, fmt.Sprintf("page-offer-%dx%d-%s.png", size[0], size[1], palette)), data, 0o644))
			}
			if ink(img, place{0, float64(size[1] - 64), float64(size[0]), 64}, 1) < 200 {
				t.Error("the offer cannot be seen")
			}
			for n := 1; n <= 2; n++ {
				r := eval[place](b, box(fmt.Sprintf("#levelspan-offer button:nth-of-type(%d)", n)))
				if r.H < 48 || r.W < 48 || r.X < 0 || r.X+r.W > float64(size[0]) || r.Y+r.H > float64(size[1]) {
					t.Errorf("%v %s: button %d lies at %+v", size, palette, n, r)
				}
			}
			if high := eval[place](b, box("#levelspan-offer div")); high.H > 63 {
				t.Errorf("%v %s: the text is %g high", size, palette, high.H)
			}
			if clipped := eval[string](b, `[...document.querySelectorAll('#levelspan-offer :is(p,small,button)')].filter(e => e.scrollWidth > e.clientWidth + 1 && getComputedStyle(e).display !== 'inline').map(e => e.textContent).join('; ')`); clipped != "" {
				t.Errorf("%v %s: no room for %q", size, palette, clipped)
			}
			if worst := eval[float64](b, contrasts); worst < 4.5 {
				t.Errorf("%v %s: contrast %.2f", size, palette, worst)
			}
			if b.attribute("#levelspan-offer p", "role") != "status" || eval[string](b, "document.querySelector('#levelspan-offer p').textContent") == "" {
				t.Error("the offer is not announced")
			}
			eval[bool](b, "document.querySelectorAll('#levelspan-offer button')[1].click(), true")
			b.until(fmt.Sprintf("document.body.clientHeight === %d && document.querySelector('body>canvas').getBoundingClientRect().height === %[1]d", size[1]))
			if posted := eval[string](b, "posted.join(' ')"); strings.Contains(posted, "take") {
				t.Errorf("putting off took the newer version: %s", posted)
			}
		}
	}
}

// contrasts is the least contrast (WCAG 2.2, 1.4.3) of the offer's texts.
const contrasts = `(() => {
	const light = c => { const [r, g, b] = c.match(/[\d.]+/g).map(v => (v /= 255) <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4); return 0.2126 * r + 0.7152 * g + 0.0722 * b; };
	const ground = e => { const c = getComputedStyle(e).backgroundColor; return /, 0\)|transparent/.test(c) ? ground(e.parentElement) : c; };
	return Math.min(...[...document.querySelectorAll('#levelspan-offer :is(p,small,button)')].map(e => {
		const a = light(getComputedStyle(e).color), b = light(ground(e));
		return (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
	}));
})()`

// TestOfferWaitsForTheHand holds a handle while a newer version comes: nothing moves under the finger. What could not be
// saved takes a second press.
func TestOfferWaitsForTheHand(t *testing.T) {
	h := newHosting(t)
	h.serve(h.dist)
	b := newTab(t, 1000, 700, 1, true)
	b.before(mockWorker + `const post = navigator.serviceWorker.controller.postMessage;
		navigator.serviceWorker.controller.postMessage = function (what, lines) { if (globalThis.come || what === 'take') post.call(this, what, lines); else globalThis.comes = () => post.call(this, what, lines); };
		Storage.prototype.setItem = function () { throw new DOMException('full', 'QuotaExceededError'); };`)
	b.open(h.home() + "?surface=software")
	b.until("globalThis.comes")
	x, y := b.control("handle/mass").middle()
	const down = "document.querySelector('#levelspan-layer.held')"
	eval[bool](b, fmt.Sprintf(`(() => { globalThis.point = (kind, x) => document.getElementById('levelspan-layer').dispatchEvent(new PointerEvent(kind,
		{bubbles: true, pointerId: 3, pointerType: 'touch', clientX: x, clientY: %g, button: 0, buttons: 1})); point('pointerdown', %g); point('pointermove', %g); return true; })()`, y, x, x-20))
	b.until(down)
	eval[bool](b, "comes(), true")
	time.Sleep(time.Second)
	if eval[bool](b, offered) {
		t.Error("the offer came under the finger")
	}
	eval[bool](b, fmt.Sprintf("point('pointermove', %g), point('pointerup', %[1]g), true", x-40))
	b.until(offered)
	b.settle()
	b.agree("the drag that the offer waited for")

	eval[bool](b, "globalThis.sameDocument = true, document.querySelector('#levelspan-offer button').click(), true")
	time.Sleep(300 * time.Millisecond)
	if !eval[bool](b, "globalThis.sameDocument === true && !posted.includes('take')") {
		t.Error("a case that could not be saved was thrown away")
	}
	if said := eval[string](b, "document.querySelector('#levelspan-offer p').textContent"); !strings.Contains(said, "not saved") {
		t.Errorf("the offer says %q", said)
	}
	b.do(chromedp.EmulateViewport(390, 844, chromedp.EmulateScale(1)))
	b.settle()
	if high := eval[place](b, box("#levelspan-offer div")); high.H > 63 {
		t.Errorf("the text is %g high", high.H)
	}
	eval[bool](b, "document.querySelector('#levelspan-offer button').click(), true")
	b.until("!globalThis.sameDocument")
}
