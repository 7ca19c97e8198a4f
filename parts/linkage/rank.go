package linkage

import "gonum.org/v1/gonum/mat"

// rankMobility counts freedoms from the rank of the Jacobian of all links (surplus ones included) at
// a position, the drive free: coordinates of moving joints minus independent equations. Links whose
// pins lie on one line count right, for the equations are those of the solver (see block).
func (m *Mechanism) rankMobility(p []Point) int {
	unknown := make([]int, 0, len(m.jointNames))
	for j := range m.jointNames {
		if !m.isGround[j] {
			unknown = append(unknown, j)
		}
	}
	var bs []blockBar
	var cs []carried
	for k, pins := range m.pins {
		shape := m.shape[k]
		a, b := base(pins, shape, nil)
		local := map[int]Point{}
		for i, j := range pins {
			local[j] = shape[i]
		}
		bs = append(bs, blockBar{a, b, dist(local[a], local[b])})
		for _, j := range pins {
			if j != a && j != b {
				cs = append(cs, carry(k, j, a, b, local[j], local[a], local[b]))
			}
		}
	}
	rows, cols := len(bs)+2*len(cs), 2*len(unknown)
	b := &block{joints: unknown, bars: bs, carried: cs, n: cols, col: make([]int, len(m.jointNames))}
	for i := range b.col {
		b.col[i] = -1
	}
	for i, j := range unknown {
		b.col[j] = 2 * i
	}
	jac := make([]float64, rows*cols)
	b.jacobian(p, jac)
	f, _, _ := nullSpaces(mat.NewDense(rows, cols, jac))
	return f.freely
}
