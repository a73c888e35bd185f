package reduce

// The JSON form of the poles: format 1.

import (
	"math/big"

	"remnant/series"
)

// PolesDocument is the answer on the zeros of W in a disc. Numbers are decimals; each zero lies
// within its radius of the place given.
type PolesDocument struct {
	Format              int        `json:"format"` // 1
	Model               *string    `json:"model"`
	W                   string     `json:"W"`
	Proven              bool       `json:"proven"` // the count is proved
	DiscRadius          string     `json:"discRadius"`
	Count               *int       `json:"count"` // by multiplicity; null if not proved
	Zeros               []ZeroJSON `json:"zeros"`
	TruncationArtefacts []ZeroJSON `json:"truncationArtefacts"`
	Reason              *string    `json:"reason"` // why something is not proved; null if all is
}

// ZeroJSON is one zero, or a cluster of several that do not separate.
type ZeroJSON struct {
	Re           string        `json:"re"`
	Im           string        `json:"im"`
	Radius       string        `json:"radius"`
	Multiplicity int           `json:"multiplicity"`
	Verdicts     []PoleVerdict `json:"verdicts"`
}

// Document is the JSON form.
func (p *Poles) Document(r *Result) *PolesDocument {
	d := &PolesDocument{Format: JSONFormat, Model: orNull(r.Model.Title), W: p.Function, Proven: p.Zeros.Proven,
		DiscRadius: p.Radius.RatString(), Zeros: []ZeroJSON{}, TruncationArtefacts: []ZeroJSON{}, Reason: orNull(p.Zeros.Reason)}
	if p.Zeros.Proven {
		d.Count = &p.Zeros.Count
	}
	for _, z := range p.List {
		d.Zeros = append(d.Zeros, zeroJSON(z.Zero, z.Verdicts))
	}
	for _, z := range p.TruncationArtefacts {
		d.TruncationArtefacts = append(d.TruncationArtefacts, zeroJSON(z, []PoleVerdict{}))
	}
	return d
}

// Encode writes the document with an indent of two spaces.
func (d *PolesDocument) Encode() ([]byte, error) { return encodeIndented(d) }

func zeroJSON(z series.Zero, v []PoleVerdict) ZeroJSON {
	return ZeroJSON{Decimal(z.Re, 15), Decimal(z.Im, 15), Decimal(z.Radius, 3), z.Multiplicity, v}
}

// Decimal writes x with so many significant digits, as an exponent where it is small or large.
func Decimal(x *big.Rat, digits int) string {
	if x.Sign() == 0 {
		return "0"
	}
	return new(big.Float).SetPrec(256).SetRat(x).Text('g', digits)
}
