package casefile

import "strconv"

// AddConfiguration appends a copy of the last configuration under a name that is not taken, with its calibration, and
// returns its index.
func (c *Case) AddConfiguration() int {
	a := &c.Aeroplane
	n := len(a.Configurations)
	fresh := Configuration{CLMax: 1.45}
	if n > 0 {
		fresh = a.Configurations[n-1]
	}
	for i := n + 1; ; i++ {
		fresh.Name = "configuration " + strconv.Itoa(i)
		if c.configuration(fresh.Name) < 0 {
			break
		}
	}
	a.Configurations = append(a.Configurations[:n:n], fresh)
	return n
}

// RemoveConfiguration takes a configuration and its calibration away, refusing with a *Fault the only one and one that a
// run was flown in. Today's configuration becomes the first one when it was the one removed.
func (c *Case) RemoveConfiguration(i int) error {
	a := &c.Aeroplane
	path := "aeroplane.configurations[" + strconv.Itoa(i) + "]"
	if i < 0 || i >= len(a.Configurations) {
		return &Fault{path, "", "a configuration that is there"}
	}
	name := a.Configurations[i].Name
	if len(a.Configurations) == 1 {
		return &Fault{path, quote(name), "at least one configuration"}
	}
	for r := range c.Runs {
		if c.Runs[r].Configuration == name {
			return &Fault{path, quote(name), "a configuration that no run was flown in"}
		}
	}
	rest := append([]Configuration(nil), a.Configurations[:i]...)
	a.Configurations = append(rest, a.Configurations[i+1:]...)
	var kept []Calibration
	for j := range a.Calibration {
		if a.Calibration[j].Configuration != name {
			kept = append(kept, a.Calibration[j])
		}
	}
	a.Calibration = kept
	if c.Today.Configuration == name {
		c.Today.Configuration = a.Configurations[0].Name
	}
	return nil
}

// configuration is the index of the configuration of that name, -1 if there is none.
func (c *Case) configuration(name string) int {
	for i := range c.Aeroplane.Configurations {
		if c.Aeroplane.Configurations[i].Name == name {
			return i
		}
	}
	return -1
}

func (c *Case) renameReferences(from, to string) {
	if c.Today.Configuration == from {
		c.Today.Configuration = to
	}
	for i := range c.Aeroplane.Calibration {
		if c.Aeroplane.Calibration[i].Configuration == from {
			c.Aeroplane.Calibration[i].Configuration = to
		}
	}
	for i := range c.Runs {
		if c.Runs[i].Configuration == from {
			c.Runs[i].Configuration = to
		}
	}
}

// begin fills the numbers of a propeller kind that are absent with class averages.
func (p *Propeller) begin(kind string) {
	for i := range propellerObject.members {
		m := &propellerObject.members[i]
		if v, ok := m.at(p).(*float64); ok && *v == 0 && m.field.Applies(kind) {
			*v = m.field.Typical
		}
	}
	if kind == Table && len(p.AdvanceRatio) == 0 && len(p.ThrustCoefficient) == 0 && len(p.PowerCoefficient) == 0 {
		p.AdvanceRatio = []float64{0, 0.2, 0.4, 0.6, 0.8, 1}
		p.ThrustCoefficient = []float64{0.105, 0.1, 0.088, 0.067, 0.038, 0.002}
		p.PowerCoefficient = []float64{0.05, 0.051, 0.05, 0.045, 0.034, 0.014}
	}
}
