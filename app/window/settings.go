package window

import (
	"bytes"
	"encoding/json"
	"os"
	"path/filepath"
	"slices"

	"github.com/adrg/xdg"

	"stillroom/app/figures"
	"stillroom/app/project"
)

// settings are what the window keeps from one start to the next.
type settings struct {
	Width, Height float32
	Outer, Inner  float64 // of the splits, 0…1
	Lower         float64
	Details       bool // folded out
	US, Dark      bool
	Recent        []string
	Folded        []string // lanes

	path string // "" keeps nothing
}

// mostRecent is how many recent files are kept.
const mostRecent = 8

func defaultSettings() *settings {
	return &settings{Width: 1280, Height: 780, Outer: 0.78, Inner: 0.42, Lower: 0.72, Details: true,
		Folded: []string{string(figures.RingingLane)}}
}

// loadSettings reads the settings; what is missing or broken has its default.
func loadSettings() *settings {
	s := defaultSettings()
	path, err := xdg.ConfigFile(filepath.Join("stillroom", "settings.json"))
	if err != nil {
		return s
	}
	s.path = path
	if data, err := os.ReadFile(path); err == nil {
		if json.Unmarshal(data, s) != nil {
			s = defaultSettings()
			s.path = path
		}
	}
	s.Width, s.Height = max(s.Width, 800), max(s.Height, 560)
	for _, share := range []*float64{&s.Outer, &s.Inner, &s.Lower} {
		*share = min(max(*share, 0.1), 0.95)
	}
	return s
}

// save writes the settings; a failure only loses them.
func (s *settings) save() {
	if s.path == "" {
		return
	}
	data, err := json.MarshalIndent(s, "", "  ")
	if err != nil {
		return
	}
	_ = writeWhole(s.path, bytes.NewReader(append(data, '\n')))
}

// remember puts a file first among the recent ones.
func (s *settings) remember(path string) {
	if abs, err := filepath.Abs(path); err == nil {
		path = abs
	}
	s.Recent = slices.DeleteFunc(s.Recent, func(p string) bool { return p == path })
	s.Recent = append([]string{path}, s.Recent...)
	s.Recent = s.Recent[:min(len(s.Recent), mostRecent)]
	s.save()
}

// recovery is where unsaved work is kept until it is saved or discarded.
type recovery struct{ path string }

// kept is the file of unsaved work: where the document is on disk, and what it
// holds.
type kept struct {
	Path    string `json:"path"`
	Project string `json:"project"`
}

func newRecovery() recovery {
	path, err := xdg.StateFile(filepath.Join("stillroom", "unsaved.json"))
	if err != nil {
		return recovery{}
	}
	return recovery{path}
}

// keep writes unsaved work down.
func (r recovery) keep(path string, p project.Project) {
	if r.path == "" {
		return
	}
	data, err := json.Marshal(kept{path, string(p.Marshal())})
	if err == nil {
		_ = writeWhole(r.path, bytes.NewReader(data))
	}
}

// drop forgets unsaved work.
func (r recovery) drop() {
	if r.path != "" {
		os.Remove(r.path)
	}
}

// found returns the unsaved work of an earlier run.
func (r recovery) found() (path string, p project.Project, ok bool) {
	data, err := os.ReadFile(r.path)
	if err != nil {
		return "", p, false
	}
	var k kept
	if json.Unmarshal(data, &k) != nil {
		return "", p, false
	}
	p, err = project.Parse([]byte(k.Project))
	return k.Path, p, err == nil
}
