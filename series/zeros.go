package series

// Number and place of the zeros of an entire function in a disc. Structure is used first: the
// exponential factor is dropped, a polynomial is counted exactly by a Cauchy index, and what
// is left is counted by the argument principle; each zero is then enclosed by itself, or as a
// cluster if it does not separate.

import (
	"fmt"
	"math"
	"math/big"
	"sort"

	"remnant/expr/budget"
)

// Zeros is the answer about one disc.
type Zeros struct {
	Proven bool // Count is the number of zeros in the disc, by multiplicity
	Count  int
	// List encloses all of them if Listed is set; else those that were found, by increasing
	// real part, then imaginary part.
	List   []Zero
	Listed bool
	Reason string // why not Proven or not Listed, in words
	// ByStructure says that the function is a polynomial times an exponential, so that
	// nothing had to be evaluated for Count.
	ByStructure bool
}

// Zero is one enclosure: |s − (Re + i Im)| ≤ Radius holds exactly Multiplicity zeros of the
// function, counted with multiplicity, unless another enclosure overlaps it.
type Zero struct {
	Re, Im, Radius *big.Rat
	Multiplicity   int
	Real           bool // proved to be real; then Im = 0
	Exact          bool // Radius = 0: the zero itself
	// Cluster: several zeros that do not separate, or one multiple zero that is not proved
	// to be one. Otherwise a zero of Multiplicity > 1 is proved to be multiple.
	Cluster bool
	// Slope is the proved sign of the derivative at a real simple zero; 0 if unknown or
	// elsewhere.
	Slope int
	// Artefact: only the truncation has this zero (see CompareTruncation).
	Artefact bool
}

// ZeroOptions bounds the search.
type ZeroOptions struct {
	Budget *budget.Budget
	// Models is the number of Taylor models that may be taken, each a few microseconds to
	// milliseconds; 0 means 40000.
	Models int
}

// EdgeZeroError says that a zero lies on the edge of the region or too close to it: the
// caller moves the edge.
type EdgeZeroError struct {
	Re, Im float64 // about where
	Within float64 // 0: on the edge exactly; else a proved bound of the distance
}

func (e *EdgeZeroError) Error() string {
	where := "on the edge of the region"
	if e.Within > 0 {
		where = fmt.Sprintf("within %.1e of the edge of the region", e.Within)
	}
	if math.IsNaN(e.Re) {
		return "a zero lies " + where
	}
	return fmt.Sprintf("a zero lies %s, at s = %.9g%+.9gi", where, e.Re, e.Im)
}

// ZeroFunctionError says that the function is 0 everywhere.
type ZeroFunctionError struct{ Function string }

func (e *ZeroFunctionError) Error() string { return e.Function + " is zero everywhere" }

// ZerosInDisc counts and encloses the zeros of f with |s − centre| < radius. The error is a
// *EdgeZeroError, *ZeroFunctionError, *GrowthError or *budget.Stop; a count that could not be
// proved is no error but Proven = false. Cost: models in proportion to the length of the edge
// times the logarithmic derivative of f on it, and the same for the cuts between zeros.
func ZerosInDisc(f Entire, centre, radius *big.Rat, opt ZeroOptions) (out Zeros, err error) {
	defer catch(&err)
	if radius.Sign() <= 0 {
		return Zeros{}, fmt.Errorf("the radius of a disc is positive, not %s", radius.RatString())
	}
	s := structureOf(f.node())
	if s.poly.IsZero() {
		return Zeros{}, &ZeroFunctionError{f.String()}
	}
	d := disc{centre, radius, ratFloat(centre), ratFloat(radius)}
	out = Zeros{Proven: true, Listed: true, ByStructure: len(s.rest) == 0}
	if s.poly.Degree() > 0 {
		if err := out.polynomial(s.poly, d, opt); err != nil {
			return Zeros{}, err
		}
	}
	for _, r := range s.rest {
		if err := out.factor(r, d, opt); err != nil {
			return Zeros{}, err
		}
	}
	out.finish(f, opt)
	return out, nil
}

// disc is the region, exactly and about.
type disc struct {
	centre, radius *big.Rat
	x, r           float64
}

// side is −1 for a disc wholly inside, 1 outside, 0 if not decided.
func (d disc) side(s found) int {
	dist := math.Hypot(s.x-d.x, s.y)
	slack := s.r + (d.r+math.Abs(d.x))*1e-13
	switch {
	case dist+slack < d.r:
		return -1
	case dist-slack > d.r:
		return 1
	}
	return 0
}

// placed panics where float64 cannot place discs in the region.
func (d disc) placed() {
	const most = 1e100
	if !(d.r < most && d.r > 1/most && math.Abs(d.x) < d.r*0x1p20) {
		panic(stuck{"the disc is too large, too small or too far away for its zeros to be placed"})
	}
}

// newFinder prepares a search in the disc.
func newFinder(f node, d disc, opt ZeroOptions) *finder {
	n := opt.Models
	if n == 0 {
		n = 40000
	}
	return &finder{f, &evaluator{Arith: NewArith(narrowBits), budget: opt.Budget}, n, d.r}
}

