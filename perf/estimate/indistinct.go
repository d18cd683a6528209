package estimate

import (
	"math"
	"strings"

	"levelspan/perf/num"
)

// When unknowns count as not told apart. known: the information of the runs on the unknown alone is that many times the prior's. blind: a direction
// in which they add less than that to the prior's. share: the least part of such a direction that belongs to an unknown. narrowed: a
// posterior standard deviation of more than that of the prior's counts as nothing said.
const (
	known    = 9.0
	blind    = 0.35
	share    = 0.3
	narrowed = 0.9
)

// indistinct says what the runs cannot tell apart: the directions of the unknowns, in standard deviations before flight, along which the runs add little to
// the prior although they say much of the unknowns that lie in them one by one; and the unknowns that no run speaks of.
func (p *Posterior) indistinct(e *Estimator) []string {
	n := len(e.l.list)
	any := false
	info := make([]float64, n*n)
	for i := range e.runs {
		if !e.counts(i) {
			continue
		}
		any = true
		h := e.counted[i]
		for k := e.first[i]; k < e.first[i]+e.runs[i].rows; k++ {
			row := e.jac[k*n : k*n+n]
			for a := range n {
				for b := range n {
					info[a*n+b] += h * row[a] * row[b]
				}
			}
		}
	}
	if !any {
		return nil
	}
	alone := make([]float64, n)
	for a := range n {
		alone[a] = info[a*n+a]
	}
	var said []string
	values, vectors := make([]float64, n), make([]float64, n*n)
	if num.Eigen(n, info, values, vectors) {
		for i := range n {
			if values[i] >= blind {
				break
			}
			var words []string
			for a := range n {
				if alone[a] > known && math.Abs(vectors[i*n+a]) > share {
					words = append(words, e.what(a))
				}
			}
			if len(words) > 1 {
				said = append(said, "the runs cannot tell apart "+list(words)+": only together are they known")
			}
		}
	}
	var silent []string
	for a := range n {
		if e.l.list[a].spread > 0 && alone[a] <= known && p.cov[a*n+a] > narrowed*narrowed {
			silent = append(silent, e.what(a))
		}
	}
	if len(silent) > 0 {
		said = append(said, "the runs say next to nothing of "+list(silent)+": what was believed before flight stands")
	}
	return said
}

// what names unknown a for a person, the contract's name with it.
func (e *Estimator) what(a int) string {
	name, words := e.l.name(a)
	return words + " (" + name + ")"
}

// list joins words as a sentence does.
func list(words []string) string {
	if len(words) == 1 {
		return words[0]
	}
	return strings.Join(words[:len(words)-1], ", ") + " and " + words[len(words)-1]
}
