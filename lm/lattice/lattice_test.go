package lattice_test

import (
	"cmp"
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"example.org/foulcase/lm/lattice"
)

// path is one way through a lattice as the enumeration finds it.
type path struct {
	score float64
	edges []int
}

// enumerate lists every path, best first, scoring each by itself.
func enumerate(edges []lattice.Edge, last int, m lattice.Scorer[toyState], weight float64) []path {
	var all []path
	var walk func(node int, s toyState, score float64, trail []int)
	walk = func(node int, s toyState, score float64, trail []int) {
		if node == last {
			all = append(all, path{score, slices.Clone(trail)})
			return
		}
		for i, e := range edges {
			if e.From != node || math.IsInf(e.Score, -1) {
				continue
			}
			state, sum := s, score+e.Score
			for _, w := range e.Words {
				var next toyState
				sum += weight * float64(m.Advance(&state, w, &next))
				state = next
			}
			walk(e.To, state, sum, append(trail, i))
		}
	}
	walk(0, toyState{}, 0, nil)
	slices.SortFunc(all, func(a, b path) int { return cmp.Compare(b.score, a.score) })
	return all
}

// masses returns the log total of the paths and each edge's posterior.
func masses(paths []path, edges int) (total float64, posterior []float64) {
	posterior = make([]float64, edges)
	sum := 0.0
	for _, p := range paths {
		share := math.Exp(p.score - paths[0].score)
		sum += share
		for _, e := range p.edges {
			posterior[e] += share
		}
	}
	for i := range posterior {
		posterior[i] /= sum
	}
	return paths[0].score + math.Log(sum), posterior
}

func fill(l *lattice.Lattice[toyState], last int, edges []lattice.Edge) {
	l.Reset(last)
	for _, e := range edges {
		l.Add(e)
	}
}

func near(t *testing.T, what string, got, want float64) {
	t.Helper()
	if !(math.Abs(got-want) <= 1e-9) {
		t.Fatalf("%s is %.15g, want %.15g", what, got, want)
	}
}

// checkExact holds a run without a beam against the enumeration.
func checkExact(t *testing.T, l *lattice.Lattice[toyState], edges []lattice.Edge, all []path) {
	t.Helper()
	total, posterior := masses(all, len(edges))
	near(t, "mass", l.Mass(), total)
	for i := range edges {
		near(t, "posterior", l.Posterior(i), posterior[i])
	}
	if got := l.Best(); !slices.Equal(got, all[0].edges) {
		t.Fatalf("best path %v, want %v", got, all[0].edges)
	}
	for _, k := range []int{1, 5, len(all), len(all) + 7} {
		got := l.NBest(k)
		if len(got) != min(k, len(all)) {
			t.Fatalf("%d best of %d paths, want %d", len(got), len(all), min(k, len(all)))
		}
		for i := range got {
			near(t, "score of an N-best path", got[i].Score, all[i].score)
			if !slices.Equal(got[i].Edges, all[i].edges) {
				t.Fatalf("path %d is %v, want %v", i, got[i].Edges, all[i].edges)
			}
		}
	}
}

func TestAgainstEnumeration(t *testing.T) {
	r := rand.New(rand.NewPCG(2, 71))
	l := lattice.New[toyState](lattice.Options{})
	for range 500 {
		m := newToy(r, 5, r.Float64())
		last := 1 + r.IntN(6)
		edges := randomEdges(r, last, r.IntN(14), 5)
		weight := 2 * r.Float64()
		fill(l, last, edges)
		if err := l.Run(m, toyState{}, weight); err != nil {
			t.Fatal(err)
		}
		checkExact(t, l, edges, enumerate(edges, last, m, weight))
	}
}

// Forbidden edges and nodes from which the end cannot be reached.
func TestDeadEnds(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 8))
	l := lattice.New[toyState](lattice.Options{})
	whole, none := 0, 0
	for range 500 {
		m := newToy(r, 4, .4)
		last := 2 + r.IntN(4)
		edges := randomEdges(r, last, 12, 4)
		for i := range edges {
			if r.IntN(5) < 3 {
				edges[i].Score = math.Inf(-1)
			}
		}
		fill(l, last, edges)
		err := l.Run(m, toyState{}, 1)
		all := enumerate(edges, last, m, 1)
		if len(all) > 0 {
			whole++
			if err != nil {
				t.Fatal(err)
			}
			checkExact(t, l, edges, all)
			continue
		}
		none++
		if !errors.Is(err, lattice.ErrNoPath) || !math.IsInf(l.Mass(), -1) || len(l.Best()) != 0 || len(l.NBest(3)) != 0 {
			t.Fatalf("no path: error %v, mass %v, best %v", err, l.Mass(), l.Best())
		}
	}
	if whole < 50 || none < 50 {
		t.Fatalf("%d lattices with and %d without a path: the draw does not test both", whole, none)
	}
}

