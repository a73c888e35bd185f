package parse

import (
	"fmt"

	"remnant/parse/diag"
)

// Functions in expressions: free functions with or without their arguments written out,
// their partial derivatives, and the elementary functions.

// functionOf returns the free function that x is, or is a partial derivative of.
func (e *elaborator) functionOf(x Expr) *symbol {
	switch n := x.(type) {
	case *Paren:
		return e.functionOf(n.X)
	case *Name:
		if s := e.symbols[n.Name]; s != nil && s.kind == symbolFunction {
			return e.lookup(n)
		}
	case *Deriv:
		if n.Mark == "," {
			return e.functionOf(n.X)
		}
	case *Call:
		return e.functionOf(n.Fun)
	}
	return nil
}

// byArgument reports whether a derivative is one by an argument of a function.
func (e *elaborator) byArgument(n *Deriv) bool {
	s := e.functionOf(n.X)
	return n.Mark == "," && s != nil && argumentIndex(s, n.Label.Name) >= 0
}

// argumentIndex finds an argument by name; X finds X(phi) where there is but one.
func argumentIndex(s *symbol, name string) int {
	found := -1
	for i, a := range s.args {
		switch {
		case a.Word.Name() != name:
		case found >= 0:
			return -1
		default:
			found = i
		}
	}
	return found
}

// partial returns the function and how often it is differentiated by each argument.
func (e *elaborator) partial(x Expr) (*symbol, []int) {
	switch n := x.(type) {
	case *Paren:
		return e.partial(n.X)
	case *Call:
		s, index := e.partial(n.Fun)
		e.checkArguments(n, s)
		return s, index
	case *Deriv:
		s, index := e.partial(n.X)
		i := argumentIndex(s, n.Label.Name)
		if i < 0 {
			panic(e.notAnIndex(n))
		}
		index[i]++
		e.limitOrder(index[i], n.At)
		return s, index
	}
	s := e.lookup(x.(*Name))
	return s, make([]int, len(s.args))
}

// callee returns the free function that a call names, or nil.
func (e *elaborator) callee(n *Call) *symbol {
	x := n.Fun
	for {
		switch m := x.(type) {
		case *Prime:
			x = m.X
		case *Deriv:
			x = m.X
		case *Name:
			if s := e.symbols[m.Name]; s != nil && s.kind == symbolFunction {
				return e.lookup(m)
			}
			return nil
		default:
			return nil
		}
	}
}

// checkArguments refuses a call with other arguments than those declared.
func (e *elaborator) checkArguments(n *Call, s *symbol) {
	declared := s.fn.Fn.ArgNames
	ok := len(n.Args) == len(declared)
	for i := 0; ok && i < len(declared); i++ {
		ok = argumentName(n.Args[i]) == declared[i]
	}
	if ok {
		return
	}
	want := s.name + "("
	for i, a := range declared {
		if i > 0 {
			want += ", "
		}
		want += a
	}
	panic(newFault(diag.WrongArguments, n.At, fmt.Sprintf("'%s' has other arguments than those declared", brief(n)),
		fmt.Sprintf("functions stand for their values on the background: %s) or %s", want, s.name)))
}

// argumentName is the canonical text of an argument: phi or X(phi).
func argumentName(x Expr) string {
	switch n := x.(type) {
	case *Name:
		return n.Name
	case *Call:
		if f, ok := n.Fun.(*Name); ok && len(n.Args) == 1 {
			return f.Name + "(" + argumentName(n.Args[0]) + ")"
		}
	}
	return ""
}

// evalCall is an elementary function, or a free function with its arguments written out.
func (e *elaborator) evalCall(n *Call) form {
	if s := e.callee(n); s != nil {
		e.checkArguments(n, s)
		return e.eval(n.Fun)
	}
	if v, ok := e.formValue(n); ok {
		return background(v, n.At)
	}
	name, isName := n.Fun.(*Name)
	if isName {
		for _, f := range elementaryNames {
			if name.Name == f {
				return e.elementary(n, f)
			}
		}
		if name.Name == "X" && len(n.Args) == 1 {
			return e.kineticCall(n)
		}
	}
	e.eval(n.Fun) // an unknown name or a form factor has its own message
	panic(newFault(diag.NotAFunction, n.At, fmt.Sprintf("'%s' is not declared as a function", brief(n.Fun)),
		"multiplication is written: "+brief(n.Fun)+"*(…)"))
}

func (e *elaborator) kineticCall(n *Call) form {
	if phi, ok := n.Args[0].(*Name); ok {
		if s := e.lookup(phi); s.kind == symbolBackground {
			return background(e.kineticOf(s.gen), n.At)
		}
	}
	panic(newFault(diag.WrongArguments, n.At, fmt.Sprintf("'%s' is no kinetic term", brief(n)), "the form is X(phi) with a scalar declared in 'background'"))
}

func (e *elaborator) elementary(n *Call, name string) form {
	if len(n.Args) != 1 {
		panic(newFault(diag.WrongArguments, n.At, fmt.Sprintf("'%s' takes one argument", name), "the form is: "+name+"(x)"))
	}
	v, ok := e.eval(n.Args[0]).elem()
	if !ok {
		panic(newFault(diag.NotBackground, n.Args[0].Span(), fmt.Sprintf("'%s' is a perturbation and cannot stand in an elementary function", brief(n.Args[0])), "constants and functions of time stand here"))
	}
	out, err := e.k.Elementary(name, v)
	if err != nil {
		panic(domainFault(err, n.At))
	}
	return background(out, n.At)
}
