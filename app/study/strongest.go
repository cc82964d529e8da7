package study

import "strings"

// axisWords are the words for what a mode does along one axis.
var axisWords = [3]struct{ walls, length string }{
	{"front and back walls", "length"},
	{"left and right walls", "width"},
	{"floor and ceiling", "height"},
}

// strongest says in words where the pressure of a mode of the given order is
// greatest: everywhere on two walls for an axial mode, along edges for a
// tangential one, in the eight corners for an oblique one, and on the planes
// between for orders above one.
func strongest(order [3]int) string {
	var along []int
	for axis, n := range order {
		if n > 0 {
			along = append(along, axis)
		}
	}
	var text string
	switch len(along) {
	case 1:
		text = "all over the " + axisWords[along[0]].walls
	case 2:
		text = edges(along[0], along[1])
	default:
		text = "in all eight corners"
	}
	var between []string
	for _, axis := range along {
		if s := fractions(order[axis]); s != "" {
			between = append(between, s+" of the "+axisWords[axis].length)
		}
	}
	if len(between) > 0 {
		text += "; again at " + strings.Join(between, " and ")
	}
	return text
}

// edges names the four edges where the walls of two axes meet.
func edges(a, b int) string {
	switch {
	case a == 0 && b == 1:
		return "in the four upright corners"
	case a == 0 && b == 2:
		return "along floor and ceiling at the front and back walls"
	default:
		return "along floor and ceiling at the left and right walls"
	}
}

// fractions says where between two walls a mode of order n is as strong as on them.
func fractions(n int) string {
	switch {
	case n < 2:
		return ""
	case n == 2:
		return "the middle"
	case n == 3:
		return "each third"
	case n == 4:
		return "each quarter"
	case n == 5:
		return "each fifth"
	case n == 6:
		return "each sixth"
	default:
		return "many places"
	}
}
