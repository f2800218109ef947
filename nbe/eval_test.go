package nbe_test

import (
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
)

// Nothing is made for arguments that a case does not mention, which takes
// knowing which those are, also where a mention stands under further binders.
func TestArgumentsMentionedUnderBindersAreUsed(t *testing.T) {
	e, err := nbe.New()
	require.NoError(t, err)
	s := e.Scope()
	for text, want := range map[string]string{
		"((elim (x (-> Nat Nat)) 3 (zero (lam (y) y)) ((suc k h) (lam (y) (h (h y))))) 9)":                                   "9",
		"((elim (x (-> Nat Nat)) 3 (zero (lam (y) 0)) ((suc k h) (lam (y) k))) 9)":                                           "2",
		"(at (elim (x (Path Nat 0 0)) 3 (zero (line (i) 0)) ((suc k h) (line (i) (hcomp Nat (at h i) ((= i 0) (j) 0))))) 0)": "0",
		"(fst (elim (x (* Nat Nat)) 5 (zero (pair 0 1)) ((suc k h) (pair (snd h) (suc (snd h))))))":                          "5",
	} {
		require.Equal(t, want, readBack(t, valueOf(t, s, e, text)), text)
	}
}
