package manifest

import (
	"math"
	"reflect"
)

// settled returns the manifest with every number rounded to nine decimals, a millionth of a micrometre:
// what processors differ in (whether a product and a sum are rounded once or twice) is beyond that,
// so the same job gives the same text on all of them. The caller's lists stay as they are.
func settled(m Manifest) Manifest {
	return settle(reflect.ValueOf(m)).Interface().(Manifest)
}

func settle(v reflect.Value) reflect.Value {
	out := reflect.New(v.Type()).Elem()
	switch v.Kind() {
	case reflect.Float64:
		r := math.Round(v.Float()*1e9) / 1e9
		if math.IsNaN(r) || math.IsInf(r, 0) {
			r = v.Float() // too large to have decimals
		}
		out.SetFloat(r + 0) // no negative zero
	case reflect.Struct:
		for i := range v.NumField() {
			out.Field(i).Set(settle(v.Field(i)))
		}
	case reflect.Slice:
		if v.IsNil() {
			return v
		}
		out.Set(reflect.MakeSlice(v.Type(), v.Len(), v.Len()))
		for i := range v.Len() {
			out.Index(i).Set(settle(v.Index(i)))
		}
	default:
		out.Set(v)
	}
	return out
}
