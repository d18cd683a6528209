package raster

import "levelspan/game/scene"

// ink is a premultiplied colour, each 0..255.
type ink struct{ r, g, b, a uint32 }

func newInk(c scene.Color) ink {
	a := uint32(c.A)
	return ink{div255(uint32(c.R) * a), div255(uint32(c.G) * a), div255(uint32(c.B) * a), a}
}

// div255 is v/255 rounded to nearest, for v up to 255*255.
func div255(v uint32) uint32 { return (v + 128 + (v+128)>>8) >> 8 }

func (c ink) scaled(alpha uint8) ink {
	k := uint32(alpha)
	return ink{div255(c.r * k), div255(c.g * k), div255(c.b * k), div255(c.a * k)}
}

// mix is the colour of pixel i of n on the way from one to the other.
func mix(from, to ink, i, n int) ink {
	t := uint32(2*i+1) * 32768 / uint32(n) // 16 bits of fraction, at the pixel's middle
	m := func(a, b uint32) uint32 { return (a*(65536-t) + b*t + 32768) >> 16 }
	return ink{m(from.r, to.r), m(from.g, to.g), m(from.b, to.b), m(from.a, to.a)}
}

// set replaces pixels.
func (c ink) set(line []uint8) {
	if len(line) == 0 {
		return
	}
	line[0], line[1], line[2], line[3] = uint8(c.r), uint8(c.g), uint8(c.b), uint8(c.a)
	for n := 4; n < len(line); n *= 2 {
		copy(line[n:], line[:n])
	}
}

// over lays the ink over pixels.
func (c ink) over(line []uint8) {
	if c.a == 255 {
		if len(line) > 32 {
			c.set(line)
			return
		}
		for i := 0; i+4 <= len(line); i += 4 {
			d := line[i : i+4 : i+4]
			d[0], d[1], d[2], d[3] = uint8(c.r), uint8(c.g), uint8(c.b), 255
		}
		return
	}
	k := 255 - c.a
	for i := 0; i+4 <= len(line); i += 4 {
		d := line[i : i+4 : i+4]
		d[0] = uint8(c.r + div255(uint32(d[0])*k))
		d[1] = uint8(c.g + div255(uint32(d[1])*k))
		d[2] = uint8(c.b + div255(uint32(d[2])*k))
		d[3] = uint8(c.a + div255(uint32(d[3])*k))
	}
}

// mask lays the ink over pixels as far as each byte of cover says.
func (c ink) mask(line, cover []uint8) {
	for i, m := range cover {
		if m == 0 {
			continue
		}
		s := c
		if m != 255 {
			s = c.scaled(m)
		}
		k := 255 - s.a
		d := line[i*4 : i*4+4 : i*4+4]
		d[0] = uint8(s.r + div255(uint32(d[0])*k))
		d[1] = uint8(s.g + div255(uint32(d[1])*k))
		d[2] = uint8(s.b + div255(uint32(d[2])*k))
		d[3] = uint8(s.a + div255(uint32(d[3])*k))
	}
}
