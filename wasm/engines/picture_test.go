package engines

import (
	"bytes"
	"fmt"
	"image"
	_ "image/png"
	"os"
	"path/filepath"
)

// picture is the page as it is shown, written to -shots under a name.
func (u user) picture(name string) image.Image {
	u.t.Helper()
	data, err := u.b.picture()
	u.check(err)
	if *shots != "" {
		u.check(os.WriteFile(filepath.Join(*shots, "engine-"+name+".png"), data, 0o644))
	}
	img, _, err := image.Decode(bytes.NewReader(data))
	u.check(err)
	return img
}

// seen demands a picture that is not empty: at least 40 colours, at four levels a channel.
func (u user) seen(name string, img image.Image) {
	u.t.Helper()
	colours := map[[3]uint32]bool{}
	for y := img.Bounds().Min.Y; y < img.Bounds().Max.Y; y += 3 {
		for x := img.Bounds().Min.X; x < img.Bounds().Max.X; x += 3 {
			r, g, b, _ := img.At(x, y).RGBA()
			colours[[3]uint32{r >> 10, g >> 10, b >> 10}] = true
		}
	}
	if len(colours) < 40 {
		u.t.Errorf("%s: the picture has %d colours", name, len(colours))
	}
}

const block = 16 // pixels

// coarse is a picture as the mean colours of blocks, 0 to 255 a channel.
func coarse(img image.Image) (means [][3]float64, columns int) {
	b := img.Bounds()
	columns = b.Dx() / block
	for top := b.Min.Y; top+block <= b.Max.Y; top += block {
		for left := b.Min.X; left+block <= b.Max.X; left += block {
			var sum [3]float64
			for y := top; y < top+block; y++ {
				for x := left; x < left+block; x++ {
					r, g, b, _ := img.At(x, y).RGBA()
					sum[0] += float64(r)
					sum[1] += float64(g)
					sum[2] += float64(b)
				}
			}
			for i := range sum {
				sum[i] /= 257 * block * block
			}
			means = append(means, sum)
		}
	}
	return means, columns
}

// differ gives the largest difference of two pictures' blocks in one channel, and where it is.
func differ(a, b image.Image) (most float64, where string, err error) {
	if a.Bounds().Size() != b.Bounds().Size() {
		return 0, "", fmt.Errorf("sizes %v and %v", a.Bounds().Size(), b.Bounds().Size())
	}
	left, columns := coarse(a)
	right, _ := coarse(b)
	for i := range left {
		for c := range 3 {
			if d := max(left[i][c]-right[i][c], right[i][c]-left[i][c]); d > most {
				most, where = d, fmt.Sprintf("at (%d, %d)", i%columns*block, i/columns*block)
			}
		}
	}
	return most, where, nil
}

// firstSeen are the pictures of the first engine that ran, by the size of the window; the others' are compared with them.
var firstSeen = map[string]struct {
	name string
	img  image.Image
}{}

// same demands the picture that the first engine gave under a key. Blocks may differ by so much of 255: nothing where the program
// has made every pixel itself, a little for what another's anti-aliasing makes of the edges.
func (u user) same(key, name string, img image.Image, allowed float64) {
	u.t.Helper()
	first, ok := firstSeen[key]
	if !ok {
		first.name, first.img = name, img
		firstSeen[key] = first
		return
	}
	most, where, err := differ(first.img, img)
	if err != nil {
		u.t.Errorf("%s and %s: %v", first.name, name, err)
		return
	}
	u.t.Logf("%s and %s: blocks of %d pixels differ by at most %.2f of 255 %s", first.name, name, block, most, where)
	if most > allowed {
		u.t.Errorf("%s and %s: blocks of %d pixels differ by more than %g of 255", first.name, name, block, allowed)
	}
}
