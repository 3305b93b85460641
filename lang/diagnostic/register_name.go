package diagnostic

func nameEntries() []Entry { return nil }
