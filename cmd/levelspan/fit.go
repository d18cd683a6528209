package main

import "levelspan/perf/casefile/report"

// fit prints the estimate from the case's runs. A fit that does not converge is no answer.
func (c *console) fit(args []string) int {
	a, problem := parse(args, true)
	path := ""
	if problem == "" {
		path, problem = a.one("CASE.json")
	}
	if problem == "" && a.set {
		problem = "no such flag: \"--gradient\""
	}
	if problem != "" {
		return c.misused("fit: " + problem)
	}
	k, where, err := c.load(path)
	if err != nil {
		return c.fail(where, err)
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
