package charset

import (
	"bytes"
	"errors"
	"strings"
	"testing"
	"unicode/utf8"

	"golang.org/x/text/encoding/htmlindex"
)

func decode(t *testing.T, source, label string) *Text {
	t.Helper()
	text, err := Decode([]byte(source), label)
	if err != nil {
		t.Fatal(err)
	}
	return text
}

func TestDecode(t *testing.T) {
	for _, test := range []struct{ name, label, source, want string }{
		{"no label", "", "quay\xff", "quay\xff"},
		{"UTF-8 mark", "", "\xEF\xBB\xBFquay", "\uFEFFquay"},
		{"UTF-8 mark against the label", "windows-1252", "\xEF\xBB\xBFquay", "\uFEFFquay"},
		{"little endian by its mark", "", "\xFF\xFEq\x00\x3D\xD8\xA2\xDE", "\uFEFFq🚢"},
		{"big endian by its mark", "latin1", "\xFE\xFF\x00q\xD8\x3D\xDE\xA2", "\uFEFFq🚢"},
		{"UTF-32 by its mark", "", "\xFF\xFE\x00\x00q\x00\x00\x00\xA2\xF6\x01\x00", "\uFEFFq🚢"},
		{"UTF-32 big endian", "utf-32be", "\x00\x00\x00q\x00\x11\x00\x00", "q\uFFFD"},
		{"no mark", "utf-16be", "\x00q\x00u", "qu"},
		{"lone surrogate, half a unit", "utf-16le", "\x3D\xD8q\x00u", "\uFFFDq\uFFFD"},
		{"Latin 1 is read as its superset", "latin1", "caf\xE9 \x93pier\x94", "café “pier”"},
		{"case and space of labels", " Windows-1251 ", "\xCF\xEE\xF0\xF2", "Порт"},
		{"two bytes", "shift_jis", "\x8D\x60 port", "港 port"},
		{"a lead byte at the end", "euc-jp", "port\xB9", "port\uFFFD"},
		{"four bytes", "gb18030", "\x81\x30\x81\x30x", "\u0080x"},
		{"empty", "utf-16le", "", ""},
	} {
		if got := string(decode(t, test.source, test.label).Bytes()); got != test.want {
			t.Errorf("%s: %q, want %q", test.name, got, test.want)
		}
	}
}

func TestFindRefuses(t *testing.T) {
	for label, want := range map[string]string{
		"morse":       "windows-1252", // names what would be right
		"iso-2022-jp": "UTF-8 first",
		"hz-gb-2312":  "UTF-8 first",
	} {
		if _, err := Find(label); err == nil || !strings.Contains(err.Error(), label) || !strings.Contains(err.Error(), want) {
			t.Errorf("%s: %v, want an error with %q", label, err, want)
		}
	}
}

func TestEncode(t *testing.T) {
	for _, test := range []struct{ label, text, want string }{
		{"", "façade ☂", "façade ☂"},
		{"utf-16le", "é🚢", "\xE9\x00\x3D\xD8\xA2\xDE"},
		{"utf-32be", "é", "\x00\x00\x00\xE9"},
		{"windows-1252", "façade’s", "fa\xE7ade\x92s"},
		{"shift_jis", "港", "\x8D\x60"},
	} {
		got, err := decode(t, "", test.label).Encode(test.text)
		if err != nil || string(got) != test.want {
			t.Errorf("%q in %s: %q, %v; want %q", test.text, test.label, got, err, test.want)
		}
	}
	_, err := decode(t, "", "iso-8859-2").Encode("naïve")
	if !errors.Is(err, ErrNotEncodable) || !strings.Contains(err.Error(), "ï") || !strings.Contains(err.Error(), "U+00EF") {
		t.Errorf("error %v, want one that names the character", err)
	}
}

// labels are one encoding of each sort.
var labels = []string{
	"utf-16le", "utf-16be", "utf-32le", "utf-32be", "windows-1252", "koi8-r", "macintosh", "x-user-defined",
	"shift_jis", "euc-jp", "euc-kr", "gbk", "gb18030", "big5",
}

