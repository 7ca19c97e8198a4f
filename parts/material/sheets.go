package material

// The cautions that several materials share.
const (
	watch     = "Never leave a running laser alone; keep a fire extinguisher at hand."
	fumes     = "Cut with extraction: the fumes are unhealthy."
	noDiode   = "A 450 nm diode laser does not cut clear or blue acrylic (university and workshop laser safety pages, 1 place)."
	noHobby   = "A hobby CO2 laser does not cut metal (university and workshop laser safety pages, 2+ places)."
	shopKerf  = "Metal shops usually compensate the kerf themselves: ask, and say compensated-by: shop, or parts are compensated twice."
	measure   = "Check the real thickness and say measured: bolts, spacers and slots follow it."
	toWasher  = "put a washer between parts that rub"
	pages     = "university and workshop laser safety pages"
	pagesMany = pages + ", 2+ places"
)

const (
	acrylicFriction = "acrylic on acrylic or steel 0.4 to 0.7 (data sheets and handbooks, 1 place): " + toWasher
	woodFriction    = "wood on wood, dry, 0.3 to 0.5 (data sheets and handbooks, 1 place): " + toWasher
	steelFriction   = "steel on steel, dry, 0.5 to 0.8 (data sheets and handbooks, 1 place): " + toWasher
	pomFriction     = "POM on steel 0.1 to 0.3 (data sheets and handbooks, 2+ places): runs well without washers"
)

