module example.com/boxwright

go 1.26.0

require (
	github.com/chzyer/readline v1.5.1 // indirect
	github.com/crillab/gophersat v1.4.0 // indirect
	github.com/google/go-cmp v0.7.0 // indirect
	github.com/google/pprof v0.0.0-20261105003125-4bf881d7fb0b // indirect
	github.com/ianlancetaylor/demangle v0.0.0-20250417193237-f615e6bd150b // indirect
	github.com/stretchr/testify v1.12.1 // indirect
	go.uber.org/goleak v1.3.0 // indirect
	go.yaml.in/yaml/v3 v3.0.5 // indirect
	golang.org/x/sys v0.32.0 // indirect
	pgregory.net/rapid v1.3.0 // indirect
)
