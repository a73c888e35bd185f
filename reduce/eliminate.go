package reduce

// The elimination: pivots while there are any, then hidden constraints, which make new
// pivots, until the leading matrix is regular.

import (
	"fmt"
	"strings"

	"remnant/expr/field"
)

// elimination is the state of a run.
type elimination struct {
	fields  []string // of the model, in declared order
	now     System
	steps   []Step
	keep    string // the field asked for, under its present name; "" if none was
	weights []int  // of what remains, once it has a regular leading matrix
	taken   map[string]bool
}

// GaugeError says that 𝒟 is singular for every k: a direction in field space is free.
type GaugeError struct {
	Direction []Addend // one entry for each field of the model that moves, acting on ξ
}

func (e *GaugeError) Error() string { return "the action has a gauge direction" }

// eliminate runs the elimination on s, through names for the coefficients where s is large.
// count is the independent count of solutions, against which names are checked; fields are
// those of the model, keep the one to keep or "".
func eliminate(s System, wave field.Elem, count Count, fields []string, keep string) (*elimination, error) {
	fresh := func(s System) *elimination {
		e := &elimination{now: s, keep: keep, fields: fields, taken: map[string]bool{}}
		for _, n := range append(append([]string{}, fields...), s.Names...) {
			e.taken[n] = true
		}
		return e
	}
	if s.D.Terms() > nameAbove && count.Gauge == 0 {
		if named, n, ok := nameCoefficients(s, wave); ok {
			e := fresh(named)
			if e.run() == nil && 2*half(e.weights) == count.Solutions && e.putBack(n) {
				return e, nil
			}
		}
	}
	e := fresh(s)
	return e, e.run()
}

// run eliminates until only propagating fields are left.
func (e *elimination) run() error {
	for len(e.now.Names) > 0 {
		keep := e.now.index(e.keep)
		if g, ok := e.gaugeRow(); ok {
			return e.gaugeError(g)
		}
		if e.onePivot(keep) {
			continue
		}
		v, q, weights, found := e.now.hiddenVector(keep)
		if !found {
			e.weights = weights
			if keep >= 0 && half(weights) == 0 && e.onePivot(-1) {
				continue // nothing propagates, the kept field no more than the others
			}
			if v, q, ok := e.now.velocityConstraint(keep); ok {
				e.apply(e.now.redefine(v, q, make([]int, len(v)), e.rename))
				continue
			}
			return nil
		}
		e.apply(e.now.redefine(v, q, weights, e.rename))
	}
	return nil
}

// half is ½ deg Det 𝒟 = Σmᵢ for a regular leading matrix: the degrees of freedom.
func half(weights []int) int {
	sum := 0
	for _, w := range weights {
		sum += w
	}
	return sum
}

// onePivot eliminates by the best pivot that does not involve field keep.
func (e *elimination) onePivot(keep int) bool {
	p, ok := e.now.choosePivot(keep)
	if ok {
		e.apply(e.now.solve(p))
	}
	return ok
}

// solve eliminates by the pivot p.
func (s System) solve(p pivot) Step {
	if p.q < 0 {
		s.K.Budget().Stage("eliminating " + s.Names[p.p])
		return s.solveAuxiliary(p.p)
	}
	s.K.Budget().Stage("eliminating " + s.Names[p.p] + " and " + s.Names[p.q])
	return s.solveMultiplier(p.p, p.q)
}

func (e *elimination) apply(s Step) {
	for _, sol := range s.Solutions {
		if s.Kind == Redefined && sol.Name == e.keep {
			e.keep = sol.Sum[0].Name
		}
	}
	e.steps = append(e.steps, s)
	e.now = s.after
}

// rename gives a redefined field the next free number: zeta, zeta_1, zeta_2.
func (e *elimination) rename(name string) string {
	base := name
	if i := strings.LastIndexByte(name, '_'); i > 0 && e.taken[name[:i]] {
		base = name[:i]
	}
	for n := 1; ; n++ {
		if c := fmt.Sprintf("%s_%d", base, n); !e.taken[c] {
			e.taken[c] = true
			return c
		}
	}
}

func (e *elimination) gaugeRow() (int, bool) {
	for i := range e.now.Names {
		if e.now.rowVanishes(i) {
			return i, true
		}
	}
	return 0, false
}

// gaugeError expresses the free direction in the fields that the model declares.
func (e *elimination) gaugeError(i int) error {
	xi := e.now.Names[i]
	var dir []Addend
	for _, name := range e.fields {
		for _, a := range Express(e.now.K, e.steps, name) {
			if a.Name == xi && !a.Coef.IsZero() {
				dir = append(dir, Addend{a.Coef, name})
			}
		}
	}
	return &GaugeError{dir}
}
