package report

// What a SARIF log holds, as far as it is written here. The names of members are
// those of the standard.

type sarifRun struct {
	Tool       sarifTool            `json:"tool"`
	ColumnKind string               `json:"columnKind"`
	Bases      map[string]sarifBase `json:"originalUriBaseIds"`
}

type sarifTool struct {
	Driver sarifDriver `json:"driver"`
}

type sarifDriver struct {
	Name       string            `json:"name"`
	Version    string            `json:"version,omitempty"`
	Rules      []sarifRule       `json:"rules"`
	Properties map[string]string `json:"properties"`
}

type sarifRule struct {
	ID    string    `json:"id"`
	Short sarifText `json:"shortDescription"`
}

type sarifText struct {
	Text string `json:"text"`
}

type sarifBase struct {
	Description sarifText `json:"description"`
}

type sarifResult struct {
	RuleID       string            `json:"ruleId"`
	RuleIndex    int               `json:"ruleIndex"`
	Level        string            `json:"level"`
	Message      sarifText         `json:"message"`
	Locations    []sarifLocation   `json:"locations"`
	Fingerprints map[string]string `json:"partialFingerprints"`
	Rank         float64           `json:"rank"` // percent
	Fixes        []sarifFix        `json:"fixes,omitempty"`
}

type sarifLocation struct {
	Physical sarifPhysical  `json:"physicalLocation"`
	Logical  []sarifLogical `json:"logicalLocations,omitempty"`
}

type sarifPhysical struct {
	Artifact sarifArtifact `json:"artifactLocation"`
	Region   *sarifRegion  `json:"region,omitempty"`
}

type sarifLogical struct {
	Name string `json:"name"`
	Kind string `json:"kind"`
}

type sarifArtifact struct {
	URI  string `json:"uri"`
	Base string `json:"uriBaseId,omitempty"`
}

// sarifRegion counts lines and columns from 1; EndColumn is that of the
// character after the region.
type sarifRegion struct {
	StartLine   int   `json:"startLine"`
	StartColumn int   `json:"startColumn"`
	EndLine     int   `json:"endLine"`
	EndColumn   int   `json:"endColumn"`
	ByteOffset  int64 `json:"byteOffset"`
	ByteLength  int64 `json:"byteLength"`
}

type sarifFix struct {
	Description sarifText     `json:"description"`
	Changes     []sarifChange `json:"artifactChanges"`
}

type sarifChange struct {
	Artifact     sarifArtifact      `json:"artifactLocation"`
	Replacements []sarifReplacement `json:"replacements"`
}

type sarifReplacement struct {
	Deleted  *sarifRegion `json:"deletedRegion"`
	Inserted sarifText    `json:"insertedContent"`
}
