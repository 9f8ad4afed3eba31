package foulcase

// Fitted reports whether the channel was fitted on a pair of observed and
// intended forms, so that a measurement on it would flatter the model. recorded
// is false for a model that does not say what it was fitted on. Case and kinds
// of apostrophe do not count. The pairs are kept as 32-bit hashes: for a pair
// not fitted on, seen is true by chance about once in 2^32 over their number.
func (e *Engine) Fitted(observed, intended string) (seen, recorded bool) {
	if e.fitted == nil {
		return false, false
	}
	return e.fitted.Has(observed, intended), true
}
