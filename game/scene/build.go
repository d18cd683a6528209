package scene

// Reset empties the scene and sets its size.
func (s *Scene) Reset(width, height, scale float64, background Color) {
	s.Width, s.Height, s.Scale, s.Background = width, height, scale, background
	s.Ops, s.Points, s.Text = s.Ops[:0], s.Points[:0], s.Text[:0]
}

func (s *Scene) put(op Op, pts ...Point) {
	op.P0 = len(s.Points)
	s.Points = append(s.Points, pts...)
	op.P1 = len(s.Points)
	s.Ops = append(s.Ops, op)
}

// Fill fills a simple polygon.
func (s *Scene) Fill(pts []Point, c Color) { s.put(Op{Kind: OpFill, Color: c}, pts...) }

// Band fills the area between two polylines of equal length.
func (s *Scene) Band(upper, lower []Point, c Color) {
	p0 := len(s.Points)
	s.Points = append(append(s.Points, upper...), lower...)
	s.Ops = append(s.Ops, Op{Kind: OpBand, Color: c, P0: p0, P1: len(s.Points)})
}

// Stroke draws a polyline.
func (s *Scene) Stroke(pts []Point, width float64, c Color) {
	s.put(Op{Kind: OpStroke, W: width, Color: c}, pts...)
}

// StrokeClosed draws a polyline whose ends meet.
func (s *Scene) StrokeClosed(pts []Point, width float64, c Color) {
	s.put(Op{Kind: OpStroke, W: width, Color: c, Closed: true}, pts...)
}

// StrokeDashed draws a polyline in dashes and gaps of these lengths.
func (s *Scene) StrokeDashed(pts []Point, width, dash, gap float64, c Color) {
	s.put(Op{Kind: OpStroke, W: width, Dash: dash, Gap: gap, Color: c}, pts...)
}

// Line draws one segment.
func (s *Scene) Line(x0, y0, x1, y1, width float64, c Color) {
	s.put(Op{Kind: OpStroke, W: width, Color: c}, Point{x0, y0}, Point{x1, y1})
}

// FillRect fills a rectangle with corner radius (0: square).
func (s *Scene) FillRect(r Rect, radius float64, c Color) {
	s.Ops = append(s.Ops, Op{Kind: OpRect, Rect: r, W: radius, Color: c})
}

// Gradient fills a rectangle with a linear gradient.
func (s *Scene) Gradient(r Rect, from, to Color, vertical bool) {
	s.Ops = append(s.Ops, Op{Kind: OpGradient, Rect: r, Color: from, Color2: to, Vertical: vertical})
}

// Circle fills a disc.
func (s *Scene) Circle(x, y, radius float64, c Color) {
	s.put(Op{Kind: OpCircle, W: radius, Color: c}, Point{x, y})
}

// Label draws text with its baseline at y. Text outside the embedded repertoire is drawn as a box.
func (s *Scene) Label(style Style, x, y float64, align Align, text string, c Color) {
	t0 := len(s.Text)
	s.Text = append(s.Text, text...)
	p0 := len(s.Points)
	s.Points = append(s.Points, Point{x, y})
	s.Ops = append(s.Ops, Op{Kind: OpText, Style: style, Align: align, Color: c, P0: p0, P1: p0 + 1, T0: t0, T1: len(s.Text)})
}

// PushClip confines what follows to r (and the clips around it) until PopClip.
func (s *Scene) PushClip(r Rect) { s.Ops = append(s.Ops, Op{Kind: OpPushClip, Rect: r}) }

// PopClip ends the innermost clip.
func (s *Scene) PopClip() { s.Ops = append(s.Ops, Op{Kind: OpPopClip}) }
