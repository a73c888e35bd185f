package series

// Rigorous complex arithmetic. A Disc is a set |z − mid| ≤ rad; every operation returns a
// disc that holds all results, rounding included. Discs are chosen over rectangles because
// multiplication, the commonest operation, then costs one product of the middles and does
// not wrap. Middles have float64 parts with a common exponent as long as 53 bits suffice,
// and big.Float parts beyond; the code that decides raises the precision, never lowers it.
// [Johansson2017], [GargantiniHenrici1971]

import (
	"fmt"
	"math"
	"math/big"
)

// Disc is an enclosure of a complex number. It is immutable; the zero value is exactly 0.
type Disc struct {
	re, im float64 // the middle is (re + i im)·2^exp, if wide is nil
	exp    int
	wide   *wideMid
	rad    mag
}

type wideMid struct{ re, im *big.Float }

// narrowBits is the precision of middles that are kept in float64.
const narrowBits = 53

// Arith is complex arithmetic with a given precision of middles, in bits, at least 53. It is
// safe for concurrent use.
type Arith struct {
	prec uint
	kept *expTable
}

// NewArith returns arithmetic with at least bits bits.
func NewArith(bits int) Arith { return Arith{uint(max(bits, narrowBits)), newExpTable()} }

// flush is the size below which one part of a narrow middle is moved into the radius, so
// that no product of parts underflows.
const flush = 0x1p-200

// narrow64 normalises a middle.
func narrow64(re, im float64, exp int, rad mag) Disc {
	_, e := math.Frexp(max(math.Abs(re), math.Abs(im)))
	if re == 0 && im == 0 {
		return Disc{rad: rad}
	}
	re, im = math.Ldexp(re, -e), math.Ldexp(im, -e)
	exp += e
	if math.Abs(re) < flush && re != 0 {
		re, rad = 0, rad.add(mag{0.5, exp - 198})
	}
	if math.Abs(im) < flush && im != 0 {
		im, rad = 0, rad.add(mag{0.5, exp - 198})
	}
	return Disc{re: re, im: im, exp: exp, rad: rad}
}

// parts is the middle as big floats, exactly.
func (d Disc) parts() (re, im *big.Float) {
	if d.wide != nil {
		return d.wide.re, d.wide.im
	}
	lift := func(x float64) *big.Float {
		f := new(big.Float).SetPrec(narrowBits).SetFloat64(x)
		return f.SetMantExp(f, d.exp)
	}
	return lift(d.re), lift(d.im)
}

// approx is the middle as (re + i im)·2^exp with parts below 1 in absolute value, each
// right to 2⁻⁵² of the larger one.
func (d Disc) approx() (re, im float64, exp int) {
	if d.wide == nil {
		return d.re, d.im, d.exp
	}
	re0, im0 := d.wide.re, d.wide.im
	switch {
	case re0.Sign() == 0 && im0.Sign() == 0:
		return 0, 0, 0
	case re0.Sign() == 0:
		exp = im0.MantExp(nil)
	case im0.Sign() == 0:
		exp = re0.MantExp(nil)
	default:
		exp = max(re0.MantExp(nil), im0.MantExp(nil))
	}
	re, _ = new(big.Float).SetMantExp(re0, -exp).Float64()
	im, _ = new(big.Float).SetMantExp(im0, -exp).Float64()
	return re, im, exp
}

// midUp and midDown bound the absolute value of the middle.
func (d Disc) midUp() mag {
	re, im, e := d.approx()
	return makeMag(math.Sqrt(re*re+im*im)*(1+0x1p-48), e)
}

func (d Disc) midDown() mag {
	re, im, e := d.approx()
	return makeMag(math.Sqrt(re*re+im*im)*(1-0x1p-48), e)
}

// norm is an upper bound of |z| over the disc.
func (d Disc) norm() mag { return d.midUp().add(d.rad) }

// isExactZero reports whether the disc is the point 0.
func (d Disc) isExactZero() bool {
	if d.rad.m != 0 {
		return false
	}
	if d.wide != nil {
		return d.wide.re.Sign() == 0 && d.wide.im.Sign() == 0
	}
	return d.re == 0 && d.im == 0
}

