package report

import (
	"bytes"
	"fmt"
	"io"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
)

// sarif is a log of the Static Analysis Results Interchange Format, version 2.1.0
// (OASIS), of one run. Columns count code points.
type sarif struct{ settings Settings }

const (
	sarifSchema = "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"
	// runFolder names the folder that relative paths are of.
	runFolder = "RUNFOLDER"
)

// Whole is false: a mark knows all that a result says.
func (sarif) Whole() bool     { return false }
func (sarif) Between() string { return ",\n" }

func (s sarif) Head(w io.Writer) error {
	head := sarifRun{
		Tool: sarifTool{Driver: sarifDriver{
			Name:       "foulcase",
			Version:    s.settings.Version,
			Rules:      sarifRules(),
			Properties: map[string]string{"model": s.settings.Model()},
		}},
		ColumnKind: "unicodeCodePoints",
		Bases: map[string]sarifBase{
			runFolder: {Description: sarifText{"the folder that foulcase was run in"}},
		},
	}
	run, err := marshal(head)
	if err != nil {
		return err
	}
	// The results follow as they are found, and how the run went after them.
	_, err = fmt.Fprintf(w, "{\"version\":\"2.1.0\",\"$schema\":%q,\"runs\":[%s,\"results\":[\n", sarifSchema, run[:len(run)-1])
	return err
}

// Tail says whether the run went well: where it did not, a missing result means nothing.
func (sarif) Tail(w io.Writer, complete bool) error {
	_, err := fmt.Fprintf(w, "\n],\"invocations\":[{\"executionSuccessful\":%t}]}]}\n", complete)
	return err
}

func (s sarif) Page(w io.Writer, d Document) Page {
	first := true
	return pageFunc(func(m foulcase.Mark) error {
		result, err := marshal(sarifResultOf(d.Path, m))
		if err != nil {
			return err
		}
		if !first {
			result = append([]byte(s.Between()), result...)
		}
		first = false
		_, err = w.Write(result)
		return err
	})
}

func sarifResultOf(path string, m foulcase.Mark) sarifResult {
	result := sarifResult{
		RuleID:       m.Kind.String(),
		RuleIndex:    int(m.Kind),
		Level:        "note",
		Message:      sarifText{wording(m)},
		Rank:         100 * m.P,
		Fingerprints: map[string]string{"foulcase/v1": house.Fingerprint(path, m)},
	}
	if m.Grade == foulcase.GradeMark {
		result.Level = "warning"
	}
	artifact := artifactOf(path)
	location := sarifLocation{Physical: sarifPhysical{Artifact: artifact}}
	if m.Part != "" {
		location.Logical = []sarifLogical{{Name: m.Part, Kind: "part"}}
	} else {
		location.Physical.Region = regionOf(m)
		result.Fixes = fixesOf(artifact, m)
	}
	result.Locations = []sarifLocation{location}
	return result
}

func artifactOf(path string) sarifArtifact {
	uri, absolute := uriOf(path)
	if absolute {
		return sarifArtifact{URI: uri}
	}
	return sarifArtifact{URI: uri, Base: runFolder}
}

func regionOf(m foulcase.Mark) *sarifRegion {
	line, column := endOf(m)
	return &sarifRegion{
		StartLine: m.Line, StartColumn: m.Column, EndLine: line, EndColumn: column,
		ByteOffset: m.Offset, ByteLength: m.Length,
	}
}

// fixesOf offers each correction, the best first; a mark ByHand has none.
func fixesOf(artifact sarifArtifact, m foulcase.Mark) []sarifFix {
	if m.ByHand {
		return nil
	}
	var fixes []sarifFix
	for _, c := range m.Corrections {
		fixes = append(fixes, sarifFix{
			Description: sarifText{fmt.Sprintf("write %s", Quoted(c.Text))},
			Changes: []sarifChange{{
				Artifact:     artifact,
				Replacements: []sarifReplacement{{Deleted: regionOf(m), Inserted: sarifText{c.Spelled()}}},
			}},
		})
	}
	return fixes
}

// sarifRules are the kinds, at the places of their values.
func sarifRules() []sarifRule {
	var rules []sarifRule
	for _, k := range foulcase.Kinds() {
		rules = append(rules, sarifRule{ID: k.String(), Short: sarifText{kindAbout[k]}})
	}
	return rules
}

// marshal is json.Marshal with "<", ">" and "&" as they are.
func marshal(v any) ([]byte, error) {
	var b bytes.Buffer
	err := JSONLines(&b).Encode(v)
	return bytes.TrimSuffix(b.Bytes(), []byte("\n")), err
}
