package casefile

import (
	"strconv"
	"strings"
)

// Fault is one thing wrong with a case: the key's path ("aeroplane.wing_area_m2", "runs[3].ias_mps"), the value
// as written ("" where the key is missing), and what is allowed.
type Fault struct{ Path, Value, Allowed string }

// Error is the fault in one line.
func (f Fault) Error() string { return f.Path + ": " + f.Text() }

// Text is the fault without its path, to be shown beside the field.
func (f Fault) Text() string {
	if f.Value == "" {
		return "missing; allowed: " + f.Allowed
	}
	return f.Value + " is refused; allowed: " + f.Allowed
}

// Faults is a list of them, as an error.
type Faults []Fault

// Error prints one line a fault.
func (f Faults) Error() string {
	lines := make([]string, len(f))
	for i := range f {
		lines[i] = f[i].Error()
	}
	if len(f) >= maxFaults {
		lines = append(lines, "further faults are not listed")
	}
	return strings.Join(lines, "\n")
}

// maxFaults is how many are listed; it keeps a hostile file cheap.
const maxFaults = 1000

// add records a fault; repeated ones of the same path and reason are kept once.
func (f *Faults) add(path, value, allowed string) {
	if len(*f) >= maxFaults {
		return
	}
	for i := range *f {
		if (*f)[i].Path == path && (*f)[i].Allowed == allowed {
			return
		}
	}
	*f = append(*f, Fault{path, value, allowed})
}

// orNil is the list as an error, nil when it is empty.
func (f Faults) orNil() error {
	if len(f) == 0 {
		return nil
	}
	return f
}

// SyntaxError says where a text stops being JSON. Line and Column count from 1; Column counts characters.
type SyntaxError struct {
	Line, Column int
	Reason       string
}

// Error is the reason with its place.
func (e *SyntaxError) Error() string {
	return "line " + strconv.Itoa(e.Line) + ", column " + strconv.Itoa(e.Column) + ": " + e.Reason
}

// VersionError says that the file or fragment was written by a newer program than this one.
type VersionError struct {
	Version string // as written
	Known   int    // the newest that this program reads
}

// Error names both versions.
func (e *VersionError) Error() string {
	return "version: " + e.Version + " is newer than this program reads (" + strconv.Itoa(e.Known) + "); open it with a newer levelspan"
}

// Warning is something kept but not understood (an unknown key).
type Warning struct{ Path, Text string }

// String is the warning in one line.
func (w Warning) String() string { return w.Path + ": " + w.Text }
