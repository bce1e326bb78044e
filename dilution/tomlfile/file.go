package tomlfile

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"unicode/utf8"

	"drawup/dilution/refusal"
)

// MaxBytes is the largest file that is read, in bytes. A larger one is refused
// without reading it all: an order or a formulary is a few thousand bytes.
const MaxBytes = 1 << 20

// ReadFile reads the file at path and returns its text without a byte order
// mark. A missing file, a directory, a file above [MaxBytes], an empty one and
// one that is not UTF-8 are refused: file-unreadable, file-too-large,
// file-empty, file-not-text.
func ReadFile(path string) ([]byte, refusal.List) {
	f, err := os.Open(path)
	if err != nil {
		return nil, unreadable(path, err)
	}
	defer f.Close() // only read; a fault in closing loses nothing
	info, err := f.Stat()
	if err != nil {
		return nil, unreadable(path, err)
	}
	if info.IsDir() {
		return nil, one(path, refusal.FileUnreadable, fmt.Sprintf("%q is a folder, not a file", path),
			"a folder", "a text file", "name one file inside the folder")
	}
	if info.Size() > MaxBytes {
		return nil, tooLarge(path, info.Size())
	}
	// A pipe has no size beforehand, so that the limit is held while reading.
	data, err := io.ReadAll(io.LimitReader(f, MaxBytes+1))
	if err != nil {
		return nil, unreadable(path, err)
	}
	return checkText(path, data)
}

// checkText refuses what is too large, empty or not UTF-8, and cuts a leading
// byte order mark, which some editors write.
func checkText(name string, data []byte) ([]byte, refusal.List) {
	if len(data) > MaxBytes {
		return nil, tooLarge(name, int64(len(data)))
	}
	text := bytes.TrimPrefix(data, []byte("\ufeff"))
	if len(bytes.TrimSpace(text)) == 0 {
		return nil, one(name, refusal.FileEmpty, fmt.Sprintf("the file %q is empty", name),
			"nothing", "a text file", "check that the file was saved")
	}
	if isUTF16(text) {
		return nil, one(name, refusal.FileNotText, fmt.Sprintf("the file %q is text in UTF-16, not in UTF-8", name),
			"UTF-16", "UTF-8", "save the file as plain text with the encoding UTF-8")
	}
	if at := notUTF8(text); at >= 0 {
		list := one(name, refusal.FileNotText, fmt.Sprintf("the file %q is not plain text in UTF-8", name),
			fmt.Sprintf("byte 0x%02X", text[at]), "UTF-8", "save the file as plain text with the encoding UTF-8")
		list[0].Pos = newLines(name, text).at(at)
		return nil, list
	}
	return text, nil
}

// isUTF16 recognises the two-byte encoding that some editors write, by its byte
// order mark or, without one, by the empty half of its letters: most letters of
// an order are plain ones, so that most bytes on one side are zero and few on
// the other. TOML itself has no zero byte.
func isUTF16(text []byte) bool {
	if bytes.HasPrefix(text, []byte{0xFF, 0xFE}) || bytes.HasPrefix(text, []byte{0xFE, 0xFF}) {
		return !bytes.HasPrefix(text, []byte{0xFF, 0xFE, 0, 0}) // that is a four-byte encoding
	}
	var zeros [2]int
	for i, b := range text {
		if b == 0 {
			zeros[i%2]++
		}
	}
	most, least, half := max(zeros[0], zeros[1]), min(zeros[0], zeros[1]), len(text)/2
	return half > 0 && 2*most >= half && 10*least <= half && most > 1
}

// notUTF8 is the place of the first byte that is not UTF-8, or -1.
func notUTF8(text []byte) int {
	for at := 0; at < len(text); {
		r, n := utf8.DecodeRune(text[at:])
		if r == utf8.RuneError && n == 1 {
			return at
		}
		at += n
	}
	return -1
}

func unreadable(path string, err error) refusal.List {
	why := err.Error()
	remedy := "check the file and the right to read it"
	var p *fs.PathError
	if errors.As(err, &p) {
		why = p.Err.Error()
	}
	if errors.Is(err, fs.ErrNotExist) {
		why, remedy = "no such file", "check the name and the folder"
	}
	return one(path, refusal.FileUnreadable, fmt.Sprintf("the file %q cannot be read: %s", path, why),
		why, "a file that can be read", remedy)
}

func tooLarge(name string, size int64) refusal.List {
	return one(name, refusal.FileTooLarge, fmt.Sprintf("the file %q is too large for an order or a formulary", name),
		fmt.Sprintf("%d bytes or more", size), fmt.Sprintf("at most %d bytes", MaxBytes), "check that it is the right file, or cut it into parts")
}

// one is a list of one refusal that concerns the whole file.
func one(name string, code refusal.Code, message, got, want, remedy string) refusal.List {
	return refusal.List{{Code: code, Severity: refusal.Refuse, Message: message,
		Got: got, Want: want, Remedy: remedy, Pos: refusal.Pos{File: name}}}
}
