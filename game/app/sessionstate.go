package app

import "strings"

// sessionNow is how the screen was left, in words that takeSession understands: it outlives the program, the history does
// not. The palette is in it only when the person chose it.
func (a *App) sessionNow() string {
	words := make([]string, 0, 4)
	if a.view.screen == screenAeroplane {
		words = append(words, "aeroplane")
	} else {
		words = append(words, "chart")
	}
	if a.view.today {
		words = append(words, "today")
	}
	if a.view.palette {
		if a.view.night {
			words = append(words, "night")
		} else {
			words = append(words, "day")
		}
	}
	if a.view.marked {
		words = append(words, "limit/"+a.view.selected.String())
	}
	return strings.Join(words, " ")
}

// takeSession takes up how the screen was left; words that it does not know are passed over.
func (a *App) takeSession(session string) {
	for _, word := range strings.Fields(session) {
		switch word {
		case "aeroplane":
			a.view.screen = screenAeroplane
		case "today":
			a.view.today = true
		case "night", "day":
			a.view.palette, a.view.themed, a.view.night = true, true, word == "night"
		default:
			if name, ok := strings.CutPrefix(word, "limit/"); ok {
				if k, ok := keyNamed(name); ok {
					a.view.marked, a.view.selected = true, k
				}
			}
		}
	}
}
