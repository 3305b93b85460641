package resolve

// geometry is the session's index of where things are.
type geometry struct{}

func (g *geometry) remove(f *fragment) {}
func (g *geometry) change(f *fragment) {}
