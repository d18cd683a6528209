//go:build !js

package main

import (
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/chromedp"
)

// processorTime is what the processes that run and draw pages have used so far, by Linux's account of them. The
// browser's own housekeeping in its other processes goes on without a page too.
func processorTime(t *testing.T) time.Duration {
	t.Helper()
	folders, _ := filepath.Glob("/proc/[0-9]*")
	type process struct {
		parent int
		ticks  uint64
		ours   bool
		page   bool
	}
	all := map[int]process{}
	for _, f := range folders {
		stat, err := os.ReadFile(filepath.Join(f, "stat"))
		if err != nil {
			continue // ended meanwhile
		}
		// pid (name) state ppid ...: the name may hold anything.
		_, rest, _ := strings.Cut(string(stat), ") ")
		fields := strings.Fields(rest)
		if len(fields) < 13 {
			continue
		}
		id, _ := strconv.Atoi(filepath.Base(f))
		p := process{}
		p.parent, _ = strconv.Atoi(fields[1])
		user, _ := strconv.ParseUint(fields[11], 10, 64)
		system, _ := strconv.ParseUint(fields[12], 10, 64)
		p.ticks = user + system
		line, _ := os.ReadFile(filepath.Join(f, "cmdline"))
		p.ours = browser.profile != "" && strings.Contains(string(line), browser.profile)
		p.page = strings.Contains(string(line), "--type=renderer") || strings.Contains(string(line), "--type=gpu-process")
		all[id] = p
	}
	sum, found := uint64(0), false
	for id, p := range all {
		if !p.page {
			continue
		}
		for n := 0; n < 20 && id > 1; n++ {
			if all[id].ours {
				sum += p.ticks
				found = true
				break
			}
			id = all[id].parent
		}
	}
	if !found {
		t.Skip("there is no account of processes here: Linux has one")
	}
	const hertz = 100 // of the clock in /proc, the same on every Linux for programs (USER_HZ)
	return time.Duration(sum) * time.Second / hertz
}

// used is the share of one processor core that they use for a while.
func used(t *testing.T, d time.Duration, meanwhile func()) float64 {
	t.Helper()
	from, start := processorTime(t), time.Now()
	meanwhile()
	if left := d - time.Since(start); left > 0 {
		time.Sleep(left)
	}
	return (processorTime(t) - from).Seconds() / time.Since(start).Seconds()
}

// TestIdleCostsNothing leaves the page alone on either surface, and on the one that follows a lost context: nothing is
// solved, drawn or painted after a second, and the page's processes use at most a fiftieth of a core in
// 20 seconds; a drag is the measure beside it.
func TestIdleCostsNothing(t *testing.T) {
	for _, c := range []struct {
		name, query string
		lose        bool
	}{{"software", "?surface=software", false}, {"webgl", "?surface=webgl", false}, {"after a lost context", "?surface=webgl", true}} {
		t.Run(c.name, func(t *testing.T) {
			b := newTab(t, 1280, 800, 1, false)
			b.open(singleFile(t) + c.query)
			if c.lose {
				eval[bool](b, "document.querySelector('body>canvas').getContext('webgl2').getExtension('WEBGL_lose_context').loseContext(), true")
				b.until("document.documentElement.dataset.surface === 'software'")
			}
			busy := used(t, 0, func() { b.paints() })
			b.do(chromedp.MouseEvent(input.DispatchMouseEventTypeMouseMoved, 100, 100)) // hovering is not touching
			b.settle()
			eval[bool](b, `(() => { const {drain, patch, blit} = levelspan; globalThis.frames = globalThis.patches = globalThis.blits = 0;
				levelspan.drain = () => { frames++; return drain(); };
				levelspan.patch = (...a) => { patches++; return patch(...a); };
				levelspan.blit = (...a) => { blits++; return blit(...a); };
				return true; })()`)
			time.Sleep(time.Second)
			eval[bool](b, "globalThis.frames = globalThis.patches = globalThis.blits = 0, true")
			idle := used(t, 20*time.Second, func() {})
			if n := eval[[]int](b, "[frames, patches, blits]"); n[0]+n[1]+n[2] != 0 {
				t.Errorf("untouched: %d frames, %d changes of the mirror, %d pieces painted", n[0], n[1], n[2])
			}
			t.Logf("idle %.2f %% of a core, a drag %.0f %%, a ratio of %.4f", 100*idle, 100*busy, idle/busy)
			if idle > 0.02 {
				t.Errorf("untouched the page uses %.2f %% of a core", 100*idle)
			}
			if idle > 0.05*busy {
				t.Errorf("untouched the page uses %.3f of what a drag does", idle/busy)
			}
		})
	}
}