// run calls step and says why it got stuck, if it did.
func run(step func()) (reason string) {
	defer func() {
		if v := recover(); v != nil {
			switch s := v.(type) {
			case stuck:
				reason = s.reason
			case big.ErrNaN:
				reason = "the values of the function are too large"
			default:
				panic(v)
			}
		}
	}()
	step()
	return ""
}

// polynomial adds the zeros of p.
func (z *Zeros) polynomial(p UniPoly, d disc, opt ZeroOptions) error {
	for _, part := range p.squareFree() {
		n, edge := countInDisc(part.part, d.centre, d.radius, opt.Budget)
		if edge {
			e := &EdgeZeroError{math.NaN(), math.NaN(), 0}
			for _, at := range []*big.Rat{new(big.Rat).Add(d.centre, d.radius), new(big.Rat).Sub(d.centre, d.radius)} {
				if part.part.Eval(at).Sign() == 0 {
					e.Re, e.Im = ratFloat(at), 0
				}
			}
			return e
		}
		z.Count += n * part.exp
		if n == 0 {
			continue
		}
		if x, ok := linearRoot(part.part); ok {
			z.List = append(z.List, Zero{x, new(big.Rat), new(big.Rat), part.exp, true, true, false, 0, false})
			continue
		}
		z.list(newFinder(polyNode{part.part}, d, opt), d, n, part.exp)
	}
	return nil
}

func linearRoot(p UniPoly) (*big.Rat, bool) {
	if p.Degree() != 1 {
		return nil, false
	}
	x := new(big.Rat).Quo(p.c[0], p.c[1])
	return x.Neg(x), true
}

// factor adds the zeros of r, counted by the argument principle.
func (z *Zeros) factor(r powerNode, d disc, opt ZeroOptions) error {
	fd := newFinder(r.f, d, opt)
	n := 0
	var gap *uncovered
	var near float64
	reason := run(func() {
		d.placed()
		if n, gap = fd.around(d.x, 0, d.r); gap != nil {
			near = fd.zeroNear(gap)
		}
	})
	switch {
	case near > 0:
		return &EdgeZeroError{gap.x, gap.y, near}
	case gap != nil && reason == "":
		reason = fmt.Sprintf("the function could not be kept from zero near s = %.9g%+.9gi on the edge", gap.x, gap.y)
	}
	if reason != "" {
		z.Proven, z.Listed, z.Reason = false, false, reason
		return nil
	}
	z.Count += n * r.k
	if n > 0 {
		z.list(fd, d, n, r.k)
	}
	return nil
}

// zeroNear proves a zero close to a piece of the edge and returns a bound of its distance.
func (z *finder) zeroNear(gap *uncovered) float64 {
	for rho := gap.rho * 4; rho < z.scale*0x1p-20; rho *= 8 {
		for k := 1; k <= 3; k++ {
			if _, ok := z.pellet(k, gap.x, gap.y, rho); ok {
				return 2 * rho
			}
		}
	}
	return 0
}

// list encloses the n zeros of the finder's function in the disc, each of multiplicity exp.
func (z *Zeros) list(fd *finder, d disc, n, exp int) {
	var all []found
	reason := run(func() { d.placed(); all = fd.inDisc(d) })
	total := 0
	for _, s := range all {
		total += s.n
		z.List = append(z.List, s.zero(exp))
	}
	switch {
	case reason != "":
		z.Listed, z.Reason = false, reason
	case total != n:
		z.Listed, z.Reason = false, "some zeros lie too close to the edge to be placed"
	}
}

// inDisc lists the zeros in the disc, those of a square around it that lie outside left out.
func (z *finder) inDisc(d disc) []found {
	for grow := 1.01; grow < 1.1; grow += 0.0137 {
		h := d.r * grow
		c, gap := z.makeCell(point{d.x - h, -h}, point{d.x + h, h}, h*0x1p-14)
		if gap != nil {
			continue
		}
		var in []found
		skip := func(c cell) bool { return c.hi.y < 0 || c.nearest(d.x, 0) > d.r*(1+1e-9) }
		for _, s := range mirror(z.separate(c, skip)) {
			if d.side(s) < 0 {
				in = append(in, s)
			}
		}
		return in
	}
	panic(stuck{"zeros lie too close to every square tried around the disc"})
}

// mirror adds the conjugates of zeros above the real axis and drops what lies below: the
// function is real on the real axis.
func mirror(list []found) []found {
	var out []found
	for _, s := range list {
		if s.y+s.r < 0 {
			continue
		}
		out = append(out, s)
		if s.y-s.r > 0 {
			s.y = -s.y
			out = append(out, s)
		}
	}
	return out
}

func (s found) zero(exp int) Zero {
	rat := func(x float64) *big.Rat { return new(big.Rat).SetFloat64(x) }
	if s.exact != nil {
		return Zero{Re: s.exact, Im: new(big.Rat), Radius: new(big.Rat), Multiplicity: s.n * exp, Real: true, Exact: true}
	}
	return Zero{Re: rat(s.x), Im: rat(s.y), Radius: rat(s.r), Multiplicity: s.n * exp,
		Real: s.n == 1 && s.y == 0, Cluster: s.n > 1}
}

