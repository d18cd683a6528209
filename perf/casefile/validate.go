package casefile

import "strconv"

// Validate reports every fault of c as Faults, or nil: each field against its range, and the fields against each other.
func (c *Case) Validate() error {
	var faults Faults
	checkObject(caseObject, c, "", false, &faults)
	if len(faults) > 0 {
		faults = nil
		checkObject(caseObject, c, "", true, &faults)
	}
	c.check(&faults, true)
	return faults.orNil()
}

// checkObject holds the leaves of an object, and of those below it, against the table. Without spell the paths of its
// faults are empty; so that a sound case, which is checked at every step of a drag, costs no text.
func checkObject(o *object, p any, path string, spell bool, faults *Faults) {
	kind := o.kindOf(p)
	for i := range o.members {
		m := &o.members[i]
		at := ""
		if spell {
			at = joinPath(path, m.key)
		}
		switch m.shape {
		case shapeLeaf:
			m.field.check(m.at(p), at, kind, faults)
		case shapePart, shapeMaybe:
			if q := m.at(p); q != nil {
				checkObject(m.object, q, at, spell, faults)
			}
		case shapeList:
			n := m.count(p)
			if n < m.least(kind) || n > m.max {
				faults.add(at, strconv.Itoa(n)+" entries", m.allowedCount(kind))
			}
			for j := 0; j < n && n <= m.max; j++ {
				row := at
				if spell {
					row += "[" + strconv.Itoa(j) + "]"
				}
				checkObject(m.object, m.item(p, j), row, spell, faults)
			}
		}
	}
}

// least is how many entries a list must have beside that kind.
func (m *member) least(kind string) int {
	if m.kinds == nil {
		return m.min
	}
	for _, k := range m.kinds {
		if k == kind {
			return m.min
		}
	}
	return 0
}

func (m *member) allowedCount(kind string) string {
	return strconv.Itoa(m.least(kind)) + " to " + strconv.Itoa(m.max) + " entries"
}

// maxRows is how many rows a propeller table may have.
const maxRows = 200

// check holds one value against the field.
func (f *Field) check(value any, path, kind string, faults *Faults) {
	unused := len(f.Kinds) > 0 && !f.Applies(kind)
	switch v := value.(type) {
	case *float64:
		if !f.holds(*v) && !(unused && *v == 0) {
			faults.add(path, plainNumber(*v), f.Allowed())
		}
	case **float64:
		if *v != nil && !f.holds(**v) {
			faults.add(path, plainNumber(**v), f.Allowed())
		}
	case *[]float64:
		if n := len(*v); n > maxRows || n < 3 && !(unused && n == 0) {
			faults.add(path, strconv.Itoa(n)+" numbers", "3 to "+strconv.Itoa(maxRows)+" numbers")
			return
		}
		for i, x := range *v {
			if !f.holds(x) {
				faults.add(path+"["+strconv.Itoa(i)+"]", plainNumber(x), f.Allowed())
			}
		}
	case *string:
		if !f.holdsText(*v, kind) {
			faults.add(path, written(&node{kind: nodeString, text: *v}), f.Allowed())
		}
	}
}

// check holds the fields against each other.
func (c *Case) check(faults *Faults, withRuns bool) {
	a := &c.Aeroplane
	if a.MaximumMassKg < a.EmptyMassKg {
		faults.add("aeroplane.maximum_mass_kg", formatNumber(a.MaximumMassKg), "at least the empty mass, "+formatNumber(a.EmptyMassKg)+" kg")
	}
	for i := range a.Configurations {
		for j := 0; j < i; j++ {
			if a.Configurations[j].Name == a.Configurations[i].Name {
				faults.add("aeroplane.configurations["+strconv.Itoa(i)+"].name", quote(a.Configurations[i].Name), "a name that no other configuration has")
				break
			}
		}
	}
	a.Propeller.check(faults)
	for i := 1; i < len(a.Engine.ConsumptionTable); i++ {
		t := a.Engine.ConsumptionTable
		if !(t[i].PowerFraction > t[i-1].PowerFraction) {
			faults.add("aeroplane.engine.consumption_table["+strconv.Itoa(i)+"].power_fraction", formatNumber(t[i].PowerFraction), "more than the row before, "+formatNumber(t[i-1].PowerFraction))
		}
	}
	for i := range a.Calibration {
		c.checkCalibration(i, faults)
	}
	c.checkToday(faults)
	if withRuns {
		for i := range c.Runs {
			c.checkRun(i, faults)
		}
	}
	if len(*faults) == 0 {
		c.checkModel(faults)
	}
}

