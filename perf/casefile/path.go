package casefile

import (
	"math"
	"strconv"
	"strings"
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
// (the fuel, the battery) is made when the number that it must have is set.
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
		v, ok := p.m.at(p.parent).(*float64)
		if !ok || !f.Required {
			p.maybe.remove(p.above)
			return &Fault{path, formatNumber(value), "nothing while " + p.maybe.key + " itself is not given"}
		}
		return c.change(path, func() { *v = value }, func() { p.maybe.remove(p.above) })
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
