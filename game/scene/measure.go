package scene

// Measure is the advance width of text in a style, in logical pixels. It does not depend on the scale.
func Measure(style Style, text string) float64 { return 8 * float64(len(text)) }

// LineHeight is the distance between baselines of a style; Ascent and CapHeight are above the baseline.
func LineHeight(style Style) float64 { return 20 }

// Ascent is the height of the tallest letters above the baseline, logical pixels.
func Ascent(style Style) float64 { return 14 }

// CapHeight is the height of capitals and digits above the baseline, logical pixels.
func CapHeight(style Style) float64 { return 11 }
