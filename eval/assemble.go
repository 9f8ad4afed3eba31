package eval

import (
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"io"
)

// AddPairs adds a measured list; of file, what is known without measuring.
func (r *Result) AddPairs(file DataFile, outcomes []PairOutcome, rs Resampling) {
	file.Items, file.Report = len(outcomes), ScorePairs(outcomes, rs)
	for _, o := range outcomes {
		o.Data = len(r.Data)
		r.Pairs = append(r.Pairs, o)
	}
	r.add(file)
}

// AddTexts adds measured texts; of file, what is known without measuring.
func (r *Result) AddTexts(file DataFile, j *Judged, rs Resampling) {
	file.Items, file.Report = j.Items, j.Score(r.Task, rs)
	first := len(r.Units)
	for _, u := range j.Units {
		u.Data = len(r.Data)
		r.Units = append(r.Units, u)
	}
	for _, p := range j.Places {
		p.Unit += first
		r.Places = append(r.Places, p)
	}
	r.add(file)
}

func (r *Result) add(file DataFile) {
	r.Data = append(r.Data, file)
	r.Overlap = r.Overlap.plus(file.Overlap)
}

// Sum reports on all data together; it is called when all are added.
func (r *Result) Sum(rs Resampling) {
	switch {
	case len(r.Data) == 1:
		r.Report = r.Data[0].Report
	case r.Task == TaskList:
		r.Report = ScorePairs(r.Pairs, rs)
	default:
		r.Report = r.Judged().Score(r.Task, rs)
	}
}

// Judged is what became of the flags and errors of all texts. It shares the
// result's memory.
func (r *Result) Judged() *Judged {
	j := &Judged{Units: r.Units, Places: r.Places}
	for _, d := range r.Data {
		j.Items += d.Items
	}
	return j
}

// Score reports on texts as a task asks for it.
func (j *Judged) Score(task string, r Resampling) *Report {
	switch task {
	case TaskClean:
		return j.ScoreClean(r)
	case TaskNoise:
		return j.ScoreNoise(r)
	}
	return j.ScoreText(r)
}

// HashItems is the SHA-256, hexadecimal, of the texts that items hold and of how
// they make documents. Errors do not bear on it, since what counts as one may
// depend on a model's lexicon.
func HashItems(items []Item) string {
	h := sha256.New()
	for _, item := range items {
		hashStrings(h, item.Document, item.Source)
	}
	return hex.EncodeToString(h.Sum(nil))
}

// HashPairs is the SHA-256, hexadecimal, of pairs in their order.
func HashPairs(pairs []Pair) string {
	h := sha256.New()
	for _, p := range pairs {
		hashStrings(h, p.Observed, p.Intended)
	}
	return hex.EncodeToString(h.Sum(nil))
}

// hashStrings writes strings so that others give other bytes.
func hashStrings(w io.Writer, list ...string) {
	for _, s := range list {
		fmt.Fprintf(w, "%d:%s", len(s), s)
	}
}
