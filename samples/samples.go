// Package samples holds project files to start from. They are inventions, made
// for demonstration.
package samples

import (
	"embed"
	"fmt"
)

//go:embed *.stillroom
var files embed.FS

// Names lists the samples, the one that the window opens with first.
func Names() []string { return []string{"edit-suite", "listening-room", "vocal-booth"} }

// Read returns the project file of that name.
func Read(name string) ([]byte, error) {
	data, err := files.ReadFile(name + ".stillroom")
	if err != nil {
		return nil, fmt.Errorf("samples: no sample is called %q", name)
	}
	return data, nil
}
