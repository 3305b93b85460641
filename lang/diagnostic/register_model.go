package diagnostic

func modelEntries() []Entry { return nil }
