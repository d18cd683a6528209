package app

import (
	"flag"
	"image/png"
	"os"
	"path/filepath"
	"testing"

	"levelspan/game/keep"
	"levelspan/game/scene/raster"
	"levelspan/game/ui"
)

var shotsDir = flag.String("shots", "", "folder for pictures of every screen, size and palette")

// shotSizes are the windows that the program is looked at in.
var shotSizes = []struct {
	name string
	w, h float64
}{
	{"landscape-1280x800", 1280, 800}, {"portrait-800x1280", 800, 1280}, {"phone-390x844", 390, 844},
	{"phone-landscape-844x390", 844, 390}, {"tiny-320x480", 320, 480}, {"huge-2560x1600", 2560, 1600},
}

// TestShots writes pictures to look at; without the flag there is nothing to do.
func TestShots(t *testing.T) {
	if *shotsDir == "" {
		t.Skip("no -shots folder given")
	}
	if err := os.MkdirAll(*shotsDir, 0o755); err != nil {
		t.Fatal(err)
	}
	for _, size := range shotSizes {
		for _, night := range []bool{false, true} {
			for _, v := range shotViews {
				p := newPilot(t, size.w, size.h)
				p.app.view.night = night
				p.app.dirty = true
				p.step()
				v.show(p)
				p.step()
				name := v.name + "-" + size.name + "-day.png"
				if night {
					name = v.name + "-" + size.name + "-night.png"
				}
				file, err := os.Create(filepath.Join(*shotsDir, name))
				if err != nil {
					t.Fatal(err)
				}
				if err := png.Encode(file, raster.Render(p.app.Scene())); err != nil {
					t.Fatal(err)
				}
				if err := file.Close(); err != nil {
					t.Fatal(err)
				}
			}
		}
	}
}

// shotViews are the states of the program worth looking at.
var shotViews = []struct {
	name string
	show func(p *pilot)
}{
	{"chart", func(p *pilot) {}},
	{"marked", func(p *pilot) { p.tap("limit/fastest_climb") }},
	{"no-level-flight", func(p *pilot) { p.setSlider(handleMass, 830); p.setSlider(handleAltitude, 6100) }},
	{"cautions", func(p *pilot) { p.setSlider(handleMass, 820) }},
	{"keypad", func(p *pilot) { p.event(ui.Event{Kind: ui.Activate, ID: handleMass}); p.tap("key/7"); p.tap("key/2") }},
	{"menu", func(p *pilot) { p.tap("menu") }},
	{"about", func(p *pilot) { p.tap("menu"); p.tap("about") }},
	{"aeroplane", func(p *pilot) { p.tap("tab/aeroplane") }},
	{"today", func(p *pilot) { p.tap("tab/aeroplane"); p.tapIf("part/today") }},
	{"refused", func(p *pilot) {
		p.tap("tab/aeroplane")
		p.tap("field/aeroplane.wing_area_m2")
		p.tap("key/0")
		p.tap("key/point")
		p.tap("key/1")
		p.tap("key/ok")
	}},
	{"share", sheetViews["share"]},
	{"code", sheetViews["code"]},
	{"cases", sheetViews["cases"]},
	{"cases-more", sheetViews["cases-more"]},
	{"rename", sheetViews["rename"]},
	{"delete", sheetViews["delete"]},
	{"paste", sheetViews["paste"]},
	{"conflict", sheetViews["conflict"]},
	{"not-kept", func(p *pilot) {
		p.filled().err = keep.ErrFull
		p.setSlider(handleMass, 640)
	}},
	{"damaged", func(p *pilot) {
		p.step(Opened{Name: "marram.json", Data: []byte("{\"format\": \"levelspan-case\", \"version\": 1,")})
	}},
}
