module example.com/boxwright

go 1.26

require (
	github.com/crillab/gophersat v1.4.0 // indirect
	github.com/google/go-cmp v0.7.0 // indirect
	github.com/stretchr/testify v1.12.1 // indirect
	go.yaml.in/yaml/v3 v3.0.5 // indirect
	pgregory.net/rapid v1.3.0 // indirect
)
