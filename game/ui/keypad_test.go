package ui

import (
	"testing"

	"levelspan/game/scene"
)

func typeInto(k *Keypad, text string) KeypadResult {
	result := KeypadSame
	for _, r := range text {
		a := Action{Kind: Press, Rune: r}
		switch r {
		case '<':
			a = Action{Kind: Press, Key: KeyBackspace}
		case '!':
			a = Action{Kind: Press, Key: KeyEnter}
		case '~':
			a = Action{Kind: Press, Key: KeyDelete}
		}
		result = k.Handle(a)
	}
	return result
}

func TestKeypadGrammar(t *testing.T) {
	for _, c := range []struct {
		typed, entry, shown string
		value               float64
		ok                  bool
	}{
		{"760", "760", "760", 760, true},
		{"14000", "14000", "14\u202f000", 14000, true},
		{"-12,5", "-12.5", "−12.5", -12.5, true},
		{"12-", "-12", "−12", -12, true},
		{"12--", "12", "12", 12, true},
		{"-12+", "12", "12", 12, true},
		{"+12", "12", "12", 12, true},
		{"007", "7", "7", 7, true},
		{"0.07", "0.07", "0.07", 0.07, true},
		{".5", "0.5", "0.5", 0.5, true},
		{"1.2.3", "1.23", "1.23", 1.23, true},
		{"1.239", "1.23", "1.23", 1.23, true},
		{"5.", "5.", "5.", 5, true},
		{"-", "-", "−", 0, false},
		{"", "", "", 0, false},
		{"12<", "1", "1", 1, true},
		{"12<<<", "", "", 0, false},
		{"12~", "", "", 0, false},
		{"-0", "-0", "−0", 0, true},
		{"1e9x", "19", "19", 19, true},
		{"1234567890123456", "123456789012", "123\u202f456\u202f789\u202f012", 123456789012, true},
	} {
		var k Keypad
		k.Begin(KeypadConfig{Decimals: 2, Signed: true, Min: -1e13, Max: 1e13})
		typeInto(&k, c.typed)
		v, ok := k.Value()
		if k.Entry() != c.entry || k.Shown() != c.shown || v != c.value || ok != c.ok {
			t.Errorf("%q: entry %q, shown %q, value %v %v", c.typed, k.Entry(), k.Shown(), v, ok)
		}
	}
}

func TestKeypadRefuses(t *testing.T) {
	var k Keypad
	k.Begin(KeypadConfig{Unit: "kg", Min: 480, Max: 850.5, Decimals: 1})
	if typeInto(&k, "!") != KeypadSame {
		t.Error("an empty entry was taken")
	}
	typeInto(&k, "7")
	if k.Refusal() != "At least 480 kg" || !k.unfinished() {
		t.Errorf("%q, unfinished %v", k.Refusal(), k.unfinished())
	}
	typeInto(&k, "60")
	if k.Refusal() != "" {
		t.Errorf("%q", k.Refusal())
	}
	typeInto(&k, "0")
	if k.Refusal() != "At most 850.5 kg" || k.unfinished() {
		t.Errorf("%q, unfinished %v", k.Refusal(), k.unfinished())
	}
	if got := typeInto(&k, "!"); got != KeypadChanged {
		t.Errorf("OK on a refused entry: %v", got)
	}
	if got := typeInto(&k, "<!"); got != KeypadDone {
		t.Errorf("OK on an allowed entry: %v", got)
	}
	k.Begin(KeypadConfig{Check: func(v float64) string { return "Never" }})
	typeInto(&k, "5")
	if k.Refusal() != "Never" || typeInto(&k, "!") == KeypadDone {
		t.Error("Check was not asked")
	}
}

// Drawn keys mean what the keyboard's do: a tap in the middle of each.
func TestKeypadByTouch(t *testing.T) {
	for _, size := range []scene.Rect{{W: 1280, H: 800}, {W: 800, H: 1280}, {W: 390, H: 844}, {W: 844, H: 390}, {W: 320, H: 480}} {
		var k Keypad
		var r Router
		k.Begin(KeypadConfig{Title: "Temperature", Unit: "°C", Min: -60, Max: 60, Decimals: 1, Signed: true, None: "No value"})
		results := map[string]KeypadResult{}
		for _, id := range []string{"key/4", "key/2", "key/point", "key/5", "key/6", "key/backspace", "key/sign", "key/1", "key/ok"} {
			var s scene.Scene
			s.Reset(size.W, size.H, 1, scene.Color{})
			var f Frame
			f.Begin(&s, Day(), &r)
			k.Draw(&f, size, size, scene.Rect{})
			c := find(f.Controls, id)
			x, y := c.Bounds.X+c.Bounds.W/2, c.Bounds.Y+c.Bounds.H/2
			for _, a := range r.Route(nil, []Event{down(1, x, y, 0), up(1, x, y, 0)}, f.Controls, 0) {
				if a.Kind == Tap {
					results[id] = k.Handle(a)
				}
			}
		}
		if v, _ := k.Value(); v != -42.1 || results["key/ok"] != KeypadDone {
			t.Errorf("%v: %q, OK %v", size, k.Entry(), results["key/ok"])
		}
		for id, want := range map[string]KeypadResult{"key/cancel": KeypadCancelled, "key/none": KeypadNone, "key/clear": KeypadChanged, "key/entry": KeypadSame, "other": KeypadSame} {
			if got := k.Handle(Action{Kind: Tap, ID: id}); got != want {
				t.Errorf("%s: %v, want %v", id, got, want)
			}
		}
	}
}

// Enter with the focus on the entry, where it is when the keypad opens, means OK.
func TestKeypadByKeyboard(t *testing.T) {
	var k Keypad
	var r Router
	k.Begin(KeypadConfig{Title: "Weight", Min: 0, Max: 900})
	var s scene.Scene
	s.Reset(1280, 800, 1, scene.Color{})
	var f Frame
	f.Begin(&s, Day(), &r)
	k.Draw(&f, scene.Rect{W: 1280, H: 800}, scene.Rect{W: 1280, H: 800}, scene.Rect{})
	last := KeypadSame
	for _, a := range r.Route(nil, []Event{{Kind: KeyDown, Rune: '7'}, {Kind: KeyDown, Rune: '5'}, key(KeyEnter)}, f.Controls, 0) {
		last = k.Handle(a)
	}
	if v, _ := k.Value(); v != 75 || last != KeypadDone {
		t.Errorf("%q, last %v", k.Entry(), last)
	}
	k.Close()
	if k.Handle(Action{Kind: Tap, ID: "key/7"}) != KeypadSame || k.Entry() != "" {
		t.Error("a closed keypad takes keys")
	}
}
