package main

import (
	"os"
	"os/exec"
	"slices"
	"strings"
	"testing"
)

// Which packages of ours each may rest on, directly or not. Arrows run down this
// list only: physics knows no document, no picture and no window.
var layers = []struct {
	name string
	may  []string
}{
	{"acoustics", nil},
	{"resonators", []string{"acoustics"}},
	{"resonators/tuning", []string{"acoustics", "resonators"}},
	{"assets", []string{"acoustics"}},
	{"samples", nil},
	{"app/project", []string{"acoustics", "assets"}},
	{"app/units", nil},
	{"app/internal/testcase", []string{"acoustics", "assets", "samples", "app/project"}}, // for tests alone
	{"app/study", []string{"acoustics", "resonators", "resonators/tuning", "assets", "app/project"}},
	{"app/figures", []string{"acoustics", "resonators", "resonators/tuning", "assets", "app/project", "app/study", "app/units"}},
	{"app/sheets", []string{"acoustics", "resonators", "resonators/tuning", "assets", "app/project", "app/study", "app/units", "app/figures"}},
	{"app/verbs", []string{"acoustics", "resonators", "resonators/tuning", "assets", "samples", "app/project", "app/study", "app/units", "app/figures", "app/sheets"}},
	{"app/window", []string{"acoustics", "resonators", "resonators/tuning", "assets", "samples", "app/project", "app/study", "app/units", "app/figures", "app/sheets"}},
	{"app", []string{"acoustics", "resonators", "resonators/tuning", "assets", "samples", "app/project", "app/study", "app/units", "app/figures", "app/sheets", "app/verbs", "app/window"}},
}

// What each layer may take from outside, beside the standard library.
func outside(name string) []string {
	gonum := []string{"gonum.org/v1/gonum"}
	pictures := []string{"gonum.org/v1/gonum", "gonum.org/v1/plot", "codeberg.org/go-fonts", "codeberg.org/go-pdf", "codeberg.org/go-latex", "git.sr.ht/~sbinet", "github.com/golang/freetype", "github.com/ajstarks/svgo", "golang.org/x"}
	saving := []string{"github.com/google/renameio"}
	optimising := []string{"golang.org/x/tools/container/intsets"} // what gonum/optimize rests on
	switch name {
	case "acoustics", "resonators", "resonators/tuning", "assets":
		return gonum
	case "samples", "app/units":
		return nil
	case "app/project", "app/internal/testcase":
		return slices.Concat(gonum, saving)
	case "app/study":
		return slices.Concat(gonum, saving, optimising)
	case "app/figures", "app/sheets", "app/verbs":
		return slices.Concat(pictures, saving)
	}
	return nil // the window and main: anything
}

func TestLayers(t *testing.T) {
	listed := map[string]bool{}
	for _, l := range layers {
		listed["stillroom/"+l.name] = true
		for _, dep := range depsOf(t, "stillroom/"+l.name) {
			if own, ok := strings.CutPrefix(dep, "stillroom/"); ok {
				if own != l.name && !slices.Contains(l.may, own) {
					t.Errorf("%s must not rest on %s", l.name, own)
				}
				continue
			}
			if l.name == "app" || l.name == "app/window" || !strings.Contains(strings.Split(dep, "/")[0], ".") || strings.HasPrefix(dep, "vendor/") {
				continue
			}
			if !slices.ContainsFunc(outside(l.name), func(p string) bool { return strings.HasPrefix(dep, p) }) {
				t.Errorf("%s must not rest on %s", l.name, dep)
			}
		}
	}
	// A new package must be given its place.
	out, err := exec.Command("go", "list", "-e", "stillroom/...").Output()
	if err != nil {
		t.Fatal(err)
	}
	for p := range strings.FieldsSeq(string(out)) {
		if !listed[p] {
			t.Errorf("%s has no place among the layers", p)
		}
	}
}

// The windowless build knows nothing of the toolkit and needs no C compiler.
func TestHeadlessBuildHasNoToolkit(t *testing.T) {
	out, err := exec.Command("go", "list", "-e", "-deps", "-tags", "headless", "stillroom/app").Output()
	if err != nil {
		t.Fatal(err)
	}
	for dep := range strings.FieldsSeq(string(out)) {
		if strings.HasPrefix(dep, "fyne.io/") || dep == "stillroom/app/window" {
			t.Errorf("the windowless build rests on %s", dep)
		}
	}
}

func depsOf(t *testing.T, pkg string) []string {
	t.Helper()
	c := exec.Command("go", "list", "-e", "-deps", pkg)
	c.Stderr = os.Stderr
	out, err := c.Output()
	if err != nil {
		t.Fatal(err)
	}
	return strings.Fields(string(out))
}
