//go:build js && wasm

// Foulcase-page is the language server of internal/editor for a web page: a
// program of js/wasm that a Web Worker runs (page/worker.js). The worker hands
// it the bytes of a model and the messages of an editor, one JSON text each, and
// takes those for the editor. What it is given stays in its memory: it opens no
// files and knows no network.
//
// The worker leaves an object "foulcase" in the global scope for it:
//
//	model            Uint8Array: the model file, copied and let go
//	send(text)       takes a message for the editor
//	started(receive) the model is open; receive(text) takes a message of the editor
//	failed(text)     the model cannot be used; the text says why
package main

import (
	"encoding/json"
	"syscall/js"
	"time"

	"example.org/foulcase"
	"example.org/foulcase/internal/editor"
)

func main() {
	host := js.Global().Get("foulcase")
	engine, err := foulcase.Open(takeModel(host))
	if err != nil {
		host.Call("failed", err.Error())
		return
	}
	serve(host, engine)
}

// takeModel copies the model into the memory of Go, and lets go of the worker's copy.
func takeModel(host js.Value) []byte {
	array := host.Get("model")
	model := make([]byte, array.Length())
	js.CopyBytesToGo(model, array)
	host.Delete("model")
	return model
}

// serve holds a session with the editor until that ends it.
func serve(host js.Value, engine *foulcase.Engine) {
	config := editor.Config{Engine: engine, Pause: pauses()}
	server := editor.New(config, func(m json.RawMessage) error {
		host.Call("send", string(m))
		return nil
	})
	// Receive waits for nothing, so the worker's event may call it. Events come one
	// after the other.
	receive := js.FuncOf(func(_ js.Value, args []js.Value) any {
		server.Receive([]byte(args[0].String()))
		return nil
	})
	host.Call("started", receive)
	<-server.Done()
	server.Close() // the worker ends with its page; how the session ended is nobody's concern
}

const (
	// longestTurn is how long a judgement keeps the worker from its messages, about.
	longestTurn = 40 * time.Millisecond
	// shortestPause is the least that timers of browsers know. Waiting for less, Go may
	// not let go of the thread.
	shortestPause = time.Millisecond
)

// pauses returns a function that lets the worker handle the messages that wait, when
// it did not for a while: Go hands the worker's only thread back while all its
// goroutines wait.
func pauses() func() {
	last := time.Now()
	return func() {
		if time.Since(last) > longestTurn {
			time.Sleep(shortestPause)
			last = time.Now()
		}
	}
}
