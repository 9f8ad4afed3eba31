package train

// Discounts are what modified Kneser-Ney subtracts from counts of one, two,
// and three or more.
type Discounts [3]float64

// of returns the discount of a count.
func (d *Discounts) of(count uint32) float64 {
	if count == 0 {
		return 0
	}
	return d[min(count, 3)-1]
}

// fallback serves orders whose counts of counts give no usable discount: rough
// values for little or artificial text.
var fallback = Discounts{0.5, 1, 1.5}

// NewDiscounts estimates discounts from the number of n-grams of an order seen
// exactly once, twice, three and four times (Chen and Goodman 1998, eq. 26):
// D_i = i - (i+1) Y n_{i+1}/n_i with Y = n1/(n1 + 2 n2). Where a count of
// counts is zero or a discount leaves [0, i], all three are the fallback.
func NewDiscounts(n1, n2, n3, n4 int64) Discounts {
	if n1 == 0 || n2 == 0 || n3 == 0 {
		return fallback
	}
	n := [4]float64{float64(n1), float64(n2), float64(n3), float64(n4)}
	y := n[0] / (n[0] + 2*n[1])
	var d Discounts
	for i := range d {
		c := float64(i + 1)
		d[i] = c - (c+1)*y*n[i+1]/n[i]
		if d[i] < 0 || d[i] > c {
			return fallback
		}
	}
	return d
}

// discounts estimates the discounts of each order.
func (c *Counts) discounts() []Discounts {
	out := make([]Discounts, len(c.levels))
	for k := range c.levels {
		var of [5]int64 // of[i] n-grams have the adjusted count i
		for _, a := range c.levels[k].adjusted {
			if a < 5 {
				of[a]++
			}
		}
		out[k] = NewDiscounts(of[1], of[2], of[3], of[4])
	}
	return out
}
