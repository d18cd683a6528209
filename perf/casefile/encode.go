package casefile

// The format and version that Marshal writes.
const (
	formatName    = "levelspan-case"
	formatVersion = 1
)

// Marshal writes the canonical form: keys in the table's order, unknown ones kept after them, two-space indent, small
// lists and objects on one line, numbers with the fewest digits that give them back, one final newline. A number that is
// not finite, which Validate refuses, is written as null.
func (c *Case) Marshal() []byte {
	n := encodeObject(caseObject, c)
	return append(appendPretty(nil, &n, 0), '\n')
}

func encodeObject(o *object, p any) node {
	n := node{kind: nodeObject, members: make([]pair, 0, len(o.members))}
	kind := o.kindOf(p)
	put := func(key string, v node) { n.members = append(n.members, pair{key, v}) }
	for i := range o.members {
		m := &o.members[i]
		switch m.shape {
		case shapeConstant:
			if m.key == "format" {
				put(m.key, node{kind: nodeString, text: formatName})
			} else {
				put(m.key, node{kind: nodeNumber, text: formatNumber(formatVersion)})
			}
		case shapeLeaf:
			if v, ok := m.field.encode(m.at(p), kind); ok {
				put(m.key, v)
			}
		case shapePart:
			put(m.key, encodeObject(m.object, m.at(p)))
		case shapeMaybe:
			if q := m.at(p); q != nil {
				put(m.key, encodeObject(m.object, q))
			}
		case shapeList:
			k := m.count(p)
			if k == 0 && m.omit {
				continue
			}
			v := node{kind: nodeArray, items: make([]node, k)}
			for j := range v.items {
				v.items[j] = encodeObject(m.object, m.item(p, j))
			}
			put(m.key, v)
		}
	}
	if s := *o.extra(p); s != "" {
		if kept, err := parseJSON([]byte("{" + s + "}")); err == nil {
			n.members = append(n.members, kept.members...)
		}
	}
	return n
}

// encode gives the value to be written, and whether it is written at all.
func (f *Field) encode(value any, kind string) (node, bool) {
	unused := len(f.Kinds) > 0 && !f.Applies(kind)
	switch v := value.(type) {
	case *float64:
		return numberNode(*v), !(unused && f.Required && *v == 0)
	case **float64:
		if *v == nil {
			return node{}, !f.omit
		}
		return numberNode(**v), true
	case *[]float64:
		n := node{kind: nodeArray, items: make([]node, len(*v))}
		for i, x := range *v {
			n.items[i] = numberNode(x)
		}
		return n, !(unused && len(*v) == 0)
	case *string:
		empty := *v == "" && (unused || f.omit)
		return node{kind: nodeString, text: *v}, !empty
	}
	return node{}, false
}

func numberNode(x float64) node {
	s := formatNumber(x)
	if s == "null" {
		return node{}
	}
	return node{kind: nodeNumber, text: s}
}

// Clone is a deep copy.
func (c *Case) Clone() *Case {
	d := *c
	a := &d.Aeroplane
	a.Configurations = append([]Configuration(nil), a.Configurations...)
	a.Engine.MaximumRPM = copied(a.Engine.MaximumRPM)
	a.Engine.ThermalPowerW = copied(a.Engine.ThermalPowerW)
	a.Engine.ConsumptionTable = append([]ConsumptionPoint(nil), a.Engine.ConsumptionTable...)
	a.Propeller.AdvanceRatio = append([]float64(nil), a.Propeller.AdvanceRatio...)
	a.Propeller.ThrustCoefficient = append([]float64(nil), a.Propeller.ThrustCoefficient...)
	a.Propeller.PowerCoefficient = append([]float64(nil), a.Propeller.PowerCoefficient...)
	a.Fuel = copied(a.Fuel)
	if a.Fuel != nil {
		a.Fuel.DensityKgPerL = copied(a.Fuel.DensityKgPerL)
	}
	a.Battery = copied(a.Battery)
	for _, v := range []**float64{&a.Placards.VNECASMps, &a.Placards.VNETASMps, &a.Placards.VNOCASMps, &a.Placards.VACASMps, &a.Placards.VFECASMps,
		&d.Today.DewPointC, &d.Today.ChargeKWh, &d.Today.FieldElevationM, &d.Today.AltimeterSettingHPa, &d.Today.ClimbGradient} {
		*v = copied(*v)
	}
	a.Calibration = append([]Calibration(nil), a.Calibration...)
	for i := range a.Calibration {
		a.Calibration[i].Points = append([]CalibrationPoint(nil), a.Calibration[i].Points...)
	}
	d.Runs = append([]Run(nil), d.Runs...)
	for i := range d.Runs {
		r := &d.Runs[i]
		r.PowerFraction, r.RPM, r.RateMps = copied(r.PowerFraction), copied(r.RPM), copied(r.RateMps)
		r.Legs = append([]Leg(nil), r.Legs...)
	}
	return &d
}

func copied[T any](p *T) *T {
	if p == nil {
		return nil
	}
	v := *p
	return &v
}
