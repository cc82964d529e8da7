package verbs

import (
	"context"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"stillroom/app/project"
	"stillroom/app/study"
)

// Exit status of a call.
const (
	Done    = 0
	AtFault = 1 // the file or the figures are at fault
	Wrong   = 2 // the call is wrong
)

// usageError is a wrong call: what is wrong with it.
type usageError struct{ text string }

func (e usageError) Error() string { return e.text }

func wrongf(format string, args ...any) error { return usageError{fmt.Sprintf(format, args...)} }

// verb is one command.
type verb struct {
	name, usage, about string
	run                func(c *call) error
}

// verbs lists the commands in the order of the usage.
func verbs() []verb {
	return []verb{
		{"modes", "modes FILE [--to HZ] [--seat ID] [--as text|csv|json]", "mode schedule, bare and treated", runModes},
		{"level", "level FILE [--from HZ] [--to HZ] [--points N] [--seat ID] [--as csv|json]", "level at the seat, bare and treated", runLevel},
		{"absorbers", "absorbers FILE [--field 90|78] [--as text|csv|json]", "resonance, Q, absorption and ratings of each absorber", runAbsorbers},
		{"check", "check FILE [--as text|csv|json]", "criteria: figure, limit, source, met or not", runCheck},
		{"tune", "tune FILE --mode 1,0,0[;2,0,0…]|problems [--kind K] [--surface S] [--depth MM] [--goal decay|level|volume] [--target S] [--units N] [--stock metric|us] [--as text|csv|json]",
			"ranked absorbers that can be built, with their predicted effect", runTune},
		{"sheets", "sheets FILE --out FILE.pdf [--paper a4|letter] [--units metric|us]", "the printed set", runSheets},
		{"figure", "figure FILE --lane NAME [--hz HZ] --out FILE.png|svg|pdf", "one lane or drawing as a picture", runFigure},
		{"sample", "sample [NAME]", "writes a sample project to the current folder", runSample},
	}
}

// Known reports whether a word is a verb.
func Known(word string) bool {
	return word == "help" || slices.ContainsFunc(verbs(), func(v verb) bool { return v.name == word })
}

// Usage returns the text that explains the calls.
func Usage() string {
	var b strings.Builder
	b.WriteString("usage:\n  stillroom [FILE]                    the window\n")
	for _, v := range verbs() {
		fmt.Fprintf(&b, "  stillroom %s\n        %s\n", v.usage, v.about)
	}
	b.WriteString("FILE may be - for standard input.\n" +
		"Exit status: 0 done, 1 the file is at fault and nothing is written, 2 the call is wrong.\n")
	return b.String()
}

// call is one command being carried out.
type call struct {
	verb   verb
	flags  *flag.FlagSet
	words  []string
	stdin  io.Reader
	stdout io.Writer
}

// Run carries out a command: args are the words after the program's name, the
// first of them a verb. It returns the exit status.
func Run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	if len(args) == 0 {
		fmt.Fprint(stderr, Usage())
		return Wrong
	}
	if args[0] == "help" || args[0] == "--help" || args[0] == "-h" {
		fmt.Fprint(stdout, Usage())
		return Done
	}
	for _, v := range verbs() {
		if v.name != args[0] {
			continue
		}
		c := &call{verb: v, flags: flag.NewFlagSet(v.name, flag.ContinueOnError), words: args[1:], stdin: stdin, stdout: stdout}
		c.flags.SetOutput(io.Discard)
		return report(v, v.run(c), stdout, stderr)
	}
	fmt.Fprintf(stderr, "stillroom: no verb is called %q\n%s", args[0], Usage())
	return Wrong
}

// report turns an error into messages and an exit status.
func report(v verb, err error, stdout, stderr io.Writer) int {
	var wrong usageError
	switch {
	case err == nil:
		return Done
	case errors.Is(err, flag.ErrHelp):
		fmt.Fprintf(stdout, "usage: stillroom %s\n", v.usage)
		return Done
	case errors.As(err, &wrong):
		fmt.Fprintf(stderr, "stillroom %s: %v\nusage: stillroom %s\n", v.name, err, v.usage)
		return Wrong
	}
	for line := range strings.SplitSeq(err.Error(), "\n") {
		fmt.Fprintf(stderr, "stillroom: %s\n", line)
	}
	return AtFault
}

