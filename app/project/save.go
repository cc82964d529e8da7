package project

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
)

// newFileMode is the mode of a project file that did not exist before, less
// the user's umask.
const newFileMode fs.FileMode = 0o644

// Save writes the project to path in one step: a new file beside it, flushed
// to the disk, is renamed onto it. Where anything fails the former file stays
// whole. An existing file keeps its permissions. A project that Validate finds
// fault with is not written, since it could not be read again; the error is
// then an Errors.
func Save(path string, p Project) error {
	if err := p.Validate().Err(); err != nil {
		return err
	}
	if info, err := os.Stat(path); err == nil && !info.Mode().IsRegular() {
		return fmt.Errorf("saving %s: %w", path, errNotRegular)
	}
	if err := writeWhole(path, p.Marshal()); err != nil {
		return fmt.Errorf("saving %s: %w", path, err)
	}
	return nil
}

var errNotRegular = errors.New("it is not an ordinary file")
