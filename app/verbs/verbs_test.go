package verbs_test

import (
	"bytes"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"testing"

	"stillroom/app/project"
	"stillroom/app/study"
	"stillroom/app/verbs"
	"stillroom/samples"
)

// run carries a call out in a folder of its own.
func run(t *testing.T, stdin string, args ...string) (status int, out, errors string) {
	t.Helper()
	var stdout, stderr bytes.Buffer
	status = verbs.Run(args, strings.NewReader(stdin), &stdout, &stderr)
	return status, stdout.String(), stderr.String()
}

// sampleFile writes a sample into a new folder, which becomes the current one.
func sampleFile(t *testing.T, name string) string {
	t.Helper()
	t.Chdir(t.TempDir())
	data, err := samples.Read(name)
	if err != nil {
		t.Fatal(err)
	}
	file := name + ".stillroom"
	if err := os.WriteFile(file, data, 0o600); err != nil {
		t.Fatal(err)
	}
	return file
}

// keys returns the keys of an object, sorted.
func keys(v any) []string {
	var k []string
	for key := range v.(map[string]any) {
		k = append(k, key)
	}
	slices.Sort(k)
	return k
}

func wantKeys(t *testing.T, what string, v any, want ...string) {
	t.Helper()
	slices.Sort(want)
	if got := keys(v); !slices.Equal(got, want) {
		t.Errorf("%s has the keys %v, promised are %v", what, got, want)
	}
}

func decode(t *testing.T, out string) map[string]any {
	t.Helper()
	var v map[string]any
	d := json.NewDecoder(strings.NewReader(out))
	if err := d.Decode(&v); err != nil {
		t.Fatalf("%v in %s", err, out)
	}
	if d.More() {
		t.Fatal("more than one value is written")
	}
	return v
}

// The JSON of modes holds the promised keys and no others, and the figures of
// the study.
func TestModesJSON(t *testing.T) {
	for _, name := range samples.Names() {
		file := sampleFile(t, name)
		status, out, errs := run(t, "", "modes", file, "--as", "json")
		if status != 0 || errs != "" {
			t.Fatalf("%s: status %d, %s", name, status, errs)
		}
		v := decode(t, out)
		wantKeys(t, "modes", v, "air", "room", "modes", "absorber_poles")
		wantKeys(t, "air", v["air"], "speed_m_s", "density_kg_m3")
		wantKeys(t, "room", v["room"], "volume_m3", "surface_m2", "schroeder_hz")
		p, err := project.Load(file)
		if err != nil {
			t.Fatal(err)
		}
		r, err := study.Run(t.Context(), p, study.Options{}, nil, nil)
		if err != nil {
			t.Fatal(err)
		}
		list := v["modes"].([]any)
		if len(list) != len(r.Modes) {
			t.Fatalf("%s: %d modes, the study has %d", name, len(list), len(r.Modes))
		}
		for i, m := range list {
			wantKeys(t, "a mode", m, "order", "kind", "f_hz", "t60_s", "width_hz", "q", "damping_ratio", "damped_hz", "peak_hz", "level_db", "limit_s", "problem", "treated")
			row, want := m.(map[string]any), r.Modes[i]
			if f := row["f_hz"].(float64); f != want.Mode.Hz || f > 200 {
				t.Errorf("%s: mode %d at %v Hz, the study has %v", name, i, f, want.Mode.Hz)
			}
			if (row["level_db"] == nil) != math.IsNaN(want.LevelDB[0]) {
				t.Errorf("%s: level %v, the study has %v", name, row["level_db"], want.LevelDB[0])
			}
			for _, q := range row["treated"].([]any) {
				wantKeys(t, "a pole", q, "f_hz", "t60_s", "level_db")
			}
			if len(row["treated"].([]any)) != 1 {
				t.Errorf("%s: mode %d became %d poles", name, i, len(row["treated"].([]any)))
			}
		}
		for _, q := range v["absorber_poles"].([]any) {
			wantKeys(t, "an absorber's pole", q, "absorber", "f_hz", "t60_s", "level_db")
		}
		if name == "edit-suite" && len(v["absorber_poles"].([]any)) != 3 {
			t.Errorf("%d poles of absorbers, want 3: two boxes and a panel", len(v["absorber_poles"].([]any)))
		}
	}
}