// ExcludesZero reports whether 0 is proved to lie outside.
func (d Disc) ExcludesZero() bool { return d.rad.less(d.midDown()) }

// Mid is the middle, exactly.
func (d Disc) Mid() (re, im *big.Float) {
	r, i := d.parts()
	return new(big.Float).Copy(r), new(big.Float).Copy(i)
}

// Radius is the radius, rounded up to a float64.
func (d Disc) Radius() float64 { return d.rad.float() }

// Contains reports whether the point re + i im lies inside; exactly.
func (d Disc) Contains(re, im *big.Rat) bool {
	r, i := d.parts()
	x, _ := r.Rat(nil)
	y, _ := i.Rat(nil)
	x, y = x.Sub(x, re), y.Sub(y, im)
	q, _ := d.rad.exact().Rat(nil)
	x, y, q = x.Mul(x, x), y.Mul(y, y), q.Mul(q, q)
	return x.Add(x, y).Cmp(q) <= 0
}

// String writes middle and radius for tests and messages.
func (d Disc) String() string {
	re, im := d.parts()
	return fmt.Sprintf("%s + %si ± %.3g", re.Text('g', 17), im.Text('g', 17), d.rad.float())
}

// enlarge adds r to the radius.
func (d Disc) enlarge(r mag) Disc { d.rad = d.rad.add(r); return d }

// exactMid is the disc with no radius.
func (d Disc) exactMid() Disc { d.rad = mag{}; return d }

// disc rounds given parts to the precision of a.
func (a Arith) disc(re, im *big.Float, rad mag) Disc {
	if a.prec == narrowBits {
		w := Disc{wide: &wideMid{re, im}}
		x, y, e := w.approx()
		// Each part was rounded by at most 2⁻⁵³ of a number below 1.
		if lost := re.MinPrec() > narrowBits || im.MinPrec() > narrowBits; lost {
			rad = rad.add(mag{0.5, e - 50})
		}
		return narrow64(x, y, e, rad)
	}
	r := new(big.Float).SetPrec(a.prec).Set(re)
	i := new(big.Float).SetPrec(a.prec).Set(im)
	d := Disc{wide: &wideMid{r, i}, rad: rad}
	if r.Acc() != big.Exact || i.Acc() != big.Exact {
		d.rad = d.rad.add(d.midUp().mul(a.ulp()))
	}
	return d
}

// ulp bounds the relative error of a few roundings.
func (a Arith) ulp() mag { return mag{0.5, 4 - int(a.prec)} }

// Rat is the point x + iy.
func (a Arith) Rat(x, y *big.Rat) Disc {
	f := func(q *big.Rat) *big.Float { return new(big.Float).SetPrec(a.prec + 2).SetRat(q) }
	re, im := f(x), f(y)
	d := a.disc(re, im, mag{})
	if re.Acc() != big.Exact || im.Acc() != big.Exact {
		d.rad = d.rad.add(d.midUp().mul(a.ulp()))
	}
	return d
}

// Point is the point x + iy, exactly, if the parts fit the precision.
func (a Arith) Point(x, y float64) Disc {
	return a.disc(new(big.Float).SetFloat64(x), new(big.Float).SetFloat64(y), mag{})
}

// mag is the point x, rounded.
func (a Arith) mag(x mag) Disc { return a.disc(x.exact(), new(big.Float), mag{}) }

// Add is u + v.
func (a Arith) Add(u, v Disc) Disc {
	switch {
	case u.isExactZero():
		return v
	case v.isExactZero():
		return u
	case u.wide != nil || v.wide != nil || a.prec > narrowBits:
		return a.addWide(u, v)
	}
	rad := u.rad.add(v.rad)
	if u.exp < v.exp {
		u, v = v, u
	}
	if u.re == 0 && u.im == 0 {
		u.exp = v.exp // the middle is 0, whatever its exponent
	}
	shift := v.exp - u.exp
	if shift < -120 {
		return narrow64(u.re, u.im, u.exp, rad.add(v.midUp()))
	}
	re, im := u.re+math.Ldexp(v.re, shift), u.im+math.Ldexp(v.im, shift)
	if re == 0 && im == 0 {
		return Disc{rad: rad}
	}
	return narrow64(re, im, u.exp, rad.add(makeMag((math.Abs(re)+math.Abs(im))*0x1p-52, u.exp)))
}

