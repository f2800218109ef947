// Package watch looks at a context now and then, for loops that have no run to
// be charged to: reading, writing and printing.
package watch

import (
	"context"
	"runtime"
	"time"
)

// every is how many units of work pass between two looks, each well below a microsecond.
const every = 2048

// Watch watches a context. The nil Watch watches none. It belongs to one goroutine.
type Watch struct {
	ctx      context.Context
	deadline time.Time
	count    int
	cause    error
}

// Of watches ctx; a context that never ends needs no watch.
func Of(ctx context.Context) *Watch {
	if ctx == nil || ctx.Done() == nil {
		return nil
	}
	w := &Watch{ctx: ctx, count: every}
	w.deadline, _ = ctx.Deadline()
	return w
}

// Ended counts n units of work and reports whether the context has ended, as
// seen at the last look; the first look is at once.
func (w *Watch) Ended(n int) bool {
	if w == nil {
		return false
	}
	if w.count += n; w.count >= every && w.cause == nil {
		w.count = 0
		w.cause = Cause(w.ctx, w.deadline)
	}
	return w.cause != nil
}

// Cause is why the context has ended, nil while it has not been seen to.
func (w *Watch) Cause() error {
	if w == nil {
		return nil
	}
	return w.cause
}

// Cause is why ctx has ended, nil if it has not. A deadline that has passed
// ends it also where the context's timer still waits for a processor, which may
// be the very one that the caller keeps busy.
func Cause(ctx context.Context, deadline time.Time) error {
	err := ctx.Err()
	if err == nil && !deadline.IsZero() && !time.Now().Before(deadline) {
		for range 100 {
			if err = ctx.Err(); err != nil {
				break
			}
			runtime.Gosched()
		}
		if err == nil {
			err = context.DeadlineExceeded
		}
	}
	if err == nil {
		return nil
	}
	if cause := context.Cause(ctx); cause != nil {
		return cause
	}
	return err
}
