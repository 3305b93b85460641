package catalogue

// tables returns all series, in the order of a handbook. Where two share a
// spelling, the first has it.
func tables() []*shelf {
	return []*shelf{
		shelfIPE(), shelfHEA(), shelfHEB(), shelfHEM(),
	}
}
