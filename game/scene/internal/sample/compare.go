package sample

import (
	"image"
	"image/png"
	"os"
	"path/filepath"
	"testing"
)

// Diff is how two pictures of the same size differ: the greatest difference of a channel, the mean over all channels,
// and how many pixels differ by more than the threshold.
type Diff struct {
	Max   int
	Mean  float64
	Count int
}

// Compare compares two pictures.
func Compare(a, b *image.RGBA, threshold int) Diff {
	var d Diff
	sum := 0
	for y := a.Rect.Min.Y; y < a.Rect.Max.Y; y++ {
		for x := a.Rect.Min.X; x < a.Rect.Max.X; x++ {
			i, j := a.PixOffset(x, y), b.PixOffset(x, y)
			worst := 0
			for k := range 4 {
				v := int(a.Pix[i+k]) - int(b.Pix[j+k])
				if v < 0 {
					v = -v
				}
				sum += v
				worst = max(worst, v)
			}
			d.Max = max(d.Max, worst)
			if worst > threshold {
				d.Count++
			}
		}
	}
	d.Mean = float64(sum) / float64(max(len(a.Pix), 1))
	return d
}

// Golden compares a picture with testdata/name.png, or writes that file when update is set. Processors may round
// differently: a few pixels may be off by a few steps.
func Golden(t *testing.T, got *image.RGBA, name string, update bool) {
	t.Helper()
	path := filepath.Join("testdata", name+".png")
	if update {
		write(t, path, got)
		return
	}
	f, err := os.Open(path)
	if err != nil {
		t.Fatalf("%v (run the test with -update to write it)", err)
	}
	defer f.Close()
	m, err := png.Decode(f)
	if err != nil {
		t.Fatal(err)
	}
	want := image.NewRGBA(m.Bounds())
	for y := range want.Rect.Dy() {
		for x := range want.Rect.Dx() {
			want.Set(x, y, m.At(x, y))
		}
	}
	if want.Rect != got.Rect {
		t.Fatalf("%s: size %v, want %v", name, got.Rect, want.Rect)
	}
	if d := Compare(got, want, 3); d.Count > len(got.Pix)/4/2000 || d.Max > 40 {
		out := filepath.Join(t.TempDir(), name+".png")
		write(t, out, got)
		t.Errorf("%s differs from its golden: %+v", name, d)
	}
}

func write(t *testing.T, path string, m image.Image) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	f, err := os.Create(path)
	if err != nil {
		t.Fatal(err)
	}
	enc := png.Encoder{CompressionLevel: png.BestCompression}
	if err := enc.Encode(f, m); err != nil {
		t.Fatal(err)
	}
	if err := f.Close(); err != nil {
		t.Fatal(err)
	}
}
