package project

import (
	"bytes"
	"errors"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"stillroom/samples"
)

// least is the smallest file there is: all else has defaults.
const least = `{"stillroom":1,"room":{"length_m":5,"width_m":4,"height_m":2.5},
"loudspeakers":[{"id":"L","at_m":[1,1,1]}],"seats":[{"id":"s","at_m":[3,2,1.2]}]%s}`

// whole has every key that the format knows.
const whole = `{
  "stillroom": 1, "title": "T", "prepared_for": "", "prepared_by": "", "note": "two\nlines",
  "air": {"temperature_c": 21, "relative_humidity_pct": 40, "pressure_kpa": 100},
  "room": {"length_m": 6, "width_m": 5, "height_m": 3, "surfaces": {
    "front": [{"finish": "plaster-on-masonry", "share": 1}],
    "back": [{"finish": "plaster-on-masonry", "share": 0.8}, {"finish": "own", "share": 0.2}],
    "left": [], "right": [], "floor": [], "ceiling": []}},
  "finishes": [{"id": "own", "name": "Own", "source": "measured", "absorption": {"63": 0.02, "31.5": 0.01, "125": 0.04}}],
  "loudspeakers": [{"id": "L", "at_m": [1, 1, 1], "gain_db": -3, "delay_ms": 2, "inverted": true}],
  "seats": [{"id": "s", "at_m": [3, 2, 1.2]}],
  "absorbers": [
    {"id": "N", "kind": "neck", "surface": "back", "centre_m": [0.4, 0.4], "size_m": [0.5, 0.5], "units": 2,
     "neck": {"cavity_l": 60, "mouth_diameter_mm": 100, "length_mm": 250, "mouths": 2, "gauze_pa_s_m": 5, "fill": {"share": 0.3, "flow_pa_s_m2": 8000}}},
    {"id": "P", "kind": "panel", "surface": "left", "centre_m": [2.6, 1.3], "size_m": [1.2, 0.6], "units": 1,
     "panel": {"mass_kg_m2": 4.8, "thickness_mm": 6, "youngs_gpa": 5, "poisson": 0.3, "loss_factor": 0.03, "cavity_mm": 100, "edge_pa_s_m": 1,
       "fill": {"thickness_mm": 50, "flow_pa_s_m2": 10000, "at": "wall"}}},
    {"id": "H", "kind": "perforated", "surface": "right", "centre_m": [1, 1], "size_m": [0.6, 0.6], "units": 1,
     "perforated": {"panel_mm": 9, "hole_mm": 6, "pitch_mm": 30, "cavity_mm": 150, "partitioned": true, "gauze_pa_s_m": 10,
       "fill": {"thickness_mm": 50, "flow_pa_s_m2": 10000, "at": "face", "porosity": 0.97, "tortuosity": 1.1, "viscous_um": 100, "thermal_um": 200}}},
    {"id": "S", "kind": "slotted", "surface": "front", "centre_m": [1, 1], "size_m": [0.6, 0.6], "units": 1,
     "slotted": {"slat_mm": 40, "slot_mm": 5, "panel_mm": 18, "cavity_mm": 100, "partitioned": false, "fill": {"thickness_mm": 100, "flow_pa_s_m2": 10000, "at": "wall"}}},
    {"id": "M", "kind": "microperforated", "surface": "ceiling", "centre_m": [3, 2], "size_m": [1, 1], "units": 1,
     "microperforated": {"panel_mm": 0.8, "hole_mm": 0.5, "pitch_mm": 4, "cavity_mm": 100, "partitioned": false}},
    {"id": "W", "kind": "porous", "surface": "floor", "centre_m": [5, 4], "size_m": [1, 1], "units": 1,
     "porous": {"thickness_mm": 100, "flow_pa_s_m2": 8000, "gap_mm": 50, "porosity": 0.98, "tortuosity": 1, "viscous_um": 90, "thermal_um": 180}}],
  "limits": {"decay": [[50, 0.6], [200, 0.2]]},
  "keep_out": [{"note": "door", "surface": "right", "centre_m": [5, 1], "size_m": [0.9, 2]}],
  "stock": {"sheets": [{"name": "our ply", "source": "weighed", "mass_kg_m2": 4.1, "thickness_mm": 6.5, "youngs_gpa": 6, "poisson": 0.3, "loss_factor": 0.02}],
    "tubes": [{"name": "duct", "source": "", "outside_mm": 100, "inside_mm": 96}],
    "wools": [{"name": "felt", "source": "", "thickness_mm": 20, "flow_pa_s_m2": 20000}]}
}`

