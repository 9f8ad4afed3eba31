package text

import (
	"bytes"
	"go/scanner"
	"go/token"
)

// How Go quotes, for what corrections must be spelled like.
var (
	goString  = enclosure{open: `"`, close: `"`, escape: '\\'}
	goRaw     = enclosure{open: "`", close: "`", lines: true}
	goComment = enclosure{role: remark, open: "/*", close: "*/", lines: true}
)

// goPieces gives the comments and strings of Go source to take. It keeps to the
// offsets of the standard library's scanner, not to its texts, which lack carriage
// returns.
func goPieces(source []byte, take func(codePiece)) {
	files := token.NewFileSet()
	file := files.AddFile("", files.Base(), len(source))
	var s scanner.Scanner
	s.Init(file, source, nil, scanner.ScanComments)
	inside := 0 // where the last piece or token ended, or a byte of it
	for {
		pos, kind, literal := s.Scan()
		if kind == token.EOF {
			return
		}
		at := file.Offset(pos)
		first := bytes.ContainsAny(source[min(inside, at):at], "\r\n") || inside == 0
		switch kind {
		case token.COMMENT:
			inside = goCommentAt(source, at, first, take)
		case token.STRING:
			inside = goStringAt(source, at, len(literal), take)
		case token.SEMICOLON: // may stand for a line end
		default:
			inside = at + 1
		}
	}
}

func goCommentAt(source []byte, at int, first bool, take func(codePiece)) (end int) {
	if bytes.HasPrefix(source[at:], []byte("//")) {
		end = at + lineLength(source[at:])
		take(codePiece{start: at, end: end, from: at + 2, to: end, line: true, first: first})
		return end
	}
	return goEnclosed(source, at, &goComment, take)
}

func goStringAt(source []byte, at, length int, take func(codePiece)) (end int) {
	if source[at] == '`' {
		return goEnclosed(source, at, &goRaw, take)
	}
	if end = at + length; end > at+1 && end <= len(source) && source[end-1] == '"' {
		take(codePiece{start: at, end: end, from: at + 1, to: end - 1, in: &goString})
	}
	return end
}

func goEnclosed(source []byte, at int, e *enclosure, take func(codePiece)) (end int) {
	from := at + len(e.open)
	to, end, ok := e.closes(source, from, e.close)
	if ok {
		take(codePiece{start: at, end: end, from: from, to: to, in: e})
	}
	return end
}
