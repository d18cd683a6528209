package ui

import (
	"math"
	"math/rand/v2"
	"testing"

	"levelspan/game/scene"
)

func TestScale(t *testing.T) {
	s := Scale{V0: 30, V1: 125, P0: 64, P1: 742}
	down := Scale{V0: 0, V1: 16000, P0: 516, P1: 88} // rises as y falls
	for _, c := range []struct{ got, want float64 }{
		{s.Pos(30), 64}, {s.Pos(125), 742}, {s.Value(742), 125}, {s.Clamp(200), 125}, {s.Clamp(-1), 30},
		{down.Pos(8000), 302}, {down.Value(516), 0}, {down.Moved(8000, -107), 12000}, {down.Moved(8000, 1e9), 0},
		{Scale{V0: 5, V1: 5, P0: 1, P1: 9}.Pos(7), 1}, {Scale{V0: 5, V1: 6, P0: 1, P1: 1}.Value(7), 5},
	} {
		if math.Abs(c.got-c.want) > 1e-9 {
			t.Errorf("%v, want %v", c.got, c.want)
		}
	}
}

func TestNiceStep(t *testing.T) {
	for _, c := range []struct{ span, count, want float64 }{
		{95, 10, 10}, {100, 10, 10}, {101, 10, 20}, {18000, 9, 2000}, {60, 6, 10}, {370, 6, 100}, {0.3, 3, 0.1}, {1e-7, 4, 5e-8},
		{0, 5, 0}, {-1, 5, 0}, {math.NaN(), 5, 0}, {5, 0, 0}, {math.Inf(1), 5, 0},
	} {
		if got := NiceStep(c.span, c.count); math.Abs(got-c.want) > 1e-12*c.want {
			t.Errorf("NiceStep(%v, %v) = %v, want %v", c.span, c.count, got, c.want)
		}
	}
	// Whatever the span: never more steps than asked for, and the next finer nice step would be more.
	rnd := rand.New(rand.NewPCG(1, 2))
	for range 10000 {
		span, count := math.Pow(10, rnd.Float64()*20-10), 1+rnd.Float64()*30
		step := NiceStep(span, count)
		if n := span / step; n > count*(1+1e-6) || n*2.5 < count*(1-1e-6) {
			t.Fatalf("span %v in %v: step %v", span, count, step)
		}
	}
}

func TestAppendTicks(t *testing.T) {
	ticks := AppendTicks(nil, -2000, 18000, 4000)
	want := []string{"0", "4\u202f000", "8\u202f000", "12\u202f000", "16\u202f000"}
	if len(ticks) != len(want) {
		t.Fatalf("%v", ticks)
	}
	for i := range want {
		if ticks[i].Text != want[i] {
			t.Errorf("%q, want %q", ticks[i].Text, want[i])
		}
	}
	ends := AppendTicks(nil, 0, 0.3, 0.1) // 3*0.1 is more than 0.3 in binary
	if len(ends) != 4 || ends[3].Text != "0.3" {
		t.Errorf("%v", ends)
	}
	for _, bad := range [][3]float64{{0, 1, 0}, {1, 0, 1}, {0, 1, math.NaN()}, {0, math.Inf(1), 1}, {0, 1, 1e-9}} {
		if got := AppendTicks(nil, bad[0], bad[1], bad[2]); len(got) != 0 {
			t.Errorf("%v gives %d ticks", bad, len(got))
		}
	}
	if n := testing.AllocsPerRun(50, func() { keptTicks.For(0, 100, 400, 40) }); n != 0 {
		t.Errorf("unchanged ticks allocate %v times", n)
	}
}

var keptTicks Ticks

func TestFormatNumber(t *testing.T) {
	for _, c := range []struct {
		v        float64
		decimals int
		want     string
	}{
		{0, 0, "0"}, {999, 0, "999"}, {1000, 0, "1\u202f000"}, {14000, 0, "14\u202f000"}, {1234567.891, 2, "1\u202f234\u202f567.89"},
		{-2000, 0, "−2\u202f000"}, {-0.04, 1, "0.0"}, {-0.0, 0, "0"}, {0.25, 1, "0.2"}, {math.NaN(), 0, "–"}, {math.Inf(-1), 2, "–"}, {5, -3, "5"},
	} {
		if got := FormatNumber(c.v, c.decimals); got != c.want {
			t.Errorf("%v with %d: %q, want %q", c.v, c.decimals, got, c.want)
		}
	}
	if got := FormatNumber(math.MaxFloat64, 20); len(got) < 309 {
		t.Errorf("the largest number has %d characters", len(got))
	}
}

// Whatever range and length: kept labels do not touch.
func TestThin(t *testing.T) {
	rnd := rand.New(rand.NewPCG(3, 4))
	for range 2000 {
		lo := rnd.Float64()*40000 - 20000
		hi := lo + math.Pow(10, rnd.Float64()*5)
		s := Scale{V0: lo, V1: hi, P0: 0, P1: 50 + rnd.Float64()*900}
		vertical := rnd.IntN(2) == 0
		if vertical {
			s.P0, s.P1 = s.P1, s.P0
		}
		ticks := AppendTicks(nil, lo, hi, NiceStep(hi-lo, 1+rnd.Float64()*60))
		k := Thin(ticks, s, scene.Small, 6, vertical)
		last, any := 0.0, false
		for i := range ticks {
			if !Kept(ticks, i, k) {
				continue
			}
			half := scene.LineHeight(scene.Small) / 2
			if !vertical {
				half = scene.Measure(scene.Small, ticks[i].Text) / 2
			}
			p := s.Pos(ticks[i].Value)
			if vertical {
				p = -p
			}
			if any && p-half < last+6-1e-9 {
				t.Fatalf("labels touch: %v..%v on %v px, every %d", lo, hi, s.P1-s.P0, k)
			}
			last, any = p+half, true
		}
	}
}
