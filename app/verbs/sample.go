package verbs

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"slices"
	"strings"

	"stillroom/samples"
)

func runSample(c *call) error {
	rest, err := c.parse()
	if err != nil {
		return err
	}
	names := samples.Names()
	name := names[0]
	switch len(rest) {
	case 0:
	case 1:
		name = strings.TrimSuffix(rest[0], ".stillroom")
	default:
		return wrongf("one NAME at most is wanted, %d are given", len(rest))
	}
	if !slices.Contains(names, name) {
		return wrongf("no sample is called %q; there are: %s", name, strings.Join(names, ", "))
	}
	data, err := samples.Read(name)
	if err != nil {
		return err
	}
	file := name + ".stillroom"
	f, err := os.OpenFile(file, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o644)
	if errors.Is(err, fs.ErrExist) {
		return fmt.Errorf("%s is there already and is left as it is", file)
	}
	if err != nil {
		return fmt.Errorf("%s cannot be written: %w", file, err)
	}
	if _, err := f.Write(data); err != nil {
		f.Close()
		os.Remove(file)
		return fmt.Errorf("%s cannot be written: %w", file, err)
	}
	if err := f.Close(); err != nil {
		return fmt.Errorf("%s cannot be written: %w", file, err)
	}
	_, err = fmt.Fprintln(c.stdout, file)
	return err
}
