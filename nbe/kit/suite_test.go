package kit_test

import (
	"testing"

	"example.com/boxwright/nbe/kit"
)

// The laws hold of every built-in former.
func TestLawsOfBuiltinFormers(t *testing.T) {
	for _, f := range kit.Builtin() {
		t.Run(f.Name, func(t *testing.T) { kit.CheckLaws(t, f, kit.Trials(24)) })
	}
}
