package job

import (
	"regexp"
	"strconv"
)

// What the reader asks the catalogues of hardware and materials.

var metricSize = regexp.MustCompile(`^M([0-9]+(?:\.[0-9]+)?)$`)

func boltNames() []string {
	return []string{"M2", "M2.5", "M3", "M4", "M5", "M6", "M8", "M10", "M12", "#2", "#4", "#6", "#8", "#10", "1/4", "5/16", "3/8"}
}

func boltDiameter(name string) (float64, bool) {
	if m := metricSize.FindStringSubmatch(name); m != nil && contains(boltNames(), name) {
		d, err := strconv.ParseFloat(m[1], 64)
		return d, err == nil
	}
	return 6.35, contains(boltNames(), name)
}

func boltFor(bore float64) string {
	name := "M" + figure(bore)
	if contains(boltNames(), name) {
		return name
	}
	return ""
}

func bearingNames() []string { return []string{"623", "624", "625", "626", "608", "MR105"} }

func bearingBore(name string) (float64, bool) {
	b, ok := map[string]float64{"623": 3, "624": 4, "625": 5, "626": 6, "608": 8, "MR105": 5}[name]
	return b, ok
}

func isHoleClass(s string) bool { return regexp.MustCompile(`^[A-Z]{1,2}[0-9]{1,2}$`).MatchString(s) }

func (r *reader) material(v *value) string {
	return v.textOr("")
}