// So many states at a node that they are hashed.
func TestManyStates(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 9))
	m := newToy(r, 14, 1)
	var edges []lattice.Edge
	for i := range 3 {
		for w := range 14 {
			edges = append(edges, lattice.Edge{From: i, To: i + 1, Words: []uint32{uint32(w + 1)}, Score: -r.Float64()})
		}
	}
	l := lattice.New[toyState](lattice.Options{})
	fill(l, 3, edges)
	if err := l.Run(m, toyState{}, 1); err != nil {
		t.Fatal(err)
	}
	checkExact(t, l, edges, enumerate(edges, 3, m, 1))
}

// The posteriors of the edges over any cut add up to one in a sentence of
// thousands of tokens, whose mass no float64 could hold but as a logarithm.
func TestCuts(t *testing.T) {
	r := rand.New(rand.NewPCG(11, 4))
	m := newToy(r, 9, .3)
	const last = 5000
	edges := randomEdges(r, last, 3*last, 9)
	for _, o := range []lattice.Options{{}, {States: 3}, {Margin: 4}, {States: 5, Margin: 9}} {
		l := lattice.New[toyState](o)
		fill(l, last, edges)
		if err := l.Run(m, toyState{}, 1); err != nil {
			t.Fatal(err)
		}
		cuts := make([]float64, last+1)
		for i, e := range edges {
			for n := e.From; n < e.To; n++ {
				cuts[n] += l.Posterior(i)
			}
		}
		for n := range last {
			near(t, "sum over a cut", cuts[n], 1)
		}
	}
}

func TestBeam(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 7))
	exact, wide := lattice.New[toyState](lattice.Options{}), lattice.New[toyState](lattice.Options{States: 1 << 20, Margin: 1e6})
	narrow := lattice.New[toyState](lattice.Options{States: 2, Margin: 5})
	dropped := 0
	for range 300 {
		m := newToy(r, 6, .5)
		last := 1 + r.IntN(5)
		edges := randomEdges(r, last, 14, 6)
		for _, l := range []*lattice.Lattice[toyState]{exact, wide, narrow} {
			fill(l, last, edges)
			if err := l.Run(m, toyState{}, 1); err != nil {
				t.Fatal(err)
			}
		}
		near(t, "mass in a wide beam", wide.Mass(), exact.Mass())
		if narrow.Mass() > exact.Mass()+1e-9 {
			t.Fatalf("a beam raised the mass from %v to %v", exact.Mass(), narrow.Mass())
		}
		if narrow.NBest(1)[0].Score > exact.NBest(1)[0].Score+1e-9 {
			t.Fatal("a beam found a path better than the best")
		}
		if narrow.Mass() < exact.Mass()-1e-9 {
			dropped++
		}
		all := enumerate(edges, last, m, 1)
		for _, p := range narrow.NBest(1000) {
			if !slices.ContainsFunc(all, func(q path) bool {
				return slices.Equal(p.Edges, q.edges) && math.Abs(p.Score-q.score) < 1e-9
			}) {
				t.Fatalf("the beam's path %v is none of the lattice's", p)
			}
		}
	}
	if dropped == 0 {
		t.Fatal("the narrow beam never dropped anything")
	}
}

// Two states of one mass, and room for one: the first stays.
func TestBeamTie(t *testing.T) {
	m := &toy{unigrams: map[uint32]float32{1: -1, 2: -1, 3: -1}}
	l := lattice.New[toyState](lattice.Options{States: 1})
	fill(l, 2, []lattice.Edge{
		{From: 0, To: 1, Words: []uint32{1}},
		{From: 0, To: 1, Words: []uint32{2}},
		{From: 1, To: 2, Words: []uint32{3}},
	})
	if err := l.Run(m, toyState{}, 1); err != nil {
		t.Fatal(err)
	}
	for i, want := range []float64{1, 0, 1} {
		near(t, "posterior", l.Posterior(i), want)
	}
}

