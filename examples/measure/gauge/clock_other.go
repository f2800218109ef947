//go:build !unix

package gauge

import "time"

var begin = time.Now()

// processor is the wall clock where the processor time cannot be asked for.
func processor() time.Duration { return time.Since(begin) }
