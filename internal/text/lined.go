package text

// stretchesBlock makes a block of stretches of the source, each read by inline,
// with white space and something that is no text of the block between them. It is
// nil when there is no text.
func stretchesBlock(source []byte, inline func(p *prose, from, to int), stretches ...[2]int) *Block {
	p := prose{source: source}
	for _, s := range stretches {
		if len(p.text) > 0 && s[0] > p.end {
			p.standIn("\n", p.end, p.end+1)
		}
		inline(&p, s[0], s[1])
	}
	return p.block()
}
