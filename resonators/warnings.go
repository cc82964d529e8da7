package resonators

import "stillroom/acoustics"

// warnings returns what is to be said of the absorber.
func warnings(a Absorber, air acoustics.Air, size [2]float64, o *acoustics.Oscillator) []string {
	return nil
}
