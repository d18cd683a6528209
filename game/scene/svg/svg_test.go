package svg

import (
	"encoding/xml"
	"io"
	"math"
	"strings"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/scene/internal/sample"
)

var black = scene.Color{A: 255}

// element is one start tag, or the text after one.
type element struct {
	name string
	attr map[string]string
	text string
}

func parse(t *testing.T, doc []byte) []element {
	t.Helper()
	d := xml.NewDecoder(strings.NewReader(string(doc)))
	d.Strict = true
	var all []element
	for {
		tok, err := d.Token()
		if err == io.EOF {
			return all
		}
		if err != nil {
			t.Fatalf("%v in\n%s", err, doc)
		}
		switch e := tok.(type) {
		case xml.StartElement:
			el := element{name: e.Name.Local, attr: map[string]string{}}
			for _, a := range e.Attr {
				el.attr[a.Name.Local] = a.Value
			}
			all = append(all, el)
		case xml.CharData:
			if len(all) > 0 {
				all[len(all)-1].text += string(e)
			}
		}
	}
}

func find(all []element, name string) (found []element) {
	for _, e := range all {
		if e.name == name {
			found = append(found, e)
		}
	}
	return found
}

func blank() *scene.Scene {
	s := new(scene.Scene)
	s.Reset(200, 100, 2, scene.Color{R: 255, G: 255, B: 255, A: 255})
	return s
}

// Coordinates are logical, unrounded to pixels, whatever the scale.
func TestShapes(t *testing.T) {
	s := blank()
	s.Line(1.25, 2.5, 11.125, 2.5, 0.5, scene.Color{R: 255, A: 51})
	s.StrokeClosed([]scene.Point{{X: 1, Y: 1}, {X: 5, Y: 2}, {X: 3, Y: 7}}, 2, black)
	s.StrokeDashed([]scene.Point{{X: 1, Y: 1}, {X: 9, Y: 1}}, 1, 4, 2, black)
	s.Fill([]scene.Point{{X: 0, Y: 0}, {X: 4, Y: 0}, {X: 4, Y: 3}}, sample.Blue)
	s.Band([]scene.Point{{X: 0, Y: 0}, {X: 4, Y: 1}}, []scene.Point{{X: 0, Y: 5}, {X: 4, Y: 6}}, sample.Red)
	p := find(parse(t, Append(nil, s, Options{})), "path")
	want := []string{"M1.25 2.5L11.125 2.5", "M1 1L5 2L3 7Z", "M1 1L9 1", "M0 0L4 0L4 3Z", "M0 0L4 1L4 6L0 5Z"}
	if len(p) != len(want) {
		t.Fatalf("%d paths", len(p))
	}
	for i, d := range want {
		if p[i].attr["d"] != d {
			t.Errorf("path %d: %q, want %q", i, p[i].attr["d"], d)
		}
	}
	if a := p[0].attr; a["stroke"] != "#ff0000" || a["stroke-opacity"] != "0.2" || a["stroke-width"] != "0.5" || a["fill"] != "none" {
		t.Errorf("%v", a)
	}
	if p[2].attr["stroke-dasharray"] != "4 2" || p[3].attr["fill"] != "#0f57a8" {
		t.Errorf("%v %v", p[2].attr, p[3].attr)
	}
}

func TestRectCircleGradient(t *testing.T) {
	s := blank()
	s.FillRect(scene.Rect{X: 1.5, Y: 2, W: 10, H: 4}, 9, black)
	s.Circle(7, 8, 2.5, black)
	s.Gradient(scene.Rect{X: 1, Y: 2, W: 3, H: 4}, scene.Color{}, sample.Red, true)
	all := parse(t, Append(nil, s, Options{}))
	r := find(all, "rect")
	if a := r[0].attr; a["width"] != "200" || a["fill"] != "#ffffff" {
		t.Errorf("background %v", a)
	}
	if a := r[1].attr; a["x"] != "1.5" || a["rx"] != "2" {
		t.Errorf("%v", a)
	}
	if a := find(all, "circle")[0].attr; a["cx"] != "7" || a["r"] != "2.5" {
		t.Errorf("%v", a)
	}
	stops := find(all, "stop")
	if stops[0].attr["stop-color"] != "#b31e1e" || stops[0].attr["stop-opacity"] != "0" || stops[1].attr["stop-color"] != "#b31e1e" {
		t.Errorf("a clear end must have the other's hue: %v", stops)
	}
	if g := find(all, "linearGradient")[0].attr; r[2].attr["fill"] != "url(#"+g["id"]+")" || g["y2"] != "1" {
		t.Errorf("%v %v", r[2].attr, g)
	}
}

