package report

import (
	"encoding/json"
	"math"
	"sort"
	"strings"
	"testing"

	"levelspan/perf/casefile"
)

func fitted(t testing.TB, c *casefile.Case) *Fit {
	t.Helper()
	f, err := NewFit(c)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

func memberNames(v any) string {
	var keys []string
	for k := range v.(map[string]any) {
		keys = append(keys, k)
	}
	sort.Strings(keys)
	return strings.Join(keys, " ")
}

// The document has the contract's members, its correlation is a correlation, and its figures are the posterior's.
func TestFitJSON(t *testing.T) {
	c := load(t, "marram")
	f := fitted(t, c)
	text := f.JSON()
	var v map[string]any
	if err := json.Unmarshal(text, &v); err != nil {
		t.Fatal(err)
	}
	for what, pair := range map[string][2]string{
		"document":  {memberNames(v), "chi_square converged correlation degrees_of_freedom format indistinct iterations parameters runs stop version"},
		"parameter": {memberNames(v["parameters"].([]any)[0]), "estimate name prior prior_sd sd"},
		"run":       {memberNames(v["runs"].([]any)[0]), "flagged index note pull residual sd standardised weight"},
	} {
		if pair[0] != pair[1] {
			t.Errorf("%s: %s, want %s", what, pair[0], pair[1])
		}
	}
	if strings.Contains(string(text), "null") {
		t.Error("the document has a null")
	}
	n := len(f.Posterior.Parameters)
	rows := v["correlation"].([]any)
	if len(rows) != n {
		t.Fatalf("%d rows of the correlation, %d parameters", len(rows), n)
	}
	for i := range n {
		row := rows[i].([]any)
		for j := range n {
			r, back := row[j].(float64), rows[j].([]any)[i].(float64)
			if i == j && r != 1 || math.Abs(r) > 1+1e-12 || math.Abs(r-back) > 1e-9 {
				t.Errorf("correlation %d %d is %g, the other way %g", i, j, r, back)
			}
		}
	}
	for i, p := range v["parameters"].([]any) {
		q := &f.Posterior.Parameters[i]
		m := p.(map[string]any)
		if m["name"] != q.Name || m["estimate"] != q.Estimate || m["sd"] != q.SD || !(q.SD > 0) || q.SD > 1.0001*q.PriorSD*math.Max(1, math.Abs(q.Estimate/q.Prior)) {
			if q.Prior != 0 || !(q.SD <= 1.0001*q.PriorSD) {
				t.Errorf("%v is %+v: runs can only make a number surer", m, *q)
			}
		}
	}
}

// Without runs the estimate is what was believed; a run left out changes nothing and keeps its reason; a spoilt one is flagged.
func TestFitFollowsTheRuns(t *testing.T) {
	c := load(t, "marram")
	all := fitted(t, c)
	none := c.Clone()
	none.Runs = nil
	f := fitted(t, none)
	for i := range f.Posterior.Parameters {
		if q := f.Posterior.Parameters[i]; math.Abs(q.Estimate-q.Prior) > 1e-9*math.Abs(q.Prior) || math.Abs(q.SD-q.PriorSD) > 1e-6*q.PriorSD {
			t.Errorf("without runs: %+v", q)
		}
	}
	shorter, out := c.Clone(), c.Clone()
	shorter.Runs = append([]casefile.Run(nil), shorter.Runs[1:]...)
	out.Runs[0].LeftOut = "rough air"
	a, b := fitted(t, shorter), fitted(t, out)
	for i := range a.Posterior.Parameters {
		if p, q := a.Posterior.Parameters[i], b.Posterior.Parameters[i]; math.Abs(p.Estimate-q.Estimate) > 1e-9*(1+math.Abs(q.Estimate)) {
			t.Errorf("left out and not there differ: %+v, %+v", p, q)
		}
	}
	if !strings.Contains(string(b.JSON()), `"note": "left out: rough air"`) || !strings.Contains(b.Text(), "left out: rough air") {
		t.Error("the reason is not said")
	}
	spoilt := c.Clone()
	for i := range spoilt.Runs {
		if r := &spoilt.Runs[i]; r.Kind == casefile.ClimbRun {
			rate := *r.RateMps + 4 // misread by 800 ft/min
			r.RateMps = &rate
			s := fitted(t, spoilt)
			if !s.Posterior.Runs[i].Flagged || !(s.Posterior.Runs[i].Weight < all.Posterior.Runs[i].Weight) || !strings.Contains(s.Text(), "check its readings") {
				t.Errorf("the spoilt run is not flagged: %+v", s.Posterior.Runs[i])
			}
			break
		}
	}
}

// Every case that can be read has an estimate that can be printed, in any units.
func TestFitOfEveryCase(t *testing.T) {
	for _, name := range cases {
		c := load(t, name)
		for _, altitude := range []string{"ft", "m"} {
			c.Display.Altitude = altitude
			f := fitted(t, c)
			if text := f.Text(); strings.Contains(text, "NaN") || strings.Contains(text, "Inf") || !f.Posterior.Converged {
				t.Errorf("%s:\n%s", name, text)
			}
			f.JSON()
		}
	}
}
