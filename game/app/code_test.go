package app

import (
	"bytes"
	"errors"
	"fmt"
	"image/png"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"levelspan/game/scene/raster"
	"levelspan/perf/casefile"
)

// scanner is the command zbarimg (Debian package zbar-tools), a QR decoder that shares nothing with the encoder. Where the
// browser and the window must be tested it must be there too.
func scanner(t *testing.T) string {
	t.Helper()
	path, err := exec.LookPath("zbarimg")
	if err != nil {
		if os.Getenv("CI") == "true" || os.Getenv("LEVELSPAN_OUTSIDE") == "required" {
			t.Fatal("zbarimg is not there: apt-get install zbar-tools")
		}
		t.Skip("zbarimg is not there")
	}
	return path
}

// scan reads the QR code in the picture that the program shows.
func (p *pilot) scan(zbar, file string) (string, error) {
	picture, err := os.Create(file)
	if err != nil {
		return "", err
	}
	if err := errors.Join(png.Encode(picture, raster.Render(p.app.Scene())), picture.Close()); err != nil {
		return "", err
	}
	out, err := exec.Command(zbar, "--quiet", "--raw", "--nodbus", "-Sdisable", "-Sqrcode.enable", file).CombinedOutput()
	if err != nil {
		return "", fmt.Errorf("%w: %s", err, out)
	}
	return strings.TrimSuffix(string(out), "\n"), nil
}

func TestCodeIsReadByAnother(t *testing.T) {
	zbar := scanner(t)
	file := filepath.Join(t.TempDir(), "code.png")
	for _, c := range []struct {
		w, h, scale float64
		night       bool
	}{
		{1280, 800, 1, false}, {1280, 800, 1, true}, {1280, 800, 1.25, true}, {800, 1280, 2, false}, {390, 844, 3, true}, {390, 844, 2, false}, {844, 390, 3, false}, {320, 480, 2, true}, {2560, 1600, 1, false},
	} {
		at := fmt.Sprintf("%gx%g at %g, night %v", c.w, c.h, c.scale, c.night)
		p := newPilotIn(t, Input{Width: c.w, Height: c.h, PrefersDark: c.night})
		p.in.Scale = c.scale
		p.setSlider(handleMass, 688)
		p.tapShareButton()
		p.press("share/code")
		got, err := p.scan(zbar, file)
		if err != nil {
			t.Errorf("%s: %v", at, err)
			continue
		}
		if got != p.app.link() {
			t.Errorf("%s: read %.60q, want %.60q", at, got, p.app.link())
		}
		q := newPilot(t, 390, 844)
		q.step(Opened{Text: got})
		if q.file() != p.file() {
			t.Errorf("%s: what is read opens another case", at)
		}
	}
}

// TestLargestCode reads a code as full as one can be.
func TestLargestCode(t *testing.T) {
	zbar := scanner(t)
	text := "#case=A"
	for i := 0; len(text) < codeBytes; i++ {
		text += string("ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_"[i*i%64])
	}
	code, err := encodeCode(text)
	if err != nil {
		t.Fatal(err)
	}
	if code.side != 177 {
		t.Errorf("%d modules a side", code.side)
	}
	p := newPilot(t, 1280, 800)
	p.app.view.code, p.app.view.overlay, p.app.dirty = code, overlayCode, true
	p.step()
	got, err := p.scan(zbar, filepath.Join(t.TempDir(), "code.png"))
	if err != nil || got != text {
		t.Errorf("read %.40q (%d characters), %v", got, len(got), err)
	}
}

