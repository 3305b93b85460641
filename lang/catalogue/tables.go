package catalogue

// tables returns all series, in the order of a handbook. Where two share a
// spelling, the first has it.
func tables() []*shelf {
	list := []*shelf{shelfIPE(), shelfHEA(), shelfHEB(), shelfHEM(), shelfUPE(), shelfUPN(), shelfL()}
	list = append(list, hollows()...)
	return append(list, shelfUB(), shelfUC(), shelfW())
}
