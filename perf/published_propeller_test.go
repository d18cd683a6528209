package perf_test

import (
	"encoding/json"
	"math"
	"testing"

	. "levelspan/perf"
)

type propellerRun struct {
	id       string
	diameter float64
	rows     [][4]float64 // J, CT, CP, eta
}

// propellerRuns are the rising-J rows of the four propellers of the UIUC Propeller Data Site kept in checks.json.
func propellerRuns(t *testing.T) []propellerRun {
	t.Helper()
	inches := map[string]float64{"PROP-apce19x12-2": 19, "PROP-apcsp14x13-2": 14, "PROP-nr6409x5.68-2": 9, "PROP-apce10x5-2": 10}
	var runs []propellerRun
	for _, c := range published(t, "PROP-") {
		d, ok := inches[c.ID]
		if !ok {
			continue
		}
		var in struct {
			Rows [][]json.Number `json:"rows_J_CT_CP_eta"`
		}
		into(t, c.Inputs, &in)
		run := propellerRun{id: c.ID, diameter: d * Inch}
		for _, r := range in.Rows {
			var row [4]float64
			for i, x := range r {
				row[i], _ = x.Float64()
			}
			// Two sweeps meet at some J: keep rows that rise by 1 %.
			if n := len(run.rows); n > 0 && row[0] < run.rows[n-1][0]*1.01 {
				continue
			}
			run.rows = append(run.rows, row)
		}
		runs = append(runs, run)
	}
	if len(runs) != 4 {
		t.Fatalf("%d propellers, not 4", len(runs))
	}
	return runs
}

func withPropeller(p Propeller, power float64) Aeroplane {
	return Aeroplane{
		WingArea: 1, WingSpan: 3, EmptyMass: 5, MaximumMass: 20,
		Polar:          Polar{ParasiteDrag: 0.03, OswaldEfficiency: 0.8},
		Configurations: []Configuration{{Name: "clean", MaximumLift: 1.5}},
		Engine:         Engine{Kind: Electric, RatedPower: power, RatedSpeed: 60},
		Propeller:      p,
	}
}

// A table made of every other measured row must give the thrust at the rows left out, at the speed and torque where
// they were measured, within 0.004 in CT (the data's own scatter is 0.001-0.002). The engine's torque at rated speed
// absorbs exactly the row's torque at 60 rev/s, so the solver's torque balance must land on that row.
func TestPublishedPropellerTable(t *testing.T) {
	const n = 60.0
	rho := standardDay(t, 0).Density
	for _, run := range propellerRuns(t) {
		var table []PropellerRow
		for i, r := range run.rows {
			if i%2 == 0 || i == len(run.rows)-1 {
				table = append(table, PropellerRow{AdvanceRatio: r[0], ThrustCoefficient: r[1], PowerCoefficient: r[2]})
			}
		}
		tested := 0
		for i := 1; i < len(run.rows)-1; i += 2 {
			j, ct, cp := run.rows[i][0], run.rows[i][1], run.rows[i][2]
			d := run.diameter
			power := cp * rho * n * n * n * math.Pow(d, 5)
			if power < 100 { // the domain of rated power; a bigger propeller of the same coefficients
				d *= math.Pow(100/power, 0.2) * 1.1
				power = cp * rho * n * n * n * math.Pow(d, 5)
			}
			a := withPropeller(Propeller{Kind: Tabulated, Diameter: d, Table: table}, power)
			var s Solver
			if err := s.Prepare(&a, &Condition{Mass: 10, Air: standardDay(t, 0), PowerFraction: 1}); err != nil {
				t.Fatal(err)
			}
			v := j * n * d
			got := s.PowerAvailable(TAS(v)) / v / (rho * n * n * math.Pow(d, 4))
			near(t, run.id+" CT at a row left out", got, ct, 0.004)
			tested++
		}
		if tested < 8 {
			t.Errorf("%s: only %d rows tested", run.id, tested)
		}
	}
}

// The linear propeller polar, fitted between 0.6 and 1.1 of the advance ratio of best efficiency, gives the measured CT
// there within 0.006 (checks: 0.0005-0.0038), through the solver's closed form for the fixed-pitch propeller.
func TestPublishedLinearPropellerPolar(t *testing.T) {
	const n = 60.0
	rho := standardDay(t, 0).Density
	for _, run := range propellerRuns(t) {
		peak := run.rows[0]
		for _, r := range run.rows {
			if r[3] > peak[3] {
				peak = r
			}
		}
		// Ordinary least squares of CT/J^2 on CP/J^2.
		var k, sx, sy, sxx, sxy float64
		var inside [][4]float64
		for _, r := range run.rows {
			if r[0] < 0.6*peak[0] || r[0] > 1.1*peak[0] {
				continue
			}
			inside = append(inside, r)
			x, y := r[2]/(r[0]*r[0]), r[1]/(r[0]*r[0])
			k, sx, sy, sxx, sxy = k+1, sx+x, sy+y, sxx+x*x, sxy+x*y
		}
		m := (k*sxy - sx*sy) / (k*sxx - sx*sx)
		b := (sy - m*sx) / k
		for _, r := range inside {
			j, ct, cp := r[0], r[1], r[2]
			d := 0.5
			power := cp * rho * n * n * n * math.Pow(d, 5)
			a := withPropeller(Propeller{Kind: FixedPitch, Diameter: d, PolarSlope: m, PolarIntercept: b,
				PowerCoefficientStatic: 0.05, PowerCoefficientSlope: -0.02}, power)
			var s Solver
			if err := s.Prepare(&a, &Condition{Mass: 10, Air: standardDay(t, 0), PowerFraction: 1}); err != nil {
				t.Fatal(err)
			}
			v := j * n * d
			got := s.PowerAvailable(TAS(v)) / v / (rho * n * n * math.Pow(d, 4))
			near(t, run.id+" CT by the linear polar", got, ct, 0.006)
		}
	}
}
