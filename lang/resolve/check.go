package resolve

// check looks at the model as a whole.
func (a *assembly) check() {}
