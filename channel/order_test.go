package channel_test

import (
	"testing"

	"example.org/foulcase/channel"
)

// TestOrder compares the costs in both reading orders with the model's, and the
// least costs with each of them.
func TestOrder(t *testing.T) {
	m := fitSlips(t)
	for _, back := range []bool{false, true} {
		o := m.Order(back)
		eachSymbol(func(before channel.Symbol) {
			eachSymbol(func(c channel.Symbol) {
				eachSymbol(func(next channel.Symbol) { comparePlace(t, m, o, back, before, c, next) })
			})
		})
	}
}

func eachSymbol(visit func(channel.Symbol)) {
	for s := channel.Edge; s < channel.Symbols; s++ {
		visit(s)
	}
}

func comparePlace(t *testing.T, m *channel.Model, o *channel.Order, back bool, before, c, next channel.Symbol) {
	t.Helper()
	l, r := before, next
	if back {
		l, r = next, before
	}
	same := func(what string, got, want float32) {
		if got != want {
			t.Fatalf("back %v, %d between %d and %d: %s %v, want %v", back, c, before, next, what, got, want)
		}
	}
	above := func(what string, got, least float32) {
		if got < least {
			t.Fatalf("back %v, %d between %d and %d: %s %v, under the least %v", back, c, before, next, what, got, least)
		}
	}
	same("drop", o.Drop(before, c, next), m.Drop(l, c, r))
	above("drop", m.Drop(l, c, r), o.LeastDrop(before, c))
	above("least drop", o.LeastDrop(before, c), o.AnyDrop(c))
	eachSymbol(func(x channel.Symbol) {
		typed, meant := channel.Letter{Sym: x}, channel.Letter{Sym: c}
		emit := m.Emit(typed, l, meant, r)
		same("emit", o.Emit(typed, before, meant, next), emit)
		above("emit", emit, o.LeastEmit(x, before, c))
		above("least emit", o.LeastEmit(x, before, c), o.AnyEmit(x, c))
		insert := m.Insert(x, before, c)
		if back {
			insert = m.Insert(x, c, before)
		}
		same("insert", o.Insert(x, before, c), insert)
		above("insert", insert, o.AnyInsert(x, c))
	})
}
