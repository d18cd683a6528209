package ui

import (
	"bytes"
	"flag"
	"image"
	"image/color"
	"image/png"
	"os"
	"path/filepath"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/scene/raster"
)

var update = flag.Bool("update", false, "write the goldens of testdata instead of comparing with them")

// picture is one golden: widgets in their states on a screen of a size.
type picture struct {
	name   string
	w, h   float64
	night  bool
	router Router
	draw   func(f *Frame, r scene.Rect)
}

func (p *picture) make() (*Frame, *scene.Scene) {
	t := Day()
	if p.night {
		t = Night()
	}
	var s scene.Scene
	s.Reset(p.w, p.h, 1, t.Background)
	var f Frame
	f.Begin(&s, t, &p.router)
	p.draw(&f, scene.Rect{W: p.w, H: p.h})
	return &f, &s
}

// held is a router with some controls held by fingers.
func held(focus string, ids ...string) Router {
	r := Router{Focus: focus, FocusVisible: focus != ""}
	for i, id := range ids {
		r.pointers[i] = pointer{number: i, state: pressing, id: id, inside: true}
	}
	return r
}

func both(name string, w, h float64, r Router, draw func(f *Frame, r scene.Rect)) []picture {
	return []picture{{name + "-day", w, h, false, r, draw}, {name + "-night", w, h, true, r, draw}}
}

func pictures() []picture {
	var all []picture
	all = append(all, both("kit", 760, 560, held("share", "undo", "pressed"), drawKit)...)
	all = append(all, both("rails", 760, 620, held("", "handle/held"), drawRails)...)
	all = append(all, picture{"keypad-landscape-day", 1280, 800, false, held("", "key/8"), drawKeypad})
	all = append(all, picture{"keypad-portrait-night", 800, 1280, true, Router{}, drawKeypad})
	all = append(all, both("keypad-phone", 390, 844, Router{}, drawKeypad)...)
	all = append(all, picture{"keypad-flat-day", 844, 390, false, held("key/entry"), drawKeypad})
	all = append(all, picture{"form-landscape-day", 1280, 800, false, held("field/area"), drawForm})
	all = append(all, picture{"form-portrait-night", 800, 1280, true, held("", "field/span"), drawForm})
	all = append(all, both("form-phone", 390, 844, Router{}, drawForm)...)
	all = append(all, both("over-landscape", 1280, 800, held("unit/speed/kt"), drawOver)...)
	all = append(all, picture{"over-phone-day", 390, 844, false, Router{}, drawOver})
	all = append(all, picture{"dialog-day", 800, 600, false, held("dialog/keep"), drawDialog})
	all = append(all, picture{"dialog-tiny-night", 320, 480, true, Router{}, drawDialog})
	return all
}

func drawKeypad(f *Frame, r scene.Rect) {
	var k Keypad
	k.Begin(KeypadConfig{ID: "handle/mass", Title: "Weight", Unit: "kg", Now: "760 kg", Range: "480 to 850 kg", Min: 480, Max: 850, Decimals: 1})
	typed := "912"
	if r.W > 1000 {
		k.Begin(KeypadConfig{ID: "x", Title: "Density altitude", Unit: "ft", Now: "6\u202f300 ft", Range: "−2\u202f000 to 18\u202f000 ft", Min: -2000, Max: 18000, Signed: true, None: "No value"})
		typed = "14000"
	}
	if r.W > r.H && r.W < 1000 {
		typed = "7"
	}
	for _, c := range typed {
		k.Handle(Action{Kind: Press, Rune: c})
	}
	f.Label(scene.Figure, scene.Rect{X: 40, Y: 40, W: 300, H: 60}, scene.Left, "What lies beneath", f.Theme.Ink)
	k.Draw(f, r, r, scene.Rect{X: 200, Y: 300, W: 200, H: 60})
}

