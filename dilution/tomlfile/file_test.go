package tomlfile

import (
	"bytes"
	"encoding/binary"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf16"

	"drawup/dilution/refusal"
)

// only demands one refusal of this code that names the file.
func only(t *testing.T, list refusal.List, code refusal.Code, file string) {
	t.Helper()
	if len(list) != 1 || list[0].Code != code || list[0].Severity != refusal.Refuse || list[0].Pos.File != file {
		t.Fatalf("got %v, want one %s for %s", list, code, file)
	}
	if r := list[0]; r.Message == "" || r.Got == "" || r.Want == "" || r.Remedy == "" {
		t.Errorf("a reason lacks a part: %+v", r)
	}
}

func TestReadFile(t *testing.T) {
	dir := t.TempDir()
	write := func(name string, data []byte) string {
		path := filepath.Join(dir, name)
		if err := os.WriteFile(path, data, 0o600); err != nil {
			t.Fatal(err)
		}
		return path
	}
	for _, c := range []struct {
		path string
		code refusal.Code
	}{
		{filepath.Join(dir, "missing.toml"), refusal.FileUnreadable},
		{dir, refusal.FileUnreadable},
		{write("empty.toml", nil), refusal.FileEmpty},
		{write("blank.toml", []byte(" \r\n\t\n")), refusal.FileEmpty},
		{write("mark.toml", []byte("\xef\xbb\xbf")), refusal.FileEmpty},
		{write("latin.toml", []byte("place = \"Br\xfccke\"\n")), refusal.FileNotText},
		{write("utf16.toml", []byte("\xff\xfea\x00=\x001\x00")), refusal.FileNotText},
		{write("large.toml", bytes.Repeat([]byte("#"), MaxBytes+1)), refusal.FileTooLarge},
	} {
		data, list := ReadFile(c.path)
		only(t, list, c.code, c.path)
		if data != nil {
			t.Errorf("%s: got data with a refusal", c.path)
		}
	}
	for name, text := range map[string]string{"plain": "a = 1\n", "largest": strings.Repeat("#", MaxBytes)} {
		data, list := ReadFile(write(name, []byte(text)))
		if len(list) > 0 || string(data) != text {
			t.Errorf("%s: got %d bytes and %v", name, len(data), list)
		}
	}
	data, list := ReadFile(write("marked.toml", []byte("\xef\xbb\xbfa = 1\n")))
	if len(list) > 0 || string(data) != "a = 1\n" {
		t.Errorf("got %q and %v, want the text without the byte order mark", data, list)
	}
}

// Text in UTF-16, either byte order, with a mark or without (RFC 2781, part 3
// and 4.3), is called by its name; other bytes that are not text are not. The
// encoder is that of the standard library.
func TestUTF16IsNamed(t *testing.T) {
	encode := func(order binary.AppendByteOrder, s string) []byte {
		var out []byte
		for _, u := range utf16.Encode([]rune(s)) {
			out = order.AppendUint16(out, u)
		}
		return out
	}
	text := "[session]\nplace = \"Br\u00fccke 2, \u65b0\U0001f489\"\ndate = \"2026-12-01\"\n"
	for name, c := range map[string]struct {
		data []byte
		want bool
	}{
		"little end first":           {encode(binary.LittleEndian, text), true},
		"big end first":              {encode(binary.BigEndian, text), true},
		"little end first, marked":   {encode(binary.LittleEndian, "\ufeff"+text), true},
		"big end first, marked":      {encode(binary.BigEndian, "\ufeff"+text), true},
		"cut in the middle":          {encode(binary.LittleEndian, text)[1:], true},
		"one line":                   {encode(binary.LittleEndian, "a = 1"), true},
		"four bytes, marked":         {append([]byte{0xFF, 0xFE, 0, 0}, "a\x00\x00\x00"...), false},
		"latin 1":                    {[]byte("place = \"Br\xfccke\"\n"), false},
		"zeros in a text of 8 bits":  {[]byte("place = \"a\x00b\x00c\"\n"), false},
		"a text of 8 bits":           {[]byte(text), false},
		"one letter and a zero byte": {[]byte("a\x00"), false},
	} {
		_, list := checkText("f", c.data)
		named := len(list) == 1 && list[0].Code == refusal.FileNotText && list[0].Got == "UTF-16" && strings.Contains(list[0].Message, "UTF-16")
		if named != c.want {
			t.Errorf("%s: got %v, want UTF-16 named %v", name, list, c.want)
		}
	}
}

// A file of 100 MB is refused by its size, without its content: here it is a
// hole of that size, which no disk has to hold.
func TestHugeFileIsNotRead(t *testing.T) {
	path := filepath.Join(t.TempDir(), "huge.toml")
	f, err := os.Create(path)
	if err != nil {
		t.Fatal(err)
	}
	if err := f.Truncate(100 << 20); err != nil {
		t.Fatal(err)
	}
	if err := f.Close(); err != nil {
		t.Fatal(err)
	}
	var list refusal.List
	allocated := testing.AllocsPerRun(1, func() { _, list = ReadFile(path) })
	only(t, list, refusal.FileTooLarge, path)
	if allocated > 100 {
		t.Errorf("got %v allocations, want few: the content must not be read", allocated)
	}
}

// Decode refuses the same bytes as ReadFile, for callers that have them already.
func TestDecodeChecksTheText(t *testing.T) {
	for data, code := range map[string]refusal.Code{
		"": refusal.FileEmpty, "a = \"\xfc\"": refusal.FileNotText, strings.Repeat(" ", MaxBytes+1): refusal.FileTooLarge,
	} {
		var into struct{}
		places, list := Decode("f", []byte(data), &into)
		only(t, list, code, "f")
		if places == nil || places.Whole() || places.Has("a") || places.Of("a").File != "f" {
			t.Errorf("%s: got places %+v, want empty ones that name the file", code, places)
		}
	}
	_, list := checkText("f", []byte("ä = 1\nü\xff"))
	if len(list) != 1 || list[0].Pos != (refusal.Pos{File: "f", Line: 2, Column: 2}) {
		t.Errorf("got %v, want the place of the wrong byte, line 2, second character", list)
	}
}
