package dxf

// entry is one name in a dictionary.
type entry struct {
	name   string
	handle int
}

func (t *tags) dictionary(handle, owner int, entries ...entry) {
	t.str(0, "DICTIONARY")
	t.handle(5, handle)
	t.handle(330, owner)
	t.str(100, "AcDbDictionary")
	t.int(281, 1) // an entry that is copied in keeps what was there
	for _, e := range entries {
		t.str(3, e.name)
		t.handle(350, e.handle)
	}
}

// objects writes the section of things that are not drawn: the root dictionary and what it names.
func (t *tags) objects(f frame) {
	t.str(0, "SECTION")
	t.str(2, "OBJECTS")
	t.dictionary(hRoot, 0,
		entry{"ACAD_GROUP", hGroups},
		entry{"ACAD_LAYOUT", hLayouts},
		entry{"ACAD_MLINESTYLE", hMlineStyles},
		entry{"ACAD_PLOTSETTINGS", hPlotSettings},
		entry{"ACAD_PLOTSTYLENAME", hPlotStyles})
	t.dictionary(hGroups, hRoot)
	t.dictionary(hLayouts, hRoot, entry{"Model", hModelLayout}, entry{"Layout1", hPaperLayout})
	t.layout(f, "Model", hModelLayout, hModelRecord)
	t.layout(f, "Layout1", hPaperLayout, hPaperRecord)
	t.dictionary(hMlineStyles, hRoot, entry{"Standard", hMlineStyle})

	t.str(0, "MLINESTYLE")
	t.handle(5, hMlineStyle)
	t.handle(330, hMlineStyles)
	t.str(100, "AcDbMlineStyle")
	t.str(2, "Standard")
	t.int(70, 0)
	t.str(3, "")
	t.int(62, 256)
	t.num(51, 90)
	t.num(52, 90)
	t.int(71, 2)
	for _, offset := range []float64{0.5, -0.5} {
		t.num(49, offset)
		t.int(62, 256)
		t.str(6, "BYLAYER")
	}

	t.dictionary(hPlotSettings, hRoot)

	t.str(0, "ACDBDICTIONARYWDFLT")
	t.handle(5, hPlotStyles)
	t.handle(330, hRoot)
	t.str(100, "AcDbDictionary")
	t.int(281, 1)
	t.str(3, "Normal")
	t.handle(350, hPlotNormal)
	t.str(100, "AcDbDictionaryWithDefault")
	t.handle(340, hPlotNormal)
	t.str(0, "ACDBPLACEHOLDER")
	t.handle(5, hPlotNormal)
	t.handle(330, hPlotStyles)
	t.str(0, "ENDSEC")
}

// layout writes a page setup at 1:1 without a printer.
func (t *tags) layout(f frame, name string, handle, record int) {
	model := name == "Model"
	t.str(0, "LAYOUT")
	t.handle(5, handle)
	t.handle(330, hLayouts)
	t.str(100, "AcDbPlotSettings")
	t.str(1, "")
	t.str(2, "none_device")
	t.str(4, "")
	t.str(6, "")
	for c := 40; c <= 43; c++ {
		t.num(c, 0) // no unprintable rim
	}
	t.num(44, f.width)
	t.num(45, f.height)
	for c := 46; c <= 49; c++ {
		t.num(c, 0)
	}
	t.num(140, 0)
	t.num(141, 0)
	t.num(142, 1) // 1 mm on paper is 1 unit
	t.num(143, 1)
	flags := 688
	if model {
		flags |= 1024
	}
	t.list(70, flags, 72, 1, 73, 0, 74, 5)
	t.str(7, "")
	t.int(75, 16)
	t.num(147, 1)
	t.num(148, 0)
	t.num(149, 0)
	t.str(100, "AcDbLayout")
	t.str(1, name)
	t.int(70, 1)
	if model {
		t.int(71, 0)
	} else {
		t.int(71, 1)
	}
	t.point(10, 0, 0)
	t.point(11, f.width, f.height)
	t.point3(12, 0, 0, 0)
	t.point3(14, f.min[0], f.min[1], 0)
	t.point3(15, f.max[0], f.max[1], 0)
	t.num(146, 0)
	t.point3(13, 0, 0, 0)
	t.point3(16, 1, 0, 0)
	t.point3(17, 0, 1, 0)
	t.int(76, 0)
	t.handle(330, record)
}
