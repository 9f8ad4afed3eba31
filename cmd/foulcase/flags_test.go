package main

import "testing"

func TestParseSize(t *testing.T) {
	for _, test := range []struct {
		in   string
		want int64 // 0: an error
	}{
		{"26MiB", 26 << 20},
		{"1G", 1 << 30},
		{"1.5K", 1536},
		{"500KB", 500000},
		{"2MB", 2000000},
		{"1 GiB", 1 << 30},
		{"12B", 12},
		{"4096", 4096},
		{"", 0},
		{"MiB", 0},
		{"0", 0},
		{"-1M", 0},
		{"NaNG", 0},
		{"1e300G", 0},
		{"26 MiBs", 0},
		{"0.1B", 0},
	} {
		got, err := parseSize(test.in)
		if got != test.want || (err == nil) != (test.want > 0) {
			t.Errorf("parseSize(%q) = %d, %v; want %d", test.in, got, err, test.want)
		}
	}
}

func TestFormatSize(t *testing.T) {
	for n, want := range map[int64]string{
		0: "0 B", 1023: "1023 B", 1536: "1.5 KiB", 26 << 20: "26.0 MiB", 3 << 30: "3.0 GiB",
	} {
		if got := formatSize(n); got != want {
			t.Errorf("formatSize(%d) = %q, want %q", n, got, want)
		}
	}
}

func TestOrList(t *testing.T) {
	for _, test := range []struct {
		words []string
		want  string
	}{
		{nil, ""},
		{[]string{"a"}, "a"},
		{[]string{"a", "b"}, "a or b"},
		{[]string{"a", "b", "c"}, "a, b or c"},
	} {
		if got := orList(test.words); got != test.want {
			t.Errorf("orList(%q) = %q, want %q", test.words, got, test.want)
		}
	}
}

func TestFlagValues(t *testing.T) {
	var n count
	var r rate
	var lists wordLists
	c := &choice{value: "a", among: []string{"a", "b"}}
	for _, test := range []struct {
		flag interface{ Set(string) error }
		in   string
		ok   bool
	}{
		{&n, "3", true},
		{&n, "0", false},
		{&n, "-2", false},
		{&n, "two", false},
		{&r, "0.5", true},
		{&r, "0", false},
		{&r, "NaN", false},
		{&r, "Inf", false},
		{&r, "-1", false},
		{c, "b", true},
		{c, "", false},
		{c, "B", false},
		{&lists, "en-GB=words.txt", true},
		{&lists, "any=a=b.txt", true},
		{&lists, "en-GB", false},
		{&lists, "en-GB=", false},
		{&lists, "de=words.txt", false},
	} {
		if err := test.flag.Set(test.in); (err == nil) != test.ok {
			t.Errorf("%T.Set(%q) = %v", test.flag, test.in, err)
		}
	}
	if n != 3 || r != 0.5 || c.value != "b" {
		t.Errorf("the flags hold %v, %v and %q", n, r, c.value)
	}
	if len(lists) != 2 || lists[1].path != "a=b.txt" {
		t.Errorf("the word lists are %v", lists)
	}
}
