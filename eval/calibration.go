package eval

import (
	"cmp"
	"math"
	"slices"
)

// A Bin holds predictions of like probability, as a reliability diagram shows
// them: were the probabilities true, P and Right would be alike but for chance.
type Bin struct {
	Low, High float64 // what probabilities it takes: above Low, up to High
	N         int
	P         float64 // mean probability
	Right     float64 // share of the predictions that came true
}

// calibrationBins is the number of bins in reports and diagrams.
const calibrationBins = 10

// EqualWidthBins sorts predictions into bins of the same width (Guo, Pleiss, Sun
// & Weinberger 2017, "On calibration of modern neural networks"). p and right
// are parallel. Bins without predictions are left out.
func EqualWidthBins(p []float64, right []bool, bins int) []Bin {
	sums := make([]calibrationSum, bins)
	for i := range p {
		sums[binOf(p[i], bins)].add(p[i], right[i])
	}
	var list []Bin
	for i, s := range sums {
		if s.n > 0 {
			list = append(list, s.bin(float64(i)/float64(bins), float64(i+1)/float64(bins)))
		}
	}
	return list
}

// EqualCountBins sorts predictions into bins that hold as many each (Nixon et al.
// 2019, "Measuring calibration in deep learning"), but for predictions of one
// probability, which stay together.
func EqualCountBins(p []float64, right []bool, bins int) []Bin {
	order := make([]int, len(p))
	for i := range order {
		order[i] = i
	}
	slices.SortFunc(order, func(a, b int) int { return cmp.Compare(p[a], p[b]) })
	var list []Bin
	low, start := 0.0, 0
	for k := 1; k <= bins && start < len(order); k++ {
		end := max(k*len(order)/bins, start)
		for end > start && end < len(order) && p[order[end]] == p[order[end-1]] {
			end++
		}
		if end == start {
			continue
		}
		var sum calibrationSum
		for _, i := range order[start:end] {
			sum.add(p[i], right[i])
		}
		high := p[order[end-1]]
		list = append(list, sum.bin(low, high))
		low, start = high, end
	}
	return list
}

// CalibrationError is the expected calibration error over bins of equal width:
// the mean difference between the probability and the share that came true,
// NaN when there are no predictions. p and right are parallel.
func CalibrationError(p []float64, right []bool, bins int) float64 {
	return BinnedError(EqualWidthBins(p, right, bins))
}

// BinnedError is the expected calibration error over any bins.
func BinnedError(bins []Bin) float64 {
	var sum, n float64
	for _, b := range bins {
		sum += float64(b.N) * math.Abs(b.P-b.Right)
		n += float64(b.N)
	}
	return sum / n
}

// Predictions lists what the flags of one kind, or of all when kind is "", said
// and whether it was so. Findings held back count too; flags that are neither
// right nor wrong do not.
func Predictions(places []Place, kind Kind) (p []float64, right []bool) {
	for i := range places {
		if f := places[i].Flag; places[i].predicts() && (kind == "" || f.Kind == kind) {
			p = append(p, f.P)
			right = append(right, places[i].Outcome == PlaceRight)
		}
	}
	return p, right
}

func (p *Place) predicts() bool { return p.Flag != nil && p.Outcome != PlaceNeither && !p.Again }

// calibrationSum adds up the predictions of a bin.
type calibrationSum struct{ n, p, right float64 }

func (s *calibrationSum) add(p float64, right bool) {
	s.n++
	s.p += p
	if right {
		s.right++
	}
}

func (s *calibrationSum) bin(low, high float64) Bin {
	return Bin{low, high, int(s.n), s.p / s.n, s.right / s.n}
}

// binOf is the bin of equal width that a probability belongs to.
func binOf(p float64, bins int) int {
	return min(max(int(math.Ceil(p*float64(bins)))-1, 0), bins-1)
}

// calibrationClasses are the kinds whose calibration is reported; "" is all.
var calibrationClasses = [...]Kind{"", Nonword, Realword}

// calibrationCounts sums over texts, by class and bin.
type calibrationCounts [len(calibrationClasses)][calibrationBins]calibrationSum

func (c calibrationCounts) plus(d calibrationCounts) calibrationCounts {
	for i := range c {
		for k := range c[i] {
			c[i][k].n += d[i][k].n
			c[i][k].p += d[i][k].p
			c[i][k].right += d[i][k].right
		}
	}
	return c
}

// of is the calibration error of one class, and how many predictions it is of.
func (c *calibrationCounts) of(class int) (value, n float64) {
	var bins []Bin
	for k := range c[class] {
		if s := &c[class][k]; s.n > 0 {
			bins = append(bins, s.bin(0, 0))
			n += s.n
		}
	}
	return BinnedError(bins), n
}

// Calibration gives "calibration.error", the expected calibration error over ten
// bins of equal width, of all findings, those held back too, and of those called
// nonword and realword, if there are any; and "calibration.reported" likewise, of
// what the system reports alone.
// The error of a resample is never less than chance allows, so intervals lie
// somewhat high where predictions are few.
func (j *Judged) Calibration(r Resampling) []Metric {
	return append(
		j.calibration("calibration.error", func(p *Place) bool { return p.predicts() }, r),
		j.calibration("calibration.reported", func(p *Place) bool { return p.predicts() && p.Reported() }, r)...)
}

func (j *Judged) calibration(name string, counts func(*Place) bool, r Resampling) []Metric {
	units := make([]calibrationCounts, len(j.Units))
	for i := range j.Places {
		p := &j.Places[i]
		if !counts(p) {
			continue
		}
		for k, class := range calibrationClasses {
			if class == "" || class == p.Flag.Kind {
				units[p.Unit][k][binOf(p.Flag.P, calibrationBins)].add(p.Flag.P, p.Outcome == PlaceRight)
			}
		}
	}
	var measures []measure[calibrationCounts]
	for k, class := range calibrationClasses {
		measures = append(measures, measure[calibrationCounts]{name, string(class), func(c calibrationCounts) (float64, float64) {
			return c.of(k)
		}})
	}
	return slices.DeleteFunc(bootstrap(units, measures, r), func(m Metric) bool { return m.N == 0 && m.Class != "" })
}
