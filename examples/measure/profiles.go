package main

import (
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"

	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/profile"
)

// Profiles of the rows' own work, by definition and operation, for go tool pprof:
// where a row spends its steps. Each is of one operation at the row's middle size,
// elaborating its term included.

// watched are options of every call that hosts made from now on make.
var watched []nbe.CallOption

// writeProfiles writes a profile of each row into a directory.
func writeProfiles(dir string, rows []gauge.Row, stderr io.Writer) error {
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return err
	}
	defer func() { watched = nil }()
	for _, r := range rows {
		size := r.Sizes[len(r.Sizes)/2]
		p := new(profile.Profile)
		watched = []nbe.CallOption{nbe.Profile(p)}
		c, err := r.Prepare(size)
		if err == nil && c.Fresh != nil {
			var operation func() error
			if operation, err = c.Fresh(); err == nil {
				err = operation()
			}
		}
		if err != nil {
			fmt.Fprintf(stderr, "%s: %v\n", r.Name, err)
		}
		if p.Calls() == 0 {
			continue // the row is no work of the engine's
		}
		file, err := os.Create(filepath.Join(dir, fileName(r.Name)+".pb.gz"))
		if err != nil {
			return err
		}
		if err := closed(file, p.Write(file)); err != nil {
			return err
		}
		fmt.Fprintf(stderr, "%s (%d): %d steps in %s\n", r.Name, size, p.Total().Steps, file.Name())
	}
	return nil
}

// fileName is a row's name as a file's.
func fileName(row string) string {
	return strings.Trim(strings.Map(func(c rune) rune {
		if c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c >= '0' && c <= '9' {
			return c
		}
		return '-'
	}, row), "-")
}
