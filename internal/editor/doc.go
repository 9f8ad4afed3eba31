// Package editor is a server of the Language Server Protocol 3.17: documents come
// from an editor change by change, and diagnostics and code actions go back.
//
// Serve speaks over a pair of streams; New makes a Server that takes and gives
// single messages, for a transport of another kind.
//
// One goroutine reads (the caller of Receive), one writes, and each open document
// has one that owns its draft; they hand each other functions to run. What waits to
// be judged or sent gives way to what is newer. Offsets inside are bytes; the
// positions of the protocol, in the units that the client chose, are made by lines
// alone.
//
// Everything a client sends is taken for hostile: it is bounded in size, clamped or
// refused with an error of the protocol.
package editor
