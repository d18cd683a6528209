package engines

import (
	"encoding/json"
	"fmt"
	"math"
	"strconv"
	"strings"
	"testing"
	"time"
)

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

// until waits until an expression is true.
func (u user) until(expression string) {
	u.t.Helper()
	for end := time.Now().Add(60 * time.Second); u.eval(expression) != "true"; time.Sleep(30 * time.Millisecond) {
		if time.Now().After(end) {
			u.t.Fatalf("never came true: %s\nproblem %s\nstopped %s", expression,
				u.eval("(document.getElementById('levelspan-problem')||{}).textContent"), u.eval("(document.querySelector('#levelspan-stop pre')||{}).textContent"))
		}
	}
}

// listening collects in the page what it throws, what is written to its console as an error and what its policy forbids. It holds for
// engines that tell nothing of their console; what happened before it came is then not known.
const listening = `(() => {
	if (globalThis.errors2) return true;
	const list = globalThis.errors2 = [], own = console.error;
	console.error = (...a) => { list.push('console: ' + a.join(' ')); own.apply(console, a); };
	addEventListener('error', e => list.push('thrown: ' + (e.message || e.target)), true);
	addEventListener('unhandledrejection', e => list.push('rejected: ' + e.reason));
	addEventListener('securitypolicyviolation', e => list.push('forbidden: ' + e.violatedDirective + ' ' + e.blockedURI));
	return true;
})()`

// quiet demands that the page and the browser's console have told no error since it was last asked.
func (u user) quiet() {
	u.t.Helper()
	said, err := u.b.console()
	u.check(err)
	var own []string
	u.check(json.Unmarshal([]byte(u.eval("JSON.stringify((globalThis.errors2 || []).splice(0))")), &own))
	for _, s := range append(said, own...) {
		u.t.Errorf("the page says: %s", s)
	}
	for _, id := range []string{"levelspan-problem", "levelspan-stop"} {
		if got := u.eval("(e => e && !e.hidden ? e.textContent : '')(document.getElementById('" + id + "'))"); got != "" {
			u.t.Errorf("%s: %s", id, got)
		}
	}
}

// open goes to an address, as a new document even where only the fragment differs, and waits for the first chart.
func (u user) open(address string) {
	u.t.Helper()
	u.quiet()
	if strings.Contains(address, "#") {
		u.away()
	}
	u.check(u.b.open(address))
	u.ready()
}

// away leaves the page for an empty one.
func (u user) away() {
	u.t.Helper()
	u.check(u.b.open("about:blank"))
	u.until("location.href === 'about:blank'")
}

// reload loads the page again and waits for the first chart.
func (u user) reload() {
	u.t.Helper()
	u.quiet()
	u.eval("(globalThis.old2 = true, '')")
	u.check(u.b.reload())
	u.until("!globalThis.old2")
	u.ready()
}

func (u user) ready() {
	u.t.Helper()
	u.until(listening + " && document.documentElement.dataset.ready === 'true'")
	u.settle()
}

// settle waits for two frames. It asks again and again: WebKit's driver can lose the answer of a script that waits.
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

// point moves, presses and releases the "mouse" or a finger ("touch"): a path of places, pressed from the first to the last.
func (u user) point(kind string, path ...[2]int) {
	u.t.Helper()
	at := func(p [2]int) action {
		return action{"type": "pointerMove", "x": p[0], "y": p[1], "duration": 0, "origin": "viewport"}
	}
	list := []any{at(path[0]), action{"type": "pointerDown", "button": 0}}
	for _, p := range path[1:] {
		list = append(list, at(p), action{"type": "pause", "duration": 20})
	}
	list = append(list, action{"type": "pointerUp", "button": 0})
	u.check(u.b.act([]any{action{"type": "pointer", "id": kind, "parameters": action{"pointerType": kind}, "actions": list}}))
	u.settle()
}

// move moves the mouse with nothing pressed.
func (u user) move(x, y int) {
	u.t.Helper()
	u.check(u.b.act([]any{action{"type": "pointer", "id": "mouse", "parameters": action{"pointerType": "mouse"},
		"actions": []any{action{"type": "pointerMove", "x": x, "y": y, "duration": 0, "origin": "viewport"}}}}))
	u.settle()
}

func (u user) tap(id string) {
	u.t.Helper()
	u.tapBy("mouse", id)
}

func (u user) tapBy(kind, id string) {
	u.t.Helper()
	x, y := u.place(id)
	u.point(kind, [2]int{x, y})
}

// drag drags a control by so many pixels, with the mouse or a finger.
func (u user) drag(kind, id string, dx, dy int) {
	u.t.Helper()
	x, y := u.place(id)
	path := [][2]int{{x, y}}
	for i := 1; i <= 6; i++ {
		path = append(path, [2]int{x + dx*i/6, y + dy*i/6})
	}
	u.point(kind, path...)
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

// link copies the page's own link by the share sheet.
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

// figures are the page's calibrated airspeeds by key, and by "key low" and "key high" the ends of their intervals, in m/s.
func (u user) figures() map[string]float64 {
	u.t.Helper()
	var page map[string]string
	u.check(json.Unmarshal([]byte(u.eval(`JSON.stringify(Object.fromEntries([...document.querySelectorAll('#levelspan-limits tr[data-key]')].flatMap(r => {
		const d = (r.querySelector('[data-cas-mps]') || {dataset: {}}).dataset;
		return [['', d.casMps || ''], [' low', d.low], [' high', d.high]].filter(p => p[1] !== undefined).map(p => [r.dataset.key + p[0], p[1]]); })))`)), &page))
	figures := map[string]float64{}
	for key, text := range page {
		v, err := strconv.ParseFloat(text, 64)
		if err != nil {
			u.t.Errorf("%s: %v", key, err)
		}
		figures[key] = v
	}
	return figures
}

// agree compares every figure with what the command says of the page's own case, and gives that case.
func (u user) agree(after string) string {
	u.t.Helper()
	_, fragment, found := strings.Cut(u.link(), "#case=")
	if !found {
		u.t.Fatal("the link has no case")
	}
	text := command(u.t, "", "open", fragment)
	var answer struct {
		Limits []struct {
			Key      string    `json:"key"`
			CAS      float64   `json:"cas_mps"`
			Interval []float64 `json:"interval_cas_mps"`
		}
	}
	u.check(json.Unmarshal([]byte(command(u.t, text, "limits", "-", "--json")), &answer))
	want := map[string]float64{}
	for _, l := range answer.Limits {
		want[l.Key] = l.CAS
		if len(l.Interval) == 2 {
			want[l.Key+" low"], want[l.Key+" high"] = l.Interval[0], l.Interval[1]
		}
	}
	page := u.figures()
	if len(want) == 0 || len(page) != len(want) {
		u.t.Errorf("%s: the page has %d figures, the command %d", after, len(page), len(want))
	}
	for key, w := range want {
		if v, ok := page[key]; !ok || !(math.Abs(v-w) <= 1e-6*w) {
			u.t.Errorf("%s: %s is %v on the page, %v by the command", after, key, v, w)
		}
	}
	return text
}

// surface demands one.
func (u user) surface(want string) {
	u.t.Helper()
	if got := u.eval("document.documentElement.dataset.surface"); got != want {
		u.t.Errorf("the surface is %s, not %s", got, want)
	}
}
