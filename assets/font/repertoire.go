package font

import "sort"

// Missing is the index of the box that stands for every character outside the repertoire.
const Missing = 0

// span is a run of consecutive characters; the index of the first is base.
type span struct {
	lo, hi rune
	base   int
}

// The characters of repertoire.txt and the narrow spaces, ascending; a test keeps the two files together.
var spans = number([]span{
	{lo: 0x20, hi: 0x7E},
	{lo: 0xA0, hi: 0xAC}, {lo: 0xAE, hi: 0xFF},
	{lo: 0x152, hi: 0x153}, {lo: 0x160, hi: 0x161}, {lo: 0x178, hi: 0x178},
	{lo: 0x393, hi: 0x394}, {lo: 0x3A3, hi: 0x3A3}, {lo: 0x3A6, hi: 0x3A6}, {lo: 0x3A9, hi: 0x3A9},
	{lo: 0x3B1, hi: 0x3B5}, {lo: 0x3B7, hi: 0x3B8}, {lo: 0x3BB, hi: 0x3BC}, {lo: 0x3C0, hi: 0x3C0},
	{lo: 0x3C3, hi: 0x3C6}, {lo: 0x3C9, hi: 0x3C9},
	{lo: figureSpace, hi: figureSpace}, {lo: thinSpace, hi: thinSpace},
	{lo: 0x2010, hi: 0x2010}, {lo: 0x2013, hi: 0x2014}, {lo: 0x2018, hi: 0x201A}, {lo: 0x201C, hi: 0x201E},
	{lo: 0x2020, hi: 0x2020}, {lo: 0x2022, hi: 0x2022}, {lo: 0x2026, hi: 0x2026}, {lo: narrowSpace, hi: narrowSpace},
	{lo: 0x2030, hi: 0x2030}, {lo: 0x2032, hi: 0x2033}, {lo: 0x2039, hi: 0x203A},
	{lo: 0x2070, hi: 0x2070}, {lo: 0x2074, hi: 0x2079}, {lo: 0x207B, hi: 0x207B}, {lo: 0x2080, hi: 0x2089},
	{lo: 0x20AC, hi: 0x20AC}, {lo: 0x2122, hi: 0x2122},
	{lo: 0x2190, hi: 0x2199}, {lo: 0x21A9, hi: 0x21AA}, {lo: 0x21B6, hi: 0x21B7},
	{lo: 0x2212, hi: 0x2212}, {lo: 0x221A, hi: 0x221A}, {lo: 0x221D, hi: 0x221E},
	{lo: 0x2248, hi: 0x2248}, {lo: 0x2260, hi: 0x2260}, {lo: 0x2264, hi: 0x2265}, {lo: 0x22EE, hi: 0x22EE},
	{lo: 0x25B6, hi: 0x25B6}, {lo: 0x25B8, hi: 0x25B8}, {lo: 0x25BC, hi: 0x25BC}, {lo: 0x25BE, hi: 0x25BE},
	{lo: 0x25CF, hi: 0x25CF}, {lo: 0x2600, hi: 0x2600}, {lo: 0x2605, hi: 0x2605}, {lo: 0x2610, hi: 0x2611},
	{lo: 0x263E, hi: 0x263E}, {lo: 0x26A0, hi: 0x26A0}, {lo: 0x2713, hi: 0x2713},
})

// Spaces that the typeface lacks, given an advance here.
const (
	figureSpace = 0x2007 // as wide as a digit
	thinSpace   = 0x2009
	narrowSpace = 0x202F // no-break, between groups of three digits
)

// blank is the advance, in font units, of a space that is not in the files.
func blank(r rune) (uint16, bool) {
	switch r {
	case figureSpace:
		return 1300, true
	case thinSpace, narrowSpace:
		return 400, true
	}
	return 0, false
}

func number(s []span) []span {
	n := Missing + 1
	for i := range s {
		s[i].base = n
		n += int(s[i].hi-s[i].lo) + 1
	}
	return s
}

// Count is the number of indices: the repertoire and the box.
func Count() int {
	last := spans[len(spans)-1]
	return last.base + int(last.hi-last.lo) + 1
}

// Index is the place of a character in the repertoire, 1..Count()-1, or Missing.
func Index(r rune) int {
	if uint32(r) < uint32(len(latin)) {
		return int(latin[r])
	}
	return search(r)
}

// latin is Index for the characters that most text is made of.
var latin = func() (t [256]uint16) {
	for r := range t {
		t[r] = uint16(search(rune(r)))
	}
	return t
}()

func search(r rune) int {
	lo, hi := 0, len(spans)
	for lo < hi {
		mid := int(uint(lo+hi) >> 1)
		if spans[mid].hi < r {
			lo = mid + 1
		} else {
			hi = mid
		}
	}
	if lo < len(spans) && spans[lo].lo <= r {
		return spans[lo].base + int(r-spans[lo].lo)
	}
	return Missing
}

// Rune is the character with an index, and utf8.RuneError for Missing and for an index outside the repertoire.
func Rune(index int) rune {
	k := sort.Search(len(spans), func(i int) bool { return spans[i].base > index }) - 1
	if k < 0 || index > spans[k].base+int(spans[k].hi-spans[k].lo) {
		return '\uFFFD'
	}
	return spans[k].lo + rune(index-spans[k].base)
}

// Has tells whether a character is drawn as itself rather than as a box.
func Has(r rune) bool { return Index(r) != Missing }

// Repertoire is every character that can be drawn, ascending. It includes the spaces.
func Repertoire() []rune {
	all := make([]rune, 0, Count()-1)
	for _, s := range spans {
		for r := s.lo; r <= s.hi; r++ {
			all = append(all, r)
		}
	}
	return all
}
