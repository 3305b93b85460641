package combine

import "spanwright/lang/model"

// Action is what a code gives one set of factors to: the cases of one kind,
// and for imposed loads of one category ('A' to 'H'; 0 where none is given).
type Action struct {
	Kind     model.CaseKind
	Category byte
}

// ActionOf returns the action that a case is part of.
func ActionOf(c *model.Case) Action {
	if c.Kind != model.Imposed {
		return Action{Kind: c.Kind}
	}
	return Action{Kind: c.Kind, Category: c.Category}
}

// String returns the action in the words of the language: "imposed B", "snow".
func (a Action) String() string {
	if a.Category == 0 {
		return a.Kind.String()
	}
	return a.Kind.String() + " " + string(rune(a.Category))
}

// The actions that the tables of the codes speak of.
var (
	imposedOf  = func(category byte) Action { return Action{model.Imposed, category} }
	snow       = Action{Kind: model.Snow}
	wind       = Action{Kind: model.Wind}
	thermal    = Action{Kind: model.Thermal}
	settlement = Action{Kind: model.Settlement}
	accidental = Action{Kind: model.Accidental}
	earthquake = Action{Kind: model.Earthquake}
)

// imposedBelow are the imposed loads on floors: all but those on roofs.
func imposedBelow() []Action {
	list := []Action{imposedOf(0)}
	for category := byte('A'); category < 'H'; category++ {
		list = append(list, imposedOf(category))
	}
	return list
}

// variableActions are all variable actions, in a fixed order.
func variableActions() []Action {
	return append(imposedBelow(), imposedOf('H'), snow, wind, thermal)
}
