//go:build !js

package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"image"
	"image/color"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// command runs the levelspan command and gives what it prints.
func (b *tab) command(stdin string, args ...string) string {
	b.t.Helper()
	out, err := b.tryCommand(stdin, args...)
	b.check(err)
	return out
}

// tryCommand is command where being refused is an answer too.
func (b *tab) tryCommand(stdin string, args ...string) (string, error) {
	b.t.Helper()
	buildAll(b.t)
	cmd := exec.Command(built.command, args...)
	cmd.Stdin = strings.NewReader(stdin)
	var errs bytes.Buffer
	cmd.Stderr = &errs
	out, err := cmd.Output()
	if err != nil && cmd.ProcessState.ExitCode() != 1 {
		return "", fmt.Errorf("levelspan %s: %w\n%s", strings.Join(args, " "), err, errs.String())
	}
	return string(out), nil
}

// marram is the demonstration's case file.
func marram(t *testing.T) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "assets", "case", "marram.json"))
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// quoted is a text as JSON and as a script.
func quoted(s string) string {
	text, _ := json.Marshal(s)
	return string(text)
}

// activate does what a screen reader does: it activates a control's element without a pointer.
func (b *tab) activate(id string) {
	b.t.Helper()
	b.control(id)
	name, _ := json.Marshal(id)
	eval[bool](b, fmt.Sprintf("document.querySelector('[data-control=' + CSS.escape(%s) + ']').click(), true", name))
	b.settle()
}

// fragment is the share link's fragment for the case that the page shows, by its own Share button.
func (b *tab) fragment() string {
	b.t.Helper()
	eval[bool](b, "document.getElementById('levelspan-copied').textContent = '', true")
	b.clickOn("share")
	b.clickOn("share/link")
	b.until("document.getElementById('levelspan-copied').textContent")
	_, fragment, found := strings.Cut(eval[string](b, "document.getElementById('levelspan-copied').textContent"), "#case=")
	if !found {
		b.t.Fatal("the link copied has no case in it")
	}
	return fragment
}

// caseFile is the case that the page shows, as a file.
func (b *tab) caseFile() string {
	b.t.Helper()
	return b.command("", "open", b.fragment())
}

// row is a limit as the mirror has it.
type row struct {
	Key, Value, SetBy string
	CAS, TAS, IAS     string
	Low, High         string
}

func (b *tab) rows() []row {
	b.t.Helper()
	text := eval[string](b, `JSON.stringify([...document.querySelectorAll('#levelspan-limits tr[data-key]')].map(r => {
		const v = r.querySelector('[data-cas-mps]'); return {Key: r.dataset.key, Value: v.textContent, SetBy: r.children[3].textContent,
		CAS: v.dataset.casMps, TAS: v.dataset.tasMps, IAS: v.dataset.iasMps,
		Low: v.dataset.low || '', High: v.dataset.high || ''}; }))`)
	var rows []row
	if err := json.Unmarshal([]byte(text), &rows); err != nil {
		b.t.Fatal(err)
	}
	return rows
}

// same reports whether two numbers are the same speed: printed digits apart from the last of sixteen, where the
// processor's own exponential may differ from WebAssembly's.
func same(shown string, want float64) bool {
	var v float64
	if _, err := fmt.Sscan(shown, &v); err != nil {
		return false
	}
	return math.Abs(v-want) <= 1e-12*math.Abs(want)
}