func formSections() []FormSection {
	help := "The area of the wing seen from above, through the fuselage. On the three-view drawing; tail and fairings do not count."
	return []FormSection{
		{Title: "Name", Fields: []FormField{
			{ID: "field/name", Label: "Aeroplane", Text: true, Value: "Marram", Edit: &TextEdit{ID: "field/name", Text: "Marram", Caret: 6}},
			{ID: "field/note", Label: "Note", Text: true, Value: "two-seat survey, big tyres"}}},
		{Title: "Wing and weight", Note: "From the three-view drawing and the weighing report.", Fields: []FormField{
			{ID: "field/area", Label: "Wing area", Value: "16.5", Unit: "m²", Range: "1 to 200 m²", Help: help, HelpOpen: true},
			{ID: "field/span", Label: "Wing span", Value: "10.8", Unit: "m", Range: "2 to 60 m", Help: help},
			{ID: "field/empty", Label: "Empty weight", Value: "480", Unit: "kg", Range: "50 to 20\u202f000 kg", Help: help},
			{ID: "field/max", Label: "Maximum weight", Value: "450", Unit: "kg", Error: "450 kg is below the empty weight of 480 kg", Help: help}}},
		{Title: "Engine", Fields: []FormField{
			{ID: "field/engine", Label: "Kind", Choices: []Choice{{ID: "engine/p", Text: "Piston", Selected: true}, {ID: "engine/t", Text: "Turboprop"}, {ID: "engine/e", Text: "Electric"}}},
			{ID: "field/power", Label: "Rated power at the shaft", Value: "74.6", Unit: "kW", Range: "1 to 5\u202f000 kW", Help: help, Active: true},
			{ID: "field/rpm", Label: "Rated speed", Value: "2\u202f750", Unit: "rpm", Range: "500 to 10\u202f000 rpm"},
			{ID: "field/fta", Label: "Full-throttle altitude", Value: "", Unit: "ft", Range: "0 to 30\u202f000 ft", Disabled: true},
			{ID: "field/sfc", Label: "Specific consumption", Value: "0.30", Unit: "kg/kWh", Range: "0.05 to 2", Note: "class average", Help: help}}},
		{Title: "Propeller", Fields: []FormField{
			{ID: "field/prop", Label: "Kind", Choices: []Choice{{ID: "prop/a", Text: "Constant efficiency"}, {ID: "prop/b", Text: "Constant speed", Selected: true}, {ID: "prop/c", Text: "Fixed pitch"}, {ID: "prop/d", Text: "Table of coefficients"}}, Help: help},
			{ID: "field/diameter", Label: "Diameter", Value: "1.90", Unit: "m", Range: "0.3 to 5 m"}},
			Row: []Button{{ID: "add", Text: "Add configuration", Icon: IconPlus, Kind: Framed}, {ID: "del", Text: "Remove", Icon: IconRemove, Kind: Framed}}},
	}
}

func drawForm(f *Frame, r scene.Rect) {
	var fm Form
	if r.W < 500 {
		fm.Reveal("field/power")
	}
	fm.Draw(f, r, "form", "Aeroplane", formSections())
}

func drawOver(f *Frame, r scene.Rect) {
	y := 70.0
	for _, b := range []Banner{{Texts: []string{"Above the maximum weight of 800 kg."}}, {ID: "dismiss", Kind: BannerBad, Texts: []string{"The case file could not be read: line 4, column 12 has a letter where a number belongs.", "Nothing was changed."}}} {
		h := b.Height(f, r.W-40)
		b.Draw(f, scene.Rect{X: 20, Y: y, W: r.W - 40, H: h})
		y += h + 12
	}
	Toast(f, r, "Link copied: anyone who opens it sees this case")
	m := Menu{ID: "menu", Label: "Menu"}
	m.Draw(f, r, r, scene.Rect{X: r.W - 56, Y: 4, W: 48, H: 48}, []MenuGroup{
		{Items: []Button{{ID: "open", Text: "Open a case", Icon: IconOpen}, {ID: "save", Text: "Save the case", Icon: IconSave}, {ID: "x", Text: "Nothing to undo", Icon: IconUndo, Disabled: true}}},
		{Title: "Speed", Choices: []Choice{{ID: "unit/speed/kt", Text: "kt", Selected: true}, {ID: "unit/speed/mph", Text: "mph"}, {ID: "unit/speed/kmh", Text: "km/h"}}},
		{Title: "Altitude", Choices: []Choice{{ID: "unit/alt/ft", Text: "ft", Selected: true}, {ID: "unit/alt/m", Text: "m"}}},
		{Title: "Fuel", Choices: []Choice{{ID: "unit/fuel/kg", Text: "kg", Selected: true}, {ID: "unit/fuel/l", Text: "L"}, {ID: "unit/fuel/gal", Text: "US gal"}}},
		{Title: "Palette", Choices: []Choice{{ID: "palette/day", Text: "As the device says"}, {ID: "palette/d", Text: "Day", Selected: true}, {ID: "palette/night", Text: "Night, for eyes used to the dark"}}},
		{Items: []Button{{ID: "about", Text: "About and cautions", Icon: IconHelp}}, Text: "levelspan 1.0 (3c9c2ab)"}})
}

