package verbs_test

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"strings"
	"testing"

	"stillroom/app/project"
)

// The round trip: the worst problem mode below 100 Hz of the sample without its
// absorbers is brought under its limit by what the tuner proposes first; put into the
// file, saved and read again, the modes verb says the same of it.
func TestRoundTripFromTheTuner(t *testing.T) {
	file := sampleFile(t, "edit-suite")
	p, err := project.Load(file)
	if err != nil {
		t.Fatal(err)
	}
	p.Absorbers = nil
	write := func() {
		t.Helper()
		if err := os.WriteFile(file, p.Marshal(), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	write()
	modes := func() []any {
		t.Helper()
		status, out, errs := run(t, "", "modes", file, "--to", "100", "--as", "json")
		if status != 0 {
			t.Fatal(errs)
		}
		return decode(t, out)["modes"].([]any)
	}
	var worst map[string]any
	for _, m := range modes() {
		x := m.(map[string]any)
		if x["problem"] != true {
			continue
		}
		over := func(m map[string]any) float64 {
			return m["level_db"].(float64) + 20*math.Log10(m["t60_s"].(float64)/m["limit_s"].(float64))
		}
		if worst == nil || over(x) > over(worst) {
			worst = x
		}
	}
	if worst == nil {
		t.Fatal("the sample has no problem mode below 100 Hz")
	}
	o := worst["order"].([]any)
	order := fmt.Sprintf("%v,%v,%v", o[0], o[1], o[2])
	status, out, errs := run(t, "", "tune", file, "--mode", order, "--kind", "neck", "--depth", "350", "--as", "json")
	if status != 0 || errs != "" {
		t.Fatalf("status %d, %s", status, errs)
	}
	v := decode(t, out)
	wantKeys(t, "tune", v, "mode", "goal", "target_s", "candidates")
	best := v["candidates"].([]any)[0].(map[string]any)
	wantKeys(t, "candidate", best, "rank", "absorber", "where", "f0_hz", "q", "coupling_ratio", "after", "t60_after_s", "meets", "peak_before_db", "peak_after_db",
		"volume_m3", "sheet_m2", "least_volume_m3", "least_area_m2", "neighbours", "tolerances", "t60_5c_colder_s", "t60_5c_warmer_s")
	if best["meets"] != true {
		t.Fatalf("the best proposal leaves %v s of a limit of %v s", best["t60_after_s"], worst["limit_s"])
	}
	// Into the file as a person would paste it.
	absorber, err := json.Marshal(best["absorber"])
	if err != nil {
		t.Fatal(err)
	}
	text := strings.Replace(string(p.Marshal()), `"absorbers": []`, `"absorbers": [`+string(absorber)+`]`, 1)
	if p, err = project.Parse([]byte(text)); err != nil {
		t.Fatal(err)
	}
	write()
	longest := 0.0
	for _, m := range modes() {
		x := m.(map[string]any)
		if fmt.Sprint(x["order"]) == fmt.Sprint(worst["order"]) {
			for _, pole := range x["treated"].([]any) {
				longest = math.Max(longest, pole.(map[string]any)["t60_s"].(float64))
			}
		}
	}
	if said := best["t60_after_s"].(float64); longest > worst["limit_s"].(float64) || longest > said*1.005 {
		t.Errorf("the mode rings %.3f s; the tuner said %.3f s, the limit is %v s", longest, said, worst["limit_s"])
	}
}

// The same call answers with the same bytes, in every form.
func TestTuneRepeats(t *testing.T) {
	file := sampleFile(t, "edit-suite")
	for _, as := range []string{"text", "csv", "json"} {
		call := []string{"tune", file, "--mode", "0,0,1", "--kind", "panel", "--surface", "ceiling", "--goal", "volume", "--target", "0.6", "--as", as}
		status, a, errs := run(t, "", call...)
		if status != 0 || errs != "" || len(a) < 100 {
			t.Fatalf("%s: status %d, %q, %d bytes", as, status, errs, len(a))
		}
		if _, b, _ := run(t, "", call...); a != b {
			t.Errorf("%s: asked twice, it answers differently", as)
		}
	}
}

// A plan for several modes says for each absorber what it is for, and what stays
// open.
func TestTunePlan(t *testing.T) {
	file := sampleFile(t, "vocal-booth")
	status, out, errs := run(t, "", "tune", file, "--mode", "0,2,0;0,1,0", "--kind", "neck", "--surface", "back", "--units", "2", "--as", "json")
	if status != 0 || errs != "" {
		t.Fatalf("status %d, %s", status, errs)
	}
	v := decode(t, out)
	wantKeys(t, "plan", v, "goal", "steps", "open")
	for _, s := range v["steps"].([]any) {
		wantKeys(t, "step", s, "mode", "f_hz", "before_s", "after_s", "limit_s", "absorber", "where", "volume_m3", "sheet_m2")
	}
}
