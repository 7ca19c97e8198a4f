package job

import (
	"slices"
	"strings"
)

// What the reader asks the catalogues of hardware and materials; nothing else in the package knows a
// size. The designations are those for which a hole, a seat or a fit is tabulated.

// size is a designation and its diameter: of a bolt the nominal one, of a bearing the bore, mm.
type size struct {
	name string
	mm   float64
}

// bolts: ISO 273 (metric) and ASME B18.2.8 (inch; numbers by 0.060 + 0.013 n inch).
var bolts = []size{
	{"M1.6", 1.6},
	{"M2", 2},
	{"M2.5", 2.5},
	{"M3", 3},
	{"M3.5", 3.5},
	{"M4", 4},
	{"M5", 5},
	{"M6", 6},
	{"M7", 7},
	{"M8", 8},
	{"M10", 10},
	{"M12", 12},
	{"#2", 2.184},
	{"#3", 2.515},
	{"#4", 2.845},
	{"#5", 3.175},
	{"#6", 3.505},
	{"#8", 4.166},
	{"#10", 4.826},
	{"1/4", 6.35},
	{"5/16", 7.938},
	{"3/8", 9.525},
}

// bearingBores: ISO 15 boundary dimensions, by bore in mm; with F (MF) before the number the same with
// a flange.
var bearingBores = []struct {
	mm    float64
	names string
}{
	{3, "623 683 693 MR63 MR83 MR93"},
	{4, "624 604 634 684 694 MR74 MR84 MR104"},
	{5, "625 605 635 685 695 MR85 MR95 MR105 MR115"},
	{6, "626 606 686 696 MR106 MR126"},
	{7, "607 627 MR117"},
	{8, "608 688 MR128 MR148"},
	{10, "6000 6800 6900"},
	{12, "6001 6801 6901"},
	{15, "6802"},
	{17, "6803"},
	{20, "6804"},
}

// holeClasses: ISO 286-2.
var holeClasses = []string{"D9", "E9", "F7", "F8", "G7", "H7", "H8", "H9", "H11", "JS7", "K7", "M7", "N7", "P7"}

func boltNames() []string {
	names := make([]string, len(bolts))
	for i, b := range bolts {
		names[i] = b.name
	}
	return names
}

func boltDiameter(name string) (float64, bool) {
	i := slices.IndexFunc(bolts, func(b size) bool { return b.name == name })
	if i < 0 {
		return 0, false
	}
	return bolts[i].mm, true
}

// boltFor is the metric bolt that fills a bore, "" when there is none.
func boltFor(bore float64) string {
	for _, b := range bolts {
		if b.mm == bore && b.name[0] == 'M' {
			return b.name
		}
	}
	return ""
}

func bearingNames() []string {
	var names []string
	for _, b := range bearingBores {
		names = append(names, strings.Fields(b.names)...)
	}
	return names
}

func bearingBore(name string) (float64, bool) {
	plain := strings.TrimPrefix(name, "F")
	if strings.HasPrefix(name, "MF") {
		plain = "MR" + strings.TrimPrefix(name, "MF")
	}
	for _, b := range bearingBores {
		if slices.Contains(strings.Fields(b.names), plain) {
			return b.mm, true
		}
	}
	return 0, false
}

func isHoleClass(name string) bool { return slices.Contains(holeClasses, name) }

// material reads the name of a material.
func (r *reader) material(v *value) string { return v.textOr("") }
