package window

import (
	"os"
	"testing"

	"gonum.org/v1/plot/vg"
)

func vgOf(units float32) vg.Length { return vg.Length(units) * unit }

func TestMain(m *testing.M) {
	// The toolkit complains of a locale that names no language.
	os.Setenv("LANG", "en_GB.UTF-8")
	os.Exit(m.Run())
}
