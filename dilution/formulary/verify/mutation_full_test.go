//go:build secondopinion

package verify_test

import "testing"

// Every mutant of the starter, not one in some: half a minute.
func TestSecondOpinionMutants(t *testing.T) { mutate(t, 1) }
