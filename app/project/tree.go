package project

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"unicode/utf8"
)

// A project file is read into a tree first and written out of one. The
// standard decoder on its own will not do: it folds the case of keys, lets the
// last of two equal keys win, and mends invalid text in silence.

// nodeKind is the type of a JSON value.
type nodeKind int

const (
	nullNode nodeKind = iota
	flagNode
	numberNode
	textNode
	listNode
	objectNode
)

// node is one JSON value.
type node struct {
	kind    nodeKind
	flag    bool
	text    string // of a string; of a number its literal
	items   []*node
	members []member // in the order of the file
	inline  bool     // an object written on one line
}

// member is one key of an object with its value.
type member struct {
	key   string
	value *node
}

// get returns the value of a key, or nil.
func (n *node) get(key string) *node {
	for _, m := range n.members {
		if m.key == key {
			return m.value
		}
	}
	return nil
}

// describe shows a value in a message.
func (n *node) describe() string {
	switch n.kind {
	case flagNode:
		return strconv.FormatBool(n.flag)
	case numberNode:
		if len(n.text) > 40 {
			return n.text[:40] + "…"
		}
		return n.text
	case textNode:
		return quoted(n.text)
	case listNode:
		return fmt.Sprintf("a list of %d", len(n.items))
	case objectNode:
		return "an object"
	default:
		return "null"
	}
}

// byteOrderMark is what some editors put before UTF-8 text.
var byteOrderMark = []byte("\uFEFF")

// readTree reads the one JSON value of a file. Where its syntax is at fault
// there is one problem with line and column and no tree; repeated keys and
// broken text are listed beside the tree.
func readTree(data []byte) (*node, Errors) {
	data = bytes.TrimPrefix(data, byteOrderMark)
	if at := invalidUTF8(data); at >= 0 {
		return nil, Errors{{Rule: place(data, at) + ": the file must be UTF-8 text",
			Value: fmt.Sprintf("byte 0x%02X", data[at])}}
	}
	if len(bytes.TrimSpace(data)) == 0 {
		return nil, Errors{{Rule: "the file must hold a project", Value: "empty"}}
	}
	var whole json.RawMessage
	if err := json.Unmarshal(data, &whole); err != nil {
		return nil, Errors{syntaxProblem(data, err)}
	}
	t := treeReader{data: data, dec: json.NewDecoder(bytes.NewReader(data))}
	t.dec.UseNumber()
	root, err := t.value("", 0)
	if err != nil {
		return nil, Errors{{Rule: place(data, int(t.dec.InputOffset())) + ": " + err.Error()}}
	}
	return root, t.problems
}

// syntaxProblem says where the JSON of a file breaks.
func syntaxProblem(data []byte, err error) Problem {
	var syntax *json.SyntaxError
	if !errors.As(err, &syntax) {
		return Problem{Rule: err.Error()}
	}
	at := int(syntax.Offset) - 1 // Offset counts the byte that broke it
	text := strings.TrimPrefix(syntax.Error(), "json: ")
	if strings.Contains(text, "unexpected end") {
		at, text = len(data), "the file ends too early"
	}
	return Problem{Rule: place(data, at) + ": " + text}
}

// invalidUTF8 returns the offset of the first byte that is not UTF-8, or −1.
func invalidUTF8(data []byte) int {
	for i := 0; i < len(data); {
		r, size := utf8.DecodeRune(data[i:])
		if r == utf8.RuneError && size <= 1 {
			return i
		}
		i += size
	}
	return -1
}

// place names a byte offset by line and column, both from 1, columns counted
// in characters.
func place(data []byte, at int) string {
	at = max(0, min(at, len(data)))
	before := data[:at]
	line := 1 + bytes.Count(before, []byte{'\n'})
	start := 1 + bytes.LastIndexByte(before, '\n')
	return fmt.Sprintf("line %d, column %d", line, 1+utf8.RuneCount(before[start:]))
}

// treeReader builds the tree from the decoder's tokens.
type treeReader struct {
	data     []byte
	dec      *json.Decoder
	problems Errors
}

// maxDepth is far beyond what any project nests.
const maxDepth = 64

func (t *treeReader) value(path string, depth int) (*node, error) {
	if depth > maxDepth {
		return nil, errors.New("lists and objects are nested too deeply")
	}
	start := t.dec.InputOffset()
	token, err := t.dec.Token()
	if err != nil {
		return nil, eof(err)
	}
	switch v := token.(type) {
	case json.Delim:
		if v == '[' {
			return t.list(path, depth)
		}
		return t.object(path, depth)
	case string:
		t.checkText(path, v, start)
		return &node{kind: textNode, text: v}, nil
	case json.Number:
		return &node{kind: numberNode, text: v.String()}, nil
	case bool:
		return &node{kind: flagNode, flag: v}, nil
	default:
		return &node{kind: nullNode}, nil
	}
}

