package casefile

import (
	"strconv"
	"strings"
)

// Parse reads a case file. The error is Faults (all of them at once), a *VersionError, or a *SyntaxError (with line and
// column). Keys that this program does not know are kept for Marshal and named in the warnings.
func Parse(data []byte) (*Case, []Warning, error) {
	root, err := parseJSON(data)
	if err != nil {
		return nil, nil, err
	}
	d := decoder{}
	if err := d.header(&root); err != nil {
		return nil, nil, err
	}
	c := &Case{}
	d.object(&root, caseObject, c, "")
	d.ratedSpeed(&root)
	if len(d.faults) == 0 {
		for _, f := range d.later {
			f(c)
		}
		c.check(&d.faults, true)
	}
	if err := d.faults.orNil(); err != nil {
		return nil, d.warnings, err
	}
	return c, d.warnings, nil
}

type decoder struct {
	faults   Faults
	warnings []Warning
	later    []func(*Case) // defaults that depend on the rest of the case, in the order of the file
}

// header checks what the file says that it is.
func (d *decoder) header(root *node) error {
	if root.kind != nodeObject {
		return Faults{{"(whole file)", written(root), "an object with \"format\": " + quote(formatName)}}
	}
	f := root.get("format")
	if f == nil {
		return Faults{{"format", "", quote(formatName)}}
	}
	if f.kind != nodeString || f.text != formatName {
		return Faults{{"format", written(f), quote(formatName)}}
	}
	v := root.get("version")
	allowed := "a whole number from 1 to " + strconv.Itoa(formatVersion)
	if v == nil {
		return Faults{{"version", "", allowed}}
	}
	x, err := strconv.ParseFloat(v.text, 64)
	switch {
	case v.kind != nodeNumber || err != nil || x != x || x < 1 || x != float64(int64(x)):
		return Faults{{"version", written(v), allowed}}
	case x > formatVersion:
		return &VersionError{formatNumber(x), formatVersion}
	}
	return nil
}

// object reads the members of n into the struct that p points to.
func (d *decoder) object(n *node, o *object, p any, path string) {
	if n.kind != nodeObject {
		d.faults.add(path, written(n), "an object")
		return
	}
	for _, key := range n.duplicates() {
		d.faults.add(joinPath(path, key), "given more than once", "one value for each key")
	}
	kind := "" // known once the member "kind" is read; it is the first where there is one
	for i := range o.members {
		m := &o.members[i]
		d.member(n.get(m.key), m, p, joinPath(path, m.key), kind)
		if i == o.kind {
			kind = o.kindOf(p)
		}
	}
	d.unknown(n, o, p, path)
}

func (d *decoder) member(v *node, m *member, p any, path, kind string) {
	absent := v == nil
	if v != nil && v.kind == nodeNull && (m.shape == shapeMaybe || m.shape == shapeLeaf && m.field.Kind == KindMaybe) {
		absent = true
	}
	switch m.shape {
	case shapeLeaf:
		if absent {
			d.absent(m, p, path, kind)
			return
		}
		d.leaf(v, m, p, path, kind)
	case shapePart:
		if absent && m.required {
			d.faults.add(path, "", "an object")
			return
		}
		if absent {
			v = &node{kind: nodeObject}
		}
		d.object(v, m.object, m.at(p), path)
	case shapeMaybe:
		if !absent {
			d.object(v, m.object, m.create(p), path)
		}
	case shapeList:
		if absent {
			if m.least(kind) > 0 {
				d.faults.add(path, "", m.allowedCount(kind))
			}
			return
		}
		if v.kind != nodeArray {
			d.faults.add(path, written(v), "a list of objects")
			return
		}
		if k := len(v.items); k < m.least(kind) || k > m.max {
			d.faults.add(path, strconv.Itoa(k)+" entries", m.allowedCount(kind))
			if k > m.max {
				return
			}
		}
		m.resize(p, len(v.items))
		for i := range v.items {
			d.object(&v.items[i], m.object, m.item(p, i), path+"["+strconv.Itoa(i)+"]")
		}
	}
}

