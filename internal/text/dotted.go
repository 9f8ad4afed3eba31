package text

import "bytes"

// ampersand: capitals with & between, seven characters at most.
func ampersand(core []byte) bool {
	return len(core) < 8 && bytes.IndexByte(core, '&') > 0 && alnumByte(core[len(core)-1]) &&
		bytes.IndexFunc(core, func(r rune) bool { return r != '&' && (r < 'A' || r > 'Z') }) < 0
}

// dottedAcronym: single letters with points between (a.m, U.S.A), or short
// capitalised parts of which one has one letter (Ph.D, M.Sc). A hyphen may follow
// (U.S.-led), or a possessive, which is taken.
func dottedAcronym(core []byte) int {
	end, single, other := 0, 0, 0
	for {
		n := 0
		for end+n < len(core) && classes[core[end+n]]&cLetter != 0 {
			n++
		}
		switch {
		case n == 0 && end > 0 && (end < len(core) && core[end] != '.'):
			end-- // the point is the acronym's last
			return acronymTail(core, end, single, other)
		case n == 1:
			single++
		case n > 1 && n < 4 && classes[core[end]]&cUpper != 0:
			other++
		default:
			return 0
		}
		if end += n; end == len(core) || core[end] != '.' {
			return acronymTail(core, end, single, other)
		}
		end++
	}
}

// acronymTail checks the parts of a dotted acronym and what follows it.
func acronymTail(core []byte, end, single, other int) int {
	if single+other < 2 || single == 0 || other > 1 {
		return 0
	}
	tail := bytes.TrimPrefix(core[end:], []byte("."))
	switch {
	case len(tail) == 0:
		return end
	case string(tail) == "'s" || string(tail) == "\u2019s":
		return len(core)
	case tail[0] == '-' || bytes.HasPrefix(tail, []byte("\u2013")):
		return len(core) - len(tail)
	}
	return 0
}

// dotted: a point with letters or digits around it. When what follows the one
// point is a capitalised function word after a small one ("end.The"), it is a
// full stop that lacks its space.
func dotted(core []byte) bool {
	if i := bytes.LastIndexByte(core, '-'); i > 0 && dottedAcronym(core[i+1:]) > 0 && plainWord(core[:i]) {
		return false // non-U.S.
	}
	inner := 0
	for i := range core {
		if core[i] != '.' || i+1 == len(core) || !alnumByte(core[i+1]) {
			continue
		}
		if i == 0 {
			return true // .hidden
		}
		inner++
		rest := core[i+1:]
		n := 0
		for n < len(rest) && classes[rest[n]]&cLetter != 0 {
			n++
		}
		if inner == 1 && classes[core[i-1]]&cUpper == 0 && opensSentence(rest[:n]) && !bytes.ContainsAny(rest, "._/") {
			return false
		}
	}
	return inner > 0
}
