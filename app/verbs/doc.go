// Package verbs is the program without a window: each verb reads a project,
// studies it and writes what was asked for as text, CSV, JSON or a file.
package verbs
