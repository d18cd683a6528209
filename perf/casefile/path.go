package casefile

import (
	"math"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"
)

// step is one part of a path: a key, and an index or -1.
type step struct {
	key   string
	index int
}

// next takes the first step off a path.
func next(path string) (s step, rest string, ok bool) {
	head, rest, _ := strings.Cut(path, ".")
	key, tail, indexed := strings.Cut(head, "[")
	if !indexed {
		return step{key, -1}, rest, key != ""
	}
	number, found := strings.CutSuffix(tail, "]")
	i, err := strconv.Atoi(number)
	if !found || err != nil || i < 0 || strconv.Itoa(i) != number {
		return step{}, "", false
	}
	return step{key, i}, rest, true
}

// place is where a path leads: a leaf and the struct that holds it.
type place struct {
	m      *member
	object *object
	parent any // nil: in an optional part that is not there
	index  int // of a list of numbers, else -1
	maybe  *member
	above  any // what holds the optional part
}

// find walks a path from the case to a leaf. With c nil, indices are not checked and only m and object are valid.
func find(c *Case, path string) (p place, ok bool) {
	p.object, p.index = caseObject, -1
	if c != nil {
		p.parent = c
	}
	for {
		s, rest, ok := next(path)
		if !ok {
			return p, false
		}
		i, known := p.object.index[s.key]
		if !known {
			return p, false
		}
		m := &p.object.members[i]
		path = rest
		switch m.shape {
		case shapeLeaf:
			if rest != "" || s.index >= 0 && m.field.Kind != KindNumbers {
				return p, false
			}
			p.m, p.index = m, s.index
			return p, true
		case shapeList:
			if s.index < 0 || c != nil && (p.parent == nil || s.index >= m.count(p.parent)) {
				return p, false
			}
			if c != nil {
				p.parent = m.item(p.parent, s.index)
			}
		case shapePart, shapeMaybe:
			if s.index >= 0 {
				return p, false
			}
			if p.parent != nil {
				if m.shape == shapeMaybe {
					p.maybe, p.above = m, p.parent
				}
				p.parent = m.at(p.parent)
			}
		default:
			return p, false
		}
		p.object = m.object
	}
}

// FieldOf is the field at a path, with or without indices filled in.
func FieldOf(path string) (Field, bool) {
	p, ok := find(nil, strings.ReplaceAll(path, "[]", "[0]"))
	if !ok {
		return Field{}, false
	}
	f := p.m.field
	f.Path = path
	return f, true
}

// Number is the number at a path, in the file's unit, and whether there is one.
func (c *Case) Number(path string) (value float64, set bool) {
	p, ok := find(c, path)
	if !ok || p.parent == nil {
		return 0, false
	}
	switch v := p.m.at(p.parent).(type) {
	case *float64:
		return *v, p.index < 0
	case **float64:
		if *v != nil {
			return **v, true
		}
	case *[]float64:
		if p.index >= 0 && p.index < len(*v) {
			return (*v)[p.index], true
		}
	}
	return 0, false
}

// SetNumber puts a number, in the file's unit, at a path. It refuses with a *Fault, and changes nothing, what is out of
// the field's range and what would make the case unphysical together with its other numbers. An optional part
// (the fuel, the battery) is made when its first number is set.
func (c *Case) SetNumber(path string, value float64) error {
	p, ok := find(c, path)
	if !ok {
		return &Fault{path, formatNumber(value), "a key of the case"}
	}
	f := &p.m.field
	if f.Kind == KindText || f.Kind == KindChoice || f.Kind == KindNumbers && p.index < 0 {
		return &Fault{path, formatNumber(value), "no number; " + f.Allowed()}
	}
	if !f.holds(value) {
		return &Fault{path, plainNumber(value), f.Allowed()}
	}
	value += 0 // no -0
	if p.parent == nil {
		p.parent = p.maybe.create(p.above)
		return c.change(path, func() { *p.m.at(p.parent).(*float64) = value }, func() { p.maybe.remove(p.above) })
	}
	switch v := p.m.at(p.parent).(type) {
	case *float64:
		old := *v
		return c.change(path, func() { *v = value }, func() { *v = old })
	case **float64:
		old := *v
		return c.change(path, func() { *v = &value }, func() { *v = old })
	case *[]float64:
		if p.index >= len(*v) {
			return &Fault{path, formatNumber(value), "a row that is there"}
		}
		old := (*v)[p.index]
		return c.change(path, func() { (*v)[p.index] = value }, func() { (*v)[p.index] = old })
	}
	return nil
}

