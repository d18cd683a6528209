package main

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"levelspan/game/app"
	"levelspan/game/scene"
	"levelspan/game/ui"
)

// mirror writes the patches that bring the page's elements in line with what is drawn, and remembers what is there, so
// that a patch holds only what changed. A patch is records that end with U+001E, their fields apart by U+001F; the
// first field says what to do. mirror.js is the other end.
type mirror struct {
	out      []byte
	have     map[string]element
	order    []string
	rows     map[string]app.MirrorRow
	rowKeys  []string
	facts    map[string]app.Fact
	factKeys []string
	texts    map[string]string
	keys     []string        // scratch
	seen     map[string]bool // scratch
}

// element is what an element of the page shows; comparable, so that a change is an inequality.
type element struct {
	control ui.Control
	covered bool // under a modal layer
	stop    bool // Tab halts here
	tag     string
	group   string
}

func newMirror() *mirror {
	return &mirror{have: map[string]element{}, rows: map[string]app.MirrorRow{}, facts: map[string]app.Fact{}, texts: map[string]string{}, seen: map[string]bool{}}
}

// field adds a field; the two separators cannot occur in one.
func (m *mirror) field(s string) {
	for i := range len(s) {
		c := s[i]
		if c == 0x1e || c == 0x1f {
			c = ' '
		}
		m.out = append(m.out, c)
	}
	m.out = append(m.out, 0x1f)
}

func (m *mirror) record(fields ...string) {
	for _, f := range fields {
		m.field(f)
	}
	m.end()
}

// end closes a record: the last field's separator becomes the record's.
func (m *mirror) end() {
	if n := len(m.out); n > 0 {
		m.out[n-1] = 0x1e
	}
}

// exact is a number as its shortest text that reads back the same, "" if it is not finite.
func exact(v float64) string {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return ""
	}
	return strconv.FormatFloat(v, 'g', -1, 64)
}

// pixels is a length for a style: no exponent, a hundredth is enough.
func pixels(v float64) string {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return "0"
	}
	return strconv.FormatFloat(math.Round(v*100)/100, 'f', -1, 64)
}

// update gives the patch from what the page shows to the given state; "" if nothing changed. The text is good until
// the next call.
func (m *mirror) update(controls []ui.Control, said *app.Mirror, ground scene.Color) string {
	m.out = m.out[:0]
	m.palette(ground)
	m.controls(controls)
	if said != nil {
		m.said(said)
	}
	return string(m.out)
}

// palette gives the page's own parts (a text field being edited, the edge that a browser shows) the drawing's colours.
func (m *mirror) palette(ground scene.Color) {
	name := "day"
	if 2*int(ground.R)+5*int(ground.G)+int(ground.B) < 8*128 {
		name = "night"
	}
	m.text("c", name, fmt.Sprintf("#%02x%02x%02x", ground.R, ground.G, ground.B))
}

func (m *mirror) controls(controls []ui.Control) {
	top := 0
	for i := range controls {
		top = max(top, controls[i].Modal)
	}
	clear(m.seen)
	m.keys = m.keys[:0]
	for i := range controls {
		c := &controls[i]
		if c.ID == "" || m.seen[c.ID] {
			continue
		}
		m.seen[c.ID] = true
		m.keys = append(m.keys, c.ID)
		m.control(c, c.Modal < top, stop(controls, i))
	}
	for id := range m.have {
		if !m.seen[id] {
			delete(m.have, id)
			m.record("-", id)
		}
	}
	if list := m.grouped(); !slices.Equal(list, m.order) {
		m.order = list
		m.field("o")
		for _, item := range list {
			m.field(item)
		}
		m.end()
	}
}

