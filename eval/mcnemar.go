package eval

import "math"

// McNemar is the outcome of McNemar's test (1947) of whether two systems differ
// on the same items. Only the items that one system gets right and the other
// wrong bear on it.
type McNemar struct {
	OnlyA      int     `json:"only_a"`      // right in A alone
	OnlyB      int     `json:"only_b"`      // right in B alone
	ChiSquared float64 `json:"chi_squared"` // with Edwards's continuity correction; 1 degree of freedom
	P          float64 `json:"p"`           // of ChiSquared; rough below some 25 such items
	Exact      float64 `json:"exact"`       // two-sided binomial p
}

// McNemarTest tests two systems that are right alone on so many items each.
func McNemarTest(onlyA, onlyB int) McNemar {
	m := McNemar{OnlyA: onlyA, OnlyB: onlyB, P: 1, Exact: 1}
	n := onlyA + onlyB
	if n == 0 {
		return m
	}
	apart := max(math.Abs(float64(onlyA-onlyB))-1, 0)
	m.ChiSquared = apart * apart / float64(n)
	m.P = math.Erfc(math.Sqrt(m.ChiSquared / 2))
	tail := 0.0
	for k := range min(onlyA, onlyB) + 1 {
		tail += math.Exp(logChoose(n, k) - float64(n)*math.Ln2)
	}
	m.Exact = min(2*tail, 1)
	return m
}

// CompareOutcomes runs McNemarTest on two systems' outcomes for the same items
// in the same order.
func CompareOutcomes(a, b []bool) McNemar {
	onlyA, onlyB := 0, 0
	for i := range min(len(a), len(b)) {
		switch {
		case a[i] && !b[i]:
			onlyA++
		case b[i] && !a[i]:
			onlyB++
		}
	}
	return McNemarTest(onlyA, onlyB)
}

// logChoose is the log of the binomial coefficient, nats.
func logChoose(n, k int) float64 {
	gamma := func(x int) float64 {
		v, _ := math.Lgamma(float64(x) + 1)
		return v
	}
	return gamma(n) - gamma(k) - gamma(n-k)
}
