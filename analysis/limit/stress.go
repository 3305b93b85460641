package limit

import (
	"strings"

	"spanwright/analysis/element"
	"spanwright/analysis/envelope"
	"spanwright/lang/model"
)

// Stress is the elastic normal stress of a member at its extreme fibres, Pa,
// tension positive, in every basic state.
//
// Sections with corners have N/A ± My/Wy ± Mz/Wz there (EN 1993-1-1, 6.2.1(9),
// elastic verification). Round ones have no corners: N/A ± √(My² + Mz²)/W.
type Stress struct {
	corners     []*envelope.Path
	axial, a, b *envelope.Path // round sections: N/A, My/W, Mz/W
	mirrored    *envelope.Path // −N/A
}

// StressOf returns the stress along a member of this section. Where the section
// lacks a property that the stress needs, the word for it comes back instead:
// "A", "Wy" or "Wz".
func StressOf(s *model.Section, along *envelope.Member) (stress *Stress, lacks string) {
	n, my, mz := along.Path(element.N), along.Path(element.My), along.Path(element.Mz)
	switch {
	case s.A == 0:
		return nil, "A"
	case s.Wy == 0 && !my.Zero():
		return nil, "Wy"
	case s.Wz == 0 && !mz.Zero():
		return nil, "Wz"
	}
	inverse := func(w float64) float64 {
		if w == 0 {
			return 0 // no moment about this axis
		}
		return 1 / w
	}
	perA, perWy, perWz := 1/s.A, inverse(s.Wy), inverse(s.Wz)
	if Round(s) {
		return &Stress{
			axial:    envelope.Blend([]float64{perA}, n),
			mirrored: envelope.Blend([]float64{-perA}, n),
			a:        envelope.Blend([]float64{perWy}, my),
			b:        envelope.Blend([]float64{perWz}, mz),
		}, ""
	}
	stress = &Stress{}
	for _, signY := range signs(my) {
		for _, signZ := range signs(mz) {
			// My > 0 puts tension on the −z side, Mz > 0 on the −y side.
			stress.corners = append(stress.corners, envelope.Blend([]float64{perA, signY * perWy, signZ * perWz}, n, my, mz))
		}
	}
	return stress, ""
}

// signs are those of a moment that matter: none for a moment that is zero.
func signs(moment *envelope.Path) []float64 {
	if moment.Zero() {
		return []float64{0}
	}
	return []float64{1, -1}
}

// Round says that a section is a circle or a ring, which has the same modulus
// about every axis.
func Round(s *model.Section) bool {
	series := s.Series
	if series == "" {
		series, _, _ = strings.Cut(s.Title, " ")
	}
	switch strings.ToLower(series) {
	case "round", "pipe", "chs":
		return true
	}
	return false
}

// Size returns the sums with the largest stress of either sign, at most count
// of them, as sizes.
func (s *Stress) Size(sums []envelope.Sum, count int) []envelope.Peak {
	if s.corners == nil {
		return envelope.LargestOf(count,
			envelope.LargestOffset(sums, count, s.axial, s.a, s.b),
			envelope.LargestOffset(sums, count, s.mirrored, s.a, s.b))
	}
	rankings := make([][]envelope.Peak, len(s.corners))
	for i, corner := range s.corners {
		rankings[i] = envelope.Largest(sums, count, corner, nil)
	}
	return envelope.LargestOf(count, rankings...)
}

// Tension returns the sums with the largest stress, at most count of them.
func (s *Stress) Tension(sums []envelope.Sum, count int) []envelope.Peak {
	if s.corners == nil {
		return envelope.LargestOffset(sums, count, s.axial, s.a, s.b)
	}
	rankings := make([][]envelope.Peak, len(s.corners))
	for i, corner := range s.corners {
		rankings[i] = envelope.LargestSigned(sums, count, corner, false)
	}
	return envelope.LargestOf(count, rankings...)
}

// Compression returns the sums with the smallest stress, at most count of them,
// the smallest first.
func (s *Stress) Compression(sums []envelope.Sum, count int) []envelope.Peak {
	var rankings [][]envelope.Peak
	if s.corners == nil {
		rankings = append(rankings, envelope.LargestOffset(sums, count, s.mirrored, s.a, s.b))
	}
	for _, corner := range s.corners {
		rankings = append(rankings, negated(envelope.LargestSigned(sums, count, corner, true)))
	}
	return negated(envelope.LargestOf(count, rankings...))
}

// negated turns the signs of values, so that the smallest rank as largest.
func negated(peaks []envelope.Peak) []envelope.Peak {
	for i := range peaks {
		peaks[i].Value = -peaks[i].Value
	}
	return peaks
}

// ShearStress returns the sums with the largest mean shear stress
// √((Vy/Avy)² + (Vz/Avz)²), Pa, at most count of them. Where the section lacks
// a shear area that it needs, the word for it comes back instead.
func ShearStress(s *model.Section, along *envelope.Member, sums []envelope.Sum, count int) (peaks []envelope.Peak, lacks string) {
	vy, vz := along.Path(element.Vy), along.Path(element.Vz)
	weight := func(area float64) []float64 {
		if area == 0 {
			return []float64{0}
		}
		return []float64{1 / area}
	}
	switch {
	case s.Avy == 0 && !vy.Zero():
		return nil, "Avy"
	case s.Avz == 0 && !vz.Zero():
		return nil, "Avz"
	}
	return envelope.Largest(sums, count, envelope.Blend(weight(s.Avy), vy), envelope.Blend(weight(s.Avz), vz)), ""
}
