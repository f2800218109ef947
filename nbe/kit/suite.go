package kit

import (
	"flag"
	"fmt"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
)

// The law suite: trials, one after the other, each with every law, and the
// smallest failing input of the first law that is broken.

// Flags of go test, for longer runs than a package's tests ask for.
var (
	moreTrials = flag.Int("law-trials", 0, "how many inputs the law suite tries, instead of what the test says")
	otherSeed  = flag.Uint64("law-seed", 0, "the seed of the law suite's first input, beyond what the test says")
)

// Option is an option of the suite.
type Option func(*config)

type config struct {
	trials int
	seed   uint64
	shrink int
	only   map[string]bool
	skip   map[string]bool
}

// Trials sets how many inputs are tried; 60 if not given.
func Trials(n int) Option { return func(c *config) { c.trials = n } }

// Seed sets the seed of the first trial; every further one has the next.
func Seed(n uint64) Option { return func(c *config) { c.seed = n } }

// Only tries the named laws alone, and that the input is well typed.
func Only(laws ...string) Option {
	return func(c *config) {
		c.only = map[string]bool{LawInput: true}
		for _, l := range laws {
			c.only[l] = true
		}
	}
}

// Without leaves the named laws out.
func Without(laws ...string) Option {
	return func(c *config) {
		for _, l := range laws {
			c.skip[l] = true
		}
	}
}

// CheckLaws tries the laws on a former and fails the test with the report of
// the smallest input that breaks one.
func CheckLaws(t testing.TB, f Former, options ...Option) bool {
	t.Helper()
	if *moreTrials > 0 {
		options = append(options[:len(options):len(options)], Trials(*moreTrials))
	}
	if *otherSeed > 0 {
		options = append(options[:len(options):len(options)], Seed(*otherSeed))
	}
	failure, tried, err := find(f, options)
	t.Log(tried)
	if err != nil {
		t.Errorf("kit: the laws of %s cannot be tried: %v", f.Name, err)
		return false
	}
	if failure != nil {
		t.Errorf("%s", failure.Report())
		return false
	}
	return true
}

// FindFailure tries the laws on a former and returns the first failure, made
// smaller, or nil. The error is that of setting up an engine. It is
// deterministic: the same former and options give the same failure.
func FindFailure(f Former, options ...Option) (*Failure, error) {
	failure, _, err := find(f, options)
	return failure, err
}

// find also tells how often each law was tried, and how often a budget ran out.
func find(f Former, options []Option) (*Failure, string, error) {
	c := config{trials: 60, shrink: 500, skip: map[string]bool{}}
	for _, o := range options {
		o(&c)
	}
	es := newEngines(f)
	if _, err := es.of(fast); err != nil {
		return nil, "", err
	}
	for k := range c.trials {
		seed := c.seed + uint64(k)
		r := &recorder{source: FromSeed(seed)}
		failure, via := c.try(es, r, nil)
		if failure == nil {
			continue
		}
		drawn := r.choices
		small := shrink(append([]int(nil), drawn...), c.shrink, func(choices []int) ([]int, bool) {
			r := &recorder{source: &replay{choices}}
			again, _ := c.try(es, r, via)
			return r.choices, again != nil && again.Law == failure.Law && again.Internal() == failure.Internal()
		})
		again, _ := c.try(es, &replay{small}, via)
		if again == nil || again.Law != failure.Law {
			again = failure
		}
		again.Options = f.Options
		again.Former, again.Seed, again.Drawn, again.Kept = f.Name, seed, len(drawn), len(small)
		return again, es.account(), nil
	}
	return nil, es.account(), nil
}

func newEngines(f Former) *engines {
	return &engines{former: f, made: map[string]*nbe.Engine{}, tried: map[string]int{}, spent: map[string]int{}}
}

// account tells how often each law was tried, and how often a budget ran out.
func (es *engines) account() string {
	var parts []string
	for _, l := range Laws() {
		text := fmt.Sprintf("%s %d", l.Name, es.tried[l.Name])
		if n := es.spent[l.Name]; n > 0 {
			text += fmt.Sprintf(" (%d out of budget)", n)
		}
		parts = append(parts, text)
	}
	return fmt.Sprintf("laws tried: %s; %d values put for variables, %d did not fit", strings.Join(parts, ", "), es.put, es.unfit)
}

// try draws an instance and tries the laws on it, or one of them.
func (c *config) try(es *engines, source Source, via *Law) (failure *Failure, by *Law) {
	defer func() {
		if thrown := recover(); thrown != nil {
			failure, by = &Failure{Law: LawInput, Err: fmt.Errorf("the generator panics: %v", thrown)}, nil
		}
	}()
	op := Operation(source.Next(3))
	b := fast
	if source.Next(3) == 2 {
		b = builds[len(builds)-1]
	}
	x := draw(es.former, op, source)
	t, failed := newTrial(es, x, b)
	if failed != nil {
		return failed, nil
	}
	laws := Laws()
	if via != nil {
		laws = []Law{*via}
	}
	for k := range laws {
		l := laws[k]
		if c.skip[l.Name] || c.only != nil && !c.only[l.Name] {
			continue
		}
		es.tried[l.Name]++
		if f := l.check(t); f != nil {
			f.build = b
			return f, &l
		}
	}
	return nil, nil
}