func problemsOf(t *testing.T, data string) Errors {
	t.Helper()
	p, err := Parse([]byte(data))
	if err == nil {
		return nil
	}
	var all Errors
	if !errors.As(err, &all) {
		t.Fatalf("the error is no Errors but %T: %v", err, err)
	}
	if !reflect.DeepEqual(p, Project{}) {
		t.Errorf("a project half built comes with an error: %+v", p)
	}
	return all
}

func TestParseFillsDefaultsIn(t *testing.T) {
	p, err := Parse([]byte(strings.Replace(least, "%s", "", 1)))
	if err != nil {
		t.Fatal(err)
	}
	if p.Air != DefaultAir() || p.Limits.Curve != MusicLimits || p.DefaultFinish() != FallbackFinish {
		t.Errorf("defaults: air %+v, limits %+v, finish %s", p.Air, p.Limits, p.DefaultFinish())
	}
	out := string(p.Marshal())
	for _, want := range []string{`"temperature_c": 20`, `"decay": "music-2015"`, `"gain_db": 0`, `"inverted": false`, `"absorbers": []`, `"ceiling": []`, `"prepared_for": ""`} {
		if !strings.Contains(out, want) {
			t.Errorf("the default %s is not written out:\n%s", want, out)
		}
	}
}

// Every key is read, and a saved file loaded and saved again is the same to the
// byte.
func TestRoundTrip(t *testing.T) {
	p, err := Parse([]byte(whole))
	if err != nil {
		t.Fatal(err)
	}
	once := p.Marshal()
	q, err := Parse(once)
	if err != nil {
		t.Fatalf("what was saved cannot be read: %v\n%s", err, once)
	}
	if !reflect.DeepEqual(p, q) {
		t.Errorf("a saved project is another:\n%+v\n%+v", p, q)
	}
	if !bytes.Equal(once, q.Marshal()) {
		t.Error("saved twice it is not the same to the byte")
	}
	// Nothing of the input is lost: each literal number and word is in the output.
	for _, word := range []string{`"gain_db": -3`, `"delay_ms": 2`, `"inverted": true`, `"31.5": 0.01`, `"at": "face"`, `"thermal_um": 180`,
		`"share": 0.3`, `"gap_mm": 50`, `"partitioned": true`, `[50, 0.6]`, `"mouths": 2`, `"edge_pa_s_m": 1`, `"gauze_pa_s_m": 10`, `"inside_mm": 96`, `"note": "door"`, `"our ply"`, `two\nlines`} {
		if !strings.Contains(string(once), word) {
			t.Errorf("%s is lost", word)
		}
	}
}

func TestParseAcceptsByteOrderMark(t *testing.T) {
	p, err := Parse([]byte("\uFEFF" + whole))
	if err != nil {
		t.Fatal(err)
	}
	if bytes.HasPrefix(p.Marshal(), []byte("\uFEFF")) {
		t.Error("the byte order mark is kept on save")
	}
}

// with returns the whole file with one piece replaced.
func with(t *testing.T, old, new string) string {
	t.Helper()
	if strings.Count(whole, old) == 0 {
		t.Fatalf("%q is not in the file", old)
	}
	return strings.Replace(whole, old, new, 1)
}

