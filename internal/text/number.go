package text

import (
	"bytes"
	"unicode/utf8"
)

// number returns the length of the number that begins a core, 0 when there is
// none or when it goes on in letters that are no unit:
//
//	[sign, comparison, currency] digits {joiner digits} [unit [/ unit]] [+]
//
// A joiner is one of . , : / ' - – × x e T between digits, so that dates, times,
// ranges, ratios and sizes are one number; a currency may follow a joiner. A
// hyphen or slash and letters may follow it: "10-knot" is a number, a hyphen and
// a word. Three groups with points are a number only when they are a date.
func number(core []byte) int {
	i := leadLen(core)
	if !digitAt(core, i) && !(i < len(core) && core[i] == '.' && digitAt(core, i+1)) && numeralLen(core[i:]) == 0 {
		return 0
	}
	start, points := i, 0
	for i < len(core) {
		if n := numeralLen(core[i:]); n > 0 {
			i += n
			continue
		}
		n := joinerLen(core[i:])
		if n == 0 {
			break
		}
		if core[i] == '.' {
			points++
		}
		i += n
	}
	if points > 1 && !dottedDate(core[start:i]) {
		return 0
	}
	i += unitLen(core[i:])
	if i == len(core) || separates(core[i:]) {
		return i
	}
	return 0
}

// version returns the length of a core of digit groups with points that number
// refuses: 1.2.3, v2.0, 192.168.0.1, 3.1.4-rc2.
func version(core []byte) int {
	i := 0
	if i < len(core) && core[i]|0x20 == 'v' {
		i++
	}
	points := i
	for ; i < len(core) && (digitAt(core, i) || core[i] == '.' && digitAt(core, i-1) && digitAt(core, i+1)); i++ {
		if core[i] == '.' {
			points++
		}
	}
	if points < 2 && !(points == 1 && core[0]|0x20 == 'v' && i > 1) || !digitAt(core, i-1) {
		return 0
	}
	return len(core)
}

// leadLen returns the length of signs, comparisons and currencies before digits.
func leadLen(core []byte) int {
	i := 0
	for n := 0; n < 4 && i < len(core); n++ {
		if m := currencyLen(core[i:]); m > 0 {
			i += m
			continue
		}
		r, m := utf8.DecodeRune(core[i:])
		switch r {
		case '+', '-', '~', '<', '>', '=', '#', '\u00B1', '\u00D7', '\u2116', '\u2212', '\u2248', '\u2264', '\u2265':
			i += m
			continue
		}
		break
	}
	return i
}

// currencyLen returns the length of a currency mark, with the letters of a
// country before a dollar sign.
func currencyLen(b []byte) int {
	for _, country := range [...]string{"US", "CA", "AU", "NZ", "HK", "A", "C", "S"} {
		if n := len(country); len(b) > n && string(b[:n]) == country && b[n] == '$' {
			return n + 1
		}
	}
	r, n := utf8.DecodeRune(b)
	switch {
	case r == '$', '\u00A2' <= r && r <= '\u00A5', '\u20A0' <= r && r <= '\u20CF':
		return n
	}
	return 0
}

// numeralLen returns the length of a digit, a vulgar fraction or a superscript
// or subscript digit.
func numeralLen(b []byte) int {
	if digitAt(b, 0) {
		return 1
	}
	r, n := utf8.DecodeRune(b)
	switch {
	case '\u00BC' <= r && r <= '\u00BE', r == '\u00B2', r == '\u00B3', r == '\u00B9', '\u2070' <= r && r <= '\u2089', '\u2150' <= r && r <= '\u215E':
		return n
	}
	return 0
}

// joinerLen returns the length of what joins two groups of digits at the start
// of b, a currency mark after a dash included.
func joinerLen(b []byte) int {
	r, n := utf8.DecodeRune(b)
	switch r {
	case '.', ',', ':', '/', '\'', '\u2019', 'x', 'T', '\u00D7', '*', '^':
	case 'e', 'E':
		if n < len(b) && (b[n] == '-' || b[n] == '+') {
			n++
		}
	case '-', '\u2010', '\u2011', '\u2013', '\u2212':
		n += currencyLen(b[n:])
	default:
		return 0
	}
	if n < len(b) && numeralLen(b[n:]) > 0 {
		return n
	}
	return 0
}

// dottedDate reports three groups, the first two of at most two digits, the
// last of two or four: 12.05.2021.
func dottedDate(digits []byte) bool {
	day, rest, _ := bytes.Cut(digits, []byte("."))
	month, year, _ := bytes.Cut(rest, []byte("."))
	return all(day, cDigit) && len(day) < 3 && all(month, cDigit) && len(month) < 3 &&
		all(year, cDigit) && (len(year) == 2 || len(year) == 4)
}