// sheets is the table of materials.
var sheets = []Material{
	{
		Name:      "cast acrylic",
		Density:   Figure{1190, "ISO 1183; published data sheets and handbooks, 2+ places"},
		Brittle:   true, // elongation at break 2 to 6 %, ISO 527; 2+ places
		Grain:     "none",
		Edge:      brittleEdge,
		Friction:  acrylicFriction,
		Lasers:    []Laser{CO2},
		Verdict:   OK,
		Cautions:  []string{watch, fumes, noDiode, measure},
		tolerance: castAcrylic,
		web:       co2Web,
		kerfs:     acrylicKerfs,
	},
	{
		Name:      "extruded acrylic",
		Density:   Figure{1190, "published data sheets and handbooks, 2+ places"},
		Brittle:   true, // elongation at break 4 to 4.5 %; 2+ places
		Grain:     "none",
		Edge:      brittleEdge,
		Friction:  acrylicFriction,
		Lasers:    []Laser{CO2},
		Verdict:   OK,
		Cautions:  []string{watch, fumes, noDiode, "Extruded sheet melts more and cracks sooner than cast sheet, most of all after alcohol or glue on a cut edge (common practice, no source)."},
		tolerance: extrudedAcrylic,
		web:       co2Web,
		kerfs:     acrylicKerfs,
	},
	{
		Name:      "birch plywood",
		Density:   Figure{680, "EN 323; published data sheets and handbooks, 1 place"},
		Brittle:   true, // across the grain of the face
		Grain:     "half-turn",
		Edge:      brittleEdge,
		Friction:  woodFriction,
		Lasers:    []Laser{CO2, Diode},
		Verdict:   OK,
		Cautions:  []string{watch, fumes, measure, "Glue lines and knots may not cut through; some workshops don't allow plywood (" + pages + ", disputed)."},
		tolerance: plywood,
		web:       co2Web,
		kerfs:     plywoodKerfs,
	},
	{
		Name:      "MDF",
		Density:   Figure{840, "EN 323, 2 to 6 mm; published data sheets and handbooks, 1 place"},
		Brittle:   true,
		Grain:     "none",
		Edge:      brittleEdge,
		Friction:  woodFriction,
		Lasers:    []Laser{CO2, Diode},
		Verdict:   OK,
		Cautions:  []string{watch, fumes, "MDF splits between its faces: no load across the thickness (internal bond 0.65 to 1.2 MPa, EN 319; 1 place)."},
		tolerance: mdf,
		web:       co2Web,
		kerfs:     mdfKerfs,
	},
	{
		Name:      "basswood",
		Density:   Figure{420, "from memory"},
		Brittle:   true,
		Grain:     "half-turn",
		Edge:      brittleEdge,
		Friction:  woodFriction,
		Lasers:    []Laser{CO2, Diode},
		Verdict:   OK,
		Cautions:  []string{watch, fumes, "Solid wood splits along the grain: lay links along it."},
		tolerance: tenPercent,
		web:       co2Web,
		kerfs:     []kerf{{3, 0.15, 0.15, 0.15}}, // published shop guidance, 1 place
	},
	{
		Name:      "POM",
		Density:   Figure{1410, "POM-C, ISO 1183; published data sheets and handbooks, 2+ places"},
		Grain:     "none",
		Edge:      plasticEdge,
		Friction:  pomFriction,
		Lasers:    []Laser{CO2},
		Verdict:   Warn,
		Cautions:  []string{watch, "POM burns with a nearly invisible flame and gives off formaldehyde: only with strong extraction, and only where the workshop allows it (" + pagesMany + ", disputed)."},
		tolerance: pom,
		web:       co2Web,
		kerfs:     []kerf{{3, 0.15, 0.2, 0.3}}, // common practice, no source
	},
	{
		Name:      "polystyrene",
		Density:   Figure{1050, "from memory"},
		Brittle:   true,
		Grain:     "none",
		Edge:      brittleEdge,
		Friction:  "not known: " + toWasher,
		Lasers:    []Laser{CO2},
		Verdict:   Warn,
		Cautions:  []string{watch, fumes, "Solid polystyrene sheet is allowed by some workshops and forbidden by others (" + pagesMany + ", disputed); it melts and smokes."},
		tolerance: tenPercent,
		web:       co2Web,
	},
	{
		Name:      "cardboard",
		Density:   Figure{200, "corrugated board with its air; from memory"},
		Grain:     "none",
		Edge:      brittleEdge,
		Friction:  "not known: " + toWasher,
		Lasers:    []Laser{CO2, Diode},
		Verdict:   OK,
		Cautions:  []string{watch, "Corrugated board catches fire easily: low power, full air assist."},
		tolerance: tenPercent,
		web:       co2Web,
		kerfs:     []kerf{{2, 0.15, 0.15, 0.15}, {3, 0.12, 0.15, 0.19}}, // published shop guidance, 1 place
	},
	{
		Name:      "museum board",
		Density:   Figure{700, "from memory"},
		Grain:     "none",
		Edge:      brittleEdge,
		Friction:  "not known: " + toWasher,
		Lasers:    []Laser{CO2, Diode},
		Verdict:   OK,
		Cautions:  []string{watch},
		tolerance: tenPercent,
		web:       co2Web,
		kerfs:     []kerf{{1.6, 0.13, 0.13, 0.13}}, // published shop guidance, 1 place
	},
	{
		Name:      "card",
		Density:   Figure{800, "from memory"},
		Grain:     "none",
		Edge:      brittleEdge,
		Friction:  "not known: " + toWasher,
		Lasers:    []Laser{CO2, Diode},
		Verdict:   OK,
		Cautions:  []string{watch},
		tolerance: tenPercent,
		web:       co2Web,
		kerfs:     []kerf{{0.3, 0.08, 0.08, 0.08}}, // published shop guidance, 1 place
	},
	{
		Name:      "mild steel",
		Density:   Figure{7850, "EN 10025-2; published data sheets and handbooks, 2+ places"},
		Grain:     "none",
		Edge:      steelEdge,
		Friction:  steelFriction,
		Lasers:    []Laser{Fibre},
		Verdict:   OK,
		Cautions:  []string{noHobby, shopKerf},
		tolerance: tenPercent,
		web:       fibreWeb,
		kerfs:     steelKerfs,
	},
	{
		Name:      "galvanised steel",
		Density:   Figure{7850, "as mild steel: EN 10025-2; 2+ places"},
		Grain:     "none",
		Edge:      steelEdge,
		Friction:  steelFriction,
		Lasers:    []Laser{Fibre},
		Verdict:   Warn,
		Cautions:  []string{"Zinc gives off zinc oxide fume: extraction, and ask the shop (from memory).", noHobby, shopKerf},
		tolerance: tenPercent,
		web:       fibreWeb,
		kerfs:     steelKerfs,
	},
	{
		Name:      "stainless steel",
		Density:   Figure{7900, "1.4301, EN 10088; published data sheets and handbooks, 2+ places (up to 8030 in one)"},
		Grain:     "none",
		Edge:      steelEdge,
		Friction:  steelFriction,
		Lasers:    []Laser{Fibre},
		Verdict:   OK,
		Cautions:  []string{noHobby, shopKerf},
		tolerance: tenPercent,
		web:       fibreWeb,
		kerfs:     steelKerfs,
	},
	{
		Name:      "aluminium",
		Density:   Figure{2660, "5754 H22, EN 485-2; from memory"},
		Grain:     "none",
		Edge:      aluminiumEdge,
		Friction:  "not known: " + toWasher,
		Lasers:    []Laser{Fibre},
		Verdict:   OK,
		Cautions:  []string{noHobby, shopKerf},
		tolerance: tenPercent,
		web:       fibreWeb,
	},
}

