package main

import "levelspan/perf/casefile/report"

// fit prints the estimate from the case's runs. A fit that does not converge is no answer.
func (c *console) fit(args []string) int {
	a, k, where, code := c.caseOf("fit", args, "--json")
	if code != done {
		return code
	}
	f, err := report.NewFit(k)
	if err != nil {
		return c.fail(where, err)
	}
	text := []byte(f.Text())
	if a.json {
		text = f.JSON()
	}
	if code := c.print(text); code != done {
		return code
	}
	if !f.Posterior.Converged {
		return noAnswer
	}
	return done
}
