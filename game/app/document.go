package app

import (
	"bytes"
	"reflect"

	"levelspan/perf/casefile"
)

// historyDepth bounds how many steps can be undone; older ones are forgotten first.
const historyDepth = 200

// document is the case on the screen and the steps that led to it. A committed case is never changed in place: an
// edit works on a clone and a drag on a working copy that is committed as one step when the last finger lifts.
type document struct {
	committed *casefile.Case // what the last finished step left
	current   *casefile.Case // what is shown: committed, or the working copy of a drag
	past      []step         // oldest first
	future    []step         // next to redo last
	revision  uint64         // rises with every change of current
	run       string         // the run that the last step belongs to, "" none
	shape     uint64         // rises when more than today's mass and air may have changed
	kept      string         // the name that the committed case is kept under, "" none yet
}

// step is one change that can be undone.
type step struct {
	what string         // in words: "weight", "wing area"
	doc  *casefile.Case // the case on the other side of the step
	kept string         // the name that it is kept under
}

func newDocument(c *casefile.Case) document {
	return document{committed: c, current: c, revision: 1, shape: 1}
}

// edit applies change to a clone and commits it as one step. When change or validation refuses, nothing has changed
// and the error says why.
func (d *document) edit(what string, change func(c *casefile.Case) error) error {
	return d.editRun(what, "", change)
}

// editRun is edit, but steps of one run that follow each other make one step of the history: the keys of a text, the
// presses of an arrow.
func (d *document) editRun(what, run string, change func(c *casefile.Case) error) error {
	d.settle("")
	next := d.committed.Clone()
	if err := change(next); err != nil {
		return err
	}
	if err := next.Validate(); err != nil {
		return err
	}
	d.commitRun(what, run, next)
	return nil
}

// nameLast names the last step.
func (d *document) nameLast(what string) {
	if n := len(d.past); n > 0 {
		d.past[n-1].what = what
	}
}

// replace puts a whole other case in place, kept under a name of its own, as one step that can be undone.
func (d *document) replace(what string, next *casefile.Case, kept string) {
	d.settle("")
	if kept == d.kept {
		d.commitRun(what, "", next)
		return
	}
	d.push(what, "", next)
	d.kept = kept
}

// rename says that what was kept under one name is kept under another, now and in every step.
func (d *document) rename(from, to string) {
	if d.kept == from {
		d.kept = to
	}
	for _, steps := range [...][]step{d.past, d.future} {
		for i := range steps {
			if steps[i].kept == from {
				steps[i].kept = to
			}
		}
	}
}

func (d *document) commitRun(what, run string, next *casefile.Case) {
	if bytes.Equal(next.Marshal(), d.committed.Marshal()) {
		if d.current != d.committed {
			d.current = d.committed
			d.revision++
		}
		return
	}
	if len(next.Runs) > 0 && reflect.DeepEqual(next.Runs, d.committed.Runs) {
		next.Runs = d.committed.Runs // committed cases are not changed in place: many steps can share many runs
	}
	d.push(what, run, next)
}

// push makes next the committed case, and the one before it a step back.
func (d *document) push(what, run string, next *casefile.Case) {
	if run == "" || run != d.run || len(d.past) == 0 {
		d.past = append(d.past, step{what, d.committed, d.kept})
	}
	d.run = run
	if len(d.past) > historyDepth {
		d.past = append(d.past[:0], d.past[len(d.past)-historyDepth:]...)
	}
	d.future = d.future[:0]
	d.committed, d.current = next, next
	d.revision++
	d.shape++
}

// work is the copy that a drag changes in place; whoever changes it calls moved.
func (d *document) work() *casefile.Case {
	if d.current == d.committed {
		d.current = d.committed.Clone()
	}
	return d.current
}

// moved says that the working copy has changed in today's mass or air.
func (d *document) moved() { d.revision++ }

// settle ends a drag: the working copy becomes one step.
func (d *document) settle(what string) { d.settleRun(what, "") }

func (d *document) settleRun(what, run string) {
	if d.current == d.committed {
		return
	}
	if what == "" {
		what = "drag"
	}
	shape := d.shape
	d.commitRun(what, run, d.current)
	d.shape = shape // a drag changes only today's mass and air
}

// abandon ends a drag as if it had never begun.
func (d *document) abandon() {
	if d.current != d.committed {
		d.current = d.committed
		d.revision++
	}
}

// undo goes back one step and returns its name, "" when there is none.
func (d *document) undo() string {
	d.settle("")
	return d.travel(&d.past, &d.future)
}

// redo goes forward one step and returns its name, "" when there is none.
func (d *document) redo() string {
	d.settle("")
	return d.travel(&d.future, &d.past)
}

func (d *document) travel(from, to *[]step) string {
	n := len(*from)
	d.run = ""
	if n == 0 {
		return ""
	}
	s := (*from)[n-1]
	*from = (*from)[:n-1]
	*to = append(*to, step{s.what, d.committed, d.kept})
	d.committed, d.current, d.kept = s.doc, s.doc, s.kept
	d.revision++
	d.shape++
	return s.what
}

// nextUndo names the step that undo would take back, "" none.
func (d *document) nextUndo() string { return lastName(d.past) }

// nextRedo names the step that redo would bring back, "" none.
func (d *document) nextRedo() string { return lastName(d.future) }

func lastName(steps []step) string {
	if len(steps) == 0 {
		return ""
	}
	return steps[len(steps)-1].what
}