func (p *Propeller) check(faults *Faults) {
	n := len(p.AdvanceRatio)
	if p.Kind == Table || n+len(p.ThrustCoefficient)+len(p.PowerCoefficient) > 0 {
		if k := len(p.ThrustCoefficient); k != n {
			faults.add("aeroplane.propeller.thrust_coefficient", strconv.Itoa(k)+" numbers", "as many as advance_ratio, "+strconv.Itoa(n))
		}
		if k := len(p.PowerCoefficient); k != n {
			faults.add("aeroplane.propeller.power_coefficient", strconv.Itoa(k)+" numbers", "as many as advance_ratio, "+strconv.Itoa(n))
		}
	}
	for i := 1; i < n; i++ {
		if !(p.AdvanceRatio[i] > p.AdvanceRatio[i-1]) {
			faults.add("aeroplane.propeller.advance_ratio["+strconv.Itoa(i)+"]", formatNumber(p.AdvanceRatio[i]), "more than the row before, "+formatNumber(p.AdvanceRatio[i-1]))
		}
	}
}

func (c *Case) checkCalibration(i int, faults *Faults) {
	k := &c.Aeroplane.Calibration[i]
	path := func(key string) string {
		return "aeroplane.calibration[" + strconv.Itoa(i) + "]." + key
	}
	if c.configuration(k.Configuration) < 0 {
		faults.add(path("configuration"), quote(k.Configuration), "the name of one of the configurations")
	}
	for j := 0; j < i; j++ {
		if c.Aeroplane.Calibration[j].Configuration == k.Configuration {
			faults.add(path("configuration"), quote(k.Configuration), "a configuration that no other calibration has")
		}
	}
	for j := range k.Points {
		cas := k.Points[j].IASMps + k.Points[j].CASMinusIASMps
		row := func(key string) string { return path("points[" + strconv.Itoa(j) + "]." + key) }
		if !(cas > 0) {
			faults.add(row("cas_minus_ias_mps"), formatNumber(k.Points[j].CASMinusIASMps), "a calibrated airspeed above 0")
		}
		if j == 0 {
			continue
		}
		q := &k.Points[j-1]
		if !(k.Points[j].IASMps > q.IASMps) {
			faults.add(row("ias_mps"), formatNumber(k.Points[j].IASMps), "more than the row before, "+formatNumber(q.IASMps))
		} else if !(cas > q.IASMps+q.CASMinusIASMps) {
			faults.add(row("cas_minus_ias_mps"), formatNumber(k.Points[j].CASMinusIASMps), "a calibrated airspeed above that of the row before")
		}
	}
}

func (c *Case) checkToday(faults *Faults) {
	t := &c.Today
	if c.configuration(t.Configuration) < 0 {
		faults.add("today.configuration", quote(t.Configuration), "the name of one of the configurations")
	}
	if t.DewPointC != nil && *t.DewPointC > t.OutsideAirTemperatureC {
		faults.add("today.dew_point_c", formatNumber(*t.DewPointC), "at most the air temperature, "+formatNumber(t.OutsideAirTemperatureC)+" °C")
	}
	if f := c.Aeroplane.Fuel; f != nil && t.FuelKg > f.UsableKg {
		faults.add("today.fuel_kg", formatNumber(t.FuelKg), "at most the usable fuel, "+formatNumber(f.UsableKg)+" kg")
	}
	if b := c.Aeroplane.Battery; b != nil && t.ChargeKWh != nil && *t.ChargeKWh > b.UsableKWh {
		faults.add("today.charge_kwh", formatNumber(*t.ChargeKWh), "at most the usable charge, "+formatNumber(b.UsableKWh)+" kWh")
	}
}

func (c *Case) checkRun(i int, faults *Faults) {
	r := &c.Runs[i]
	path := func(key string) string { return "runs[" + strconv.Itoa(i) + "]." + key }
	if c.configuration(r.Configuration) < 0 {
		faults.add(path("configuration"), quote(r.Configuration), "the name of one of the configurations")
	}
	if (r.Kind == LevelRun || r.Kind == ClimbRun) && r.PowerFraction == nil && r.RPM == nil {
		faults.add(path("power_fraction"), "", "power_fraction or rpm; 1 is full throttle")
	}
	if (r.Kind == ClimbRun || r.Kind == GlideRun) && r.RateMps == nil {
		faults.add(path("rate_mps"), "", "-30 to 30 m/s")
	}
}