func TestCodeModulesAreWholeDevicePixels(t *testing.T) {
	for _, scale := range []float64{1, 1.25, 1.5, 2, 3} {
		p := newPilotIn(t, Input{Width: 800, Height: 1280, PrefersDark: true})
		p.in.Scale = scale
		p.tap("share")
		p.tap("share/code")
		m := raster.Render(p.app.Scene())
		// Only black and white within the code; and its outer white is four modules wide.
		s, side := p.app.Scene(), float64(p.app.view.code.side)
		for i := range s.Ops {
			op := &s.Ops[i]
			if op.Rect.W != op.Rect.H || op.Color.R != 255 || op.Color.G != 255 || op.Rect.W < 200 {
				continue
			}
			module := op.Rect.W * scale / (side + 2*codeQuiet)
			if d := module - float64(int(module+0.5)); d > 1e-6 || d < -1e-6 {
				t.Fatalf("scale %g: a module of %g device pixels", scale, module)
			}
			x0, y0, n := int(op.Rect.X*scale+0.5), int(op.Rect.Y*scale+0.5), int(op.Rect.W*scale+0.5)
			quiet, black := int(module+0.5)*codeQuiet, 0
			for y := y0; y < y0+n; y++ {
				for x := x0; x < x0+n; x++ {
					c := m.RGBAAt(x, y)
					in := x >= x0+quiet && y >= y0+quiet && x < x0+n-quiet && y < y0+n-quiet
					if c.R != c.G || c.G != c.B || c.R != 0 && c.R != 255 || !in && c.R != 255 {
						t.Fatalf("scale %g: %v at %d, %d", scale, c, x-x0, y-y0)
					}
					if c.R == 0 {
						black++
					}
				}
			}
			if share := float64(black) / float64(n*n); share < 0.3 || share > 0.6 {
				t.Errorf("scale %g: %.2f of the code is black", scale, share)
			}
			return
		}
		t.Fatal("no white square")
	}
}

func TestCodeOfAPageFromDisk(t *testing.T) {
	host := &sheetHost{base: "file:///home/anna/levelspan.html"}
	p := newPilot(t, 1280, 800)
	p.app = NewWith(Options{Host: host})
	p.step()
	p.tap("share")
	p.tap("share/code")
	if got := p.app.view.code.text; got != "#case="+p.app.presentCase().Fragment() {
		t.Errorf("the code holds %.40q", got)
	}
	if !p.says("no address that another machine") {
		t.Error("it is not said what to do with it")
	}
	p.tap("code/close")
	p.app = NewWith(Options{Host: host, HostedBase: "https://example.org/l/"})
	p.step()
	p.tap("share")
	p.tap("share/code")
	if got := p.app.view.code.text; !strings.HasPrefix(got, "https://example.org/l/#case=A") {
		t.Errorf("the code holds %.40q", got)
	}
	p.tap("code/close")
	if p.find("code/close") != nil {
		t.Error("the code stays")
	}
}

func TestTooLargeForACode(t *testing.T) {
	c := otherCase(t)
	full := 1.0
	for i := range 150 {
		rate := float64(i*7919%997) / 331
		c.Runs = append(c.Runs, casefile.Run{Kind: "climb", Configuration: "clean", IASMps: 30 + float64(i*31%17), PressureAltitudeM: float64(i * 13), OutsideAirTemperatureC: 12,
			MassKg: 700, RateMps: &rate, PowerFraction: &full})
	}
	if err := c.Validate(); err != nil {
		t.Fatal(err)
	}
	p := newPilot(t, 1280, 800)
	p.step(Opened{Data: c.Marshal()})
	p.tap("share")
	p.tap("share/code")
	size := fmt.Sprint(len(p.app.link()))
	if d := p.app.view.dialog; p.app.view.overlay != overlayDialog || !strings.Contains(d.Text, size) || !strings.Contains(d.Text, "2953") {
		t.Fatalf("the dialog says %q, the link has %s characters", d.Text, size)
	}
	p.tap("share/text")
	if len(p.host.copied) != 1 || !bytes.Equal([]byte(p.host.copied[0]), p.app.presentCase().Marshal()) {
		t.Error("the text is not offered")
	}
	p.tap("share")
	p.tap("share/code")
	p.tap("save")
	if len(p.host.saved) != 1 || p.find("dialog/ok") != nil {
		t.Error("the file is not offered")
	}
}

func BenchmarkEncodeCode(b *testing.B) {
	text := New(&testHost{}, nil).codeText()
	for b.Loop() {
		if _, err := encodeCode(text); err != nil {
			b.Fatal(err)
		}
	}
}
