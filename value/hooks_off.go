//go:build boxwright_nohooks

package value

const hooks = false
