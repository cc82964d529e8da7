//go:build !headless

package main

import (
	"fmt"
	"os"
	"runtime"
	"strings"

	"fyne.io/fyne/v2/app"

	"stillroom/app/verbs"
	"stillroom/app/window"
)

// openWindow opens the window on a file, or on the sample where there is none.
func openWindow(file string) int {
	if runtime.GOOS == "linux" && os.Getenv("DISPLAY") == "" && os.Getenv("WAYLAND_DISPLAY") == "" {
		fmt.Fprintln(os.Stderr, "stillroom: there is no display; give a verb, as in: stillroom modes FILE (stillroom help lists them)")
		return verbs.Wrong
	}
	// The toolkit complains of a locale that names no language.
	if l := os.Getenv("LANG"); l == "" || l == "POSIX" || strings.HasPrefix(l, "C") {
		os.Setenv("LANG", "en_US.UTF-8")
	}
	if err := window.Run(app.NewWithID(window.ID), file); err != nil {
		fmt.Fprintln(os.Stderr, "stillroom:", err)
		return verbs.AtFault
	}
	return verbs.Done
}
