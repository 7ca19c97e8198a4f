package job

import "regexp"

// nameRule is how a kind of thing may be called.
type nameRule struct {
	noun    string // "a joint name"
	pattern string // regular expression that the whole name must match
	says    string // the rule in words
	form    *regexp.Regexp
}

func newNameRule(noun, pattern, says string) *nameRule {
	return &nameRule{noun, pattern, says, regexp.MustCompile(pattern)}
}

// fileName names files and parts, so it has only what every file system and every laser's computer
// takes. jointName stands in pairs such as A-B, so it has no hyphen.
var (
	fileName  = newNameRule("a name", `^[A-Za-z0-9][A-Za-z0-9-]{0,39}$`, "letters a to z, digits and hyphens, at most 40, not beginning with a hyphen")
	jointName = newNameRule("a joint name", `^[A-Za-z_][A-Za-z0-9_]{0,19}$`, "letters a to z, digits and _, at most 20, not beginning with a digit; no hyphen, because A-B is the pair of A and B")
	pairName  = newNameRule("a pair of joints", `^[A-Za-z_][A-Za-z0-9_]{0,19}-[A-Za-z_][A-Za-z0-9_]{0,19}$`, "two joints with a hyphen between, such as A-B")
)
