package main

import (
	"fmt"
	"os"
)

// A progress is told how far a long run is: the task, how many are done, of
// how many.
type progress func(task string, done, total int)

// longRun is from how many syringes on a run shows its progress.
const longRun = 100

// silent shows nothing.
func silent(string, int, int) {}

// progressOn shows long runs on standard error when that is a terminal, and
// nothing in a pipe or a file.
func progressOn(e env) progress {
	f, ok := e.stderr.(*os.File)
	if !ok {
		return silent
	}
	info, err := f.Stat()
	if err != nil || info.Mode()&os.ModeCharDevice == 0 {
		return silent
	}
	return func(task string, done, total int) {
		if total < longRun || (done%25 != 0 && done != total) {
			return
		}
		fmt.Fprintf(f, "\r%s: %d of %d ", task, done, total)
		if done == total {
			fmt.Fprint(f, "\r\x1b[K")
		}
	}
}
