package estimate

import (
	"encoding/binary"
	"math"
	"testing"

	"levelspan/perf"
)

// garbage reads numbers from the fuzzer's bytes: ordinary ones, ends of the domain and what is none.
type garbage struct{ b []byte }

func (g *garbage) word() uint16 {
	if len(g.b) < 2 {
		return 0
	}
	w := binary.LittleEndian.Uint16(g.b)
	g.b = g.b[2:]
	return w
}

func (g *garbage) number(usual float64) float64 {
	w := g.word()
	switch w % 16 {
	case 0:
		return math.NaN()
	case 1:
		return math.Inf(1)
	case 2:
		return math.Inf(-1)
	case 3:
		return 0
	case 4:
		return -usual
	case 5:
		return usual * 1e9
	case 6:
		return usual * 1e-9
	}
	return usual * (0.25 + float64(w)/32768)
}

// FuzzFit: whatever the runs, the fit ends, and no figure that leaves it is other than finite.
func FuzzFit(f *testing.F) {
	f.Add([]byte("level runs and climbs of an afternoon in spring, read from the knee pad"))
	f.Add([]byte{7, 1, 9, 40, 200, 33, 17, 90, 8, 8, 8, 8, 40, 41, 42, 43, 0, 0, 1, 0, 2, 0, 3, 0, 200, 201, 202, 203, 204, 205})
	f.Add([]byte{1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 250, 251, 252, 253, 254, 255, 128, 64, 32, 16, 8, 4, 2, 1})
	f.Fuzz(func(t *testing.T, data []byte) {
		if len(data) > 600 {
			return
		}
		g := garbage{data}
		c := priorCase(kinds[int(g.word())%len(kinds)].kind)
		if g.word()%4 == 0 {
			c.Beliefs.ParasiteDrag, c.Beliefs.PositionError, c.Instruments.IAS = g.number(0.1), g.number(1), g.number(0.5)
		}
		for len(g.b) > 0 && len(c.Runs) < 30 {
			air, err := perf.AirAt(g.number(1000), g.number(280), 0)
			if err != nil {
				air = perf.Air{Density: g.number(1.2), Pressure: g.number(9e4), Temperature: g.number(280), SpeedOfSound: g.number(330), PressureAltitude: g.number(900)}
			}
			r := Run{Kind: Kind(g.word() % 7), Configuration: int(g.word()%4) - 1, IAS: perf.IAS(g.number(40)), Air: air, Mass: g.number(700),
				HasSetting: g.word()%2 == 0, Setting: g.number(0.5), RevolutionRate: g.number(40), Rate: g.number(2), Propeller: PropellerState(g.word() % 6)}
			if g.word()%8 == 0 {
				r.LeftOut = "by hand"
			}
			for range g.word() % 6 {
				r.Legs = append(r.Legs, Leg{g.number(45), g.number(3)})
			}
			c.Runs = append(c.Runs, r)
		}
		var e Estimator
		var p Posterior
		if err := e.Fit(&c, &p); err != nil {
			return
		}
		finite := func(what string, x float64) {
			if math.IsNaN(x) || math.IsInf(x, 0) {
				t.Fatalf("%s is %g", what, x)
			}
		}
		finite("chi-square", p.ChiSquare)
		for i := range p.Parameters {
			q := &p.Parameters[i]
			finite(q.Name, q.Estimate)
			finite(q.Name+" spread", q.SD)
		}
		for _, x := range p.Correlation {
			finite("correlation", x)
		}
		for i := range p.Runs {
			q := &p.Runs[i]
			for _, x := range []float64{q.Residual, q.SD, q.Standardised, q.Weight, q.Pull, q.RPMResidual, q.RPMSD} {
				finite("run result", x)
			}
		}
		var a perf.Aeroplane
		p.Aeroplane(&a)
		if err := a.Validate(); err != nil {
			t.Fatal(err)
		}
		var d Draws
		var b Bands
		var got Intervals
		d.Set(&p, 8)
		condition := today()
		if err := b.Solve(&d, &condition, &got); err != nil {
			t.Fatal(err)
		}
		var line Classical
		line.Reduce(&c, c.Prior, 0)
		for _, x := range []float64{line.Slope, line.Constant, line.SlopeSD, line.ParasiteDrag, line.OswaldEfficiency, line.LeastDragSpeed} {
			finite("classical", x)
		}
	})
}
