package text

// abbreviation says what the point after an abbreviation may mean.
type abbreviation uint8

const (
	noAbbreviation abbreviation = iota
	beforeName                  // Mr. : a name follows, the sentence goes on
	beforeNumber                // No. : the sentence goes on when a number or a small letter follows
	anywhere                    // Inc. : it goes on unless a capitalised function word follows
	closing                     // etc. : it goes on when a small letter or a digit follows
)

// abbreviationOf looks up a folded word that has a point after it. Words that
// are words without the point as well (no, art, sun) stand in the classes that
// ask for a number or a small letter.
func abbreviationOf(norm []byte) abbreviation {
	switch string(norm) {
	case "mr", "mrs", "ms", "messrs", "mme", "mlle", "dr", "drs", "prof", "rev", "hon", "fr", "st", "ste", "mt", "ft",
		"gen", "maj", "col", "lt", "capt", "cpt", "cmdr", "cdr", "adm", "sgt", "cpl", "pvt", "brig", "supt", "insp",
		"sen", "rep", "gov", "pres", "amb", "atty", "supr",
		"viz", "cf", "vs", "esp", "incl", "excl", "approx", "aka":
		return beforeName
	case "no", "nos", "nr", "fig", "figs", "sec", "secs", "sect", "art", "arts", "ch", "chap", "vol", "vols", "eq",
		"eqs", "ref", "refs", "pp", "pg", "para", "paras", "cl", "pt", "ex", "app", "tab", "ln", "lot", "op", "ca",
		"jan", "feb", "mar", "apr", "jun", "jul", "aug", "sep", "sept", "oct", "nov", "dec",
		"mon", "tue", "tues", "wed", "thu", "thur", "thurs", "fri", "sat", "sun",
		"min", "max", "tel", "ext", "rm", "bk", "stat", "reg", "cir", "supp":
		return beforeNumber
	case "inc", "ltd", "co", "corp", "llc", "plc", "bros", "assn", "assoc", "dept", "div", "univ", "inst", "govt",
		"jr", "sr", "esq", "al", "ed", "eds", "edn", "trans", "rept", "repr", "est", "ave", "blvd", "rd", "hwy", "sq",
		"bldg", "mfg", "ibid", "op.cit", "misc", "temp", "orig", "intl", "natl", "gmbh", "v", "am", "pm":
		return anywhere
	case "etc", "ft.", "oz", "lb", "lbs", "kg", "km", "cm", "mm", "hrs", "hr", "yd", "yds", "mi", "yr", "yrs", "mo", "wk":
		return closing
	}
	return noAbbreviation
}

// opensSentence reports a capitalised function word: one that hardly begins a
// name, so that a point before it ends a sentence.
func opensSentence(word []byte) bool {
	switch string(word) {
	case "A", "An", "The", "This", "That", "These", "Those", "There", "Here",
		"I", "He", "She", "It", "We", "You", "They", "My", "His", "Her", "Its", "Our", "Your", "Their",
		"In", "On", "At", "By", "For", "From", "With", "To", "Of", "As", "After", "Before", "During", "Since", "Under",
		"And", "But", "Or", "So", "If", "When", "While", "Where", "Although", "Because", "However", "Then", "Thus",
		"What", "Which", "Who", "Why", "How", "Not", "No", "Yes", "Now", "Some", "Many", "Most", "All", "Both", "Each",
		"Is", "Are", "Was", "Were", "Do", "Does", "Did", "Please", "Let":
		return true
	}
	return false
}