// agree demands that the page's table is that of levelspan limits for the same case, figure by figure, and gives the
// case.
func (b *tab) agree(after string) string {
	b.t.Helper()
	file := b.caseFile()
	var answer struct {
		Air    map[string]float64
		Limits []struct {
			Key string  `json:"key"`
			CAS float64 `json:"cas_mps"`
			TAS float64 `json:"tas_mps"`
			IAS float64 `json:"ias_mps"`

			Interval []float64 `json:"interval_cas_mps"`
		}
	}
	if err := json.Unmarshal([]byte(b.command(file, "limits", "-", "--json")), &answer); err != nil {
		b.t.Fatal(err)
	}
	rows, table := b.rows(), printed(b.command(file, "limits", "-"))
	if len(rows) != len(answer.Limits) || len(table) != len(answer.Limits) || len(rows) == 0 {
		b.t.Fatalf("after %s: the page has %d limits, the command %d, its table %d", after, len(rows), len(answer.Limits), len(table))
	}
	const knot = 1852.0 / 3600
	for k, l := range answer.Limits {
		i := slices.IndexFunc(rows, func(r row) bool { return r.Key == l.Key })
		if i < 0 {
			b.t.Errorf("after %s: the page lacks %s", after, l.Key)
			continue
		}
		r := rows[i]
		if !same(r.CAS, l.CAS) || !same(r.TAS, l.TAS) || !same(r.IAS, l.IAS) {
			b.t.Errorf("after %s: %s is %s %s %s on the page (CAS, TAS, IAS), %v %v %v from the command", after, l.Key, r.CAS, r.TAS, r.IAS, l.CAS, l.TAS, l.IAS)
		}
		if shown := r.Low != "" && r.High != ""; shown != (len(l.Interval) == 2) {
			b.t.Errorf("after %s: %s has the interval %q to %q on the page, %v from the command", after, l.Key, r.Low, r.High, l.Interval)
		} else if shown {
			for n, text := range []string{r.Low, r.High} {
				if v, err := strconv.ParseFloat(text, 64); err != nil || math.Abs(v-l.Interval[n]) > 1e-6*v {
					b.t.Errorf("after %s: %s has the interval %s to %s on the page, %v from the command", after, l.Key, r.Low, r.High, l.Interval)
				}
			}
		}
		if want := fmt.Sprintf("%.0f", l.CAS/knot); !strings.HasPrefix(r.Value, want) {
			b.t.Errorf("after %s: %s is shown as %s, and is %s kt", after, l.Key, r.Value, want)
		}
		// The table has the limits in the same order, to a tenth of a knot, and says what sets them in the page's words.
		if got := tenths(r.CAS) + tenths(r.IAS) + tenths(r.TAS) + r.SetBy; got != table[k] {
			b.t.Errorf("after %s: %s is %s on the page, %s in the command's table", after, l.Key, got, table[k])
		}
	}
	if got := b.attribute("[data-key=density_altitude]", "data-value"); !same(got, answer.Air["density_altitude_m"]) {
		b.t.Errorf("after %s: density altitude %s on the page, %v from the command", after, got, answer.Air["density_altitude_m"])
	}
	return file
}

// tenths is a speed of the mirror in knots as the command's table prints it, with a space after it.
func tenths(mps string) string {
	var v float64
	fmt.Sscan(mps, &v)
	return fmt.Sprintf("%.1f ", v*3600/1852)
}

// printed is the table that levelspan limits prints, a line a limit: CAS, IAS, TAS, what sets it.
func printed(text string) (rows []string) {
	spans := regexp.MustCompile(`[0-9.]+ to [0-9.]+`) // the intervals are compared by the JSON
	column := -1
	for line := range strings.Lines(text) {
		r := []rune(strings.TrimSuffix(line, "\n"))
		if i := strings.Index(line, "set by"); strings.HasPrefix(line, "Speed, kt") && i > 0 {
			column = len([]rune(line[:i]))
			continue
		}
		if column < 0 {
			continue
		}
		if len(r) == 0 {
			break
		}
		word := ""
		if len(r) > column && r[column] != ' ' {
			word, _, _ = strings.Cut(string(r[column:]), "  ")
		}
		figures := strings.Fields(spans.ReplaceAllString(string(r[:min(column, len(r))]), ""))
		rows = append(rows, strings.Join(figures[max(0, len(figures)-3):], " ")+" "+word)
	}
	return rows
}

// handle is the value of a slider, SI.
func (b *tab) handle(name string) (v float64) {
	b.t.Helper()
	if _, err := fmt.Sscan(b.attribute("[role=slider][data-handle="+name+"]", "aria-valuenow"), &v); err != nil {
		b.t.Fatalf("handle %s: %v", name, err)
	}
	return v
}

// ink counts the pixels of a part of a picture, given in logical pixels, that differ clearly from its commonest colour.
func ink(img image.Image, p place, scale float64) int {
	at := func(x, y int) [3]uint8 {
		c := color.RGBAModel.Convert(img.At(x, y)).(color.RGBA)
		return [3]uint8{c.R, c.G, c.B}
	}
	part := image.Rect(int(p.X*scale), int(p.Y*scale), int((p.X+p.W)*scale), int((p.Y+p.H)*scale)).Intersect(img.Bounds())
	counts := map[[3]uint8]int{}
	for y := part.Min.Y; y < part.Max.Y; y++ {
		for x := part.Min.X; x < part.Max.X; x++ {
			counts[at(x, y)]++
		}
	}
	var ground [3]uint8
	most := 0
	for c, n := range counts {
		if n > most {
			ground, most = c, n
		}
	}
	n := 0
	for c, count := range counts {
		far := 0
		for i := range c {
			far = max(far, int(math.Abs(float64(c[i])-float64(ground[i]))))
		}
		if far > 60 {
			n += count
		}
	}
	return n
}