// grouped is the order of the elements with the beginnings and ends of groups between them: tabs are announced as
// tabs only inside a list of tabs, radios inside a group.
func (m *mirror) grouped() []string {
	list := make([]string, 0, len(m.keys)+8)
	open := ""
	for _, id := range m.keys {
		group := m.have[id].group
		if group != open {
			if open != "" {
				list = append(list, ">")
			}
			if group != "" {
				list = append(list, "<"+group)
			}
			open = group
		}
		list = append(list, id)
	}
	if open != "" {
		list = append(list, ">")
	}
	return list
}

// groupNames makes a group's name readable.
var groupNames = strings.NewReplacer("-", " ", "/", " ", ".", " ", "_", " ")

// groupOf is "kind name" for what has to stand in a group. A group is one role and one ID up to its last slash.
func groupOf(c *ui.Control) string {
	kind := ""
	switch c.Role {
	case ui.RoleTab:
		kind = "tablist "
	case ui.RoleRadio:
		kind = "radiogroup "
	default:
		return ""
	}
	stem := c.ID[:max(0, strings.LastIndexByte(c.ID, '/'))]
	if stem == "tab" {
		stem = "screens"
	}
	return kind + groupNames.Replace(stem)
}

// stop reports whether Tab halts at a control: in a group only at the selected member, or the first if none is. The
// arrow keys go on from there.
func stop(controls []ui.Control, at int) bool {
	c := &controls[at]
	if c.Disabled {
		return false
	}
	if c.Role != ui.RoleTab && c.Role != ui.RoleRadio || c.Selected {
		return true
	}
	group, first := groupOf(c), true
	for i := range controls {
		o := &controls[i]
		if o.Role != c.Role || o.Modal != c.Modal || o.Disabled || groupOf(o) != group {
			continue
		}
		if o.Selected {
			return false
		}
		if i < at {
			first = false
		}
	}
	return first
}

func tagOf(c *ui.Control) string {
	switch {
	case c.Role == ui.RoleSlider:
		return "slider"
	case c.Role == ui.RoleRegion:
		return "region"
	case c.Role == ui.RoleField && c.LiveText:
		return "input"
	}
	return "button"
}

// control brings one element in line.
func (m *mirror) control(c *ui.Control, covered, stop bool) {
	now := element{control: *c, covered: covered, stop: stop, tag: tagOf(c), group: groupOf(c)}
	was, there := m.have[c.ID]
	if there && was == now {
		return
	}
	if there && was.tag != now.tag {
		m.record("-", c.ID)
		m.order = nil
		there = false
	}
	if !there {
		was = element{}
		m.record("+", c.ID, now.tag)
	}
	m.have[c.ID] = now
	if place := scene.Rect(c.Bounds); !there || was.control.Bounds != place {
		m.record("p", c.ID, pixels(place.X), pixels(place.Y), pixels(max(0, place.W)), pixels(max(0, place.H)))
	}
	before, after := attributes(&was), attributes(&now)
	for i, a := range after {
		if there && before[i].value == a.value {
			continue
		}
		switch {
		case a.value != "":
			m.record("a", c.ID, a.name, a.value)
		case there:
			m.record("x", c.ID, a.name)
		}
	}
	if now.tag == "input" && (!there || was.control.ValueText != c.ValueText) {
		m.record("v", c.ID, c.ValueText)
	}
}

type attribute struct{ name, value string }

