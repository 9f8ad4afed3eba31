package main

import (
	"slices"
	"sync/atomic"
	"testing"
)

func TestOrdered(t *testing.T) {
	for _, jobs := range []int{1, 2, 7} {
		var running, most atomic.Int32
		var got []int
		for i, square := range ordered(100, jobs, func(i int) int {
			now := running.Add(1)
			for m := most.Load(); now > m && !most.CompareAndSwap(m, now); m = most.Load() {
			}
			defer running.Add(-1)
			return i * i
		}) {
			if square != i*i {
				t.Fatalf("%d jobs: result %d is %d", jobs, i, square)
			}
			got = append(got, i)
		}
		if len(got) != 100 || !slices.IsSorted(got) {
			t.Errorf("%d jobs: the order was %v", jobs, got)
		}
		if most.Load() > int32(jobs) {
			t.Errorf("%d ran at once, want at most %d", most.Load(), jobs)
		}
	}
}

func TestOrderedStops(t *testing.T) {
	var begun, ended atomic.Int32
	for i := range ordered(1000, 2, func(i int) int {
		begun.Add(1)
		defer ended.Add(1)
		return i
	}) {
		if i == 3 {
			break
		}
	}
	if n := begun.Load(); n > 10 || ended.Load() != n {
		t.Errorf("%d were begun and %d had ended after a stop at the fourth", n, ended.Load())
	}
}
