package main

import "math/big"

// The baselines: the same recursions as Go closures over an interface universe,
// which is the least a Go program pays for a language without types of its own.

type universe = any

type function = func(universe) universe

func call(f universe, args ...universe) universe {
	for _, a := range args {
		f = f.(function)(a)
	}
	return f
}

func nativeChurch() func() {
	two := function(func(f universe) universe {
		return function(func(x universe) universe { return f.(function)(f.(function)(x)) })
	})
	mul := function(func(m universe) universe {
		return function(func(n universe) universe {
			return function(func(f universe) universe { return m.(function)(n.(function)(f)) })
		})
	})
	square := func(m universe) universe { return mul(m).(function)(m) }
	n := square(square(square(square(two))))
	successor := function(func(x universe) universe { return x.(int) + 1 })
	return func() {
		if n.(function)(successor).(function)(0).(int) != 1<<16 {
			panic("Church")
		}
	}
}

// churchApplications is how many closures nativeChurch calls in one operation:
// the successor 2^16 times, the doubled functions 2^16-1 times.
const churchApplications = 1<<17 - 1

// nativeElim is the recursor of the naturals, strict and without nesting.
func nativeElim(n int, zero universe, step func(k int, h universe) universe) universe {
	for k := range n {
		zero = step(k, zero)
	}
	return zero
}

func nativeAckermann(m, n, want int) func() {
	a := function(func(m universe) universe {
		return nativeElim(m.(int), function(func(n universe) universe { return n.(int) + 1 }), func(_ int, h universe) universe {
			return function(func(n universe) universe {
				return nativeElim(n.(int), h.(function)(1), func(_ int, g universe) universe { return h.(function)(g) })
			})
		})
	})
	return func() {
		if call(a, m, n).(int) != want {
			panic("Ackermann")
		}
	}
}

var nativePlus = function(func(a universe) universe {
	return function(func(b universe) universe { return new(big.Int).Add(a.(*big.Int), b.(*big.Int)) })
})

// nativeTimes adds n times, as the recursor does.
var nativeTimes = function(func(m universe) universe {
	return function(func(n universe) universe {
		return nativeElim(int(m.(*big.Int).Int64()), new(big.Int), func(_ int, h universe) universe { return call(nativePlus, n, h) })
	})
})

func nativeFactorial(n int) *big.Int {
	return nativeElim(n, big.NewInt(1), func(k int, h universe) universe {
		return call(nativeTimes, big.NewInt(int64(k+1)), h)
	}).(*big.Int)
}

type couple struct{ first, second universe }

func nativeFibonacci(n int) *big.Int {
	p := nativeElim(n, couple{new(big.Int), big.NewInt(1)}, func(_ int, h universe) universe {
		c := h.(couple)
		return couple{c.second, call(nativePlus, c.first, c.second)}
	})
	return p.(couple).first.(*big.Int)
}

// nativeBinomial is Pascal's triangle as a recursion on both numbers, the second
// hypothesis not used.
func nativeBinomial(n, k int) *big.Int {
	row := nativeElim(n, function(func(k universe) universe {
		if k.(int) == 0 {
			return big.NewInt(1)
		}
		return new(big.Int)
	}), func(_ int, h universe) universe {
		return function(func(k universe) universe {
			if k.(int) == 0 {
				return big.NewInt(1)
			}
			return call(nativePlus, call(h, k.(int)-1), call(h, k))
		})
	})
	return call(row, k).(*big.Int)
}

type cons struct{ head, tail universe } // nil is the empty list

func nativeLess(m int) universe {
	return nativeElim(m, function(func(universe) universe { return true }), func(_ int, h universe) universe {
		return function(func(n universe) universe {
			if n.(int) == 0 {
				return false
			}
			return call(h, n.(int)-1)
		})
	})
}

// nativeFold is the recursor of lists with the hypothesis on demand, as in the
// engine, where one that is not used costs nothing.
func nativeFold(l universe, empty universe, step func(x, tail universe, h func() universe) universe) universe {
	if l == nil {
		return empty
	}
	c := l.(*cons)
	return step(c.head, c.tail, func() universe { return nativeFold(c.tail, empty, step) })
}

func nativeInsert(x, l universe) universe {
	return nativeFold(l, &cons{x, nil}, func(y, ys universe, h func() universe) universe {
		if call(nativeLess(x.(int)), y).(bool) {
			return &cons{x, &cons{y, ys}}
		}
		return &cons{y, h()}
	})
}

func nativeSort(l universe) universe {
	return nativeFold(l, nil, func(x, _ universe, h func() universe) universe { return nativeInsert(x, h()) })
}

// nativeComposite composes the successor n times with itself.
func nativeComposite(n int) universe {
	compose := function(func(f universe) universe {
		return function(func(g universe) universe {
			return function(func(x universe) universe { return call(f, call(g, x)) })
		})
	})
	successor := function(func(x universe) universe { return x.(int) + 1 })
	return nativeElim(n, function(func(x universe) universe { return x }), func(_ int, h universe) universe {
		return call(compose, successor, h)
	})
}
