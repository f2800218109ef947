package script

import (
	"context"
	"fmt"
	"io"
	"os"
	"syscall"
	"time"

	"example.com/boxwright/nbe/term"
)

// MaxFile is how many bytes of a file are read; a longer one cannot be read.
const MaxFile = 1 << 28

// readFile is os.ReadFile for names that an adversary may have chosen: it waits
// for no writer of a named pipe, stops when the context ends, and ends on a
// device that gives bytes for ever.
func readFile(ctx context.Context, name string) ([]byte, error) {
	f, err := os.OpenFile(name, os.O_RDONLY|syscall.O_NONBLOCK, 0)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	stop := context.AfterFunc(ctx, func() { _ = f.SetReadDeadline(time.Unix(1, 0)) })
	defer stop()
	src, err := io.ReadAll(io.LimitReader(&watched{ctx, f}, MaxFile+1))
	if ended := ctx.Err(); ended != nil {
		return nil, &term.Error{Kind: term.Cancelled, Message: "cancelled", Cause: context.Cause(ctx)}
	}
	if err == nil && len(src) > MaxFile {
		return nil, fmt.Errorf("it is longer than %d bytes", MaxFile)
	}
	return src, err
}

// watched looks at its context before each read.
type watched struct {
	ctx  context.Context
	from io.Reader
}

func (w *watched) Read(p []byte) (int, error) {
	if err := w.ctx.Err(); err != nil {
		return 0, err
	}
	return w.from.Read(p)
}