// Each rule of the format, by a file that breaks it: path and rule are named.
func TestParseRefuses(t *testing.T) {
	for _, c := range []struct{ name, data, path, rule string }{
		{"truncated", whole[:400], "", "line"},
		{"empty", "", "", "must hold a project"},
		{"a list", "[1]", "", "object"},
		{"not UTF-8", "{\"title\": \"\xff\"}", "", "UTF-8"},
		{"two values", whole + "{}", "", "line"},
		{"newer version", with(t, `"stillroom": 1`, `"stillroom": 2`), "stillroom", "newer"},
		{"no version", with(t, `"stillroom": 1, `, ``), "stillroom", "required"},
		{"version of another kind", with(t, `"stillroom": 1`, `"stillroom": "1"`), "stillroom", ""},
		{"unknown key", with(t, `"title": "T"`, `"titel": "T"`), "titel", "not a key"},
		{"unknown key in an absorber", with(t, `"cavity_l": 60`, `"cavity_l": 60, "gauze": 3`), "absorbers[0].neck.gauze", "not a key"},
		{"key of other case", with(t, `"title"`, `"Title"`), "Title", "not a key"},
		{"repeated key", with(t, `"title": "T"`, `"title": "T", "title": "U"`), "title", "once"},
		{"wrong type", with(t, `"length_m": 6`, `"length_m": "6"`), "room.length_m", "number"},
		{"null", with(t, `"length_m": 6`, `"length_m": null`), "room.length_m", "number"},
		{"not finite", with(t, `"length_m": 6`, `"length_m": 1e999`), "room.length_m", "finite"},
		{"size of zero", with(t, `"size_m": [0.5, 0.5]`, `"size_m": [0, 0.5]`), "absorbers[0].size_m[0]", "between"},
		{"room of zero", with(t, `"height_m": 3`, `"height_m": 0`), "room.height_m", "between 0.5 and 100"},
		{"negative cavity", with(t, `"cavity_mm": 100, "edge`, `"cavity_mm": -4, "edge`), "absorbers[1].panel.cavity_mm", "must be between 1 and 2000, is -4"},
		{"room missing", strings.Replace(strings.Replace(least, "%s", "", 1), `"room":{"length_m":5,"width_m":4,"height_m":2.5},`, "", 1), "room", "required"},
		{"dimension missing", with(t, `"length_m": 6, `, ``), "room.length_m", "required"},
		{"no loudspeaker", with(t, `[{"id": "L", "at_m": [1, 1, 1], "gain_db": -3, "delay_ms": 2, "inverted": true}]`, `[]`), "loudspeakers", "at least one"},
		{"no seat", with(t, `[{"id": "s", "at_m": [3, 2, 1.2]}]`, `[]`), "seats", "at least one"},
		{"seat outside", with(t, `"at_m": [3, 2, 1.2]`, `"at_m": [7, 2, 1.2]`), "seats[0].at_m[0]", "inside the room"},
		{"loudspeaker on the floor", with(t, `"at_m": [1, 1, 1]`, `"at_m": [1, 1, 0]`), "loudspeakers[0].at_m[2]", "inside the room"},
		{"point of two", with(t, `"at_m": [3, 2, 1.2]`, `"at_m": [3, 2]`), "seats[0].at_m", "3"},
		{"gain", with(t, `"gain_db": -3`, `"gain_db": 21`), "loudspeakers[0].gain_db", "between -60 and 20"},
		{"delay", with(t, `"delay_ms": 2`, `"delay_ms": -1`), "loudspeakers[0].delay_ms", "between 0 and 500"},
		{"id with a blank", with(t, `"id": "L"`, `"id": "L 1"`), "loudspeakers[0].id", "letters"},
		{"empty id", with(t, `"id": "L"`, `"id": ""`), "loudspeakers[0].id", "1 to 40"},
		{"id twice", with(t, `"id": "P"`, `"id": "N"`), "absorbers[1].id", "unique"},
		{"shares", with(t, `"share": 0.8`, `"share": 0.7`), "room.surfaces.back", "add to 1"},
		{"unknown finish", with(t, `"finish": "own"`, `"finish": "felt"`), "room.surfaces.back[1].finish", "finish"},
		{"unknown surface", with(t, `"left": []`, `"left": [], "roof": []`), "room.surfaces.roof", "not a key"},
		{"unknown band", with(t, `"125": 0.04`, `"130": 0.04`), "finishes[0].absorption.130", "band"},
		{"coefficient", with(t, `"125": 0.04`, `"125": -0.04`), "finishes[0].absorption.125", "between"},
		{"unknown kind", with(t, `"kind": "panel"`, `"kind": "membrane"`), "absorbers[1].kind", "neck"},
		{"block of another kind", with(t, `"kind": "panel"`, `"kind": "neck"`), "absorbers[1].panel", "must not stand beside"},
		{"unknown place", with(t, `"surface": "back"`, `"surface": "rear"`), "absorbers[0].surface", "front"},
		{"off its surface", with(t, `"centre_m": [0.4, 0.4]`, `"centre_m": [0.2, 0.4]`), "absorbers[0].centre_m[0]", "lie on the surface"},
		{"units off the surface", with(t, `"units": 2`, `"units": 20`), "absorbers[0].centre_m[0]", "lie on the surface"},
		{"no unit", with(t, `"units": 2`, `"units": 0`), "absorbers[0].units", "between 1 and 200"},
		{"half a unit", with(t, `"units": 2`, `"units": 1.5`), "absorbers[0].units", "whole"},
		{"overlap", with(t, `"surface": "front", "centre_m": [1, 1]`, `"surface": "right", "centre_m": [1.2, 1]`), "absorbers[3].centre_m", "overlap"},
		{"fill thicker than its cavity", with(t, `"thickness_mm": 50, "flow_pa_s_m2": 10000, "at": "wall"`, `"thickness_mm": 150, "flow_pa_s_m2": 10000, "at": "wall"`), "absorbers[1].panel.fill.thickness_mm", "no thicker"},
		{"fill elsewhere", with(t, `"at": "wall"`, `"at": "middle"`), "absorbers[1].panel.fill.at", "wall"},
		{"flow", with(t, `"flow_pa_s_m2": 8000}}`, `"flow_pa_s_m2": 99}}`), "absorbers[0].neck.fill.flow_pa_s_m2", "between 100 and 1000000"},
		{"hole as wide as its pitch", with(t, `"hole_mm": 6`, `"hole_mm": 30`), "absorbers[2].perforated.hole_mm", "smaller than the pitch"},
		{"three of four fluid figures", with(t, `"porosity": 0.97, `, ``), "absorbers[2].perforated.fill.porosity", "required where any"},
		{"mouth wider than the box", with(t, `"mouth_diameter_mm": 100`, `"mouth_diameter_mm": 600`), "absorbers[0].neck.mouth_diameter_mm", "fit"},
		{"area off its wall", with(t, `"centre_m": [5, 1], "size_m": [0.9, 2]`, `"centre_m": [5.8, 1], "size_m": [0.9, 2]`), "keep_out[0].centre_m[0]", "lie on the surface"},
		{"area of no wall", with(t, `"note": "door", "surface": "right"`, `"note": "door", "surface": "wall"`), "keep_out[0].surface", "must be one of"},
		{"heavy sheet", with(t, `"mass_kg_m2": 4.1`, `"mass_kg_m2": 410`), "stock.sheets[0].mass_kg_m2", "between 0.1 and 200"},
		{"tube inside out", with(t, `"inside_mm": 96`, `"inside_mm": 100`), "stock.tubes[0].inside_mm", "smaller than outside_mm, 100"},
		{"nameless wool", with(t, `"name": "felt"`, `"name": ""`), "stock.wools[0].name", "not be empty"},
		{"unknown stock", with(t, `"wools": [`, `"woods": [`), "stock.woods", "wools"},
		{"unknown curve", with(t, `"decay": [[50, 0.6], [200, 0.2]]`, `"decay": "loud"`), "limits.decay", "music-2015"},
		{"falling curve", with(t, `[200, 0.2]`, `[20, 0.2]`), "limits.decay[1][0]", "rise"},
		{"no point in the curve", with(t, `[[50, 0.6], [200, 0.2]]`, `[]`), "limits.decay", "at least one"},
		{"air", with(t, `"temperature_c": 21`, `"temperature_c": 51`), "air.temperature_c", "between -20 and 50"},
	} {
		problems := problemsOf(t, c.data)
		found := false
		for _, p := range problems {
			if p.Path == c.path && strings.Contains(p.Error(), c.rule) {
				found = true
			}
		}
		if !found {
			t.Errorf("%s: no problem %q %q among:\n%v", c.name, c.path, c.rule, problems)
		}
		if len(problems) > 2 {
			t.Errorf("%s: one slip gives %d problems:\n%v", c.name, len(problems), problems)
		}
	}
}

