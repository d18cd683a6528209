//go:build !js

package main

import (
	"fmt"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"syscall"
	"testing"
	"time"

	"github.com/chromedp/cdproto/cdp"
	"github.com/chromedp/cdproto/page"
	"github.com/chromedp/chromedp"
)

// nudge moves the weight handle by keys, each press a finished change.
func (b *tab) nudge(presses int) float64 {
	b.t.Helper()
	for range presses {
		eval[bool](b, "document.querySelector('[data-handle=mass]').focus(), document.activeElement.dispatchEvent(new KeyboardEvent('keydown', {key: 'ArrowLeft', bubbles: true})), true")
		b.settle()
	}
	return b.handle("mass")
}

// TestTwoTabs changes one case in two tabs. The second is asked, nothing is overwritten silently, and either answer works.
func TestTwoTabs(t *testing.T) {
	for _, answer := range []string{"conflict/both", "conflict/other"} {
		one := newTab(t, 1000, 700, 1, false)
		one.open(singleFile(t))
		first := one.nudge(3)
		two := one.beside(1000, 700)
		two.open(singleFile(t))
		if got := two.handle("mass"); got != first {
			t.Fatalf("the second tab begins with %g, the first has %g", got, first)
		}
		second := two.nudge(10)
		two.settle()
		one.until("document.querySelector('[data-control=\"" + answer + "\"]')")
		if got := one.handle("mass"); got != first {
			t.Errorf("the first tab shows %g without being asked; its own was %g", got, first)
		}
		one.clickOn(answer)
		want := first
		if answer == "conflict/other" {
			want = second
		}
		one.settle()
		if got := one.handle("mass"); got != want {
			t.Errorf("%s: the first tab shows %g, want %g", answer, got, want)
		}
		kept := eval[string](one, "Object.values(localStorage).join('\\n')")
		for _, mass := range []float64{first, second} {
			if answer == "conflict/other" && mass == first {
				continue
			}
			if !strings.Contains(kept, fmt.Sprintf(`"mass_kg": %g`, mass)) && !strings.Contains(kept, fmt.Sprintf(`"mass_kg":%g`, mass)) {
				t.Errorf("%s: a case of %g kg is not kept", answer, mass)
			}
		}
		one.agree("the answer")
		two.agree("the other tab's answer")
	}
}

// TestStorageFull fills the browser's storage: that changes are not kept is said, the case can be taken away as a file,
// and once there is room it is kept again.
func TestStorageFull(t *testing.T) {
	b := newTab(t, 1000, 700, 1, false)
	b.open(singleFile(t))
	const kept = 760.0 // the demonstration's
	eval[bool](b, `(() => { for (let n = 1 << 20; n >= 1; n = n >> 1) for (let i = 0; ; i++) try { localStorage.setItem('filler' + n + '/' + i, 'x'.repeat(n)); } catch (e) { break; } return true; })()`)
	changed := b.nudge(5)
	b.until("/not kept/.test(document.getElementById('levelspan-page').textContent + [...document.querySelectorAll('[aria-label]')].map(e => e.ariaLabel).join())")
	b.agree("a change that is not kept")
	if !b.has("share") {
		t.Error("the case cannot be taken away")
	}
	other := b.beside(800, 600)
	other.open(singleFile(t))
	if got := other.handle("mass"); got != kept {
		t.Errorf("another tab finds %g, what was last kept is %g", got, kept)
	}
	eval[bool](b, "(() => { for (const k of Object.keys(localStorage)) if (k.startsWith('filler')) localStorage.removeItem(k); return true; })()")
	if again := b.nudge(1); again == changed {
		t.Error("the page no longer follows")
	} else {
		b.open(singleFile(t))
		if got := b.handle("mass"); got != again {
			t.Errorf("with room again, what comes back is %g, not %g", got, again)
		}
	}
}

// TestCrashAndDiscard lets the page's process die, and lets the browser freeze and drop the tab: the case comes back.
func TestCrashAndDiscard(t *testing.T) {
	b := newTab(t, 1000, 700, 1, false) // stays empty: it holds the storage
	dying := b.beside(1000, 700)
	dying.open(singleFile(t))
	before := dying.handle("mass")
	after := dying.nudge(3)
	if after == before {
		t.Fatal("nothing changed")
	}
	go chromedp.Call(dying.ctx, page.Crash, cdp.Empty{}) // never answers
	time.Sleep(time.Second)
	next := b.beside(1000, 700)
	next.open(singleFile(t))
	if got := next.handle("mass"); got != after {
		t.Errorf("after the crash the weight is %g, was %g", got, after)
	}
	frozen := next.nudge(2)
	_, err := chromedp.Call(next.ctx, page.SetWebLifecycleState, page.SetWebLifecycleStateParams{State: page.SetWebLifecycleStateStateFrozen})
	next.check(err)
	time.Sleep(500 * time.Millisecond)
	_, err = chromedp.Call(next.ctx, page.Close, cdp.Empty{})
	next.check(err)
	last := b.beside(1000, 700)
	last.open(singleFile(t))
	if got := last.handle("mass"); got != frozen {
		t.Errorf("after the tab was dropped the weight is %g, was %g", got, frozen)
	}
	last.agree("a crash and a dropped tab")
}

// TestKilledBrowser kills the whole browser in the middle of saves, with no chance to tidy up, and starts it again: the
// case is one that was shown, whole, and the page is well.
func TestKilledBrowser(t *testing.T) {
	path := chromium()
	if path == "" {
		without(t, "Chromium")
	}
	profile := t.TempDir()
	ctx, stop, err := startBrowser(path, profile)
	if err != nil {
		t.Fatal(err)
	}
	b := tabOf(t, ctx, 1000, 700, 1, false)
	b.open(singleFile(t))
	shown := map[float64]bool{b.handle("mass"): true}
	for end := time.Now().Add(9 * time.Second); time.Now().Before(end); {
		shown[b.nudge(1)] = true
	}
	killed := 0
	lines, _ := filepath.Glob("/proc/[0-9]*/cmdline")
	for _, l := range lines {
		text, _ := os.ReadFile(l)
		if strings.Contains(string(text), "--user-data-dir="+profile) {
			id, _ := strconv.Atoi(filepath.Base(filepath.Dir(l)))
			if syscall.Kill(id, syscall.SIGKILL) == nil {
				killed++
			}
		}
	}
	stop()
	if killed == 0 {
		t.Skip("the browser's processes cannot be found here: Linux lists them")
	}
	ctx, stop, err = startBrowser(path, profile)
	if err != nil {
		t.Fatal(err)
	}
	defer stop()
	again := tabOf(t, ctx, 1000, 700, 1, false)
	again.open(singleFile(t))
	if got := again.handle("mass"); !shown[got] {
		t.Errorf("the weight %g was never shown", got)
	} else {
		t.Logf("%d weights were shown; %g came back", len(shown), got)
		if got == 760 && len(shown) > 1 {
			t.Error("nothing of nine seconds' work came back")
		}
	}
	again.agree("the browser was killed")
}
