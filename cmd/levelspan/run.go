package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"runtime/debug"
	"slices"
	"strconv"
	"strings"

	"levelspan/perf/casefile"
	"levelspan/perf/casefile/report"
)

// The exit codes, from contract.md.
const (
	done     = 0
	noAnswer = 1 // the case is well formed, and level flight is not possible
	failed   = 2 // bad usage, unreadable or unphysical input
)

const usage = `usage:
  levelspan limits CASE.json [--json] [--gradient G]
                                every limit, ceiling and inverse answer for "today";
                                G asks how much still climbs at that gradient, as 0.033
  levelspan fit CASE.json [--json]
                                the aeroplane's numbers from its runs, with 95 % intervals
  levelspan link CASE.json      the share link's fragment
  levelspan open FRAGMENT       the case of a fragment, or of a whole link
  levelspan schema              the JSON Schema of a case file
  levelspan version
- in place of CASE.json or FRAGMENT reads standard input.
Exit status: 0 done; 1 no level flight is possible, or the fit did not converge (the answer printed says why); 2 bad usage or input.
`

// maxInput bounds what is read: the case file's own bound, and one byte to notice more.
const maxInput = 16<<20 + 1

// console is the outside world of one run.
type console struct {
	in       io.Reader
	out, err io.Writer
}

// doMain is the command; it returns the exit code.
func doMain(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	c := &console{stdin, stdout, stderr}
	if len(args) == 0 {
		fmt.Fprint(stderr, usage)
		return failed
	}
	name, rest := args[0], args[1:]
	switch name {
	case "limits":
		return c.limits(rest)
	case "fit":
		return c.fit(rest)
	case "link":
		return c.link(rest)
	case "open":
		return c.open(rest)
	case "schema", "version":
		if len(rest) > 0 {
			return c.misused(name + " takes no argument: " + strconv.Quote(rest[0]))
		}
		if name == "schema" {
			return c.print(casefile.Schema())
		}
		return c.print([]byte(version()))
	case "help", "-h", "--help":
		return c.print([]byte(usage))
	}
	return c.misused("no such command: " + strconv.Quote(name))
}

func (c *console) misused(what string) int {
	fmt.Fprintf(c.err, "levelspan: %s\n%s", what, usage)
	return failed
}

// print writes a result; a result that cannot be written is a failure.
func (c *console) print(text []byte) int {
	if _, err := c.out.Write(text); err != nil {
		fmt.Fprintf(c.err, "levelspan: standard output: %v\n", err)
		return failed
	}
	return done
}

// fail prints an error, one line a fault, each with where it comes from.
func (c *console) fail(where string, err error) int {
	var faults casefile.Faults
	if errors.As(err, &faults) {
		for _, line := range strings.Split(faults.Error(), "\n") {
			fmt.Fprintf(c.err, "%s: %s\n", where, line)
		}
		return failed
	}
	fmt.Fprintf(c.err, "%s: %s\n", where, strings.ReplaceAll(err.Error(), "\n", " "))
	return failed
}

// arguments are what a command was given.
type arguments struct {
	operands []string
	json     bool
	gradient string
	set      bool // gradient
}

// parse takes the flags that a command has, before or after the operands; "--" ends the flags, and "-" is an operand.
func parse(args []string, flags ...string) (a arguments, problem string) {
	has := func(name, flag string) bool {
		return slices.Contains(flags, flag) && (name == flag || name == flag[1:])
	}
	for i := 0; i < len(args); i++ {
		s := args[i]
		name, value, joined := strings.Cut(s, "=")
		switch {
		case s == "--":
			a.operands = append(a.operands, args[i+1:]...)
			return a, ""
		case s == "-" || !strings.HasPrefix(s, "-"):
			a.operands = append(a.operands, s)
		case has(s, "--json"):
			a.json = true
		case has(name, "--gradient"):
			if !joined {
				i++
				if i == len(args) {
					return a, "--gradient needs a value, as 0.033"
				}
				value = args[i]
			}
			a.gradient, a.set = value, true
		default:
			return a, "no such flag: " + strconv.Quote(s)
		}
	}
	return a, ""
}