// All errors of a file are listed, in the words that the format promises.
func TestParseListsAllErrors(t *testing.T) {
	data := with(t, `"cavity_mm": 100, "edge`, `"cavity_mm": -4, "edge`)
	data = strings.Replace(data, `"125": 0.04`, `"125": 7`, 1)
	data = strings.Replace(data, `"title": "T"`, `"titel": "T"`, 1)
	data = strings.Replace(data, `"at_m": [3, 2, 1.2]`, `"at_m": [3, 2, 9]`, 1)
	problems := problemsOf(t, data)
	if len(problems) != 4 {
		t.Errorf("%d problems, four were made:\n%v", len(problems), problems)
	}
	text := problems.Error()
	for _, want := range []string{
		"absorbers[1].panel.cavity_mm: must be between 1 and 2000, is -4",
		"finishes[0].absorption.125: must be between 0 and 1.5, is 7",
		"seats[0].at_m[2]: must lie inside the room", "titel: ",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in\n%s", want, text)
		}
	}
}

// Ranges include their ends, for every number of the file that has one.
func TestRangesIncludeTheirEnds(t *testing.T) {
	for path, want := range map[string]Range{
		"room.length_m": {0.5, 100}, "absorbers[3].panel.cavity_mm": {1, 2000}, "absorbers[0].panel.fill.thickness_mm": {1, 2000},
		"absorbers[1].perforated.panel_mm": {0.1, 100}, "absorbers[1].perforated.hole_mm": {0.05, 100}, "absorbers[0].neck.mouth_diameter_mm": {5, 1000},
		"absorbers[0].neck.cavity_l": {0.05, 5000}, "absorbers[0].panel.mass_kg_m2": {0.1, 200}, "absorbers[0].porous.flow_pa_s_m2": {100, 1e6},
		"loudspeakers[0].gain_db": {-60, 20}, "loudspeakers[0].delay_ms": {0, 500}, "absorbers[7].units": {1, 200},
	} {
		got, ok := FieldRange(path)
		if !ok || got != want {
			t.Errorf("%s: %+v (%v), the format says %+v", path, got, ok, want)
		}
		if !got.Contains(want.Min) || !got.Contains(want.Max) || got.Contains(want.Max*1.001) {
			t.Errorf("%s: %+v does not hold its ends alone", path, got)
		}
	}
}

