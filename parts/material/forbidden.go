package material

// forbidden is what must not go into a laser: its names, the first being the one to speak of, and why.
// Names of two letters count only when they are all that is said.
var forbidden = []struct {
	names  []string
	reason string
	source string
}{
	{
		[]string{
			"PVC", "vinyl", "polyvinyl", "polyvinylchloride", "uPVC", "forex", "artificial leather", "faux leather",
			"imitation leather", "leatherette", "leather look", "pleather", "chlorinated", "CPVC",
		},
		"it holds chlorine: hydrogen chloride poisons people and corrodes the machine",
		pagesMany,
	},
	{
		[]string{"pressure treated wood", "pressure treated", "treated wood", "treated timber"},
		"its preservatives give off chlorine and worse",
		pagesMany,
	},
	{[]string{"ABS", "acrylonitrile"}, "it gives off hydrogen cyanide, melts and catches fire", pagesMany},
	{
		[]string{"polycarbonate", "PC", "lexan", "makrolon"},
		"it chars, burns and discolours instead of cutting, with toxic fumes",
		pagesMany,
	},
	{
		[]string{"PTFE", "teflon", "fluoropolymer", "FEP", "PVDF"},
		"it gives off carbonyl fluoride and hydrogen fluoride; PTFE washers are bought, not cut",
		pagesMany,
	},
	{
		[]string{
			"glass fibre laminate", "fibreglass", "fiberglass", "glass fibre", "glass fiber", "GRP", "GFRP", "FR4", "G10", "epoxy",
		},
		"the glass does not cut, and the epoxy gives off hydrogen cyanide",
		pagesMany,
	},
	{
		[]string{"carbon fibre laminate", "carbon fibre", "carbon fiber", "CFRP", "carbon laminate"},
		"its resin gives off noxious fumes and hydrogen cyanide",
		pagesMany,
	},
	{[]string{"HDPE", "polyethylene", "PE", "LDPE", "UHMWPE", "UHMW"}, "it melts and catches fire", pagesMany + "; one public table disagrees"},
	{[]string{"PETG", "PET G", "copolyester"}, "it melts, burns and gives off formaldehyde", pagesMany},
	{
		[]string{"foam", "styrofoam", "foamboard", "foamcore", "depron", "EPS", "XPS", "EPP"},
		"it catches fire: foam is the first cause of laser fires",
		pagesMany,
	},
	{
		[]string{"nylon", "polyamide", "PA", "PA6", "PA66", "polyurethane", "PU", "PUR", "TPU"},
		"it holds nitrogen and gives off hydrogen cyanide; nylon washers are bought, not cut",
		pagesMany,
	},
	{
		[]string{"rubber", "elastomer", "neoprene", "viton", "FKM"},
		"fluoro rubber gives off hydrogen fluoride, chlorinated rubber chlorine, and which it is can't be seen",
		pagesMany,
	},
	{
		[]string{"self adhesive", "adhesive backed", "glue backed", "sticky backed"},
		"the glue fouls the optics",
		pages + ", 1 place",
	},
}
