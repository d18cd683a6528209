package ui

import (
	"strings"
	"testing"
	"unicode/utf8"

	"levelspan/game/scene"
)

// checkWrap: every line fits or is a single character, and nothing but spaces and line feeds is lost.
func checkWrap(t *testing.T, text string, width float64) {
	t.Helper()
	lines := Wrap(scene.Body, text, width)
	for _, l := range lines {
		if scene.Measure(scene.Body, l) > width && utf8.RuneCountInString(l) > 1 {
			t.Fatalf("%q is wider than %v", l, width)
		}
	}
	squeeze := strings.NewReplacer(" ", "", "\n", "")
	if got, want := squeeze.Replace(strings.Join(lines, "")), squeeze.Replace(text); got != want {
		t.Fatalf("%q became %q", want, got)
	}
}

func TestWrap(t *testing.T) {
	text := "Level flight is not possible today: 3.2 kW short at 58 kt.\nBelow 612 kg it is."
	for _, w := range []float64{0, 1, 40, 100, 163, 240, 1000} {
		checkWrap(t, text, w)
	}
	if got := Wrap(scene.Body, text, 1e6); len(got) != 2 || got[1] != "Below 612 kg it is." {
		t.Errorf("%q", got)
	}
	if got := Wrap(scene.Body, "", 100); len(got) != 1 {
		t.Errorf("nothing is %q", got)
	}
	// Words stay whole where they fit.
	w := scene.Measure(scene.Body, "one two")
	if got := Wrap(scene.Body, "one two three", w); len(got) != 2 || got[0] != "one two" || got[1] != "three" {
		t.Errorf("%q", got)
	}
}

func TestEllipsis(t *testing.T) {
	full := "Steepest climb"
	if got := Ellipsis(scene.Body, full, 1000); got != full {
		t.Errorf("%q", got)
	}
	for w := 20.0; w < 100; w += 7 {
		got := Ellipsis(scene.Body, full, w)
		if !strings.HasSuffix(got, "…") || !strings.HasPrefix(full, strings.TrimSuffix(got, "…")) {
			t.Errorf("%q", got)
		}
		if scene.Measure(scene.Body, got) > w && utf8.RuneCountInString(got) > 2 {
			t.Errorf("%q wider than %v", got, w)
		}
	}
}

func TestTextEdit(t *testing.T) {
	e := TextEdit{ID: "n", Max: 8}
	e.Set("Mé\nrr\x00am, big tyres")
	if e.Text != "Mé rram," || e.Caret != len(e.Text) {
		t.Fatalf("%q %d", e.Text, e.Caret)
	}
	do := func(k Key, r rune) TextResult { return e.Handle(Action{Kind: Press, ID: "n", Key: k, Rune: r}) }
	if do(KeyNone, 'x') != TextSame {
		t.Error("grew beyond Max")
	}
	for _, s := range []struct {
		k     Key
		r     rune
		want  TextResult
		text  string
		caret int
	}{
		{KeyBackspace, 0, TextChanged, "Mé rram", 8}, {KeyHome, 0, TextMoved, "Mé rram", 0}, {KeyLeft, 0, TextSame, "Mé rram", 0},
		{KeyBackspace, 0, TextSame, "Mé rram", 0}, {KeyRight, 0, TextMoved, "Mé rram", 1}, {KeyRight, 0, TextMoved, "Mé rram", 3},
		{KeyBackspace, 0, TextChanged, "M rram", 1}, {KeyNone, 'å', TextChanged, "Må rram", 3}, {KeyDelete, 0, TextChanged, "Mårram", 3},
		{KeySpace, ' ', TextChanged, "Må rram", 4}, {KeyNone, '\x07', TextSame, "Må rram", 4}, {KeyEnd, 0, TextMoved, "Må rram", 8},
		{KeyDelete, 0, TextSame, "Må rram", 8}, {KeyEnter, 0, TextDone, "Må rram", 8}, {KeyEscape, 0, TextCancelled, "Må rram", 8},
	} {
		if got := do(s.k, s.r); got != s.want || e.Text != s.text || e.Caret != s.caret {
			t.Fatalf("key %d %q: %v %q %d, want %v %q %d", s.k, s.r, got, e.Text, e.Caret, s.want, s.text, s.caret)
		}
	}
	if e.Handle(Action{Kind: Type, ID: "n", Text: "Other"}) != TextChanged || e.Text != "Other" {
		t.Errorf("typed outside: %q", e.Text)
	}
	if e.Handle(Action{Kind: Type, ID: "m", Text: "?"}) != TextSame {
		t.Error("took another field's text")
	}
	e.CaretAt(scene.Body, 100, 100+scene.Measure(scene.Body, "Ot")+1)
	if e.Caret != 2 {
		t.Errorf("caret %d", e.Caret)
	}
	// A caret that points into a character, as after a change from outside, is mended.
	e.Text, e.Caret = "é", 1
	do(KeyNone, 'x')
	if !utf8.ValidString(e.Text) {
		t.Errorf("%q", e.Text)
	}
}