func drawDialog(f *Frame, r scene.Rect) {
	d := Dialog{ID: "dialog", Title: "Open another case?", Icon: IconWarning,
		Text:    "The case on the screen stays in the history: Undo brings it back.\n\nThis tool is advisory only. The approved flight manual, the placards, licensed practice and the local rules govern; check every figure against them before it is flown.",
		Buttons: []Button{{ID: "dialog/keep", Text: "Keep this one", Kind: Framed}, {ID: "dialog/open", Text: "Open the other", Kind: Primary}}}
	d.Draw(f, r, r)
}

func drawKit(f *Frame, r scene.Rect) {
	bar, rest := CutTop(r, 56)
	f.Scene.FillRect(bar, 0, f.Theme.Bar)
	TabBar(f, scene.Rect{X: 0, Y: 0, W: 400, H: 56}, []Choice{{ID: "tab/chart", Text: "Chart", Selected: true}, {ID: "tab/a", Text: "Aeroplane"}, {ID: "tab/t", Text: "Today"}}, false)
	x := r.W - 8
	for _, b := range []Button{{ID: "menu", Icon: IconMenu, Label: "Menu"}, {ID: "share", Text: "Share", Icon: IconShare, Bold: true}, {ID: "redo", Icon: IconRedo, Label: "Redo", Disabled: true}, {ID: "undo", Icon: IconUndo, Label: "Undo"}} {
		w := b.Width()
		x -= w
		b.Draw(f, scene.Rect{X: x, Y: 4, W: w, H: 48})
	}
	rest = Inset(rest, 20)
	row, rest := CutTop(rest, 48)
	x = row.X
	for _, b := range []Button{{ID: "a", Text: "Quiet"}, {ID: "b", Text: "Framed", Kind: Framed}, {ID: "pressed", Text: "Pressed", Kind: Framed}, {ID: "c", Text: "Primary", Kind: Primary}, {ID: "d", Text: "Remove", Kind: Danger, Icon: IconRemove}, {ID: "e", Text: "Chosen", Kind: Framed, Selected: true}, {ID: "f", Text: "Disabled", Kind: Framed, Disabled: true}} {
		w := b.Width()
		b.Draw(f, scene.Rect{X: x, Y: row.Y, W: w, H: 48})
		x += w + 8
	}
	_, rest = CutTop(rest, 20)
	row, rest = CutTop(rest, 44)
	Segments(f, scene.Rect{X: row.X, Y: row.Y, W: 240, H: 44}, []Choice{{ID: "k/IAS", Text: "IAS"}, {ID: "k/CAS", Text: "CAS", Selected: true}, {ID: "k/TAS", Text: "TAS"}})
	Segments(f, scene.Rect{X: row.X + 260, Y: row.Y, W: 400, H: 44}, []Choice{{ID: "e/p", Text: "Piston"}, {ID: "e/t", Text: "Turboprop", Disabled: true}, {ID: "e/e", Text: "Electric", Selected: true}})
	_, rest = CutTop(rest, 20)
	row, rest = CutTop(rest, 2*56)
	for i := IconUndo; i < IconCount; i++ {
		c := Cell(row, 15, 2, int(i-1)%15, int(i-1)/15, 4)
		f.Box(c, 8, f.Theme.Key, f.Theme.Edge)
		f.Icon(i, c, 28, f.Theme.Ink)
	}
	_, rest = CutTop(rest, 20)
	for i, c := range []struct {
		name string
		ink  scene.Color
	}{{"required", f.Theme.Required}, {"available", f.Theme.Available}, {"good", f.Theme.Good}, {"bad", f.Theme.Bad}, {"caution", f.Theme.Caution}, {"muted", f.Theme.Muted}} {
		for j, back := range []scene.Color{f.Theme.Background, f.Theme.Panel, f.Theme.Bar, f.Theme.Key, f.Theme.Chosen} {
			cell := Cell(scene.Rect{X: rest.X, Y: rest.Y, W: rest.W, H: 5 * 26}, 6, 5, i, j, 0)
			f.Scene.FillRect(cell, 0, back)
			f.Label(scene.BodyBold, cell, scene.Center, c.name, c.ink)
		}
	}
	_, rest = CutTop(rest, 5*26+12)
	f.Paragraph(scene.Small, rest, "A paragraph in the small style that is long enough to be broken into lines where the width asks for it, and averylongwordthatfitsnowhereatallandisbrokenwithin because there is no other way to show it at all in the room that there is on this page, is there?", f.Theme.Muted)
}

