package app

import (
	"bytes"
	"errors"
	"strconv"
	"time"

	"levelspan/assets/case"
	"levelspan/game/keep"
	"levelspan/game/ui"
	"levelspan/perf/casefile"
)

// kept is what the program knows of the store: which version of each case this window last read or wrote. Every
// committed change is saved at the end of its Step.
type kept struct {
	store    keep.Store
	clock    func() time.Time
	versions map[string]version // by name
	seen     *casefile.Case     // the committed case that was last dealt with, and its name
	seenName string
	current  string // what the store was last told is worked on
	session  string // what the store was last told of the screen
	trouble  error  // why the last save failed, nil if it did not
	told     bool   // of the trouble
	check    bool   // another window wrote; not looked at yet
	other    string // the name of the other window's version that the dialog asks about
	removed  []removedCase
}

// version is one kept version of a case.
type version struct {
	stamp string
	data  []byte
}

// removedCase can be brought back until the end.
type removedCase struct {
	name string
	data []byte
}

// startKept takes up the case that was last worked on; without one that can be read the demo stays.
func (a *App) startKept(o *Options) {
	k := &a.kept
	k.store, k.clock, k.versions = o.Store, o.Clock, map[string]version{}
	if k.store == nil {
		k.store = keep.Memory()
	}
	if k.clock == nil {
		k.clock = time.Now
	}
	name, ok, _ := k.store.Current()
	if !ok {
		if list, err := k.store.List(); err == nil && len(list) > 0 {
			name, ok = list[0].Name, true
		}
	}
	if ok {
		if c, err := a.load(name); err == nil {
			a.doc = newDocument(c)
			a.doc.kept, k.current = name, name
		} else if !errors.Is(err, keep.ErrMissing) && !errors.Is(err, keep.ErrDenied) {
			a.openDialog("The case last worked on cannot be read", true, name+": "+err.Error()+".", "It stays where it is kept. The demonstration is shown instead.")
		}
	}
	k.seen, k.seenName = a.doc.committed, a.doc.kept
	a.takeSelection()
	if s, err := k.store.Session(); err == nil && s != "" {
		a.view.marked = false
		a.takeSession(s)
	}
	k.session = a.sessionNow()
}

// load reads a kept case and remembers its version.
func (a *App) load(name string) (*casefile.Case, error) {
	data, stamp, err := a.kept.store.Load(name)
	if err != nil {
		return nil, err
	}
	c, _, err := casefile.Parse(data)
	if err != nil {
		return nil, err
	}
	a.kept.versions[name] = version{stamp, data}
	return c, nil
}

// keepChanges saves what has been committed since it was last called: once a Step, and not in a drag.
func (a *App) keepChanges() {
	k := &a.kept
	if a.doc.committed != k.seen || a.doc.kept != k.seenName {
		moved := a.doc.kept != k.seenName
		if a.doc.kept == "" {
			a.doc.rename("", a.freeName(a.doc.committed.Aeroplane.Name))
		}
		k.seen, k.seenName = a.doc.committed, a.doc.kept
		a.saveKept()
		k.check = k.check || moved
	}
	if k.check && a.view.overlay == overlayNone && a.doc.current == a.doc.committed && a.view.text.ID == "" {
		k.check = false
		a.lookAtOther()
	}
	if s := a.sessionNow(); s != k.session {
		k.session = s
		_ = k.store.SetSession(s) // a store in trouble says so at the next save
	}
}

// saveKept saves the committed case if it differs from the version last saved.
func (a *App) saveKept() {
	k, name := &a.kept, a.doc.kept
	data, v := a.doc.committed.Marshal(), k.versions[name]
	if !bytes.Equal(data, v.data) || k.trouble != nil {
		stamp, err := k.store.Save(name, data, v.stamp)
		switch {
		case errors.Is(err, keep.ErrChanged):
			a.meetOther(data)
			return
		case err != nil:
			a.storeTrouble(err)
			return
		}
		k.versions[name] = version{stamp, data}
		if k.trouble != nil {
			k.trouble, k.told = nil, false
			a.notify("Changes are kept again")
		}
	}
	if name != k.current && k.store.SetCurrent(name) == nil {
		k.current = name
	}
}

// storeTrouble says once that changes are not kept; the strip says it as long as it holds.
func (a *App) storeTrouble(err error) {
	k := &a.kept
	k.trouble = err
	if !k.told {
		k.told = true
		a.view.failures = append(a.view.failures, a.troubleText()+" The program goes on. Share offers the case as a file or as text.")
	}
	a.dirty = true
}

// troubleText says that changes are not kept, and why; "" while they are.
func (a *App) troubleText() string {
	err := a.kept.trouble
	switch {
	case err == nil:
		return ""
	case errors.Is(err, keep.ErrFull):
		return "Changes are not kept: " + keep.ErrFull.Error() + "."
	}
	return "Changes are not kept: " + keep.ErrDenied.Error() + "."
}

