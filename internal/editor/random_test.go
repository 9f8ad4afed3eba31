package editor

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"sync"
	"testing"
	"testing/synctest"
	"time"
)

// TestRandomSessions: whatever a client does, in whatever order, every request is
// answered once, no diagnostics are of an older version than those before, those of a
// closed document are cleared, what is pulled at the end is that of the text as it
// stands, and no goroutine is left over.
func TestRandomSessions(t *testing.T) {
	engine()
	sessions, steps := uint64(6), 60
	if testing.Short() {
		sessions, steps = 2, 30
	}
	for seed := range sessions {
		for _, capabilities := range []string{"{}", pulling} {
			t.Run(fmt.Sprint(seed, len(capabilities) > 2), func(t *testing.T) {
				synctest.Test(t, func(t *testing.T) {
					p := newRandomClient(t, seed, capabilities)
					for range steps {
						p.step()
					}
					p.finish()
				})
			})
		}
	}
}

// randomClient does at random what editors do.
type randomClient struct {
	*client
	r       *rand.Rand
	pulls   bool
	version int
	texts   map[string]string // of the open documents
	asked   []string          // ids
}

func newRandomClient(t *testing.T, seed uint64, capabilities string) *randomClient {
	m := &lockedMemory{}
	return &randomClient{
		client: start(t, Config{Settings: m.load, Pause: func() { time.Sleep(time.Millisecond) }}, capabilities),
		r:      rand.New(rand.NewPCG(seed, 6)),
		pulls:  capabilities == pulling,
		texts:  map[string]string{},
	}
}

// lockedMemory is memory that documents share: their goroutines load it at once, each a
// copy of its own.
type lockedMemory struct {
	mu    sync.Mutex
	words []string
}

func (m *lockedMemory) load(string) (Settings, error) {
	m.mu.Lock()
	defer m.mu.Unlock()
	return &sharedMemory{memory{words: append([]string(nil), m.words...)}, m}, nil
}

type sharedMemory struct {
	memory
	shared *lockedMemory
}

func (m *sharedMemory) AddWord(word string) (string, error) {
	m.shared.mu.Lock()
	defer m.shared.mu.Unlock()
	m.shared.words = append(m.shared.words, word)
	return "house.txt", nil
}

func (p *randomClient) step() {
	uri := fmt.Sprintf("file:///papers/%d.md", p.r.IntN(3))
	text, open := p.texts[uri]
	p.version++
	switch n := p.r.IntN(20); {
	case !open:
		p.texts[uri] = longText(p.t, 50+p.r.IntN(100)) + randomText(p.r, 20)
		p.notify("textDocument/didOpen", fmt.Sprintf(`{"textDocument":{"uri":%q,"languageId":"markdown","version":%d,"text":%s}}`, uri, p.version, encode(p.texts[uri])))
	case n < 8:
		p.edit(uri, text)
	case n == 8:
		delete(p.texts, uri)
		p.notify("textDocument/didClose", naming(uri))
	case n == 9:
		p.notify("textDocument/didSave", naming(uri))
	case n == 10:
		p.notify("workspace/didChangeConfiguration", fmt.Sprintf(`{"settings":{"foulcase":{"budget":%d}}}`, 1+p.r.IntN(3)))
	case n == 11:
		p.notify("workspace/didChangeWatchedFiles", `{"changes":[]}`)
	case n == 12 && len(p.asked) > 0:
		p.notify("$/cancelRequest", `{"id":`+p.asked[p.r.IntN(len(p.asked))]+`}`)
	case n == 13:
		p.wonder("workspace/executeCommand", fmt.Sprintf(`{"command":"foulcase.addWord","arguments":[{"uri":%q,"word":"word%d"}]}`, uri, p.version))
	case n == 14 && p.pulls:
		p.wonder("workspace/diagnostic", `{"previousResultIds":[]}`)
	case n == 15:
		p.wonder("textDocument/codeAction", fmt.Sprintf(`{"textDocument":{"uri":%q},"range":%s,"context":{"diagnostics":[]}}`, uri, between(0, 0, p.r.IntN(30), 0)))
	case n == 16:
		p.wonder("textDocument/diagnostic", naming(uri))
	default:
		time.Sleep(time.Duration(p.r.IntN(800)) * time.Millisecond)
	}
}

func (p *randomClient) edit(uri, text string) {
	l := lines{unit: utf16Units}
	l.reset([]byte(text))
	at := l.cursor([]byte(text))
	first, last := randomStretch(p.r, text)
	added := randomText(p.r, p.r.IntN(12))
	p.change(uri, p.version, encode(span{at.position(first), at.position(last)}), added)
	p.texts[uri] = text[:first] + added + text[last:]
}

// wonder asks something and goes on.
func (p *randomClient) wonder(method, params string) {
	p.asked = append(p.asked, p.ask(method, params))
}

// finish compares with documents that are opened fresh, and looks through all that came.
func (p *randomClient) finish() {
	for uri, text := range p.texts {
		p.notify("textDocument/didSave", naming(uri))
		p.notify("textDocument/didOpen", fmt.Sprintf(`{"textDocument":{"uri":%q,"languageId":"markdown","version":0,"text":%s}}`, uri+".fresh", encode(text)))
	}
	time.Sleep(time.Hour) // of the bubble: everything has settled
	if p.pulls {
		for uri := range p.texts {
			got, want := p.pull(uri, ""), p.pull(uri+".fresh", "")
			if encode(got.Items) != encode(want.Items) {
				p.t.Errorf("%s: %v, fresh %v", uri, got.Items, want.Items)
			}
		}
	}
	p.request("shutdown", "null")
	p.notify("exit", "null")
	if err := p.server.Close(); err != nil {
		p.t.Error(err)
	}
	p.lookThrough()
}

func (p *randomClient) lookThrough() {
	answers, last := map[string]int{}, map[string]publication{}
	for _, a := range p.arrived {
		switch {
		case a.Method == "":
			answers[string(a.ID)]++
		case a.Method == "textDocument/publishDiagnostics":
			var pub publication
			read(p.t, a.Params, &pub)
			before := last[pub.URI]
			if before.Version != nil && pub.Version != nil && *pub.Version < *before.Version {
				p.t.Errorf("version %d after %d", *pub.Version, *before.Version)
			}
			last[pub.URI] = pub
		}
	}
	for _, id := range p.asked {
		if answers[id] != 1 {
			p.t.Errorf("request %s was answered %d times", id, answers[id])
		}
	}
	for uri, pub := range last {
		if _, open := p.texts[strings.TrimSuffix(uri, ".fresh")]; !open && (pub.Version != nil || len(pub.Diagnostics) > 0) {
			p.t.Errorf("%s is closed and has %v", uri, pub.Diagnostics)
		} else if fresh := last[uri+".fresh"]; open && !strings.HasSuffix(uri, ".fresh") && encode(pub.Diagnostics) != encode(fresh.Diagnostics) {
			p.t.Errorf("%s: %v, fresh %v", uri, pub.Diagnostics, fresh.Diagnostics)
		}
	}
}
