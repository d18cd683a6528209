//go:build !js

package main

import (
	"bytes"
	"encoding/base64"
	"encoding/json"
	"fmt"
	"image"
	"image/png"
	"os"
	"path/filepath"
	"testing"
	"time"

	"github.com/chromedp/chromedp"

	"levelspan/game/app"
	"levelspan/game/scene"
	"levelspan/game/scene/device"
	"levelspan/game/scene/glyph"
	"levelspan/game/scene/raster"
	"levelspan/game/ui"
)

// TestReplay measures the way that the software surface does not take: each scene of a drag replayed whole on the
// browser's 2D context, shapes as paths, characters copied from an atlas. It shows the same picture, so the figures
// are of the same work as those of TestMeasure.
func TestReplay(t *testing.T) {
	if !*measure {
		t.Skip("no -measure")
	}
	const width, height = 1280, 800
	frames, first := replayed(width, height)
	list, err := json.Marshal(frames)
	if err != nil {
		t.Fatal(err)
	}
	var atlas bytes.Buffer
	if err := png.Encode(&atlas, glyph.New(1).RGBA()); err != nil {
		t.Fatal(err)
	}
	file := filepath.Join(t.TempDir(), "replay.html")
	page := fmt.Sprintf(replayPage, width, height, list, base64.StdEncoding.EncodeToString(atlas.Bytes()))
	if err := os.WriteFile(file, []byte(page), 0o600); err != nil {
		t.Fatal(err)
	}
	b := newTab(t, width, height, 1, false)
	b.do(chromedp.Navigate("file://" + filepath.ToSlash(file)))
	b.until("globalThis.ready")
	eval[bool](b, "replay(FRAMES[0]), true")
	got, _ := b.picture()
	if mean, far := difference(got, first); mean > 1.5 || far > 0.01 {
		t.Errorf("the replay shows another picture: mean difference %.3f of 255, %.2f %% of the pixels far off", mean, 100*far)
	}
	eval[float64](b, "script(60)", awaitPromise) // once to warm up
	size, _ := json.Marshal(frames[0])
	fmt.Printf("replay: %d operations, %.0f kB as text; %.2f ms of script, %.2f ms until it is drawn\n", len(frames[0]), float64(len(size))/1000,
		eval[float64](b, "script(60)", awaitPromise), eval[float64](b, "drawn(60)"))
}

// replayed is a drag of the weight as lists of operations in device pixels, and the first picture of it.
func replayed(width, height float64) (frames [][]any, first image.Image) {
	a := app.New(noHost{}, nil)
	in := app.Input{Width: width, Height: height, Scale: 1}
	a.Step(in)
	var box scene.Rect
	for _, c := range a.Controls() {
		if c.ID == "handle/mass" {
			box = c.Bounds
		}
	}
	atlas := glyph.New(1)
	for i := range 60 {
		in.Now += 16 * time.Millisecond
		e := ui.Event{Kind: ui.PointerMove, Pointer: 1, X: box.X + box.W/2 - float64(3*i), Y: box.Y + box.H/2, Time: in.Now}
		if i == 0 {
			e.Kind = ui.PointerDown
		}
		in.Events = append(in.Events[:0], e)
		if a.Step(in); i == 0 {
			first = raster.Render(a.Scene())
		}
		frames = append(frames, operations(a.Scene(), atlas))
	}
	return frames, first
}