func TestLevelJSON(t *testing.T) {
	for _, name := range samples.Names() {
		file := sampleFile(t, name)
		_, out, _ := run(t, "", "level", file, "--as", "json")
		v := decode(t, out)
		wantKeys(t, "level", v, "seat", "f_hz", "bare_db", "treated_db")
		hz := v["f_hz"].([]any)
		if len(hz) != 200 || hz[0].(float64) != 16 || hz[199].(float64) != 250 {
			t.Errorf("%s: %d points from %v to %v Hz", name, len(hz), hz[0], hz[len(hz)-1])
		}
		for i := 1; i < len(hz); i++ {
			if ratio := hz[i].(float64) / hz[i-1].(float64); math.Abs(ratio-math.Pow(250./16, 1./199)) > 1e-9 {
				t.Fatalf("%s: the points are not evenly spaced in log f", name)
			}
		}
		_, out, _ = run(t, "", "level", file, "--from", "30", "--to", "60", "--points", "7", "--as", "json")
		if v := decode(t, out); len(v["bare_db"].([]any)) != 7 || len(v["treated_db"].([]any)) != 7 {
			t.Errorf("%s: seven points were asked for", name)
		}
	}
}

// Where there is no absorber both curves are one.
func TestLevelWithoutAbsorbers(t *testing.T) {
	p := project.New()
	status, out, errs := run(t, string(p.Marshal()), "level", "-", "--points", "20", "--as", "json")
	if status != 0 {
		t.Fatal(errs)
	}
	v := decode(t, out)
	if !reflect.DeepEqual(v["bare_db"], v["treated_db"]) {
		t.Error("bare and treated differ without absorbers")
	}
	_, out, _ = run(t, string(p.Marshal()), "modes", "-", "--as", "json")
	for _, m := range decode(t, out)["modes"].([]any) {
		if got := m.(map[string]any)["treated"].([]any); len(got) != 0 {
			t.Fatalf("a mode became %v without absorbers", got)
		}
	}
}

func TestAbsorbersJSON(t *testing.T) {
	for _, name := range samples.Names() {
		file := sampleFile(t, name)
		_, out, _ := run(t, "", "absorbers", file, "--as", "json")
		v := decode(t, out)
		wantKeys(t, "absorbers", v, "absorbers")
		for _, a := range v["absorbers"].([]any) {
			wantKeys(t, "an absorber", a, "id", "kind", "f0_hz", "q", "damping_ratio", "damped_hz", "peak_hz", "band_hz", "third_octaves", "alpha_w", "alpha_w_shape", "impedance")
			row := a.(map[string]any)
			if broad := row["kind"] == "porous"; broad != (row["f0_hz"] == nil) || broad != (row["band_hz"] == nil) || broad != (row["q"] == nil) {
				t.Errorf("%s: %v of kind %v has f0 %v, band %v", name, row["id"], row["kind"], row["f0_hz"], row["band_hz"])
			}
			thirds := row["third_octaves"].([]any)
			if len(thirds) != 25 || thirds[0].(map[string]any)["nominal"] != "20" || thirds[24].(map[string]any)["nominal"] != "5000" {
				t.Errorf("%s: %d third octaves", name, len(thirds))
			}
			wantKeys(t, "a third octave", thirds[0], "nominal", "normal", "diffuse")
			wantKeys(t, "an impedance", row["impedance"].([]any)[0], "f_hz", "real", "imag")
		}
	}
}

