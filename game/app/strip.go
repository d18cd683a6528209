package app

import (
	"math"
	"slices"
	"strings"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf"
)

// cautions are the warnings that hold now, the gravest first. What is always so (advisory only, what is not modelled)
// stands on the panel and behind the menu instead.
func (a *App) cautions() []string {
	texts := a.mirror.Warnings[:0]
	if a.solved.fault != "" {
		texts = append(texts, "These figures are stale: "+a.solved.fault)
	}
	on := &a.solved.answer.Cautions
	for _, c := range graveCautions {
		if on[c] {
			texts = append(texts, c.Text())
		}
	}
	for i := range on {
		c := perf.Caution(i)
		if on[i] && c != perf.CautionAdvisory && c != perf.CautionNotModelled && !slices.Contains(graveCautions[:], c) {
			texts = append(texts, c.Text())
		}
	}
	if text := a.troubleText(); text != "" {
		texts = append(texts, text)
	}
	return texts
}

// graveCautions come first.
var graveCautions = [...]perf.Caution{perf.CautionNoLevelFlight, perf.CautionClimbAboveNeverExceed, perf.CautionNearCeiling, perf.CautionAboveMaximumMass}

// drawStrip draws the cautions under the chart; without any, the day in one sentence. The caution of the tightest turn
// stands beside that turn in the panel, and here too only when the day is flown in a bank: it holds for most aeroplanes,
// and a strip that never clears is not read.
func (a *App) drawStrip(f *ui.Frame) {
	t, r := f.Theme, a.layout.strip
	texts := a.stripped[:0]
	for _, text := range a.mirror.Warnings {
		if text != perf.CautionTurnNearStall.Text() || a.solved.cond.Bank > 0 {
			texts = append(texts, text)
		}
	}
	a.stripped = texts
	in := ui.Trim(r, 0, a.layout.margin, 0, a.layout.margin)
	if len(texts) == 0 {
		f.Scene.FillRect(a.toEdges(r), 0, t.Bar)
		text, style := a.mirror.Summary, scene.Body
		for _, shorter := range [...]struct {
			text  string
			style scene.Style
		}{{text, scene.Small}, {a.day(), scene.Small}, {a.ends() + ".", scene.Small}} {
			if f.ParagraphHeight(style, in.W, text) <= r.H-8 {
				break
			}
			text, style = shorter.text, shorter.style
		}
		h := f.ParagraphHeight(style, in.W, text)
		f.Paragraph(style, scene.Rect{X: in.X, Y: r.Y + (r.H-h)/2, W: in.W, H: h}, text, t.Ink)
		return
	}
	f.Scene.FillRect(a.toEdges(r), 0, t.CautionBack)
	f.Scene.FillRect(scene.Rect{X: a.toEdges(r).X, Y: r.Y, W: 4, H: r.H}, 0, t.Caution)
	sign, words := ui.CutLeft(in, 40)
	f.Icon(ui.IconWarning, sign, 24, t.Caution)
	text := strings.Join(texts, " ")
	style, more := scene.Body, false
	if f.ParagraphHeight(style, words.W, text) > r.H-8 {
		style = scene.Small
	}
	h := f.ParagraphHeight(style, words.W, text)
	if more = h > r.H-6; more {
		words.W -= 40
		line := scene.LineHeight(style)
		h = math.Max(1, math.Floor((r.H-6)/line)) * line
	}
	second := 0.0
	if s := scene.LineHeight(scene.Small) + 2; !more && h+s <= r.H-10 && scene.Measure(scene.Small, a.mirror.Summary) <= words.W {
		second = s
	}
	y := r.Y + (r.H-h-second)/2
	f.Paragraph(style, scene.Rect{X: words.X, Y: y, W: words.W, H: h}, text, t.Ink)
	if second > 0 {
		f.Label(scene.Small, scene.Rect{X: words.X, Y: y + h + 2, W: words.W, H: second}, scene.Left, a.mirror.Summary, t.Muted)
	}
	if more {
		f.Icon(ui.IconRight, scene.Rect{X: words.X + words.W + 4, Y: r.Y, W: 36, H: r.H}, 20, t.Caution)
	}
	f.Add(ui.Control{ID: "cautions", Role: ui.RoleButton, Label: "Cautions", ValueText: text, Bounds: r, Hit: r})
}
