// Command script handles scripts.
package main

import (
	"context"
	"fmt"
	"os"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

func main() {
	e, err := nbe.New()
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
		os.Exit(2)
	}
	failed := 0
	s := &script.Session{Engine: e, Report: func(r script.Result) {
		if r.Err != nil {
			failed++
			fmt.Println(r.Err)
		} else if r.Text != "" {
			fmt.Printf("%s: %s: %s\n", r.Form.Place, r.Form.Kind, r.Text)
		}
	}}
	for _, f := range os.Args[1:] {
		if err := s.File(context.Background(), f); err != nil {
			fmt.Println(err)
			os.Exit(2)
		}
	}
	if failed > 0 {
		os.Exit(1)
	}
}
