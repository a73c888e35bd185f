package series

// The argument principle as a proof. A closed curve is covered by discs on each of which the
// function is proved to stay within nine tenths of |a| around a number a ≠ 0. Neighbouring
// discs share a point of the curve, so from one a to the next, through the value at that
// point, the argument changes by less than 2·arcsin(0.9) < 2.3 < π: it is the principal
// value, and the sum over the curve is 2π times the number of zeros inside. Rounding errors
// of the sum are below 10⁻⁶, so the integer is certain. [Henrici1974], section 4.10;
// [DellnitzSchuetzeZheng2002] for the subdivision.

import (
	"fmt"
	"math"
	"math/cmplx"
)

// stuck is the panic of a finder that cannot go on.
type stuck struct{ reason string }

// finder looks for the zeros of one function.
type finder struct {
	f     node
	ev    *evaluator
	left  int     // models that may still be taken
	scale float64 // length of the region, below which details are measured
}

// maxBits is the highest precision tried.
const maxBits = 1 << 11

// model takes one model.
func (z *finder) model(x, y, rho float64) model {
	if z.left <= 0 {
		panic(stuck{"the limit on evaluations was reached"})
	}
	z.left--
	return z.ev.at(z.f, z.ev.Point(x, y), makeMag(rho, 0))
}

// pellet tries to prove exactly k zeros in a disc, with as many bits as it takes, and returns
// the last model.
func (z *finder) pellet(k int, x, y, rho float64) (model, bool) {
	for {
		m := z.model(x, y, rho)
		proved, rounding, lead := m.pellet(k)
		if proved {
			if z.ev.prec > narrowBits && rounding.mul(mag{0.5, int(z.ev.prec)/2 + 8}).less(lead) {
				z.ev.prec = max(z.ev.prec/2, narrowBits)
			}
			return m, true
		}
		var rest mag
		for j, d := range m.a {
			if j != k {
				rest = rest.add(d.midUp())
			}
		}
		limited := !rounding.mul(mag{0.5, 4}).less(lead) && !rounding.mul(mag{0.5, 3}).less(rest.add(m.eps))
		if !limited || z.ev.prec >= maxBits {
			return m, false
		}
		z.ev.prec = min(2*z.ev.prec, maxBits)
	}
}

// curve gives for 0 ≤ u < v ≤ 1 a disc that holds the piece of a curve from u to v.
type curve func(u, v float64) (x, y, rho float64)

// uncovered is a piece of a curve on which the function could not be kept from zero.
type uncovered struct{ x, y, rho float64 }

// cover follows a curve by zero-free discs and returns their values a, scaled; or the piece
// that would need a disc smaller than least.
func (z *finder) cover(path curve, least float64) ([]complex128, *uncovered) {
	var values []complex128
	for u, h := 0.0, 1.0/16; u < 1; {
		v := min(u+h, 1)
		if 1-v < h/8 {
			v = 1
		}
		x, y, rho := path(u, v)
		m, ok := z.pellet(0, x, y, rho)
		if !ok {
			if rho < least {
				return nil, &uncovered{x, y, rho}
			}
			h = (v - u) / 2
			continue
		}
		re, im, _ := m.a[0].approx()
		values = append(values, complex(re, im))
		u, h = v, h*1.6
	}
	return values, nil
}

// turning is Σ of the changes of argument from each value to the next.
func turning(values []complex128) float64 {
	var sum float64
	for i := 1; i < len(values); i++ {
		sum += cmplx.Phase(values[i] / values[i-1])
	}
	return sum
}

// turns is a whole number of turns.
func turns(sum float64) int {
	n := math.Round(sum / (2 * math.Pi))
	if math.Abs(sum/(2*math.Pi)-n) > 0.01 {
		panic(stuck{fmt.Sprintf("the argument changes by %g turns along a closed curve", sum/(2*math.Pi))})
	}
	return int(n)
}

// circle is the circle around (x, y); slack covers its rounding and that of x, y and r.
func circle(x, y, r float64) curve {
	slack := (math.Abs(x) + math.Abs(y) + r) * 1e-13
	return func(u, v float64) (float64, float64, float64) {
		sin, cos := math.Sincos(math.Pi * (u + v))
		return x + r*cos, y + r*sin, r*math.Pi*(v-u)*(1+1e-9) + slack
	}
}

// around counts the zeros inside a circle. Around a point of the real axis the lower half
// mirrors the upper one, as the function is real on the axis.
func (z *finder) around(x, y, r float64) (int, *uncovered) {
	path := circle(x, y, r)
	least := max(r*0x1p-34, (math.Abs(x)+math.Abs(y)+r)*1e-12)
	if y != 0 {
		values, gap := z.cover(path, least)
		if gap != nil {
			return 0, gap
		}
		return turns(turning(append(values, values[0]))), nil
	}
	half := func(u, v float64) (float64, float64, float64) { return path(u/2, v/2) }
	values, gap := z.cover(half, least)
	if gap != nil {
		return 0, gap
	}
	from, to := z.value(point{x + r, 0}), z.value(point{x - r, 0})
	return turns(2 * turning(append(append([]complex128{from}, values...), to))), nil
}

// point is a point of the plane.
type point struct{ x, y float64 }

// segment is the change of argument from p to q; false if the function cannot be kept from
// zero with discs of at least the given size, or of what rounding leaves.
func (z *finder) segment(p, q point, least float64) (float64, *uncovered) {
	slack := (math.Abs(p.x) + math.Abs(p.y) + math.Abs(q.x) + math.Abs(q.y)) * 1e-14
	half := math.Hypot(q.x-p.x, q.y-p.y) / 2
	path := func(u, v float64) (float64, float64, float64) {
		w := (u + v) / 2
		return p.x + (q.x-p.x)*w, p.y + (q.y-p.y)*w, half*(v-u)*(1+1e-9) + slack
	}
	values, gap := z.cover(path, max(least, 4*slack))
	if gap != nil {
		return 0, gap
	}
	from, to := z.value(p), z.value(q)
	return turning(append(append([]complex128{from}, values...), to)), nil
}

// value is the function at a point known to be no zero, scaled, to 30 bits or more.
func (z *finder) value(p point) complex128 {
	for {
		m := z.model(p.x, p.y, z.scale*0x1p-100)
		if m.norm().isZero() {
			panic(stuck{"the function vanishes where it was proved not to"})
		}
		err := m.normFrom(1).add(m.eps).add(m.a[0].rad)
		if err.mul(mag{0.5, 31}).less(m.a[0].midDown()) {
			re, im, _ := m.a[0].approx()
			return complex(re, im)
		}
		if z.ev.prec >= maxBits {
			panic(stuck{"a value needs more bits than the limit allows"})
		}
		z.ev.prec *= 2
	}
}
