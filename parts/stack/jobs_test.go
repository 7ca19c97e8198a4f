package stack

import (
	"pinwright/parts/job"
	"pinwright/parts/linkage"
)

// sheet is a stock of measured cast acrylic; measured 0 is not measured.
func sheet(name string, nominal, measured float64) job.Stock {
	if measured == 0 {
		measured = nominal
	}
	return job.Stock{Name: name, Material: "cast acrylic", Thickness: nominal, Measured: measured}
}

// at puts a link on a plane, cut from a stock, through joints.
type at struct {
	name, stock string
	plane       int
	pins        []string
	bores       []job.Bore
}

// jobOf puts a job together; joints in capitals that begin with G are ground pivots.
func jobOf(links []at, pins []job.Pin, frame *job.Frame, stock ...job.Stock) job.Job {
	j := job.Job{Name: "test", Frame: frame, Pins: pins, Stock: stock, Copies: []job.Copy{{}}}
	seen := map[string]bool{}
	for _, l := range links {
		j.Linkage.Links = append(j.Linkage.Links, linkage.Link{Name: l.name, Pins: l.pins})
		j.Links = append(j.Links, job.Link{Name: l.name, Plane: l.plane, Stock: l.stock, Bores: l.bores})
		for _, p := range l.pins {
			if seen[p] {
				continue
			}
			seen[p] = true
			joint := linkage.Joint{Name: p}
			if p[0] == 'G' {
				joint.Ground = &linkage.Ground{}
			}
			j.Linkage.Joints = append(j.Linkage.Joints, joint)
		}
	}
	return j
}

// bolt is a pin with the usual things on it.
func bolt(joint, size string) job.Pin {
	return job.Pin{Joint: joint, Kind: job.BoltPin, Bolt: size, Fit: "medium", Head: "socket", Nut: "lock", Washer: "normal"}
}
