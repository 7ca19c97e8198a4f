package job

import "strconv"

// Position is a place in a file; lines and columns count from 1.
type Position struct {
	File         string
	Line, Column int
}

// String writes the place as file:line:column.
func (p Position) String() string {
	return p.File + ":" + strconv.Itoa(p.Line) + ":" + strconv.Itoa(p.Column)
}
