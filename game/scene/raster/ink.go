package raster

import (
	"encoding/binary"

	"levelspan/game/scene"
)

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

// packed is the ink as the four bytes of a pixel in one word, red lowest.
func (c ink) packed() uint32 { return c.r | c.g<<8 | c.b<<16 | c.a<<24 }

// fade is a pixel, packed, times k/255: two channels at a time, each rounded as div255 does.
func fade(d, k uint32) uint32 {
	const two = 0x00FF00FF
	rb := d&two*k + 0x00800080
	ga := d>>8&two*k + 0x00800080
	rb = (rb + rb>>8&two) >> 8 & two
	ga = (ga + ga>>8&two) & (two << 8)
	return rb | ga
}

// set replaces pixels.
func (c ink) set(line []uint8) {
	if len(line) < 4 {
		return
	}
	binary.LittleEndian.PutUint32(line, c.packed())
	for n := 4; n < len(line); n *= 2 {
		copy(line[n:], line[:n])
	}
}

// over lays the ink over pixels.
func (c ink) over(line []uint8) {
	if c.a == 255 {
		c.set(line)
		return
	}
	k, src := 255-c.a, c.packed()
	// Long spans lie on plain ground more often than not: the last answer is kept.
	ground := uint32(0)
	answer := src
	for len(line) >= 4 {
		d := binary.LittleEndian.Uint32(line)
		if d != ground {
			ground, answer = d, src+fade(d, k)
		}
		binary.LittleEndian.PutUint32(line, answer)
		line = line[4:]
	}
}

// mask lays the ink over pixels as far as each byte of cover says.
func (c ink) mask(line, cover []uint8) {
	full := c.packed()
	for _, m := range cover {
		if len(line) < 4 {
			return
		}
		if m != 0 {
			src := full
			if m != 255 {
				src = fade(full, uint32(m))
			}
			if k := 255 - src>>24; k == 0 {
				binary.LittleEndian.PutUint32(line, src)
			} else {
				binary.LittleEndian.PutUint32(line, src+fade(binary.LittleEndian.Uint32(line), k))
			}
		}
		line = line[4:]
	}
}
