package main

import (
	"bufio"
	"fmt"
	"io"
	"strconv"
	"strings"
	"time"
)

// The files of the quay. A drum's log has one entry a line,
//
//	06:40 forward 3
//	07:15 back 1
//
// in the order of the clock; a sheet of bays has a line of crates by bay and a
// line that says which bay each becomes, counted from 1:
//
//	crates 12 0 7
//	becomes 2 3 1
//
// In both, a hash begins a remark and empty lines say nothing.

// Turn is one entry of a log: a time of the day, and turns, negative for back.
type Turn struct {
	At time.Duration
	By int
}

// maxTurns is how many turns one entry may have, and a whole log.
const maxTurns = 10_000_000

// lines calls each with the words of every line that says something; an error
// of it is reported with the line's number.
func lines(r io.Reader, each func(words []string) error) error {
	s := bufio.NewScanner(r)
	s.Buffer(make([]byte, 0, 64<<10), 1<<20)
	n := 0
	for s.Scan() {
		n++
		text, _, _ := strings.Cut(s.Text(), "#")
		words := strings.Fields(text)
		if len(words) == 0 {
			continue
		}
		if err := each(words); err != nil {
			return fmt.Errorf("%d: %w", n, err)
		}
	}
	if err := s.Err(); err != nil {
		return fmt.Errorf("%d: %w", n+1, err)
	}
	return nil
}

func readLog(r io.Reader) ([]Turn, error) {
	var log []Turn
	total := 0
	err := lines(r, func(words []string) error {
		if len(words) != 3 {
			return fmt.Errorf("expected a time, a direction and a number, found %d words", len(words))
		}
		at, err := time.Parse("15:04", words[0])
		if err != nil {
			return fmt.Errorf("expected a time like 06:40, found %q", words[0])
		}
		clock := time.Duration(at.Hour())*time.Hour + time.Duration(at.Minute())*time.Minute
		if len(log) > 0 && clock < log[len(log)-1].At {
			return fmt.Errorf("expected a time not before the last entry's, found %s", words[0])
		}
		n, err := strconv.Atoi(words[2])
		if err != nil || n < 0 {
			return fmt.Errorf("expected a number of turns, found %q", words[2])
		}
		if total += n; n > maxTurns || total > maxTurns {
			return fmt.Errorf("expected at most %d turns in all", maxTurns)
		}
		switch words[1] {
		case "forward":
		case "back":
			n = -n
		default:
			return fmt.Errorf("expected forward or back, found %q", words[1])
		}
		log = append(log, Turn{clock, n})
		return nil
	})
	return log, err
}

// Bays is a sheet: the crates in each bay, and the bay each becomes, from 0.
type Bays struct {
	Crates  []int
	Becomes []int
}

// maxBays is how many bays a quay has at the most.
const maxBays = 64

func readBays(r io.Reader) (*Bays, error) {
	b := &Bays{}
	err := lines(r, func(words []string) error {
		into := &b.Crates
		least, most := 0, 1_000_000_000
		switch words[0] {
		case "crates":
		case "becomes":
			into, least, most = &b.Becomes, 1, len(words)-1
		default:
			return fmt.Errorf("expected crates or becomes, found %q", words[0])
		}
		if *into != nil {
			return fmt.Errorf("%s stands twice", words[0])
		}
		if n := len(words) - 1; n < 1 || n > maxBays {
			return fmt.Errorf("expected 1 to %d bays, found %d", maxBays, n)
		}
		seen := map[int]bool{}
		for _, word := range words[1:] {
			n, err := strconv.Atoi(word)
			if err != nil || n < least || n > most {
				return fmt.Errorf("expected a number from %d to %d, found %q", least, most, word)
			}
			if words[0] == "becomes" {
				if seen[n] {
					return fmt.Errorf("two bays become bay %d", n)
				}
				seen[n] = true
				n--
			}
			*into = append(*into, n)
		}
		return nil
	})
	if err == nil && len(b.Crates) != len(b.Becomes) {
		err = fmt.Errorf(" the sheet counts the crates of %d bays and relabels %d", len(b.Crates), len(b.Becomes))
	}
	return b, err
}

// relabelled is the inventory by arithmetic: what stood in bay k stands in Becomes[k].
func (b *Bays) relabelled() []int {
	out := make([]int, len(b.Crates))
	for k, n := range b.Crates {
		out[b.Becomes[k]] = n
	}
	return out
}
