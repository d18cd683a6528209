package ui

import (
	"math"

	"levelspan/game/scene"
)

// FormField is one row of a form: a number that opens the keypad, a choice, or free text.
type FormField struct {
	ID       string
	Label    string
	Value    string // as shown; "" is drawn as a dash
	Unit     string
	Range    string // what is allowed, small under the label
	Note     string // where the value comes from, small beside the range
	Help     string // expanded under the row by the "?" target, whose ID is "help/" + ID
	HelpOpen bool
	Error    string    // refusal, shown in place of the range
	Choices  []Choice  // a choice of one
	Text     bool      // free text
	Edit     *TextEdit // the text while it is edited
	Active   bool      // the keypad is open for it
	Disabled bool

	Number, Min, Max float64 // SI, for the control
}

// FormSection is a titled group of rows with buttons under it.
type FormSection struct {
	Title  string
	Note   string // one sentence under the title
	Fields []FormField
	Row    []Button
}

// Form is a scrollable list of sections in as many columns as there is room for. The app keeps it between frames.
type Form struct {
	Scroll Scroller

	reveal string
	unit   float64 // width of the widest unit: all values end above each other
	places []fieldPlace
	plain  []float64 // heights of the sections without help and refusals
}

// fieldPlace is where a row lies in the content.
type fieldPlace struct {
	section, field int // field -1: the title; -2: the buttons
	r              scene.Rect
}

// The measures of a form, logical pixels.
const (
	rowHigh     = 60.0
	boxHigh     = 48.0
	formGap     = 32.0 // between columns
	columnWidth = 400.0
	helpWidth   = MinTarget
)

// Reveal scrolls a field into sight when the form is drawn next, as when the focus came to it.
func (fm *Form) Reveal(id string) { fm.reveal = id }

// Draw draws the form over r and adds its controls; id names the region that scrolls.
func (fm *Form) Draw(f *Frame, r scene.Rect, id, label string, sections []FormSection) {
	height := fm.place(f, r.W, sections)
	fm.Scroll.Fit(height, r.H)
	if fm.reveal != "" {
		for _, p := range fm.places {
			if p.field >= 0 && sections[p.section].Fields[p.field].ID == fm.reveal {
				fm.Scroll.Reveal(p.r.Y-24, p.r.Y+p.r.H+24)
			}
		}
		fm.reveal = ""
	}
	top := f.BeginScroll(id, label, "", r, &fm.Scroll, height)
	for _, p := range fm.places {
		b := p.r
		b.X, b.Y = b.X+r.X, b.Y+top
		s := &sections[p.section]
		switch p.field {
		case -1:
			s.title(f, b)
		case -2:
			drawRow(f, b, s.Row)
		default:
			s.Fields[p.field].draw(f, b, fm.unit)
		}
	}
	f.EndScroll(r, &fm.Scroll, f.Theme.Background)
}

// place lays the sections out in columns and returns the height of the content. Which column a section is in does not
// depend on help and refusals, so that nothing jumps aside when they open.
func (fm *Form) place(f *Frame, width float64, sections []FormSection) float64 {
	fm.places, fm.unit = fm.places[:0], 24
	for i := range sections {
		for j := range sections[i].Fields {
			fm.unit = math.Max(fm.unit, math.Ceil(scene.Measure(scene.Small, sections[i].Fields[j].Unit)))
		}
	}
	const margin = 20
	columns := int(math.Max(1, math.Min(3, math.Floor((width-2*margin+formGap)/(columnWidth+formGap)))))
	columns = min(columns, max(1, len(sections)))
	w := math.Min(560, (width-2*margin-formGap*float64(columns-1))/float64(columns))
	if width < 440 {
		w = width - 2*12
	}
	left := (width - w*float64(columns) - formGap*float64(columns-1)) / 2
	fm.plain = fm.plain[:0]
	for i := range sections {
		fm.plain = append(fm.plain, sections[i].height(f, w, fm.unit))
	}
	limit := columnLimit(fm.plain, columns)
	column, plain, y, height := 0, 0.0, 0.0, 0.0
	for i := range sections {
		s := &sections[i]
		h := fm.plain[i]
		if plain > 0 && plain+h > limit+0.5 && column < columns-1 {
			column, plain, y = column+1, 0, 0
		}
		plain += h
		x := left + float64(column)*(w+formGap)
		add := func(field int, h float64) {
			fm.places = append(fm.places, fieldPlace{i, field, scene.Rect{X: x, Y: y, W: w, H: h}})
			y += h
		}
		add(-1, s.titleHeight(f, w))
		for j := range s.Fields {
			add(j, s.Fields[j].height(f, w, fm.unit, true))
		}
		if len(s.Row) > 0 {
			add(-2, rowHeight(s.Row, w))
		}
		y += 12
		height = math.Max(height, y)
	}
	return height + 24
}

// columnLimit is the least height of a column with which sections of these heights, kept in order, take no more than so
// many columns.
func columnLimit(heights []float64, columns int) float64 {
	lo, hi := 0.0, 0.0
	for _, h := range heights {
		lo, hi = math.Max(lo, h), hi+h
	}
	for k := 0; k < 24 && hi-lo > 1; k++ {
		mid, n, at := (lo+hi)/2, 1, 0.0
		for _, h := range heights {
			if at > 0 && at+h > mid {
				n, at = n+1, 0
			}
			at += h
		}
		if n <= columns {
			hi = mid
		} else {
			lo = mid
		}
	}
	return hi
}

// height is the height of a section without help and refusals.
func (s *FormSection) height(f *Frame, w, unit float64) float64 {
	h := s.titleHeight(f, w) + 12
	for i := range s.Fields {
		h += s.Fields[i].height(f, w, unit, false)
	}
	if len(s.Row) > 0 {
		h += rowHeight(s.Row, w)
	}
	return h
}

func (s *FormSection) titleHeight(f *Frame, w float64) float64 {
	h := 16 + scene.LineHeight(scene.Title) + 8
	if s.Note != "" {
		h += f.ParagraphHeight(scene.Small, w, s.Note) + 4
	}
	return math.Ceil(h)
}

func (s *FormSection) title(f *Frame, r scene.Rect) {
	if !f.Seen(r) {
		return
	}
	_, r = CutTop(r, 16)
	line, rest := CutTop(r, scene.LineHeight(scene.Title))
	f.Label(scene.Title, line, scene.Left, s.Title, f.Theme.Ink)
	if s.Note != "" {
		f.Paragraph(scene.Small, rest, s.Note, f.Theme.Muted)
	}
	f.Scene.Line(r.X, r.Y+r.H-1, r.X+r.W, r.Y+r.H-1, 1, f.Theme.Line)
}

// rowHeight is the height of buttons that wrap in a width.
func rowHeight(row []Button, w float64) float64 {
	x, lines := 0.0, 1.0
	for _, b := range row {
		if x > 0 && x+b.Width() > w {
			x, lines = 0, lines+1
		}
		x += b.Width() + 8
	}
	return 8 + lines*(MinTarget+8)
}

func drawRow(f *Frame, r scene.Rect, row []Button) {
	x, y := r.X, r.Y+8
	for _, b := range row {
		w := math.Min(b.Width(), r.W)
		if x > r.X && x+w > r.X+r.W {
			x, y = r.X, y+MinTarget+8
		}
		b.Draw(f, scene.Rect{X: x, Y: y, W: w, H: MinTarget})
		x += w + 8
	}
}
