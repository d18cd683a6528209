//go:build !js

package main

import (
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
		{"software", singleFile(t) + "?surface=software", "software"},
	}
	const rounds = 7
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
