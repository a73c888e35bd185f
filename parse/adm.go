package parse

import (
	"fmt"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// Elaboration of an adm Lagrangian: S = ∫dt d³x N√h L in the unitary gauge, with L a scalar on
// the slices of constant time, built from the lapse N (1 on the background), the extrinsic
// curvature K_ij, the curvature R3_ij of the slices, Vn = (N′ − Nⁱ∂_iN)/N, acc_i = ∂_iN/N and
// functions of time. Sums, products, powers and abbreviations are those of the covariant form;
// here are the names, the functions and the derivatives.

// sliceRank is how many indices a geometric quantity of the slices takes beside none; those
// of rank 0 take none, and acc takes its index always.
var sliceRank = map[string]int{"N": 0, "Vn": 0, "K": 2, "R3": 2, "acc": 1}

func (e *elaborator) isADM() bool { return e.form == "adm" }

// adm elaborates the nodes that mean in an adm Lagrangian something else than in a covariant
// one; it is false for the others.
func (e *elaborator) adm(x Expr) (Tensor, bool) {
	e.k.Budget().Check(0)
	switch n := x.(type) {
	case *Name:
		return e.admName(n), true
	case *Prime:
		return e.admPrime(n), true
	case *Deriv:
		if e.byArgument(n) {
			return e.tensorFunction(n), true
		}
		if n.Mark == "," && e.functionOf(n.X) != nil {
			panic(e.notAnIndex(n))
		}
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' has no meaning in an adm Lagrangian", brief(n)),
			"acc.i is ∂_iN/N, and Vn the time derivative of N"))
	case *Index:
		return e.admIndexed(n), true
	case *Apply:
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' has no meaning in an adm Lagrangian", brief(n)),
			"N, K, K.ij, R3, R3.ij, Vn, acc.i and functions of time stand here"))
	case *Call:
		if f, ok := n.Fun.(*Name); ok && f.Name == "X" && e.callee(n) == nil {
			panic(e.notOnSlices(f))
		}
	}
	return nil, false
}

func (e *elaborator) admName(n *Name) Tensor {
	switch rank, ok := sliceRank[n.Name]; {
	case n.Name == "acc":
		panic(newFault(diag.IndexMismatch, n.At, "'acc' stands without its index", "it takes 1: acc.i"))
	case ok && (rank == 0 || rank == 2):
		return &TensorSlice{node{n.At}, n.Name, ""}
	case n.Name == "t":
		return &TensorValue{node{n.At}, e.k.Gen(e.time())}
	case n.Name == "pi":
		return &TensorValue{node{n.At}, e.constantPi()}
	}
	if _, declared := e.symbols[n.Name]; !declared && (n.Name == "X" || n.Name == "G" || n.Name == "R" || tensorRank[n.Name] > 0) {
		panic(e.notOnSlices(n))
	}
	switch s := e.lookup(n); s.kind {
	case symbolConstant, symbolBackground:
		return &TensorValue{node{n.At}, e.k.Gen(s.gen)}
	case symbolFunction:
		return e.tensorFunction(n)
	case symbolLet:
		return e.tensorLet(n, s)
	case symbolFormFactor:
		panic(e.formFactor(n))
	default:
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' is %s and has no meaning in an adm Lagrangian", n.Text, kindNames[s.kind]),
			"N, K, K.ij, R3, R3.ij, Vn, acc.i and functions of time stand here"))
	}
}

// notOnSlices refuses a quantity of the covariant form.
func (e *elaborator) notOnSlices(n *Name) *fault {
	hint := "R3 is the curvature of the slices; R is R3 + K.ij*K.ij - K^2 and a total derivative"
	if n.Name == "X" {
		hint = "X is φ'²/(2N²) in the unitary gauge: a function of time and N"
	}
	return newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' belongs to the covariant form", n.Text), hint)
}

// admPrime is the time derivative of a function of time, by the clock of the model.
func (e *elaborator) admPrime(n *Prime) Tensor {
	if name := e.sliceName(n.X); name != "" {
		hint := "functions of time have primes"
		if name == "N" {
			hint = "Vn is the time derivative of N along the normal, (N' − Nⁱ∂_iN)/N; functions of time have primes"
		}
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' holds '%s' and has no time derivative here", brief(n.X), name), hint))
	}
	return &TensorValue{node{n.At}, e.background(n, "a function of time")}
}

