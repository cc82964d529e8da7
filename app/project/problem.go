package project

import (
	"fmt"
	"strconv"
	"strings"
	"unicode/utf8"
)

// Problem is one thing that is wrong with a project: where, which rule it
// breaks, and what stands there instead.
type Problem struct {
	// Path names the key, as in "absorbers[1].panel.cavity_mm"; empty for
	// what concerns the file as a whole.
	Path string
	// Rule says what is allowed, as in "must be between 1 and 2000".
	Rule string
	// Value is what was found, as the file would write it; empty where there
	// is nothing to show.
	Value string
}

// Error returns "path: rule, is value".
func (p Problem) Error() string {
	var b strings.Builder
	if p.Path != "" {
		b.WriteString(p.Path)
		b.WriteString(": ")
	}
	b.WriteString(p.Rule)
	if p.Value != "" {
		b.WriteString(", is ")
		b.WriteString(p.Value)
	}
	return b.String()
}

// Errors lists everything that is wrong with a project, in the order of the
// file. It is an error only where it is not empty: see Err.
type Errors []Problem

// Error returns one problem per line.
func (e Errors) Error() string {
	lines := make([]string, len(e))
	for i, p := range e {
		lines[i] = p.Error()
	}
	return strings.Join(lines, "\n")
}

// Err returns e as an error, or nil where e is empty.
func (e Errors) Err() error {
	if len(e) == 0 {
		return nil
	}
	return e
}

// Unwrap lets errors.As reach the single problems.
func (e Errors) Unwrap() []error {
	all := make([]error, len(e))
	for i, p := range e {
		all[i] = p
	}
	return all
}

// At returns the problems at the path or below it, so that a window can show
// them beside the field that has them.
func (e Errors) At(path string) Errors {
	var at Errors
	for _, p := range e {
		if within(p.Path, path) {
			at = append(at, p)
		}
	}
	return at
}

// within reports whether path is parent or lies below it.
func within(path, parent string) bool {
	rest, found := strings.CutPrefix(path, parent)
	return found && (parent == "" || rest == "" || rest[0] == '.' || rest[0] == '[')
}

// join appends a key to a path.
func join(path, key string) string {
	if !plainKey(key) {
		key = strconv.Quote(key)
	}
	if path == "" {
		return key
	}
	return path + "." + key
}

// plainKey reports whether a key can stand in a path without quotes. Dots are
// allowed: band names have them, as in absorption.31.5.
func plainKey(key string) bool {
	if key == "" || len(key) > 60 {
		return false
	}
	for _, r := range key {
		if !idRune(r) {
			return false
		}
	}
	return true
}

// item appends an index to a path.
func item(path string, i int) string { return fmt.Sprintf("%s[%d]", path, i) }

// quoted shows a string in a message, shortened where it is long.
func quoted(s string) string {
	const most = 60
	if utf8.RuneCountInString(s) > most {
		s = string([]rune(s)[:most]) + "…"
	}
	return strconv.Quote(s)
}
