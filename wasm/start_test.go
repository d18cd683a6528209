//go:build !js

package main

import (
	"fmt"
	"os/exec"
	"path/filepath"
	"slices"
	"testing"
)

// mostStart is how much longer than an empty page of the drawing library the page may take to its first chart.
const mostStart = 1.6

// TestStart opens the page and an empty page of the drawing library in turn, each in a window of its own that knows
// nothing of the one before, and holds the medians of the times to their first pictures against each other. The empty
// page is linked, packed and unpacked the same way (testdata/empty), and is spared the question which surface to take.
func TestStart(t *testing.T) {
	dist := filepath.Join(buildAll(t), "empty")
	said, err := exec.Command("go", "run", "levelspan/cmd/pagebuild", "-program", "levelspan/testdata/empty", "-out", dist, "-version", "empty", "-brotli=false").CombinedOutput()
	if err != nil {
		t.Fatalf("building the empty page: %v\n%s", err, said)
	}
	pages := []struct{ name, address, surface string }{
		{"empty", "file://" + filepath.ToSlash(filepath.Join(dist, "levelspan.html")) + "?surface=webgl", "webgl"},
		{"as it comes", singleFile(t), ""},
		{"webgl", singleFile(t) + "?surface=webgl", "webgl"},
	}
	const rounds = 5
	times := map[string][]float64{}
	for round := range rounds + 1 {
		for _, p := range pages {
			t.Run(p.name, func(t *testing.T) {
				b := newTab(t, 1280, 800, 1, false)
				b.open(p.address)
				if got := b.attribute("html", "data-surface"); p.surface != "" && got != p.surface {
					t.Fatalf("the surface is %q", got)
				}
				first := eval[float64](b, "performance.getEntriesByName('levelspan-first-chart')[0].startTime")
				if round > 0 { // the first round brings the browser to life
					times[p.name] = append(times[p.name], first)
				}
			})
		}
	}
	median := func(name string) float64 {
		all := slices.Sorted(slices.Values(times[name]))
		if len(all) != rounds {
			t.Fatalf("%s: %d times", name, len(all))
		}
		return all[len(all)/2]
	}
	base := median("empty")
	for _, p := range pages {
		t.Logf("%-12s %4.0f ms to the first picture, %.2f of the empty page's (from %.0f to %.0f)", p.name, median(p.name), median(p.name)/base,
			slices.Min(times[p.name]), slices.Max(times[p.name]))
	}
	if ratio := median("as it comes") / base; ratio > mostStart {
		t.Errorf("the first chart takes %.2f times as long as an empty page, more than %.1f", ratio, mostStart)
	}
}

// TestDecode loads the page in one file with the browser's own base64 decoder and without it. Neither way calls back for
// each of the program's millions of bytes, and both give the program.
func TestDecode(t *testing.T) {
	for _, own := range []bool{true, false} {
		b := newTab(t, 800, 600, 1, false)
		b.before(fmt.Sprintf(`globalThis.long = 0; globalThis.spent = 0; globalThis.own = false; {
			const list = [].map, last = [].findLast, apply = Reflect.apply;
			const many = (object, name) => { const f = object[name]; object[name] = function (...a) {
				const act = apply(last, a, [x => typeof x === 'function']);
				return apply(f, this, apply(list, a, [x => x !== act || !act ? x : function (...b) { if (++calls > 100000) long++; return apply(act, this, b); }]));
			}; };
			let calls = 0, from = 0;
			many(Uint8Array, 'from'); many(Array, 'from'); many(Array.prototype, 'map'); many(Array.prototype, 'forEach'); many(String.prototype, 'replace');
			many(Object.getPrototypeOf(Uint8Array.prototype), 'map'); many(Object.getPrototypeOf(Uint8Array.prototype), 'forEach');
			const began = f => f && function (...a) { from = from || performance.now(); return f.apply(this, a); };
			const native = Uint8Array.fromBase64;
			if (%v) Uint8Array.fromBase64 = began((...a) => { own = true; return native.apply(Uint8Array, a); }); else delete Uint8Array.fromBase64;
			window.atob = began(atob);
			const B = Blob; window.Blob = function (...a) { spent = spent || performance.now() - from; return new B(...a); };
		}`, own))
		b.open(singleFile(t))
		b.agree("decoding")
		t.Logf("own decoder %v: %.0f ms", own, eval[float64](b, "spent"))
		if eval[bool](b, "globalThis.own") != own {
			t.Errorf("the browser's decoder: used %v, want %v", !own, own)
		}
		if n := eval[int](b, "long"); n > 0 || eval[float64](b, "spent") <= 0 {
			t.Errorf("%d calls back for a byte each", n)
		}
	}
}
