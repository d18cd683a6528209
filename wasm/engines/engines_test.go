package engines

import (
	"bytes"
	"encoding/json"
	"flag"
	"fmt"
	"image"
	_ "image/png"
	"math"
	"net/http"
	"net/http/httptest"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"
)

var shots = flag.String("shots", "", "directory to write a picture of each engine's page into")

var built struct {
	once         sync.Once
	dir, command string
	err          error
}

func TestMain(m *testing.M) {
	code := m.Run()
	if built.dir != "" {
		os.RemoveAll(built.dir)
	}
	os.Exit(code)
}

// page is the file of the page, made once a run beside the command to compare it with.
func page(t *testing.T) string {
	t.Helper()
	built.once.Do(func() {
		if built.dir, built.err = os.MkdirTemp("", "levelspan-engines"); built.err != nil {
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
	return filepath.Join(built.dir, "dist", "levelspan.html")
}

// command runs the levelspan command.
func command(t *testing.T, stdin string, args ...string) string {
	t.Helper()
	page(t)
	cmd := exec.Command(built.command, args...)
	cmd.Stdin = strings.NewReader(stdin)
	out, err := cmd.Output()
	if err != nil && cmd.ProcessState.ExitCode() != 1 {
		t.Fatalf("levelspan %s: %v", strings.Join(args, " "), err)
	}
	return string(out)
}

// demo is the demonstration's case file with another weight.
func demo(t *testing.T, mass string) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "..", "assets", "case", "marram.json"))
	if err != nil {
		t.Fatal(err)
	}
	changed := strings.Replace(string(text), `"mass_kg": 760`, `"mass_kg": `+mass, 1)
	if changed == string(text) && mass != "760" {
		t.Fatal("the demonstration's weight is not 760 kg")
	}
	return changed
}

// The engines. WebKit's port needs a display; the others are headless.
var engines = []struct {
	name   string
	start  func(t *testing.T) browser
	webgl2 bool   // there is, drawn by the processor here
	choice string // the surface that the page takes by itself: WebKit does not say that its WebGL2 is software
}{
	{"chromium", func(t *testing.T) browser {
		binary := program(t, "chromium", "chromium-browser", "google-chrome")
		port := freePort(t)
		start(t, nil, program(t, "chromedriver"), "--port="+port)
		return newWebDriver(t, port, map[string]any{"goog:chromeOptions": map[string]any{"binary": binary,
			"args": []string{"--headless=new", "--no-sandbox", "--disable-component-update", "--disable-background-networking", "--enable-unsafe-swiftshader"}}})
	}, true, "software"},
	{"firefox", func(t *testing.T) browser { return newBiDi(t, program(t, "firefox-esr", "firefox")) }, false, "software"},
	{"webkit", func(t *testing.T) browser {
		driver := program(t, "WebKitWebDriver")
		small := program(t, "/usr/lib/*/webkit2gtk-4*/MiniBrowser", "/usr/libexec/webkit2gtk-4*/MiniBrowser")
		port := freePort(t)
		start(t, []string{"DISPLAY=" + display(t), "WEBKIT_DISABLE_SANDBOX_THIS_IS_DANGEROUS=1", "LIBGL_ALWAYS_SOFTWARE=1", "GDK_BACKEND=x11", "NO_AT_BRIDGE=1"}, driver, "--port="+port)
		return newWebDriver(t, port, map[string]any{"webkitgtk:browserOptions": map[string]any{"binary": small, "args": []string{"--automation"}}})
	}, true, "webgl"},
}

// user is a person at a browser.
type user struct {
	t *testing.T
	b browser
}

func (u user) check(err error) {
	u.t.Helper()
	if err != nil {
		u.t.Fatal(err)
	}
}

func (u user) eval(expression string) string {
	u.t.Helper()
	v, err := u.b.eval("String(" + expression + ")")
	u.check(err)
	return v
}

