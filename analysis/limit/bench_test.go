package limit

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"spanwright/analysis/element"
	"spanwright/analysis/envelope"
	"spanwright/lang/model"
)

// spaceMember is a member of a space frame under uniform loads in all its
// states, with one piece.
func spaceMember(random *rand.Rand, states int) [][]element.Piece {
	pieces := make([][]element.Piece, states)
	for s := range pieces {
		p := element.Piece{From: 0, To: 6}
		fill := func(c element.Component, degree int, scale float64) {
			for k := 0; k <= degree; k++ {
				p.Courses[c][k] = scale * random.NormFloat64()
				scale /= 3
			}
		}
		fill(element.N, 0, 100e3)
		fill(element.Vy, 1, 5e3)
		fill(element.Vz, 1, 30e3)
		fill(element.T, 0, 1e3)
		fill(element.My, 2, 50e3)
		fill(element.Mz, 2, 5e3)
		fill(element.BentV, 4, 0.002)
		fill(element.BentW, 4, 0.01)
		pieces[s] = []element.Piece{p}
	}
	return pieces
}

func manySums(random *rand.Rand, states, count int) []envelope.Sum {
	sums := make([]envelope.Sum, count)
	for i := range sums {
		for s := range states {
			if s < 2 || random.IntN(3) == 0 {
				sums[i] = append(sums[i], envelope.Term{State: s, Factor: []float64{1.35, 1, 1.5, 0.9}[random.IntN(4)]})
			}
		}
	}
	return sums
}

// BenchmarkMemberEnvelope is all that is asked of one member: section forces,
// deflection and stress; multiply by the number of members.
func BenchmarkMemberEnvelope(b *testing.B) {
	section := &model.Section{A: 5e-3, Wy: 6e-4, Wz: 8e-5}
	for _, count := range []int{20, 200} {
		for _, states := range []int{4, 20} {
			b.Run(fmt.Sprintf("cases=%d/combinations=%d", states, count), func(b *testing.B) {
				random := rand.New(rand.NewPCG(1, 2))
				sums := manySums(random, states, count)
				pieces := make([][][]element.Piece, 64)
				for i := range pieces {
					pieces[i] = spaceMember(random, states)
				}
				b.ReportAllocs()
				for i := 0; b.Loop(); i++ {
					along := envelope.NewMember(pieces[i%len(pieces)], true)
					for c := element.N; c <= element.Mz; c++ {
						along.Path(c).Extremes(sums)
					}
					envelope.Largest(sums, 1, along.Path(element.BentV), along.Path(element.BentW))
					stress, _ := StressOf(section, along)
					stress.Tension(sums, 1)
					stress.Compression(sums, 1)
				}
			})
		}
	}
}
