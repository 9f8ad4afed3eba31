// Package english is the default model of English, embedded in whatever
// program imports it. Its card, card.md, states the sources with their
// licences, the recipe and the measured figures; build.sh rebuilds it.
package english

import _ "embed"

//go:embed english.fcm
var model []byte

// Model returns the model file, in place. It is shared and must not be
// written to.
func Model() []byte { return model }
