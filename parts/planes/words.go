package planes

import (
	"fmt"
	"math"
	"strings"
)

// Error says what contradicts what, and what would help.
func (c *Conflict) Error() string { return c.Message() + "\n  " + c.Hint() }

// Message says what contradicts what.
func (c *Conflict) Message() string {
	return "no planes fit: " + strings.Join(c.Rules(), ", and ")
}

// Hint says what would help: any one of its parts.
func (c *Conflict) Hint() string { return strings.Join(c.Help(), "; or ") }

// Rules says each rule in words.
func (c *Conflict) Rules() []string {
	p := c.problem
	var out []string
	say := func(format string, args ...any) { out = append(out, fmt.Sprintf(format, args...)) }
	for _, d := range c.Demands {
		say("%s", p.demandWords(d))
	}
	for _, x := range c.Apart {
		say("%s and %s cannot share a plane (%s)", p.Bodies[x.A].Name, p.Bodies[x.B].Name, c.gap(x.Near))
	}
	for _, x := range c.Swept {
		say("%s cannot lie %s %s, whose %s it sweeps across (%s)", p.Bodies[x.Body].Name, where[x.Zone], p.Pins[x.Pin].Name, x.Zone, c.gap(x.Near))
	}
	for _, x := range c.Close {
		say("the %s of %s and the %s of %s cannot be at one height (%s)", x.ZoneP, p.Pins[x.P].Name, x.ZoneQ, p.Pins[x.Q].Name, c.gap(x.Near))
	}
	for _, x := range c.Short {
		say("what holds %s together is too short for more than %.1f mm of parts and spacers", p.Pins[x.Pin].Name, x.MM)
	}
	return out
}

var where = map[Zone]string{Shank: "between the parts on", Head: "close behind", Nut: "close in front of"}

func (p Problem) demandWords(d Demand) string {
	a, b := p.Bodies[d.A].Name, p.Bodies[d.B].Name
	switch d.Kind {
	case On:
		return fmt.Sprintf("%s is to lie on plane %d", a, d.Plane)
	case SamePlane:
		return fmt.Sprintf("%s is to lie on the same plane as %s", a, b)
	}
	return fmt.Sprintf("%s is to lie in front of %s", a, b)
}

// gap says the gap and where it is.
func (c *Conflict) gap(n Near) string {
	wanted := ""
	if n.MM > -0.05 {
		wanted = fmt.Sprintf(", %.1f mm wanted", c.problem.Clear)
	}
	return fmt.Sprintf("gap %.1f mm at %.0f deg%s", n.MM, math.Mod(n.Angle*180/math.Pi+360, 360), wanted)
}

// short is how much is missing, rounded up to a tenth.
func (c *Conflict) short(n Near) float64 {
	return math.Ceil((c.problem.Clear-n.MM)*10-1e-6) / 10
}

// Help says of each rule how to get rid of it.
func (c *Conflict) Help() []string {
	p := c.problem
	var out []string
	say := func(format string, args ...any) { out = append(out, fmt.Sprintf(format, args...)) }
	for _, d := range c.Demands {
		switch d.Kind {
		case On:
			say("take plane: %d of %s out, or give it another plane", d.Plane, p.Bodies[d.A].Name)
		case SamePlane:
			say("take same-plane-as: %s of %s out", p.Bodies[d.B].Name, p.Bodies[d.A].Name)
		default:
			say("take in-front-of: %s of %s out", p.Bodies[d.B].Name, p.Bodies[d.A].Name)
		}
	}
	for _, x := range c.Apart {
		say("make %s and %s slimmer by %.1f mm together, or bend one of them by as much", p.Bodies[x.A].Name, p.Bodies[x.B].Name, c.short(x.Near))
	}
	for _, x := range c.Swept {
		say("bend %s by %.1f mm to pass %s, or make its %s and the part slimmer by as much", p.Bodies[x.Body].Name, c.short(x.Near), p.Pins[x.Pin].Name, x.Zone)
	}
	for _, x := range c.Close {
		say("make the pins %s and %s slimmer by %.1f mm together", p.Pins[x.P].Name, p.Pins[x.Q].Name, c.short(x.Near))
	}
	for _, x := range c.Short {
		say("take a thicker bolt at %s, which comes longer", p.Pins[x.Pin].Name)
	}
	return out
}
