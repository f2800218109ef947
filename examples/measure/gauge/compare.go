package gauge

import (
	"fmt"
	"io"
	"math"
	"sort"
)

// Comparing two runs by their ratios to the baselines. Whether a difference is
// more than noise is asked of the U test (H. B. Mann, D. R. Whitney, "On a Test of
// Whether one of Two Random Variables is Stochastically Larger than the Other",
// Annals of Mathematical Statistics 18, 1947): the exact distribution where the
// samples are small and without ties, otherwise the normal approximation with the
// correction for ties and for continuity (common practice, Lehmann,
// "Nonparametrics", 1975, as I remember it).

// Change is how a row at one size differs between two runs.
type Change struct {
	Name     string
	Size     int
	Old, New float64 // medians of the ratios
	P        float64 // the chance to see that much difference where there is none
}

// Significance is the largest P at which a difference counts.
const Significance = 0.05

// Loss is the relative loss above which a significant difference is one.
const Loss = 0.10

// Lost reports whether the change is a significant loss.
func (c Change) Lost() bool { return c.P < Significance && c.New > c.Old*(1+Loss) }

// Won reports whether the change is a significant gain of the same amount.
func (c Change) Won() bool { return c.P < Significance && c.Old > c.New*(1+Loss) }

// Compare compares the rows that both tables have, at the sizes that both have.
func Compare(old, new *Table) (changes []Change) {
	for _, n := range new.Results {
		k := old.index(n.Name)
		if k < 0 {
			continue
		}
		for _, p := range n.Points {
			for _, q := range old.Results[k].Points {
				if p.Size == q.Size && len(p.Ratios) > 0 && len(q.Ratios) > 0 {
					changes = append(changes, Change{n.Name, p.Size, q.Ratio(), p.Ratio(), UTest(q.Ratios, p.Ratios)})
				}
			}
		}
	}
	return changes
}

// WriteChanges writes the changes for people and returns how many are losses.
func WriteChanges(w io.Writer, changes []Change) (lost int) {
	for _, c := range changes {
		word := "~"
		switch {
		case c.Lost():
			word = "LOSS"
			lost++
		case c.Won():
			word = "gain"
		}
		fmt.Fprintf(w, "%-5s %+7.1f%%  p=%.3f  %s → %s  %s, %d\n", word, 100*(c.New/c.Old-1), c.P, figure(c.Old), figure(c.New), c.Name, c.Size)
	}
	return lost
}

// UTest is the two-sided P of the U test of two samples, 1 without one of them.
func UTest(a, b []float64) float64 {
	n, m := len(a), len(b)
	if n == 0 || m == 0 {
		return 1
	}
	type one struct {
		v     float64
		first bool
	}
	all := make([]one, 0, n+m)
	for _, v := range a {
		all = append(all, one{v, true})
	}
	for _, v := range b {
		all = append(all, one{v, false})
	}
	sort.Slice(all, func(i, j int) bool { return all[i].v < all[j].v })
	var ranks, ties float64
	for i := 0; i < len(all); {
		j := i
		for j < len(all) && all[j].v == all[i].v {
			j++
		}
		t := float64(j - i)
		ties += t*t*t - t
		for k := i; k < j; k++ {
			if all[k].first {
				ranks += float64(i+j+1) / 2 // the middle of the ranks i+1 to j
			}
		}
		i = j
	}
	u := ranks - float64(n*(n+1))/2
	u = min(u, float64(n*m)-u)
	if ties == 0 && n+m <= 60 {
		return min(1, 2*below(n, m, int(u)))
	}
	total := float64(n + m)
	variance := float64(n*m) / 12 * (total + 1 - ties/(total*(total-1)))
	if variance == 0 {
		return 1
	}
	z := (float64(n*m)/2 - u - 0.5) / math.Sqrt(variance)
	return min(1, math.Erfc(z/math.Sqrt2))
}

// below is the chance that U is at most u for samples of n and m without ties: of
// the ways to interleave them, the share in which at most u pairs are turned round.
func below(n, m, u int) float64 {
	// ways[j][s]: interleavings of i of the first and j of the second with s pairs turned round.
	ways := make([][]float64, m+1)
	for j := range ways {
		ways[j] = make([]float64, n*m+1)
		ways[j][0] = 1
	}
	for i := 1; i <= n; i++ {
		for j := 1; j <= m; j++ {
			// The last one is of the first sample and stands behind all j of the second, or it is of the second.
			next := make([]float64, n*m+1)
			for s := range next {
				next[s] = ways[j-1][s]
				if s >= j {
					next[s] += ways[j][s-j]
				}
			}
			ways[j] = next
		}
	}
	var sum, total float64
	for s, w := range ways[m] {
		total += w
		if s <= u {
			sum += w
		}
	}
	return sum / total
}
