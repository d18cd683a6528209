package casefile

import (
	"encoding/json"
	"errors"
	"reflect"
	"strings"
	"testing"
)

// What this reader takes and refuses, held against encoding/json, which reads the same language.
func TestParseJSONAgreesWithTheStandardLibrary(t *testing.T) {
	texts := []string{
		`{}`, `[]`, `0`, `-0`, `-0.5e+10`, `1E5`, `"a"`, `"\u00e9\n\t\"\\\/\b\f\r"`, `"\ud83d\ude00"`, `true`, `false`, `null`, ` [1, 2 ,{"a" : [] }] `, "\t{\"k\":\n\"v\"}\r\n",
		`{"a":{"b":[1,[2,[3]]]}}`, `[1e999]`, `"é€😀"`,
		``, ` `, `{`, `}`, `[`, `]`, `{"a"}`, `{"a":}`, `{"a":1,}`, `[1,]`, `[,]`, `{,}`, `01`, `-`, `1.`, `.5`, `1e`, `1e+`, `+1`, `0x1`, `nul`, `tru`, `"`, `"\`, `"\x"`, `"\u12"`, `"\u12g4"`,
		"\"a\nb\"", "\"\x01\"", `{} {}`, `1 2`, `{a:1}`, `{'a':1}`, `[1 2]`, `{"a":1 "b":2}`, `//x`, `"a" b`, `[}`, `{]`,
	}
	for _, s := range texts {
		var want any
		wantErr := json.Unmarshal([]byte(s), &want)
		if wantErr != nil && strings.Contains(wantErr.Error(), "cannot unmarshal number") {
			wantErr = nil // a matter of the number's type, not of the language
		}
		n, err := parseJSON([]byte(s))
		if (err == nil) != (wantErr == nil) {
			t.Errorf("%q: error %v, encoding/json says %v", s, err, wantErr)
			continue
		}
		if err != nil {
			var syntax *SyntaxError
			if !errors.As(err, &syntax) || syntax.Line < 1 || syntax.Column < 1 || syntax.Reason == "" {
				t.Errorf("%q: %v is no SyntaxError with a place", s, err)
			}
			continue
		}
		if s == `[1e999]` {
			continue
		}
		for _, printed := range [][]byte{appendCompact(nil, &n), appendPretty(nil, &n, 0)} {
			var got any
			if err := json.Unmarshal(printed, &got); err != nil || !reflect.DeepEqual(got, want) {
				t.Errorf("%q prints as %q: %v", s, printed, err)
			}
		}
	}
}

// Where this reader is deliberately narrower or wider than encoding/json.
func TestParseJSONOnItsOwn(t *testing.T) {
	for _, s := range []string{`"\ud800"`, `"\udc00"`, `"\ud800\u0041"`, "\"\xff\"", strings.Repeat("[", maxDepth+2) + strings.Repeat("]", maxDepth+2), strings.Repeat("[", 1000000)} {
		if _, err := parseJSON([]byte(s)); err == nil {
			t.Errorf("%.20q is taken", s)
		}
	}
	for _, s := range []string{`NaN`, `[Infinity,-Infinity]`, "\xef\xbb\xbf{}", strings.Repeat("[", maxDepth) + strings.Repeat("]", maxDepth)} {
		if _, err := parseJSON([]byte(s)); err != nil {
			t.Errorf("%.20q: %v", s, err)
		}
	}
	if _, err := parseJSON(make([]byte, maxFileSize+1)); err == nil {
		t.Error("a file above the bound is read")
	}
}

func TestSyntaxErrorsHaveTheirPlace(t *testing.T) {
	for _, x := range []struct {
		text         string
		line, column int
		reason       string
	}{
		{"{\n  \"a\": 1,\n  \"b\" 2\n}", 3, 7, "colon"},
		{"{\"é\": tru}", 1, 7, "value"},
		{"{\"a\": 1", 1, 8, "cut short"},
		{"{\"a\": \"b\n\"}", 1, 9, "closing quote"},
		{"[1]\nx", 2, 1, "follows"},
		{"", 1, 1, "empty"},
		{"[00]", 1, 2, "needless 0"},
	} {
		_, err := parseJSON([]byte(x.text))
		var e *SyntaxError
		if !errors.As(err, &e) || e.Line != x.line || e.Column != x.column || !strings.Contains(e.Reason, x.reason) {
			t.Errorf("%q: %v, want line %d, column %d, %q", x.text, err, x.line, x.column, x.reason)
		}
	}
}

func TestPrettyKeepsSmallThingsOnOneLine(t *testing.T) {
	n, err := parseJSON([]byte(`{"a":{"x":1,"y":"z"},"b":[1,2,3],"c":[{"k":1},{"k":[2]}],"d":{},"e":[],"f":["` + strings.Repeat("long", 30) + `"]}`))
	if err != nil {
		t.Fatal(err)
	}
	want := `{
  "a": {"x": 1, "y": "z"},
  "b": [1, 2, 3],
  "c": [
    {"k": 1},
    {
      "k": [2]
    }
  ],
  "d": {},
  "e": [],
  "f": [
    "` + strings.Repeat("long", 30) + `"
  ]
}`
	if got := string(appendPretty(nil, &n, 0)); got != want {
		t.Errorf("got:\n%s\nwant:\n%s", got, want)
	}
}