// lookAtOther compares the case with what the store holds now.
func (a *App) lookAtOther() {
	v, known := a.kept.versions[a.doc.kept]
	if !known {
		return
	}
	data, stamp, err := a.kept.store.Load(a.doc.kept)
	switch {
	case errors.Is(err, keep.ErrMissing):
		a.notify(a.doc.kept + " was deleted in another window; the next change keeps it again")
	case err != nil || stamp == v.stamp:
	case bytes.Equal(data, v.data):
		a.kept.versions[a.doc.kept] = version{stamp, data}
	default:
		a.askAboutOther()
	}
}

// meetOther deals with a save that was refused: another window wrote, or deleted, since.
func (a *App) meetOther(mine []byte) {
	k, name := &a.kept, a.doc.kept
	if k.versions[name].stamp == "" { // the name was taken meanwhile
		a.doc.rename(name, a.freeName(name))
		k.seenName = a.doc.kept
		a.saveKept()
		return
	}
	theirs, stamp, err := k.store.Load(name)
	switch {
	case errors.Is(err, keep.ErrMissing):
		delete(k.versions, name)
		stamp, err := k.store.Save(name, mine, "")
		if err != nil {
			a.storeTrouble(err)
			return
		}
		k.versions[name] = version{stamp, mine}
		a.notify(name + " was deleted in another window; it is kept again with this change")
	case err != nil:
		a.storeTrouble(err)
	case bytes.Equal(theirs, mine):
		k.versions[name] = version{stamp, mine}
	default:
		a.askAboutOther()
	}
}

// askAboutOther keeps this window's version under a name of its own, at once, and asks whether to stay with it.
func (a *App) askAboutOther() {
	k, from := &a.kept, a.doc.kept
	to := a.freeName(from)
	a.doc.rename(from, to)
	delete(k.versions, from)
	k.seenName, k.other = to, from
	a.saveKept()
	a.openDialog(from+" was changed in another window", true,
		"Nothing is lost: what this window shows is kept as “"+to+"”, beside the other window's version.",
		"Keep both, or take the other window's version and let “"+to+"” go; undo brings it back.")
	a.view.dialog.Buttons = []ui.Button{{ID: "conflict/both", Text: "Keep both", Kind: ui.Primary}, {ID: "conflict/other", Text: "Take the other", Kind: ui.Framed}}
}

// takeOther shows the other window's version, as a step that undo takes back, and lets this window's go.
func (a *App) takeOther() {
	k, mine := &a.kept, a.doc.kept
	c, err := a.load(k.other)
	if err != nil {
		a.notify("The other window's version cannot be read; this one stays")
		return
	}
	a.show("the other window's version", c, k.other)
	if v, ok := k.versions[mine]; ok && k.store.Delete(mine, v.stamp) == nil {
		delete(k.versions, mine)
	}
}

// show replaces the case on the screen.
func (a *App) show(what string, c *casefile.Case, name string) {
	a.cancelDrags()
	a.endText()
	a.doc.replace(what, c, name)
	a.units = a.unitsNow()
	a.takeSelection()
	a.resetScrolls()
	a.dirty = true
}

// nameFor is the name that a case which arrived is kept under: that of a kept case with the same content, else one that
// is free.
func (a *App) nameFor(c *casefile.Case) string {
	data := c.Marshal()
	if v, ok := a.kept.versions[a.doc.kept]; ok && bytes.Equal(v.data, data) && bytes.Equal(a.doc.committed.Marshal(), data) {
		return a.doc.kept
	}
	list, _ := a.kept.store.List()
	for _, e := range list {
		if e.Size != len(data) {
			continue
		}
		if same, stamp, err := a.kept.store.Load(e.Name); err == nil && bytes.Equal(same, data) {
			a.kept.versions[e.Name] = version{stamp, same}
			return e.Name
		}
	}
	return a.freeName(c.Aeroplane.Name)
}

// freeName is a name that nothing is kept under: the one wished for, or with the first number that is free.
func (a *App) freeName(wish string) string {
	const room = 4 // " 999"
	base := keep.CleanName(wish, room)
	if base == "" {
		base = "Case"
	}
	taken := map[string]bool{"": true, a.doc.kept: true}
	if list, err := a.kept.store.List(); err == nil {
		for _, e := range list {
			taken[e.Name] = true
		}
	}
	for name := range a.kept.versions {
		taken[name] = true
	}
	stem, name := base, base
	if i := bytes.LastIndexByte([]byte(base), ' '); i > 0 { // "Marram 2" goes on as "Marram 3"
		if _, err := strconv.ParseUint(base[i+1:], 10, 16); err == nil {
			stem = base[:i]
		}
	}
	for n := 2; taken[name]; n++ {
		name = stem + " " + strconv.Itoa(n)
	}
	return name
}

// demo is the embedded case.
func demo() *casefile.Case {
	c, _, err := casefile.Parse(democase.JSON())
	if err != nil { // a fault of the build: the tests parse the demo
		panic("app: the embedded demo case does not parse: " + err.Error())
	}
	return c
}
