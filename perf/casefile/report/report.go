// Package report says what the model answers for a case: as the JSON of `levelspan limits --json`, and as the table that
// a person would paste into a note. The page takes names, order and symbols from here too, so that all of them agree.
package report

import (
	"math"
	"sort"
	"strconv"

	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
	"levelspan/perf/estimate"
)

// Report is one case and its answer. Make it with New.
type Report struct {
	Case      *casefile.Case
	Aeroplane perf.Aeroplane // the estimated one
	Condition perf.Condition
	Answer    perf.Answer
	Intervals *estimate.Intervals // nil: not worked out
	Basis     string              // what the aeroplane's numbers come from
	Units     figure.Units
}

// New solves a case for the aeroplane that its runs and beliefs make likely, with the intervals of every figure. The error is
// casefile.Faults; having no level flight is an answer.
func New(c *casefile.Case) (*Report, error) {
	r := &Report{Case: c, Units: figure.Of(c)}
	var err error
	if r.Aeroplane, r.Condition, err = c.Model(); err != nil {
		return nil, err
	}
	f, err := NewFit(c)
	if err != nil {
		return nil, err
	}
	p := &f.Posterior
	r.Basis = Basis(p)
	if p.Converged {
		p.Aeroplane(&r.Aeroplane)
		r.Intervals = &estimate.Intervals{}
		var d estimate.Draws
		var b estimate.Bands
		d.Set(p, estimate.DefaultDraws)
		if err := b.Solve(&d, &r.Condition, r.Intervals); err != nil {
			return nil, err
		}
	}
	var s perf.Solver
	if err := s.Solve(&r.Aeroplane, &r.Condition, &r.Answer); err != nil {
		return nil, err
	}
	return r, nil
}

// Basis says in a sentence what an estimate's numbers come from.
func Basis(p *estimate.Posterior) string {
	if !p.Converged {
		return "The runs give no estimate (" + p.Stop.String() + "): the figures are those of the numbers as typed, without intervals."
	}
	n := 0
	for i := range p.Runs {
		if p.Runs[i].Outcome == estimate.Fitted {
			n++
		}
	}
	switch n {
	case 0:
		return "By the numbers as typed, with no runs."
	case 1:
		return "By the estimate from 1 run."
	}
	return "By the estimate from " + strconv.Itoa(n) + " runs."
}

var names = [perf.KeyCount]string{
	perf.Stall:         "Stall",
	perf.SlowestLevel:  "Slowest level",
	perf.LeastPower:    "Least power",
	perf.SteepestClimb: "Steepest climb",
	perf.FastestClimb:  "Fastest climb",
	perf.BestGlide:     "Best glide",
	perf.BestRange:     "Best range",
	perf.Carson:        "Carson",
	perf.Manoeuvring:   "Manoeuvring",
	perf.FastestLevel:  "Fastest level",
	perf.NeverExceed:   "Never exceed",
}

// Name is a limit in words. The stall's is followed by the configuration.
func (r *Report) Name(k perf.Key) string {
	if k == perf.Stall {
		return names[k] + ", " + r.Case.Today.Configuration
	}
	return names[k]
}

// Symbol is the trade's symbol, "" where there is none. The stall is VS0 in the configuration of the greatest lift, where
// there are several, and VS1 in every other.
func (r *Report) Symbol(k perf.Key) string {
	if k != perf.Stall {
		return k.Symbol()
	}
	all := r.Aeroplane.Configurations
	now := r.Condition.Configuration
	if len(all) < 2 {
		return "VS1"
	}
	for i := range all {
		if i != now && all[i].MaximumLift >= all[now].MaximumLift {
			return "VS1"
		}
	}
	return "VS0"
}

// SetBy is what sets a limit, in a word; the lift's is "stall" where the limit is another one than the stall.
func (r *Report) SetBy(k perf.Key) string {
	s := r.Answer.Limits[k].SetBy
	if s == perf.SetByLift && k != perf.Stall {
		return "stall"
	}
	return s.String()
}

// Order is the limits that apply, in order of speed; equal speeds in the order of perf's keys.
func Order(a *perf.Answer) []perf.Key {
	keys := make([]perf.Key, 0, perf.KeyCount)
	for k := perf.Key(0); k < perf.KeyCount; k++ {
		if a.Limits[k].Applies {
			keys = append(keys, k)
		}
	}
	sort.SliceStable(keys, func(i, j int) bool { return a.Limits[keys[i]].TAS < a.Limits[keys[j]].TAS })
	return keys
}

// speeds are one true airspeed in all three kinds, today and in today's configuration.
func (r *Report) speeds(v perf.TAS) perf.Limit {
	l := perf.Limit{Applies: true, TAS: v, CAS: r.Condition.Air.CASFromTAS(v)}
	l.IAS = r.Aeroplane.Configurations[r.Condition.Configuration].IASFromCAS(l.CAS)
	return l
}

// StallAtBank is the stall at a bank (rad) in place of today's; ok is false where today's bank is no smaller.
func (r *Report) StallAtBank(bank float64) (l perf.Limit, ok bool) {
	s := &r.Answer.Limits[perf.Stall]
	if !s.Applies || bank <= r.Condition.Bank {
		return perf.Limit{}, false
	}
	v := float64(s.TAS) * math.Sqrt(math.Cos(r.Condition.Bank)/math.Cos(bank))
	return r.speeds(perf.TAS(v)), true
}

// LevelFlight reports whether level flight is possible.
func (r *Report) LevelFlight() bool { return r.Answer.Outcome == perf.LevelFlight }