// A launch that will "birth" at noon, by hand: with P(birth|will) = 1/100 and
// P(berth|will) = 1/20, a slip of one word in 50 and no other difference, the
// posterior of berth is (1/20)(1/50) / ((1/20)(1/50) + (1/100)(49/50)) = 5/54.
func TestByHand(t *testing.T) {
	const will, birth, berth = 1, 2, 3
	m := &toy{
		unigrams: map[uint32]float32{will: -2},
		bigrams: map[[2]uint32]float32{
			{will, birth}: float32(math.Log(1. / 100)),
			{will, berth}: float32(math.Log(1. / 20)),
		},
	}
	l := lattice.New[toyState](lattice.Options{})
	l.Reset(2)
	l.Add(lattice.Edge{From: 0, To: 1, Words: []uint32{will}})
	typed := l.Add(lattice.Edge{From: 1, To: 2, Words: []uint32{birth}, Score: math.Log(49. / 50)})
	meant := l.Add(lattice.Edge{From: 1, To: 2, Words: []uint32{berth}, Score: math.Log(1. / 50)})
	if err := l.Run(m, toyState{}, 1); err != nil {
		t.Fatal(err)
	}
	// The model's float32 logs limit the agreement to 1e-6.
	if got := l.Posterior(meant); math.Abs(got-5./54) > 1e-6 {
		t.Errorf("posterior of berth is %v, want 5/54", got)
	}
	if got := l.Best(); !slices.Equal(got, []int{0, typed}) {
		t.Errorf("best path %v", got)
	}
}

func TestRefusals(t *testing.T) {
	m := &toy{unigrams: map[uint32]float32{1: -1}}
	fine := lattice.Edge{From: 0, To: 1, Words: []uint32{1}}
	for name, e := range map[string]lattice.Edge{
		"backwards":  {From: 1, To: 0},
		"loop":       {From: 1, To: 1},
		"before":     {From: -1, To: 1},
		"beyond":     {From: 1, To: 3},
		"five words": {From: 0, To: 1, Words: []uint32{1, 1, 1, 1, 1}},
		"NaN":        {From: 0, To: 1, Score: math.NaN()},
		"+Inf":       {From: 0, To: 1, Score: math.Inf(1)},
	} {
		l := lattice.New[toyState](lattice.Options{})
		fill(l, 2, []lattice.Edge{fine, {From: 1, To: 2, Words: []uint32{1}}, e})
		if err := l.Run(m, toyState{}, 1); !errors.Is(err, lattice.ErrEdge) {
			t.Errorf("%s: error %v", name, err)
		}
		fill(l, 1, []lattice.Edge{fine})
		if err := l.Run(m, toyState{}, 1); err != nil {
			t.Errorf("%s: the next sentence fails too: %v", name, err)
		}
	}
	l := lattice.New[toyState](lattice.Options{})
	fill(l, 1, []lattice.Edge{fine})
	for _, p := range []float64{math.NaN(), math.Inf(1)} {
		m.unigrams[1] = float32(p)
		if err := l.Run(m, toyState{}, 1); !errors.Is(err, lattice.ErrScore) {
			t.Errorf("log probability %v: error %v", p, err)
		}
	}
}

// A sentence of no tokens has one path, the empty one.
func TestEmpty(t *testing.T) {
	l := lattice.New[toyState](lattice.Options{})
	l.Reset(0)
	if err := l.Run(&toy{}, toyState{}, 1); err != nil {
		t.Fatal(err)
	}
	near(t, "mass", l.Mass(), 0)
	if p := l.NBest(2); len(p) != 1 || len(p[0].Edges) != 0 || p[0].Score != 0 {
		t.Errorf("paths %v", p)
	}
}

func TestEdgeIsKept(t *testing.T) {
	l := lattice.New[toyState](lattice.Options{})
	l.Reset(2)
	words := []uint32{4, 5}
	i := l.Add(lattice.Edge{From: 0, To: 2, Words: words, Score: -3, Tag: 9})
	words[0] = 77
	e := l.Edge(i)
	if l.Len() != 1 || e.From != 0 || e.To != 2 || !slices.Equal(e.Words, []uint32{4, 5}) || e.Score != -3 || e.Tag != 9 {
		t.Errorf("edge %+v", e)
	}
}

func TestNoAllocation(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 1))
	m := newToy(r, 20, .5)
	edges := randomEdges(r, 40, 300, 20)
	l := lattice.New[toyState](lattice.Options{States: 50})
	if n := testing.AllocsPerRun(20, func() {
		fill(l, 40, edges)
		if err := l.Run(m, toyState{}, 1); err != nil {
			t.Fatal(err)
		}
		l.Best()
		l.NBest(10)
	}); n != 0 {
		t.Errorf("%v allocations a sentence", n)
	}
}
