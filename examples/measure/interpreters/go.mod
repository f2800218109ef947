module example.com/boxwright/examples/measure/interpreters

go 1.26.0

require (
	example.com/boxwright v0.0.0
	github.com/dop251/goja v0.0.0-20260917113740-793a2a65c13b
	go.starlark.net v0.0.0-20260908191801-89a6a09411d5
)

require (
	github.com/dlclark/regexp2/v2 v2.5.2 // indirect
	github.com/go-sourcemap/sourcemap v2.1.3+incompatible // indirect
	github.com/google/pprof v0.0.0-20261105003125-4bf881d7fb0b // indirect
	golang.org/x/sys v0.42.0 // indirect
	golang.org/x/text v0.3.8 // indirect
)

replace example.com/boxwright => ../../..
