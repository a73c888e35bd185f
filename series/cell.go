package series

// Separating zeros: a rectangle whose number of zeros is known is cut into four, the number
// of each found from the changes of argument along its sides, until every zero stands alone.
// Only rectangles with zeros are cut, so the cost is that of boundaries, not of areas.

import (
	"math"
	"math/big"
	"math/cmplx"
)

// cell is a rectangle with the changes of argument along its sides, each to the right or
// upwards.
type cell struct {
	lo, hi                   point
	bottom, top, left, right float64
}

func (c cell) count() int { return turns(c.bottom + c.right - c.top - c.left) }

func (c cell) size() float64 { return max(c.hi.x-c.lo.x, c.hi.y-c.lo.y) }

// holds reports whether a disc lies inside.
func (c cell) holds(x, y, r float64) bool {
	return c.lo.x < x-r && x+r < c.hi.x && c.lo.y < y-r && y+r < c.hi.y
}

// nearest is the distance of the rectangle from a point.
func (c cell) nearest(x, y float64) float64 {
	dx := max(c.lo.x-x, 0, x-c.hi.x)
	dy := max(c.lo.y-y, 0, y-c.hi.y)
	return math.Hypot(dx, dy)
}

// makeCell measures the sides of a rectangle.
func (z *finder) makeCell(lo, hi point, least float64) (c cell, gap *uncovered) {
	c = cell{lo: lo, hi: hi}
	side := func(p, q point) (d float64) {
		if gap == nil {
			d, gap = z.segment(p, q, least)
		}
		return d
	}
	c.bottom, c.top = side(lo, point{hi.x, lo.y}), side(point{lo.x, hi.y}, hi)
	c.left, c.right = side(lo, point{lo.x, hi.y}), side(point{hi.x, lo.y}, hi)
	return c, gap
}

// cuts are the places tried for a cut, off the middle since zeros like symmetric places.
var cuts = [...]float64{0.4871, 0.5339, 0.4519, 0.5717, 0.4133, 0.6089}

// split cuts a rectangle into four. No side of them has a zero.
func (z *finder) split(c cell) [4]cell {
	for _, at := range cuts {
		m := point{c.lo.x + (c.hi.x-c.lo.x)*at, c.lo.y + (c.hi.y-c.lo.y)*at}
		if out, ok := z.splitAt(c, m); ok {
			return out
		}
	}
	panic(stuck{"zeros lie too close together to be cut apart"})
}

func (z *finder) splitAt(c cell, m point) ([4]cell, bool) {
	ok := true
	side := func(p, q point) (d float64) {
		if ok {
			var gap *uncovered
			d, gap = z.segment(p, q, c.size()*0x1p-10)
			ok = gap == nil
		}
		return d
	}
	west, east := side(point{c.lo.x, m.y}, m), side(m, point{c.hi.x, m.y})
	south, north := side(point{m.x, c.lo.y}, m), side(m, point{m.x, c.hi.y})
	bottom, top := side(c.lo, point{m.x, c.lo.y}), side(point{c.lo.x, c.hi.y}, point{m.x, c.hi.y})
	left, right := side(c.lo, point{c.lo.x, m.y}), side(point{c.hi.x, c.lo.y}, point{c.hi.x, m.y})
	return [4]cell{
		{c.lo, m, bottom, west, left, south},
		{point{m.x, c.lo.y}, point{c.hi.x, m.y}, c.bottom - bottom, east, south, right},
		{point{c.lo.x, m.y}, point{m.x, c.hi.y}, west, top, c.left - left, north},
		{m, c.hi, east, c.top - top, north, c.right - right},
	}, ok
}

// found is a disc with n zeros, and none else in it if n = 1.
type found struct {
	x, y, r float64
	n       int
	exact   *big.Rat // the zero itself, of multiplicity n, if it is known
}

// separate lists the zeros in a rectangle. Rectangles for which skip holds are left out.
func (z *finder) separate(c cell, skip func(cell) bool) []found {
	n := c.count()
	if n == 0 || skip(c) {
		return nil
	}
	z.ev.budget.Check(n)
	if s, ok := z.rational(c, n); ok {
		return []found{s}
	}
	if n < modelOrder-1 {
		x, y, ok := z.newton((c.lo.x+c.hi.x)/2, (c.lo.y+c.hi.y)/2, c.size(), n)
		if s, ok := z.enclose(c, x, y, n, ok); ok && c.holds(s.x, s.y, s.r) {
			return []found{s}
		}
	}
	if c.size() < z.resolution(c) {
		r := math.Hypot(c.hi.x-c.lo.x, c.hi.y-c.lo.y) / 2
		return []found{{(c.lo.x + c.hi.x) / 2, (c.lo.y + c.hi.y) / 2, r * (1 + 1e-9), n, nil}}
	}
	var out []found
	for _, part := range z.split(c) {
		out = append(out, z.separate(part, skip)...)
	}
	return out
}

