package resonators

import "testing"

func BenchmarkAnalyse(b *testing.B) {
	for _, c := range specimens() {
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				Analyse(c.absorber, testAir, unitSize)
			}
		})
	}
}

func BenchmarkInRoom(b *testing.B) {
	for _, c := range specimens() {
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				c.absorber.InRoom(complex(380, 4), 0.25, testAir)
			}
		})
	}
}
