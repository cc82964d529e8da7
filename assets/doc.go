// Package assets holds the program's data: finishes, cautions, lettering and
// icon. It is the only place, beside the samples, that embeds files.
package assets