// The criteria in their promised order, met, not met or null for information; the
// call is done whether or not they are met.
func TestCheckJSON(t *testing.T) {
	ids := []string{"bonello-counts", "bonello-coincident", "ratio-low", "ratio-high", "length", "width", "integer-ratio", "schroeder", "modal-overlap", "reverberation"}
	for _, name := range samples.Names() {
		file := sampleFile(t, name)
		status, out, errs := run(t, "", "check", file, "--as", "json")
		if status != 0 {
			t.Fatalf("%s: status %d, %s", name, status, errs)
		}
		v := decode(t, out)
		wantKeys(t, "check", v, "criteria")
		found := map[string]map[string]any{}
		for _, c := range v["criteria"].([]any) {
			wantKeys(t, "a criterion", c, "id", "title", "source", "figure", "limit", "unit", "met")
			row := c.(map[string]any)
			found[row["id"].(string)] = row
			if (row["met"] == nil) != (row["limit"] == nil) {
				t.Errorf("%s: %v has limit %v and met %v", name, row["id"], row["limit"], row["met"])
			}
		}
		for _, id := range ids {
			if found[id] == nil {
				t.Errorf("%s: no criterion %q", name, id)
			}
		}
		for _, id := range []string{"schroeder", "modal-overlap"} {
			if found[id]["met"] != nil {
				t.Errorf("%s: %s is judged", name, id)
			}
		}
		if _, text, _ := run(t, "", "check", file); !strings.Contains(text, "What to do") || !strings.Contains(text, "Schroeder frequency") {
			t.Errorf("%s: the table does not say what to do", name)
		}
		if _, table, _ := run(t, "", "check", file, "--as", "csv"); strings.Count(table, "\n") != len(found)+1 {
			t.Errorf("%s: %d lines of CSV for %d criteria", name, strings.Count(table, "\n"), len(found))
		}
	}
}

// A seat is chosen by its id.
func TestSeat(t *testing.T) {
	file := sampleFile(t, "listening-room")
	_, first, _ := run(t, "", "level", file, "--points", "5", "--as", "json")
	_, second, _ := run(t, "", "level", file, "--points", "5", "--as", "json", "--seat", "sofa")
	if decode(t, first)["seat"] != "chair" || decode(t, second)["seat"] != "sofa" || first == second {
		t.Error("--seat does not choose the seat")
	}
}

// Text and CSV say the same figures, with a heading for every column.
func TestTextAndCSV(t *testing.T) {
	file := sampleFile(t, "edit-suite")
	for _, c := range [][]string{{"modes", file, "--as", "csv"}, {"level", file, "--as", "csv"}, {"absorbers", file, "--as", "csv"}} {
		status, out, _ := run(t, "", c...)
		lines := strings.Split(strings.TrimSpace(out), "\n")
		if status != 0 || len(lines) < 3 {
			t.Fatalf("%v: status %d, %d lines", c, status, len(lines))
		}
		for _, l := range lines {
			if strings.Count(l, ",") < strings.Count(lines[0], ",") && !strings.Contains(l, `"`) {
				t.Errorf("%v: %q has not as many columns as %q", c, l, lines[0])
			}
		}
	}
	_, out, _ := run(t, "", "modes", file)
	for _, want := range []string{"T60 s", "Calculated", "32.45", "axial", "Schroeder"} {
		if !strings.Contains(out, want) {
			t.Errorf("the table does not say %q", want)
		}
	}
	if _, text, _ := run(t, "", "absorbers", file); !strings.Contains(text, "not measured") {
		t.Error("the absorbers' table does not say that it is calculated")
	}
}

