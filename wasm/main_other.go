//go:build !js

package main

import (
	"fmt"
	"os"
)

func main() {
	fmt.Fprintln(os.Stderr, "this program runs in a browser: build it with GOOS=js GOARCH=wasm, or use make page")
	os.Exit(2)
}
