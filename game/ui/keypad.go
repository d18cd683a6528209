package ui

import (
	"math"
	"strconv"
	"strings"
)

// KeypadConfig is what is asked for. Numbers are in the unit shown.
type KeypadConfig struct {
	ID       string // of the field or handle whose value is asked for
	Title    string
	Unit     string
	Now      string // the value so far, "760 kg"; "" none
	Range    string // what is allowed, "480 to 850 kg"
	Min, Max float64
	Decimals int
	Signed   bool
	None     string // text of the key that takes the value away, "No value"; "" it cannot be taken away
	// Check is the reason why a value is refused, "" if it is allowed. Without it Min..Max decides.
	Check func(v float64) string
}

// KeypadResult is what an action did.
type KeypadResult uint8

// The results.
const (
	KeypadSame      KeypadResult = iota
	KeypadChanged                // the entry, or what is said about it
	KeypadDone                   // Value is the new value, and allowed
	KeypadNone                   // the value is to be taken away
	KeypadCancelled              // nothing is to change
)

// maxDigits bounds an entry: whatever is typed stays far within what a float64 tells apart.
const maxDigits = 12

// Keypad is the entry of one number, by drawn keys or a keyboard. The zero value is closed.
type Keypad struct {
	KeypadConfig
	Open  bool
	entry string // "", digits with at most one point, "-" before them
	stern bool   // OK was refused: say so in red
}

// Begin opens the keypad with an empty entry.
func (k *Keypad) Begin(c KeypadConfig) {
	c.Decimals = min(max(0, c.Decimals), maxDigits-1)
	*k = Keypad{KeypadConfig: c, Open: true}
}

// Close closes the keypad.
func (k *Keypad) Close() { *k = Keypad{} }

// Entry is the entry as typed, in plain ASCII.
func (k *Keypad) Entry() string { return k.entry }

// Shown is the entry as drawn: thousands apart and a proper minus.
func (k *Keypad) Shown() string {
	sign, rest := "", k.entry
	if strings.HasPrefix(rest, "-") {
		sign, rest = "−", rest[1:]
	}
	whole, frac, point := strings.Cut(rest, ".")
	var b strings.Builder
	b.WriteString(sign)
	for i := range whole {
		if i > 0 && (len(whole)-i)%3 == 0 {
			b.WriteRune('\u202f')
		}
		b.WriteByte(whole[i])
	}
	if point {
		b.WriteByte('.')
	}
	b.WriteString(frac)
	return b.String()
}

// Value is the number entered; not ok while there is none yet. It is finite and never a negative zero.
func (k *Keypad) Value() (v float64, ok bool) {
	if strings.IndexFunc(k.entry, func(r rune) bool { return r >= '0' && r <= '9' }) < 0 {
		return 0, false
	}
	v, err := strconv.ParseFloat(k.entry, 64)
	if err != nil || math.IsInf(v, 0) || math.IsNaN(v) {
		return 0, false
	}
	if v == 0 {
		return 0, true // also for "-0"
	}
	return v, true
}

// Refusal is why the number entered is not allowed, "" if it is or there is none.
func (k *Keypad) Refusal() string {
	v, ok := k.Value()
	if !ok {
		return ""
	}
	if k.Check != nil {
		return k.Check(v)
	}
	unit := ""
	if k.Unit != "" {
		unit = " " + k.Unit
	}
	switch {
	case v < k.Min:
		return "At least " + plainNumber(k.Min, k.Decimals) + unit
	case v > k.Max:
		return "At most " + plainNumber(k.Max, k.Decimals) + unit
	}
	return ""
}

// plainNumber is a number without zeros at the end of its decimals.
func plainNumber(v float64, decimals int) string {
	s := FormatNumber(v, decimals)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	return s
}

// unfinished reports whether more digits may yet make the entry allowed.
func (k *Keypad) unfinished() bool {
	v, ok := k.Value()
	return ok && !strings.Contains(k.entry, ".") && math.Abs(v)*10 <= math.Max(math.Abs(k.Min), math.Abs(k.Max))
}

// Handle applies an action: a Tap on a drawn key, or a Press of a key of the keyboard.
func (k *Keypad) Handle(a Action) KeypadResult {
	if !k.Open {
		return KeypadSame
	}
	switch a.Kind {
	case Tap:
		return k.tapped(a)
	case Press:
		return k.pressed(a)
	}
	return KeypadSame
}

func (k *Keypad) tapped(a Action) KeypadResult {
	name, mine := strings.CutPrefix(a.ID, "key/")
	if !mine {
		return KeypadSame
	}
	switch name {
	case "ok":
		return k.done()
	case "cancel":
		return KeypadCancelled
	case "none":
		if k.None == "" {
			return KeypadSame
		}
		return KeypadNone
	case "entry":
		if a.Key == KeyEnter {
			return k.done()
		}
		return KeypadSame
	case "clear":
		return k.set("")
	case "backspace":
		return k.erase()
	case "sign":
		return k.typed('-')
	case "point":
		return k.typed('.')
	}
	if len(name) == 1 {
		return k.typed(rune(name[0]))
	}
	return KeypadSame
}

func (k *Keypad) pressed(a Action) KeypadResult {
	switch a.Key {
	case KeyEnter:
		return k.done()
	case KeyEscape:
		return KeypadCancelled
	case KeyBackspace:
		return k.erase()
	case KeyDelete:
		return k.set("")
	case KeyNone:
		return k.typed(a.Rune)
	}
	return KeypadSame
}

func (k *Keypad) set(entry string) KeypadResult {
	if entry == k.entry && !k.stern {
		return KeypadSame
	}
	k.entry, k.stern = entry, false
	return KeypadChanged
}

func (k *Keypad) erase() KeypadResult {
	if k.entry == "" {
		return KeypadSame
	}
	return k.set(k.entry[:len(k.entry)-1])
}

// typed takes in a digit, a decimal sign or a sign; what the grammar has no place for is dropped.
func (k *Keypad) typed(r rune) KeypadResult {
	sign, digits := "", k.entry
	if strings.HasPrefix(digits, "-") {
		sign, digits = "-", digits[1:]
	}
	switch r {
	case '-', '−', '+':
		if !k.Signed || r == '+' && sign == "" {
			return KeypadSame
		}
		if sign == "" {
			return k.set("-" + digits)
		}
		return k.set(digits)
	case '.', ',':
		if k.Decimals == 0 || strings.Contains(digits, ".") {
			return KeypadSame
		}
		if digits == "" {
			digits = "0"
		}
		return k.set(sign + digits + ".")
	}
	if r < '0' || r > '9' {
		return KeypadSame
	}
	whole, frac, point := strings.Cut(digits, ".")
	if point && len(frac) >= k.Decimals || len(whole)+len(frac) >= maxDigits {
		return KeypadSame
	}
	if digits == "0" {
		digits = "" // no leading zeros
	}
	return k.set(sign + digits + string(r))
}

func (k *Keypad) done() KeypadResult {
	if _, ok := k.Value(); !ok {
		return KeypadSame
	}
	if k.Refusal() == "" {
		return KeypadDone
	}
	if k.stern {
		return KeypadSame
	}
	k.stern = true
	return KeypadChanged
}
