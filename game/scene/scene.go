// Package scene is a drawing as data: fills, strokes, gradients, text and clips, in logical pixels, with the
// measuring that layout needs. It knows no window and no aeroplane. Back ends: scene/raster (pixels), scene/svg, and
// through scene/mesh (triangles) the window's painter.
package scene

// Point is a place in logical pixels, y down.
type Point struct{ X, Y float64 }

// Rect is a rectangle with its corner at (X, Y).
type Rect struct{ X, Y, W, H float64 }

// Color is a colour with straight (not premultiplied) alpha.
type Color struct{ R, G, B, A uint8 }

// Style is one of the few fixed text styles; a fixed set, so that the glyph atlas is made once.
type Style uint8

// The styles (weight and size in logical pixels).
const (
	Small     Style = iota // regular 13: second figures, ticks
	SmallBold              // bold 13: marks on the rail
	Body                   // regular 16
	BodyBold               // bold 16
	Title                  // bold 20
	Figure                 // bold 26: the value of a limit
	FigureBig              // bold 34: the keypad's entry
	StyleCount
)

// Align places text against its x.
type Align uint8

// The alignments.
const (
	Left Align = iota
	Center
	Right
)

// OpKind is the kind of one drawing operation.
type OpKind uint8

// The operations.
const (
	OpFill     OpKind = iota // polygon Points[P0:P1], simple (not self-crossing), filled
	OpBand                   // area between two polylines of equal length: Points[P0:P1] is upper then lower, each left to right
	OpStroke                 // polyline Points[P0:P1], width W, round joins and butt ends; Closed joins the ends
	OpRect                   // Rect, corner radius W
	OpGradient               // Rect, colour Color to Color2, left to right or (Vertical) top to bottom
	OpCircle                 // centre Points[P0], radius W
	OpText                   // Text[T0:T1] at Points[P0] (x by Align, y = baseline)
	OpPushClip               // Rect
	OpPopClip
)

// Op is one operation; what its fields mean depends on Kind.
type Op struct {
	Kind     OpKind
	Closed   bool
	Vertical bool
	Style    Style
	Align    Align
	Color    Color
	Color2   Color
	Rect     Rect
	W        float64
	Dash     float64 // OpStroke: length of a dash and of the gap after it, logical pixels; 0: an unbroken line
	Gap      float64
	P0, P1   int
	T0, T1   int
}

// Scene is the drawing. Reset keeps the store, so that a frame allocates nothing once warm.
type Scene struct {
	Width, Height float64 // logical pixels
	Scale         float64 // device pixels per logical pixel
	Background    Color
	Ops           []Op
	Points        []Point
	Text          []byte
}