func (u user) until(expression string) {
	u.t.Helper()
	for end := time.Now().Add(60 * time.Second); u.eval(expression) != "true"; time.Sleep(30 * time.Millisecond) {
		if time.Now().After(end) {
			u.t.Fatalf("never came true: %s\nproblem %s\nstopped %s", expression,
				u.eval("(document.getElementById('levelspan-problem')||{}).textContent"), u.eval("(document.querySelector('#levelspan-stop pre')||{}).textContent"))
		}
	}
}

// open goes to an address and waits for the first chart.
func (u user) open(address string) {
	u.t.Helper()
	u.check(u.b.open("about:blank"))
	u.check(u.b.open(address))
	u.until("document.documentElement.dataset.ready === 'true'")
	u.settle()
}

// settle waits for two frames.
func (u user) settle() {
	u.t.Helper()
	u.eval("(globalThis.frames2 = 0, requestAnimationFrame(() => requestAnimationFrame(() => setTimeout(() => { globalThis.frames2 = 1; }))), '')")
	u.until("globalThis.frames2 === 1")
}

// place is the middle of a control.
func (u user) place(id string) (x, y int) {
	u.t.Helper()
	text := u.eval(fmt.Sprintf("(e => { if (!e) return ''; const r = e.getBoundingClientRect(); return Math.round(r.x + r.width / 2) + ' ' + Math.round(r.y + r.height / 2); })(document.querySelector('[data-control=\"%s\"]'))", id))
	if _, err := fmt.Sscan(text, &x, &y); err != nil {
		u.t.Fatalf("no control %s; there are %s", id, u.eval("[...document.querySelectorAll('[data-control]')].map(e => e.dataset.control).join(' ')"))
	}
	return x, y
}

func (u user) has(id string) bool {
	u.t.Helper()
	return u.eval(fmt.Sprintf("!!document.querySelector('[data-control=\"%s\"]')", id)) == "true"
}

func (u user) handle(name string) (v float64) {
	u.t.Helper()
	if _, err := fmt.Sscan(u.eval("document.querySelector('[role=slider][data-handle="+name+"]').getAttribute('aria-valuenow')"), &v); err != nil {
		u.t.Fatal(err)
	}
	return v
}

type action = map[string]any

// mouse moves, presses and releases: a path of places, pressed from the first to the last.
func (u user) mouse(path ...[2]int) {
	u.t.Helper()
	at := func(p [2]int) action {
		return action{"type": "pointerMove", "x": p[0], "y": p[1], "duration": 0, "origin": "viewport"}
	}
	list := []any{at(path[0]), action{"type": "pointerDown", "button": 0}}
	for _, p := range path[1:] {
		list = append(list, at(p), action{"type": "pause", "duration": 20})
	}
	list = append(list, action{"type": "pointerUp", "button": 0})
	u.check(u.b.act([]any{action{"type": "pointer", "id": "mouse", "parameters": action{"pointerType": "mouse"}, "actions": list}}))
	u.settle()
}

func (u user) tap(id string) {
	u.t.Helper()
	x, y := u.place(id)
	u.mouse([2]int{x, y})
}

// drag drags a control by so many pixels.
func (u user) drag(id string, dx, dy int) {
	u.t.Helper()
	x, y := u.place(id)
	path := [][2]int{{x, y}}
	for i := 1; i <= 6; i++ {
		path = append(path, [2]int{x + dx*i/6, y + dy*i/6})
	}
	u.mouse(path...)
}

func (u user) keys(text ...string) {
	u.t.Helper()
	var list []any
	for _, k := range text {
		list = append(list, action{"type": "keyDown", "value": k}, action{"type": "keyUp", "value": k})
	}
	u.check(u.b.act([]any{action{"type": "key", "id": "keys", "actions": list}}))
	u.settle()
}