func TestLoadAndSave(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "a.stillroom")
	p, err := Parse([]byte(whole))
	if err != nil {
		t.Fatal(err)
	}
	if err := Save(path, p); err != nil {
		t.Fatal(err)
	}
	q, err := Load(path)
	if err != nil || !reflect.DeepEqual(p, q) {
		t.Fatalf("loaded: %v, equal %v", err, reflect.DeepEqual(p, q))
	}
	// A failed save leaves the old file whole and nothing beside it.
	if err := Save(filepath.Join(dir, "no such folder", "a.stillroom"), p); err == nil {
		t.Error("saved into a folder that is not there")
	}
	if os.Geteuid() != 0 {
		if err := os.Chmod(dir, 0o500); err != nil {
			t.Fatal(err)
		}
		if err := Save(path, New()); err == nil {
			t.Error("saved into a folder that may not be written")
		}
		_ = os.Chmod(dir, 0o700)
	}
	if data, _ := os.ReadFile(path); !bytes.Equal(data, p.Marshal()) {
		t.Error("the old file is not whole")
	}
	if list, _ := os.ReadDir(dir); len(list) != 1 {
		t.Errorf("%d files in the folder, want one", len(list))
	}
	if _, err := Load(filepath.Join(dir, "none.stillroom")); !errors.Is(err, os.ErrNotExist) {
		t.Errorf("a file that is not there gives %v", err)
	}
	if err := os.WriteFile(path, []byte("{"), 0o600); err != nil {
		t.Fatal(err)
	}
	if _, err := Load(path); err == nil || !strings.Contains(err.Error(), path) {
		t.Errorf("the error does not name the file: %v", err)
	}
}

// Whatever is read, nothing panics, an error builds nothing, and what is read
// without one is valid and stable to the byte.
func FuzzParse(f *testing.F) {
	for _, name := range samples.Names() {
		data, err := samples.Read(name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(data)
	}
	f.Add([]byte(whole))
	f.Add([]byte(whole[:300]))
	f.Add([]byte("\uFEFF{}"))
	f.Add([]byte(`{"stillroom":1,"stillroom":1e400}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		p, err := Parse(data)
		if err != nil {
			var all Errors
			if !errors.As(err, &all) || len(all) == 0 || err.Error() == "" {
				t.Fatalf("an error that names nothing: %T %v", err, err)
			}
			return
		}
		if problems := p.Validate(); len(problems) > 0 {
			t.Fatalf("read without error, yet: %v", problems)
		}
		once := p.Marshal()
		q, err := Parse(once)
		if err != nil {
			t.Fatalf("what was written cannot be read: %v\n%s", err, once)
		}
		if !bytes.Equal(once, q.Marshal()) {
			t.Fatalf("not stable:\n%s\n%s", once, q.Marshal())
		}
	})
}