func drawRails(f *Frame, r scene.Rect) {
	t := f.Theme
	var kg, ft, kt Ticks
	mass := Rail{ID: "handle/mass", Title: "Weight", ValueText: "760 kg", Min: 480, Max: 850, Value: 760, Filled: true,
		Marks: []RailMark{{At: 480, Text: "empty 480"}, {At: 670, Text: "zero fuel"}, {At: 800, Text: "max 800"}}}
	mass.Draw(f, scene.Rect{X: 20, Y: 80, W: 400, H: mass.RailHeight()})
	low := mass
	low.ID, low.Value, low.ValueText = "handle/low", 483, "483 kg"
	low.Ticks = kg.For(480, 850, 360, 60)
	low.Draw(f, scene.Rect{X: 20, Y: 180, W: 400, H: low.RailHeight()})
	over := mass
	over.ID, over.Value, over.ValueText, over.Warn, over.Title = "handle/held", 828, "828 kg", true, "Weight, above the maximum"
	over.Zones = []RailZone{{From: 800, To: 850, FadeLow: 12, Color: Fade(t.Bad, 0.7)}}
	over.Draw(f, scene.Rect{X: 20, Y: 300, W: 400, H: over.RailHeight()})
	band := Rail{Title: "TAS, kt", Min: 30, Max: 125, Ticks: kt.For(30, 125, 400, 40),
		Zones: []RailZone{{From: 46, To: 102, FadeLow: 4, FadeTop: 5, Color: t.Good}},
		Marks: []RailMark{{At: 48, Text: "stall", Bold: true}, {At: 59, Text: "VX", Bold: true}, {At: 61, Text: "glide", Bold: true}, {At: 67, Text: "VY", Bold: true}, {At: 98, Text: "VH, power", Bold: true}}}
	band.Draw(f, scene.Rect{X: 20, Y: 20, W: 400, H: band.RailHeight()})
	tiny := mass
	tiny.ID, tiny.Ticks = "handle/tiny", kg.For(480, 850, 360, 60)
	tiny.Draw(f, scene.Rect{X: 20, Y: 420, W: 200, H: tiny.RailHeight()})
	off := mass
	off.ID, off.Disabled = "handle/off", true
	off.Draw(f, scene.Rect{X: 240, Y: 420, W: 180, H: off.RailHeight()})
	alt := Rail{ID: "handle/alt", Title: "Density altitude, ft", ValueText: "6 300", Notes: []string{"PA 3 940", "+28 °C"}, Vertical: true,
		Min: -2000, Max: 18000, Value: 6300, Filled: true, Ticks: ft.For(-2000, 18000, 400, 36),
		Zones: []RailZone{{From: 15600, To: 18000, FadeLow: 1500, Color: Fade(t.Bad, 0.8)}},
		Marks: []RailMark{{At: 15600, Text: "absolute", Color: t.Bad}, {At: 13200, Text: "service", Color: t.Ink}, {At: 2950, Text: "field"}}}
	alt.Draw(f, scene.Rect{X: 440, Y: 20, W: 160, H: 580})
	near := alt
	near.ID, near.Value, near.ValueText, near.Title = "handle/near", 13000, "13 000", "Altitude, ft"
	near.Marks = append([]RailMark{{At: 12800, Text: "level"}, {At: 13100, Text: "best"}}, alt.Marks...)
	near.Draw(f, scene.Rect{X: 600, Y: 20, W: 150, H: 280})
	top := alt
	top.ID, top.Value, top.ValueText, top.Title = "handle/top", 18000, "18 000", "Altitude, ft"
	top.Draw(f, scene.Rect{X: 600, Y: 320, W: 150, H: 280})
}

