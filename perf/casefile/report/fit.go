package report

import (
	"encoding/json"
	"math"
	"strconv"
	"strings"

	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
	"levelspan/perf/estimate"
)

// Fit is the estimate of a case, to be printed.
type Fit struct {
	Case      *casefile.Case
	Units     figure.Units
	Posterior estimate.Posterior
}

// NewFit makes the estimate. The error is that of the case.
func NewFit(c *casefile.Case) (*Fit, error) {
	e, err := c.Estimate()
	if err != nil {
		return nil, err
	}
	f := &Fit{Case: c, Units: figure.Of(c)}
	var fitter estimate.Estimator
	if err := fitter.Fit(&e, &f.Posterior); err != nil {
		return nil, err
	}
	return f, nil
}

// The members of fit --json in the order of contract.md. A run that says nothing has no residual, and its note says why.
type (
	fitDocument struct {
		Format      string         `json:"format"`
		Version     int            `json:"version"`
		Parameters  []fitParameter `json:"parameters"`
		Correlation [][]float64    `json:"correlation"`
		Runs        []fitRun       `json:"runs"`
		ChiSquare   float64        `json:"chi_square"`
		Freedom     int            `json:"degrees_of_freedom"`
		Iterations  int            `json:"iterations"`
		Converged   bool           `json:"converged"`
		Stop        string         `json:"stop"`
		Indistinct  []string       `json:"indistinct"`
	}
	fitParameter struct {
		Name       string  `json:"name"`
		Prior      float64 `json:"prior"`
		PriorSD    float64 `json:"prior_sd"`
		Estimate   float64 `json:"estimate"`
		EstimateSD float64 `json:"sd"`
	}
	fitRun struct {
		Index        int      `json:"index"`
		Residual     *float64 `json:"residual,omitempty"`
		SD           *float64 `json:"sd,omitempty"`
		Standardised *float64 `json:"standardised,omitempty"`
		Weight       float64  `json:"weight"`
		Pull         *float64 `json:"pull,omitempty"`
		Flagged      bool     `json:"flagged"`
		Note         string   `json:"note"`
	}
)

// JSON is the document "levelspan-fit" of contract.md, indented, with a newline at its end.
func (f *Fit) JSON() []byte {
	p := &f.Posterior
	d := fitDocument{Format: "levelspan-fit", Version: 1, Parameters: []fitParameter{}, Correlation: [][]float64{}, Runs: []fitRun{},
		ChiSquare: p.ChiSquare, Freedom: p.DegreesOfFreedom, Iterations: p.Iterations, Converged: p.Converged, Stop: p.Stop.String(),
		Indistinct: append([]string{}, p.Indistinct...)}
	n := len(p.Parameters)
	for i := range p.Parameters {
		q := &p.Parameters[i]
		d.Parameters = append(d.Parameters, fitParameter{q.Name, q.Prior, q.PriorSD, q.Estimate, q.SD})
		d.Correlation = append(d.Correlation, p.Correlation[i*n:(i+1)*n])
	}
	for i := range p.Runs {
		r := &p.Runs[i]
		row := fitRun{Index: i, Weight: r.Weight, Flagged: r.Flagged, Note: f.note(i)}
		if r.Outcome.Counts() {
			row.Residual, row.SD, row.Standardised, row.Pull = &r.Residual, &r.SD, &r.Standardised, &r.Pull
		}
		d.Runs = append(d.Runs, row)
	}
	text, err := json.MarshalIndent(d, "", "  ")
	if err != nil { // every number is finite: a fault of the program
		panic("report: " + err.Error())
	}
	return append(text, '\n')
}

// note is what there is to say of a run.
func (f *Fit) note(i int) string {
	r := &f.Posterior.Runs[i]
	switch {
	case r.Outcome == estimate.WasLeftOut:
		return "left out: " + f.Case.Runs[i].LeftOut
	case !r.Outcome.Counts():
		return r.Outcome.Text()
	case r.Flagged:
		return "does not agree with the others: check its readings"
	}
	return ""
}

