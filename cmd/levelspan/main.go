// Command levelspan answers for a case file without a screen: every limit, ceiling and inverse answer for today, the share
// link and back, and the JSON Schema of the file.
package main

import "os"

func main() { os.Exit(doMain(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }
