//go:build !boxwright_nohooks

package value

// hooks is false in builds with the tag boxwright_nohooks, which have no hooks
// at all: what a run without a trace is measured against.
const hooks = true
