// Package tomlfile reads the files that people edit: it refuses what is not a
// small text in UTF-8, decodes TOML 1.0 strictly, and keeps the place of every
// key, so that a fault found much later can still point at its line.
//
// It gives as many reasons at once as it can: a line that does not read is set
// aside and the rest is read on.
package tomlfile
