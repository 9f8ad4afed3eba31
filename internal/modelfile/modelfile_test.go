package modelfile_test

import (
	"bytes"
	"errors"
	"os"
	"path/filepath"
	"testing"

	"example.org/foulcase/internal/modelfile"
)

// tiny returns a small file of three sections, one of them empty.
func tiny(t testing.TB) []byte {
	t.Helper()
	w := modelfile.NewWriter()
	for _, s := range []struct{ name, body string }{
		{"card", "Skarrow Sound"}, {"lm", "\x00\x01\x02"}, {"twelve-bytes", ""},
	} {
		if err := w.Set(s.name, []byte(s.body)); err != nil {
			t.Fatal(err)
		}
	}
	var out bytes.Buffer
	n, err := w.WriteTo(&out)
	if err != nil || n != int64(out.Len()) {
		t.Fatalf("WriteTo = %d, %v; wrote %d", n, err, out.Len())
	}
	return out.Bytes()
}

func TestRoundTrip(t *testing.T) {
	f, err := modelfile.Open(tiny(t))
	if err != nil {
		t.Fatal(err)
	}
	for name, want := range map[string]string{"card": "Skarrow Sound", "lm": "\x00\x01\x02", "twelve-bytes": ""} {
		if got, ok := f.Section(name); !ok || string(got) != want {
			t.Errorf("Section(%q) = %q, %v; want %q", name, got, ok, want)
		}
	}
	if _, ok := f.Section("absent"); ok {
		t.Error("Section of an absent name says it is there")
	}
	if got := f.Names(); len(got) != 3 || got[0] != "card" {
		t.Errorf("Names() = %q", got)
	}
	if a, b := tiny(t), tiny(t); !bytes.Equal(a, b) {
		t.Error("the same sections give different bytes")
	}
}

func TestEveryFlippedBitIsAnError(t *testing.T) {
	data := tiny(t)
	for i := range data {
		for bit := range 8 {
			data[i] ^= 1 << bit
			if _, err := modelfile.Open(data); !isOpenError(err) {
				t.Fatalf("byte %d bit %d flipped: err = %v", i, bit, err)
			}
			data[i] ^= 1 << bit
		}
	}
}

func TestEveryCutIsAnError(t *testing.T) {
	data := tiny(t)
	for n := range data {
		if _, err := modelfile.Open(data[:n]); !isOpenError(err) {
			t.Fatalf("cut to %d bytes: err = %v", n, err)
		}
	}
	if _, err := modelfile.Open(append(data, 0)); !errors.Is(err, modelfile.ErrDamaged) {
		t.Errorf("a byte too many: err = %v", err)
	}
}

func isOpenError(err error) bool {
	return errors.Is(err, modelfile.ErrForeign) || errors.Is(err, modelfile.ErrDamaged) || errors.Is(err, modelfile.ErrNewer)
}

func TestNewerLayoutSaysSo(t *testing.T) {
	data := tiny(t)
	data[8] = modelfile.Version + 1
	if _, err := modelfile.Open(data); !errors.Is(err, modelfile.ErrNewer) {
		t.Errorf("err = %v, want ErrNewer", err)
	}
}

func TestOpenPath(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "m.fcm")
	w := modelfile.NewWriter()
	if err := w.Set("card", []byte("berth")); err != nil {
		t.Fatal(err)
	}
	if err := w.WriteFile(path); err != nil {
		t.Fatal(err)
	}
	f, err := modelfile.OpenPath(path)
	if err != nil {
		t.Fatal(err)
	}
	if got, _ := f.Section("card"); string(got) != "berth" {
		t.Errorf("card = %q", got)
	}
	if err := f.Close(); err != nil {
		t.Error(err)
	}
	if err := f.Close(); err != nil {
		t.Error("second Close:", err)
	}
	left, err := os.ReadDir(dir)
	if err != nil || len(left) != 1 {
		t.Errorf("temporary files remain: %v %v", left, err)
	}
}

func TestOpenPathErrorsNameTheFile(t *testing.T) {
	dir := t.TempDir()
	for name, body := range map[string]string{"empty": "", "foreign": "PK\x03\x04 an archive"} {
		path := filepath.Join(dir, name)
		if err := os.WriteFile(path, []byte(body), 0o600); err != nil {
			t.Fatal(err)
		}
		_, err := modelfile.OpenPath(path)
		if !errors.Is(err, modelfile.ErrForeign) || !bytes.Contains([]byte(err.Error()), []byte(path)) {
			t.Errorf("%s: err = %v", name, err)
		}
	}
	if _, err := modelfile.OpenPath(filepath.Join(dir, "absent")); !errors.Is(err, os.ErrNotExist) {
		t.Errorf("absent: err = %v", err)
	}
}

func TestWriterRefusesBadNames(t *testing.T) {
	w := modelfile.NewWriter()
	for _, name := range []string{"", "thirteen-byte"} {
		if err := w.Set(name, nil); err == nil {
			t.Errorf("Set(%q) is accepted", name)
		}
	}
}

func FuzzOpen(f *testing.F) {
	f.Add(tiny(f))
	f.Add([]byte("FOULCASE"))
	f.Fuzz(func(t *testing.T, data []byte) {
		file, err := modelfile.Open(data)
		if err != nil {
			return
		}
		for _, name := range file.Names() {
			file.Section(name)
		}
	})
}
