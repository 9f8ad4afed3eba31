package text_test

import (
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

const mailSample = "From: desk@skarrow.example\r\nSUBJECT: Re: Fwd: Fog at\r\n the bar\r\nMIME-Version: 1.0\r\n" +
	"Content-Type: multipart/mixed;\r\n boundary=\"=_a b\"\r\n\r\nA preamble here.\r\n--=_a b\r\n" +
	"Content-Type: multipart/alternative; boundary=inner\r\n\r\n--inner\r\nContent-Type: text/plain; charset=utf-8\r\n" +
	"Content-Transfer-Encoding: quoted-printable\r\n\r\nThe pilot of the caf=C3=A9 has le=\r\nft us = and =\r\nice.\r\n\r\n" +
	"> the tug\r\n> is quoted\r\nSo be it.\r\n-- \r\nTom of the desk\r\n--inner\r\nContent-Type: text/html\r\n\r\n<p>hidden words</p>\r\n--inner--\r\n" +
	"--=_a b\r\nContent-Type: text/plain\r\nContent-Disposition: attachment; filename=a.txt\r\n\r\nattached words\r\n" +
	"--=_a b\r\n\r\nA second part.\r\n--=_a b--\r\nAn epilogue here.\r\n"

func TestMail(t *testing.T) {
	checkReadings(t, text.Mail, []reading{
		{"empty", "", nil},
		{"sample", mailSample, []string{"Fog at\n the bar", "The pilot of the café has left us = and ice.", "So be it.", "A second part."}},
		{"no body", "Subject: the fog", []string{"the fog"}},
		{"no header", "\nthe fog\n", []string{"the fog"}},
		{"flowed", "Content-Type: text/plain; format=flowed\n\nThe fog \nCame in. \n and\nIce\n> quoted \nbar", []string{"The fog \nCame in. \n and", "Ice", "bar"}},
		{"HTML alone", "Content-Type: text/html; charset=utf-8\nContent-Transfer-Encoding: quoted-printable\n\n<p class=3D\"a\">The caf=C3=A9 &am=\np; the t=\nug</p>=0A<p>ice", []string{"The café & the tug", "ice"}},
		{"HTML with images", "Content-Type: multipart/related; boundary=a\n\n--a\nContent-Type: text/html\n\n<p>the <b>fog</b>\n--a\nContent-Type: image/png\n\nx\n--a--", []string{"the fog"}},
		{"base64", "Content-Transfer-Encoding: BASE64\n\ndGhlIGZvZw==\n", nil},
		{"charset", "Content-Type: text/plain; charset=iso-8859-1\n\nthe fog\n", nil},
		{"broken type", "Content-Type: text/plain; charset\n\nthe fog\n", []string{"the fog"}},
		{"not text", "Content-Type: application/json\n\nthe fog\n", nil},
		{"digest", "Content-Type: multipart/digest; boundary=a\n\n--a\n\nSubject: fog\n\nice\n", nil},
		{"encoded subject", "Subject: =?utf-8?Q?Caf=C3=A9?= =?ISO-8859-1?B?6Q==?= at =?koi8-r?Q?=C1?= sea\n", []string{"Caféé at \uFFFC sea"}},
		{"quoted subject", "Subject: Re: =?utf-8?Q?The_caf=C3=A9?=\n =?utf-8?q?s_=3D?= now", []string{"The cafés = now"}},
		{"no end of a part", "Content-Type: multipart/mixed; boundary=a\n\n--a\n\nthe fog\n--ab\nice", []string{"the fog", "--ab", "ice"}},
	})
}

func TestMailSpelling(t *testing.T) {
	for _, c := range []struct{ head, body, word, other, want string }{
		{"Content-Transfer-Encoding: quoted-printable\nContent-Type: text/plain; charset=UTF-8", "the fog", "fog", "é=a", "=C3=A9=3Da"},
		{"Content-Transfer-Encoding: 8bit\nContent-Type: text/plain; charset=UTF-8", "the fog", "fog", "é=a", "é=a"},
		{"Content-Transfer-Encoding: quoted-printable", "the fog", "fog", "é", "-"},
		{"X: y", "the fog", "fog", "é", "-"},
		{"X: y", "the fog", "fog", "ice", "ice"},
		{"Content-Type: text/html; charset=utf-8\nContent-Transfer-Encoding: quoted-printable", "<p>the fog", "fog", "é<", "=C3=A9&lt;"},
		{"Subject: the tide", "", "tide", "ice", "ice"},
		{"Subject: the tide", "", "tide", "é", "-"},
		{"Subject: the tide =?utf-8?q?x?=", "", "tide", "ice", "ice"},
		{"Subject: =?UTF-8?Q?Caf=C3=A9_the_tide?=", "", "tide", "ice", "ice"},
		{"Subject: =?utf-8?q?the_tide?=", "", "tide", "the ice", "-"},
		{"Subject: the tide =?utf-8?b?eA==?=", "", "tide", "ice", "-"},
	} {
		got, ok, _ := spelled(t, c.head+"\n\n"+c.body, text.Mail, c.word, c.other)
		if !ok {
			got = "-"
		}
		if got != c.want {
			t.Errorf("%s: %q is spelled %q, want %q", c.head, c.other, got, c.want)
		}
	}
	if _, _, interrupted := spelled(t, mailSample, text.Mail, "left", "x"); !interrupted {
		t.Error("a word over a broken line is not interrupted")
	}
}

// TestMailDepth: parts in parts are read, but not without end.
func TestMailDepth(t *testing.T) {
	nested := func(depth int) string {
		var b strings.Builder
		for i := range depth {
			b.WriteString("Content-Type: multipart/mixed; boundary=b" + strings.Repeat("x", i) + "\n\n--b" + strings.Repeat("x", i) + "\n")
		}
		return b.String() + "\nthe fog\n"
	}
	checkReadings(t, text.Mail, []reading{
		{"eight", nested(8), []string{"the fog"}},
		{"many", nested(500), nil},
	})
}

func FuzzMail(f *testing.F) {
	fuzzFormat(f, text.Mail, mailSample, "Subject: =?utf-8?q?a?= b\n =?utf-8?b?YQ==?=\nContent-Type: text/plain;format=flowed\n\na \n b=\n-- \n",
		"Content-Type: text/html; charset=utf-8\nContent-Transfer-Encoding: quoted-printable\n\n<p a=3D\"b\" title=3Dc>d =C3=A9&am=\np; <b>e</b>=0A=20<img alt=3D'f g'>")
}
