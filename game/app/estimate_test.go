package app

import (
	"strings"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/ui"
)

// The estimate is made anew when what it is made from has changed, and only then.
func TestFitsOnlyWhatChanged(t *testing.T) {
	p := aeroplaneScreen(t)
	fits := func() int { return p.app.solved.estimated.fits }
	if fits() != 1 {
		t.Fatalf("%d fits at the start", fits())
	}
	p.setSlider(handleMass, 700)
	p.setSlider(handleAltitude, 1000)
	p.tap("field/aeroplane.name")
	p.event(ui.Event{Kind: ui.SetText, ID: "field/aeroplane.name", Text: "Marram the second"})
	p.key(ui.KeyEnter)
	if p.app.Case().Aeroplane.Name != "Marram the second" || fits() != 1 {
		t.Errorf("%d fits after a drag and another name, %q", fits(), p.app.Case().Aeroplane.Name)
	}
	p.open("aeroplane.wing_area_m2")
	p.typeIn("18")
	if fits() != 2 {
		t.Errorf("%d fits after another wing", fits())
	}
	p.sameAsSolve()
	p.key(ui.KeyUndo)
	p.sameAsSolve()
	c := p.app.Case().Clone()
	c.Runs[2].LeftOut = "rough air"
	p.step(Opened{Data: c.Marshal()})
	p.sameAsSolve()
	if text := p.app.Mirror().Summary; !strings.Contains(text, "from 11 runs") {
		t.Errorf("with a run left out the summary says %q", text)
	}
}

// In every window each limit that has an interval shows it, and the day's sentence is whole.
func TestIntervalsAreShown(t *testing.T) {
	for _, size := range [][2]float64{{1280, 800}, {800, 1280}, {390, 844}, {320, 480}, {844, 390}} {
		p := newPilot(t, size[0], size[1])
		for _, r := range p.app.rows { // the rows scrolled out of sight are not drawn
			if r.span != "" && p.says(r.name) && !p.says(r.span) && !p.says(r.within) {
				t.Errorf("%v: %s shows neither %s nor %s", size, r.name, r.span, r.within)
			}
		}
		strip := p.app.layout.strip
		for _, text := range [...]string{p.app.Mirror().Summary, p.app.day(), p.app.ends()} { // the longest that is said fits
			if p.says(text) {
				if h := p.app.frame.ParagraphHeight(scene.Small, strip.W-2*p.app.layout.margin, text); h > strip.H {
					t.Errorf("%v: %q takes %g of the strip's %g", size, text, h, strip.H)
				}
				break
			}
		}
	}
}