// TestGallery compares every widget in its states, rasterised, with the goldens. Look at them when they change.
func TestGallery(t *testing.T) {
	for _, p := range pictures() {
		t.Run(p.name, func(t *testing.T) {
			_, s := p.make()
			img := raster.Render(s)
			file := filepath.Join("testdata", "gallery", p.name+".png")
			if *update {
				write(t, file, img)
				return
			}
			data, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			want, err := png.Decode(bytes.NewReader(data))
			if err != nil {
				t.Fatal(err)
			}
			if n, of := differing(img, want), len(img.Pix)/4; n > of/2000 {
				t.Errorf("%d of %d pixels differ by more than 24 from %s", n, of, file)
			}
		})
	}
}

func write(t *testing.T, file string, img *image.RGBA) {
	t.Helper()
	var buf bytes.Buffer
	enc := png.Encoder{CompressionLevel: png.BestCompression}
	if err := enc.Encode(&buf, coarse(img)); err != nil {
		t.Fatal(err)
	}
	if err := os.MkdirAll(filepath.Dir(file), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(file, buf.Bytes(), 0o644); err != nil {
		t.Fatal(err)
	}
}

// coarse is a picture with its colours rounded by at most 8, so that the file is a fraction of the size: the tolerance
// of the comparison covers that.
func coarse(img *image.RGBA) image.Image {
	near := func(v uint8) uint8 { return uint8(min(255, (int(v)+8)/16*16)) }
	out := image.NewPaletted(img.Rect, nil)
	index := map[color.RGBA]uint8{}
	round := image.NewRGBA(img.Rect)
	for i := 0; i < len(img.Pix); i += 4 {
		c := color.RGBA{R: near(img.Pix[i]), G: near(img.Pix[i+1]), B: near(img.Pix[i+2]), A: 255}
		copy(round.Pix[i:], []uint8{c.R, c.G, c.B, c.A})
		k, ok := index[c]
		if !ok && len(index) < 256 {
			k = uint8(len(index))
			index[c] = k
			out.Palette = append(out.Palette, c)
		}
		out.Pix[i/4] = k
	}
	if len(index) >= 256 {
		return round
	}
	return out
}

// differing counts the pixels that differ by more than 24 in a channel; a picture of another size differs wholly.
func differing(a *image.RGBA, b image.Image) int {
	if a.Bounds().Size() != b.Bounds().Size() {
		return len(a.Pix)
	}
	n := 0
	for y := 0; y < a.Rect.Dy(); y++ {
		for x := 0; x < a.Rect.Dx(); x++ {
			p := a.RGBAAt(x, y)
			r, g, bl, _ := b.At(b.Bounds().Min.X+x, b.Bounds().Min.Y+y).RGBA()
			if off(p.R, r) || off(p.G, g) || off(p.B, bl) {
				n++
			}
		}
	}
	return n
}

func off(a uint8, b uint32) bool {
	d := int(a) - int(b>>8)
	return d > 24 || d < -24
}
