package eval

// Wilson is wilson.
var Wilson = wilson

// RecallCurve gives the points of a curve as recall and precision, and where the
// reported flags and the marks among them lie.
func RecallCurve(places []Place, kind Kind) (curve [][2]float64, all, marks [2]float64) {
	c := newRecallCurve("", places, kind)
	for _, p := range c.points {
		curve = append(curve, [2]float64{p.x, p.y})
	}
	return curve, [2]float64{c.all.x, c.all.y}, [2]float64{c.marks.x, c.marks.y}
}

// Cut is Place.cut.
func Cut(p Place) [3]string {
	before, observed, after := p.cut()
	return [3]string{before, observed, after}
}
