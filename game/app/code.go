package app

import (
	"math"
	"strings"

	"levelspan/game/scene"
	"levelspan/game/ui"

	"rsc.io/qr/coding"
)

// shareCode is the QR code that is shown.
type shareCode struct {
	text string
	bits []byte // one row of side modules after the other; 1 is black
	side int    // modules, 0 where the text is too long for one code
}

// The bounds of a QR code (ISO/IEC 18004): the most bytes that version 40 at level L holds, and the quiet zone, modules.
const (
	codeBytes = 2953
	codeQuiet = 4
)

// codeText is what the code holds: the link where it leads somewhere from another machine, else the fragment alone, to be
// pasted into that machine's own copy of the program. A file address helps nobody else, and tells of this machine's folders.
func (a *App) codeText() string {
	fragment := a.presentCase().Fragment()
	if fragment == "" {
		return ""
	}
	base := a.host.LinkBase()
	if base == "" || strings.HasPrefix(base, "file:") {
		base = a.hostedBase
	}
	return base + "#case=" + fragment
}

// openCode shows the case as a QR code.
func (a *App) openCode() {
	text := a.codeText()
	if text == "" || len(text) > codeBytes {
		size := "This case"
		if text != "" {
			size = "This case takes " + count(len(text)) + " as a link; one QR code"
		}
		lines := []string{size + " holds " + count(codeBytes) + " at most.", "Save the case file, or copy the case as text."}
		if text == "" {
			lines[0] = "A QR code holds " + count(codeBytes) + " at most, and this case is larger than any link."
		}
		a.openDialog("Too large for one QR code", true, lines...)
		a.view.dialog.Buttons = []ui.Button{{ID: "dialog/ok", Text: "Close", Kind: ui.Framed}, {ID: "share/text", Text: "Copy as text", Kind: ui.Framed}, {ID: "save", Text: "Save a file", Kind: ui.Primary}}
		return
	}
	code, err := encodeCode(text)
	if err != nil {
		a.openDialog("No QR code", true, capital(err.Error())+".")
		return
	}
	a.view.code = code
	a.view.overlay = overlayCode
	a.dirty = true
}

// encodeCode makes the code, in bytes at level L, of the smallest version that holds the text.
func encodeCode(text string) (shareCode, error) {
	v, enc := coding.Version(coding.MinVersion), coding.String(text)
	for v < coding.MaxVersion && enc.Bits(v) > v.DataBytes(coding.L)*8 {
		v++
	}
	var best *coding.Code
	least := math.MaxInt
	for mask := coding.Mask(0); mask < 8; mask++ {
		plan, err := coding.NewPlan(v, coding.L, mask)
		if err != nil {
			return shareCode{}, err
		}
		code, err := plan.Encode(enc)
		if err != nil {
			return shareCode{}, err
		}
		if p := penalty(code); p < least {
			best, least = code, p
		}
	}
	c := shareCode{text: text, side: best.Size, bits: make([]byte, best.Size*best.Size)}
	for y := range best.Size {
		for x := range best.Size {
			if best.Black(x, y) {
				c.bits[y*best.Size+x] = 1
			}
		}
	}
	return c, nil
}

// penalty is how hard a masked code is to read: runs of one colour and blocks of two by two, the first two of the
// standard's four counts.
func penalty(c *coding.Code) int {
	n := 0
	for y := range c.Size {
		across, down := 0, 0
		for x := range c.Size {
			if x > 0 && c.Black(x, y) == c.Black(x-1, y) {
				across++
			} else {
				across = 0
			}
			if x > 0 && c.Black(y, x) == c.Black(y, x-1) {
				down++
			} else {
				down = 0
			}
			for _, run := range [...]int{across, down} {
				switch {
				case run == 4:
					n += 3
				case run > 4:
					n++
				}
			}
			if x > 0 && y > 0 && c.Black(x, y) == c.Black(x-1, y) && c.Black(x, y) == c.Black(x, y-1) && c.Black(x, y) == c.Black(x-1, y-1) {
				n += 3
			}
		}
	}
	return n
}

// drawCode draws the code over the whole window, as large as whole device pixels a module allow, with words beside or under it.
func (a *App) drawCode(f *ui.Frame) {
	f.Modal++
	defer func() { f.Modal-- }()
	t, s := f.Theme, a.layout.safe
	f.Scene.FillRect(a.layout.window, 0, t.Background)
	f.Add(ui.Control{ID: "code/outside", Role: ui.RoleRegion, Label: "QR code of " + a.doc.current.Aeroplane.Name, Bounds: a.layout.window, Hit: a.layout.window})
	lines := a.codeWords()
	area, side := s, scene.Rect{}
	beside := s.W > s.H
	if beside {
		side, area = ui.CutRight(s, clamp(s.W-s.H, 230, 400))
		side = ui.Trim(side, 12, 20, 12, 4)
	} else {
		h := 16 + ui.MinTarget + 12.0
		for _, l := range lines {
			h += f.ParagraphHeight(scene.Body, s.W-40, l) + 6
		}
		side, area = ui.CutBottom(s, math.Min(h, 0.5*s.H))
		side = ui.Trim(side, 4, 20, 12, 20)
	}
	drawModules(f.Scene, area, &a.view.code)
	button, words := ui.CutBottom(side, ui.MinTarget)
	f.PushView(words)
	for i, l := range lines {
		style, ink := scene.Body, t.Ink
		if i == 0 {
			style = scene.BodyBold
		}
		h := f.Paragraph(style, words, l, ink) + 6
		words = ui.Trim(words, h, 0, 0, 0)
	}
	f.PopView()
	ui.Button{ID: "code/close", Text: "Close", Kind: ui.Framed}.Draw(f, button)
}

// codeWords say what the other machine does with the code.
func (a *App) codeWords() []string {
	name := a.doc.current.Aeroplane.Name
	if strings.HasPrefix(a.view.code.text, "#") {
		return []string{name, "Scan this with the other tablet, copy the text that it finds, and paste it there: levelspan, menu, Paste a link or case text. No network is needed.",
			"This copy of the page has no address that another machine could open, so the code holds the case alone."}
	}
	return []string{name, "Scan this with the other tablet: its browser opens the case.", "Without a network, copy the text that it finds and paste it there: levelspan, menu, Paste a link or case text."}
}

// drawModules draws the code black on white in the middle of area: in every palette, for a scanner sees no other.
func drawModules(s *scene.Scene, area scene.Rect, c *shareCode) {
	if c.side == 0 {
		return
	}
	scale := scene.CleanScale(s.Scale)
	total := float64(c.side + 2*codeQuiet)
	room := math.Floor(math.Min(area.W, area.H) * scale)
	module := math.Max(1, math.Floor(room/total)) / scale
	snap := func(v float64) float64 { return math.Round(v*scale) / scale }
	x0, y0 := snap(area.X+(area.W-total*module)/2), snap(area.Y+(area.H-total*module)/2)
	black, white := scene.Color{A: 255}, scene.Color{R: 255, G: 255, B: 255, A: 255}
	s.FillRect(scene.Rect{X: x0, Y: y0, W: total * module, H: total * module}, 0, white)
	for y := range c.side {
		row := c.bits[y*c.side : (y+1)*c.side]
		for x := 0; x < c.side; {
			if row[x] == 0 {
				x++
				continue
			}
			n := x
			for n < c.side && row[n] == 1 {
				n++
			}
			s.FillRect(scene.Rect{X: x0 + float64(x+codeQuiet)*module, Y: y0 + float64(y+codeQuiet)*module, W: float64(n-x) * module, H: module}, 0, black)
			x = n
		}
	}
}