// Text is the estimate as tables for a person; lines end with a newline.
func (f *Fit) Text() string {
	var b strings.Builder
	p := &f.Posterior
	b.WriteString(f.Case.Aeroplane.Name + ": " + strconv.Itoa(p.DegreesOfFreedom) + " readings of " + strconv.Itoa(len(p.Runs)) + " runs count\n\n")
	rows := [][]string{{"Number", "Believed before", "", "Estimate", "95 % interval", ""}}
	for i := range p.Parameters {
		q := &p.Parameters[i]
		low, high := interval(q)
		rows = append(rows, []string{q.Words, short(q.Prior), plusMinus(q.PriorSD), short(q.Estimate), short(low) + " to " + short(high), q.Name})
	}
	b.WriteString(table(rows, []bool{false, true, false, true, true, false}))
	if len(p.Runs) > 0 {
		b.WriteByte('\n')
		rows = [][]string{{"Run", "Kind", "IAS " + f.Units.Speed.Name, "Residual", "In its spreads", "Weight", ""}}
		for i := range p.Runs {
			r, c := &p.Runs[i], &f.Case.Runs[i]
			row := []string{strconv.Itoa(i + 1), c.Kind, figure.Number(c.IASMps/f.Units.Speed.SI, 0), "", "", "", f.note(i)}
			if r.Outcome.Counts() {
				row[3], row[4], row[5] = f.residual(c.Kind, r), signed(r.Standardised, 1), figure.Number(r.Weight, 2)
			}
			rows = append(rows, row)
		}
		b.WriteString(table(rows, []bool{true, false, true, true, true, true, false}))
	}
	b.WriteString("\nChi-square " + figure.Number(p.ChiSquare, 1) + " where about " + strconv.Itoa(p.DegreesOfFreedom) + " is as it should be. ")
	if p.Converged {
		b.WriteString("The fit " + p.Stop.String() + " after " + strconv.Itoa(p.Iterations) + " steps.\n")
	} else {
		b.WriteString("The fit did not converge: " + p.Stop.String() + ". No figure of it may be used.\n")
	}
	for _, s := range p.Indistinct {
		b.WriteString(s + "\n")
	}
	return b.String()
}

// interval is where 95 % of the parameter's probability lies: about a normal value, or a log-normal one where it has a sign of its own.
func interval(q *estimate.Parameter) (low, high float64) {
	const z = 1.959963984540054
	switch q.Kind {
	case estimate.PositionOffset, estimate.PositionSlope:
		return q.Estimate - z*q.SD, q.Estimate + z*q.SD
	}
	if q.Estimate == 0 {
		return 0, 0
	}
	s := z * math.Sqrt(math.Log1p(q.SD*q.SD/(q.Estimate*q.Estimate)))
	low, high = q.Estimate*math.Exp(-s), q.Estimate*math.Exp(s)
	if low > high {
		low, high = high, low
	}
	return low, high
}

// residual is a run's residual in the unit of its kind.
func (f *Fit) residual(kind string, r *estimate.RunResult) string {
	switch kind {
	case casefile.StallRun:
		return signed(r.Residual, 3) + " CL"
	case casefile.GPSRun:
		return signed(r.Residual/f.Units.Speed.SI, 1) + " " + f.Units.Speed.Name
	}
	decimals := 0
	if f.Units.RateUnit.Name == "m/s" {
		decimals = 2
	}
	return signed(r.Residual/f.Units.RateUnit.SI, decimals) + " " + f.Units.RateUnit.Name
}

func signed(x float64, decimals int) string {
	s := figure.Number(x, decimals)
	if !strings.HasPrefix(s, figure.Minus) {
		s = "+" + s
	}
	return s
}

// short is a number of four significant digits.
func short(x float64) string { return strconv.FormatFloat(x, 'g', 4, 64) }

func plusMinus(sd float64) string { return "±" + strconv.FormatFloat(sd, 'g', 2, 64) }