// caseOn is the case on the page, as its own link says it.
func (u user) link() string {
	u.t.Helper()
	u.eval("(document.getElementById('levelspan-copied').textContent = '', '')")
	u.tap("share")
	u.tap("share/link")
	u.until("document.getElementById('levelspan-copied').textContent !== ''")
	link := u.eval("document.getElementById('levelspan-copied').textContent")
	if u.eval("!document.getElementById('levelspan-copy').hidden") == "true" { // the browser gave no clipboard
		u.eval("(document.querySelector('#levelspan-copy button').click(), '')")
	}
	return link
}

// agree compares every figure with what the command says of the page's own case.
func (u user) agree(after string) {
	u.t.Helper()
	_, fragment, found := strings.Cut(u.link(), "#case=")
	if !found {
		u.t.Fatal("the link has no case")
	}
	var answer struct {
		Limits []struct {
			Key string  `json:"key"`
			CAS float64 `json:"cas_mps"`
		}
	}
	u.check(json.Unmarshal([]byte(command(u.t, command(u.t, "", "open", fragment), "limits", "-", "--json")), &answer))
	var page map[string]string
	u.check(json.Unmarshal([]byte(u.eval("JSON.stringify(Object.fromEntries([...document.querySelectorAll('#levelspan-limits tr[data-key]')].map(r => [r.dataset.key, (r.querySelector('[data-cas-mps]')||{dataset:{}}).dataset.casMps])))")), &page))
	if len(answer.Limits) == 0 || len(page) != len(answer.Limits) {
		u.t.Errorf("%s: the page has %d limits, the command %d", after, len(page), len(answer.Limits))
	}
	for _, l := range answer.Limits {
		var v float64
		fmt.Sscan(page[l.Key], &v)
		if math.Abs(v-l.CAS) > 1e-6*l.CAS {
			u.t.Errorf("%s: %s is %v on the page, %v by the command", after, l.Key, v, l.CAS)
		}
	}
}

// surface demands one.
func (u user) surface(want string) {
	u.t.Helper()
	if got := u.eval("document.documentElement.dataset.surface"); got != want {
		u.t.Errorf("the surface is %s, not %s", got, want)
	}
}

// seen demands a picture of many colours, and gives it small.
func (u user) seen(name string) {
	u.t.Helper()
	data, err := u.b.picture()
	u.check(err)
	if *shots != "" {
		u.check(os.WriteFile(filepath.Join(*shots, "engine-"+name+".png"), data, 0o644))
	}
	img, _, err := image.Decode(bytes.NewReader(data))
	u.check(err)
	colours := map[[3]uint32]bool{}
	for y := img.Bounds().Min.Y; y < img.Bounds().Max.Y; y += 3 {
		for x := img.Bounds().Min.X; x < img.Bounds().Max.X; x += 3 {
			r, g, b, _ := img.At(x, y).RGBA()
			colours[[3]uint32{r >> 10, g >> 10, b >> 10}] = true
		}
	}
	if len(colours) < 40 {
		u.t.Errorf("%s: the picture has %d colours", name, len(colours))
	}
}