// alias is another name of a material, with what it assumes.
type alias struct{ name, note string }

var aliases = map[string][]alias{
	"cast acrylic": {
		{"acrylic", "acrylic may be cast or extruded: taken as cast, whose thickness varies more"},
		{"PMMA", "PMMA may be cast or extruded: taken as cast, whose thickness varies more"},
		{"plexiglas", "acrylic may be cast or extruded: taken as cast, whose thickness varies more"},
		{"plexiglass", "acrylic may be cast or extruded: taken as cast, whose thickness varies more"},
		{"perspex", "acrylic may be cast or extruded: taken as cast, whose thickness varies more"},
		{"acrylic GS", ""},
		{"cast PMMA", ""},
	},
	"extruded acrylic": {{"acrylic XT", ""}, {"extruded PMMA", ""}},
	"birch plywood": {
		{"birch ply", ""},
		{"birch", "taken as birch plywood"},
		{"plywood", "plywood is taken as birch plywood; poplar is lighter and weaker"},
		{"ply", "plywood is taken as birch plywood; poplar is lighter and weaker"},
	},
	"MDF":      {{"HDF", ""}, {"fibreboard", "taken as MDF"}, {"hardboard", "taken as HDF"}},
	"basswood": {{"lime wood", ""}, {"limewood", ""}},
	"POM":      {{"acetal", ""}, {"delrin", ""}, {"POM-C", ""}, {"POM-H", "density of POM-C; POM-H has 1420 kg/m3"}, {"polyacetal", ""}},
	"polystyrene": {
		{"polystyrene sheet", ""}, {"HIPS", ""},
	},
	"cardboard":        {{"corrugated cardboard", ""}, {"corrugated board", ""}},
	"museum board":     {{"mat board", ""}, {"greyboard", "taken as museum board"}, {"grey board", "taken as museum board"}},
	"card":             {{"paper", ""}, {"cardstock", ""}, {"card stock", ""}},
	"mild steel":       {{"steel", "steel is taken as mild steel"}, {"carbon steel", ""}, {"S235", ""}, {"S235JR", ""}, {"DC01", ""}},
	"galvanised steel": {{"galvanized steel", ""}, {"zinc plated steel", ""}},
	"stainless steel":  {{"stainless", ""}, {"1.4301", ""}, {"304", ""}, {"V2A", ""}},
	"aluminium":        {{"aluminum", ""}, {"5754", ""}},
}
