package editor

import (
	"bytes"
	"context"
	"time"

	"example.org/foulcase"
	"example.org/foulcase/internal/text"
)

// document is one that the client has open.
type document struct {
	s         *Server
	uri       string
	path      string // where its settings are looked up
	language  string // the protocol's identifier
	inbox     mailbox
	preferred preferences // what its goroutine was told last, under s.mu

	// The rest belongs to its goroutine.

	version  int
	draft    *foulcase.Draft // nil: too large, or no such format
	format   string          // of the draft
	fields   []string        // likewise
	lines    lines
	settings Settings // nil: none
	asked    preferences
	stands   map[mark]bool // what settings said of marks
	closed   bool

	stale     bool          // the draft changed since marks were found
	unsettled bool          // everything is to be judged anew some time
	judged    bool          // once
	resting   bool          // the draft holds nothing that only judging needs
	took      time.Duration // to judge an edit, the last time
	opening   *progress     // of the first judgement; nil when that is not under way

	marks    []foulcase.Mark // of the draft, if it is not stale
	items    []byte          // diagnostics of the marks, a JSON array
	resultID int64           // numbers items, whatever document they are of
	trouble  string          // the last that was reported

	overflowed bool // it was said that there are more marks than are shown
}

// mark is what decides whether a mark stands.
type mark struct {
	kind                    foulcase.Kind
	part, observed, context string
}

// run does the tasks of a document until it is closed, and judges it in between.
func (d *document) run() {
	defer d.s.work.Done()
	for !d.closed && d.s.ctx.Err() == nil {
		t, ok := d.inbox.take()
		switch {
		case ok:
			t.run()
		case d.stale:
			if pause := d.pause(); pause == 0 || d.wait(time.After(pause)) {
				d.judge(d.s.ctx)
			}
		case d.unsettled:
			if d.wait(time.After(settlePause)) {
				d.rejudge()
			}
		case d.draft != nil && !d.resting:
			if d.wait(time.After(restPause)) {
				d.draft.Rest()
				d.resting = true
			}
		default:
			d.wait(nil)
		}
	}
	d.opened()
	if d.draft != nil {
		d.draft.Close()
	}
}

// opened ends what is shown of the first judgement.
func (d *document) opened() {
	if d.opening != nil {
		d.opening.end()
	}
	d.opening = nil
}

// wait waits for a task; it reports whether timeout came before.
func (d *document) wait(timeout <-chan time.Time) bool {
	select {
	case <-d.inbox.wake:
	case <-d.s.ctx.Done():
	case <-timeout:
		return true
	}
	return false
}

const (
	// quick is a judgement that need not wait for the writer to pause.
	quick = 10 * time.Millisecond
	// longestPause is the most that is waited.
	longestPause = 250 * time.Millisecond
	// settlePause is how long nothing must have been done before everything is read
	// anew, during which an edit has to wait.
	settlePause = 500 * time.Millisecond
	// restPause is how long nothing must have been done before the draft gives back what
	// judging takes: many documents may be open, and few are worked on.
	restPause = 30 * time.Second
)

// pause is how long the writer must not have typed before the document is judged: as
// long as that is likely to take, when it takes long.
func (d *document) pause() time.Duration {
	if d.took < quick {
		return 0
	}
	return min(d.took, longestPause)
}

// judge finds the marks of the document as it stands, unless they are known, and
// publishes them. The error says why they are not known.
func (d *document) judge(ctx context.Context) *failure {
	if !d.stale {
		return nil
	}
	begun, edit := time.Now(), d.judged
	f := d.look(ctx, (*foulcase.Draft).Marks, false)
	if f == nil && edit {
		d.took = time.Since(begun)
	}
	return f
}

// rejudge judges everything anew, so that what was edited bears on the evidence for
// what was not. Nobody waits for it, so it lets others pass and goes on later.
func (d *document) rejudge() {
	before := d.resultID
	if d.look(d.s.ctx, (*foulcase.Draft).Settle, true) != nil {
		return
	}
	d.unsettled = false
	if d.resultID != before {
		d.s.refresh()
	}
}

// look has the draft find its marks, in one way or the other; see mailbox.begin for
// yields.
func (d *document) look(ctx context.Context, find func(*foulcase.Draft, context.Context, func(done, total int)) ([]foulcase.Mark, error), yields bool) *failure {
	ctx, ok := d.inbox.begin(ctx, yields)
	if !ok {
		return failf(contentModified, "the document changes")
	}
	var marks []foulcase.Mark
	var err error
	if d.draft != nil {
		d.resting = false
		marks, err = find(d.draft, ctx, d.showing())
	}
	ended := ctx.Err() != nil
	switch changing := d.inbox.end(); {
	case ended && changing:
		return failf(contentModified, "the document changes")
	case ended:
		return failf(requestCancelled, "cancelled")
	}
	d.opened()
	d.report(err)
	d.stale, d.judged = false, true
	d.keep(marks)
	d.publish()
	return nil
}

// showing is what a judgement is to tell of its progress: the first one, that is. All
// of them pause now and then.
func (d *document) showing() func(done, total int) {
	pause := d.s.config.Pause
	if d.judged && pause == nil {
		return nil
	}
	if !d.judged && d.opening == nil {
		d.opening = d.s.progress(nameOf(d.uri), len(d.draft.Source()))
	}
	opening := d.opening
	return func(done, total int) {
		if opening != nil {
			opening.report(done, total)
		}
		if pause != nil {
			pause()
		}
	}
}

// report tells of what hinders a judgement, once: the user, when it hinders the first,
// and the log while the document is edited, as half a record is when it is typed.
func (d *document) report(err error) {
	now := ""
	if err != nil {
		now = err.Error()
	}
	switch {
	case now == "" || now == d.trouble:
	case d.judged:
		d.s.log(loudWarning, "%s: %s", nameOf(d.uri), now)
	default:
		d.s.show(loudError, "foulcase: %s: %s", nameOf(d.uri), now)
	}
	d.trouble = now
}

// mostMarks is the most marks of a document that a client gets, all of them anew after
// each change. Those beyond come up when some before them are done with.
const mostMarks = 5000

// keep takes over the marks that do not stand.
func (d *document) keep(marks []foulcase.Mark) {
	d.marks = d.marks[:0]
	for _, m := range marks {
		if d.letsStand(m) {
			continue
		}
		if len(d.marks) == mostMarks {
			d.overflow()
			break
		}
		d.marks = append(d.marks, m)
	}
	items := d.appendDiagnostics(make([]byte, 0, len(d.items)+1024), d.marks)
	if d.resultID == 0 || !bytes.Equal(items, d.items) {
		d.items, d.resultID = items, d.s.counter.Add(1)
	}
}

// overflow tells, once, that there are more marks than the client gets.
func (d *document) overflow() {
	if !d.overflowed {
		d.s.show(loudWarning, "foulcase: %s has more than %d marks: the first of them are shown", nameOf(d.uri), mostMarks)
	}
	d.overflowed = true
}

// maxStands is how many answers of the settings are kept.
const maxStands = 10000

func (d *document) letsStand(m foulcase.Mark) bool {
	if len(d.asked.house) > 0 && d.asked.house[string(text.Fold(nil, []byte(m.Observed)))] {
		return true
	}
	if d.settings == nil {
		return false
	}
	key := mark{m.Kind, m.Part, m.Observed, m.Context}
	stands, known := d.stands[key]
	if !known {
		if len(d.stands) >= maxStands {
			clear(d.stands)
		}
		stands = d.settings.Stands(d.path, m)
		d.stands[key] = stands
	}
	return stands
}