// parse reads options wherever they stand among the words and returns the rest.
func (c *call) parse() ([]string, error) {
	var rest []string
	words := c.words
	for {
		if err := c.flags.Parse(words); err != nil {
			if errors.Is(err, flag.ErrHelp) {
				return nil, err
			}
			return nil, usageError{err.Error()}
		}
		words = c.flags.Args()
		if len(words) == 0 {
			return rest, nil
		}
		rest = append(rest, words[0])
		words = words[1:]
	}
}

// parseFile is parse for the verbs that take one FILE.
func (c *call) parseFile() (string, error) {
	rest, err := c.parse()
	if err != nil {
		return "", err
	}
	if len(rest) != 1 {
		return "", wrongf("one FILE is wanted, %d are given", len(rest))
	}
	return rest[0], nil
}

// answer writes a verb's answer in the form asked for.
func (c *call) answer(as string, inJSON any, inCSV [][]string, inText func() error) error {
	switch as {
	case "json":
		return writeJSON(c.stdout, inJSON)
	case "csv":
		return writeCSV(c.stdout, inCSV)
	}
	return inText()
}

// isSet reports whether an option was given.
func (c *call) isSet(name string) bool {
	set := false
	c.flags.Visit(func(f *flag.Flag) { set = set || f.Name == name })
	return set
}

// loadAs reads the options, checks the form asked for and reads the project
// FILE: the whole beginning of a verb that has no other options.
func (c *call) loadAs() (p project.Project, as string, err error) {
	form := c.flags.String("as", "text", "")
	file, err := c.parseFile()
	if err != nil {
		return p, "", err
	}
	if err := oneOf("as", *form, "text", "csv", "json"); err != nil {
		return p, "", err
	}
	p, err = c.load(file)
	return p, *form, err
}

// load reads the project FILE.
func (c *call) load(file string) (project.Project, error) {
	if file == "-" {
		return project.Read(c.stdin)
	}
	return project.Load(file)
}

// study computes a project.
func (c *call) study(p project.Project, o study.Options) (*study.Result, error) {
	return study.Run(context.Background(), p, o, nil, nil)
}

// seatIndex finds a seat by its id, the first where none is named.
func seatIndex(p project.Project, id string) (int, error) {
	if id == "" {
		return 0, nil
	}
	var ids []string
	for i, s := range p.Seats {
		if s.ID == id {
			return i, nil
		}
		ids = append(ids, s.ID)
	}
	return 0, wrongf("no seat is called %q; there are: %s", id, strings.Join(ids, ", "))
}

// oneOf checks that an option has one of the allowed values.
func oneOf(option, value string, allowed ...string) error {
	if slices.Contains(allowed, value) {
		return nil
	}
	return wrongf("--%s must be one of %s, is %q", option, strings.Join(allowed, ", "), value)
}

// frequency checks that an option is a frequency that can be computed.
func frequency(option string, hz float64) error {
	if !(hz >= 5 && hz <= 1000) {
		return wrongf("--%s must be between 5 and 1000 Hz, is %g", option, hz)
	}
	return nil
}

// writeFile writes a file whole or not at all.
func writeFile(path string, write func(io.Writer) error) (err error) {
	f, err := os.CreateTemp(filepath.Dir(path), ".stillroom-*")
	if err != nil {
		return fmt.Errorf("%s cannot be written: %w", path, err)
	}
	defer func() {
		if err != nil {
			f.Close()
			os.Remove(f.Name())
		}
	}()
	if err := write(f); err != nil {
		return err
	}
	if err := errors.Join(f.Chmod(0o644), f.Sync(), f.Close()); err != nil {
		return fmt.Errorf("%s cannot be written: %w", path, err)
	}
	if err := os.Rename(f.Name(), path); err != nil {
		return fmt.Errorf("%s cannot be written: %w", path, err)
	}
	return nil
}

// IsFile reports whether a word is meant as a project file: it ends like one or
// a file of that name is there.
func IsFile(word string) bool {
	if strings.HasSuffix(word, project.Suffix) {
		return true
	}
	info, err := os.Stat(word)
	return err == nil && !info.IsDir()
}
