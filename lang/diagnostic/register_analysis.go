package diagnostic

func analysisEntries() []Entry { return nil }