// TestEngines does in each engine what a person does with the page in the field.
func TestEngines(t *testing.T) {
	for _, e := range engines {
		t.Run(e.name, func(t *testing.T) {
			b := e.start(t)
			u := user{t, b}
			u.check(b.size(1280, 800))
			file := "file://" + filepath.ToSlash(page(t))

			// From the disk, on the surface that the page chooses and on each asked for.
			if e.webgl2 {
				u.open(file + "?surface=webgl")
				u.surface("webgl")
				u.seen(e.name + "-webgl")
				u.agree("opening with WebGL")
				before := u.handle("mass")
				if u.drag("handle/mass", -60, 0); u.handle("mass") >= before {
					t.Errorf("with WebGL the handle does not follow: %g", u.handle("mass"))
				}
			}
			u.open(file)
			u.surface(e.choice)
			u.open(file + "?surface=software")
			u.surface("software")
			u.seen(e.name)
			u.agree("opening")

			// A drag, and its end.
			before := u.handle("mass")
			u.drag("handle/mass", -60, 0)
			dragged := u.handle("mass")
			if dragged >= before {
				t.Errorf("the handle does not follow: %g, then %g", before, dragged)
			}
			u.mouse([2]int{200, 20})
			if got := u.handle("mass"); got != dragged {
				t.Errorf("the handle sticks to the mouse: %g", got)
			}
			height := u.handle("density-altitude")
			if u.drag("handle/density-altitude", 0, -60); u.handle("density-altitude") <= height {
				t.Error("the other handle does not follow")
			}
			u.agree("two drags")

			// What was changed is there after loading again.
			mass := u.handle("mass")
			u.open(file + "?surface=software")
			kept := u.handle("mass")
			if kept != mass {
				t.Errorf("after loading again the weight is %g, was %g; kept: %s", kept, mass, u.eval("(() => { try { return Object.keys(localStorage).join(' '); } catch (e) { return e; } })()"))
			}

			// Keys on a handle; Tab is the browser's.
			u.eval("(document.querySelector('[data-handle=mass]').focus(), '')")
			was := u.handle("mass")
			u.keys("\ue014") // right
			if got := u.handle("mass"); got <= was {
				t.Errorf("a key does not move the handle: %g", got)
			}
			u.eval("(addEventListener('keydown', e => setTimeout(() => { globalThis.taken = e.defaultPrevented; })), '')")
			u.keys("\ue004") // tab
			u.until("globalThis.taken === false")

			// The keypad: a figure that holds, and one that is refused.
			u.tap("tab/aeroplane")
			u.tap("field/aeroplane.wing_area_m2")
			for _, k := range []string{"1", "7"} {
				u.tap("key/" + k)
			}
			u.tap("key/ok")
			if got := u.eval(`document.querySelector('[data-control="field/aeroplane.wing_area_m2"]').textContent + document.querySelector('[data-control="field/aeroplane.wing_area_m2"]').ariaLabel`); !strings.Contains(got, "17") {
				t.Errorf("the wing area is %q", got)
			}
			u.tap("field/aeroplane.wing_area_m2")
			u.tap("key/0")
			u.tap("key/ok")
			if !u.has("key/ok") && u.eval(`document.querySelector('[data-control="field/aeroplane.wing_area_m2"]').getAttribute('aria-invalid')`) != "true" {
				t.Error("a wing of no area is not refused")
			}
			u.keys("\ue00c") // escape
			u.tap("tab/chart")
			u.agree("typing")

			// Links: the command's, and the page's own.
			u.open(file + "#case=" + strings.TrimSpace(command(t, demo(t, "655"), "link", "-")))
			if got := u.handle("mass"); got != 655 {
				t.Errorf("the link's weight is 655, the page's %g", got)
			}
			u.drag("handle/mass", 40, 0)
			own, mass := u.link(), u.handle("mass")
			u.open(file + own[strings.Index(own, "#"):])
			if got := u.handle("mass"); got != mass {
				t.Errorf("the page's own link gives %g, not %g", got, mass)
			}
			u.agree("the page's own link")

			// The narrow window of a phone, and from a server.
			u.check(b.size(390, 844))
			u.settle()
			u.seen(e.name + "-narrow")
			server := httptest.NewServer(http.FileServer(http.Dir(filepath.Dir(page(t)))))
			defer server.Close()
			u.open(server.URL + "/levelspan.html")
			u.drag("handle/mass", -30, 0)
			mass = u.handle("mass")
			u.open(server.URL + "/levelspan.html")
			if got := u.handle("mass"); got != mass {
				t.Errorf("from a server: after loading again the weight is %g, was %g", got, mass)
			}
			if d, ok := b.(*biDi); ok {
				d.mu.Lock()
				for _, s := range d.said {
					t.Errorf("the console says %s", s)
				}
				d.mu.Unlock()
			}
		})
	}
}
