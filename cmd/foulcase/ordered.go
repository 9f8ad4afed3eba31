package main

import (
	"iter"
	"sync"
)

// ordered runs do for 0..n-1, at most jobs at once, and yields the results in
// order. A loop that stops early starts no more of them and ends when those under
// way have.
func ordered[T any](n, jobs int, do func(i int) T) iter.Seq2[int, T] {
	return func(yield func(int, T) bool) {
		// What waits in the queue is running or done; one more is awaited
		// below. So the queue's capacity bounds how far work runs ahead.
		queue := make(chan chan T, jobs-1)
		stop := make(chan struct{})
		var running sync.WaitGroup
		defer running.Wait()
		defer close(stop)
		running.Go(func() {
			defer close(queue)
			for i := range n {
				result := make(chan T, 1)
				select {
				case queue <- result:
					running.Go(func() { result <- do(i) })
				case <-stop:
					return
				}
			}
		})
		i := 0
		for result := range queue {
			if !yield(i, <-result) {
				return
			}
			i++
		}
	}
}
