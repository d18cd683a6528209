package estimate

import "levelspan/perf"

// Interval is a 95 % coverage interval, in the unit of its quantity. Where it does not apply both ends are 0.
type Interval struct {
	Applies   bool
	Low, High float64
}

// Width is High less Low.
func (i Interval) Width() float64 { return i.High - i.Low }

// Holds reports whether x lies inside.
func (i Interval) Holds(x float64) bool { return i.Applies && x >= i.Low && x <= i.High }

// LimitIntervals are those of one limit, over the draws in which it applies. Those that its key does not use do not apply, as in perf.Limit.
type LimitIntervals struct {
	Share                       float64 // of the draws in which the limit applies
	TAS, CAS, IAS               Interval
	Rate, Gradient, Ratio, Sink Interval
	LeastSinkTAS                Interval
	PowerRequired, ShaftPower   Interval
	Endurance, Distance         Interval
	FuelFlow                    Interval
}

// CeilingIntervals are those of a ceiling.
type CeilingIntervals struct {
	Share                                  float64
	PressureAltitude, DensityAltitude, TAS Interval
}

// TurnIntervals are those of the tightest sustained turn.
type TurnIntervals struct {
	Share                               float64
	LoadFactor, Bank, Radius, Rate, TAS Interval
}

// AllowanceIntervals are those of an inverse answer.
type AllowanceIntervals struct {
	MassShare, AltitudeShare                float64
	Mass, PressureAltitude, DensityAltitude Interval
}

// Intervals are what the draws say of one condition.
type Intervals struct {
	Draws            int
	LevelProbability float64 // share of the draws with level flight
	Shortfall        Interval
	Limits           [perf.KeyCount]LimitIntervals
	Service          CeilingIntervals
	Absolute         CeilingIntervals
	Turn             TurnIntervals
	Level            AllowanceIntervals
	Climb            AllowanceIntervals
}

// figures is how many figures of an answer have an interval. The order is that of flatten, and expand gives them back in it.
const figures = int(perf.KeyCount)*13 + 1 + 2*3 + 5 + 2*3

// figure is one of them in one draw.
type figure struct {
	x  float64
	ok bool
}

// tape is a row of figures that is written or read in order.
type tape struct {
	f  *[figures]figure
	at int
}

func (t *tape) put(ok bool, x float64) {
	t.f[t.at] = figure{x, ok}
	t.at++
}

// used is put for a figure that is 0 where its limit has none.
func (t *tape) used(ok bool, x float64) { t.put(ok && x != 0, x) }

// flatten writes an answer's figures.
func flatten(a *perf.Answer, f *[figures]figure) {
	t := tape{f: f}
	for k := range a.Limits {
		l := &a.Limits[k]
		ok := l.Applies
		climb := ok && (perf.Key(k) == perf.SteepestClimb || perf.Key(k) == perf.FastestClimb)
		t.put(ok, float64(l.TAS))
		t.put(ok, float64(l.CAS))
		t.put(ok, float64(l.IAS))
		t.put(climb, l.Rate)
		t.put(climb, l.Gradient)
		t.used(ok, l.Ratio)
		t.used(ok, l.Sink)
		t.used(ok, float64(l.LeastSinkTAS))
		t.used(ok, l.PowerRequired)
		t.used(ok, l.ShaftPower)
		t.used(ok, l.Endurance)
		t.used(ok, l.Distance)
		t.used(ok, l.FuelFlow)
	}
	t.put(a.Shortfall > 0, a.Shortfall)
	for _, c := range [...]*perf.Ceiling{&a.Service, &a.Absolute} {
		t.put(c.Applies, c.PressureAltitude)
		t.put(c.Applies, c.DensityAltitude)
		t.put(c.Applies, float64(c.TAS))
	}
	t.put(a.Turn.Applies, a.Turn.LoadFactor)
	t.put(a.Turn.Applies, a.Turn.Bank)
	t.put(a.Turn.Applies, a.Turn.Radius)
	t.put(a.Turn.Applies, a.Turn.Rate)
	t.put(a.Turn.Applies, float64(a.Turn.TAS))
	for _, c := range [...]*perf.Allowance{&a.Level, &a.Climb} {
		t.put(c.MassApplies, c.Mass)
		t.put(c.AltitudeApplies, c.PressureAltitude)
		t.put(c.AltitudeApplies, c.DensityAltitude)
	}
}

// reader gives the columns back in the order of flatten.
type reader struct {
	b  *Bands
	at int
}

func (r *reader) next(dst *Interval) float64 {
	column := r.b.column(r.at)
	*dst = interval(column)
	r.at++
	return float64(len(column)) / float64(max(r.b.done, 1))
}

// expand fills dst from the columns.
func (b *Bands) expand(dst *Intervals) {
	r := reader{b: b}
	*dst = Intervals{Draws: b.done, LevelProbability: float64(b.level) / float64(max(b.done, 1))}
	for k := range dst.Limits {
		l := &dst.Limits[k]
		l.Share = r.next(&l.TAS)
		for _, i := range [...]*Interval{&l.CAS, &l.IAS, &l.Rate, &l.Gradient, &l.Ratio, &l.Sink, &l.LeastSinkTAS, &l.PowerRequired, &l.ShaftPower,
			&l.Endurance, &l.Distance, &l.FuelFlow} {
			r.next(i)
		}
	}
	r.next(&dst.Shortfall)
	for _, c := range [...]*CeilingIntervals{&dst.Service, &dst.Absolute} {
		c.Share = r.next(&c.PressureAltitude)
		r.next(&c.DensityAltitude)
		r.next(&c.TAS)
	}
	dst.Turn.Share = r.next(&dst.Turn.LoadFactor)
	r.next(&dst.Turn.Bank)
	r.next(&dst.Turn.Radius)
	r.next(&dst.Turn.Rate)
	r.next(&dst.Turn.TAS)
	for _, c := range [...]*AllowanceIntervals{&dst.Level, &dst.Climb} {
		c.MassShare = r.next(&c.Mass)
		c.AltitudeShare = r.next(&c.PressureAltitude)
		r.next(&c.DensityAltitude)
	}
}
