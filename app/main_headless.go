//go:build headless

package main

import (
	"fmt"
	"os"

	"stillroom/app/verbs"
)

// openWindow has no window to open in this build.
func openWindow(string) int {
	fmt.Fprint(os.Stderr, "stillroom: this build has no window\n"+verbs.Usage())
	return verbs.Wrong
}
