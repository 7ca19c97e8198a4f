package hardware

// Thread is the real outside of a metric screw thread, class 6g, coarse pitch.
type Thread struct {
	Size        string
	Pitch       float64
	Least, Most float64 // major diameter, mm: less than the nominal
	Source      Source
}

func threadOf(r *row) Thread {
	return Thread{
		Size: r.text("size"), Pitch: r.number("pitch_mm"),
		Least: r.number("major_min_mm"), Most: r.number("major_max_mm"),
		Source: r.source("ISO 965 6g"),
	}
}

// ThreadFor gives the thread of a metric size: what a link that turns on a bolt really turns on.
func ThreadFor(size string) (Thread, error) {
	c, err := read()
	if err != nil {
		return Thread{}, err
	}
	var sizes []string
	for _, t := range c.threads {
		if t.Size == size {
			return t, nil
		}
		sizes = append(sizes, t.Size)
	}
	return Thread{}, missing("thread", size, sizes)
}
