package gauge

import (
	"runtime"
	"runtime/debug"
	"runtime/metrics"
	"time"
)

// What a row keeps alive. The live heap is what a collection has marked, so a
// run of its own collects often and asks after it all the time.

const liveMetric = "/gc/heap/live:bytes"

// live is the heap that the last collection found alive.
func live() int64 {
	s := []metrics.Sample{{Name: liveMetric}}
	metrics.Read(s)
	return int64(s[0].Value.Uint64())
}

// settled is the live heap when nothing runs.
func settled() int64 {
	runtime.GC()
	runtime.GC()
	return live()
}

// peak is the most that was alive during one operation, above what was before.
func peak(fresh func() (func() error, error)) (int64, error) {
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(2))
	defer debug.SetGCPercent(debug.SetGCPercent(25))
	op, err := fresh()
	if err != nil {
		return 0, err
	}
	before := settled()
	most := before
	stop, done := make(chan struct{}), make(chan struct{})
	go func() {
		defer close(done)
		tick := time.NewTicker(time.Millisecond)
		defer tick.Stop()
		for {
			most = max(most, live())
			select {
			case <-stop:
				return
			case <-tick.C:
			}
		}
	}()
	err = op()
	runtime.GC() // what the operation still holds at its end counts
	close(stop)
	<-done
	most = max(most, live())
	runtime.KeepAlive(op)
	return most - before, err
}

// Left is by how much the live heap has grown after the operation was repeated
// n times.
func Left(fresh func() (func() error, error), n int) (int64, error) {
	again := func(n int) error {
		for range n {
			op, err := fresh()
			if err != nil {
				return err
			}
			if err := op(); err != nil {
				return err
			}
		}
		return nil
	}
	if err := again(2); err != nil {
		return 0, err
	}
	before := settled()
	err := again(n)
	return settled() - before, err
}
