package text

import (
	"cmp"
	"strings"
)

// reads reports that a text in the language of a tag (BCP 47, or a name of a
// locale: "de-AT", "de_AT") is read: that it has the primary subtag asked for.
func (o Options) reads(tag string) bool {
	tag = strings.TrimSpace(tag)
	if i := strings.IndexAny(tag, "-_.@"); i >= 0 {
		tag = tag[:i]
	}
	return tag == "" || strings.EqualFold(tag, cmp.Or(o.Language, "en"))
}
