package dxf

// The parts of a drawing that are the same for every sheet. A reader that follows the DXF Reference
// to the letter wants them all; the beam wants none of them.

// Handles of the fixed objects. Entities come after them.
const (
	hVportTable = iota + 1
	hLtypeTable
	hLayerTable
	hStyleTable
	hViewTable
	hUcsTable
	hAppidTable
	hDimstyleTable
	hBlockTable
	hVport
	hByBlock
	hByLayer
	hContinuous
	hLayerZero
	hLayerEngrave
	hLayerInside
	hLayerOutside
	hLayerEdge
	hStyle
	hAppid
	hDimstyle
	hModelRecord
	hModelBegin
	hModelEnd
	hPaperRecord
	hPaperBegin
	hPaperEnd
	hRoot
	hGroups
	hLayouts
	hModelLayout
	hPaperLayout
	hMlineStyles
	hMlineStyle
	hPlotSettings
	hPlotStyles
	hPlotNormal
	hFirstEntity
)

type layer struct {
	handle, colour int
	name           string
	plotted        bool
}

// frame is what the skeleton needs to know of the sheet.
type frame struct {
	width, height float64
	min, max      [2]float64 // of what is drawn
	handSeed      int
	layers        []layer
}

func (t *tags) header(f frame) {
	t.str(0, "SECTION")
	t.str(2, "HEADER")
	t.str(9, "$ACADVER")
	t.str(1, "AC1015")
	t.str(9, "$DWGCODEPAGE")
	t.str(3, "ANSI_1252")
	t.str(9, "$INSBASE")
	t.point3(10, 0, 0, 0)
	t.str(9, "$EXTMIN")
	t.point3(10, f.min[0], f.min[1], 0)
	t.str(9, "$EXTMAX")
	t.point3(10, f.max[0], f.max[1], 0)
	t.str(9, "$LIMMIN")
	t.point(10, 0, 0)
	t.str(9, "$LIMMAX")
	t.point(10, f.width, f.height)
	t.str(9, "$CLAYER")
	t.str(8, "0")
	t.str(9, "$LUNITS")
	t.int(70, 2) // decimal
	t.str(9, "$LUPREC")
	t.int(70, 4)
	t.str(9, "$MEASUREMENT")
	t.int(70, 1) // metric
	t.str(9, "$INSUNITS")
	t.int(70, int(Millimetre))
	t.str(9, "$TILEMODE")
	t.int(70, 1)
	t.str(9, "$PSTYLEMODE")
	t.int(290, 1) // colours by index
	t.str(9, "$HANDSEED")
	t.handle(5, f.handSeed)
	t.str(0, "ENDSEC")
	t.str(0, "SECTION")
	t.str(2, "CLASSES")
	for i, name := range []string{"ACDBDICTIONARYWDFLT", "ACDBPLACEHOLDER", "LAYOUT"} {
		t.str(0, "CLASS")
		t.str(1, name)
		t.str(2, []string{"AcDbDictionaryWithDefault", "AcDbPlaceHolder", "AcDbLayout"}[i])
		t.str(3, "ObjectDBX Classes")
		t.list(90, 0, 280, 0, 281, 0)
	}
	t.str(0, "ENDSEC")
}

// table opens a table of n records.
func (t *tags) table(name string, handle, n int) {
	t.str(0, "TABLE")
	t.str(2, name)
	t.handle(5, handle)
	t.handle(330, 0)
	t.str(100, "AcDbSymbolTable")
	t.int(70, n)
}

// record opens a record of a table.
func (t *tags) record(kind string, handle, table int, class string) {
	t.str(0, kind)
	if kind == "DIMSTYLE" {
		t.handle(105, handle) // 5 means something else there
	} else {
		t.handle(5, handle)
	}
	t.handle(330, table)
	t.str(100, "AcDbSymbolTableRecord")
	t.str(100, class)
}

