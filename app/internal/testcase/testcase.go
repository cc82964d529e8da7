// Package testcase gives the tests of several packages the same projects.
package testcase

import (
	"testing"

	"stillroom/app/project"
	"stillroom/samples"
)

// Sample returns a sample project by its name.
func Sample(t testing.TB, name string) project.Project {
	t.Helper()
	data, err := samples.Read(name)
	if err != nil {
		t.Fatal(err)
	}
	p, err := project.Parse(data)
	if err != nil {
		t.Fatal(err)
	}
	return p
}
