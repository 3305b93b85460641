package diagnostic

func quantityEntries() []Entry { return nil }
