package samples_test

import (
	"bytes"
	"testing"

	"stillroom/app/project"
	"stillroom/samples"
)

// Each sample opens without a fault, has absorbers, says that it is invented, and
// stands in the form in which the program would save it.
func TestSamplesOpen(t *testing.T) {
	if len(samples.Names()) != 3 {
		t.Errorf("%d samples, want 3", len(samples.Names()))
	}
	kinds := map[string]bool{}
	for _, name := range samples.Names() {
		data, err := samples.Read(name)
		if err != nil {
			t.Fatal(err)
		}
		p, err := project.Parse(data)
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if len(p.Absorbers) == 0 || !bytes.Contains([]byte(p.Note), []byte("invented")) {
			t.Errorf("%s: %d absorbers, note %q", name, len(p.Absorbers), p.Note)
		}
		for _, a := range p.Absorbers {
			kinds[a.Kind] = true
		}
		if !bytes.Equal(p.Marshal(), data) {
			t.Errorf("%s: saved again it is another file", name)
		}
	}
	for _, k := range project.Kinds() {
		if !kinds[k] {
			t.Errorf("no sample has an absorber of kind %s", k)
		}
	}
	if _, err := samples.Read("ballroom"); err == nil {
		t.Error("an unknown sample is read")
	}
}