func (t *treeReader) list(path string, depth int) (*node, error) {
	n := &node{kind: listNode}
	for t.dec.More() {
		v, err := t.value(item(path, len(n.items)), depth+1)
		if err != nil {
			return nil, err
		}
		n.items = append(n.items, v)
	}
	_, err := t.dec.Token()
	return n, eof(err)
}

func (t *treeReader) object(path string, depth int) (*node, error) {
	n := &node{kind: objectNode}
	seen := map[string]bool{}
	for t.dec.More() {
		start := t.dec.InputOffset()
		token, err := t.dec.Token()
		if err != nil {
			return nil, eof(err)
		}
		key, _ := token.(string)
		at := join(path, key)
		t.checkText(at, key, start)
		v, err := t.value(at, depth+1)
		if err != nil {
			return nil, err
		}
		if seen[key] {
			t.problems = append(t.problems, Problem{Path: at, Rule: "a key must be given once, is given again", Value: v.describe()})
			continue
		}
		seen[key] = true
		n.members = append(n.members, member{key, v})
	}
	_, err := t.dec.Token()
	return n, eof(err)
}

// checkText finds escapes that stand for no character (half of a surrogate
// pair), which the decoder would replace by U+FFFD.
func (t *treeReader) checkText(path, text string, start int64) {
	if !strings.ContainsRune(text, utf8.RuneError) {
		return
	}
	raw := strings.ToLower(string(t.data[start:t.dec.InputOffset()]))
	given := strings.Count(raw, "\uFFFD") + strings.Count(raw, `\ufffd`)
	if strings.Count(text, "\uFFFD") > given {
		t.problems = append(t.problems, Problem{Path: path, Rule: "must be valid Unicode text", Value: quoted(text)})
	}
}

// eof names an end that comes too early.
func eof(err error) error {
	if errors.Is(err, io.EOF) {
		return io.ErrUnexpectedEOF
	}
	return err
}

// numberText writes a number as short as it can be read back exactly.
func numberText(v float64) string {
	if math.IsNaN(v) {
		return "not a number"
	}
	if math.IsInf(v, 0) {
		return "infinite"
	}
	if v == 0 {
		return "0" // not "-0"
	}
	if a := math.Abs(v); a < 1e-6 || a >= 1e21 {
		return strconv.FormatFloat(v, 'g', -1, 64)
	}
	return strconv.FormatFloat(v, 'f', -1, 64)
}

func newNumber(v float64) *node {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		panic("project: writing a number that is not finite")
	}
	return &node{kind: numberNode, text: numberText(v)}
}

func newText(s string) *node { return &node{kind: textNode, text: s} }

func newNumbers(vs ...float64) *node {
	n := &node{kind: listNode}
	for _, v := range vs {
		n.items = append(n.items, newNumber(v))
	}
	return n
}

// add appends a key to an object.
func (n *node) add(key string, v *node) { n.members = append(n.members, member{key, v}) }

// print writes the tree with two spaces of indent. Lists of plain values and
// objects marked inline stand on one line.
func (n *node) print(b *bytes.Buffer, indent string) {
	switch n.kind {
	case flagNode:
		b.WriteString(strconv.FormatBool(n.flag))
	case numberNode:
		b.WriteString(n.text)
	case textNode:
		printText(b, n.text)
	case listNode:
		oneLine := true
		for _, v := range n.items {
			oneLine = oneLine && v.kind < listNode
		}
		printParts(b, '[', ']', len(n.items), oneLine, indent, func(i int, deeper string) {
			n.items[i].print(b, deeper)
		})
	case objectNode:
		printParts(b, '{', '}', len(n.members), n.inline, indent, func(i int, deeper string) {
			printText(b, n.members[i].key)
			b.WriteString(": ")
			n.members[i].value.print(b, deeper)
		})
	default:
		b.WriteString("null")
	}
}

func printParts(b *bytes.Buffer, open, end byte, count int, oneLine bool, indent string, part func(i int, deeper string)) {
	deeper := indent + "  "
	b.WriteByte(open)
	for i := range count {
		if i > 0 {
			b.WriteByte(',')
			if oneLine {
				b.WriteByte(' ')
			}
		}
		if !oneLine {
			b.WriteString("\n" + deeper)
		}
		part(i, deeper)
	}
	if count > 0 && !oneLine {
		b.WriteString("\n" + indent)
	}
	b.WriteByte(end)
}

func printText(b *bytes.Buffer, s string) {
	enc := json.NewEncoder(b)
	enc.SetEscapeHTML(false)
	if err := enc.Encode(s); err != nil {
		panic("project: writing text: " + err.Error())
	}
	b.Truncate(b.Len() - 1) // the encoder's newline
}
