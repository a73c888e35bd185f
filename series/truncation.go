package series

// Zeros that only a truncation has. A Taylor polynomial of an entire function has as many
// zeros as its degree, most of which move out as the order grows and belong to nothing: they
// mark the circle where the polynomial stops to resemble the function. [Szego1924]

import (
	"fmt"
	"math"
	"math/big"
)

// Truncate is the Taylor polynomial Σ_{n≤order} fₙ sⁿ at 0, and whether its coefficients are
// rational here.
func (f Entire) Truncate(order int) (UniPoly, bool) {
	t, ok := f.Taylor(new(big.Rat), order+1)
	if !ok {
		return UniPoly{}, false
	}
	c := make([]*big.Rat, len(t))
	for i, x := range t {
		if c[i], ok = x.Rat(); !ok {
			return UniPoly{}, false
		}
	}
	return trim(c), true
}

// Truncation compares the zeros of a function in a disc with those of a Taylor polynomial.
type Truncation struct {
	Order    int
	Function Zeros
	// Polynomial has Artefact set on every zero near which the function is proved to have
	// none; one that is shared or could not be decided has it not.
	Polynomial Zeros
	// Undecided is the number of zeros of the polynomial, by multiplicity, for which neither
	// a zero of the function nearby nor its absence could be proved.
	Undecided int
}

// CompareTruncation finds the zeros of f and of its Taylor polynomial of the given order in a
// disc around 0. A zero z of the polynomial belongs to the function if f is proved to have as
// many zeros in a small disc around z; it is an artefact if f is proved to have none there.
// Small is nearness: a fraction of |z|, or of the radius for a zero at 0, below 1.
func CompareTruncation(f Entire, order int, radius, nearness *big.Rat, opt ZeroOptions) (t Truncation, err error) {
	defer catch(&err)
	p, ok := f.Truncate(order)
	if !ok {
		return Truncation{}, fmt.Errorf("the Taylor coefficients of %v at 0 are not rational", f)
	}
	t.Order = order
	if t.Function, err = ZerosInDisc(f, new(big.Rat), radius, opt); err != nil {
		return Truncation{}, fmt.Errorf("the function: %w", err)
	}
	if t.Polynomial, err = ZerosInDisc(Polynomial(p), new(big.Rat), radius, opt); err != nil {
		return Truncation{}, fmt.Errorf("the truncation: %w", err)
	}
	near := ratFloat(nearness)
	for i := range t.Polynomial.List {
		s := &t.Polynomial.List[i]
		n, decided := t.zerosNear(f, *s, near, ratFloat(radius), opt)
		switch {
		case decided && n == 0:
			s.Artefact = true
		case !decided || n != s.Multiplicity:
			t.Undecided += s.Multiplicity
		}
	}
	return t, nil
}

// zerosNear counts the zeros of f around a zero of the truncation.
func (t Truncation) zerosNear(f Entire, s Zero, near, radius float64, opt ZeroOptions) (n int, decided bool) {
	x, y := ratFloat(s.Re), ratFloat(s.Im)
	size := near * math.Hypot(x, y)
	if size == 0 {
		size = near * radius
	}
	if size < 2*ratFloat(s.Radius) {
		return 0, false
	}
	// Where the function has no zero in the whole disc, there is none near s unless the
	// small disc leaves the large one.
	if t.Function.Proven && t.Function.Count == 0 && math.Hypot(x, y)+size < radius {
		return 0, true
	}
	st := structureOf(f.node())
	parts := append([]powerNode{{polyNode{st.poly}, 1}}, st.rest...)
	for _, part := range parts {
		fd := newFinder(part.f, disc{r: size}, opt)
		var gap *uncovered
		var k int
		if reason := run(func() { k, gap = fd.around(x, y, size) }); reason != "" || gap != nil {
			return 0, false
		}
		n += k * part.k
	}
	return n, true
}
