package perf

import (
	"math"
	"testing"
)

// flightOf prepares a solver for a random case; false where it is refused.
func flightOf(z *Solver, seed uint64) bool {
	a, c := randomCase(seed)
	return z.Prepare(&a, &c) == nil
}

// TestTablePassesThroughItsRows, holds its low end and goes on along the slope of its high end.
func TestTablePassesThroughItsRows(t *testing.T) {
	a, _ := benchCase(Tabulated)
	rows := a.Propeller.Table[2:]
	var g propellerTable
	g.set(rows)
	for _, r := range rows {
		ct, _, cp, _ := g.at(r.AdvanceRatio)
		if math.Abs(ct-r.ThrustCoefficient) > 1e-15 || math.Abs(cp-r.PowerCoefficient) > 1e-15 {
			t.Errorf("at J = %g: CT %g, CP %g", r.AdvanceRatio, ct, cp)
		}
	}
	first, last := rows[0], rows[len(rows)-1]
	if ct, d, cp, e := g.at(first.AdvanceRatio / 2); ct != first.ThrustCoefficient || cp != first.PowerCoefficient || d != 0 || e != 0 {
		t.Errorf("below the table: %g, %g, %g, %g", ct, d, cp, e)
	}
	_, end, _, _ := g.at(last.AdvanceRatio * (1 - 1e-12))
	ct, d, cp, _ := g.at(last.AdvanceRatio + 0.5)
	if math.Abs(d-end) > 1e-6 || math.Abs(ct-(last.ThrustCoefficient+0.5*d)) > 1e-12 || cp != last.PowerCoefficient || !(d < 0) {
		t.Errorf("above the table: CT %g, slope %g, CP %g", ct, d, cp)
	}
}

// TestRisingEndIsHeldLevel: a table that ends while its thrust coefficient rises must not promise more beyond.
func TestRisingEndIsHeldLevel(t *testing.T) {
	var g propellerTable
	g.set([]PropellerRow{{0.2, 0.05, 0.05}, {0.3, 0.06, 0.05}, {0.4, 0.08, 0.05}})
	if ct, d, _, _ := g.at(2); ct != 0.08 || d != 0 {
		t.Errorf("CT %g, slope %g", ct, d)
	}
}

// TestAdvanceOfInverts CT/J^2 over the held end, the rows and the far end.
func TestAdvanceOfInverts(t *testing.T) {
	var z Solver
	tables := 0
	for seed := uint64(0); seed < 800; seed++ {
		if !flightOf(&z, seed) || z.k.kind != Tabulated {
			continue
		}
		tables++
		g := &z.table
		for j := 0.02; j < 3*g.j[len(g.j)-1]; j *= 1.05 {
			ct, _, _, _ := g.at(j)
			if ct <= 1e-6 {
				break
			}
			if back := g.advanceOf(ct / (j * j)); relative(back, j) > 1e-9 {
				t.Errorf("seed %d: J = %.12g comes back %.12g", seed, j, back)
			}
		}
	}
	if tables < 100 {
		t.Errorf("only %d tables", tables)
	}
}

// TestTheSameTableIsKnownAgain, and another one is not taken for it.
func TestTheSameTableIsKnownAgain(t *testing.T) {
	a, _ := benchCase(Tabulated)
	var g, fresh propellerTable
	g.set(a.Propeller.Table)
	other := append([]PropellerRow(nil), a.Propeller.Table...)
	other[7].ThrustCoefficient *= 0.97
	g.set(other)
	fresh.set(other)
	for j := 0.0; j < 1.5; j += 0.01 {
		a0, a1, a2, a3 := g.at(j)
		b0, b1, b2, b3 := fresh.at(j)
		if a0 != b0 || a1 != b1 || a2 != b2 || a3 != b3 {
			t.Fatalf("at J = %g the old table is still there", j)
		}
	}
	if len(g.node) != len(fresh.node) {
		t.Errorf("%d nodes, fresh %d", len(g.node), len(fresh.node))
	}
}

