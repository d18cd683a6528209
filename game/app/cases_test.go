package app

import (
	"os"
	"path/filepath"
	"testing"

	"levelspan/game/scene/raster"
)

// TestOtherAeroplanes opens every case of the repository, drags both handles through their range and compares each frame
// with a direct solve: engines and propellers of every kind, and one that cannot fly.
func TestOtherAeroplanes(t *testing.T) {
	paths, err := filepath.Glob(filepath.Join("..", "..", "testdata", "cases", "*.json"))
	if err != nil || len(paths) == 0 {
		t.Fatalf("no cases: %v", err)
	}
	for _, path := range paths {
		data, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		p := newPilot(t, 1280, 800)
		p.step(Opened{Name: path, Data: data})
		if p.find("dialog/ok") != nil {
			t.Errorf("%s is not opened without a word", path)
			p.press("dialog/ok")
		}
		if *shotsDir != "" {
			name := filepath.Base(path)
			writePNG(t, filepath.Join(*shotsDir, "case-"+name[:len(name)-5]+".png"), raster.Render(p.app.Scene()))
		}
		p.sameAsSolve()
		x, y := p.app.chart.x, p.app.chart.y
		p.dragBy(1, handleMass, -300, 0, 12, p.sameAsSolve)
		p.dragBy(1, handleAltitude, 0, -180, 12, p.sameAsSolve)
		p.dragBy(1, handleMass, 500, 0, 12, p.sameAsSolve)
		if p.app.chart.x != x || p.app.chart.y != y {
			t.Errorf("%s: a scale moved", path)
		}
	}
}