// Any text comes back from a parser as it was, save for what XML cannot hold.
func TestTextIsEscaped(t *testing.T) {
	for _, opt := range []Options{{}, {Outlines: true}} {
		s := blank()
		s.Label(scene.Title, 100, 50, scene.Center, `<&> "VX" ± 'é'`, black)
		s.Label(scene.Small, 100, 50, scene.Right, "a\x00b\xffc\uffff", black)
		all := parse(t, Append(nil, s, opt))
		var got []string
		if opt.Outlines {
			for _, g := range find(all, "g") {
				got = append(got, g.attr["aria-label"])
			}
		} else {
			for _, g := range find(all, "text") {
				got = append(got, strings.TrimSpace(g.text))
			}
		}
		want := []string{`<&> "VX" ± 'é'`, "a\ufffdb\ufffdc\ufffd"}
		if len(got) != 2 || got[0] != want[0] || got[1] != want[1] {
			t.Errorf("outlines %v: %q, want %q", opt.Outlines, got, want)
		}
	}
}

// Text starts where the layout counted on, and is as wide.
func TestTextPlace(t *testing.T) {
	s := blank()
	s.Label(scene.Title, 100, 50.25, scene.Right, "125", black) // 39 wide
	a := find(parse(t, Append(nil, s, Options{})), "text")[0].attr
	if a["x"] != "61" || a["y"] != "50.25" || a["textLength"] != "39" || a["font-size"] != "20" || a["font-weight"] != "bold" {
		t.Errorf("%v", a)
	}
	all := parse(t, Append(nil, s, Options{Outlines: true}))
	var at []string
	for _, u := range find(all, "use") {
		at = append(at, u.attr["transform"])
	}
	want := "translate(61 50.25) scale(0.01)|translate(74 50.25) scale(0.01)|translate(87 50.25) scale(0.01)"
	if got := strings.Join(at, "|"); got != want {
		t.Errorf("%s, want %s", got, want)
	}
	// Each outline that is used is defined, once.
	defined := map[string]int{}
	for _, p := range find(all, "path") {
		defined[p.attr["id"]]++
	}
	for _, u := range find(all, "use") {
		if defined[strings.TrimPrefix(u.attr["href"], "#")] != 1 {
			t.Errorf("%s is defined %d times", u.attr["href"], defined[u.attr["href"]])
		}
	}
}

// Clips nest, close when left open, and one of no size hides everything.
func TestClips(t *testing.T) {
	s := blank()
	s.PopClip()
	s.PushClip(scene.Rect{X: 1, Y: 2, W: 3, H: 4})
	s.PushClip(scene.Rect{X: math.NaN(), Y: 2, W: 3, H: 4})
	s.Circle(7, 8, 2.5, black)
	all := parse(t, Append(nil, s, Options{}))
	clips, groups := find(all, "clipPath"), find(all, "g")
	if len(clips) != 2 || len(groups) != 2 || clips[0].attr["id"] == clips[1].attr["id"] {
		t.Fatalf("%v %v", clips, groups)
	}
	for i := range clips {
		if groups[i].attr["clip-path"] != "url(#"+clips[i].attr["id"]+")" {
			t.Errorf("%v %v", clips[i], groups[i])
		}
	}
	if r := find(all, "rect"); r[1].attr["width"] != "3" || r[2].attr["width"] != "0" {
		t.Errorf("%v", r)
	}
}

// The whole sheet, with its numbers that are none, is well-formed and free of them.
func TestSheet(t *testing.T) {
	var s scene.Scene
	sample.Sheet(&s, 1)
	for _, opt := range []Options{{Title: "A & B"}, {Outlines: true}} {
		doc := Append(nil, &s, opt)
		all := parse(t, doc)
		if len(all) < 50 {
			t.Errorf("only %d elements", len(all))
		}
		if strings.Contains(string(doc), "NaN") || strings.Contains(string(doc), "Inf") {
			t.Error("a number that is none")
		}
		if title := find(all, "title"); opt.Title != "" && (len(title) != 1 || strings.TrimSpace(title[0].text) != "A & B") {
			t.Errorf("%v", title)
		}
	}
}

func BenchmarkAppend(b *testing.B) {
	var c sample.Chart
	var s scene.Scene
	c.Draw(&s, 1280, 800, 1, 0)
	var doc []byte
	for range b.N {
		doc = Append(doc[:0], &s, Options{Outlines: true})
	}
	b.ReportMetric(float64(len(doc)), "bytes")
}
