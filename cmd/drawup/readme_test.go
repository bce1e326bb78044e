package main

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

const readme = "../../README.md"

// TestReadme runs every command of the README's console blocks and compares
// what it prints with what stands below it. A line "…" means that the rest is
// left out there. Documentation that does not run is a fault.
func TestReadme(t *testing.T) {
	text := string(load(t, readme))
	t.Chdir(filepath.Join("..", ".."))
	ran := 0
	for _, block := range consoleBlocks(text) {
		for _, c := range block {
			ran++
			args, ok := strings.CutPrefix(c.line, "go run ./cmd/drawup ")
			if !ok {
				t.Errorf("the README runs %q, which is not this command", c.line)
				continue
			}
			words := shellWords(args)
			for i, w := range words {
				if w == "--out" {
					words[i+1] = t.TempDir()
				}
			}
			var out bytes.Buffer
			run(words, strings.NewReader(""), &out, &out)
			if want := c.output; want != "" && !sameOutput(out.String(), want) {
				t.Errorf("%s\nprints\n%s\nthe README says\n%s", c.line, out.String(), want)
			}
		}
	}
	if ran < 3 {
		t.Errorf("found %d commands in the README", ran)
	}
	if !strings.Contains(text, "go test ./...") {
		t.Error("the README does not name the test command")
	}
}

type consoleCommand struct{ line, output string }

func consoleBlocks(text string) [][]consoleCommand {
	var blocks [][]consoleCommand
	parts := strings.Split(text, "```console\n")
	for _, p := range parts[1:] {
		body, _, _ := strings.Cut(p, "```")
		var block []consoleCommand
		for _, line := range strings.SplitAfter(body, "\n") {
			if c, ok := strings.CutPrefix(line, "$ "); ok {
				block = append(block, consoleCommand{line: strings.TrimSpace(c)})
			} else if len(block) > 0 {
				block[len(block)-1].output += line
			}
		}
		blocks = append(blocks, block)
	}
	return blocks
}

// sameOutput compares line by line up to a line "…".
func sameOutput(got, want string) bool {
	head, _, open := strings.Cut(want, "…\n")
	if open {
		return strings.HasPrefix(got, head)
	}
	return got == want
}

// shellWords splits at blanks, keeping what stands in double quotes together.
func shellWords(s string) []string {
	var words []string
	var b strings.Builder
	quoted, any := false, false
	for _, r := range s {
		switch {
		case r == '"':
			quoted, any = !quoted, true
		case r == ' ' && !quoted:
			if any {
				words = append(words, b.String())
			}
			b.Reset()
			any = false
		default:
			b.WriteRune(r)
			any = true
		}
	}
	if any {
		words = append(words, b.String())
	}
	return words
}

// Every file that the README points to is there.
func TestReadmeLinks(t *testing.T) {
	text := string(load(t, readme))
	for _, part := range strings.Split(text, "](")[1:] {
		target, _, _ := strings.Cut(part, ")")
		if strings.Contains(target, "://") {
			continue
		}
		if _, err := os.Stat(filepath.Join("..", "..", filepath.FromSlash(target))); err != nil {
			t.Errorf("the README points to %s: %v", target, err)
		}
	}
}
