module example.com/boxwright

go 1.26

require (
	github.com/google/go-cmp v0.7.0 // indirect
	github.com/stretchr/testify v1.12.1 // indirect
	pgregory.net/rapid v1.3.0 // indirect
)
