package train

// digitBits is the radix of the sort: 2^11 counters stay in the first cache.
const digitBits = 11

// sortKeys sorts keys by their low bits with a least-significant-digit radix
// sort; scratch must be as long. The result is in the first slice returned,
// which is one of the two.
func sortKeys(keys, scratch []key, width uint) (sorted, spare []key) {
	for shift := uint(0); shift < width; shift += digitBits {
		if pass(keys, scratch, shift) {
			keys, scratch = scratch, keys
		}
	}
	return keys, scratch
}

// pass distributes keys by one digit and tells whether it had to: a digit that
// all keys share needs no move.
func pass(keys, out []key, shift uint) bool {
	var at [1 << digitBits]int
	for _, k := range keys {
		at[digit(k, shift)]++
	}
	sum := 0
	for d, n := range at {
		if n == len(keys) {
			return false
		}
		at[d] = sum
		sum += n
	}
	for _, k := range keys {
		d := digit(k, shift)
		out[at[d]] = k
		at[d]++
	}
	return true
}

func digit(k key, shift uint) uint64 {
	v := k.lo >> shift
	if shift >= 64 {
		v = k.hi >> (shift - 64)
	} else if shift > 0 {
		v |= k.hi << (64 - shift)
	}
	return v & (1<<digitBits - 1)
}