// absent gives a leaf its default.
func (d *decoder) absent(m *member, p any, path, kind string) {
	f := &m.field
	if f.Required {
		if f.Applies(kind) {
			d.faults.add(path, "", f.Allowed())
		}
		return
	}
	switch at := m.at(p).(type) {
	case *float64:
		*at = f.Default
		if f.dynamic != nil {
			d.later = append(d.later, func(c *Case) { *at = f.dynamic(c) })
		}
	case *string:
		*at = f.Text
		if f.dynamicText != nil {
			d.later = append(d.later, func(c *Case) { *at = f.dynamicText(c) })
		}
	}
}

func (d *decoder) leaf(v *node, m *member, p any, path, kind string) {
	f := &m.field
	switch at := m.at(p).(type) {
	case *float64:
		if x, ok := d.number(v, f, path); ok {
			*at = x
		}
	case **float64:
		if x, ok := d.number(v, f, path); ok {
			*at = &x
		}
	case *[]float64:
		if v.kind != nodeArray {
			d.faults.add(path, written(v), "a list of numbers")
			return
		}
		if len(v.items) == 0 && !f.Applies(kind) {
			return
		}
		if k := len(v.items); k < 3 || k > maxRows {
			d.faults.add(path, strconv.Itoa(k)+" numbers", "3 to "+strconv.Itoa(maxRows)+" numbers")
			return
		}
		*at = make([]float64, len(v.items))
		for i := range v.items {
			if x, ok := d.number(&v.items[i], f, path+"["+strconv.Itoa(i)+"]"); ok {
				(*at)[i] = x
			}
		}
	case *string:
		if v.kind != nodeString || !f.holdsText(v.text, kind) {
			d.faults.add(path, written(v), f.Allowed())
			return
		}
		*at = v.text
	}
}

// number reads a number inside the field's range.
func (d *decoder) number(v *node, f *Field, path string) (float64, bool) {
	if v.kind == nodeNumber {
		if x, err := strconv.ParseFloat(v.text, 64); err == nil && f.holds(x) {
			return x + 0, true
		}
	}
	d.faults.add(path, written(v), f.Allowed())
	return 0, false
}

// unknown keeps the members that the table does not have.
func (d *decoder) unknown(n *node, o *object, p any, path string) {
	var kept []byte
	for i := range n.members {
		key := n.members[i].key
		if _, known := o.index[key]; known {
			continue
		}
		v := &n.members[i].value
		where := joinPath(path, key)
		if !d.clean(v, where) {
			continue
		}
		d.warnings = append(d.warnings, Warning{where, "this program does not know the key; it is kept, and has no effect"})
		if kept != nil {
			kept = append(kept, ',')
		}
		kept = appendQuoted(kept, key)
		kept = append(kept, ':')
		kept = appendCompact(kept, v)
	}
	*o.extra(p) = string(kept)
}

// clean reports whether an unknown value can be kept: JSON knows its numbers and no object has a key twice.
func (d *decoder) clean(v *node, path string) bool {
	ok := true
	switch v.kind {
	case nodeNumber:
		if strings.ContainsAny(v.text, "NI") {
			d.faults.add(path, v.text, "a number that JSON knows")
			ok = false
		}
	case nodeArray:
		for i := range v.items {
			ok = d.clean(&v.items[i], path+"["+strconv.Itoa(i)+"]") && ok
		}
	case nodeObject:
		for _, key := range v.duplicates() {
			d.faults.add(joinPath(path, key), "given more than once", "one value for each key")
			ok = false
		}
		for i := range v.members {
			ok = d.clean(&v.members[i].value, joinPath(path, v.members[i].key)) && ok
		}
	}
	return ok
}

// ratedSpeed asks for rated_rpm where the propeller's thrust depends on it.
func (d *decoder) ratedSpeed(root *node) {
	a := root.get("aeroplane")
	if a == nil || a.kind != nodeObject {
		return
	}
	engine, propeller := a.get("engine"), a.get("propeller")
	if engine == nil || propeller == nil || engine.kind != nodeObject || engine.get("rated_rpm") != nil {
		return
	}
	if k := propeller.get("kind"); k != nil && (k.text == FixedPitch || k.text == Table) {
		f, _ := FieldOf("aeroplane.engine.rated_rpm")
		d.faults.add("aeroplane.engine.rated_rpm", "", f.Allowed()+" (a "+k.text+" propeller needs it)")
	}
}
