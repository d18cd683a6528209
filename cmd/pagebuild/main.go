// Command pagebuild makes dist/: the page as one self-contained file, and the same page split for hosting. With
// -serve it shows the hosted one on the loopback address. The output depends only on the sources, the toolchain and
// the version.
package main

import (
	"context"
	"flag"
	"fmt"
	"io"
	"os"
	"os/signal"
)

func main() { os.Exit(doMain(os.Args[1:], os.Stdout, os.Stderr)) }

// doMain builds or serves; it gives the exit code: 0 done, 1 failed, 2 bad usage.
func doMain(args []string, out, errs io.Writer) int {
	flags := flag.NewFlagSet("pagebuild", flag.ContinueOnError)
	flags.SetOutput(errs)
	dir := flags.String("out", "dist", "directory to write into")
	wasm := flags.String("wasm", "", "a program already compiled, instead of compiling one")
	program := flags.String("program", "levelspan/wasm", "the package to compile for the page")
	version := flags.String("version", "", "version shown (default: git describe, else \"dev\")")
	withBrotli := flags.Bool("brotli", true, "also compress for hosting with the brotli command, if it is there; slow")
	slim := flags.Bool("slim", true, "link the program with the drawing library's shaders made beforehand: a quarter smaller")
	serve := flags.String("serve", "", "serve OUT/site on this loopback address instead of building, such as 127.0.0.1:8080")
	open := flags.Bool("open", false, "with -serve: open a browser where there is one")
	seconds := flags.Int("seconds", 0, "with -serve: stop after so many seconds (0: until interrupted)")
	if err := flags.Parse(args); err != nil {
		return 2
	}
	if flags.NArg() > 0 {
		fmt.Fprintf(errs, "pagebuild: unexpected argument %q\n", flags.Arg(0))
		return 2
	}
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	var err error
	if *serve != "" {
		err = serveSite(ctx, *dir+"/site", *serve, *seconds, *open, out)
	} else {
		err = build(ctx, options{dir: *dir, wasm: *wasm, program: *program, version: *version, brotli: *withBrotli, slim: *slim}, out)
	}
	if err != nil {
		fmt.Fprintln(errs, "pagebuild:", err)
		return 1
	}
	return 0
}
