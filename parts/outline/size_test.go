package outline

const (
	cases        = 400
	seedBooleans = 31177
	seedOffsets  = 31178
)
