// Package promises tests what a host that embeds the engine may rely on: it
// stays up, whatever it hands to the engine. It holds tests only, over one
// corpus (corpus_test.go): terms that nest deep, programs that never end, and
// terms that grow.
//
// BOXWRIGHT_LONG=1 makes the tests long: a million levels, half a minute of
// concurrency, many more random terms. BOXWRIGHT_HAMMER=5m says how long many
// goroutines work on one engine.
package promises
