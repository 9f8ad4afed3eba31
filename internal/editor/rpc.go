package editor

import (
	"bytes"
	"encoding/json"
	"fmt"
)

// code is the number of an error of JSON-RPC 2.0 or of the Language Server Protocol.
type code int

// The error codes in use, of JSON-RPC 2.0 (section 5.1) and LSP 3.17 (ErrorCodes).
const (
	parseError           code = -32700
	invalidRequest       code = -32600
	methodNotFound       code = -32601
	invalidParams        code = -32602
	internalError        code = -32603
	serverNotInitialized code = -32002
	requestFailed        code = -32803
	serverCancelled      code = -32802
	contentModified      code = -32801
	requestCancelled     code = -32800
)

// failure is an error as the protocol carries it.
type failure struct {
	Code    code   `json:"code"`
	Message string `json:"message"`
	Data    any    `json:"data,omitempty"`
}

func failf(c code, format string, args ...any) *failure {
	return &failure{Code: c, Message: fmt.Sprintf(format, args...)}
}

// message is any message that arrives: a request has a method and an id, a
// notification no id, a response no method.
type message struct {
	JSONRPC string          `json:"jsonrpc"`
	ID      json.RawMessage `json:"id"`
	Method  *string         `json:"method"`
	Params  json.RawMessage `json:"params"`
	Result  json.RawMessage `json:"result"`
	Error   *failure        `json:"error"`
}

var noID = json.RawMessage("null")

// parseMessage reads a message. With an error comes what can be told of its id.
func parseMessage(raw []byte) (message, *failure) {
	var m message
	if trimmed := bytes.TrimLeft(raw, " \t\r\n"); len(trimmed) > 0 && trimmed[0] == '[' && json.Valid(raw) {
		return message{ID: noID}, failf(invalidRequest, "the protocol has no batches: send one message at a time")
	}
	if err := json.Unmarshal(raw, &m); err != nil {
		if !json.Valid(raw) {
			return message{ID: noID}, failf(parseError, "not JSON: %v", err)
		}
		return message{ID: noID}, failf(invalidRequest, "not a message of JSON-RPC: %v", err)
	}
	if m.ID != nil && !isID(m.ID) {
		return message{ID: noID}, failf(invalidRequest, "the id of a message is a string or a number")
	}
	switch {
	case m.JSONRPC != "2.0":
		return m, failf(invalidRequest, `a message wants "jsonrpc": "2.0"`)
	case m.Method == nil && m.ID == nil:
		return m, failf(invalidRequest, "a message wants a method or an id")
	}
	return m, nil
}

// isID tells strings and numbers from the rest of JSON.
func isID(raw json.RawMessage) bool {
	return raw[0] == '"' || raw[0] == '-' || '0' <= raw[0] && raw[0] <= '9'
}

// request, notification and refusal are messages that are sent.
type request struct {
	JSONRPC string `json:"jsonrpc"`
	ID      int    `json:"id"`
	Method  string `json:"method"`
	Params  any    `json:"params,omitempty"`
}

type notification struct {
	JSONRPC string `json:"jsonrpc"`
	Method  string `json:"method"`
	Params  any    `json:"params"`
}

type refusal struct {
	JSONRPC string          `json:"jsonrpc"`
	ID      json.RawMessage `json:"id"`
	Error   *failure        `json:"error"`
}
