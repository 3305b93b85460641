package diagnostic

func syntaxEntries() []Entry { return nil }
