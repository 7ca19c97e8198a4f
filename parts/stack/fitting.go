package stack

import (
	"fmt"
	"slices"
	"strings"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// fitting is a pin with its members and with what the catalogue holds for it.
type fitting struct {
	pin     job.Pin
	members []member
	open    bool
	movable bool // the pivot is adjustable
	size    string
	as      string // metric size that stands in for an inch size in the catalogue; else size
	screw   hardware.Screw
	nut     *hardware.Nut
	washer  *hardware.Washer
	spacer  float64       // outside diameter of spacers
	usual   float64       // the same where no bearing asks for slimmer ones
	stock   []float64     // the lengths in which spacers are bought; nil: they are cut to length
	jam     *hardware.Nut // that clamps a link to the bolt, beside the pin's own nut
	rodEnd  *hardware.RodEnd
	notes   []string
}

// fitOut looks up everything that a pin needs.
func fitOut(j job.Job, pin job.Pin) (fitting, error) {
	f := fitting{pin: pin}
	if j.Spacers.Stock {
		if f.stock = j.Spacers.Lengths; len(f.stock) == 0 {
			f.stock = hardware.SpacerLengths()
		}
	}
	var err error
	if f.members, err = members(j, pin); err != nil {
		return f, err
	}
	if len(f.members) == 0 {
		return f, fmt.Errorf("joint %s: it has a pin, and no link or plate is on it", pin.Joint)
	}
	for _, joint := range j.Linkage.Joints {
		if joint.Name == pin.Joint && joint.Ground != nil {
			f.movable = joint.Ground.Range != nil
			f.open = !slices.ContainsFunc(f.members, func(m member) bool { return m.plate })
		}
	}
	key := pinKey(j, pin.Joint)
	fail := func(err error) (fitting, error) {
		return f, fault(j, key, fmt.Sprintf("joint %s: %v", pin.Joint, err), "")
	}
	if pin.Kind == job.ShaftPin {
		if err := f.shaft(); err != nil {
			return fail(err)
		}
		return f, nil
	}
	if err := f.bolt(); err != nil {
		return fail(err)
	}
	if err := f.kind(); err != nil {
		return fail(err)
	}
	return f, nil
}

// kind looks up what a kind of pin has besides bolt, nut and washers.
func (f *fitting) kind() error {
	switch f.pin.Kind {
	case job.BearingPin:
		return f.bearing()
	case job.SleevePin:
		return f.sleeves()
	case job.ClampPin:
		return f.clamp()
	case job.RodEndPin:
		return f.ball()
	}
	return nil
}

// bolt looks up screw, nut and washer.
func (f *fitting) bolt() error {
	f.size, f.as = f.pin.Bolt, f.pin.Bolt
	if hardware.IsInch(f.size) {
		as, err := standIn(f.size)
		if err != nil {
			return err
		}
		f.as = as
		f.notes = append(f.notes, fmt.Sprintf("Washer, nut and head of %s are taken as those of %s, which are no smaller: measure yours.", f.size, as))
	}
	var err error
	if f.screw, err = hardware.ScrewFor(hardware.Head(f.pin.Head), f.as); err != nil {
		return err
	}
	if f.pin.Nut != "none" {
		n, err := hardware.NutFor(hardware.NutKind(f.pin.Nut), f.as)
		if err != nil {
			return err
		}
		f.nut = &n
		if n.Source.Confirmed == "from memory" {
			f.notes = append(f.notes, fmt.Sprintf("The height of the nut %s (%g mm) is from memory and makers differ: measure it.", n.Size, n.Height))
		}
	}
	return f.washers(func(k hardware.WasherKind) (hardware.Washer, error) { return hardware.WasherFor(k, f.as) })
}

// washers looks up the washer and what it says about spacers: tube as wide as a small washer.
func (f *fitting) washers(of func(hardware.WasherKind) (hardware.Washer, error)) error {
	f.spacer = 2 * f.diameter()
	if small, err := of(hardware.SmallWasher); err == nil {
		f.spacer = small.Outside
	}
	f.usual = f.spacer
	if f.pin.Washer == "none" {
		return nil
	}
	w, err := of(hardware.WasherKind(f.pin.Washer))
	if err != nil {
		return err
	}
	f.washer = &w
	return nil
}

// diameter is that of bolt or shaft.
func (f *fitting) diameter() float64 {
	if f.pin.Kind == job.ShaftPin {
		return f.pin.Shaft
	}
	d, _ := hardware.BoltDiameter(f.pin.Bolt) // looked up before
	return d
}

// standIn gives the smallest metric bolt of the catalogue that is no thinner than an inch bolt.
func standIn(inch string) (string, error) {
	d, err := hardware.BoltDiameter(inch)
	if err != nil {
		return "", err
	}
	best, least := "", 0.0
	for _, size := range hardware.BoltSizes() {
		m, err := hardware.BoltDiameter(size)
		if err != nil || m < d || !strings.HasPrefix(size, "M") {
			continue
		}
		if _, err := hardware.ScrewFor(hardware.Socket, size); err == nil && (best == "" || m < least) {
			best, least = size, m
		}
	}
	if best == "" {
		return "", fmt.Errorf("bolt %s: %w", inch, hardware.ErrInch)
	}
	return best, nil
}

// shaft looks up the washer and finds out which members are fast on the shaft.
func (f *fitting) shaft() error {
	if !(f.pin.Shaft > 0) {
		return fmt.Errorf("a shaft of %g mm", f.pin.Shaft)
	}
	tight := hardware.Tight(f.pin.Fit, f.pin.Clearance)
	for i := range f.members {
		// A plate of the frame lets the shaft turn, whatever the fit: see hardware.PlateFit.
		if tight && !f.members[i].plate {
			f.members[i].held = true
		}
	}
	held := ""
	for _, m := range f.members {
		if !m.held {
			continue
		}
		if held != "" {
			return fmt.Errorf("%s and %s are both fast on the shaft, and they could not turn on each other: say fit: running, and give the one that the shaft drives a bore with a flat",
				held, m.name)
		}
		held = m.name
	}
	err := f.washers(func(k hardware.WasherKind) (hardware.Washer, error) {
		return hardware.ShaftWasher(k, f.pin.Shaft)
	})
	if err != nil {
		return fmt.Errorf("%w; say washer: none", err)
	}
	return nil
}

// washerThickness is 0 without washers.
func (f *fitting) washerThickness() float64 {
	if f.washer == nil {
		return 0
	}
	return f.washer.Thickness
}
