package ui

import (
	"math"
	"testing"

	"levelspan/game/scene"
)

// The ratio of black and white is 21 by definition of WCAG 2.2; that of #777777 on white is 4.48 (from memory).
func TestContrast(t *testing.T) {
	black, white := scene.Color{A: 255}, scene.Color{R: 255, G: 255, B: 255, A: 255}
	if c := Contrast(black, white); math.Abs(c-21) > 1e-9 {
		t.Errorf("black on white %v", c)
	}
	if c := Contrast(rgb(0x777777), white); math.Abs(c-4.48) > 0.005 {
		t.Errorf("grey on white %v", c)
	}
}

// Text reads at 4.5:1 and signs at 3:1 (WCAG 2.2, 1.4.3 and 1.4.11) on every background that they are drawn on.
func TestPaletteContrast(t *testing.T) {
	for name, p := range map[string]*Theme{"day": Day(), "night": Night()} {
		type named struct {
			name string
			c    scene.Color
		}
		backs := []named{{"background", p.Background}, {"panel", p.Panel}, {"bar", p.Bar}, {"key", p.Key}, {"chosen", p.Chosen}}
		texts := []named{{"ink", p.Ink}, {"muted", p.Muted}, {"required", p.Required}, {"available", p.Available}, {"good", p.Good},
			{"bad", p.Bad}, {"caution", p.Caution}, {"accent", p.Accent}}
		least := func(what string, a, b scene.Color, want float64) {
			if c := Contrast(a, b); c < want {
				t.Errorf("%s: %s %.2f, want %.1f", name, what, c, want)
			}
		}
		for _, b := range backs {
			for _, x := range texts {
				least(x.name+" on "+b.name, x.c, b.c, 4.5)
			}
			least("edge on "+b.name, p.Edge, b.c, 3)
		}
		for _, b := range []named{{"accent", p.Accent}, {"good", p.Good}, {"bad", p.Bad}} {
			least("text on "+b.name, p.OnBold, b.c, 4.5)
		}
		least("ink on a caution", p.Ink, p.CautionBack, 4.5)
		least("sign on a caution", p.Caution, p.CautionBack, 4.5)
		least("ink on a refusal", p.Ink, p.BadBack, 4.5)
		least("sign on a refusal", p.Bad, p.BadBack, 4.5)
		least("ink on a pressed key", p.Ink, p.KeyDown, 4.5)
		least("handle's edge on its face", p.Ink, p.Handle, 3)
		least("filled rail beside the empty one", p.Ink, p.Track, 3)
		least("level band beside the empty rail", p.Good, p.Track, 3)
		least("notice", p.Background, p.Ink, 4.5)
	}
}

func TestNightIsDim(t *testing.T) {
	n := Night()
	for _, c := range []scene.Color{n.Background, n.Panel, n.Bar, n.Key, n.CautionBack, n.BadBack} {
		if luminance(c) > 0.05 {
			t.Errorf("background %v is bright", c)
		}
	}
	for _, c := range []scene.Color{n.Ink, n.Muted, n.Required, n.Available, n.Good, n.Bad, n.Caution, n.Accent, n.Handle} {
		if luminance(c) > 0.65 {
			t.Errorf("colour %v is glaring", c)
		}
	}
}

// What is blue, orange, green, red and amber by day is so by night.
func TestMeaningsKeepTheirHue(t *testing.T) {
	d, n := Day(), Night()
	for _, c := range [][2]scene.Color{{d.Required, n.Required}, {d.Available, n.Available}, {d.Good, n.Good}, {d.Bad, n.Bad}, {d.Caution, n.Caution}, {d.Accent, n.Accent}} {
		a, b := hue(c[0]), hue(c[1])
		if diff := math.Abs(math.Remainder(a-b, 360)); diff > 20 {
			t.Errorf("hue %v by day, %v by night", a, b)
		}
	}
}

func hue(c scene.Color) float64 {
	r, g, b := float64(c.R), float64(c.G), float64(c.B)
	return math.Atan2(math.Sqrt(3)*(g-b), 2*r-g-b) * 180 / math.Pi
}

func TestMixing(t *testing.T) {
	a, b := rgb(0x000000), rgb(0xFFFFFF)
	if m := Mix(a, b, 0.5); m.R != 128 {
		t.Errorf("half way %v", m)
	}
	if m := Over(Fade(b, 0.5), a); m.R != 128 || m.A != 255 {
		t.Errorf("half over %v", m)
	}
	if Fade(a, 2).A != 255 || Fade(a, -1).A != 0 {
		t.Error("opacity leaves its range")
	}
}