// TestCrookedTables: rows that are each allowed, with a cubic between them that gives one speed two advance ratios.
func TestCrookedTables(t *testing.T) {
	for _, rows := range [][]PropellerRow{
		{{0, 0.1, 0.02}, {0.5, 0.09, 0.0201}, {0.9, 0.08, 0.0649}, {1.1, 0.05, 0.065}},      // power rises too fast in between
		{{0.5, 0.03, 0.05}, {0.9, 0.031, 0.05}, {1.0, 0.098, 0.05}, {1.5, 0.0981, 0.05}},    // so does thrust
		{{0.1, 0.03, 0.05}, {0.2, 0.031, 0.05}, {0.4, 0.118, 0.05}, {1.5, 0.05, 0.05}},      // the same nearer the start
		{{0.3, 0.1, 0.03}, {0.6, 0.09, 0.0301}, {0.8, 0.07, 0.0534}, {1.2, 0.02, 0.0535}},   // power again
		{{0.3, 0.1, 0.03}, {0.6, 0.09, 0.0301}, {0.75, 0.07, 0.0468}, {1.2, 0.02, 0.04685}}, // and again
	} {
		p := Propeller{Kind: Tabulated, Diameter: 2, Table: rows}
		var g propellerTable
		g.set(rows)
		crooked := false
		for j := rows[0].AdvanceRatio + 1e-4; j < rows[len(rows)-1].AdvanceRatio; j += 1e-4 {
			ct, d, cp, e := g.at(j)
			if 2*cp-j*e <= 0 || ct > 0 && 2*ct-j*d <= 0 {
				crooked = true
			}
		}
		var f faults
		p.validate(&f, &g)
		if crooked != (len(f) > 0) {
			t.Errorf("%v: crooked %v, but %v", rows, crooked, f.err())
		}
	}
	// Over random tables the closed test and the dense look agree.
	for seed := uint64(0); seed < 1500; seed++ {
		a, _ := randomCase(seed)
		if a.Propeller.Kind != Tabulated {
			continue
		}
		var g propellerTable
		g.set(a.Propeller.Table)
		worst := math.Inf(1)
		last := g.j[len(g.j)-1]
		for i := 1; i < 3000; i++ {
			j := g.j[0] + (last-g.j[0])*float64(i)/3000
			ct, d, cp, e := g.at(j)
			worst = min(worst, (2*cp-j*e)/cp)
			if ct > 0 {
				worst = min(worst, (2*ct-j*d)/ct)
			}
		}
		if math.Abs(worst) > 1e-3 && (worst < 0) != (g.crooked() >= 0) {
			t.Errorf("seed %d: least %g, crooked in %d", seed, worst, g.crooked())
		}
	}
}

// TestParameterInverts: the speed at the parameter of a speed is that speed, and dT/dV is the slope of the thrust.
func TestParameterInverts(t *testing.T) {
	var z Solver
	for seed := uint64(0); seed < 1000; seed++ {
		if !flightOf(&z, seed) {
			continue
		}
		f := &z.now
		for v := 0.5; v < 150; v *= 1.7 {
			got, thrust, slope := f.at(f.param(v))
			if relative(got, v) > 1e-11 || relative(thrust, f.thrust(v)) > 1e-9 && math.Abs(thrust-f.thrust(v)) > 1e-9 {
				t.Errorf("seed %d: %g m/s comes back %.15g, thrust %g, %g", seed, v, got, thrust, f.thrust(v))
			}
			if f.kind == Tabulated {
				continue // has corners; its slopes are held by the twin's maxima
			}
			const h = 1e-5
			if d := (f.thrust(v*(1+h)) - f.thrust(v*(1-h))) / (2 * h * v); math.Abs(d-slope) > 1e-5*(math.Abs(slope)+math.Abs(thrust)/v) {
				t.Errorf("seed %d at %g m/s: slope %g, by difference %g", seed, v, slope, d)
			}
		}
	}
}

// TestNodesAreTheTable: what is kept at the nodes is what the table gives there.
func TestNodesAreTheTable(t *testing.T) {
	var z Solver
	for seed := uint64(0); seed < 300; seed++ {
		if !flightOf(&z, seed) || z.now.kind != Tabulated {
			continue
		}
		for i := range z.table.node {
			g := &z.table.node[i]
			v1, t1, s1 := z.now.atNode(g)
			v2, t2, s2 := z.now.at(g.j)
			// At a corner between torque and power either slope is right.
			if math.Abs(v1-v2) > 1e-12*v2 || math.Abs(t1-t2) > 1e-12*math.Abs(t2)+1e-12 || math.Abs(s1-s2) > 1e-9*math.Abs(s2)+1e-9 {
				t.Errorf("seed %d, node %d: %g %g %g, the table says %g %g %g", seed, i, v1, t1, s1, v2, t2, s2)
			}
		}
	}
}

// TestActuatorDisc: momentum, power and the ideal efficiency hold together at every speed, and at rest the thrust is the static one.
func TestActuatorDisc(t *testing.T) {
	a, c := benchCase(ConstantSpeed)
	c.Air = StandardAir()
	var z Solver
	if err := z.Prepare(&a, &c); err != nil {
		t.Fatal(err)
	}
	area := math.Pi / 4 * 1.9 * 1.9
	for v := 0.1; v < 120; v += 3.3 {
		thrust := z.Thrust(TAS(v))
		w := 0.5 * (-v + math.Sqrt(v*v+2*thrust/(SeaLevelDensity*area)))
		if got := thrust * (v + w) / 0.87; relative(got, 74600) > 1e-9 {
			t.Errorf("at %g m/s the thrust takes %.12g W", v, got)
		}
	}
	static := math.Cbrt(2 * SeaLevelDensity * area * 0.87 * 74600 * 0.87 * 74600)
	if got := z.now.thrust(1e-6); relative(got, static) > 1e-6 {
		t.Errorf("static thrust %g, want %g", got, static)
	}
}
