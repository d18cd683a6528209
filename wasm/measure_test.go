//go:build !js

package main

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"testing"

	"github.com/chromedp/cdproto/input"
)

var measure = flag.Bool("measure", false, "measure the page instead of only testing it")

// TestMeasure says how large the page is, how long it takes to its first chart, and how many frames a second a drag
// gets, in this Chromium on this machine. Nothing is demanded: the figures are for reading side by side.
func TestMeasure(t *testing.T) {
	if !*measure {
		t.Skip("no -measure")
	}
	address := singleFile(t)
	info, err := os.Stat(filepath.Join(built.dir, "dist", "levelspan.html"))
	if err != nil {
		t.Fatal(err)
	}
	fmt.Printf("levelspan.html          %.2f MB\n", float64(info.Size())/1e6)
	for _, size := range [][2]int{{1280, 800}, {390, 844}} {
		b := newTab(t, size[0], size[1], 1, false)
		b.open(address)
		first := eval[float64](b, "performance.getEntriesByName('levelspan-first-chart')[0].startTime")
		fmt.Printf("%4d x %4d first chart  %.0f ms after navigation\n", size[0], size[1], first)
		x, y := b.control("handle/mass").middle()
		b.mouse(input.DispatchMouseEventTypeMousePressed, x, y, 1)
		b.mouse(input.DispatchMouseEventTypeMouseMoved, x-6, y, 0)
		rate := eval[float64](b, fmt.Sprintf(`new Promise(done => {
			const layer = document.getElementById('levelspan-layer'), slider = document.querySelector('[data-handle=mass]');
			const start = performance.now();
			let frames = 0, values = 0, last = '', i = 0;
			const turn = () => {
				if (slider.getAttribute('aria-valuenow') !== last) { values++; last = slider.getAttribute('aria-valuenow'); }
				frames++;
				i += 2;
				layer.dispatchEvent(new PointerEvent('pointermove', {pointerId: 1, pointerType: 'mouse', clientX: %f - Math.abs(80 - i %% 160), clientY: %f, bubbles: true}));
				if (performance.now() - start < 5000) requestAnimationFrame(turn);
				else done(values / (performance.now() - start) * 1000);
			};
			requestAnimationFrame(turn);
		})`, x, y), awaitPromise)
		b.mouse(input.DispatchMouseEventTypeMouseReleased, x, y, 1)
		fmt.Printf("%4d x %4d drag         %.1f frames/s, each with new figures\n", size[0], size[1], rate)
	}
}