// operations is a scene as the script of replayPage takes it.
func operations(s *scene.Scene, atlas *glyph.Atlas) []any {
	var f device.Frame
	f.Begin(s)
	css := func(c scene.Color) string {
		return fmt.Sprintf("rgba(%d,%d,%d,%.4f)", c.R, c.G, c.B, float64(c.A)/255)
	}
	flat := func(q []scene.Point) (out []float64) {
		for _, p := range q {
			out = append(out, p.X, p.Y)
		}
		return out
	}
	corners := func(r image.Rectangle) []int { return []int{r.Min.X, r.Min.Y, r.Dx(), r.Dy()} }
	ops := []any{[]any{"rect", css(s.Background), corners(f.Bounds), 0}}
	for i := range s.Ops {
		op := &s.Ops[i]
		switch op.Kind {
		case scene.OpPushClip:
			f.Push(op.Rect)
			ops = append(ops, []any{"clip", corners(f.Clip)})
		case scene.OpPopClip:
			f.Pop()
			ops = append(ops, []any{"unclip"})
		case scene.OpFill:
			ops = append(ops, []any{"fill", css(op.Color), flat(f.Polygon(s, op))})
		case scene.OpBand:
			for next := 0; ; {
				var u, l []scene.Point
				if u, l, next = f.Band(s, op, next); len(u) == 0 {
					break
				}
				q := flat(u)
				for k := len(l) - 1; k >= 0; k-- {
					q = append(q, l[k].X, l[k].Y)
				}
				ops = append(ops, []any{"fill", css(op.Color), q})
			}
		case scene.OpStroke:
			parts, w := f.Stroke(s, op)
			lines := [][]float64{}
			for _, p := range parts {
				lines = append(lines, flat(p.Points))
			}
			ops = append(ops, []any{"stroke", css(op.Color), w, lines, op.Closed})
		case scene.OpRect:
			ops = append(ops, []any{"rect", css(op.Color), corners(f.Box(op.Rect)), op.W})
		case scene.OpGradient:
			ops = append(ops, []any{"gradient", css(op.Color), css(op.Color2), corners(f.Box(op.Rect)), op.Vertical})
		case scene.OpCircle:
			if c, r, ok := f.Disc(s, op); ok {
				ops = append(ops, []any{"circle", css(op.Color), c.X, c.Y, r})
			}
		case scene.OpText:
			f.Text(s, op)
			quads := []int{}
			for {
				index, x, y, ok := f.Next()
				if !ok {
					break
				}
				if g := atlas.At(op.Style, index); g.W > 0 {
					quads = append(quads, int(g.X), int(g.Y), int(g.W), int(g.H), x+int(g.Left), y+int(g.Top))
				}
			}
			ops = append(ops, []any{"text", css(op.Color), quads})
		}
	}
	return ops
}

// replayPage wants the size, the frames and the atlas.
const replayPage = `<!doctype html><body style="margin:0"><canvas width=%d height=%d></canvas><script>
const FRAMES = %s, atlas = new Image();
atlas.onload = () => { globalThis.ready = true; };
atlas.src = 'data:image/png;base64,%s';
const g = document.querySelector('canvas').getContext('2d', {alpha: false}), tints = new Map();
g.lineJoin = 'round';
const tinted = color => {
	let t = tints.get(color);
	if (!t) {
		t = document.createElement('canvas');
		t.width = atlas.width; t.height = atlas.height;
		const h = t.getContext('2d');
		h.drawImage(atlas, 0, 0);
		h.globalCompositeOperation = 'source-in';
		h.fillStyle = color;
		h.fillRect(0, 0, t.width, t.height);
		tints.set(color, t);
	}
	return t;
};
const trace = q => { g.moveTo(q[0], q[1]); for (let i = 2; i < q.length; i += 2) g.lineTo(q[i], q[i + 1]); };
const DO = {
	clip: r => { g.save(); g.beginPath(); g.rect(...r); g.clip(); },
	unclip: () => g.restore(),
	fill: (c, q) => { if (!q) return; g.fillStyle = c; g.beginPath(); trace(q); g.fill(); },
	stroke: (c, w, lines, closed) => { g.strokeStyle = c; g.lineWidth = w; g.beginPath(); for (const q of lines) { trace(q); if (closed) g.closePath(); } g.stroke(); },
	rect: (c, r, round) => { g.fillStyle = c; if (round > 0) { g.beginPath(); g.roundRect(...r, round); g.fill(); } else g.fillRect(...r); },
	gradient: (a, b, r, down) => {
		const l = down ? g.createLinearGradient(0, r[1], 0, r[1] + r[3]) : g.createLinearGradient(r[0], 0, r[0] + r[2], 0);
		l.addColorStop(0, a); l.addColorStop(1, b); g.fillStyle = l; g.fillRect(...r);
	},
	circle: (c, x, y, r) => { g.fillStyle = c; g.beginPath(); g.arc(x, y, r, 0, 7); g.fill(); },
	text: (c, q) => { const t = tinted(c); for (let i = 0; i < q.length; i += 6) g.drawImage(t, q[i], q[i + 1], q[i + 2], q[i + 3], q[i + 4], q[i + 5], q[i + 2], q[i + 3]); },
};
const replay = ops => { for (const [what, ...more] of ops) DO[what](...more); };
// script is the time of the calls alone, ms, a frame of the screen each; drawn has each awaited by reading a pixel.
const script = n => new Promise(done => { let i = 0, spent = 0; const f = () => { const t = performance.now(); replay(FRAMES[i]); spent += performance.now() - t; if (++i < n) requestAnimationFrame(f); else done(spent / n); }; requestAnimationFrame(f); });
const drawn = n => { const t = performance.now(); for (let i = 0; i < n; i++) { replay(FRAMES[i]); g.getImageData(0, 0, 1, 1); } return (performance.now() - t) / n; };
</script>`
