package main

import (
	"math"
	"os"
	"time"

	"levelspan/game/app"
	"levelspan/game/keep"
	"levelspan/game/scene"
	"levelspan/perf/casefile"
)

func main() {
	version := "dev"
	if len(os.Args) > 1 {
		version = os.Args[1]
	}
	b := newBridge()
	p := &page{bridge: b, mirror: newMirror()}
	p.app = app.NewWith(app.Options{
		Host:  &host{bridge: b, version: version},
		Store: keep.NewKV(storage{b, "localStorage"}, storage{b, "sessionStorage"}, keep.Seconds),
	})
	b.call("adopt")
	if os.Getenv("SURFACE") == "webgl" {
		if err := (&webgl{b}).run(p.frame, p.shown); err != nil {
			b.call("lose") // the canvas of a surface that did not start goes
		}
		p.again, p.surface = true, ""
	}
	(&software{bridge: b}).run(p.frame, p.shown)
}

// page is what does not depend on the surface: the queue in, the program, the mirror out.
type page struct {
	bridge  *bridge
	app     *app.App
	mirror  *mirror
	input   app.Input
	focus   string
	held    *casefile.Case // what the page was last given to show if all stops
	again   bool           // the scene holds, but the surface is another
	surface string         // the one that has drawn
	asleep  bool           // the page has been asked for a frame later
}

// frame takes the queue in and gives the scene to show, nil if the one shown still holds. It answers for the frame that was
// asked for, and then asks for the next.
func (p *page) frame(width, height, scale float64) *scene.Scene {
	show := p.step(width, height, scale)
	p.bridge.call("beat")
	p.sleep(p.app.Wake())
	return show
}

func (p *page) step(width, height, scale float64) *scene.Scene {
	p.bridge.drain(&p.input)
	p.input.Width, p.input.Height, p.input.Scale = width, height, scale
	changed := p.app.Step(p.input)
	if c := p.app.Committed(); c != p.held {
		p.held = c
		p.bridge.call("hold", string(c.Marshal()))
	}
	if !changed && !p.again {
		return nil
	}
	p.again = false
	show := p.app.Scene()
	if patch := p.mirror.update(p.app.Controls(), p.app.Mirror(), show.Background); patch != "" {
		p.bridge.call("patch", patch)
	}
	if focus := p.app.FocusID(); focus != p.focus {
		p.focus = focus
		p.bridge.call("focus", focus)
	}
	return show
}

// shown is called by the surface when a scene has been drawn.
func (p *page) shown(surface string) {
	if p.surface != surface {
		p.surface = surface
		p.bridge.call("ready", surface)
	}
}

// sleep sees to it that the next frame comes no later than after d, if d is not negative.
func (p *page) sleep(d time.Duration) {
	if d == 0 {
		p.bridge.wake()
	}
	switch {
	case d > 0:
		p.bridge.call("later", math.Ceil(float64(d)/float64(time.Millisecond)))
	case p.asleep:
		p.bridge.call("later", -1)
	}
	p.asleep = d > 0
}
