package perf

import "testing"

// TestSolveAllocatesNothing: not the first time, for the propeller's table is made ready then, but ever after.
func TestSolveAllocatesNothing(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		list := benchConditions(c)
		var z Solver
		var got Answer
		i := 0
		if n := testing.AllocsPerRun(200, func() {
			if err := z.Solve(&a, &list[i%len(list)], &got); err != nil {
				t.Fatal(err)
			}
			i++
		}); n != 0 {
			t.Errorf("%s: %g allocations a solve", k.name, n)
		}
		sum := 0.0
		if n := testing.AllocsPerRun(50, func() {
			for v := TAS(10); v < 90; v += 3 {
				sum += z.PowerRequired(v) + z.PowerAvailable(v) + z.ClimbRate(v) + z.ShaftPowerRequired(v) + z.FullSpeed(v) + z.LevelSpeed(v) + z.FuelFlow(v)
			}
		}); n != 0 {
			t.Errorf("%s: %g allocations a curve", k.name, n)
		}
		if !(sum > 0) {
			t.Errorf("%s: the curves sum to %g", k.name, sum)
		}
	}
}

// TestRandomSolvesAllocateNothing covers the paths that the typical aeroplane does not take: no level flight, odd tables, consumption
// tables, heights below today's.
func TestRandomSolvesAllocateNothing(t *testing.T) {
	type question struct {
		a Aeroplane
		c Condition
	}
	var list []question
	var z Solver
	var got Answer
	for seed := uint64(0); seed < 300; seed++ {
		a, c := randomCase(seed)
		if z.Solve(&a, &c, &got) == nil {
			list = append(list, question{a, c})
		}
	}
	if n := testing.AllocsPerRun(3, func() {
		for i := range list {
			if err := z.Solve(&list[i].a, &list[i].c, &got); err != nil {
				t.Fatal(err)
			}
		}
	}); n != 0 {
		t.Errorf("%g allocations in %d solves", n, len(list))
	}
}

// TestSolveIsDeterministic: the answer does not depend on what the solver did before.
func TestSolveIsDeterministic(t *testing.T) {
	var used Solver
	var first, second Answer
	for seed := uint64(0); seed < 500; seed++ {
		a, c := randomCase(seed)
		var fresh Solver
		e1, e2 := fresh.Solve(&a, &c, &first), used.Solve(&a, &c, &second)
		if (e1 == nil) != (e2 == nil) || first != second {
			t.Fatalf("seed %d: a used solver answers otherwise than a fresh one", seed)
		}
		if again := used.Solve(&a, &c, &second); (again == nil) != (e1 == nil) || first != second {
			t.Fatalf("seed %d: the second answer differs", seed)
		}
	}
}
