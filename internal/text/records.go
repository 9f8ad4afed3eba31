package text

// The formats of records and messages.
const (
	SRT       Format = "srt"
	VTT       Format = "vtt"
	PO        Format = "po"
	Mail      Format = "mail"
	CSV       Format = "csv"
	TSV       Format = "tsv"
	JSONLines Format = "jsonl"
	JSON      Format = "json"
)

// recordFormats are the entries of the registry for documents of records and
// messages.
func recordFormats() []format {
	return []format{
		{
			name: SRT, about: "text of subtitles, a sentence over several cues as one",
			extensions: []string{".srt"}, read: readSRT,
		},
		{
			name: VTT, about: "text of subtitles in the language asked for; not notes, styles and names of voices",
			extensions: []string{".vtt"}, read: readVTT,
		},
		{
			name: PO, about: "translations into the language asked for; in other catalogues the originals, to correct by hand",
			extensions: []string{".po", ".pot"}, languages: []string{"po"}, read: readPO,
		},
		{
			name: Mail, about: "subject and text parts; not quoted lines, signatures, attachments and base64",
			extensions: []string{".eml"}, read: readMail,
		},
		{
			name: CSV, about: "the columns asked for, else cells that hold prose; any of , ; | or a tab between",
			extensions: []string{".csv"}, read: readCSV,
		},
		{
			name: TSV, about: "as csv, with tabs",
			extensions: []string{".tsv"}, read: readTSV,
		},
		{
			name: JSONLines, about: "the members or JSON Pointers asked for, else strings that hold prose; one value a line",
			extensions: []string{".jsonl", ".ndjson"}, read: readJSONLines,
		},
		{
			name: JSON, about: "as jsonl, but one value, and comments are borne",
			extensions: []string{".json"}, languages: []string{"json", "jsonc"}, read: readJSON,
		},
	}
}
