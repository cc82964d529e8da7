package acoustics

import (
	"context"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// The polynomial must stand for the sums it was made from all over the stretches
// it is used on; that those stand for all modes is another test's business.
func TestDistantsAgreeWithCompleteSums(t *testing.T) {
	f := studioField(t, eightBottles(studio(t)))
	distants, err := f.newDistants(context.Background(), 0, 1.2*200)
	if err != nil {
		t.Fatal(err)
	}
	short, whole := f.newTransfer(), f.newTransfer()
	short.distants = distants
	rapid.Check(t, func(t *rapid.T) {
		omega := complex(rapid.Float64Range(60, 1500).Draw(t, "re"), rapid.Float64Range(0, tallest).Draw(t, "im"))
		short.at(omega, -1)
		whole.complete(omega, 0, distantFor(distants, omega).whole)
		for p := range f.units {
			for q := range p + 1 {
				a, b := short.unitPair(p, q), whole.unitPair(p, q)
				scale := whole.unitPair(p, p)
				if d := cmplx.Abs(a - b); d > 1e-6*cmplx.Abs(scale) {
					t.Fatalf("units %d, %d at ω = %v: %v with the polynomial, %v complete", p, q, omega, a, b)
				}
			}
		}
	})
}