// resolution is the size of rectangle that is not cut any more: eleven digits of where it is.
func (z *finder) resolution(c cell) float64 {
	far := max(math.Abs(c.lo.x), math.Abs(c.hi.x), math.Abs(c.lo.y), math.Abs(c.hi.y))
	return max(far, z.scale*0x1p-30) * 0x1p-36
}

// rational recognises an n-fold zero at the simplest rational number in the rectangle.
func (z *finder) rational(c cell, n int) (found, bool) {
	if c.lo.y >= 0 || c.hi.y <= 0 {
		return found{}, false
	}
	return z.rationalIn(c.lo.x, c.hi.x, n)
}

func (z *finder) rationalIn(lo, hi float64, n int) (found, bool) {
	x := simplest(new(big.Rat).SetFloat64(lo), new(big.Rat).SetFloat64(hi))
	if x.Denom().BitLen() > 40 {
		return found{}, false
	}
	t, ok := z.f.taylor(x, n)
	if !ok {
		return found{}, false
	}
	for _, v := range t {
		if !v.IsZero() {
			return found{}, false
		}
	}
	return found{ratFloat(x), 0, 0, n, x}, true
}

// newton follows Newton's method for the (n−1)-th derivative from a point, to a zero or to the
// centre of n zeros that lie together.
func (z *finder) newton(x, y, size float64, n int) (float64, float64, bool) {
	for step := size; step > 0; {
		rho := max(step, z.scale*0x1p-40) * 0x1p-4
		dx, dy, ok := newtonStep(z.model(x, y, rho), rho, n)
		length := math.Hypot(dx, dy)
		if !ok || length > 2*step {
			return 0, 0, false
		}
		x, y = x+dx, y+dy
		if length < (math.Abs(x)+math.Abs(y))*0x1p-50 || length >= step/2 && step < z.scale*0x1p-30 {
			break
		}
		step = min(length, step*0.75)
	}
	return x, y, true
}

// enclose proves, by the n-th term of a model, a small disc with exactly n zeros around a point
// that newton found. For n = 1 this is the disc form of the test of Krawczyk.
func (z *finder) enclose(c cell, x, y float64, n int, ok bool) (found, bool) {
	if !ok {
		return found{}, false
	}
	if n > 1 {
		r := z.resolution(c)
		if math.Abs(y) < r {
			y = 0
		}
		// Zeros that lie apart show on a larger scale, at less cost.
		if _, ok := z.pellet(n, x, y, max(c.size()*0x1p-6, r)); !ok {
			return found{}, false
		}
		_, ok := z.pellet(n, x, y, r)
		return found{x, y, r, n, nil}, ok
	}
	r := max(math.Hypot(x, y)*0x1p-46, z.scale*0x1p-56)
	for range 6 {
		if math.Abs(y) < r {
			if s, ok := z.one(x, 0, r); ok {
				return s, true
			}
		}
		if s, ok := z.one(x, y, r); ok {
			return s, true
		}
		r *= 16
	}
	return found{}, false
}

// one proves exactly one zero in a disc.
func (z *finder) one(x, y, r float64) (found, bool) {
	if _, ok := z.pellet(1, x, y, r); !ok {
		return found{}, false
	}
	if y == 0 {
		if s, ok := z.rationalIn(x-r, x+r, 1); ok {
			return s, true
		}
	}
	return found{x, y, r, 1, nil}, true
}

// newtonStep is −a_{n−1}/(n a_n)·ρ.
func newtonStep(m model, rho float64, n int) (dx, dy float64, ok bool) {
	r0, i0, e0 := m.a[n-1].approx()
	r1, i1, e1 := m.a[n].approx()
	if r1 == 0 && i1 == 0 || math.Abs(float64(e0-e1)) > 900 && (r0 != 0 || i0 != 0) {
		return 0, 0, r0 == 0 && i0 == 0
	}
	d := -complex(r0, i0) / complex(r1, i1) * complex(math.Ldexp(rho, e0-e1)/float64(n), 0)
	return real(d), imag(d), !cmplx.IsNaN(d) && !cmplx.IsInf(d)
}
