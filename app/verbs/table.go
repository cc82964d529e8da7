package verbs

import (
	"encoding/csv"
	"encoding/json"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"unicode/utf8"
)

// number is a JSON number that is null where it is NaN or infinite.
type number float64

// MarshalJSON writes the number or null.
func (n number) MarshalJSON() ([]byte, error) {
	if v := float64(n); math.IsNaN(v) || math.IsInf(v, 0) {
		return []byte("null"), nil
	}
	return json.Marshal(float64(n))
}

// numbers makes a list of JSON numbers.
func numbers(v []float64) []number {
	out := make([]number, len(v))
	for i, x := range v {
		out[i] = number(x)
	}
	return out
}

// writeJSON writes a value indented.
func writeJSON(w io.Writer, v any) error {
	e := json.NewEncoder(w)
	e.SetIndent("", "  ")
	e.SetEscapeHTML(false)
	return e.Encode(v)
}

// cell writes a number for CSV: shortest exact, empty where there is none.
func cell(v float64) string {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return ""
	}
	return strconv.FormatFloat(v, 'g', -1, 64)
}

// shown writes a number for people, a dash where there is none.
func shown(v float64, decimals int) string {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return "–"
	}
	return strconv.FormatFloat(v, 'f', decimals, 64)
}

// writeCSV writes rows as RFC 4180 has it.
func writeCSV(w io.Writer, rows [][]string) error {
	c := csv.NewWriter(w)
	c.UseCRLF = true
	if err := c.WriteAll(rows); err != nil {
		return err
	}
	return c.Error()
}

// writeText writes rows in aligned columns, numbers to the right; the first
// row is the heading.
func writeText(w io.Writer, rows [][]string) error {
	var widths []int
	for _, r := range rows {
		for i, s := range r {
			if i == len(widths) {
				widths = append(widths, 0)
			}
			widths[i] = max(widths[i], utf8.RuneCountInString(s))
		}
	}
	for _, r := range rows {
		var b strings.Builder
		for i, s := range r {
			pad := strings.Repeat(" ", widths[i]-utf8.RuneCountInString(s))
			if i > 0 {
				b.WriteString("  ")
			}
			if rightAligned(rows, i) {
				b.WriteString(pad + s)
			} else {
				b.WriteString(s + pad)
			}
		}
		if _, err := fmt.Fprintln(w, strings.TrimRight(b.String(), " ")); err != nil {
			return err
		}
	}
	return nil
}

// rightAligned reports whether a column holds figures: its first filled cell
// below the heading begins like a number.
func rightAligned(rows [][]string, column int) bool {
	for _, r := range rows[1:] {
		if column >= len(r) || r[column] == "" || r[column] == "–" {
			continue
		}
		c := r[column][0]
		return c >= '0' && c <= '9' || c == '-'
	}
	return false
}
