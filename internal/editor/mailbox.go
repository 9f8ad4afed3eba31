package editor

import (
	"context"
	"sync"
)

// mailbox holds what a document's goroutine has to do, in order. A task that changes
// the document interrupts the judgement under way, whose result nobody wants. A
// judgement that nobody waits for gives way to any task.
type mailbox struct {
	wake chan struct{} // has a token when there may be tasks

	mu        sync.Mutex
	tasks     []task
	changes   int                // of the tasks, those that change the document
	interrupt context.CancelFunc // of the judgement under way; nil when there is none
	yields    bool               // that judgement gives way to any task
}

type task struct {
	run     func()
	changes bool
}

func newMailbox() mailbox { return mailbox{wake: make(chan struct{}, 1)} }

func (m *mailbox) put(t task) {
	m.mu.Lock()
	m.tasks = append(m.tasks, t)
	if t.changes {
		m.changes++
	}
	if m.interrupt != nil && (t.changes || m.yields) {
		m.interrupt()
	}
	m.mu.Unlock()
	select {
	case m.wake <- struct{}{}:
	default:
	}
}

// take returns the next task; ok is false when there is none.
func (m *mailbox) take() (t task, ok bool) {
	m.mu.Lock()
	defer m.mu.Unlock()
	if len(m.tasks) == 0 {
		return task{}, false
	}
	t, m.tasks[0] = m.tasks[0], task{} // which may hold a whole document
	m.tasks = m.tasks[1:]
	if t.changes {
		m.changes--
	}
	return t, true
}

// begin returns a context for a judgement, which ends when the document changes or, if
// the judgement yields, when there is anything to do; ok is false when that is so
// already. End must be called after.
func (m *mailbox) begin(ctx context.Context, yields bool) (_ context.Context, ok bool) {
	m.mu.Lock()
	defer m.mu.Unlock()
	if m.changes > 0 || yields && len(m.tasks) > 0 {
		return ctx, false
	}
	ctx, m.interrupt = context.WithCancel(ctx)
	m.yields = yields
	return ctx, true
}

// end tells whether the document is about to change.
func (m *mailbox) end() (changing bool) {
	m.mu.Lock()
	defer m.mu.Unlock()
	m.interrupt()
	m.interrupt = nil
	return m.changes > 0
}
