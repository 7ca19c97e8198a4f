package parts

import "pinwright/parts/outline"

// MarkClear is the least distance that engraved strokes keep from every edge of their part, mm.
const MarkClear = markClear

// Mirrored is the motion that makes a link part of a mirrored copy from the link part: y to -y.
func Mirrored() outline.Transform { return mirrored() }
