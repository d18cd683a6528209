package app

import (
	"flag"
	"image"
	"image/png"
	"os"
	"path/filepath"
	"testing"

	"levelspan/game/scene/raster"
)

var update = flag.Bool("update", false, "write the goldens anew")

// goldens are half-size pictures of a case that does not change with the demo: each screen, layout and palette.
var goldens = []struct {
	name  string
	w, h  float64
	night bool
	show  func(p *pilot)
}{
	{"chart-landscape-day", 1280, 800, false, views["chart"]},
	{"chart-landscape-night", 1280, 800, true, views["chart"]},
	{"chart-portrait-day", 800, 1280, false, func(p *pilot) { p.press("limit/fastest_climb") }},
	{"chart-phone-day", 390, 844, false, views["chart"]},
	{"chart-phone-night", 390, 844, true, views["high"]},
	{"ceiling-landscape-day", 1280, 800, false, func(p *pilot) { p.setSlider(handleMass, 820); p.setSlider(handleAltitude, 6100) }},
	{"aeroplane-landscape-day", 1280, 800, false, views["aeroplane"]},
	{"aeroplane-phone-night", 390, 844, true, views["aeroplane"]},
	{"today-portrait-night", 800, 1280, true, views["today"]},
}

// goldenTolerance: rasterising sums in floating point, and some machines fuse multiply and add; a text that moved by a
// pixel changes far more.
const (
	channelTolerance = 40
	pixelTolerance   = 0.002 // share of the pixels
)

func TestGoldens(t *testing.T) {
	data, err := os.ReadFile(filepath.Join("testdata", "marram.json"))
	if err != nil {
		t.Fatal(err)
	}
	for _, g := range goldens {
		p := newPilot(t, g.w, g.h)
		p.app = New(p.host, data)
		p.in.Scale, p.in.PrefersDark = 0.5, g.night
		p.step()
		g.show(p)
		p.in.Now += noticeTime
		p.step()
		got := raster.Render(p.app.Scene())
		path := filepath.Join("testdata", g.name+".png")
		if *update {
			writePNG(t, path, got)
			continue
		}
		if share := difference(t, path, got); share > pixelTolerance {
			t.Errorf("%s: %.2f %% of the pixels differ; look at it, and run with -update if it is right", g.name, 100*share)
		}
	}
}

func writePNG(t *testing.T, path string, m image.Image) {
	t.Helper()
	file, err := os.Create(path)
	if err != nil {
		t.Fatal(err)
	}
	if err := png.Encode(file, m); err != nil {
		t.Fatal(err)
	}
	if err := file.Close(); err != nil {
		t.Fatal(err)
	}
}

// difference is the share of pixels of which a channel differs by more than the tolerance; 1 where the sizes differ.
func difference(t *testing.T, path string, got *image.RGBA) float64 {
	t.Helper()
	file, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	want, err := png.Decode(file)
	if err != nil {
		t.Fatal(err)
	}
	if want.Bounds() != got.Bounds() {
		return 1
	}
	n := 0
	for y := 0; y < got.Rect.Dy(); y++ {
		for x := 0; x < got.Rect.Dx(); x++ {
			r, g, b, _ := want.At(x, y).RGBA()
			c := got.RGBAAt(x, y)
			if far(r, c.R) || far(g, c.G) || far(b, c.B) {
				n++
			}
		}
	}
	return float64(n) / float64(got.Rect.Dx()*got.Rect.Dy())
}

func far(a uint32, b uint8) bool {
	d := int(a>>8) - int(b)
	return d > channelTolerance || d < -channelTolerance
}