func (a Arith) addWide(u, v Disc) Disc {
	ur, ui := u.parts()
	vr, vi := v.parts()
	re := new(big.Float).SetPrec(a.prec).Add(ur, vr)
	im := new(big.Float).SetPrec(a.prec).Add(ui, vi)
	d := Disc{wide: &wideMid{re, im}, rad: u.rad.add(v.rad)}
	if re.Acc() != big.Exact || im.Acc() != big.Exact {
		d.rad = d.rad.add(d.midUp().mul(a.ulp()))
	}
	return d
}

// Neg is −u.
func (a Arith) Neg(u Disc) Disc {
	if u.wide != nil {
		u.wide = &wideMid{new(big.Float).Neg(u.wide.re), new(big.Float).Neg(u.wide.im)}
		return u
	}
	u.re, u.im = -u.re, -u.im
	return u
}

// Sub is u − v.
func (a Arith) Sub(u, v Disc) Disc { return a.Add(u, a.Neg(v)) }

// Mul is u·v.
func (a Arith) Mul(u, v Disc) Disc {
	if u.isExactZero() || v.isExactZero() {
		return Disc{}
	}
	um, vm := u.midUp(), v.midUp()
	rad := um.mul(v.rad).add(vm.mul(u.rad)).add(u.rad.mul(v.rad))
	if u.wide == nil && v.wide == nil && a.prec == narrowBits {
		re, im := u.re*v.re-u.im*v.im, u.re*v.im+u.im*v.re
		if u.im != 0 || v.im != 0 || u.re != 0.5 && v.re != 0.5 {
			rad = rad.add(um.mul(vm).mul(mag{0.5, -49}))
		}
		return narrow64(re, im, u.exp+v.exp, rad)
	}
	ur, ui := u.parts()
	vr, vi := v.parts()
	m := func() *big.Float { return new(big.Float).SetPrec(a.prec) }
	re := m().Mul(ur, vr)
	im := m().Mul(ur, vi)
	if ui.Sign() != 0 {
		re.Sub(re, m().Mul(ui, vi))
		im.Add(im, m().Mul(ui, vr))
	}
	return Disc{wide: &wideMid{re, im}, rad: rad.add(um.mul(vm).mul(a.ulp()))}
}

// scale2 is u·2^k, exactly.
func (a Arith) scale2(u Disc, k int) Disc {
	if u.rad.m != 0 {
		u.rad.e += k
	}
	if u.wide == nil {
		u.exp += k
		return u
	}
	u.wide = &wideMid{new(big.Float).SetMantExp(u.wide.re, k), new(big.Float).SetMantExp(u.wide.im, k)}
	return u
}

// Inv is 1/u, and false if the disc does not exclude 0.
//
// 1/z − 1/m = (m − z)/(z m), so the radius is rad/(|m|(|m| − rad)).
func (a Arith) Inv(u Disc) (Disc, bool) {
	if !u.ExcludesZero() {
		return Disc{}, false
	}
	re, im := u.parts()
	m := func() *big.Float { return new(big.Float).SetPrec(2*a.prec + 64) }
	n := m().Add(m().Mul(re, re), m().Mul(im, im))
	x, y := m().Quo(re, n), m().Neg(m().Quo(im, n))
	low := u.midDown()
	rad := u.rad.quo(low).quo(low.subDown(u.rad))
	d := a.disc(x, y, rad)
	return d.enlarge(d.midUp().mul(a.ulp())), true
}

// Div is u/v, and false if v does not exclude 0.
func (a Arith) Div(u, v Disc) (Disc, bool) {
	w, ok := a.Inv(v)
	return a.Mul(u, w), ok
}
