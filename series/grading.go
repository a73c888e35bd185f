package series

// Weights. A generator is homogeneous if it scales as a power of λ; a root or a function of
// an argument that is not homogeneous has to be expanded.

import (
	"fmt"
	"slices"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// Grading gives weights to generators of a field. Jets of a weighted function weigh what the
// function does. It is not safe for concurrent use, as its field is not.
type Grading struct {
	f       *field.Field
	gens    []field.Gen
	weights map[field.Gen]int
	jets    map[*field.FreeFunc]int
	grades  map[field.Gen]grade
}

// grade is the weight of a generator that is homogeneous.
type grade struct {
	weight      int
	homogeneous bool
}

// Small is the grading in which every given generator is small, of weight 1. It fails if a
// relation replaces one of them, or if one is a root or a function of other quantities.
func Small(f *field.Field, small []field.Gen) (*Grading, error) {
	return newGrading(f, small, 1)
}

// LargeScales is the grading for k → 0: powers of k.
func LargeScales(f *field.Field, k field.Gen) (*Grading, error) {
	return newGrading(f, []field.Gen{k}, 1)
}

// SmallScales is the grading for k → ∞: powers of 1/k, so that k weighs −1.
func SmallScales(f *field.Field, k field.Gen) (*Grading, error) {
	return newGrading(f, []field.Gen{k}, -1)
}

func newGrading(f *field.Field, gens []field.Gen, weight int) (*Grading, error) {
	g := &Grading{
		f: f, weights: map[field.Gen]int{}, jets: map[*field.FreeFunc]int{},
		grades: map[field.Gen]grade{},
	}
	for _, x := range gens {
		in := f.Info(x)
		switch {
		case in.Kind == field.Root || in.Kind == field.Elementary:
			return nil, fmt.Errorf("%v depends on other quantities and cannot be a parameter of a series", f.Raw(x))
		case in.Order > 0 || slices.ContainsFunc(in.Index, func(n int) bool { return n > 0 }):
			return nil, fmt.Errorf("the derivative %v cannot be a parameter of a series by itself", f.Raw(x))
		case !f.Gen(x).Equal(f.Raw(x)):
			return nil, fmt.Errorf("%s is fixed by a relation, as %v, and cannot be a parameter of a series", in.Name, f.Gen(x))
		}
		if _, twice := g.weights[x]; twice {
			continue
		}
		g.gens = append(g.gens, x)
		g.weights[x] = weight
		if in.Kind == field.FreeFunction {
			g.jets[in.Fn] = weight
		}
	}
	return g, nil
}

// Field is the field of the coefficients.
func (g *Grading) Field() *field.Field { return g.f }

// Gens lists the generators that were given weights.
func (g *Grading) Gens() []field.Gen { return append([]field.Gen(nil), g.gens...) }

// weighted is the weight of a generator that has one of its own: one that was given a
// weight, or a jet of such a one.
func (g *Grading) weighted(x field.Gen) (int, bool) {
	in := g.f.Info(x)
	if in.Kind == field.FreeFunction {
		w, ok := g.jets[in.Fn]
		return w, ok
	}
	w, ok := g.weights[g.f.Base(x)]
	return w, ok
}

// gradeOf finds the weight of any generator.
func (g *Grading) gradeOf(x field.Gen) grade {
	if gr, ok := g.grades[x]; ok {
		return gr
	}
	gr := g.findGrade(x)
	g.grades[x] = gr
	return gr
}

func (g *Grading) findGrade(x field.Gen) grade {
	in := g.f.Info(x)
	w, _ := g.weighted(x)
	switch in.Kind {
	case field.FreeFunction:
		for _, arg := range in.Fn.Args {
			if !g.scaleFree(arg) {
				return grade{}
			}
		}
	case field.Root:
		aw, ok := g.polyGrade(in.Arg.Num())
		return grade{aw / 2, ok && aw%2 == 0}
	case field.Elementary:
		return grade{0, g.scaleFree(in.Arg)}
	}
	return grade{w, true}
}

// scaleFree reports whether e is homogeneous of weight 0.
func (g *Grading) scaleFree(e field.Elem) bool {
	n, err := e.Normal()
	if err != nil {
		n = e
	}
	w, ok := g.elemGrade(n)
	return ok && w == 0
}

// elemGrade is the weight of e if e is homogeneous. Zero is homogeneous of weight 0.
func (g *Grading) elemGrade(e field.Elem) (int, bool) {
	flat := true
	for _, x := range e.Gens() {
		gr := g.gradeOf(x)
		if !gr.homogeneous {
			return 0, false
		}
		flat = flat && gr.weight == 0
	}
	if flat || e.IsZero() {
		return 0, true
	}
	n, nok := g.polyGrade(e.Num())
	d, dok := g.polyGrade(e.Den())
	return n - d, nok && dok
}

// polyGrade is the weight of p if p is homogeneous.
func (g *Grading) polyGrade(p poly.Poly) (w int, ok bool) {
	first := true
	for mono := range p.Terms() {
		v, ok := g.monoGrade(mono)
		if !ok || !first && v != w {
			return 0, false
		}
		w, first = v, false
	}
	return w, true
}

func (g *Grading) monoGrade(mono []poly.Power) (w int, ok bool) {
	for _, m := range mono {
		gr := g.gradeOf(m.Var)
		if !gr.homogeneous {
			return 0, false
		}
		w += gr.weight * int(m.Exp)
	}
	return w, true
}
