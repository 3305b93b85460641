package envelope

import "spanwright/analysis/element"

// Member holds the quantities along one physical member in every basic state.
type Member struct {
	// N, Vy, Vz, T, My, Mz are the section forces; V and W the movements along
	// the member's y and z; BentV and BentW the departures from the chord.
	Paths [element.BentW + 1]*Path
	// BentKnown says that the departure from the chord could be worked out.
	BentKnown bool
}

// Path returns that of one component.
func (m *Member) Path(c element.Component) *Path { return m.Paths[c] }

// LargestOf joins rankings of the same sums by different measures: of each sum its
// largest value counts. It returns at most count of them, largest first.
func LargestOf(count int, rankings ...[]Peak) []Peak {
	var all []Peak
	for _, ranking := range rankings {
		for _, peak := range ranking {
			known := false
			for i := range all {
				if all[i].Sum == peak.Sum {
					known = true
					if further(peak.Value, peak.At, all[i].Value, all[i].At) {
						all[i] = peak
					}
				}
			}
			if !known {
				all = append(all, peak)
			}
		}
	}
	var best []Peak
	for _, peak := range all {
		place := len(best)
		for place > 0 && (above(peak.Value, best[place-1].Value) ||
			!above(best[place-1].Value, peak.Value) && peak.Sum < best[place-1].Sum) {
			place--
		}
		best = append(best, Peak{})
		copy(best[place+1:], best[place:])
		best[place] = peak
	}
	return best[:min(count, len(best))]
}