// separates reports that what follows a number is a hyphen or slash and then
// words without further digits.
func separates(b []byte) bool {
	r, n := utf8.DecodeRune(b)
	switch r {
	case '-', '\u2010', '\u2011', '\u2013', '/':
		return n < len(b) && alnumByte(b[n]) && !bytes.ContainsAny(b, "0123456789_@=\\")
	}
	return false
}

// unitLen returns the length of a unit glued to a number, with a second one
// after a slash and a power: km/h m² %+.
func unitLen(b []byte) int {
	n := oneUnitLen(b)
	if n > 0 && n < len(b) && b[n] == '/' {
		if m := oneUnitLen(b[n+1:]); m > 0 {
			n += 1 + m
		}
	}
	for n > 0 && n < len(b) && (numeralLen(b[n:]) > 1 || b[n] == '2' || b[n] == '3') {
		n += numeralLen(b[n:])
	}
	switch {
	case n < len(b) && b[n] == '+':
		n++
	case n == 0 && (string(b) == "'s" || string(b) == "\u2019s"): // 1990's
		return len(b)
	}
	if n < len(b) && alnumByte(b[n]) && !separates(b[n:]) {
		return 0
	}
	return n
}

func oneUnitLen(b []byte) int {
	end := 0
	for end < len(b) {
		r, n := utf8.DecodeRune(b[end:])
		if cl := classOf(r, n); cl != rLatin && r != '\u00B5' && r != '\u03BC' && r != '\u03A9' && r != '%' && r != '\u2030' && r != '\u00B0' && r != '\u2032' && r != '\u2033' && currencyLen(b[end:]) == 0 {
			break
		}
		end += n
	}
	if end+2 == len(b) && string(b[end:]) == ".m" && (string(b[:end]) == "a" || string(b[:end]) == "p") {
		return end + 2
	}
	if unit(b[:end]) {
		return end
	}
	return 0
}

// unit reports what may be glued to a number: units of measure with their
// prefixes, ordinal endings, the s of decades, am and pm, factors.
func unit(b []byte) bool {
	switch string(b) {
	case "st", "nd", "rd", "th", "s", "am", "pm", "AM", "PM", "h", "hr", "hrs", "min", "sec", "d", "w", "wk", "y", "yr", "yrs",
		"k", "K", "M", "B", "m", "bn", "mn", "tn", "mil", "x", "X", "%", "\u2030", "\u00B0", "\u2032", "\u2033", "\u20AC", "\u00A3", "$", "\u00A2", "p", "c",
		"\u00B0C", "\u00B0F", "C", "F", "\u00B0N", "\u00B0S", "\u00B0E", "\u00B0W", "N", "S", "E", "W", "Z",
		"in", "ft", "yd", "mi", "nm", "NM", "nmi", "kn", "kt", "kts", "lb", "lbs", "oz", "pt", "gal", "mph", "kph", "kmh", "rpm", "fps", "dpi", "ppi",
		"psi", "bar", "mbar", "hPa", "atm", "g", "G", "t", "ha", "l", "L", "ml", "mL", "cl", "dl", "px", "em", "rem", "vw", "vh", "ppm", "ppb", "bps", "kbps", "Mbps", "Gbps",
		"b", "kB", "KB", "MB", "GB", "TB", "PB", "kb", "Kb", "Mb", "Gb", "KiB", "MiB", "GiB", "TiB", "bit", "dB", "dBA", "hp", "cc", "cal", "kcal", "kWh", "MWh", "GWh", "mAh", "Ah":
		return true
	}
	for _, prefix := range [...]string{"", "k", "M", "G", "T", "m", "\u00B5", "\u03BC", "n", "c", "d", "p"} {
		if rest, ok := bytes.CutPrefix(b, []byte(prefix)); ok {
			switch string(rest) {
			case "m", "g", "s", "A", "V", "W", "J", "N", "Hz", "Pa", "eV", "mol", "M", "\u03A9":
				return true
			}
		}
	}
	return false
}

// spacedUnit reports units that are no words, so that they are units when they
// stand apart from their number.
func spacedUnit(word []byte) bool {
	switch string(word) {
	case "kg", "mg", "km", "cm", "mm", "nm", "nmi", "kn", "kt", "kts", "ml", "cl", "dl", "ft", "yd", "lb", "lbs", "oz", "hr", "hrs", "min", "sec",
		"pm", "am", "mph", "kph", "rpm", "psi", "mbar", "dpi", "px", "ppm", "ppb", "bn", "mn", "ha", "kcal", "hp", "cc", "gal", "sq", "km\u00B2", "yrs", "yr":
		return true
	}
	return false
}
