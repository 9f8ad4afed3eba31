package eval

// An Overlap says how much of the data the model was fitted on.
type Overlap struct {
	Recorded bool `json:"recorded"` // the model says what it was fitted on
	Of       int  `json:"of"`       // pairs or errors looked up
	Fitted   int  `json:"fitted"`   // of these, fitted on
}

// A Fitted tells whether a model was fitted on a pair, and whether it says so
// at all. A nil one says nothing.
type Fitted func(observed, intended string) (seen, recorded bool)

func (f Fitted) ask(observed, intended string) (seen, recorded bool) {
	if f == nil {
		return false, false
	}
	return f(observed, intended)
}

// OverlapOf looks the pairs up.
func (f Fitted) OverlapOf(pairs []Pair) Overlap {
	var o Overlap
	for _, p := range pairs {
		o.look(f, p.Observed, p.Intended)
	}
	return o
}

// OverlapOfErrors looks up the errors of texts with their first corrections.
func (f Fitted) OverlapOfErrors(items []Item) Overlap {
	var o Overlap
	for _, item := range items {
		for _, span := range item.Spans {
			if !span.Neutral && len(span.Corrections) > 0 {
				o.look(f, item.Source[span.Start:span.End], span.Corrections[0])
			}
		}
	}
	return o
}

func (o *Overlap) look(f Fitted, observed, intended string) {
	seen, recorded := f.ask(observed, intended)
	o.Of++
	o.Recorded = recorded
	if seen {
		o.Fitted++
	}
}

// plus is the overlap of two lots of data with one model.
func (o Overlap) plus(p Overlap) Overlap {
	return Overlap{o.Recorded || p.Recorded, o.Of + p.Of, o.Fitted + p.Fitted}
}

// Share is the part that the model was fitted on, 0 where nothing is recorded.
func (o Overlap) Share() float64 {
	if o.Of == 0 || !o.Recorded {
		return 0
	}
	return float64(o.Fitted) / float64(o.Of)
}
