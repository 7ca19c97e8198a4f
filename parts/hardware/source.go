package hardware

// Source says where a figure comes from.
type Source struct {
	Standard  string // "ISO 4762 (DIN 912)"
	Confirmed string // "2+ places", "1 place", "from memory", "common practice, no source"
	From      string // what was compared
	Note      string // where tables disagree, or what to mind; may be empty
}

// String writes the source as one line: standard, what was compared, how far confirmed.
func (s Source) String() string {
	text := s.From
	if text == "" {
		text = s.Standard
	}
	if text == "" {
		return s.Confirmed
	}
	if s.Confirmed == "" || s.Confirmed == text {
		return text
	}
	return text + " (" + s.Confirmed + ")"
}