// finish orders the list, joins what overlaps and finds the slopes.
func (z *Zeros) finish(f Entire, opt ZeroOptions) {
	sort.SliceStable(z.List, func(i, j int) bool { return z.List[i].before(z.List[j]) })
	z.join()
	for i := range z.List {
		if s := &z.List[i]; s.Real && s.Multiplicity == 1 {
			run(func() { s.Slope = slope(f, *s, opt) }) // 0 where values are too large
		}
	}
}

func (s Zero) before(t Zero) bool {
	if c := s.Re.Cmp(t.Re); c != 0 {
		return c < 0
	}
	return s.Im.Cmp(t.Im) < 0
}

// join makes one enclosure of two that overlap: the same exact zero, or a cluster.
func (z *Zeros) join() {
	for i := 0; i < len(z.List); i++ {
		for j := i + 1; j < len(z.List); j++ {
			s, t := z.List[i], z.List[j]
			if !s.overlaps(t) {
				continue
			}
			u := s
			u.Multiplicity += t.Multiplicity
			if !s.Exact || !t.Exact {
				far := new(big.Rat).Add(s.Radius, t.Radius)
				u.Radius = far.Add(far, far)
				u.Exact, u.Cluster, u.Real = false, true, s.Real && t.Real
			}
			z.List[i] = u
			z.List = append(z.List[:j], z.List[j+1:]...)
			i = -1
			break
		}
	}
}

// overlaps reports whether two enclosures share a point.
func (s Zero) overlaps(t Zero) bool {
	dx, dy := new(big.Rat).Sub(s.Re, t.Re), new(big.Rat).Sub(s.Im, t.Im)
	r := new(big.Rat).Add(s.Radius, t.Radius)
	dx, dy = dx.Mul(dx, dx), dy.Mul(dy, dy)
	return dx.Add(dx, dy).Cmp(r.Mul(r, r)) <= 0
}

// slope is the sign of f' on the enclosure of a real zero, 0 if it is not decided.
func slope(f Entire, s Zero, opt ZeroOptions) int {
	for bits := narrowBits; bits <= maxBits; bits *= 2 {
		ev := &evaluator{Arith: NewArith(bits), budget: opt.Budget}
		c := ev.rat(s.Re)
		r := c.rad.add(magOfRat(s.Radius)).add(c.midUp().mul(mag{0.5, -bits / 2})).add(mag{0.5, -bits})
		rho := r.mul(mag{0.5, 2})
		d := ev.derivative(ev.at(f.node(), c.exactMid(), rho), rho)
		re, _ := d.parts()
		if d.rad.less(magOf(re).mul(mag{down, 0})) {
			return re.Sign()
		}
	}
	return 0
}

// polynomialZeros encloses all zeros of a square-free p of positive degree.
func polynomialZeros(p UniPoly, b *budget.Budget) ([]Zero, error) {
	bound := rootBound(p.integral())
	z, err := ZerosInDisc(Polynomial(p), new(big.Rat), bound, ZeroOptions{Budget: b})
	if err == nil && len(z.List) == 0 {
		err = fmt.Errorf("the zeros of %v could not be placed: %s", p, z.Reason)
	}
	return z.List, err
}

// Box is the rectangle Lo ≤ (Re s, Im s) ≤ Hi.
type Box struct{ ReLo, ReHi, ImLo, ImHi *big.Rat }

// CountInBox is the number of zeros of f inside a rectangle, by the argument principle. It is
// an *EdgeZeroError if a zero lies on the edge or close to it, a *NotProvenError if the limit
// was reached.
func CountInBox(f Entire, box Box, opt ZeroOptions) (n int, err error) {
	defer catch(&err)
	lo, hi := point{ratFloat(box.ReLo), ratFloat(box.ImLo)}, point{ratFloat(box.ReHi), ratFloat(box.ImHi)}
	if lo.x >= hi.x || lo.y >= hi.y {
		return 0, fmt.Errorf("a box needs its lower bounds below its upper ones")
	}
	size := max(hi.x-lo.x, hi.y-lo.y)
	z := newFinder(f.node(), disc{r: size}, opt)
	reason := run(func() {
		disc{x: math.Hypot(lo.x, lo.y), r: size}.placed()
		c, gap := z.makeCell(lo, hi, size*0x1p-34)
		switch near := 0.0; {
		case gap == nil:
			n = c.count()
		default:
			if near = z.zeroNear(gap); near > 0 {
				err = &EdgeZeroError{gap.x, gap.y, near}
				return
			}
			panic(stuck{fmt.Sprintf("the function could not be kept from zero near s = %.9g%+.9gi on the edge", gap.x, gap.y)})
		}
	})
	if reason != "" {
		return 0, &NotProvenError{reason}
	}
	return n, err
}

// NotProvenError says that a count could not be proved.
type NotProvenError struct{ Reason string }

func (e *NotProvenError) Error() string { return "not proven: " + e.Reason }
