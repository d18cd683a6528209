package main

import (
	"bytes"
	"crypto/sha256"
	"encoding/base64"
	"encoding/json"
	"fmt"
	"image/png"
	"maps"
	"slices"

	"levelspan/assets/page"
	"levelspan/game/scene"
	"levelspan/game/scene/raster"
)

// The files of the hosted page whose names stay the same from version to version: a browser finds the next one by them.
const (
	manifestName = "levelspan.webmanifest"
	workerName   = "sw.js"
)

// worker is the service worker for a set of files. Its text changes with any of them, which is how a browser learns of a
// newer version. The page itself goes by its folder's address. Each file stands with the hash that it must have.
func (p *parts) worker(files map[string][]byte) []byte {
	var list [][2]string
	whole := sha256.New()
	for _, n := range slices.Sorted(maps.Keys(files)) {
		sum := sha256.Sum256(files[n])
		fmt.Fprintf(whole, "%s %x\n", n, sum)
		if n == "index.html" {
			n = "./"
		}
		list = append(list, [2]string{n, "sha256-" + base64.StdEncoding.EncodeToString(sum[:])})
	}
	constants, _ := json.Marshal(list) // strings cannot fail
	version, _ := json.Marshal(p.shown())
	return fmt.Appendf(nil, "const VERSION = %s, BUNDLE = \"%x\",\n FILES = %s;\n%s", version, whole.Sum(nil)[:8], constants, page.Worker)
}

// manifest describes the page as an application that can be installed, and draws its icons. Touch is the name of the icon
// for browsers that read no manifest.
func (p *parts) manifest(name func(stem, ext string, data []byte) string) (data []byte, touch string, err error) {
	type icon struct {
		Src     string `json:"src"`
		Sizes   string `json:"sizes"`
		Type    string `json:"type"`
		Purpose string `json:"purpose"`
	}
	var icons []icon
	for _, i := range []struct {
		size     int
		maskable bool
		purpose  string
	}{{192, false, "any"}, {512, false, "any"}, {192, true, "maskable"}, {512, true, "maskable"}, {180, true, ""}} {
		var picture bytes.Buffer
		if err := png.Encode(&picture, raster.Render(iconScene(i.size, i.maskable))); err != nil {
			return nil, "", err
		}
		file := name(fmt.Sprintf("icon-%d", i.size), "png", picture.Bytes())
		if i.purpose == "" {
			touch = file
			continue
		}
		icons = append(icons, icon{file, fmt.Sprintf("%dx%d", i.size, i.size), "image/png", i.purpose})
	}
	data, err = json.MarshalIndent(map[string]any{
		"name": "levelspan", "short_name": "levelspan", "lang": "en", "start_url": "./", "scope": "./",
		"description": "How slow and how fast one propeller aeroplane can hold level flight today, and the speeds between.",
		"display":     "standalone", "orientation": "any", "background_color": "#fcfbf7", "theme_color": "#f3f1ea", "icons": icons,
	}, "", " ")
	return data, touch, err
}

// iconScene is the page's icon (assets/page/icon.svg) as a drawing: two curves that cross, and the span between. A
// maskable one fills its square, and all that matters lies inside the middle four fifths, as masks leave it.
func iconScene(size int, maskable bool) *scene.Scene {
	ground, clear := scene.Color{R: 0xf3, G: 0xf1, B: 0xea, A: 255}, scene.Color{}
	s := &scene.Scene{}
	scale, shift := float64(size)/64, 0.0
	if maskable {
		s.Reset(float64(size), float64(size), 1, ground)
		shift = 0.15 * float64(size)
		scale *= 0.7
	} else {
		s.Reset(float64(size), float64(size), 1, clear)
		s.FillRect(scene.Rect{W: float64(size), H: float64(size)}, 12*scale, ground)
	}
	at := func(x, y float64) scene.Point { return scene.Point{X: shift + x*scale, Y: shift + y*scale} }
	var points []scene.Point
	arc := func(x0, y0, x1, y1, x2, y2 float64) { // a quadratic curve
		for i := 0; i <= 24; i++ {
			k := float64(i) / 24
			a, b, c := (1-k)*(1-k), 2*k*(1-k), k*k
			points = append(points, at(a*x0+b*x1+c*x2, a*y0+b*y1+c*y2))
		}
	}
	stroke := func(width float64, c scene.Color) {
		s.Stroke(points, width*scale, c)
		for _, end := range []scene.Point{points[0], points[len(points)-1]} {
			s.Circle(end.X, end.Y, width*scale/2, c)
		}
		points = points[:0]
	}
	arc(8, 24, 22, 46, 34, 40)
	arc(34, 40, 46, 34, 56, 8)
	stroke(5, scene.Color{R: 0x12, G: 0x57, B: 0xa8, A: 255})
	arc(8, 46, 26, 14, 56, 30)
	stroke(5, scene.Color{R: 0xc2, G: 0x51, B: 0x0f, A: 255})
	points = append(points, at(14, 55), at(50, 55))
	stroke(6, scene.Color{R: 0x12, G: 0x80, B: 0x5c, A: 255})
	return s
}
