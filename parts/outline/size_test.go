package outline

const (
	cases        = 400
	seedBooleans = 1177
	seedOffsets  = 1178
)
