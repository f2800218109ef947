module example.com/boxwright

go 1.26.0

require (
	github.com/crillab/gophersat v1.4.0
	github.com/google/go-cmp v0.7.0
	github.com/google/pprof v0.0.0-20261105003125-4bf881d7fb0b
	github.com/stretchr/testify v1.12.1
	go.uber.org/goleak v1.3.0
	pgregory.net/rapid v1.3.0
)

require go.yaml.in/yaml/v3 v3.0.5 // indirect