// Wrong calls: exit 2, with the usage, and nothing written.
func TestWrongCalls(t *testing.T) {
	file := sampleFile(t, "edit-suite")
	for _, c := range [][]string{
		{}, {"measure"}, {"modes"}, {"modes", file, file}, {"modes", file, "--seat", "roof"}, {"modes", file, "--as", "xml"},
		{"modes", file, "--to", "x"}, {"modes", file, "--to", "-3"}, {"modes", file, "--loud"},
		{"level", file, "--from", "100", "--to", "100"}, {"level", file, "--from", "200", "--to", "100"}, {"level", file, "--points", "1"}, {"level", file, "--as", "text"},
		{"absorbers", file, "--as", "yaml"}, {"check"}, {"check", file, "--as", "xml"}, {"sheets", file}, {"sheets", file, "--out", "a.doc"}, {"figure", file, "--lane", "modes"},
		{"figure", file, "--lane", "sky", "--out", "a.png"}, {"figure", file, "--lane", "modes", "--out", "a.gif"}, {"sample", "ballroom"}, {"sample", "a", "b"},
		{"absorbers", file, "--field", "45"}, {"figure", file, "--lane", "level", "--hz", "50", "--out", "a.png"}, {"figure", file, "--lane", "plan", "--hz", "5000", "--out", "a.png"},
		{"tune", file}, {"tune", file, "--mode", "1,0"}, {"tune", file, "--mode", "0,0,0"}, {"tune", file, "--mode", "1,0,0;x"}, {"tune", file, "--mode", "1,0,-1"}, {"tune", file, "--mode", "90,0,0"},
		{"tune", file, "--mode", "1,0,0", "--kind", "bottle"}, {"tune", file, "--mode", "1,0,0", "--surface", "door"}, {"tune", file, "--mode", "1,0,0", "--goal", "beauty"},
		{"tune", file, "--mode", "1,0,0", "--depth", "5"}, {"tune", file, "--mode", "1,0,0", "--target", "0"}, {"tune", file, "--mode", "1,0,0", "--units", "0"},
	} {
		status, out, errs := run(t, "", c...)
		if status != 2 || !strings.Contains(errs, "usage") || out != "" {
			t.Errorf("%v: status %d, %q on standard output, %q", c, status, out, errs)
		}
	}
	if list, _ := os.ReadDir("."); len(list) != 1 {
		t.Errorf("%d files are there, only the sample was", len(list))
	}
}

// Bad files: exit 1, every error named, nothing written, no panic.
func TestBadFiles(t *testing.T) {
	file := sampleFile(t, "edit-suite")
	good, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	replace := func(pairs ...string) string {
		s := string(good)
		for i := 0; i < len(pairs); i += 2 {
			if !strings.Contains(s, pairs[i]) {
				t.Fatalf("%q is not in the sample", pairs[i])
			}
			s = strings.Replace(s, pairs[i], pairs[i+1], 1)
		}
		return s
	}
	for name, c := range map[string]struct {
		data string
		want []string
	}{
		"truncated":        {string(good[:len(good)/2]), []string{"line"}},
		"empty":            {"", []string{"must hold a project"}},
		"unknown key":      {replace(`"title"`, `"titel"`), []string{"titel"}},
		"wrong type":       {replace(`"length_m": 5.3`, `"length_m": "long"`), []string{"room.length_m: must be a number"}},
		"size of zero":     {replace(`"height_m": 2.58`, `"height_m": 0`), []string{"room.height_m: must be between 0.5 and 100, is 0"}},
		"seat outside":     {replace(`"at_m": [2.9, 1.93, 1.2]`, `"at_m": [2.9, 1.93, 12]`), []string{"seats[0].at_m[2]: must lie inside the room"}},
		"three at once":    {replace(`"title"`, `"titel"`, `"height_m": 2.58`, `"height_m": -1`, `"cavity_l": 153`, `"cavity_l": 0`), []string{"titel", "room.height_m", "absorbers[0].neck.cavity_l"}},
		"no UTF-8":         {"{\"title\": \"\xff\"}", []string{"UTF-8"}},
		"too many modes":   {replace(`"length_m": 5.3`, `"length_m": 100`, `"width_m": 3.86`, `"width_m": 90`, `"height_m": 2.58`, `"height_m": 90`), []string{"modes"}},
		"newer version":    {replace(`"stillroom": 1`, `"stillroom": 99`), []string{"newer"}},
		"deeply nested":    {strings.Repeat("[", 5000), []string{"line"}},
		"a lone surrogate": {replace(`Harbour`, `\ud800arbour`), []string{"title"}},
	} {
		if err := os.WriteFile("bad.stillroom", []byte(c.data), 0o600); err != nil {
			t.Fatal(err)
		}
		for _, call := range [][]string{{"modes", "bad.stillroom"}, {"level", "bad.stillroom"}, {"sheets", "bad.stillroom", "--out", "bad.pdf"},
			{"figure", "bad.stillroom", "--lane", "modes", "--out", "bad.png"}} {
			status, out, errs := run(t, "", call...)
			if status != 1 || out != "" {
				t.Errorf("%s, %s: status %d, %d bytes on standard output", name, call[0], status, len(out))
			}
			for _, want := range c.want {
				if !strings.Contains(errs, want) {
					t.Errorf("%s, %s: %q does not name %q", name, call[0], errs, want)
				}
			}
		}
	}
	for _, c := range [][]string{{"modes", "none.stillroom"}, {"sheets", file, "--out", filepath.Join("no", "where.pdf")}} {
		if status, _, errs := run(t, "", c...); status != 1 || errs == "" {
			t.Errorf("%v: status %d, %q", c, status, errs)
		}
	}
	list, _ := os.ReadDir(".")
	if len(list) != 2 {
		t.Errorf("%d files are there, want the two projects", len(list))
	}
}

