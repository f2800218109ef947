package kit

import (
	"math/rand/v2"
)

// Choices: what every generator of this package draws from. A generator is a
// function of a sequence of small numbers, each below a bound that the
// generator names; 0 is always the simplest choice. So one generator serves a
// seed, a fuzzer's bytes and pgregory.net/rapid, and a failure is made smaller
// by making the sequence smaller, whatever the generator makes of it.

// Source gives numbers from 0 up to bound, which is at least 1.
type Source interface{ Next(bound int) int }

// FromSeed is the source of a seed; the same seed gives the same numbers.
func FromSeed(seed uint64) Source { return &seeded{rand.New(rand.NewPCG(seed, 0))} }

type seeded struct{ r *rand.Rand }

func (s *seeded) Next(bound int) int { return s.r.IntN(bound) }

// FromBytes is the source of a fuzzer's input: one byte for each number, and 0
// when they are used up.
func FromBytes(data []byte) Source { return &bytesSource{data} }

type bytesSource struct{ data []byte }

func (s *bytesSource) Next(bound int) int {
	if len(s.data) == 0 {
		return 0
	}
	b := s.data[0]
	s.data = s.data[1:]
	return int(b) % bound
}

// replay gives recorded numbers, cut to the bounds asked for, and then zeros.
type replay struct{ choices []int }

func (s *replay) Next(bound int) int {
	if len(s.choices) == 0 {
		return 0
	}
	c := s.choices[0]
	s.choices = s.choices[1:]
	return min(c, bound-1)
}

// recorder notes what is drawn from a source.
type recorder struct {
	source  Source
	choices []int
}

func (r *recorder) Next(bound int) int {
	c := 0
	if bound > 1 {
		c = max(0, min(r.source.Next(bound), bound-1))
	}
	r.choices = append(r.choices, c)
	return c
}

// shrink makes a failing sequence smaller as long as fails says that it still
// fails, at the cost of at most budget calls. fails returns what was really
// drawn, which may be less than it was given.
func shrink(choices []int, budget int, fails func([]int) ([]int, bool)) []int {
	try := func(c []int) bool {
		if budget <= 0 {
			return false
		}
		budget--
		used, ok := fails(c)
		if ok {
			for len(used) > 0 && used[len(used)-1] == 0 {
				used = used[:len(used)-1] // zeros come by themselves
			}
			choices = used
		}
		return ok
	}
	for before := -1; before != budget && budget > 0; {
		before = budget
		progress := false
		for size := max(len(choices)/2, 1); size >= 1; size /= 2 {
			for at := 0; at+size <= len(choices) && budget > 0; {
				cut := append(append([]int(nil), choices[:at]...), choices[at+size:]...)
				if try(cut) {
					progress = true
					continue
				}
				zero := append([]int(nil), choices...)
				changed := false
				for k := at; k < at+size; k++ {
					changed = changed || zero[k] != 0
					zero[k] = 0
				}
				if changed && try(zero) {
					progress = true
				}
				at += size
			}
		}
		for at := 0; at < len(choices) && budget > 0; at++ {
			for c := 1; at < len(choices) && c < choices[at]; c++ {
				less := append([]int(nil), choices...)
				less[at] = c
				if try(less) {
					progress = true
					break
				}
			}
		}
		if !progress {
			return choices
		}
	}
	return choices
}