func TestOffsetIsFoundFromAnyPlace(t *testing.T) {
	log := strings.Repeat("The pilot boarded at the north buoy, moderate swell. ", 90)
	for _, label := range labels {
		e, err := Find(label)
		if err != nil {
			t.Fatal(err)
		}
		source, err := e.Encode(log)
		if err != nil {
			t.Fatal(err)
		}
		text := e.Decode(source)
		if string(text.Bytes()) != log {
			t.Fatalf("%s: decodes otherwise than it was encoded", label)
		}
		width := int64(len(source) / len(log))
		for at := int64(0); at < int64(len(log))+5; at += 5 {
			if got, want := text.Offset(at), min(at, int64(len(log)))*width; got != want {
				t.Fatalf("%s: offset %d is %d in the source, want %d", label, at, got, want)
			}
		}
	}
}

// FuzzDecode holds that the offsets ascend with the text, and that any stretch of
// the source between two of them reads as the text between.
func FuzzDecode(f *testing.F) {
	f.Add([]byte("caf\xE9 \x93pier\x94"), uint8(4))
	f.Add([]byte("\xFF\xFEq\x00\x3D\xD8\xA2\xDE"), uint8(0))
	f.Add([]byte("\x88\x62\x8D\x60\xB9"), uint8(13))
	f.Add([]byte("\x81\x30\x81\x30\x81\x30\x81"), uint8(12))
	f.Fuzz(func(t *testing.T, source []byte, which uint8) {
		label := labels[int(which)%len(labels)]
		text, err := Decode(source, label)
		if err != nil {
			t.Fatal(err)
		}
		e, out := text.Encoding(), text.Bytes()
		if e.IsUTF8() {
			if !bytes.Equal(out, source) {
				t.Fatal("UTF-8 is changed")
			}
			return
		}
		if !utf8.Valid(out) {
			t.Fatalf("%s: %q is not UTF-8", label, out)
		}
		sameAsLibrary(t, source, e, out)
		last, lastAt := int64(0), 0
		for at := range out {
			here := text.Offset(int64(at))
			if here < last {
				t.Fatalf("%s: offset %d is %d in the source, after %d", label, at, here, last)
			}
			if here > last {
				if piece := e.Decode(source[last:here]).Bytes(); !bytes.Equal(piece, out[lastAt:at]) {
					t.Fatalf("%s: source[%d:%d] reads %q, the text has %q", label, last, here, piece, out[lastAt:at])
				}
				last, lastAt = here, at
			}
		}
		if end := text.Offset(int64(len(out))); end != int64(len(source)) {
			t.Fatalf("%s: the text ends at %d of %d", label, end, len(source))
		}
		if encoded, err := e.Encode(string(out)); err == nil && !bytes.Equal(e.Decode(encoded).Bytes(), out) {
			t.Fatalf("%s: %q does not come back", label, out)
		}
	})
}

// sameAsLibrary compares with what the library makes of the whole source.
func sameAsLibrary(t *testing.T, source []byte, e *Encoding, out []byte) {
	t.Helper()
	if strings.HasPrefix(e.Name(), "utf-") {
		return // theirs drops the byte order mark, or has none of it
	}
	theirs, err := htmlindex.Get(e.Name())
	if err != nil {
		t.Fatal(err)
	}
	if want, err := theirs.NewDecoder().Bytes(source); err != nil || !bytes.Equal(out, want) {
		t.Fatalf("%s: %q reads %q, the library has %q, %v", e.Name(), source, out, want, err)
	}
}

func BenchmarkDecode(b *testing.B) {
	log := strings.Repeat("The pilot boarded at the north buoy, moderate swell. ", 2000)
	for _, label := range []string{"utf-16le", "windows-1252", "shift_jis"} {
		b.Run(label, func(b *testing.B) {
			e, err := Find(label)
			if err != nil {
				b.Fatal(err)
			}
			source, err := e.Encode(log)
			if err != nil {
				b.Fatal(err)
			}
			b.SetBytes(int64(len(source)))
			for b.Loop() {
				e.Decode(source)
			}
		})
	}
}
