package reduce

// The record of an elimination.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
)

// StepKind tells what a step did.
type StepKind uint8

const (
	Auxiliary  StepKind = iota // a field without derivatives in its own diagonal entry was solved
	Multiplier                 // a multiplier and its partner were solved together
	Redefined                  // fields were redefined to expose a hidden constraint
	Exchanged                  // a new variable that holds the velocity took the mode's place
)

// Addend is Coef acting on the field Name.
type Addend struct {
	Coef oper.Oper
	Name string
}

// Solution gives a field that is gone in terms of those that stood when it went.
type Solution struct {
	Name     string
	Equation string // the field whose equation of motion gave it; "" for a redefinition
	Sum      []Addend
}

// Step is one step of the elimination.
type Step struct {
	Kind      StepKind
	Solutions []Solution
	Nonzero   []field.Elem // factors assumed not to vanish
	after     System       // what stands after the step, under names if those are not nil
	names     *naming
}

// After is the system that stands after the step. Where coefficients were named, their values
// are put back when it is asked for.
func (s Step) After() System {
	if s.names == nil {
		return s.after
	}
	out, err := s.names.system(s.after)
	if err != nil {
		panic(err) // the pivots, which alone are divided by, were found not to vanish
	}
	return out
}

func (s System) combination(row []oper.Oper, skip ...int) []Addend {
	var out []Addend
	for i, a := range row {
		gone := a.IsZero()
		for _, j := range skip {
			gone = gone || i == j
		}
		if !gone {
			out = append(out, Addend{a, s.Names[i]})
		}
	}
	return out
}

// Express gives the field name, and through it every field that was eliminated, in terms of
// what remains: operators on the names that no step removed.
func Express(k *field.Field, steps []Step, name string) []Addend {
	sum := []Addend{{oper.New(k.Int(1)), name}}
	for _, st := range steps {
		for _, sol := range st.Solutions {
			sum = replace(sum, sol)
		}
	}
	return sum
}

func replace(sum []Addend, sol Solution) []Addend {
	var out []Addend
	add := func(a Addend) {
		for i := range out {
			if out[i].Name == a.Name {
				out[i].Coef = out[i].Coef.Add(a.Coef)
				return
			}
		}
		out = append(out, a)
	}
	for _, a := range sum {
		if a.Name != sol.Name {
			add(a)
			continue
		}
		for _, b := range sol.Sum {
			add(Addend{a.Coef.Mul(b.Coef), b.Name})
		}
	}
	return out
}