// attributes are all that an element may carry, always in the same order; "" means that it is not there.
func attributes(e *element) [14]attribute {
	c := &e.control
	yes := func(b bool) string {
		if b {
			return "true"
		}
		return ""
	}
	state := func(want bool) string {
		if want {
			return strconv.FormatBool(c.Selected)
		}
		return ""
	}
	button := e.tag == "button"
	role := ""
	if button {
		switch c.Role {
		case ui.RoleTab:
			role = "tab"
		case ui.RoleSwitch:
			role = "switch"
		case ui.RoleRadio:
			role = "radio"
		}
	}
	name := c.Label
	if button && c.ValueText != "" {
		name = strings.TrimPrefix(c.Label+", "+c.ValueText, ", ")
	}
	if c.Error != "" {
		name += ". " + c.Error
	}
	var now, least, most, said, step string
	if e.tag == "slider" {
		now, least, most, said, step = exact(c.Value), exact(c.Min), exact(c.Max), c.ValueText, exact(c.Step)
	}
	if e.tag == "region" {
		name = ""
	}
	covered := ""
	if e.covered {
		covered = "true"
	}
	invalid := ""
	if e.tag == "input" {
		invalid = yes(c.Error != "")
	}
	tabindex := "-1"
	switch {
	case e.tag == "region":
		tabindex = ""
	case e.stop:
		tabindex = "0"
	}
	return [14]attribute{
		{"role", roleOr(role, e.tag)},
		{"aria-label", name},
		{"aria-valuenow", now},
		{"aria-valuemin", least},
		{"aria-valuemax", most},
		{"aria-valuetext", said},
		{"data-step", step},
		{"aria-selected", state(button && c.Role == ui.RoleTab)},
		{"aria-checked", state(button && (c.Role == ui.RoleSwitch || c.Role == ui.RoleRadio))},
		{"aria-pressed", state(button && c.Role == ui.RoleRow)},
		{"aria-disabled", yes(c.Disabled)},
		{"inert", covered},
		{"aria-invalid", invalid},
		{"tabindex", tabindex},
	}
}

func roleOr(role, tag string) string {
	if tag == "slider" {
		return "slider"
	}
	return role
}

// said brings the table, the facts and the sentences in line.
func (m *mirror) said(s *app.Mirror) {
	m.text("T", "", s.Title)
	m.text("t", "title", s.Title)
	m.text("t", "summary", s.Summary)
	m.text("l", "warnings", strings.Join(s.Warnings, " \n"))
	m.text("l", "status", s.Status)

	m.keys = m.keys[:0]
	for i := range s.Rows {
		r := &s.Rows[i]
		if slices.Contains(m.keys, r.Key) {
			continue
		}
		m.keys = append(m.keys, r.Key)
		if was, there := m.rows[r.Key]; there && was == *r {
			continue
		}
		m.rows[r.Key] = *r
		low, high, selected := "", "", "0"
		if r.HasInterval {
			low, high = exact(r.LowCASMps), exact(r.HighCASMps)
		}
		if r.Selected {
			selected = "1"
		}
		m.record("r", r.Key, r.Name, r.Symbol, r.ValueText, r.SetBy, r.SecondText,
			exact(r.CASMps), exact(r.TASMps), exact(r.IASMps), low, high, selected)
	}
	m.keep("R", &m.rowKeys, func(key string) { delete(m.rows, key) })

	m.keys = m.keys[:0]
	for _, f := range s.Facts {
		if slices.Contains(m.keys, f.Key) {
			continue
		}
		m.keys = append(m.keys, f.Key)
		if was, there := m.facts[f.Key]; there && was == f {
			continue
		}
		m.facts[f.Key] = f
		m.record("f", f.Key, f.Name, f.ValueText, exact(f.Value))
	}
	m.keep("F", &m.factKeys, func(key string) { delete(m.facts, key) })
}

// keep writes which keys stay, and in which order, if that changed; gone are forgotten.
func (m *mirror) keep(op string, have *[]string, forget func(string)) {
	if slices.Equal(m.keys, *have) {
		return
	}
	for _, key := range *have {
		if !slices.Contains(m.keys, key) {
			forget(key)
		}
	}
	*have = append((*have)[:0], m.keys...)
	m.field(op)
	for _, key := range m.keys {
		m.field(key)
	}
	m.end()
}

func (m *mirror) text(op, name, value string) {
	key := op + name
	if was, there := m.texts[key]; there && was == value {
		return
	}
	m.texts[key] = value
	if name == "" {
		m.record(op, value)
		return
	}
	m.record(op, name, value)
}
