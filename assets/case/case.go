// Package democase holds the demo: the invented aeroplane Marram at the invented field Skerry Flat.
package democase

import _ "embed"

//go:embed marram.json
var marram []byte

// JSON is the demo's case file, in canonical form. The slice is the caller's.
func JSON() []byte { return append([]byte(nil), marram...) }