// ClearNumber takes the number at a path away: an optional one becomes nothing, one with a default becomes the default,
// and the first number of an optional part takes the part away. It refuses, with a *Fault, a number that must be there.
func (c *Case) ClearNumber(path string) error {
	p, ok := find(c, path)
	if !ok {
		return &Fault{path, "", "a key of the case"}
	}
	if p.parent == nil {
		return nil
	}
	f := &p.m.field
	switch v := p.m.at(p.parent).(type) {
	case **float64:
		old := *v
		return c.change(path, func() { *v = nil }, func() { *v = old })
	case *float64:
		old := *v
		if !f.Required {
			byDefault := f.defaultNumber(c)
			return c.change(path, func() { *v = byDefault }, func() { *v = old })
		}
		if p.maybe != nil {
			part := p.maybe.at(p.above)
			switch part := part.(type) {
			case *Fuel:
				return c.change(path, func() { c.Aeroplane.Fuel = nil }, func() { c.Aeroplane.Fuel = part })
			case *Battery:
				return c.change(path, func() { c.Aeroplane.Battery = nil }, func() { c.Aeroplane.Battery = part })
			}
		}
		if kind := p.object.kindOf(p.parent); !f.Applies(kind) {
			*v = 0
			return nil
		}
	}
	return &Fault{path, "", f.Allowed()}
}

// Text is the text or choice at a path.
func (c *Case) Text(path string) (string, bool) {
	p, ok := find(c, path)
	if !ok || p.parent == nil {
		return "", false
	}
	if v, ok := p.m.at(p.parent).(*string); ok {
		return *v, true
	}
	return "", false
}

// SetText puts a text or choice at a path, refusing with a *Fault as SetNumber does. Renaming a configuration renames it
// wherever it is referred to. A new propeller kind begins with class averages where the case has no numbers of that
// kind; those of the old kind are kept.
func (c *Case) SetText(path, text string) error {
	p, ok := find(c, path)
	if !ok || p.parent == nil {
		return &Fault{path, quote(text), "a key of the case"}
	}
	v, ok := p.m.at(p.parent).(*string)
	f := &p.m.field
	if !ok {
		return &Fault{path, quote(text), f.Allowed()}
	}
	if !f.holdsText(text, p.object.kindOf(p.parent)) {
		return &Fault{path, quote(text), f.Allowed()}
	}
	old := c.Clone()
	switch q := p.parent.(type) {
	case *Configuration:
		c.renameReferences(q.Name, text)
	case *Propeller:
		q.begin(text)
	}
	return c.change(path, func() { *v = text }, func() { *c = *old })
}

// change makes a change and takes it back when the case then has a fault that it did not have before.
func (c *Case) change(path string, do, undo func()) error {
	withRuns := strings.HasPrefix(path, "runs[") || strings.HasPrefix(path, "aeroplane.configurations[") || strings.HasPrefix(path, "aeroplane.propeller")
	var before, after Faults
	c.check(&before, withRuns)
	do()
	c.check(&after, withRuns)
	for i := range after {
		known := false
		for j := range before {
			known = known || before[j].Path == after[i].Path && before[j].Allowed == after[i].Allowed
		}
		if !known {
			fault := after[i]
			undo()
			return &fault
		}
	}
	return nil
}

func (f *Field) defaultNumber(c *Case) float64 {
	if f.dynamic != nil {
		return f.dynamic(c)
	}
	return f.Default
}

// holdsText reports whether a text or choice is allowed. A choice that the kind beside it does not use may be empty.
func (f *Field) holdsText(s, kind string) bool {
	if f.Kind == KindChoice {
		for _, c := range f.Choices {
			if s == c {
				return true
			}
		}
		return s == "" && f.Required && len(f.Kinds) > 0 && !f.Applies(kind)
	}
	if !utf8.ValidString(s) {
		return false
	}
	if n := float64(utf8.RuneCountInString(s)); n < f.Min || n > f.Max {
		return false
	}
	blank := f.Min > 0
	for _, r := range s {
		if unicode.IsControl(r) || r == '\u2028' || r == '\u2029' {
			if r != '\n' && r != '\t' || !f.long() {
				return false
			}
		}
		blank = blank && unicode.IsSpace(r)
	}
	return !blank
}

// long reports whether a text may have several lines.
func (f *Field) long() bool { return f.Max >= 500 }

// plainNumber writes any float, also those that JSON does not know.
func plainNumber(x float64) string {
	switch {
	case math.IsNaN(x):
		return "NaN"
	case math.IsInf(x, 1):
		return "Infinity"
	case math.IsInf(x, -1):
		return "-Infinity"
	}
	return formatNumber(x)
}

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
