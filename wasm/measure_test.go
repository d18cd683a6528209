//go:build !js

package main

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"testing"
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
		b.paints()
		for _, p := range b.parts() {
			fmt.Printf("%4d x %4d %s\n", size[0], size[1], p)
		}
	}
}

// parts drags on the software surface and says where the script's time goes, a picture, by the clock at each call that
// the program makes of the page.
func (b *tab) parts() []string {
	eval[bool](b, `(() => {
		const {drain, beat, patch, blit, onpaint} = levelspan, now = () => performance.now();
		const t = globalThis.spent = {drain: 0, step: 0, patch: 0, paint: 0, blits: 0, rest: 0, frames: 0, pieces: 0, pixels: 0};
		let last = 0, at = '';
		const to = part => { const n = now(); if (at) t[at] += n - last; last = n; at = part; };
		levelspan.onpaint = (...a) => { to('drain'); onpaint(...a); to(''); t.frames++; };
		levelspan.drain = () => { const n = drain(); to('step'); return n; };
		levelspan.patch = text => { to('patch'); patch(text); to('rest'); };
		levelspan.beat = () => { beat(); to('paint'); };
		levelspan.blit = (x, y, w, h) => { to('blits'); blit(x, y, w, h); t.pieces++; t.pixels += w * h; to('paint'); };
		return true;
	})()`)
	d := b.paints()
	t := eval[map[string]float64](b, "spent")
	out := []string{fmt.Sprintf("drag %.1f pictures/s, %.2f ms of script each; %.1f pieces of %.0f pixels in all", d.Rate, d.Cost, t["pieces"]/t["frames"], t["pixels"]/t["frames"])}
	for _, p := range []struct{ name, text string }{{"drain", "the queue taken over"}, {"step", "the program: input, solve, scene, mirror's text"},
		{"patch", "the mirror's elements"}, {"rest", "focus, heartbeat, the next frame asked for"}, {"paint", "rasterising and copying into the browser's memory"}, {"blits", "putImageData"}} {
		out = append(out, fmt.Sprintf("     %5.2f ms %s", t[p.name]/t["frames"], p.text))
	}
	return out
}