func TestSampleNeverOverwrites(t *testing.T) {
	t.Chdir(t.TempDir())
	status, out, _ := run(t, "", "sample")
	if status != 0 || strings.TrimSpace(out) != "edit-suite.stillroom" {
		t.Fatalf("status %d, %q", status, out)
	}
	if err := os.WriteFile("edit-suite.stillroom", []byte("mine"), 0o600); err != nil {
		t.Fatal(err)
	}
	if status, _, errs := run(t, "", "sample", "edit-suite"); status != 1 || !strings.Contains(errs, "left as it is") {
		t.Errorf("status %d, %q", status, errs)
	}
	if data, _ := os.ReadFile("edit-suite.stillroom"); string(data) != "mine" {
		t.Error("the file is overwritten")
	}
	for _, name := range samples.Names()[1:] {
		if status, _, _ := run(t, "", "sample", name); status != 0 {
			t.Errorf("%s: status %d", name, status)
		}
		if _, err := project.Load(name + ".stillroom"); err != nil {
			t.Error(err)
		}
	}
}

// Pictures and papers are written whole, in every format.
func TestFigureAndSheets(t *testing.T) {
	file := sampleFile(t, "edit-suite")
	for name, begins := range map[string]string{"a.png": "\x89PNG", "a.svg": "<?xml", "a.pdf": "%PDF"} {
		for _, lane := range []string{"modes", "density", "level", "decay", "absorption", "plan", "section"} {
			if status, _, errs := run(t, "", "figure", file, "--lane", lane, "--out", name); status != 0 {
				t.Errorf("%s as %s: %s", lane, name, errs)
			}
			if data, _ := os.ReadFile(name); !bytes.HasPrefix(data, []byte(begins)) {
				t.Errorf("%s as %s begins with %q", lane, name, data[:min(8, len(data))])
			}
		}
	}
	if status, _, errs := run(t, "", "sheets", file, "--out", "set.pdf", "--paper", "letter", "--units", "us"); status != 0 {
		t.Error(errs)
	}
	if data, _ := os.ReadFile("set.pdf"); !bytes.HasPrefix(data, []byte("%PDF")) {
		t.Error("the set is no PDF")
	}
}

func TestHelp(t *testing.T) {
	status, out, _ := run(t, "", "help")
	if status != 0 {
		t.Errorf("status %d", status)
	}
	for _, v := range []string{"modes", "level", "absorbers", "check", "sheets", "figure", "sample"} {
		if !strings.Contains(out, "stillroom "+v+" ") || !verbs.Known(v) {
			t.Errorf("the usage does not explain %s", v)
		}
		if status, text, _ := run(t, "", v, "--help"); status != 0 || !strings.Contains(text, "usage") {
			t.Errorf("%s --help: status %d, %q", v, status, text)
		}
	}
}