func (t *tags) tables(f frame) {
	t.str(0, "SECTION")
	t.str(2, "TABLES")

	t.table("VPORT", hVportTable, 1)
	t.record("VPORT", hVport, hVportTable, "AcDbViewportTableRecord")
	t.str(2, "*Active")
	t.int(70, 0)
	t.point(10, 0, 0)
	t.point(11, 1, 1)
	t.point(12, f.width/2, f.height/2) // middle of the view
	t.point(13, 0, 0)
	t.point(14, 10, 10)
	t.point(15, 10, 10)
	t.point3(16, 0, 0, 1)
	t.point3(17, 0, 0, 0)
	t.num(40, 1.05*max(f.height, f.width/1.5)) // height of the view: the whole sheet in a 3:2 window
	t.num(41, 1.5)
	t.num(42, 50)
	t.num(43, 0)
	t.num(44, 0)
	t.num(50, 0)
	t.num(51, 0)
	t.list(71, 0, 72, 1000, 73, 1, 74, 3, 75, 0, 76, 0, 77, 0, 78, 0)
	t.str(0, "ENDTAB")

	t.table("LTYPE", hLtypeTable, 3)
	for i, name := range []string{"ByBlock", "ByLayer", "Continuous"} {
		t.record("LTYPE", hByBlock+i, hLtypeTable, "AcDbLinetypeTableRecord")
		t.str(2, name)
		t.int(70, 0)
		t.str(3, "")
		t.list(72, 65, 73, 0)
		t.num(40, 0)
	}
	t.str(0, "ENDTAB")

	t.table("LAYER", hLayerTable, len(f.layers))
	for _, l := range f.layers {
		t.record("LAYER", l.handle, hLayerTable, "AcDbLayerTableRecord")
		t.str(2, l.name)
		t.int(70, 0)
		t.int(62, l.colour)
		t.str(6, "Continuous")
		if !l.plotted {
			t.int(290, 0)
		}
		t.int(370, 0) // hairline
		t.handle(390, hPlotNormal)
	}
	t.str(0, "ENDTAB")

	t.table("STYLE", hStyleTable, 1)
	t.record("STYLE", hStyle, hStyleTable, "AcDbTextStyleTableRecord")
	t.str(2, "Standard")
	t.int(70, 0)
	t.num(40, 0)
	t.num(41, 1)
	t.num(50, 0)
	t.int(71, 0)
	t.num(42, 2.5)
	t.str(3, "txt")
	t.str(4, "")
	t.str(0, "ENDTAB")

	t.table("VIEW", hViewTable, 0)
	t.str(0, "ENDTAB")
	t.table("UCS", hUcsTable, 0)
	t.str(0, "ENDTAB")

	t.table("APPID", hAppidTable, 1)
	t.record("APPID", hAppid, hAppidTable, "AcDbRegAppTableRecord")
	t.str(2, "ACAD")
	t.int(70, 0)
	t.str(0, "ENDTAB")

	t.table("DIMSTYLE", hDimstyleTable, 1)
	t.str(100, "AcDbDimStyleTable")
	t.record("DIMSTYLE", hDimstyle, hDimstyleTable, "AcDbDimStyleTableRecord")
	t.str(2, "Standard")
	t.int(70, 0)
	t.handle(340, hStyle)
	t.str(0, "ENDTAB")

	t.table("BLOCK_RECORD", hBlockTable, 2)
	t.record("BLOCK_RECORD", hModelRecord, hBlockTable, "AcDbBlockTableRecord")
	t.str(2, "*Model_Space")
	t.handle(340, hModelLayout)
	t.record("BLOCK_RECORD", hPaperRecord, hBlockTable, "AcDbBlockTableRecord")
	t.str(2, "*Paper_Space")
	t.handle(340, hPaperLayout)
	t.str(0, "ENDTAB")
	t.str(0, "ENDSEC")
}

func (t *tags) blocks() {
	t.str(0, "SECTION")
	t.str(2, "BLOCKS")
	t.block("*Model_Space", hModelRecord, hModelBegin, hModelEnd)
	t.block("*Paper_Space", hPaperRecord, hPaperBegin, hPaperEnd)
	t.str(0, "ENDSEC")
}

func (t *tags) block(name string, owner, begin, end int) {
	t.str(0, "BLOCK")
	t.handle(5, begin)
	t.handle(330, owner)
	t.str(100, "AcDbEntity")
	if name == "*Paper_Space" {
		t.int(67, 1)
	}
	t.str(8, "0")
	t.str(100, "AcDbBlockBegin")
	t.str(2, name)
	t.int(70, 0)
	t.point3(10, 0, 0, 0)
	t.str(3, name)
	t.str(1, "")
	t.str(0, "ENDBLK")
	t.handle(5, end)
	t.handle(330, owner)
	t.str(100, "AcDbEntity")
	if name == "*Paper_Space" {
		t.int(67, 1)
	}
	t.str(8, "0")
	t.str(100, "AcDbBlockEnd")
}
