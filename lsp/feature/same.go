package feature

import (
	"math"
	"reflect"

	"spanwright/lang/model"
)

// unseen are the fields of a model that an analysis does not see, or that hold
// names.
var unseen = map[string]bool{"Name": true, "Origin": true, "Heading": true, "Files": true, "Text": true, "Title": true, "Generated": true, "Display": true}

// sameStructure reports whether two models are the same to an analysis, names
// aside; if not, it says which part of the model differs.
func sameStructure(a, b *model.Model) (same bool, what string) {
	x, y := reflect.ValueOf(a).Elem(), reflect.ValueOf(b).Elem()
	for i := range x.NumField() {
		field := x.Type().Field(i)
		if !unseen[field.Name] && !sameValue(x.Field(i), y.Field(i)) {
			return false, field.Name
		}
	}
	return true, ""
}

func sameValue(a, b reflect.Value) bool {
	switch a.Kind() {
	case reflect.Struct:
		for i := range a.NumField() {
			if !unseen[a.Type().Field(i).Name] && !sameValue(a.Field(i), b.Field(i)) {
				return false
			}
		}
		return true
	case reflect.Slice:
		if a.Len() != b.Len() {
			return false
		}
		fallthrough
	case reflect.Array:
		for i := range a.Len() {
			if !sameValue(a.Index(i), b.Index(i)) {
				return false
			}
		}
		return true
	case reflect.Float64:
		// The same number written in another unit may differ in its last digit.
		x, y := a.Float(), b.Float()
		return math.Abs(x-y) <= 4e-16*math.Max(math.Abs(x), math.Abs(y)) || x == y || math.IsNaN(x) && math.IsNaN(y)
	default:
		return a.Equal(b)
	}
}
