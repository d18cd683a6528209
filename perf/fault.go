package perf

import (
	"errors"
	"strconv"
)

// DomainError is one input that the model cannot take.
type DomainError struct {
	Key      string   // path from the type that was validated, "Polar.ParasiteDrag" or "Configurations[1].MaximumLift"
	Quantity Quantity // what it is
	Value    float64  // as given, SI
	Min, Max float64  // allowed, SI; both 0 where Reason says it all
	Reason   string   // "" where the range says it all
}

// Error names the quantity, the value and what is allowed.
func (e *DomainError) Error() string {
	d := e.Quantity.Domain()
	s := e.Key + ": " + d.Name + " " + number(e.Value)
	if d.Unit != "" {
		s += " " + d.Unit
	}
	if e.Reason != "" {
		s += ": " + e.Reason
		if e.Min == 0 && e.Max == 0 {
			return s
		}
		return s + " (allowed " + number(e.Min) + " to " + number(e.Max) + ")"
	}
	return s + " is outside " + number(e.Min) + " to " + number(e.Max)
}

func number(x float64) string { return strconv.FormatFloat(x, 'g', 6, 64) }

// Faults takes the error of Validate, Solve or an air function apart. It is nil for an error of another kind.
func Faults(err error) []*DomainError {
	if err == nil {
		return nil
	}
	if e, ok := err.(interface{ Unwrap() []error }); ok {
		var all []*DomainError
		for _, e := range e.Unwrap() {
			all = append(all, Faults(e)...)
		}
		return all
	}
	var d *DomainError
	if errors.As(err, &d) {
		return []*DomainError{d}
	}
	return nil
}

// faults collects; empty it costs nothing.
type faults []error

func (f *faults) check(key string, q Quantity, x float64) {
	if d := q.Domain(); !d.Holds(x) {
		f.add(key, q, x, d.Min, d.Max, "")
	}
}

// optional is check for an input where 0 means that there is none.
func (f *faults) optional(key string, q Quantity, x float64) {
	if x != 0 {
		f.check(key, q, x)
	}
}

func (f *faults) add(key string, q Quantity, x, low, high float64, reason string) {
	*f = append(*f, &DomainError{key, q, x, low, high, reason})
}

// row is check for a field of a list's element; the key is only spelt where there is a fault.
func (f *faults) row(list string, i int, field string, q Quantity, x float64) {
	if d := q.Domain(); !d.Holds(x) {
		f.add(rowKey(list, i, field), q, x, d.Min, d.Max, "")
	}
}

func rowKey(list string, i int, field string) string {
	return list + "[" + strconv.Itoa(i) + "]." + field
}

func (f faults) err() error {
	if len(f) == 0 {
		return nil
	}
	return errors.Join(f...)
}