// one is the single operand of a command, or what is wrong.
func (a *arguments) one(what string) (string, string) {
	switch len(a.operands) {
	case 0:
		return "", what + " is missing"
	case 1:
		return a.operands[0], ""
	}
	return "", "one " + what + " at a time: " + strconv.Quote(a.operands[1])
}

// read is a file's bytes, or standard input's, and the name to give in messages.
func (c *console) read(path string) (data []byte, where string, err error) {
	in, where := c.in, "standard input"
	if path != "-" {
		f, err := os.Open(path)
		if err != nil {
			var p *os.PathError
			if errors.As(err, &p) {
				err = p.Err
			}
			return nil, path, err
		}
		defer f.Close()
		in, where = f, path
	}
	data, err = io.ReadAll(io.LimitReader(in, maxInput))
	return data, where, err
}

// load reads a case file and prints its warnings.
func (c *console) load(path string) (*casefile.Case, string, error) {
	data, where, err := c.read(path)
	if err != nil {
		return nil, where, err
	}
	k, warnings, err := casefile.Parse(data)
	c.warn(where, warnings)
	return k, where, err
}

func (c *console) warn(where string, warnings []casefile.Warning) {
	for _, w := range warnings {
		fmt.Fprintf(c.err, "%s: warning: %s\n", where, w)
	}
}

// caseOf reads the one case that a command is for, and its flags; a code other than done has been explained.
func (c *console) caseOf(command string, args []string, flags ...string) (a arguments, k *casefile.Case, where string, code int) {
	a, problem := parse(args, flags...)
	path := ""
	if problem == "" {
		path, problem = a.one("CASE.json")
	}
	if problem != "" {
		return a, nil, "", c.misused(command + ": " + problem)
	}
	k, where, err := c.load(path)
	if err != nil {
		return a, nil, where, c.fail(where, err)
	}
	return a, k, where, done
}

func (c *console) limits(args []string) int {
	a, k, where, code := c.caseOf("limits", args, "--json", "--gradient")
	if code != done {
		return code
	}
	if a.set {
		g, err := strconv.ParseFloat(a.gradient, 64)
		if err != nil {
			return c.misused("limits: --gradient " + strconv.Quote(a.gradient) + " is no number")
		}
		if err := k.SetNumber("today.climb_gradient", g); err != nil {
			return c.fail("--gradient", err)
		}
	}
	r, err := report.New(k)
	if err != nil {
		return c.fail(where, err)
	}
	text := []byte(r.Text())
	if a.json {
		text = r.JSON()
	}
	if code := c.print(text); code != done {
		return code
	}
	if !r.LevelFlight() {
		return noAnswer
	}
	return done
}

func (c *console) link(args []string) int {
	_, k, where, code := c.caseOf("link", args)
	if code != done {
		return code
	}
	s := k.Fragment()
	if s == "" {
		return c.fail(where, errors.New("the case is too large for a link (1 MiB); share the file"))
	}
	return c.print([]byte(s + "\n"))
}

func (c *console) open(args []string) int {
	a, problem := parse(args)
	link := ""
	if problem == "" {
		link, problem = a.one("FRAGMENT")
	}
	if problem != "" {
		return c.misused("open: " + problem)
	}
	where := "fragment"
	if link == "-" {
		data, from, err := c.read(link)
		if err != nil {
			return c.fail(from, err)
		}
		link, where = string(data), from
	}
	k, warnings, err := casefile.ParseFragment(link)
	c.warn(where, warnings)
	if err != nil {
		return c.fail(where, err)
	}
	return c.print(k.Marshal())
}

// release is set at link time; without it the version is that of the sources.
var release string

// version is a line: the program's version, and what it reads.
func version() string {
	v := release
	if v == "" {
		v = "unreleased"
		if info, ok := debug.ReadBuildInfo(); ok {
			for _, s := range info.Settings {
				if s.Key == "vcs.revision" && len(s.Value) >= 12 {
					v = s.Value[:12]
				}
			}
		}
	}
	return "levelspan " + v + "\n"
}
