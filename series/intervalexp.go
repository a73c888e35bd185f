package series

// The exponential of a disc, and through it sine and cosine. An argument is brought close to
// 0 by taking off multiples of 1/16 and i/16, whose exponentials are computed once by
// squaring and kept.

import (
	"math"
	"math/big"
	"sync"
)

// expTable keeps exponentials of multiples of 1/16 and i/16.
type expTable struct {
	mu  sync.Mutex
	val map[expKey]Disc
}

type expKey struct {
	prec uint
	n    int
	imag bool
}

// maxKept bounds the multiples of 1/16 that are kept, and so the table.
const maxKept = 1 << 14

func newExpTable() *expTable { return &expTable{val: map[expKey]Disc{}} }

// maxExpBits bounds arguments by 2^maxExpBits, so that exponents of results and of their
// products stay far from the limits of big.Float.
const maxExpBits = 22

// Exp is e^u. Where |u| passes 2^maxExpBits only a bound is returned.
func (a Arith) Exp(u Disc) Disc {
	if u.midUp().e > maxExpBits {
		return Disc{rad: u.norm().exp()}
	}
	m := a.expPoint(u.exactMid())
	return m.enlarge(m.norm().mul(u.rad.expm1()))
}

// expPoint is e^u for a u without radius. The differences are exact: a multiple of 1/16 is
// taken from a number whose last bit the difference shares.
func (a Arith) expPoint(u Disc) Disc {
	re, im := u.parts()
	x, y := sixteenths(re), sixteenths(im)
	if a.kept == nil || max(x, -x, y, -y) > maxKept {
		return a.expSquaring(u)
	}
	less := func(f *big.Float, n int) *big.Float {
		t := new(big.Float).SetPrec(max(f.Prec(), narrowBits) + 40)
		return t.Sub(f, big.NewFloat(float64(n)/16))
	}
	out := a.expSeries(a.disc(less(re, x), less(im, y), mag{}), 4)
	if x != 0 {
		out = a.Mul(out, a.keptExp(x, false))
	}
	if y != 0 {
		out = a.Mul(out, a.keptExp(y, true))
	}
	return out
}

// sixteenths is 16x, rounded.
func sixteenths(x *big.Float) int {
	f, _ := x.Float64()
	return int(math.Round(f * 16))
}

// keptExp is exp(n/16) or exp(in/16).
func (a Arith) keptExp(n int, imag bool) Disc {
	k := expKey{a.prec, n, imag}
	a.kept.mu.Lock()
	defer a.kept.mu.Unlock()
	d, ok := a.kept.val[k]
	if !ok {
		u := a.Point(float64(n)/16, 0)
		if imag {
			u = a.Point(0, float64(n)/16)
		}
		d = a.expSquaring(u)
		a.kept.val[k] = d
	}
	return d
}

// expSquaring is e^u as the exponential of u/2^k, squared k times, with guard bits.
func (a Arith) expSquaring(u Disc) Disc {
	k := max(0, u.midUp().e+8)
	w := Arith{a.prec + uint(k) + 16, nil}
	re, im := u.parts()
	out := w.expSeries(w.scale2(w.disc(re, im, mag{}), -k), 8)
	for range k {
		out = w.Mul(out, out)
	}
	re, im = out.parts()
	return a.disc(re, im, out.rad)
}

// expSeries is e^z by its Taylor series, for |z| < 2^(1−bits), bits ≥ 4:
// 1 + z(1 + z/2(1 + z/3(…))) from the innermost bracket.
func (a Arith) expSeries(z Disc, bits int) Disc {
	terms, rest := 0, mag{0.5, 1}
	for ; rest.e > -int(a.prec)-4; terms++ { // rest bounds |z|^terms/terms!
		rest = rest.mul(mag{0.5, 2 - bits}).quo(makeMag(float64(terms+1), 0))
	}
	one := a.Point(1, 0)
	out := one
	for i := terms - 1; i >= 1; i-- {
		out = a.Add(one, a.Mul(out, a.Mul(z, a.reciprocalInt(i))))
	}
	// The terms left out are below twice the first of them.
	return out.enlarge(rest.mul(mag{0.5, 2}))
}

// reciprocalInt is 1/n.
func (a Arith) reciprocalInt(n int) Disc {
	if a.prec == narrowBits {
		x := 1 / float64(n)
		return narrow64(x, 0, 0, makeMag(x*0x1p-52, 0))
	}
	return a.Rat(big.NewRat(1, int64(n)), new(big.Rat))
}

// Cos is cos u = (e^{iu} + e^{−iu})/2.
func (a Arith) Cos(u Disc) Disc {
	iu := a.Mul(a.Point(0, 1), u)
	return a.scale2(a.Add(a.Exp(iu), a.Exp(a.Neg(iu))), -1)
}

// Sin is sin u = (e^{iu} − e^{−iu})/2i.
func (a Arith) Sin(u Disc) Disc {
	iu := a.Mul(a.Point(0, 1), u)
	return a.Mul(a.Point(0, -1), a.scale2(a.Sub(a.Exp(iu), a.Exp(a.Neg(iu))), -1))
}
