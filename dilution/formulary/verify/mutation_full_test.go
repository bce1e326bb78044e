//go:build secondopinion

package verify_test

import "testing"

// Every mutant of the starter, every loosened figure and every line, not one in
// some: two minutes.
func TestSecondOpinionMutants(t *testing.T)  { mutate(t, 1) }
func TestSecondOpinionLoosened(t *testing.T) { loosen(t, 1) }
func TestSecondOpinionLines(t *testing.T)    { strike(t, 1) }
