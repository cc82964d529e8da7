package project

import (
	"errors"
	"os"
	"path/filepath"
)

// writeWhole replaces the file at path by one that holds data: a new file
// beside it is flushed and renamed onto it. Renaming replaces an existing file
// on this system too, though a crash of the machine within the rename may leave
// the new file under its temporary name.
func writeWhole(path string, data []byte) (err error) {
	if target, err := filepath.EvalSymlinks(path); err == nil {
		path = target
	}
	f, err := os.CreateTemp(filepath.Dir(path), "."+filepath.Base(path)+".*")
	if err != nil {
		return err
	}
	defer func() {
		if err != nil {
			_ = os.Remove(f.Name())
		}
	}()
	_, err = f.Write(data)
	if err == nil {
		err = f.Sync()
	}
	if err = errors.Join(err, f.Close()); err != nil {
		return err
	}
	return os.Rename(f.Name(), path)
}