// sliceName finds a quantity of the slices in an expression, also behind abbreviations and as
// an argument of functions; "" if there is none.
func (e *elaborator) sliceName(x Expr) string {
	used := map[string]bool{}
	e.collectNames(x, used)
	for _, name := range formNames["adm"] {
		if used[name] {
			return name
		}
	}
	for _, name := range e.names {
		for _, a := range e.symbols[name].args {
			if _, ok := sliceRank[a.Word.Name()]; ok && used[name] {
				return a.Word.Name()
			}
		}
	}
	return ""
}

func (e *elaborator) admIndexed(n *Index) Tensor {
	name, isName := n.X.(*Name)
	label, isLabel := n.Label.(*Name)
	if isName {
		if s := e.symbols[name.Name]; s != nil && s.kind == symbolFormFactor {
			panic(e.formFactor(n))
		}
		if tensorRank[name.Name] > 0 {
			panic(e.notOnSlices(name))
		}
	}
	if !isName || !isLabel || sliceRank[name.Name] == 0 {
		panic(newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' takes no indices", brief(n.X)), "K.ij, R3.ij and acc.i do"))
	}
	for _, l := range label.Name {
		if !isIndexLetter(l) {
			panic(newFault(diag.NotAnIndex, label.At, fmt.Sprintf("'%c' is no index over space", l), "indices over space are the letters i to n and p to s"))
		}
	}
	if rank := sliceRank[name.Name]; len(label.Name) != rank {
		panic(newFault(diag.IndexMismatch, label.At, fmt.Sprintf("'%s' has %d indices", brief(n), len(label.Name)),
			fmt.Sprintf("%s takes %d: %s.%s", name.Name, rank, name.Name, "ij"[:rank])))
	}
	return &TensorSlice{node{n.At}, name.Name, label.Name}
}

// admArgument is what a function of an adm model depends on, on the background: N is 1, K
// three times the physical rate, R3 and Vn are 0. It is false for the arguments that all
// forms have.
func (e *elaborator) admArgument(a *Argument) (field.Elem, bool) {
	name := a.Word.Name()
	_, declared := e.symbols[name]
	switch {
	case !e.isADM() || a.Of == nil && declared:
		return field.Elem{}, false
	case a.Of != nil, name == "X", name == "R":
		panic(newFault(diag.WrongArguments, a.Word.Span(), fmt.Sprintf("'%s' cannot be an argument of a function in the adm form", a.Word.Text),
			"functions depend on t, N, K, R3, Vn and functions of time"))
	case name == "N":
		return e.k.Int(1), true
	case name == "K":
		m := e.model
		return m.A.D().Div(m.A.Mul(m.Lapse)).Scale(3, 1), true
	case name == "R3", name == "Vn":
		return field.Elem{}, true
	}
	return field.Elem{}, false
}

// admGauge refuses gauges other than the unitary one, in which the form is written.
func (e *elaborator) admGauge(g Gauge, at diag.Span) {
	if e.isADM() && g != Unitary {
		panic(newFault(diag.WrongForm, at, fmt.Sprintf("an adm Lagrangian cannot take the %s gauge", g),
			"it is written on the slices where the scalar is uniform, so that δφ = 0 already: gauge unitary"))
	}
}

// standIns gives a constant to each argument of a function that is a quantity of the slices.
func (e *elaborator) standIns(fn *field.FreeFunc) map[int]field.Gen {
	if !e.isADM() {
		return nil
	}
	out := map[int]field.Gen{}
	for i, name := range fn.ArgNames {
		if _, ok := sliceRank[name]; !ok {
			continue
		}
		sign := field.Unknown
		if name == "N" {
			sign = field.Positive
		}
		g, ok := e.k.Lookup(name)
		if !ok {
			g = e.k.Constant(name, sign)
		}
		out[i] = g
	}
	return out
}

// OnBackground puts the background values of the arguments for their stand-ins in x, the
// definition or a derivative of it. It fails with *field.ErrZeroDivisor where x is singular there.
func (d *FunctionDecl) OnBackground(x field.Elem) (field.Elem, error) {
	if len(d.StandIns) == 0 {
		return x, nil
	}
	return x.Substitute(func(g field.Gen) (field.Elem, bool) {
		for i, own := range d.StandIns {
			if own == g {
				value, err := d.Fn.Args[i].Normal()
				return value, err == nil
			}
		}
		return field.Elem{}, false
	})
}
