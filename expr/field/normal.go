package field

// Bringing an element that was built earlier up to date with the relations, and replacing
// generators by values.

import (
	"fmt"

	"remnant/expr/poly"
)

// ErrZeroDivisor is returned where a denominator vanishes, by the relations or at a point.
type ErrZeroDivisor struct{ Factor Elem }

func (e *ErrZeroDivisor) Error() string {
	return fmt.Sprintf("division by %v, which is zero", e.Factor)
}

// Normal is e modulo the relations as they stand now. It fails with *ErrZeroDivisor if the
// denominator is zero modulo them.
func (e Elem) Normal() (Elem, error) {
	if e.f == nil {
		return e, nil
	}
	return e.Substitute(func(g Gen) (Elem, bool) {
		v := e.f.value(g)
		return v, !(v.isPoly() && v.num.Equal(poly.FromVar(g)))
	})
}

// normalOrSelf is e modulo the relations, and e where a denominator vanishes.
func (e Elem) normalOrSelf() Elem {
	if n, err := e.Normal(); err == nil {
		return n
	}
	return e
}

// Substitute replaces generators by elements of the same field, all at once; to says by
// what. Roots and functions of replaced generators are rebuilt from their arguments. It
// fails with *ErrZeroDivisor if the denominator becomes zero.
func (e Elem) Substitute(to func(Gen) (Elem, bool)) (Elem, error) {
	if e.f == nil {
		return e, nil
	}
	f := e.f
	s := substitution{f: f, to: to, memo: map[Gen]replacement{}}
	e = e.live()
	num, err := s.poly(e.num)
	if err != nil {
		return Elem{}, err
	}
	num = num.Mul(Elem{f: f, num: poly.FromInt(1), den: denominator{int: e.den.int}})
	for _, p := range e.den.pow {
		q, err := s.poly(f.factors[p.id].p)
		if err != nil {
			return Elem{}, err
		}
		if q.IsZero() {
			return Elem{}, &ErrZeroDivisor{Elem{f: f, num: f.factors[p.id].p}}
		}
		if num.IsZero() {
			continue
		}
		num = num.Mul(q.Pow(-int(p.exp)))
	}
	return num, nil
}

type replacement struct {
	elem Elem
	is   bool
}

type substitution struct {
	f    *Field
	to   func(Gen) (Elem, bool)
	memo map[Gen]replacement
}

func (s *substitution) gen(g Gen) (replacement, error) {
	if r, ok := s.memo[g]; ok {
		return r, nil
	}
	var r replacement
	r.elem, r.is = s.to(g)
	if gen := s.f.gens[g]; !r.is && (gen.Kind == Root || gen.Kind == Elementary) {
		arg, name := gen.Arg, gen.Name
		if name == "cos" {
			arg = gen.Angle
		}
		changed := false
		for _, h := range arg.Gens() {
			rh, err := s.gen(h)
			if err != nil {
				return r, err
			}
			changed = changed || rh.is
		}
		if changed {
			v, err := arg.Substitute(s.to)
			if err != nil {
				return r, err
			}
			if r.elem, err = s.f.Elementary(name, v); err != nil {
				return r, err
			}
			r.is = true
		}
	}
	s.memo[g] = r
	return r, nil
}

func (s *substitution) poly(p poly.Poly) (Elem, error) {
	for _, g := range p.Vars() {
		r, err := s.gen(g)
		if err != nil {
			return Elem{}, err
		}
		if !r.is {
			continue
		}
		var out Elem
		c := p.CoeffsIn(g)
		for i := len(c) - 1; i >= 0; i-- {
			out = out.Mul(r.elem)
			if c[i].IsZero() {
				continue
			}
			part, err := s.poly(c[i])
			if err != nil {
				return Elem{}, err
			}
			out = out.Add(part)
		}
		return out, nil
	}
	return Elem{f: s.f, num: p}, nil
}
