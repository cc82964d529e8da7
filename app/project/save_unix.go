//go:build !windows

package project

import (
	"os"
	"path/filepath"

	"github.com/google/renameio/v2"
)

// writeWhole replaces the file at path by one that holds data, in one step. A
// symbolic link stays one: the file it leads to is replaced.
func writeWhole(path string, data []byte) error {
	if target, err := filepath.EvalSymlinks(path); err == nil {
		path = target
	}
	dir := filepath.Dir(path)
	if err := renameio.WriteFile(path, data, newFileMode, renameio.WithTempDir(dir)); err != nil {
		return err
	}
	// The file itself is flushed; its new name is safe once the folder is.
	if d, err := os.Open(dir); err == nil {
		_ = d.Sync() // some file systems refuse to flush a folder
		return d.Close()
	}
	return nil
}
