package editor

import (
	"encoding/json"
	"errors"
	"slices"
	"sync"
)

// maxWaiting is the most bytes that wait for a client to read them.
const maxWaiting = 256 << 20

// outbox hands messages to send one after the other, in a goroutine of its own, so
// that nobody else waits for a client that is slow to read.
type outbox struct {
	send   func(json.RawMessage) error
	broken func(error) // told once when nothing can be sent any more

	mu     sync.Mutex
	queue  []parcel
	size   int
	shut   bool
	wake   chan struct{}
	closed chan struct{} // closed when the last message is sent
}

// parcel is a message that waits. A newer one of the same key takes its place.
type parcel struct {
	key     string // "" is like no other
	message json.RawMessage
}

func (p parcel) replaces(older parcel) bool { return p.key != "" && p.key == older.key }

func newOutbox(send func(json.RawMessage) error, broken func(error)) *outbox {
	o := &outbox{send: send, broken: broken, wake: make(chan struct{}, 1), closed: make(chan struct{})}
	go o.work()
	return o
}

// put queues a message, which is the outbox's from then on.
func (o *outbox) put(p parcel) {
	o.mu.Lock()
	if o.shut {
		o.mu.Unlock()
		return
	}
	if i := slices.IndexFunc(o.queue, p.replaces); i >= 0 {
		o.size -= len(o.queue[i].message)
		o.queue = slices.Delete(o.queue, i, i+1)
	}
	o.queue = append(o.queue, p)
	o.size += len(p.message)
	full := o.size > maxWaiting
	o.mu.Unlock()
	if full {
		o.close()
		o.broken(errors.New("the client does not read what is sent to it"))
	}
	o.stir()
}

// close lets what is queued be sent, and nothing more.
func (o *outbox) close() {
	o.mu.Lock()
	o.shut = true
	o.mu.Unlock()
	o.stir()
}

func (o *outbox) stir() {
	select {
	case o.wake <- struct{}{}:
	default:
	}
}

func (o *outbox) work() {
	defer close(o.closed)
	for range o.wake {
		for {
			p, more, shut := o.take()
			if !more {
				if shut {
					return
				}
				break
			}
			if err := o.send(p.message); err != nil {
				o.close()
				o.broken(err)
				return
			}
		}
	}
}

func (o *outbox) take() (p parcel, more, shut bool) {
	o.mu.Lock()
	defer o.mu.Unlock()
	if len(o.queue) == 0 {
		return parcel{}, false, o.shut
	}
	p, o.queue[0] = o.queue[0], parcel{} // let go of when it is sent
	o.queue = o.queue[1:]
	o.size -= len(p.message)
	return p, true, o.shut
}
