package font

import (
	"bufio"
	"os"
	"strconv"
	"strings"
	"testing"
)

// listed reads repertoire.txt, the file that the subset was cut with.
func listed(t *testing.T) []rune {
	f, err := os.Open("repertoire.txt")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	var all []rune
	lines := bufio.NewScanner(f)
	for lines.Scan() {
		line := strings.TrimSpace(lines.Text())
		if line == "" || line[0] == '#' {
			continue
		}
		a, b, ok := strings.Cut(line, "-")
		if !ok {
			b = a
		}
		lo, err1 := strconv.ParseInt(a, 16, 32)
		hi, err2 := strconv.ParseInt(b, 16, 32)
		if err1 != nil || err2 != nil || lo > hi {
			t.Fatalf("repertoire.txt: %q", line)
		}
		for r := lo; r <= hi; r++ {
			all = append(all, rune(r))
		}
	}
	return all
}

func TestRepertoireIsTheFilesRepertoire(t *testing.T) {
	want := map[rune]bool{figureSpace: true, thinSpace: true, narrowSpace: true}
	for _, r := range listed(t) {
		want[r] = true
	}
	got := Repertoire()
	if len(got) != len(want) || len(got) != Count()-1 {
		t.Fatalf("%d characters in code, Count %d, %d in repertoire.txt with the narrow spaces", len(got), Count(), len(want))
	}
	for i, r := range got {
		if !want[r] {
			t.Errorf("%U is not in repertoire.txt", r)
		}
		if i > 0 && got[i-1] >= r {
			t.Errorf("%U after %U", r, got[i-1])
		}
		if Index(r) != i+1 || Rune(i+1) != r || !Has(r) {
			t.Errorf("%U: index %d, want %d; back %U", r, Index(r), i+1, Rune(i+1))
		}
	}
	for _, r := range []rune{-1, 0, 0x1F, 0x7F, 0xAD, 'ł', 'ρ', 0x2012, 0x10FFFF, 0x7FFFFFFF} {
		if Has(r) {
			t.Errorf("%U counted as drawn", r)
		}
	}
	for _, i := range []int{-1, Missing, Count(), 1 << 30} {
		if Rune(i) != '\uFFFD' {
			t.Errorf("Rune(%d) = %U", i, Rune(i))
		}
	}
}

// The signs that the program writes must be there.
func TestRepertoireHoldsTheTrade(t *testing.T) {
	for _, r := range "0123456789+-−±°·×÷≥≤≈≠→←↑↓²³½µμ∞✓–—…‘’“”éèüøåæßñçØÅÄÖ⚠▸▾•′″ηηλσπαΔ√" {
		if !Has(r) {
			t.Errorf("%q is missing", r)
		}
	}
}

func TestDigitsAreTabular(t *testing.T) {
	for w := Regular; w < WeightCount; w++ {
		for _, r := range "0123456789\u2007" {
			if a := Advance(w, Index(r)); a != 1300 {
				t.Errorf("weight %d: %q advances %d", w, r, a)
			}
		}
	}
	if Advance(Regular, -5) != Advance(Regular, Missing) || Advance(Bold, Count()) != Advance(Bold, Missing) {
		t.Error("an index out of range must be the box")
	}
}

// The constants are what the outlines show; B612 cuts the tops of its stems up to 30 units above the flat height.
func TestMetrics(t *testing.T) {
	var o Outliner
	for w := Regular; w < WeightCount; w++ {
		for _, c := range []struct {
			r   rune
			top float64
		}{{'H', CapHeight}, {'x', XHeight}} {
			lo, hi := extent(o.Outline(w, Index(c.r)))
			if lo != 0 || hi < c.top || hi > c.top+30 {
				t.Errorf("weight %d: %q spans %g..%g, want 0..%g and a little", w, c.r, lo, hi, c.top)
			}
		}
		for i := range Count() {
			lo, hi := extent(o.Outline(w, i))
			if lo < -UnitsPerEm/2 || hi > UnitsPerEm*1.2 {
				t.Errorf("weight %d: %q spans %g..%g", w, Rune(i), lo, hi)
			}
		}
	}
}

// Every character with ink has an outline in which each contour starts with MoveTo.
func TestOutlines(t *testing.T) {
	var o Outliner
	for w := Regular; w < WeightCount; w++ {
		for i := range Count() {
			segs := o.Outline(w, i)
			space := strings.ContainsRune(" \u00a0\u2007\u2009\u202f", Rune(i))
			if (len(segs) == 0) != space {
				t.Errorf("weight %d: %q has %d segments", w, Rune(i), len(segs))
			}
			if len(segs) > 0 && segs[0].Verb != MoveTo {
				t.Errorf("weight %d: %q does not start with a move", w, Rune(i))
			}
		}
	}
}

func extent(segs []Segment) (lo, hi float64) {
	if len(segs) == 0 {
		return 0, 0
	}
	lo, hi = segs[0].Y, segs[0].Y
	for _, s := range segs {
		lo, hi = min(lo, s.Y), max(hi, s.Y)
	}
	return lo, hi
}

func BenchmarkIndex(b *testing.B) {
	text := []rune("Density altitude 6 300 ft ± 70 → 45° é")
	n := 0
	for i := range b.N {
		n += Index(text[i%len(text)])
	}
	if n == 0 {
		b.Fatal("nothing found")
	}
}
