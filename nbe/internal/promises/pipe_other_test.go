//go:build !linux

package promises

import "errors"

func mkfifo(string) error { return errors.ErrUnsupported }
