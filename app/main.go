// Command stillroom lays out listening rooms, finds their modes and designs
// absorbers tuned to them. With a verb it computes without any window; with
// none it opens the window.
package main

import (
	"fmt"
	"os"

	"stillroom/app/verbs"
)

func main() { os.Exit(run(os.Args[1:])) }

func run(args []string) int {
	if len(args) > 0 && args[0] == "--version" {
		fmt.Println("stillroom", version)
		return verbs.Done
	}
	if len(args) == 0 || !verbs.Known(args[0]) && len(args) == 1 && verbs.IsFile(args[0]) {
		file := ""
		if len(args) == 1 {
			file = args[0]
		}
		return openWindow(file)
	}
	return verbs.Run(args, os.Stdin, os.Stdout, os.Stderr)
}

// version is that of the program; the file format has its own.
const version = "0.1"
